/** The load checks of an arm: what each joint and bearing must carry, as convex forms, in the order they are reported. */
import type { Arm, Joint } from '../arm/arm.ts';
import { jointChecks, pairChecks, ringChecks } from './bearingPair.ts';
import type { Chain } from './chain.ts';
import type { CheckForm } from './form.ts';

/** Checks of the bearings of one joint; none where it has no support. */
export function bearingChecks(index: number, joint: Joint): readonly CheckForm[] {
  const { support, drive } = joint;
  if (!support) return [];
  if (support.arrangement === 'ring') return ringChecks(index, support.station, drive);
  return pairChecks(index, { stationA: support.stationA, stationB: support.stationB, drive }, support.thrust);
}

/** Per revolute joint from ground to tip: the bearings' checks, then those of the joint itself. */
export function loadChecks(arm: Arm, chain: Chain): readonly CheckForm[] {
  return chain.jointIndex.flatMap((k, i) => [...bearingChecks(i, arm.joints[k]!), ...jointChecks(i)]);
}
