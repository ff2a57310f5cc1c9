/**
 * Forms (`form.ts`) made from others: scaled, with a linear part added, and a safe form of a sum of two norms.
 *
 * A sum a‖x‖ + b‖y‖ is convex but not one form. With K directions e_k evenly round the circle, ‖y‖ ≤ max_k e_k·y / cos(π/K), so
 *
 *     a‖x‖ + b‖y‖  ≤  max over k of  a‖x‖ + (b / cos(π/K)) e_k·y
 *
 * never below the sum, and above it by at most 1/cos(π/K) - 1 of the second term (0.48 % for K = 32). Own derivation: the circle lies in
 * the polygon that touches it.
 */
import { type Form, form } from '../../mechanics/form.ts';

const DIRECTIONS = 32;
const OUTWARD = 1 / Math.cos(Math.PI / DIRECTIONS);

/** Most that `sumForms` exceeds the sum by, as a share of its second term. */
export const SUM_MARGIN = OUTWARD - 1;

const NONE: readonly number[] = [0, 0, 0, 0, 0, 0];

/** scale ≥ 0 times the norm of each form, plus l · w. The forms given must be norms alone (no linear part of their own). */
export function scaledForms(forms: readonly Form[], scale: number, l: readonly number[] = NONE): readonly Form[] {
  return forms.map((f) =>
    form({
      P: Array.from({ length: f.rows }, (_, r) => Array.from(f.P.subarray(6 * r, 6 * r + 6), (v) => scale * v)),
      c: Array.from(f.c, (v) => scale * v),
      l,
      torque: [f.torqueFrom, f.torqueTo],
    }),
  );
}

/**
 * Safe forms of a‖first‖ + b‖second‖ + l · w for norms of two rows that hold for the same torques in the same order (both made from one
 * drive). The second term is the one that is taken a little too large.
 */
export function sumForms(
  first: readonly Form[],
  a: number,
  second: readonly Form[],
  b: number,
  l: readonly number[] = NONE,
): readonly Form[] {
  if (b === 0) return scaledForms(first, a, l);
  return first.flatMap((f, i) => {
    const s = second[i]!;
    return Array.from({ length: DIRECTIONS }, (_, k) => {
      const x = b * OUTWARD * Math.cos((2 * Math.PI * k) / DIRECTIONS);
      const y = b * OUTWARD * Math.sin((2 * Math.PI * k) / DIRECTIONS);
      const [scaled] = scaledForms(
        [f],
        a,
        l.map((v, j) => v + x * s.P[j]! + y * s.P[6 + j]!),
      );
      return { ...scaled!, o: x * s.c[0]! + y * s.c[1]! };
    });
  });
}
