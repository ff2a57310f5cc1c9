/** Which check governs each bearing and each shaft, for a first look: the highest utilisation, and what that look does not cover. */
import { attainedShare, type CheckRow, isMissing, type Verdict } from './results.ts';

export interface Governing {
  readonly joint: string;
  readonly jointIndex: number;
  /** Null: the joint's shaft. */
  readonly bearing: CheckRow['bearing'];
  /** The row whose value takes up most of its allowable, of equal ones that of the highest bound; null where none has a utilisation. */
  readonly row: CheckRow | null;
  /** Of all rows together: `over` where one is; else `unassessed` where one is; `pass` only where every one passes. */
  readonly verdict: Verdict;
  /** Of `row`. */
  readonly utilisation: number | null;
  /** One clause: why this row, or why there is none. */
  readonly why: string;
  /** Checks that stay unassessed, with their reasons; never hidden behind a pass. */
  readonly open: readonly { readonly check: string; readonly reason: string }[];
}

/** One entry a bearing and shaft that has a judged row, joints in the order of the rows, A before B, the shaft last. */
export function governing(rows: readonly CheckRow[]): readonly Governing[] {
  const groups = new Map<string, CheckRow[]>();
  for (const row of rows) {
    if (row.verdict === null && Number.isFinite(row.value)) continue;
    const key = `${row.jointIndex} ${row.bearing}`;
    groups.set(key, [...(groups.get(key) ?? []), row]);
  }
  return [...groups.values()].map(governs);
}

function governs(rows: readonly CheckRow[]): Governing {
  const first = rows[0]!;
  const held = rows.filter((row) => row.utilisation !== null && !Number.isNaN(row.utilisation));
  const over = rows.filter((row) => row.verdict === 'over');
  // What is over governs before what only may be.
  const candidates = over.length > 0 ? over.filter((row) => held.includes(row)) : held;
  const row = candidates.reduce<CheckRow | null>(
    (most, one) => (most === null || harder(one, most) ? one : most),
    null,
  );
  const open = rows
    .filter((one) => one.verdict !== 'pass' && one.verdict !== 'over')
    .map((one) => ({ check: one.check, reason: one.reason ?? 'the value could not be computed' }));
  const verdict: Verdict = over.length > 0 ? 'over' : open.length > 0 ? 'unassessed' : 'pass';
  return {
    joint: first.joint,
    jointIndex: first.jointIndex,
    bearing: first.bearing,
    row,
    verdict,
    utilisation: row?.utilisation ?? null,
    why: why(row, held.length, over.length),
    open,
  };
}

/** A bound says how bad a check might be, not how bad it is: what is attained comes first. */
function harder(one: CheckRow, other: CheckRow): boolean {
  const [a, b] = [attained(one), attained(other)];
  return a > b || (a === b && one.utilisation! > other.utilisation!);
}

function attained(row: CheckRow): number {
  // Below a floor nothing counts, whatever the value.
  return Math.min(attainedShare(row) ?? row.utilisation!, row.utilisation!);
}

function why(row: CheckRow | null, held: number, over: number): string {
  if (row === null) return 'no check has an allowable to be held against';
  const place = row.where === undefined ? '' : ` at ${row.where}`;
  if (over > 0) {
    return over === 1
      ? `${row.check}${place} is over its limit`
      : `${row.check}${place} is the furthest of ${over} over their limits`;
  }
  if (held === 1) return `${row.check}${place} is the only check with a limit`;
  return `${row.check}${place} is the nearest to its limit of ${held} checks`;
}

/** Of a whole list: `over`, else `unassessed` where any row is, or is missing, or nothing was judged; `pass` only where all pass. */
export function overall(rows: readonly CheckRow[]): Verdict {
  const judged = rows.filter((row) => row.verdict !== null || Number.isNaN(row.value));
  if (judged.some((row) => row.verdict === 'over')) return 'over';
  const passed = judged.filter((row) => row.verdict === 'pass' && !isMissing(row) && Number.isFinite(row.value));
  return judged.length > 0 && passed.length === judged.length ? 'pass' : 'unassessed';
}
