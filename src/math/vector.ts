/**
 * Three-vectors and 3×3 matrices held in flat arrays, addressed by offset: matrices are row-major (9), vectors 3.
 * Kernels pass their own scratch; nothing here allocates except where the name says `new`.
 */

export type Flat = Float64Array;
/** Anything that can be read by index. */
export type Numbers = ArrayLike<number>;

export function dot3(a: Numbers, ao: number, b: Numbers, bo: number): number {
  return a[ao]! * b[bo]! + a[ao + 1]! * b[bo + 1]! + a[ao + 2]! * b[bo + 2]!;
}

/** out = a × b. `out` may not overlap a or b. */
export function cross3(out: Flat, oo: number, a: Numbers, ao: number, b: Numbers, bo: number): void {
  out[oo] = a[ao + 1]! * b[bo + 2]! - a[ao + 2]! * b[bo + 1]!;
  out[oo + 1] = a[ao + 2]! * b[bo]! - a[ao]! * b[bo + 2]!;
  out[oo + 2] = a[ao]! * b[bo + 1]! - a[ao + 1]! * b[bo]!;
}

/** out = M v. `out` may not overlap v. */
export function rotate3(out: Flat, oo: number, m: Numbers, mo: number, v: Numbers, vo: number): void {
  const x = v[vo]!;
  const y = v[vo + 1]!;
  const z = v[vo + 2]!;
  out[oo] = m[mo]! * x + m[mo + 1]! * y + m[mo + 2]! * z;
  out[oo + 1] = m[mo + 3]! * x + m[mo + 4]! * y + m[mo + 5]! * z;
  out[oo + 2] = m[mo + 6]! * x + m[mo + 7]! * y + m[mo + 8]! * z;
}

/** out = Mᵀ v. `out` may be v itself. */
export function rotateBack3(out: Flat, oo: number, m: Numbers, mo: number, v: Numbers, vo: number): void {
  const x = v[vo]!;
  const y = v[vo + 1]!;
  const z = v[vo + 2]!;
  out[oo] = m[mo]! * x + m[mo + 3]! * y + m[mo + 6]! * z;
  out[oo + 1] = m[mo + 1]! * x + m[mo + 4]! * y + m[mo + 7]! * z;
  out[oo + 2] = m[mo + 2]! * x + m[mo + 5]! * y + m[mo + 8]! * z;
}

/** out = A B, all 3×3. `out` may not overlap A or B. */
export function multiply33(out: Flat, oo: number, a: Numbers, ao: number, b: Numbers, bo: number): void {
  for (let r = 0; r < 3; r++) {
    const x = a[ao + 3 * r]!;
    const y = a[ao + 3 * r + 1]!;
    const z = a[ao + 3 * r + 2]!;
    for (let c = 0; c < 3; c++) {
      out[oo + 3 * r + c] = x * b[bo + c]! + y * b[bo + 3 + c]! + z * b[bo + 6 + c]!;
    }
  }
}

/** out = Aᵀ B, all 3×3. `out` may not overlap A or B. */
export function multiplyBack33(out: Flat, oo: number, a: Numbers, ao: number, b: Numbers, bo: number): void {
  for (let r = 0; r < 3; r++) {
    const x = a[ao + r]!;
    const y = a[ao + 3 + r]!;
    const z = a[ao + 6 + r]!;
    for (let c = 0; c < 3; c++) {
      out[oo + 3 * r + c] = x * b[bo + c]! + y * b[bo + 3 + c]! + z * b[bo + 6 + c]!;
    }
  }
}

export function norm3(a: Numbers, ao: number): number {
  return Math.hypot(a[ao]!, a[ao + 1]!, a[ao + 2]!);
}

export const IDENTITY33: readonly number[] = [1, 0, 0, 0, 1, 0, 0, 0, 1];
