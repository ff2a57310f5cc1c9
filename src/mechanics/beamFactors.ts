/** The few linear equations of a beam's unknowns, n by n, row by row. */

/** A pivot below this share of its row means that the supports do not hold the shaft. */
const SINGULAR = 1e-11;

/** LU with row scaling and partial pivoting, in place; false where a pivot vanishes. `order` receives the rows' order. */
export function factorise(a: Float64Array, order: Int32Array, n: number): boolean {
  const scale = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    order[i] = i;
    for (let j = 0; j < n; j++) scale[i] = Math.max(scale[i]!, Math.abs(a[i * n + j]!));
    if (!(scale[i]! > 0)) return false;
  }
  for (let k = 0; k < n; k++) {
    let best = k;
    let size = -1;
    for (let i = k; i < n; i++) {
      const candidate = Math.abs(a[order[i]! * n + k]!) / scale[order[i]!]!;
      if (candidate > size) {
        size = candidate;
        best = i;
      }
    }
    if (!(size > SINGULAR)) return false;
    const row = order[best]!;
    order[best] = order[k]!;
    order[k] = row;
    for (let i = k + 1; i < n; i++) {
      const other = order[i]!;
      const factor = a[other * n + k]! / a[row * n + k]!;
      a[other * n + k] = factor;
      for (let j = k + 1; j < n; j++) a[other * n + j]! -= factor * a[row * n + j]!;
    }
  }
  return true;
}

/** Solves the factored equations for a right side given by rows; returns the unknowns. */
export function substitute(a: Float64Array, order: Int32Array, right: Float64Array): Float64Array {
  const n = right.length;
  const x = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = right[order[i]!]!;
    for (let j = 0; j < i; j++) sum -= a[order[i]! * n + j]! * x[j]!;
    x[i] = sum;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = x[i]!;
    for (let j = i + 1; j < n; j++) sum -= a[order[i]! * n + j]! * x[j]!;
    x[i] = sum / a[order[i]! * n + i]!;
  }
  return x;
}
