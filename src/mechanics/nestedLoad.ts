/** Joint load and value of a check at one u and one Y (see `nestedCase`): f = Σ m_p u_p + T, m = Σ h_p × u_p + t. */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import type { NestedCase } from './nestedCase.ts';
import { type FormTable, LINE, ROWS, rowValue } from './nestedForms.ts';

/**
 * Joint load of joint i from u and Y at their offsets into `w` at `at`; with `whole` false only what is linear in Y (for parts of Y).
 */
export function pairLoad(
  load: NestedCase,
  i: number,
  u: Flat,
  uAt: number,
  Y: Flat,
  yAt: number,
  whole: boolean,
  w: Flat,
  at: number,
): void {
  const { pairs, weight } = load;
  let fx = 0;
  let fy = 0;
  let fz = 0;
  let mx = 0;
  let my = 0;
  let mz = 0;
  for (let p = 0; p < pairs; p++) {
    const ux = u[uAt + 3 * p]!;
    const uy = u[uAt + 3 * p + 1]!;
    const uz = u[uAt + 3 * p + 2]!;
    const hx = Y[yAt + 3 * p]!;
    const hy = Y[yAt + 3 * p + 1]!;
    const hz = Y[yAt + 3 * p + 2]!;
    const m = whole ? weight[pairs * i + p]! : 0;
    fx += m * ux;
    fy += m * uy;
    fz += m * uz;
    mx += hy * uz - hz * uy;
    my += hz * ux - hx * uz;
    mz += hx * uy - hy * ux;
  }
  if (load.tool) {
    const t = yAt + 3 * pairs;
    fx += Y[t]!;
    fy += Y[t + 1]!;
    fz += Y[t + 2]!;
    mx += Y[t + 3]!;
    my += Y[t + 4]!;
    mz += Y[t + 5]!;
  }
  w[at] = fx;
  w[at + 1] = fy;
  w[at + 2] = fz;
  w[at + 3] = mx;
  w[at + 4] = my;
  w[at + 5] = mz;
}

/** Value of check c at the joint load w [6]. */
export function pairValue(table: FormTable, c: number, w: Flat): number {
  const { factor, constant } = table;
  const last = table.start[c + 1]!;
  const ranged = table.ranged[c] === 1;
  let value = Number.NEGATIVE_INFINITY;
  for (let f = table.start[c]!; f < last; f++) {
    if (ranged && (w[5]! < table.torqueFrom[f]! || w[5]! > table.torqueTo[f]!)) continue;
    const rows = table.rows[f]!;
    let square = 0;
    for (let r = 0; r < rows; r++) {
      const y = rowValue(factor, WRENCH * (ROWS * f + r), w) + constant[ROWS * f + r]!;
      square += y * y;
    }
    let own = Math.sqrt(square) + constant[ROWS * f + LINE]!;
    if (table.linear[f] === 1) own += rowValue(factor, WRENCH * (ROWS * f + LINE), w);
    if (own > value) value = own;
  }
  return value;
}
