/** What a sweep looks at: the loads and the demands on capacity, but for those that would take it too long. */
import type { Arm } from '../arm/arm.ts';
import type { Chain } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import { hasFree } from '../mechanics/freeLoads.ts';
import type { CheckRow } from './results.ts';
import { armChecks } from './worstRun.ts';

export interface SweepChecks {
  readonly checks: readonly CheckForm[];
  /** Rows of the checks left out, unassessed, with the reason. */
  readonly leftOut: readonly CheckRow[];
}

/**
 * A form of three rows (a stress) over a free tip force or motion is searched for at every pose. Seconds each, measured on one core
 * with the models; what would take longer than the budget is left out.
 */
const SEARCH = { tipForce: 1e-4, motion: 1e-3 } as const;
const BUDGET = 3;

const REASON =
  'what the cases leave free makes this too long for so fine a grid: take a coarser one, or the certified worst';

/** `poses`: of the grid. `caseNames`: the cases swept; null: all. */
export function sweepChecks(
  arm: Arm,
  chain: Chain,
  poses: number,
  caseNames: readonly string[] | null = null,
): SweepChecks {
  const all = armChecks(arm, chain);
  const slow = all.filter((check) => check.forms.some((form) => form.rows > 2));
  const perPose = chain.cases
    .filter((load) => hasFree(load) && (!caseNames || caseNames.includes(load.name)))
    .reduce((sum, load) => sum + (load.speed ? SEARCH.motion : SEARCH.tipForce), 0);
  if (slow.length * perPose * poses <= BUDGET) return { checks: all, leftOut: [] };
  const none = [Number.NaN, Number.NaN, Number.NaN] as const;
  return {
    checks: all.filter((check) => !slow.includes(check)),
    leftOut: slow.map((check) => ({
      joint: chain.names[check.joint]!,
      jointIndex: chain.jointIndex[check.joint]!,
      bearing: check.bearing,
      check: check.check,
      unit: check.unit,
      value: Number.NaN,
      case: '',
      pose: [],
      free: null,
      wrench: { force: none, moment: none },
      bound: null,
      gap: null,
      certified: null,
      allowable: null,
      utilisation: null,
      verdict: 'unassessed',
      reason: REASON,
      source: null,
    })),
  };
}
