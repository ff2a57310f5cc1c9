/**
 * The forms of a check that matter. A form ‖P w + c‖ + l·w + o never exceeds another where that one's Gram matrix [P c]ᵀ[P c] is larger
 * (their difference has no negative eigenvalue), its torque range contains it, and the linear parts are alike, or its own lies between
 * two forms of the other's norm with opposite linear parts (their mean is the norm alone). Such a form is dropped. Forms alike in all but
 * neighbouring torque ranges become one.
 */
import type { Form } from '../../mechanics/form.ts';

/** What is lost to rounding at most, as a share of the form that stays: far below what a load is known to. */
const ROUNDING = 1e-12;
const SIZE = 7;

export interface PlacedForm {
  readonly form: Form;
  readonly place: string | null;
}

/** The forms left, in the order given; for the same value at every load the first of several that are alike stays. */
export function fewerForms(all: readonly PlacedForm[]): readonly PlacedForm[] {
  const merged = mergeRanges(all);
  const grams = merged.map(({ form }) => gram(form));
  const dropped = new Set<number>();
  merged.forEach(({ form }, g) => {
    const by = merged.findIndex(
      ({ form: other }, f) =>
        f !== g && !dropped.has(f) && holds(other, form) && linearAbove(merged, f, form) && above(grams[f]!, grams[g]!),
    );
    if (by >= 0) dropped.add(g);
  });
  return merged.filter((_, k) => !dropped.has(k));
}

/** Whether `outer` speaks wherever `inner` does. */
function holds(outer: Form, inner: Form): boolean {
  return outer.torqueFrom <= inner.torqueFrom && outer.torqueTo >= inner.torqueTo;
}

function sameLinear(a: Form, b: Form): boolean {
  return a.o === b.o && a.l.every((v, k) => v === b.l[k]);
}

/** Whether the linear part of form f, or of it and its opposite, is nowhere below that of `small`. */
function linearAbove(all: readonly PlacedForm[], f: number, small: Form): boolean {
  const big = all[f]!.form;
  if (sameLinear(big, small)) return true;
  if (small.o !== 0 || small.l.some((v) => v !== 0)) return false;
  return all.some(
    ({ form }) =>
      holds(form, small) && sameNorm(form, big) && form.o === -big.o && form.l.every((v, k) => v === -big.l[k]!),
  );
}

function sameNorm(a: Form, b: Form): boolean {
  return a.rows === b.rows && a.P.every((v, k) => v === b.P[k]) && a.c.every((v, k) => v === b.c[k]);
}

/** [P c]ᵀ[P c], row by row. */
function gram(form: Form): Float64Array {
  const out = new Float64Array(SIZE * SIZE);
  const entry = (r: number, k: number) => (k < SIZE - 1 ? form.P[(SIZE - 1) * r + k]! : form.c[r]!);
  for (let r = 0; r < form.rows; r++) {
    for (let i = 0; i < SIZE; i++) for (let j = 0; j < SIZE; j++) out[SIZE * i + j]! += entry(r, i) * entry(r, j);
  }
  return out;
}

/** Whether big - small has no negative eigenvalue, by Cholesky's factors of it, each unknown scaled to the size of `big`. */
function above(big: Float64Array, small: Float64Array): boolean {
  const a = big.map((v, k) => v - small[k]!);
  const scale = Float64Array.from({ length: SIZE }, (_, k) => big[SIZE * k + k]!);
  for (let i = 0; i < SIZE; i++) {
    // Where the larger form feels nothing, the smaller must not either.
    if (scale[i] === 0 && small[SIZE * i + i]! > 0) return false;
  }
  const size = (i: number) => (scale[i]! > 0 ? Math.sqrt(scale[i]!) : 1);
  for (let i = 0; i < SIZE; i++) for (let j = 0; j < SIZE; j++) a[SIZE * i + j]! /= size(i) * size(j);
  for (let i = 0; i < SIZE; i++) {
    const pivot = a[SIZE * i + i]!;
    if (pivot < -ROUNDING) return false;
    if (pivot <= ROUNDING) {
      // No room: what is coupled to this unknown must vanish too (|a_ij|² ≤ a_ii a_jj).
      for (let j = i + 1; j < SIZE; j++) if (Math.abs(a[SIZE * i + j]!) > ROUNDING) return false;
      continue;
    }
    for (let r = i + 1; r < SIZE; r++) {
      const factor = a[SIZE * r + i]! / pivot;
      for (let j = r; j < SIZE; j++) a[SIZE * r + j]! -= factor * a[SIZE * i + j]!;
      for (let j = i + 1; j < r; j++) a[SIZE * r + j] = a[SIZE * j + r]!;
    }
  }
  return true;
}

function mergeRanges(all: readonly PlacedForm[]): readonly PlacedForm[] {
  const left = [...all];
  for (let i = 0; i < left.length; i++) {
    for (let j = i + 1; j < left.length; j++) {
      const [a, b] = [left[i]!, left[j]!];
      if (a.place !== b.place || !sameNorm(a.form, b.form) || !sameLinear(a.form, b.form)) continue;
      if (a.form.torqueTo < b.form.torqueFrom || b.form.torqueTo < a.form.torqueFrom) continue;
      const torqueFrom = Math.min(a.form.torqueFrom, b.form.torqueFrom);
      const torqueTo = Math.max(a.form.torqueTo, b.form.torqueTo);
      left[i] = { ...a, form: { ...a.form, torqueFrom, torqueTo } };
      left.splice(j, 1);
      // The wider range may meet one passed over.
      j = i;
    }
  }
  return left;
}
