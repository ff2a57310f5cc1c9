/** What the shaft rests on, for the checks of its bent line. */
import type { JointShaft } from '../shaft/index.ts';
import { isRingParts, type PairParts, type RingParts } from './jointParts.ts';

/** A station on the shaft; beyond its last support or load the shaft stays straight, so the end stands for what lies further out. */
export function heldStation(shaft: JointShaft, station: number): number {
  const { nodes } = shaft.beam;
  return Math.min(Math.max(station, nodes[0]!), nodes[nodes.length - 1]!);
}

/** Which bearings were taken as rigid. */
export function supportNotes(parts: PairParts | RingParts): readonly string[] {
  const known = isRingParts(parts) ? [parts.bearing] : [parts.bearings.A, parts.bearings.B];
  const rigid = known.filter((bearing) => 'unassessed' in bearing || bearing.value.stiffness === null).length;
  if (rigid === 0) return [];
  return [
    rigid === known.length
      ? 'bearings taken as rigid: no stiffness in the file'
      : 'one bearing taken as rigid: no stiffness in the file',
  ];
}
