/** Checks laid out flat for the nested sweep. */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import type { CheckForm, Form } from './form.ts';

/** Rows of a form: up to three of the norm, then the linear part. */
export const ROWS = 4;
export const LINE = 3;

export interface FormTable {
  readonly checks: number;
  /** Chain index of the joint of each check. */
  readonly joint: Int32Array;
  /** Forms of check c: start[c] to start[c+1]. */
  readonly start: Int32Array;
  /** Most forms of one check. */
  readonly widest: number;
  /** Whether forms of the check hold for some torques only. */
  readonly ranged: Uint8Array;
  /** Whether the check feels the moment at all. */
  readonly feelsMoment: Uint8Array;
  /** Rows of the norm, 0 to 3, and whether the linear part says anything. */
  readonly rows: Int32Array;
  readonly linear: Uint8Array;
  /** Row r of form f: factors of the joint load, at WRENCH (ROWS f + r). */
  readonly factor: Float64Array;
  /** Constants of the rows, at ROWS f + r. */
  readonly constant: Float64Array;
  /** Frobenius norms of the norm's and of the linear part's factors of force and moment. [f] each */
  readonly normForce: Float64Array;
  readonly normMoment: Float64Array;
  readonly lineForce: Float64Array;
  readonly lineMoment: Float64Array;
  readonly torqueFrom: Float64Array;
  readonly torqueTo: Float64Array;
}

/** Rows of a form that are not zero at every load. */
function speakingRows(f: Form): number[] {
  const rows: number[] = [];
  for (let r = 0; r < f.rows; r++) {
    const speaks = f.c[r] !== 0 || f.P.subarray(WRENCH * r, WRENCH * (r + 1)).some((value) => value !== 0);
    if (speaks) rows.push(r);
  }
  return rows;
}

export function formTable(checks: readonly CheckForm[]): FormTable {
  const forms = checks.flatMap((check) => check.forms);
  const total = forms.length;
  const flat = (size: number) => new Float64Array(size * total);
  const table = {
    checks: checks.length,
    joint: Int32Array.from(checks, (check) => check.joint),
    start: new Int32Array(checks.length + 1),
    widest: Math.max(1, ...checks.map((check) => check.forms.length)),
    ranged: new Uint8Array(checks.length),
    feelsMoment: new Uint8Array(checks.length),
    rows: new Int32Array(total),
    linear: new Uint8Array(total),
    factor: flat(ROWS * WRENCH),
    constant: flat(ROWS),
    normForce: flat(1),
    normMoment: flat(1),
    lineForce: flat(1),
    lineMoment: flat(1),
    torqueFrom: Float64Array.from(forms, (f) => f.torqueFrom),
    torqueTo: Float64Array.from(forms, (f) => f.torqueTo),
  };
  checks.forEach((check, c) => {
    table.start[c + 1] = table.start[c]! + check.forms.length;
  });
  forms.forEach((f, k) => {
    const rows = speakingRows(f);
    table.rows[k] = rows.length;
    const force: number[] = [];
    const moment: number[] = [];
    rows.forEach((r, to) => {
      const row = f.P.subarray(WRENCH * r, WRENCH * (r + 1));
      table.factor.set(row, WRENCH * (ROWS * k + to));
      table.constant[ROWS * k + to] = f.c[r]!;
      force.push(...row.subarray(0, 3));
      moment.push(...row.subarray(3));
    });
    table.normForce[k] = Math.hypot(...force);
    table.normMoment[k] = Math.hypot(...moment);
    table.factor.set(f.l, WRENCH * (ROWS * k + LINE));
    table.constant[ROWS * k + LINE] = f.o;
    table.lineForce[k] = Math.hypot(f.l[0]!, f.l[1]!, f.l[2]!);
    table.lineMoment[k] = Math.hypot(f.l[3]!, f.l[4]!, f.l[5]!);
    table.linear[k] = table.lineForce[k]! + table.lineMoment[k]! > 0 ? 1 : 0;
  });
  for (let c = 0; c < checks.length; c++) {
    for (let k = table.start[c]!; k < table.start[c + 1]!; k++) {
      if (Number.isFinite(table.torqueFrom[k]!) || Number.isFinite(table.torqueTo[k]!)) table.ranged[c] = 1;
      if (table.normMoment[k]! + table.lineMoment[k]! > 0) table.feelsMoment[c] = 1;
    }
    if (table.ranged[c]) table.feelsMoment[c] = 1;
  }
  return table;
}

/** Whether a check depends on the joint load at all. */
export function feelsLoad(table: FormTable, c: number): boolean {
  for (let f = table.start[c]!; f < table.start[c + 1]!; f++) {
    if (table.normForce[f]! + table.normMoment[f]! + table.lineForce[f]! + table.lineMoment[f]! > 0) return true;
  }
  return false;
}

/** One row (its factors at `o`) at the joint load w [6]. */
export function rowValue(factor: Flat, o: number, w: Flat): number {
  return (
    factor[o]! * w[0]! +
    factor[o + 1]! * w[1]! +
    factor[o + 2]! * w[2]! +
    factor[o + 3]! * w[3]! +
    factor[o + 4]! * w[4]! +
    factor[o + 5]! * w[5]!
  );
}
