/** The one list of capacity checks of an arm, in the order they are reported. */
import type { Arm } from '../../arm/arm.ts';
import type { Chain } from '../../mechanics/chain.ts';
import type { Rule } from '../rule.ts';
import { staticChecks } from './bearingStatic.ts';
import { pressureChecks } from './bushingPressure.ts';
import { type CapacityCheck, missingCheck } from './check.ts';
import { dynamicChecks } from './dynamicLoad.ts';
import { jointParts, type PairParts, type RingParts } from './jointParts.ts';
import { deflectionChecks } from './shaftDeflection.ts';
import { slopeChecks } from './shaftSlope.ts';
import { stressChecks } from './shaftStress.ts';
import { thrustChecks } from './thrust.ts';

/** A new check joins here. */
const KINDS: readonly ((parts: PairParts | RingParts) => readonly CapacityCheck[])[] = [
  staticChecks,
  thrustChecks,
  pressureChecks,
  slopeChecks,
  dynamicChecks,
  stressChecks,
  deflectionChecks,
];

export const SUPPORT_RULE: Rule = {
  name: 'support',
  formula: 'none: bearings and shaft must be known',
  source: 'arm file',
  trust: 'common practice',
  units: '-',
  range: 'every joint that turns',
};

/** Checks of one revolute joint (chain index): those of A, then of B or the ring, then of the shaft. */
export function jointCapacity(arm: Arm, chain: Chain, joint: number): readonly CapacityCheck[] {
  const parts = jointParts(arm, chain, joint);
  if (!parts) {
    const name = { check: 'support', label: 'support', unit: 'N', rule: SUPPORT_RULE, bearing: null } as const;
    const jointIndex = chain.jointIndex[joint]!;
    return [missingCheck({ ...name, joint, jointIndex }, 'the joint has no bearings in the file: fill in `support`')];
  }
  const all = KINDS.flatMap((kind) => kind(parts));
  const rank = (check: CapacityCheck) => ['A', 'B', 'ring', null].indexOf(check.bearing);
  return all
    .map((check, i) => ({ check, i }))
    .sort((a, b) => rank(a.check) - rank(b.check) || a.i - b.i)
    .map(({ check }) => check);
}

/** Prepared once for an arm; joints from ground to tip. */
export function capacityChecks(arm: Arm, chain: Chain): readonly CapacityCheck[] {
  return chain.jointIndex.flatMap((_, joint) => jointCapacity(arm, chain, joint));
}
