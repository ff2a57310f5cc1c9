/** The rows of a comparison, by proof or over a grid, with Ctrl-C. */
import type { Arm } from '../arm/arm.ts';
import type { Chain } from '../mechanics/chain.ts';
import { gridChoiceText } from '../report/gridText.ts';
import type { ComparePlan } from '../studies/comparePlan.ts';
import { runCompare } from '../studies/compareRun.ts';
import type { CheckRow } from '../studies/results.ts';
import { DEFAULT_GAP, DEFAULT_SECONDS } from '../studies/worstArm.ts';
import { type GridOptions, gridChoice } from './gridChoice.ts';
import { onInterrupt } from './interrupt.ts';
import { openPool } from './openPool.ts';
import { runSweep } from './runSweep.ts';
import { sweepText } from './sweepText.ts';
import { withPatience } from './withPatience.ts';

export interface ComparisonOptions extends GridOptions {
  readonly gap?: number;
  readonly seconds?: number;
  readonly workers?: number;
}

export interface ComparisonRows {
  /** One a check of the plan; empty where it was interrupted before there was anything to compare. */
  readonly rows: readonly CheckRow[];
  readonly partial: boolean;
  readonly seconds: number;
  /** What was looked at, for a heading, and how, in a sentence; and the facts for JSON. */
  readonly over: string;
  readonly method: string;
  readonly facts: Readonly<Record<string, unknown>>;
}

/** The whole travel by proof; over a grid where a step or a number of samples is given. */
export function runComparison(
  arm: Arm,
  chain: Chain,
  plan: ComparePlan,
  options: ComparisonOptions,
): Promise<ComparisonRows> {
  const onGrid = options.step !== undefined || options.samples !== undefined;
  return onGrid ? overGrid(arm, chain, plan, options) : overTravel(arm, plan, options);
}

const SAME_LOADS = 'The load on the joint does not depend on how it is carried';

async function overGrid(
  arm: Arm,
  chain: Chain,
  plan: ComparePlan,
  options: ComparisonOptions,
): Promise<ComparisonRows> {
  const { choice, poses } = gridChoice(chain, options);
  const swept = await runSweep(arm, chain, {
    choice,
    cases: null,
    checks: plan.checks,
    poses,
    workers: options.workers,
  });
  return {
    rows: swept.rows,
    partial: swept.partial,
    seconds: swept.seconds,
    over: `${sweepText(swept, arm.cases.length)}, ${gridChoiceText(choice)}`,
    method:
      `${SAME_LOADS}: one pass over the poses, every layout and span held against every joint load of it.\n` +
      'A grid finds a bad pose; it does not show that there is none worse between its samples.',
    facts: { poses: swept.poses, poses_done: swept.done },
  };
}

async function overTravel(arm: Arm, plan: ComparePlan, options: ComparisonOptions): Promise<ComparisonRows> {
  const { gap = DEFAULT_GAP, seconds = DEFAULT_SECONDS } = options;
  const interrupt = onInterrupt();
  const pool = openPool(options.workers);
  const search = runCompare(arm, plan, { pool, gap, seconds, signal: interrupt.signal });
  const found = await withPatience(search, interrupt.signal).finally(() => {
    interrupt.release();
    pool.close();
  });
  const rows = found?.rows ?? [];
  const open = rows.filter((row) => !row.certified).length;
  const cases = arm.cases.length === 1 ? '1 case' : `${arm.cases.length} cases`;
  const proof =
    open === 0
      ? `Values are attained; nothing within travel exceeds them by more than ${100 * gap} %.`
      : `Values are attained; for ${open} of ${rows.length} it is not proved that nothing within travel exceeds them by more than ${100 * gap} %: give more --seconds or a larger --gap.`;
  return {
    rows,
    partial: interrupt.signal.aborted,
    seconds: found?.seconds ?? 0,
    over: `the whole travel, ${cases}`,
    method: `${SAME_LOADS}: one search of the travel, every layout and span held against the same joint loads.\n${proof}`,
    facts: { gap_asked: gap, certified: found?.certified ?? false },
  };
}
