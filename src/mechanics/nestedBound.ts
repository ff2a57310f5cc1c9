/**
 * A bound on a check where the inboard vectors u and the outboard numbers Y are known, exactly or to lie in balls. A form is
 * ‖y‖ + line, y = P w + c. With u = u₀ + δ_u, |δ_u| ≤ ρ_u, and h, T, t likewise,
 *
 *     y = y₀ + Σ S δ + P_m (δ_h × δ_u)
 *     ‖y‖² ≤ ‖y₀‖² + 2 Σ max δ·Sᵀy₀ + 2 ‖y₀‖ x + (Σ ρ ‖S‖ + x)²        x = ‖P_m‖ Σ ρ_u ρ_h
 *
 * with norms of S no smaller than its largest singular value. A direction u keeps its length, so δ_u lies across u₀ but for -ρ²/2 along
 * it at most: at the directions that load a check most, where Sᵀy₀ is along u₀, the bound is loose to second order only. A tip force free
 * to point anywhere is one more u, about 0 with its size as radius and the tip's reach for h; motion adds its most to every form. Forms
 * that hold at no torque within reach are left out. Own derivation; the sweep is tested against every pose looked at.
 */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import type { NestedCase } from './nestedCase.ts';
import { type FormTable, LINE, ROWS, rowValue } from './nestedForms.ts';

export class NestedBound {
  /** Where `outward` and `both` leave the bound: a number handed back from call to call would be an object each. */
  readonly result: Flat = new Float64Array(1);
  /** Sizes of the inboard vectors. */
  readonly size: Flat;
  private readonly table: FormTable;
  private readonly load: NestedCase;
  /** Σ y_r × the rows' factors of force and of moment. */
  private readonly pull = new Float64Array(WRENCH);
  /** Frobenius norm of the rows' u_p × moment factors, by form and pair, at the u last given to `direct`. */
  private readonly turned: Flat;
  /** Most that motion can add to each form. */
  private readonly slack: Flat;

  constructor(table: FormTable, load: NestedCase) {
    this.table = table;
    this.load = load;
    const { base } = load;
    this.turned = new Float64Array(load.pairs * table.rows.length);
    this.slack = new Float64Array(table.rows.length);
    for (let c = 0; load.motion && c < table.checks; c++) {
      const force = load.motion[2 * table.joint[c]!]!;
      const moment = load.motion[2 * table.joint[c]! + 1]!;
      for (let f = table.start[c]!; f < table.start[c + 1]!; f++) {
        this.slack[f] =
          force * (table.normForce[f]! + table.lineForce[f]!) + moment * (table.normMoment[f]! + table.lineMoment[f]!);
      }
    }
    this.size = Float64Array.from({ length: load.pairs }, (_, p) =>
      Math.hypot(base[3 * p]!, base[3 * p + 1]!, base[3 * p + 2]!),
    );
  }

  /** What the bounds of check c need of u at `uAt`; to be called before them. */
  direct(c: number, u: Flat, uAt: number): void {
    const { table, load, turned } = this;
    const { factor } = table;
    for (let f = table.start[c]!; f < table.start[c + 1]!; f++) {
      for (let p = 0; p < load.pairs; p++) {
        const ux = u[uAt + 3 * p]!;
        const uy = u[uAt + 3 * p + 1]!;
        const uz = u[uAt + 3 * p + 2]!;
        let sum = 0;
        for (let r = 0; r < table.rows[f]!; r++) {
          const o = WRENCH * (ROWS * f + r);
          const x = uy * factor[o + 5]! - uz * factor[o + 4]!;
          const y = uz * factor[o + 3]! - ux * factor[o + 5]!;
          const z = ux * factor[o + 4]! - uy * factor[o + 3]!;
          sum += x * x + y * y + z * z;
        }
        turned[load.pairs * f + p] = Math.sqrt(sum);
      }
    }
  }

  /**
   * Bound of check c at a known u and Y within `radius` [blocks] of `Y`, whose joint load is w. -∞ only where no form holds.
   */
  outward(c: number, w: Flat, u: Flat, uAt: number, Y: Flat, yAt: number, radius: Flat): void {
    this.bound(c, w, u, uAt, null, Y, yAt, radius);
  }

  /** As `outward`, with u within `spread` [pairs] of `u`, at its length. */
  both(c: number, w: Flat, u: Flat, spread: Flat, Y: Flat, yAt: number, radius: Flat): void {
    this.bound(c, w, u, 0, spread, Y, yAt, radius);
  }

  private bound(
    c: number,
    w: Flat,
    u: Flat,
    uAt: number,
    spread: Flat | null,
    Y: Flat,
    yAt: number,
    radius: Flat,
  ): void {
    const { table, load, turned } = this;
    const { factor, constant } = table;
    const { pairs, blocks } = load;
    const ranged = table.ranged[c] === 1;
    const reach = ranged ? this.torqueReach(c, u, uAt, spread, Y, yAt, radius) : 0;
    const last = table.start[c + 1]!;
    const roams = spread !== null || load.freeForce > 0;
    let bound = Number.NEGATIVE_INFINITY;
    for (let f = table.start[c]!; f < last; f++) {
      if (ranged && (table.torqueTo[f]! < w[5]! - reach || table.torqueFrom[f]! > w[5]! + reach)) continue;
      const rows = table.rows[f]!;
      let square = 0;
      let ax = 0;
      let ay = 0;
      let az = 0;
      let bx = 0;
      let by = 0;
      let bz = 0;
      for (let r = 0; r < rows; r++) {
        const o = WRENCH * (ROWS * f + r);
        const y = rowValue(factor, o, w) + constant[ROWS * f + r]!;
        square += y * y;
        ax += y * factor[o]!;
        ay += y * factor[o + 1]!;
        az += y * factor[o + 2]!;
        bx += y * factor[o + 3]!;
        by += y * factor[o + 4]!;
        bz += y * factor[o + 5]!;
      }
      let along = 0;
      let wide = 0;
      for (let p = 0; p < pairs; p++) {
        const rho = radius[p]!;
        if (rho === 0) continue;
        const ux = u[uAt + 3 * p]!;
        const uy = u[uAt + 3 * p + 1]!;
        const uz = u[uAt + 3 * p + 2]!;
        const x = uy * bz - uz * by;
        const y = uz * bx - ux * bz;
        const z = ux * by - uy * bx;
        along += rho * Math.sqrt(x * x + y * y + z * z);
        wide += rho * turned[pairs * f + p]!;
      }
      if (load.tool) {
        along += radius[blocks - 2]! * Math.sqrt(ax * ax + ay * ay + az * az);
        along += radius[blocks - 1]! * Math.sqrt(bx * bx + by * by + bz * bz);
        wide += radius[blocks - 2]! * table.normForce[f]! + radius[blocks - 1]! * table.normMoment[f]!;
      }
      let own: number;
      if (roams) {
        const { pull } = this;
        pull[0] = ax;
        pull[1] = ay;
        pull[2] = az;
        pull[3] = bx;
        pull[4] = by;
        pull[5] = bz;
        own = this.widened(c, f, square, along, wide, u, spread, Y, yAt, radius);
      } else own = Math.sqrt(square + 2 * along + wide * wide);
      own += constant[ROWS * f + LINE]! + this.slack[f]!;
      if (table.linear[f] === 1) own += this.line(c, f, w, u, uAt, spread, Y, yAt, radius);
      if (own > bound) bound = own;
    }
    this.result[0] = bound;
  }

  /** The norm with u free within `spread` and the tip force free as well. */
  private widened(
    c: number,
    f: number,
    square: number,
    alongY: number,
    wideY: number,
    u: Flat,
    spread: Flat | null,
    Y: Flat,
    yAt: number,
    radius: Flat,
  ): number {
    const { table, load, pull } = this;
    const { pairs, freeForce } = load;
    const i = table.joint[c]!;
    let along = alongY;
    let wide = wideY;
    let cross = 0;
    for (let p = 0; spread && p < pairs; p++) {
      const rho = spread[p]!;
      const m = load.weight[pairs * i + p]!;
      const hx = Y[yAt + 3 * p]!;
      const hy = Y[yAt + 3 * p + 1]!;
      const hz = Y[yAt + 3 * p + 2]!;
      // Sᵀy = m a + b × h
      const gx = m * pull[0]! + pull[4]! * hz - pull[5]! * hy;
      const gy = m * pull[1]! + pull[5]! * hx - pull[3]! * hz;
      const gz = m * pull[2]! + pull[3]! * hy - pull[4]! * hx;
      along += this.across(gx, gy, gz, u, p, rho);
      wide += rho * this.senseOf(f, m, hx, hy, hz);
      cross += table.normMoment[f]! * rho * radius[p]!;
    }
    if (freeForce > 0) {
      const rx = Y[yAt + 3 * pairs]!;
      const ry = Y[yAt + 3 * pairs + 1]!;
      const rz = Y[yAt + 3 * pairs + 2]!;
      const gx = pull[0]! + pull[4]! * rz - pull[5]! * ry;
      const gy = pull[1]! + pull[5]! * rx - pull[3]! * rz;
      const gz = pull[2]! + pull[3]! * ry - pull[4]! * rx;
      along += freeForce * Math.sqrt(gx * gx + gy * gy + gz * gz);
      wide += freeForce * this.senseOf(f, 1, rx, ry, rz);
      cross += freeForce * radius[pairs]! * table.normMoment[f]!;
    }
    const reach = wide + cross;
    return Math.sqrt(square + 2 * (along + Math.sqrt(square) * cross) + reach * reach);
  }

  /** Most of g · δ for u_p + δ as long as u_p and within `rho` of it. */
  private across(gx: number, gy: number, gz: number, u: Flat, p: number, rho: number): number {
    const size = this.size[p]!;
    if (size === 0) return 0;
    const ux = u[3 * p]! / size;
    const uy = u[3 * p + 1]! / size;
    const uz = u[3 * p + 2]! / size;
    const g = gx * ux + gy * uy + gz * uz;
    const square = Math.max(0, gx * gx + gy * gy + gz * gz - g * g);
    return rho * Math.sqrt(square) + (g < 0 ? (-g * rho * rho) / (2 * size) : 0);
  }

  /** Norm of S, rows m α + β × h of the norm: its largest singular value for two rows, else Frobenius. */
  private senseOf(f: number, m: number, hx: number, hy: number, hz: number): number {
    const { factor } = this.table;
    const rows = this.table.rows[f]!;
    let sum = 0;
    let first = 0;
    let inner = 0;
    let px = 0;
    let py = 0;
    let pz = 0;
    for (let r = 0; r < rows; r++) {
      const o = WRENCH * (ROWS * f + r);
      const x = m * factor[o]! + factor[o + 4]! * hz - factor[o + 5]! * hy;
      const y = m * factor[o + 1]! + factor[o + 5]! * hx - factor[o + 3]! * hz;
      const z = m * factor[o + 2]! + factor[o + 3]! * hy - factor[o + 4]! * hx;
      const own = x * x + y * y + z * z;
      sum += own;
      if (r === 0) {
        first = own;
        px = x;
        py = y;
        pz = z;
      } else if (r === 1) inner = px * x + py * y + pz * z;
    }
    if (rows !== 2) return Math.sqrt(sum);
    const half = sum / 2;
    const apart = first - half;
    return Math.sqrt(half + Math.sqrt(apart * apart + inner * inner));
  }

  /** Most of the linear part. */
  private line(
    c: number,
    f: number,
    w: Flat,
    u: Flat,
    uAt: number,
    spread: Flat | null,
    Y: Flat,
    yAt: number,
    radius: Flat,
  ): number {
    const { table, load } = this;
    const { factor } = table;
    const { pairs, blocks } = load;
    const o = WRENCH * (ROWS * f + LINE);
    const bx = factor[o + 3]!;
    const by = factor[o + 4]!;
    const bz = factor[o + 5]!;
    let line = rowValue(factor, o, w);
    for (let p = 0; p < pairs; p++) {
      const ux = u[uAt + 3 * p]!;
      const uy = u[uAt + 3 * p + 1]!;
      const uz = u[uAt + 3 * p + 2]!;
      const x = uy * bz - uz * by;
      const y = uz * bx - ux * bz;
      const z = ux * by - uy * bx;
      line += radius[p]! * Math.sqrt(x * x + y * y + z * z);
      if (!spread) continue;
      const m = load.weight[pairs * table.joint[c]! + p]!;
      const hx = Y[yAt + 3 * p]!;
      const hy = Y[yAt + 3 * p + 1]!;
      const hz = Y[yAt + 3 * p + 2]!;
      line += this.across(
        m * factor[o]! + by * hz - bz * hy,
        m * factor[o + 1]! + bz * hx - bx * hz,
        m * factor[o + 2]! + bx * hy - by * hx,
        u,
        p,
        spread[p]!,
      );
      line += table.lineMoment[f]! * spread[p]! * radius[p]!;
    }
    if (load.tool) line += radius[blocks - 2]! * table.lineForce[f]! + radius[blocks - 1]! * table.lineMoment[f]!;
    if (load.freeForce === 0) return line;
    const rx = Y[yAt + 3 * pairs]!;
    const ry = Y[yAt + 3 * pairs + 1]!;
    const rz = Y[yAt + 3 * pairs + 2]!;
    const x = factor[o]! + by * rz - bz * ry;
    const y = factor[o + 1]! + bz * rx - bx * rz;
    const z = factor[o + 2]! + bx * ry - by * rx;
    return line + load.freeForce * (Math.sqrt(x * x + y * y + z * z) + radius[pairs]! * table.lineMoment[f]!);
  }

  /** How far the torque can be from that at the centres. */
  private torqueReach(
    c: number,
    u: Flat,
    uAt: number,
    spread: Flat | null,
    Y: Flat,
    yAt: number,
    radius: Flat,
  ): number {
    const { load } = this;
    const { pairs, freeForce } = load;
    let reach = load.motion ? load.motion[2 * this.table.joint[c]! + 1]! : 0;
    for (let p = 0; p < pairs; p++) {
      const a = uAt + 3 * p;
      const h = yAt + 3 * p;
      const ru = spread ? spread[p]! : 0;
      const rh = radius[p]!;
      reach += rh * Math.hypot(u[a]!, u[a + 1]!) + ru * (Math.hypot(Y[h]!, Y[h + 1]!) + rh);
    }
    const tip = yAt + 3 * pairs;
    if (freeForce > 0) reach += freeForce * (Math.hypot(Y[tip]!, Y[tip + 1]!) + radius[pairs]!);
    return load.tool ? reach + radius[load.blocks - 1]! : reach;
  }
}
