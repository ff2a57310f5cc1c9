/** What the checks of one joint need of the arm, looked up once: bearings, points of support, the shaft on them. */
import type { Arm, Bearing, Joint, PairSupport, RingSupport } from '../../arm/arm.ts';
import { type PairGeometry, radialForms, ringChecks } from '../../mechanics/bearingPair.ts';
import type { Chain } from '../../mechanics/chain.ts';
import type { Form } from '../../mechanics/form.ts';
import type { Assessed } from '../rule.ts';
import { type JointShaft, jointShaft, shaftSupports } from '../shaft/index.ts';
import { type TargetList, targetsOf } from '../targets.ts';
import { type AdjustedPair, adjustedPair } from './adjustedParts.ts';
import type { CapacityCheck, CheckName } from './check.ts';

export type BearingSide = 'A' | 'B' | 'ring';

export interface SupportedJoint {
  /** Chain index, and index in the arm file. */
  readonly joint: number;
  readonly jointIndex: number;
  readonly part: Joint;
  readonly targets: TargetList;
  /** Largest force that lengths and masses suggest, N: what rounding is measured by. */
  readonly forceScale: number;
  /** Whether the joint load enters by the shaft (it turns with the link) or by the housings; `assumed` where no shaft is given. */
  readonly loadOn: 'shaft' | 'housing';
  readonly loadOnAssumed: boolean;
}

export interface PairParts extends SupportedJoint {
  readonly support: PairSupport;
  readonly bearings: Readonly<Record<'A' | 'B', Assessed<Bearing>>>;
  /** Only of an adjusted pair. */
  readonly adjusted: Assessed<AdjustedPair> | null;
  /** Points of support: bearing centres, or the pressure centres of an adjusted pair where they are known. */
  readonly points: PairGeometry;
  readonly shaft: Assessed<JointShaft>;
}

export interface RingParts extends SupportedJoint {
  readonly support: RingSupport;
  readonly bearing: Assessed<Bearing>;
  readonly shaft: Assessed<JointShaft>;
}

/** The bearing of a name in the arm's table, or what to fill in. */
export function bearingOf(arm: Arm, name: string | null, side: BearingSide): Assessed<Bearing> {
  const where = side === 'ring' ? 'ring' : side;
  if (name === null)
    return { unassessed: `no bearing is named for ${where}: fill in a name of the table \`bearings\`` };
  const value = Object.hasOwn(arm.bearings, name) ? arm.bearings[name] : undefined;
  return value ? { value } : { unassessed: `the bearing “${name}” is not in the table \`bearings\`: fill it in` };
}

/** What the joint carries at most, N, by weight and tip force alone. */
function forceScale(chain: Chain, joint: number): number {
  const g = Math.hypot(...chain.gravity);
  const sizes = chain.cases.map((load) => {
    let mass = 0;
    for (let k = joint; k < chain.n; k++) mass += load.mass[k]!;
    return g * mass + load.magnitude;
  });
  return Math.max(0, ...sizes);
}

/** The parts of a revolute joint (chain index); null where it has no support. */
export function jointParts(arm: Arm, chain: Chain, joint: number): PairParts | RingParts | null {
  const jointIndex = chain.jointIndex[joint]!;
  const part = arm.joints[jointIndex]!;
  const { support } = part;
  if (!support) return null;
  const common: SupportedJoint = {
    joint,
    jointIndex,
    part,
    targets: targetsOf(arm),
    forceScale: forceScale(chain, joint),
    loadOn: support.shaft?.turnsWith === 'housing' ? 'housing' : 'shaft',
    loadOnAssumed: support.shaft === null,
  };
  const stiffness = (bearing: Assessed<Bearing>) =>
    'value' in bearing ? (bearing.value.stiffness ?? Number.POSITIVE_INFINITY) : Number.POSITIVE_INFINITY;
  if (support.arrangement === 'ring') {
    const bearing = bearingOf(arm, support.bearing, 'ring');
    const shaft = jointShaft(part, shaftSupports(support, [stiffness(bearing)]));
    return { ...common, support, bearing, shaft };
  }
  const bearings = { A: bearingOf(arm, support.bearingA, 'A'), B: bearingOf(arm, support.bearingB, 'B') };
  const adjusted = support.adjusted === null ? null : adjustedPair(support, bearings, part.drive, common.loadOn);
  const points =
    adjusted && 'value' in adjusted
      ? adjusted.value.points
      : { stationA: support.stationA, stationB: support.stationB, drive: part.drive };
  const held = shaftSupports({ ...support, stationA: points.stationA, stationB: points.stationB }, [
    stiffness(bearings.A),
    stiffness(bearings.B),
  ]);
  return { ...common, support, bearings, adjusted, points, shaft: jointShaft(part, held) };
}

export function isRingParts(parts: PairParts | RingParts): parts is RingParts {
  return parts.support.arrangement === 'ring';
}

/** Radial load on a bearing at its point of support, and the tilting moment on a ring (null for A and B), as norms of two rows. */
export function radialNorms(parts: PairParts | RingParts, side: BearingSide): readonly Form[] {
  if (isRingParts(parts)) return ringForms(parts, 'radial');
  return radialForms(parts.points, side === 'B' ? 'B' : 'A');
}

export function tiltingNorms(parts: RingParts): readonly Form[] {
  return ringForms(parts, 'moment');
}

function ringForms(parts: RingParts, check: 'radial' | 'moment'): readonly Form[] {
  return ringChecks(parts.joint, parts.support.station, parts.part.drive).find((one) => one.check === check)!.forms;
}

/** The head of a check of this joint. */
export function named(
  parts: SupportedJoint,
  bearing: CapacityCheck['bearing'],
  name: Pick<CheckName, 'check' | 'label' | 'unit' | 'rule'>,
): CheckName {
  return { ...name, joint: parts.joint, jointIndex: parts.jointIndex, bearing };
}

/** Linear part of a thrust along + axis, per newton. */
export function thrustLine(perNewton: number): readonly number[] {
  return [0, 0, perNewton, 0, 0, 0];
}

/** Signs of the thrusts along + axis that load a bearing of a pair whose thrust goes by name or by direction; none: it floats. */
export function thrustSigns(support: PairSupport, side: 'A' | 'B'): readonly (1 | -1)[] {
  if (support.thrust === 'both') return [side === 'A' ? 1 : -1];
  return support.thrust === side ? [1, -1] : [];
}

/** Axial load on a bearing of a pair that is not adjusted, N, at a thrust fz along + axis. */
export function axialOn(support: PairSupport, side: 'A' | 'B', fz: number): number {
  if (support.thrust === 'both') return side === 'A' ? Math.max(0, fz) : Math.min(0, fz);
  return support.thrust === side ? fz : 0;
}
