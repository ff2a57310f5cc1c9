/** Rows as studies hand them on, made at a pose of one's own choice. */
import type { Arm } from '../../src/arm/arm.ts';
import type { Chain } from '../../src/mechanics/chain.ts';
import type { CheckForm } from '../../src/mechanics/form.ts';
import type { FreePart } from '../../src/mechanics/freeLoads.ts';
import type { CheckRow } from '../../src/studies/results.ts';

export interface RowPart {
  readonly value: number;
  readonly pose: ArrayLike<number>;
  readonly free: FreePart | null;
}

export function rowAt(arm: Arm, chain: Chain, caseIndex: number, check: CheckForm, part: RowPart): CheckRow {
  const jointIndex = chain.jointIndex[check.joint]!;
  return {
    joint: arm.joints[jointIndex]!.name,
    jointIndex,
    bearing: check.bearing,
    check: check.check,
    unit: check.unit,
    value: part.value,
    case: arm.cases[caseIndex]!.name,
    pose: Array.from(part.pose),
    free: part.free,
    wrench: { force: [0, 0, 0], moment: [0, 0, 0] },
    bound: null,
    gap: null,
    certified: null,
    allowable: null,
    utilisation: null,
    verdict: null,
    reason: null,
    source: null,
  };
}
