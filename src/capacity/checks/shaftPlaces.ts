/** Names of the places along a shaft, for saying where something is worst. */
import { isRingParts, type PairParts, type RingParts } from './jointParts.ts';

/** Stations nearer than this are one place, m. */
const SAME = 1e-9;

/** What stands at a station (m along the joint axis from the joint origin); ends of sections where nothing else does. */
export function placeName(parts: PairParts | RingParts, station: number): string {
  const { support, part } = parts;
  const here = (at: number) => Math.abs(at - station) <= SAME;
  const names: string[] = [];
  if (here(support.hub)) names.push('hub');
  if (isRingParts(parts)) {
    if (here(parts.support.station)) names.push('ring');
  } else {
    const centre = parts.adjusted && 'value' in parts.adjusted ? 'pressure centre' : 'bearing';
    if (here(parts.points.stationA)) names.push(`${centre} A`);
    if (here(parts.points.stationB)) names.push(`${centre} B`);
  }
  if (part.drive && here(part.drive.station)) names.push('drive');
  if (names.length > 0) return names.join(' and ');
  const section = support.shaft?.sections.findIndex(({ from, to }) => here(to) || here(from)) ?? -1;
  return section >= 0 ? `end of section ${section + 1}` : 'end of the shaft';
}
