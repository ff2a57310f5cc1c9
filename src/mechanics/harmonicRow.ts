/**
 * The last turn of the tree as a row: with every other joint held, the outboard numbers and so the joint load are affine in the cosine
 * and sine of the last angle, w = w₀ + w₁ cos q + w₂ sin q, and the square of a norm of rows of it is
 *
 *     a + b cos q + c sin q + d cos 2q + e sin 2q ≤ a + √(b² + c²) + √(d² + e²)
 *
 * Five numbers stand for the row; where their bound cannot matter the row is skipped, else its samples follow from w₀, w₁, w₂.
 */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import { beaten, type Leaders, offer } from './gridSweepLeaders.ts';
import type { NestedCase } from './nestedCase.ts';
import { type FormTable, LINE, ROWS } from './nestedForms.ts';
import { pairLoad } from './nestedLoad.ts';

/** Samples of a row: cos and sin of each angle, and what it adds to the index. */
export interface RowSamples {
  readonly turns: number;
  readonly cos: Flat;
  readonly sin: Flat;
  readonly offset: Flat;
}

export class HarmonicRow {
  /** Index of the row's first pose, and the bound last found: numbers handed from call to call would be an object each. */
  readonly index: Flat = new Float64Array(1);
  private readonly most: Flat = new Float64Array(1);
  private readonly table: FormTable;
  private readonly load: NestedCase;
  private readonly joint: number;
  /** w₀, w₁, w₂. */
  private readonly w: Flat = new Float64Array(3 * WRENCH);
  /** For each form of a check in hand: the three parts of each row, at 3 (ROWS slot + row). */
  private readonly y: Flat;

  constructor(table: FormTable, load: NestedCase, joint: number) {
    this.table = table;
    this.load = load;
    this.joint = joint;
    this.y = new Float64Array(3 * ROWS * table.widest);
  }

  /** Sets the row of u at `uAt` and Y₀, Y₁, Y₂ one after another at `yAt`. */
  set(u: Flat, uAt: number, Y: Flat, yAt: number): void {
    const { load, joint, w } = this;
    const { width } = load;
    pairLoad(load, joint, u, uAt, Y, yAt, true, w, 0);
    pairLoad(load, joint, u, uAt, Y, yAt + width, false, w, WRENCH);
    pairLoad(load, joint, u, uAt, Y, yAt + 2 * width, false, w, 2 * WRENCH);
  }

  /** Offers the samples of the row to check c. */
  offer(c: number, samples: RowSamples, leaders: Leaders): void {
    this.bound(c);
    const bound = this.most[0]!;
    if (bound < leaders.best[c]! - leaders.tie[c]! || beaten(leaders, c, bound, this.index[0]!)) return;
    const { table } = this;
    if (table.start[c + 1]! === table.start[c]! + 1 && table.ranged[c] === 0) this.single(c, samples, leaders);
    else this.several(c, samples, leaders);
  }

  /** Bound of check c over any last angle; fills `y`. */
  private bound(c: number): void {
    const { table, w, y } = this;
    const { factor, constant } = table;
    const first = table.start[c]!;
    const last = table.start[c + 1]!;
    const ranged = table.ranged[c] === 1;
    const reach = ranged ? Math.hypot(w[WRENCH + 5]!, w[2 * WRENCH + 5]!) * (1 + 1e-15) : 0;
    let bound = Number.NEGATIVE_INFINITY;
    for (let f = first; f < last; f++) {
      const rows = table.rows[f]!;
      const slot = 3 * ROWS * (f - first);
      let a = 0;
      let b = 0;
      let s = 0;
      let d = 0;
      let e = 0;
      for (let r = 0; r < rows; r++) {
        const o = WRENCH * (ROWS * f + r);
        const y0 = along(factor, o, w, 0) + constant[ROWS * f + r]!;
        const y1 = along(factor, o, w, WRENCH);
        const y2 = along(factor, o, w, 2 * WRENCH);
        y[slot + 3 * r] = y0;
        y[slot + 3 * r + 1] = y1;
        y[slot + 3 * r + 2] = y2;
        a += y0 * y0 + (y1 * y1 + y2 * y2) / 2;
        b += y0 * y1;
        s += y0 * y2;
        d += (y1 * y1 - y2 * y2) / 2;
        e += y1 * y2;
      }
      let own = Math.sqrt(a + 2 * Math.sqrt(b * b + s * s) + Math.sqrt(d * d + e * e));
      const line = slot + 3 * LINE;
      y[line] = constant[ROWS * f + LINE]!;
      y[line + 1] = 0;
      y[line + 2] = 0;
      if (table.linear[f] === 1) {
        const o = WRENCH * (ROWS * f + LINE);
        const l1 = along(factor, o, w, WRENCH);
        const l2 = along(factor, o, w, 2 * WRENCH);
        y[line]! += along(factor, o, w, 0);
        y[line + 1] = l1;
        y[line + 2] = l2;
        own += Math.sqrt(l1 * l1 + l2 * l2);
      }
      own += y[line]!;
      if (ranged && (table.torqueTo[f]! < w[5]! - reach || table.torqueFrom[f]! > w[5]! + reach)) continue;
      if (own > bound) bound = own;
    }
    this.most[0] = bound;
  }

  /** A check of one form: squares, until one matters, where it is a norm alone. */
  private single(c: number, samples: RowSamples, leaders: Leaders): void {
    const { y, table } = this;
    const { turns, cos, sin, offset } = samples;
    const rows = table.rows[table.start[c]!]!;
    const line = 3 * LINE;
    for (let k = 0; k < turns; k++) {
      const c1 = cos[k]!;
      const s1 = sin[k]!;
      let square = 0;
      for (let r = 0; r < rows; r++) {
        const value = y[3 * r]! + y[3 * r + 1]! * c1 + y[3 * r + 2]! * s1;
        square += value * value;
      }
      const value = Math.sqrt(square) + y[line]! + y[line + 1]! * c1 + y[line + 2]! * s1;
      if (!(value < leaders.best[c]! - leaders.tie[c]!)) offer(leaders, c, value, this.index[0]! + offset[k]!);
    }
  }

  /** A check of several forms: the largest of those that hold at the torque of the sample. */
  private several(c: number, samples: RowSamples, leaders: Leaders): void {
    const { y, w, table } = this;
    const { turns, cos, sin, offset } = samples;
    const first = table.start[c]!;
    const last = table.start[c + 1]!;
    const ranged = table.ranged[c] === 1;
    for (let k = 0; k < turns; k++) {
      const c1 = cos[k]!;
      const s1 = sin[k]!;
      const torque = w[5]! + w[WRENCH + 5]! * c1 + w[2 * WRENCH + 5]! * s1;
      let most = Number.NEGATIVE_INFINITY;
      for (let f = first; f < last; f++) {
        if (ranged && (torque < table.torqueFrom[f]! || torque > table.torqueTo[f]!)) continue;
        const slot = 3 * ROWS * (f - first);
        let square = 0;
        for (let r = 0; r < table.rows[f]!; r++) {
          const value = y[slot + 3 * r]! + y[slot + 3 * r + 1]! * c1 + y[slot + 3 * r + 2]! * s1;
          square += value * value;
        }
        const line = slot + 3 * LINE;
        const value = Math.sqrt(square) + y[line]! + y[line + 1]! * c1 + y[line + 2]! * s1;
        if (value > most) most = value;
      }
      if (!(most < leaders.best[c]! - leaders.tie[c]!)) offer(leaders, c, most, this.index[0]! + offset[k]!);
    }
  }
}

function along(factor: Flat, o: number, w: Flat, at: number): number {
  return (
    factor[o]! * w[at]! +
    factor[o + 1]! * w[at + 1]! +
    factor[o + 2]! * w[at + 2]! +
    factor[o + 3]! * w[at + 3]! +
    factor[o + 4]! * w[at + 4]! +
    factor[o + 5]! * w[at + 5]!
  );
}
