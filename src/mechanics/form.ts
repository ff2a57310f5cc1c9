/**
 * A check is a convex function of the joint load w = (force N, moment N·m about the joint origin, canonical housing frame):
 *
 *     value(w) = max over its forms of  ‖ P w + c ‖ + l · w + o
 *
 * with P of one to three rows. Radial load, thrust, tilting moment, equivalent loads, bending moment and stress all fit. Because
 * every form is a maximum of linear functions of w, one machinery finds its worst pose, bounds it and splits it into shares.
 *
 * A form may hold only for some drive torques w[5] (`torqueFrom` to `torqueTo`; the forms of a check cover every torque and agree
 * where they meet): the separating force of a gear follows |torque|. A bound that drops the condition stays a bound, though it
 * may be loose.
 */
import type { Numbers } from '../math/vector.ts';
import { WRENCH } from './chain.ts';

export interface Form {
  /** Rows of P, 1 to 3. */
  readonly rows: number;
  /** [6·rows], row-major. */
  readonly P: Float64Array;
  /** [rows] */
  readonly c: Float64Array;
  /** [6] */
  readonly l: Float64Array;
  readonly o: number;
  /** N·m; infinite where there is no limit. */
  readonly torqueFrom: number;
  readonly torqueTo: number;
}

export interface CheckForm {
  /** Such as `radial`, `axial`, `moment`; unique together with joint and bearing. */
  readonly check: string;
  /** Chain index of the joint. */
  readonly joint: number;
  readonly bearing: 'A' | 'B' | 'ring' | null;
  /** Of the value. */
  readonly unit: string;
  readonly forms: readonly Form[];
}

export function form(parts: {
  P: readonly (readonly number[])[];
  c?: readonly number[];
  l?: readonly number[];
  o?: number;
  torque?: readonly [number, number];
}): Form {
  const rows = parts.P.length;
  return {
    rows,
    P: Float64Array.from(parts.P.flat()),
    c: Float64Array.from(parts.c ?? new Array(rows).fill(0)),
    l: Float64Array.from(parts.l ?? [0, 0, 0, 0, 0, 0]),
    o: parts.o ?? 0,
    torqueFrom: parts.torque?.[0] ?? Number.NEGATIVE_INFINITY,
    torqueTo: parts.torque?.[1] ?? Number.POSITIVE_INFINITY,
  };
}

/** Value of one form at the wrench w[at..at+5], whatever its torque range. */
export function formValue(f: Form, w: Numbers, at: number): number {
  let square = 0;
  for (let r = 0; r < f.rows; r++) {
    let y = f.c[r]!;
    for (let k = 0; k < WRENCH; k++) y += f.P[WRENCH * r + k]! * w[at + k]!;
    square += y * y;
  }
  let linear = f.o;
  for (let k = 0; k < WRENCH; k++) linear += f.l[k]! * w[at + k]!;
  return Math.sqrt(square) + linear;
}

/** Whether a form speaks about this wrench. */
export function formHolds(f: Form, w: Numbers, at: number): boolean {
  return w[at + 5]! >= f.torqueFrom && w[at + 5]! <= f.torqueTo;
}

/** Value of a check at one wrench; NaN where the wrench is not finite. */
export function checkValue(check: CheckForm, w: Numbers, at: number): number {
  let value = Number.NaN;
  for (const f of check.forms) {
    if (!formHolds(f, w, at)) continue;
    const v = formValue(f, w, at);
    if (Number.isNaN(v)) return v;
    if (!(v <= value)) value = v;
  }
  return value;
}

/** Whether a form holds only for some drive torques. */
export function isRanged(f: Form): boolean {
  return f.torqueFrom > Number.NEGATIVE_INFINITY || f.torqueTo < Number.POSITIVE_INFINITY;
}

/** A check whose forms hold at every torque: never below the check itself. */
export function anyTorque(check: CheckForm): CheckForm {
  const forms = check.forms.map((f) => ({
    ...f,
    torqueFrom: Number.NEGATIVE_INFINITY,
    torqueTo: Number.POSITIVE_INFINITY,
  }));
  return { ...check, forms };
}
