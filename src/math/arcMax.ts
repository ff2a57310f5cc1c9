/**
 * Upper bound of a convex function along an arc of directions, from values at points of the arc.
 *
 * The arc is d(t) = d∥ + d⊥(t), d⊥ turning in a plane by the angle t, and f is convex and positively homogeneous of degree one. Between two
 * points δ apart, d(t) = a d1 + b d2 + (1-a-b) d∥ with a = sin(δ-t)/sin δ, b = sin t/sin δ and a+b ≥ 1, so
 *
 *     f(d(t)) ≤ a f1 + b f2 + (a+b-1) f(-d∥)
 *
 * which is the sinusoid through f1+κ and f2+κ, less κ = f(-d∥). Also d(t) = a point of the chord plus at most ρ(1-cos(δ/2)) of
 * a unit vector in the plane, ρ = |d⊥|, which gives the second bound. The smaller of the two is used.
 */

/** Bound on an interval of width δ (0 < δ < π) with end values v1, v2; sag = ρ·(most f of a unit vector of the plane, ≥ 0). */
export function arcBound(v1: number, v2: number, width: number, kappa: number, sag: number): number {
  const a1 = v1 + kappa;
  const a2 = v2 + kappa;
  const c = Math.cos(width);
  const s = Math.sin(width);
  const rise = (a2 - a1 * c) / s;
  let wave: number;
  // Falling at the start: the sinusoid may still pass a trough and come up again, never a crest.
  if (rise <= 0) wave = Math.max(v1, v2);
  else if (rise * c >= a1 * s) wave = v2;
  else wave = Math.sqrt(a1 * a1 + rise * rise) - kappa;
  const half = Math.sin(width / 4);
  const chord = Math.max(v1, v2) + 2 * half * half * sag;
  // A NaN anywhere must come out as NaN.
  return wave <= chord ? wave : chord <= wave ? chord : Number.NaN;
}

/** What an arc search asks of its function. */
export interface ArcFunction {
  /** Upper bound of f at angle t from tables of refinement `level`; higher levels are tighter. */
  at(t: number, level: number): number;
}

/** Widest interval of the coarse pass, rad; every level halves it. */
const COARSE = Math.PI / 12;

/**
 * Bound of the maximum over [from, to] with tables up to `level`. Coarse values everywhere bound every interval; only intervals
 * that can still hold the maximum are looked at with finer tables. Nothing is allocated after construction.
 */
export class ArcMax {
  /** Of the last call: angle of the best value met. */
  arg = 0;
  private best = 0;
  private top = 0;
  private level = 0;
  private enough = 0;
  private kappa = 0;
  private sag = 0;
  private f: ArcFunction | null = null;
  private readonly value: Float64Array;
  private readonly bound: Float64Array;
  private readonly intervals: number;
  private readonly step: number;
  readonly from: number;
  readonly to: number;

  constructor(from: number, to: number) {
    this.from = from;
    this.to = to;
    this.intervals = Math.max(1, Math.ceil((to - from) / COARSE - 1e-9));
    this.step = (to - from) / this.intervals;
    this.value = new Float64Array(this.intervals + 1);
    this.bound = new Float64Array(this.intervals);
  }

  /**
   * `kappa` ≥ f(-d∥); `sag` as in arcBound; intervals bounded by `enough` are not refined further. `limit`: what f exceeds nowhere on the arc;
   * a bound that comes up to it ends the search.
   */
  run(
    f: ArcFunction,
    level: number,
    kappa: number,
    sag: number,
    enough: number,
    limit = Number.POSITIVE_INFINITY,
  ): number {
    this.top = Number.NEGATIVE_INFINITY;
    if (this.step < 1e-12) {
      this.arg = this.from;
      // A travel this short moves the direction by less than rounding of the kernel; sag covers it.
      return f.at(this.from, level) + this.step * sag;
    }
    const { value, bound, intervals, step } = this;
    for (let j = 0; j <= intervals; j++) {
      const t = j === intervals ? this.to : this.from + j * step;
      value[j] = f.at(t, 0);
      if (!(value[j]! <= this.top)) {
        this.top = value[j]!;
        this.arg = t;
      }
    }
    this.best = Number.NEGATIVE_INFINITY;
    let widest = Number.NEGATIVE_INFINITY;
    for (let j = 0; j < intervals; j++) {
      bound[j] = arcBound(value[j]!, value[j + 1]!, step, kappa, sag);
      if (!(bound[j]! <= widest)) widest = bound[j]!;
    }
    if (widest > limit) widest = limit;
    if (level === 0 || !(widest > enough)) return widest;
    this.f = f;
    this.level = level;
    this.kappa = kappa;
    this.sag = sag;
    this.enough = enough;
    this.top = Number.NEGATIVE_INFINITY;
    for (;;) {
      let pick = 0;
      for (let j = 1; j < intervals; j++) if (bound[j]! > bound[pick]!) pick = j;
      if (bound[pick]! <= this.best || bound[pick]! === Number.NEGATIVE_INFINITY) break;
      const b = bound[pick]!;
      bound[pick] = Number.NEGATIVE_INFINITY;
      if (b <= enough) {
        this.best = Math.max(this.best, b);
        break;
      }
      const t1 = this.from + pick * step;
      this.refine(t1, pick === intervals - 1 ? this.to : t1 + step, 1);
      if (this.best >= limit) return limit;
    }
    return this.best;
  }

  private refine(t1: number, t2: number, level: number): void {
    const f = this.f!;
    const middle = 0.5 * (t1 + t2);
    const half = 0.5 * (t2 - t1);
    const v1 = f.at(t1, level);
    const vm = f.at(middle, level);
    const v2 = f.at(t2, level);
    const left = arcBound(v1, vm, half, this.kappa, this.sag);
    const right = arcBound(vm, v2, half, this.kappa, this.sag);
    if (level === this.level) {
      this.note(t1, v1);
      this.note(middle, vm);
      this.note(t2, v2);
      this.settle(left);
      this.settle(right);
      return;
    }
    if (left >= right) {
      this.descend(t1, middle, left, level);
      this.descend(middle, t2, right, level);
    } else {
      this.descend(middle, t2, right, level);
      this.descend(t1, middle, left, level);
    }
  }

  private descend(t1: number, t2: number, bound: number, level: number): void {
    if (bound <= this.best) return;
    if (bound <= this.enough) this.settle(bound);
    else this.refine(t1, t2, level + 1);
  }

  private settle(bound: number): void {
    if (!(bound <= this.best)) this.best = bound;
  }

  private note(t: number, value: number): void {
    if (!(value <= this.top)) {
      this.top = value;
      this.arg = t;
    }
  }
}
