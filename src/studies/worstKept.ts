/**
 * What a certified worst of an earlier layout still says of a later one: value, pose and bound of every check for which the loads and the check
 * itself are as they were, number for number. They hold without any search.
 */
import type { Arm } from '../arm/arm.ts';
import { type Chain, flattenArm } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import { sameCheck, sameJointLoad } from '../mechanics/sameLoad.ts';
import type { CheckRow } from './results.ts';
import type { WorstResult } from './worstArm.ts';

export interface EarlierWorst {
  readonly arm: Arm;
  readonly worst: WorstResult;
}

/**
 * For each case of `chain` and each of its `checks` the row that stays, or null. `checksOf` gives the checks of an arm in the order of its rows.
 * Where a joint, its frame or a case has another name, place or turn, nothing stays: a row speaks of them.
 */
export function keptRows(
  earlier: EarlierWorst,
  chain: Chain,
  checks: readonly CheckForm[],
  checksOf: (arm: Arm, chain: Chain) => readonly CheckForm[],
): readonly (readonly (CheckRow | null)[])[] {
  const before = flattenArm(earlier.arm);
  const theirs = checksOf(earlier.arm, before);
  const rows = earlier.worst.eachCase;
  const whole = rows.length === before.cases.length * theirs.length;
  return chain.cases.map((load, caseIndex) => {
    const theirLoad = before.cases[caseIndex];
    if (!whole || theirLoad?.name !== load.name) return checks.map(() => null);
    const stays = chain.names.map(
      (_, joint) =>
        isNamedAlike(before, chain, joint) && sameJointLoad({ chain: before, load: theirLoad }, { chain, load }, joint),
    );
    return checks.map((check) => {
      if (!stays[check.joint]) return null;
      const place = theirs.findIndex((one) => sameCheck(one, check));
      const row = rows[caseIndex * theirs.length + place];
      return place >= 0 && row && Number.isFinite(row.value) ? row : null;
    });
  });
}

function isNamedAlike(a: Chain, b: Chain, joint: number): boolean {
  if (a.names[joint] !== b.names[joint] || a.jointIndex[joint] !== b.jointIndex[joint]) return false;
  for (let k = 9 * joint; k < 9 * joint + 9; k++) if (a.housing[k] !== b.housing[k]) return false;
  return true;
}
