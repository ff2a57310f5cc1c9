/** Life, fatigue and play beside a sweep or a search, with Ctrl-C. */
import type { Arm } from '../arm/arm.ts';
import { runLasting } from '../studies/lastingRun.ts';
import type { CheckRow } from '../studies/results.ts';
import { onInterrupt } from './interrupt.ts';
import { openPool } from './openPool.ts';
import { warn } from './output.ts';
import { withPatience } from './withPatience.ts';

export interface LastingRequest {
  /** With all its cases: what is asked for is a mean or a range over the duty or over every case. */
  readonly arm: Arm;
  readonly case: readonly string[] | undefined;
  readonly eachCase: boolean | undefined;
  readonly workers: number | undefined;
}

/** The rows, or null where they were interrupted. None, and a word why, where the question is about single cases. */
export async function lastingRowsFor(request: LastingRequest): Promise<readonly CheckRow[] | null> {
  if (request.case || request.eachCase) {
    warn('life, fatigue and play belong to no single case: left out with --case and --each-case');
    return [];
  }
  const interrupt = onInterrupt();
  const pool = openPool(request.workers);
  try {
    const work = runLasting(request.arm, { pool, signal: interrupt.signal });
    const ended = await withPatience(work, interrupt.signal);
    return ended && !ended.stopped ? ended.rows : null;
  } finally {
    interrupt.release();
    pool.close();
  }
}
