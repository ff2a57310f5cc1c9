/** A sweep with its progress bar and Ctrl-C. */
import type { Arm } from '../arm/arm.ts';
import type { Chain } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import type { GridChoice } from '../mechanics/gridSweepGrid.ts';
import { countText } from '../report/shown.ts';
import type { SweepResult } from '../studies/results.ts';
import { sweepArm } from '../studies/sweepArm.ts';
import { inlinePool } from '../worker/inlinePool.ts';
import { onInterrupt } from './interrupt.ts';
import { openPool } from './openPool.ts';
import { progressBar } from './progressBar.ts';

export interface SweepRequest {
  readonly choice: GridChoice;
  readonly cases: readonly string[] | null;
  readonly checks: readonly CheckForm[];
  readonly poses: number;
  readonly workers: number | undefined;
}

/** Fewer poses (of all cases) than this are swept sooner than threads start. */
const WORTH_THREADS = 50_000;

/** Partial where it was interrupted. The result is the same with threads and without. */
export async function runSweep(arm: Arm, chain: Chain, request: SweepRequest): Promise<SweepResult> {
  const work = request.poses * chain.cases.length;
  const pool = request.workers === undefined && work < WORTH_THREADS ? inlinePool() : openPool(request.workers);
  const interrupt = onInterrupt();
  const bar = progressBar();
  try {
    return await sweepArm(arm, request.choice, {
      pool,
      cases: request.cases,
      checks: request.checks,
      signal: interrupt.signal,
      onProgress: (done, poses) => bar.show(done / poses, `${countText(done)} of ${countText(poses)} poses`),
    });
  } finally {
    bar.clear();
    interrupt.release();
    pool.close();
  }
}
