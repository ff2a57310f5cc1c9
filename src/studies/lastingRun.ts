/** Life, fatigue and play as a job for workers, one part a chunk. */
import type { Arm } from '../arm/arm.ts';
import { flattenArm } from '../mechanics/chain.ts';
import type { JobKind, JobPool } from '../mechanics/job.ts';
import { LASTING_PARTS, type LastingPart, lastingPart } from './lastingRows.ts';
import type { CheckRow } from './results.ts';

/** Plain data. */
export interface LastingShared {
  readonly arm: Arm;
}

export const lastingJob: JobKind<LastingShared, LastingPart, readonly CheckRow[]> = {
  name: 'lasting',
  start: ({ arm }) => {
    const chain = flattenArm(arm);
    return (part) => lastingPart(arm, chain, part);
  },
};

export interface LastingOptions {
  readonly pool: JobPool;
  readonly signal?: AbortSignal;
  readonly onPart?: (part: LastingPart, rows: readonly CheckRow[]) => void;
}

/** The rows of every part that was reached, and whether the signal came before the last. Rejects with `JobFailed` where a worker fails. */
export async function runLasting(
  arm: Arm,
  { pool, signal, onPart }: LastingOptions,
): Promise<{ readonly rows: readonly CheckRow[]; readonly stopped: boolean }> {
  const rows: CheckRow[] = [];
  const shared: LastingShared = { arm };
  const { stopped } = await pool.run({
    kind: lastingJob,
    shared,
    chunks: LASTING_PARTS.length,
    input: (chunk) => LASTING_PARTS[chunk]!,
    onOutput: (chunk, part) => {
      rows.push(...part);
      onPart?.(LASTING_PARTS[chunk]!, part);
    },
    ...(signal ? { signal } : {}),
  });
  return { rows, stopped };
}
