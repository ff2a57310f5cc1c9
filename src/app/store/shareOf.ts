/** Who causes a worst value, and what would lower it: for one row of the worst loads. */
import type { Arm } from '../../arm/arm.ts';
import { capacityForms, jointCapacity } from '../../capacity/index.ts';
import { jointChecks } from '../../mechanics/bearingPair.ts';
import type { Chain } from '../../mechanics/chain.ts';
import type { CheckForm } from '../../mechanics/form.ts';
import { bearingChecks } from '../../mechanics/loadChecks.ts';
import type { CheckRow } from '../../studies/results.ts';
import { type ArmShare, sharesOf } from '../../studies/sharesArm.ts';
import { type Slope, slopesOf } from '../../studies/slopes.ts';

/** Every check of the row's joint, of whatever arm the study tries; the checks of the other joints are not needed. */
function checksOfJoint(jointIndex: number) {
  return (arm: Arm, chain: Chain): readonly CheckForm[] => {
    const i = chain.jointIndex.indexOf(jointIndex);
    return [
      ...bearingChecks(i, arm.joints[jointIndex]!),
      ...jointChecks(i),
      ...capacityForms(jointCapacity(arm, chain, i)),
    ];
  };
}

/** Shares of each link, payload, tip force and drive in the value of a row, the largest first; empty where the row is no such sum. */
export function sharesOfRow(arm: Arm, row: CheckRow): readonly ArmShare[] {
  return row.pose.length > 0 ? sharesOf(arm, row, checksOfJoint(row.jointIndex)) : [];
}

/** How the value of a row moves with lengths, masses and travel limits, what helps most first. */
export function slopesOfRow(arm: Arm, row: CheckRow): readonly Slope[] {
  if (row.pose.length === 0 || !(Math.abs(row.value) > 0)) return [];
  return slopesOf(arm, row, checksOfJoint(row.jointIndex));
}
