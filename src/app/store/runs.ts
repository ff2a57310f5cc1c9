/** Long work of the sheet, in workers: the sweep of a grid, the proof of the worst, the two ways of a joint. Each can be stopped. */
import type { Arm } from '../../arm/arm.ts';
import { flattenArm } from '../../mechanics/chain.ts';
import type { CheckForm } from '../../mechanics/form.ts';
import type { JobPool } from '../../mechanics/job.ts';
import { type CompareResult, compareArm } from '../../studies/compareArm.ts';
import { type CompareOptions, type CompareRefusal, planCompare } from '../../studies/comparePlan.ts';
import type { LastingPart } from '../../studies/lastingRows.ts';
import { runLasting } from '../../studies/lastingRun.ts';
import type { CheckRow, SweepResult } from '../../studies/results.ts';
import { sweepArm } from '../../studies/sweepArm.ts';
import { sweepChecks } from '../../studies/sweepChecks.ts';
import type { WorstResult } from '../../studies/worstArm.ts';
import type { EarlierWorst } from '../../studies/worstKept.ts';
import { runWorst } from '../../studies/worstRun.ts';
import { browserPool } from '../../worker/browserPool.ts';

export interface Run<Result> {
  readonly result: Promise<Result>;
  stop(): void;
}

export type SweepRun = Run<Swept>;
export type ProofRun = Run<WorstResult>;
export type LastingRun = Run<void>;
export type CompareRun = Run<CompareResult | CompareRefusal>;

export interface GridOrder {
  /** rad. */
  readonly step: number;
  /** In the order of the arm. */
  readonly cases: readonly string[];
}

/** Workers of the sweeps, kept from one to the next; started when they are first needed. */
let sweepers: JobPool | null = null;
/** What a stop waits for a part under way, ms; then its worker is ended with it. */
const PATIENCE = 1200;

function sweepGrid(
  arm: Arm,
  checks: readonly CheckForm[],
  order: GridOrder,
  onProgress?: (done: number, poses: number) => void,
): Run<SweepResult> {
  sweepers ??= browserPool();
  const pool = sweepers;
  const control = new AbortController();
  let settled = false;
  const result = sweepArm(
    arm,
    { step: order.step },
    {
      pool,
      cases: order.cases,
      checks,
      onProgress,
      signal: control.signal,
    },
  );
  const settle = () => {
    settled = true;
  };
  result.then(settle, settle);
  const stop = () => {
    control.abort();
    setTimeout(() => {
      if (settled) return;
      pool.close();
      if (sweepers === pool) sweepers = null;
    }, PATIENCE);
  };
  return { result, stop };
}

/** A sweep and, without values, the rows of what it had to leave out; none has a verdict for its value yet. */
export interface Swept extends SweepResult {
  readonly leftOut: readonly CheckRow[];
}

/** Every load and demand on capacity that a sweep of `poses` poses has time for. */
export function startSweep(
  arm: Arm,
  order: GridOrder & { readonly poses: number },
  onProgress: (done: number, poses: number) => void,
): Run<Swept> {
  const { checks, leftOut } = sweepChecks(arm, flattenArm(arm), order.poses, order.cases);
  const { result, stop } = sweepGrid(arm, checks, order, onProgress);
  return { result: result.then((swept) => ({ ...swept, leftOut })), stop };
}

/** One pass over the grid for both ways of a joint and every span. */
export function startCompare(arm: Arm, joint: string, options: CompareOptions, order: GridOrder): CompareRun {
  const plan = planCompare(arm, flattenArm(arm), joint, options);
  if ('refused' in plan) return { result: Promise.resolve(plan), stop: () => undefined };
  const pass = sweepGrid(arm, plan.checks, order);
  return { result: pass.result.then((swept) => compareArm(plan, swept.rows)), stop: pass.stop };
}

/**
 * The certified worst; `onBetter` gives each better answer as it comes. What an `earlier` layout proved and the change leaves as it was is
 * not searched again. Its workers are its own, so that a stop can end them in the middle of a long part.
 */
export function startProof(
  arm: Arm,
  order: { readonly gap: number; readonly seconds: number; readonly earlier: EarlierWorst | null },
  onBetter: (best: WorstResult) => void,
): Run<WorstResult> {
  const pool = browserPool();
  const result = runWorst(arm, { pool, ...order, onBetter }).finally(() => pool.close());
  return { result, stop: () => pool.close() };
}

/** Life, fatigue and play, part by part, in a worker of their own that a stop ends at once. */
export function startLasting(arm: Arm, onPart: (part: LastingPart, rows: readonly CheckRow[]) => void): LastingRun {
  const pool = browserPool(1);
  const result = runLasting(arm, { pool, onPart })
    .then(() => undefined)
    .finally(() => pool.close());
  return { result, stop: () => pool.close() };
}
