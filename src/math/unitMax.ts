/**
 * Upper bound of the maximum, over unit vectors e of up to three components, of a function G(e) that is convex and positively
 * homogeneous in (e, 1): what is left of a norm when its direction is free. κ ≥ G(0, -1), the price of overshooting the constant part.
 */
import { ArcMax } from './arcMax.ts';

export interface UnitFunction {
  /** Upper bound of G at a unit vector from tables of refinement `level`; unused components are 0. */
  unit(e0: number, e1: number, e2: number, level: number): number;
}

/** Halvings of an octant's edge at level 0 of a three-component search. */
const TRIANGLE_DEPTH = 4;

export class UnitMax {
  /** Of the last call: the e of the best value met. [3] */
  readonly e = new Float64Array(3);
  private readonly rows: number;
  private readonly arc = new ArcMax(0, 2 * Math.PI);
  private f: UnitFunction | null = null;
  private best = 0;
  private met = 0;
  private level = 0;
  private enough = 0;
  private kappa = 0;

  constructor(rows: number) {
    this.rows = rows;
  }

  /** `sag` ≥ |G| of any unit e; bounds below `enough` are not refined. */
  run(f: UnitFunction, level: number, kappa: number, sag: number, enough: number): number {
    this.e.fill(0);
    if (this.rows === 0) return f.unit(0, 0, 0, level);
    if (this.rows === 1) {
      const plus = f.unit(1, 0, 0, level);
      const minus = f.unit(-1, 0, 0, level);
      this.e[0] = plus >= minus ? 1 : -1;
      return Math.max(plus, minus);
    }
    this.f = f;
    if (this.rows === 2) {
      const bound = this.arc.run(this, level, kappa, sag, enough);
      this.e[0] = Math.cos(this.arc.arg);
      this.e[1] = Math.sin(this.arc.arg);
      return bound;
    }
    this.level = level;
    this.kappa = kappa;
    this.enough = enough;
    this.best = Number.NEGATIVE_INFINITY;
    this.met = Number.NEGATIVE_INFINITY;
    for (let octant = 0; octant < 8; octant++) {
      const a = octant & 1 ? -1 : 1;
      const b = octant & 2 ? -1 : 1;
      const c = octant & 4 ? -1 : 1;
      this.triangle([a, 0, 0], [0, b, 0], [0, 0, c], level + TRIANGLE_DEPTH);
    }
    return this.best;
  }

  at(t: number, level: number): number {
    return this.f!.unit(Math.cos(t), Math.sin(t), 0, level);
  }

  /** Unit corners; inside, e = Σ a_k e_k with a_k ≥ 0 and 1 ≤ Σ a_k ≤ 1/(distance of the corners' plane). */
  private triangle(p: number[], q: number[], r: number[], depth: number): void {
    let most = Number.NEGATIVE_INFINITY;
    for (const corner of [p, q, r]) {
      const value = this.f!.unit(corner[0]!, corner[1]!, corner[2]!, this.level);
      if (value > this.met) {
        this.met = value;
        this.e.set(corner);
      }
      if (!(value <= most)) most = value;
    }
    const nx = (q[1]! - p[1]!) * (r[2]! - p[2]!) - (q[2]! - p[2]!) * (r[1]! - p[1]!);
    const ny = (q[2]! - p[2]!) * (r[0]! - p[0]!) - (q[0]! - p[0]!) * (r[2]! - p[2]!);
    const nz = (q[0]! - p[0]!) * (r[1]! - p[1]!) - (q[1]! - p[1]!) * (r[0]! - p[0]!);
    const far = Math.hypot(nx, ny, nz) / Math.abs(nx * p[0]! + ny * p[1]! + nz * p[2]!);
    const top = most + this.kappa;
    const bound = top > 0 ? far * top - this.kappa : most;
    if (bound <= this.best) return;
    if (depth === 0 || bound <= this.enough) {
      this.best = bound;
      return;
    }
    const pq = middle(p, q);
    const qr = middle(q, r);
    const rp = middle(r, p);
    this.triangle(pq, qr, rp, depth - 1);
    this.triangle(p, pq, rp, depth - 1);
    this.triangle(q, qr, pq, depth - 1);
    this.triangle(r, rp, qr, depth - 1);
  }
}

function middle(a: number[], b: number[]): number[] {
  const x = a[0]! + b[0]!;
  const y = a[1]! + b[1]!;
  const z = a[2]! + b[2]!;
  const length = Math.hypot(x, y, z);
  return [x / length, y / length, z / length];
}
