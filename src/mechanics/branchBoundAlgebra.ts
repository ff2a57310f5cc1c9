/** Small sums that the box bounds are made of. */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import type { Form } from './form.ts';

/** Maximum of a x + b x² + c x³ over 0 ≤ x ≤ 1, with a, c ≥ 0. */
export function mostOf(a: number, b: number, c: number): number {
  const end = a + b + c;
  if (b >= 0) return end;
  const root = b * b - 3 * a * c;
  if (!(root > 0)) return end;
  const x = a / (-b + Math.sqrt(root));
  return x < 1 ? Math.max(end, x * (a + x * (b + x * c))) : end;
}

export function dot(a: Flat, ao: number, b: Flat, bo: number): number {
  return a[ao]! * b[bo]! + a[ao + 1]! * b[bo + 1]! + a[ao + 2]! * b[bo + 2]!;
}

/** Adds to the entry (j, k) of a symmetric matrix. */
export function add(matrix: Flat, size: number, j: number, k: number, value: number): void {
  matrix[j * size + k]! += value;
  if (j !== k) matrix[k * size + j]! += value;
}

/** Bound of the norm of three columns of P from `column` on: the root of the largest row sum of P Pᵀ. */
export function operatorNorm(f: Form, column: number): number {
  let most = 0;
  for (let r = 0; r < f.rows; r++) {
    let sum = 0;
    for (let s = 0; s < f.rows; s++) {
      let product = 0;
      for (let k = column; k < column + 3; k++) product += f.P[WRENCH * r + k]! * f.P[WRENCH * s + k]!;
      sum += Math.abs(product);
    }
    most = Math.max(most, sum);
  }
  return Math.sqrt(most);
}

/** Bound of the norm of e → u × P_mᵀ e, P_m the moment columns of P; `scratch` [≥ 9]. */
export function crossedNorm(f: Form, u: Flat, at: number, scratch: Flat): number {
  for (let r = 0; r < f.rows; r++) {
    const o = WRENCH * r + 3;
    scratch[3 * r] = u[at + 1]! * f.P[o + 2]! - u[at + 2]! * f.P[o + 1]!;
    scratch[3 * r + 1] = u[at + 2]! * f.P[o]! - u[at]! * f.P[o + 2]!;
    scratch[3 * r + 2] = u[at]! * f.P[o + 1]! - u[at + 1]! * f.P[o]!;
  }
  let most = 0;
  for (let r = 0; r < f.rows; r++) {
    let sum = 0;
    for (let s = 0; s < f.rows; s++) sum += Math.abs(dot(scratch, 3 * r, scratch, 3 * s));
    most = Math.max(most, sum);
  }
  return Math.sqrt(most);
}
