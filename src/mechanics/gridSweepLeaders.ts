/**
 * The worst pose of each slot (one check under one case), kept so that the answer does not depend on the order in which poses are
 * looked at, nor on rounding between two ways of computing the same value.
 *
 * Rule of ties: values within `tie` of the maximum count as equal to it; of these the lowest pose index governs (and between cases
 * the lowest case). `tie` is 2⁻⁴⁰ (9·10⁻¹³) of the size that the value's terms can reach, well above rounding (about 10⁻¹⁵ of
 * it) and far below anything of interest. Kept per slot are the values that may still govern: none of them has another beside it
 * that is at least as large with a lower index.
 */

/** Of the size of a value: within this, two values are equal; and what rounding may do, with room to spare. */
export const TIE = 2 ** -40;
export const ROUNDING = 2 ** -46;

export interface Leaders {
  readonly slots: number;
  /** Absolute, in the unit of the value. [slots] */
  readonly tie: Float64Array;
  readonly rounding: Float64Array;
  /** Largest finite value; -∞ where there is none. [slots] */
  readonly best: Float64Array;
  /** (value, index) pairs. */
  readonly kept: number[][];
  /** Values that were not finite, and the lowest index of one (∞: none). [slots] */
  readonly failed: Float64Array;
  readonly firstFailed: Float64Array;
}

/** `size` [slots]: what the absolute terms of each value can add up to. */
export function newLeaders(size: Float64Array): Leaders {
  const slots = size.length;
  return {
    slots,
    tie: size.map((s) => (Number.isFinite(s) ? TIE * s : 0)),
    rounding: size.map((s) => (Number.isFinite(s) ? ROUNDING * s : 0)),
    best: new Float64Array(slots).fill(Number.NEGATIVE_INFINITY),
    kept: Array.from({ length: slots }, () => []),
    failed: new Float64Array(slots),
    firstFailed: new Float64Array(slots).fill(Number.POSITIVE_INFINITY),
  };
}

export function clearLeaders(leaders: Leaders): void {
  leaders.best.fill(Number.NEGATIVE_INFINITY);
  for (const list of leaders.kept) list.length = 0;
  leaders.failed.fill(0);
  leaders.firstFailed.fill(Number.POSITIVE_INFINITY);
}

/** Takes a value at a pose into account. */
export function offer(leaders: Leaders, slot: number, value: number, index: number): void {
  const best = leaders.best[slot]!;
  if (!(value - value === 0)) {
    leaders.failed[slot]!++;
    if (index < leaders.firstFailed[slot]!) leaders.firstFailed[slot] = index;
    return;
  }
  if (value < best - leaders.tie[slot]!) return;
  const list = leaders.kept[slot]!;
  for (let k = 0; k < list.length; k += 2) if (list[k + 1]! <= index && list[k]! >= value) return;
  const raised = Math.max(value, best);
  leaders.best[slot] = raised;
  const cut = raised - leaders.tie[slot]!;
  let out = 0;
  for (let k = 0; k < list.length; k += 2) {
    const v = list[k]!;
    const at = list[k + 1]!;
    if (v < cut || (at >= index && v <= value)) continue;
    list[out++] = v;
    list[out++] = at;
  }
  list.length = out;
  list.push(value, index);
}

/** Whether nothing that is at most `bound`, at poses from `index` on, can change the answer. */
export function beaten(leaders: Leaders, slot: number, bound: number, index: number): boolean {
  if (bound < leaders.best[slot]! - leaders.tie[slot]!) return true;
  const list = leaders.kept[slot]!;
  const least = bound - leaders.rounding[slot]!;
  for (let k = 0; k < list.length; k += 2) if (list[k + 1]! <= index && list[k]! >= least) return true;
  return false;
}

/** The pose that governs a slot by the rule of ties; where a value failed, the first such pose. -1: no pose was looked at. */
export function governing(leaders: Leaders, slot: number): number {
  if (leaders.failed[slot]! > 0) return leaders.firstFailed[slot]!;
  const cut = leaders.best[slot]! - leaders.tie[slot]!;
  const list = leaders.kept[slot]!;
  let index = -1;
  for (let k = 0; k < list.length; k += 2) {
    if (list[k]! >= cut && (index < 0 || list[k + 1]! < index)) index = list[k + 1]!;
  }
  return index;
}

/** As plain numbers: for each slot failed, firstFailed, how many pairs, the pairs. */
export function packLeaders(leaders: Leaders): Float64Array {
  const out: number[] = [];
  for (let s = 0; s < leaders.slots; s++) {
    const list = leaders.kept[s]!;
    out.push(leaders.failed[s]!, leaders.firstFailed[s]!, list.length / 2, ...list);
  }
  return Float64Array.from(out);
}

/** Adds packed leaders of other poses. Packs are merged in the order of their chunks. */
export function mergeLeaders(leaders: Leaders, packed: Float64Array): void {
  let at = 0;
  for (let s = 0; s < leaders.slots; s++) {
    leaders.failed[s]! += packed[at]!;
    leaders.firstFailed[s] = Math.min(leaders.firstFailed[s]!, packed[at + 1]!);
    const pairs = packed[at + 2]!;
    at += 3;
    for (let k = 0; k < pairs; k++, at += 2) offer(leaders, s, packed[at]!, packed[at + 1]!);
  }
}
