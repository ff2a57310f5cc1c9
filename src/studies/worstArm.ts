/**
 * The certified worst pose of every check over an arm's whole travel: for each an attained value with its pose and load, and a bound that no pose
 * within the travel exceeds. The method and its proof: `mechanics/WORST-POSE.md`.
 */
import type { Arm } from '../arm/arm.ts';
import { type Chain, flattenArm, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import { loadChecks } from '../mechanics/loadChecks.ts';
import { type Limits, WorstCase, type WorstRow } from '../mechanics/worstCase.ts';
import type { CheckRow } from './results.ts';

/** What was found in one case, as a worker sends it back. */
export interface CaseWorst {
  readonly caseIndex: number;
  readonly rows: readonly CheckRow[];
}

export interface WorstResult {
  /** Worst over all cases, in the order of the checks. */
  readonly rows: readonly CheckRow[];
  readonly eachCase: readonly CheckRow[];
  readonly seconds: number;
  /** Whether every row reached the gap asked for. */
  readonly certified: boolean;
  /** Stopped before all gaps were closed: by the user or by the time allowed. */
  readonly partial: boolean;
}

/** Checks that a search looks at: the loads of every joint and whatever else is given as forms. */
export function worstChecks(arm: Arm, chain: Chain, more: readonly CheckForm[] = []): readonly CheckForm[] {
  return [...loadChecks(arm, chain), ...more];
}

/**
 * The search of one case, made to be worked on in slices. `previous`: the search of the same case of an earlier layout; what does not change is
 * not searched again.
 */
export class CaseSearch {
  readonly worst: WorstCase;
  private readonly arm: Arm;
  private readonly chain: Chain;
  private readonly caseIndex: number;
  private readonly gap: number;

  constructor(
    arm: Arm,
    chain: Chain,
    caseIndex: number,
    checks: readonly CheckForm[],
    gap: number,
    previous: CaseSearch | null = null,
    limits: Limits = new Map(),
  ) {
    this.arm = arm;
    this.chain = chain;
    this.caseIndex = caseIndex;
    this.gap = gap;
    this.worst = new WorstCase(chain, chain.cases[caseIndex]!, checks, previous?.worst ?? null, limits);
  }

  get open(): boolean {
    return this.worst.open(this.gap);
  }

  /** Works until all gaps are closed or `due` says to pause; returns whether work is left. */
  work(due: () => boolean): boolean {
    // However short the time, every check is looked at once: a row without a value says nothing.
    do this.worst.step(this.gap, this.worst.begun ? due : () => false);
    while (this.open && !(this.worst.begun && due()));
    return this.open;
  }

  result(): CaseWorst {
    return {
      caseIndex: this.caseIndex,
      rows: this.worst.rows().map((row) => checkRow(this.arm, this.chain, this.caseIndex, row, this.gap)),
    };
  }
}

function checkRow(arm: Arm, chain: Chain, caseIndex: number, row: WorstRow, gap: number): CheckRow {
  const { check } = row;
  const jointIndex = chain.jointIndex[check.joint]!;
  const out = new Float64Array(WRENCH);
  wrenchToFile(chain, check.joint, row.wrench, 0, out);
  // A search that has not begun has no value; it must not look like one.
  const value = row.found === Number.NEGATIVE_INFINITY ? Number.NaN : row.found;
  return {
    joint: arm.joints[jointIndex]!.name,
    jointIndex,
    bearing: check.bearing,
    check: check.check,
    unit: check.unit,
    value,
    case: chain.cases[caseIndex]!.name,
    pose: [...row.pose],
    free: row.free,
    wrench: { force: [out[0]!, out[1]!, out[2]!], moment: [out[3]!, out[4]!, out[5]!] },
    bound: row.bound,
    gap: row.gap,
    certified: row.gap <= gap && Number.isFinite(value),
    allowable: null,
    utilisation: null,
    verdict: null,
    reason: null,
    source: null,
  };
}

/**
 * The worst over cases, row by row: the value attained in some case (the first where they tie), under the largest bound of all cases. A value
 * that failed wins, so that it is seen.
 */
export function overCases(cases: readonly CaseWorst[], gap: number): readonly CheckRow[] {
  const ordered = [...cases].sort((a, b) => a.caseIndex - b.caseIndex);
  const first = ordered[0];
  if (!first) return [];
  return first.rows.map((_, k) => {
    const rows = ordered.map((one) => one.rows[k]!);
    let worst = rows[0]!;
    for (const row of rows)
      if (Number.isNaN(row.value) ? !Number.isNaN(worst.value) : row.value > worst.value) worst = row;
    const leading = rows.reduce((most, row) => (row.bound! > most.bound! || Number.isNaN(row.bound!) ? row : most));
    const bound = leading.bound!;
    // The case with the largest bound attains at most what the worst one does: its closed gap closes this one.
    const total = leading.gap === 0 ? 0 : bound > 0 ? (bound - worst.value) / bound : 0;
    return { ...worst, bound, gap: total, certified: Number.isFinite(worst.value) && total <= gap };
  });
}

export interface WorstOptions {
  /** (bound - found)/bound asked for; default 0.001. */
  readonly gap?: number;
  /** Time allowed, s; default 30. */
  readonly seconds?: number;
  /** Checks besides the loads. */
  readonly more?: readonly CheckForm[];
  /** Asked between slices; true stops and keeps the best so far. */
  readonly stop?: () => boolean;
}

export const DEFAULT_GAP = 1e-3;
export const DEFAULT_SECONDS = 30;

/** The whole search in line, case by case in slices of equal time: for tests and small jobs. Others run a case a worker. */
export function worstArm(arm: Arm, options: WorstOptions = {}): WorstResult {
  const gap = options.gap ?? DEFAULT_GAP;
  const chain = flattenArm(arm);
  const checks = worstChecks(arm, chain, options.more);
  const begin = performance.now();
  const end = begin + 1000 * (options.seconds ?? DEFAULT_SECONDS);
  const stopped = () => performance.now() > end || (options.stop?.() ?? false);
  const searches = chain.cases.map((_, k) => new CaseSearch(arm, chain, k, checks, gap));
  while (!stopped() && searches.some((search) => search.open)) {
    for (const search of searches) {
      const slice = performance.now() + SLICE_MS;
      search.work(() => performance.now() > slice || stopped());
    }
  }
  return worstResult(
    searches.map((search) => search.result()),
    gap,
    (performance.now() - begin) / 1000,
    searches.some((search) => search.open),
  );
}

const SLICE_MS = 50;

/** Puts the cases together. */
export function worstResult(cases: readonly CaseWorst[], gap: number, seconds: number, partial: boolean): WorstResult {
  const rows = overCases(cases, gap);
  return {
    rows,
    eachCase: cases.flatMap((one) => one.rows),
    seconds,
    certified: rows.every((row) => row.certified),
    partial,
  };
}
