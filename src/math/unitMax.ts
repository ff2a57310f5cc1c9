/**
 * Upper bound of the maximum, over unit vectors e of up to three components, of a function G(e) that is convex and positively
 * homogeneous in (e, 1): what is left of a norm when its direction is free. κ ≥ G(0, -1), the price of overshooting the constant part.
 */
import { ArcMax } from './arcMax.ts';

export interface UnitFunction {
  /** Upper bound of G at a unit vector from tables of refinement `level`; unused components are 0. */
  unit(e0: number, e1: number, e2: number, level: number): number;
}

export class UnitMax {
  /** Of the last call: the e of the best value met. [3] */
  readonly e = new Float64Array(3);
  private readonly rows: number;
  private readonly arc = new ArcMax(0, 2 * Math.PI);
  private readonly meridian: Meridian | null;
  private f: UnitFunction | null = null;
  private kappa = 0;
  private sag = 0;

  constructor(rows: number) {
    this.rows = rows;
    this.meridian = rows === 3 ? new Meridian() : null;
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
    this.kappa = kappa;
    this.sag = sag;
    const bound = this.arc.run(this, level, kappa, sag, enough);
    const t = this.arc.arg;
    if (this.meridian) {
      this.at(t, level);
      this.meridian.write(this.e);
    } else {
      this.e[0] = Math.cos(t);
      this.e[1] = Math.sin(t);
    }
    return bound;
  }

  /**
   * Two rows: G on the circle. Three: the most of G on the half circle from pole to pole through (cos t, sin t, 0). Between two such
   * half circles δ apart, e = a e1 + b e2 with e1, e2 in the half discs of the two and a, b as in arcBound, and a convex function's
   * most on a half disc is on its half circle: so the same bound holds.
   */
  at(t: number, level: number): number {
    const x = Math.cos(t);
    const y = Math.sin(t);
    if (this.meridian === null) return this.f!.unit(x, y, 0, level);
    return this.meridian.run(this.f!, x, y, level, this.kappa, this.sag);
  }
}

/** A half circle of unit vectors from pole to pole. */
class Meridian {
  private readonly arc = new ArcMax(-Math.PI / 2, Math.PI / 2);
  private f: UnitFunction | null = null;
  private x = 0;
  private y = 0;

  run(f: UnitFunction, x: number, y: number, level: number, kappa: number, sag: number): number {
    this.f = f;
    this.x = x;
    this.y = y;
    return this.arc.run(this, level, kappa, sag, Number.NEGATIVE_INFINITY);
  }

  at(t: number, level: number): number {
    const c = Math.cos(t);
    return this.f!.unit(c * this.x, c * this.y, Math.sin(t), level);
  }

  write(e: Float64Array): void {
    const c = Math.cos(this.arc.arg);
    e[0] = c * this.x;
    e[1] = c * this.y;
    e[2] = Math.sin(this.arc.arg);
  }
}
