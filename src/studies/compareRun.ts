/**
 * The rows of a comparison by the certified worst: one search a case holds every layout and span of the plan against the joint loads of the
 * whole travel. As a job for workers; anytime, in passes of a falling gap.
 */
import type { Arm } from '../arm/arm.ts';
import { flattenArm } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import type { JobKind, JobPool } from '../mechanics/job.ts';
import type { ComparePlan } from './comparePlan.ts';
import type { CheckRow } from './results.ts';
import { CaseSearch, type CaseWorst, DEFAULT_GAP, DEFAULT_SECONDS, overCases } from './worstArm.ts';

/** Plain data. */
export interface CompareShared {
  readonly arm: Arm;
  readonly checks: readonly CheckForm[];
  readonly gap: number;
  /** Time of the clock (`Date.now`) at which to stop, ms. */
  readonly end: number;
}

/** Input: index of the case. */
export const compareJob: JobKind<CompareShared, number, CaseWorst> = {
  name: 'compare',
  start: ({ arm, checks, gap, end }) => {
    const chain = flattenArm(arm);
    return (caseIndex) => {
      const search = new CaseSearch(arm, chain, caseIndex, checks, gap);
      search.work(() => Date.now() > end);
      return search.result();
    };
  },
};

const FIRST_GAP = 0.1;

export interface CompareRunOptions {
  readonly pool: JobPool;
  readonly gap?: number;
  readonly seconds?: number;
  readonly signal?: AbortSignal;
}

export interface CompareRows {
  /** One a check of the plan, for `compareArm`; empty where it was stopped before every case was looked at once. */
  readonly rows: readonly CheckRow[];
  readonly certified: boolean;
  /** Stopped by the signal. */
  readonly partial: boolean;
  readonly seconds: number;
}

/** Searches the cases of `arm` (of which `plan` was made) until every gap is closed, the time is up or the signal stops it. */
export async function runCompare(arm: Arm, plan: ComparePlan, options: CompareRunOptions): Promise<CompareRows> {
  const { pool, gap = DEFAULT_GAP, seconds = DEFAULT_SECONDS, signal } = options;
  const begin = Date.now();
  const end = begin + 1000 * seconds;
  const best = new Map<number, CaseWorst>();
  let stopped = false;
  for (const pass of gap < FIRST_GAP ? [FIRST_GAP, gap] : [gap]) {
    const finished = await pool.run({
      kind: compareJob,
      shared: { arm, checks: plan.checks, gap: pass, end },
      chunks: arm.cases.length,
      input: (chunk) => chunk,
      onOutput: (chunk, output) => best.set(chunk, better(best.get(chunk), output)),
      ...(signal ? { signal } : {}),
    });
    stopped = finished.stopped;
    if (stopped || Date.now() > end) break;
  }
  const rows = best.size === arm.cases.length ? overCases([...best.values()], gap) : [];
  return {
    rows,
    certified: rows.length > 0 && rows.every((row) => row.certified),
    partial: stopped,
    seconds: (Date.now() - begin) / 1000,
  };
}

/** Of two searches of one case the rows with the smaller gap; the later one where they tie. A failed row stays. */
function better(before: CaseWorst | undefined, after: CaseWorst): CaseWorst {
  if (!before) return after;
  const rows = after.rows.map((row, k) => {
    const old = before.rows[k]!;
    return Number.isNaN(old.value) || old.gap! < row.gap! ? old : row;
  });
  return { caseIndex: after.caseIndex, rows };
}
