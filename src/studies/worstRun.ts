/**
 * The certified worst as a job for workers, anytime: passes of a growing time, each over all cases, so that a first answer is there at once and
 * better ones follow; a stop, or the end of the time allowed, keeps the best so far. A pass leaves out what an earlier one closed.
 */
import type { Arm } from '../arm/arm.ts';
import { type CapacityCheck, capacityChecks, capacityForms } from '../capacity/index.ts';
import { type Chain, flattenArm } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import { gravityLoad } from '../mechanics/gravityLoad.ts';
import type { JobKind, JobPool } from '../mechanics/job.ts';
import type { Limits } from '../mechanics/worstCase.ts';
import type { CheckRow } from './results.ts';
import {
  CaseSearch,
  type CaseWorst,
  DEFAULT_GAP,
  DEFAULT_SECONDS,
  type WorstResult,
  worstChecks,
  worstResult,
} from './worstArm.ts';
import { type EarlierWorst, keptRows } from './worstKept.ts';

/** Plain data. */
export interface WorstShared {
  readonly arm: Arm;
  /** Gap asked for. */
  readonly gap: number;
  /** Time of the clock (`Date.now`) at which to stop, ms. */
  readonly end: number;
}

/** A case, or one joint of it where joints share no work: the checks of `joints` (chain indices). */
export interface WorstInput {
  readonly caseIndex: number;
  readonly joints: readonly number[];
  /** Time it may take, ms. */
  readonly budget: number;
}

type Part = Pick<WorstInput, 'caseIndex' | 'joints'>;

/** Every check that the certified worst covers: loads of joints and bearings, and the demands on capacity that are convex. */
export function armChecks(arm: Arm, chain: Chain): readonly CheckForm[] {
  return worstChecks(arm, chain, capacityForms(capacityChecks(arm, chain)));
}

/** What those checks are held against, where it is known. */
function armLimits(checks: readonly CapacityCheck[]): Limits {
  const limits = new Map<CheckForm, number>();
  for (const { form, allowable } of checks) if (form && allowable !== null) limits.set(form, allowable);
  return limits;
}

export const worstJob: JobKind<WorstShared, WorstInput, CaseWorst> = {
  name: 'worst',
  start: ({ arm, gap, end }) => {
    const chain = flattenArm(arm);
    const capacity = capacityChecks(arm, chain);
    const checks = worstChecks(arm, chain, capacityForms(capacity));
    const limits = armLimits(capacity);
    return ({ caseIndex, joints, budget }) => {
      const own = checks.filter((check) => joints.includes(check.joint));
      const search = new CaseSearch(arm, chain, caseIndex, own, gap, null, limits);
      const until = Math.min(end, Date.now() + budget);
      search.work(() => Date.now() > until);
      return search.result();
    };
  },
};

/** Share of the time by which each pass must end. What a pass does not close is begun anew by the next: mostly little, and never much. */
const PASSES = [0.03, 0.3, 1] as const;
/** Least time of a part, ms: enough for first bounds. */
const LEAST = 200;

export interface WorstRunOptions {
  readonly pool: JobPool;
  readonly gap?: number;
  readonly seconds?: number;
  readonly signal?: AbortSignal;
  /** A stop before every check was looked at gives the rows of those that were; else none. */
  readonly someRows?: boolean;
  /** Worst of an earlier layout: joints of which every check is as it was are not searched again. */
  readonly earlier?: EarlierWorst | null;
  /** After each part: the best so far, and how much of the present pass is done (0 to 1). */
  readonly onBetter?: (best: WorstResult, part: number) => void;
}

/** Searches until every gap is closed, the time is up or the signal stops it. Rejects with `JobFailed` where a worker fails. */
export async function runWorst(arm: Arm, options: WorstRunOptions): Promise<WorstResult> {
  const gap = options.gap ?? DEFAULT_GAP;
  const begin = Date.now();
  const end = begin + 1000 * (options.seconds ?? DEFAULT_SECONDS);
  const chain = flattenArm(arm);
  const checks = armChecks(arm, chain);
  const best = new BestRows(chain, checks, options.earlier ?? null);
  let stopped = false;
  const result = (some = false) => best.result(gap, (Date.now() - begin) / 1000, stopped || Date.now() > end, some);
  for (const share of PASSES) {
    const inputs = allParts(chain).flatMap((part) => best.openPart(part, gap));
    if (inputs.length === 0) break;
    const until = begin + share * (end - begin);
    // What time is left is shared out evenly as parts are handed out.
    const budget = (chunk: number) =>
      Math.max(LEAST, ((until - Date.now()) * options.pool.size) / (inputs.length - chunk));
    const finished = await options.pool.run({
      kind: worstJob,
      shared: { arm, gap, end },
      chunks: inputs.length,
      input: (chunk) => ({ ...inputs[chunk]!, budget: budget(chunk) }),
      onOutput: (chunk, output) => best.take(inputs[chunk]!, output),
      onProgress: (done) => options.onBetter?.(result(), done / inputs.length),
      ...(options.signal ? { signal: options.signal } : {}),
    });
    stopped = finished.stopped;
    if (stopped || Date.now() > end) break;
  }
  return result(options.someRows);
}

/** Long parts first, so that workers end together: cases for branch and bound joint by joint, then the others whole. */
function allParts(chain: Chain): readonly Part[] {
  const whole = chain.cases.flatMap((load, caseIndex) =>
    gravityLoad(chain, load) ? [{ caseIndex, joints: chain.names.map((_, joint) => joint) }] : [],
  );
  const single = chain.cases.flatMap((load, caseIndex) =>
    gravityLoad(chain, load) ? [] : chain.names.map((_, joint) => ({ caseIndex, joints: [joint] })),
  );
  return [...single, ...whole];
}

/** The best known of every check and case; what no pass has reached yet is not a number, under no bound. */
class BestRows {
  private readonly checks: readonly CheckForm[];
  private readonly rows: (CheckRow | null)[][];

  constructor(chain: Chain, checks: readonly CheckForm[], earlier: EarlierWorst | null) {
    this.checks = checks;
    this.rows = earlier
      ? keptRows(earlier, chain, checks, armChecks).map((rows) => [...rows])
      : chain.cases.map(() => checks.map(() => null));
  }

  take(input: Part, output: CaseWorst): void {
    this.places(input).forEach((place, k) => {
      const row = output.rows[k]!;
      const before = this.rows[input.caseIndex]![place];
      this.rows[input.caseIndex]![place] = before ? better(before, row) : row;
    });
  }

  /** The part without the joints whose gaps are all closed; nothing where none is left. */
  openPart(part: Part, gap: number): Part[] {
    const open = new Set<number>();
    for (const place of this.places(part)) {
      const row = this.rows[part.caseIndex]![place];
      if (row?.gap == null || row.gap > gap) open.add(this.checks[place]!.joint);
    }
    return open.size === 0 ? [] : [{ ...part, joints: part.joints.filter((joint) => open.has(joint)) }];
  }

  /** Rows so far; while some part was never reached, empty, or with `some` those that were reached in every case. */
  result(gap: number, seconds: number, late: boolean, some = false): WorstResult {
    const reached = this.checks.map((_, place) => this.rows.every((rows) => rows[place] !== null));
    const all = reached.every((each) => each);
    if (!all && !some) return { rows: [], eachCase: [], seconds, certified: false, partial: true };
    const certain = this.rows.map((rows, caseIndex) => ({
      caseIndex,
      rows: rows.flatMap((row, place) =>
        row !== null && reached[place]
          ? [{ ...row, certified: row.gap !== null && row.gap <= gap && Number.isFinite(row.value) }]
          : [],
      ),
    }));
    const done = worstResult(certain, gap, seconds, false);
    return { ...done, certified: all && done.certified, partial: !all || (late && !done.certified) };
  }

  private places(input: Part): readonly number[] {
    return this.checks.flatMap((check, place) => (input.joints.includes(check.joint) ? [place] : []));
  }
}

/** The higher value under the lower bound: both hold. A failed value stays. */
function better(before: CheckRow, row: CheckRow): CheckRow {
  if (Number.isNaN(before.value)) return before;
  const found = row.value > before.value || Number.isNaN(row.value) ? row : before;
  const lower = row.bound! < before.bound! ? row : before;
  if (found === lower) return found;
  const bound = Math.max(lower.bound!, found.value);
  const gap = lower.gap === 0 || found.gap === 0 ? 0 : bound > 0 ? (bound - found.value) / bound : 0;
  return { ...found, bound, gap };
}
