/** The vectors that gravity and a tip force act on, weight (mass α + β × x), over a box of joint angles and directions e, to second order. */
import type { Flat } from '../math/vector.ts';
import { dot } from './branchBoundAlgebra.ts';
import { type BoxChain, crossAt, length3, type TurnedVector } from './branchBoundChain.ts';

/** α and β at the middle and their derivatives by θ, φ, θθ, θφ, φφ [18 each], with the series of both [4]. */
export interface LeverDirections {
  readonly alpha: Flat;
  readonly beta: Flat;
  readonly seriesA: Flat;
  readonly seriesB: Flat;
}

export class Lever {
  readonly at = new Float64Array(3);
  /** Slopes by interval [3·size], curvatures of j ≤ k at 3(j·size + k) [3·size²]. */
  readonly slope: Flat;
  readonly bend: Flat;
  /** Second-order changes that each interval has a part in. [size] */
  readonly share: Flat;
  /** Length at the middle; changes of first order by length, and across; of higher orders; the least that is left along the middle. */
  length = 0;
  most = 0;
  aside = 0;
  bent = 0;
  left = 0;
  private readonly n: number;
  private readonly size: number;
  private readonly crossed = new Float64Array(3);

  constructor(n: number) {
    this.n = n;
    this.size = n + 2;
    this.slope = new Float64Array(3 * this.size);
    this.bend = new Float64Array(3 * this.size * this.size);
    this.share = new Float64Array(this.size);
  }

  /** `active`: the first `count` are intervals of the model, joints by index, then θ (n) and φ (n + 1); `half` widths. */
  expand(
    weight: number,
    mass: number,
    x: TurnedVector,
    e: LeverDirections,
    chain: BoxChain,
    active: Int32Array,
    count: number,
    half: Flat,
  ): void {
    const { at, slope, bend, n, size, crossed } = this;
    const { alpha, beta } = e;
    const { joint, axis } = chain;
    crossAt(at, 0, beta, 0, x.at, 0);
    for (let c = 0; c < 3; c++) at[c] = weight * (at[c]! + mass * alpha[c]!);
    for (let a = 0; a < count; a++) {
      const k = active[a]!;
      const inner = k < joint;
      const outer = k >= n;
      const d = outer ? 3 + 3 * (k - n) : 0;
      if (inner) slope.fill(0, 3 * k, 3 * k + 3);
      else {
        crossAt(slope, 3 * k, beta, d, outer ? x.at : x.slope, outer ? 0 : 3 * k);
        for (let c = 0; c < 3; c++)
          slope[3 * k + c] = weight * (slope[3 * k + c]! + (outer ? mass * alpha[d + c]! : 0));
      }
      for (let b = 0; b <= a; b++) {
        const j = active[b]!;
        const entry = 3 * (j * size + k);
        if (j < joint) bend.fill(0, entry, entry + 3);
        else if (!outer) {
          crossAt(crossed, 0, axis, 3 * j, x.slope, 3 * k);
          crossAt(bend, entry, beta, 0, crossed, 0);
        } else if (j < n) crossAt(bend, entry, beta, d, x.slope, 3 * j);
        else {
          const dd = 9 + 3 * (j - n + k - n);
          crossAt(bend, entry, beta, dd, x.at, 0);
          for (let c = 0; c < 3; c++) bend[entry + c]! += mass * alpha[dd + c]!;
        }
        for (let c = 0; c < 3; c++) bend[entry + c]! *= weight;
      }
    }
    this.measure(active, count, half);
    const { seriesA: A, seriesB: B } = e;
    const X = x.series;
    const second = mass * A[2]! + B[0]! * X[2]! + B[1]! * X[1]! + B[2]! * X[0]!;
    const third = mass * A[3]! + B[0]! * X[3]! + B[1]! * X[2]! + B[2]! * X[1]! + B[3]! * X[0]!;
    // curvatures as they are at the middle and a third order, or norms alone: the smaller
    this.bent = Math.min(weight * second, this.bent + weight * third);
    this.left -= this.bent;
  }

  /** Leaves in `bent` the second order at the middle, in `left` the length less the first order along it. */
  private measure(active: Int32Array, count: number, half: Flat): void {
    const { at, slope, bend, share, size } = this;
    share.fill(0);
    const length = length3(at, 0);
    let along = 0;
    let aside = 0;
    let most = 0;
    let second = 0;
    for (let a = 0; a < count; a++) {
      const k = active[a]!;
      const rho = half[k]!;
      const square = dot(slope, 3 * k, slope, 3 * k);
      const by = length > 0 ? dot(slope, 3 * k, at, 0) / length : 0;
      most += Math.sqrt(square) * rho;
      along += Math.abs(by) * rho;
      aside += Math.sqrt(Math.max(0, square - by * by)) * rho;
      for (let b = 0; b <= a; b++) {
        const j = active[b]!;
        const part = length3(bend, 3 * (j * size + k)) * rho * half[j]! * (j === k ? 0.5 : 1);
        second += part;
        share[k]! += part;
        if (j !== k) share[j]! += part;
      }
    }
    this.length = length;
    this.most = most;
    this.aside = aside;
    this.bent = second;
    this.left = length - along;
  }
}
