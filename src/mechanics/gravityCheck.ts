/**
 * A check as a function of the direction of gravity, and its worst over the inboard joints.
 *
 * With unit gravity u in housing frame i and a check form ‖P w + c‖ + l·w, c = 0, the joint load is f = M g u, m = g h × u, so for
 * each unit e (one to three rows) with [α β] = Pᵀe + l
 *
 *     V_i(u) = max over e of [ M g α·u + g S_i(u × β) ]
 *
 * which is convex and homogeneous in u. It is carried back to the base by F_k(u) = max over q_k of F_{k+1}(Rᵀ Rz(q_k)ᵀ u), F_i = V_i,
 * and the bound is F_0 at the base's gravity. The first joints are taken on their exact arcs, the rest from lazy tables.
 */
import { DirectionValue } from './directionValue.ts';
import type { Form } from './form.ts';
import {
  type DirectionFunction,
  followOutward,
  InwardStep,
  intoNext,
  PolarTabled,
  parallelRuns,
  type Roof,
  Tabled,
} from './inwardSteps.ts';
import type { OutwardSets } from './outwardSets.ts';
import type { TipPush } from './tipPush.ts';

/** Inboard steps that are taken on exact arcs rather than from tables. */
const EXACT = 2;
const ROUNDING = 1e-13;
/** A cap this much above the bound of its level will not become the better one. */
const CAP_WORTH = 1.01;

export class GravityCheck {
  readonly joint: number;
  private readonly sets: OutwardSets;
  private readonly steps: InwardStep[] = [];
  private readonly value: DirectionValue;
  private readonly u0: Float64Array;
  private readonly inLink: boolean;
  private capHelps: boolean;
  private readonly roof: Roof;

  /**
   * `g` m/s² ≥ 0; `down` its unit direction in the base frame; `form` with c = 0 and o = 0. `inLink` and `push` as of `DirectionValue`: with
   * a push the check is that of weights and push together, each at its own pose outboard.
   */
  constructor(
    sets: OutwardSets,
    joint: number,
    form: Form,
    g: number,
    down: ArrayLike<number>,
    inLink = false,
    push: TipPush | null = null,
  ) {
    this.joint = joint;
    this.sets = sets;
    this.inLink = inLink;
    this.value = new DirectionValue(sets, joint, form, g, inLink, push);
    this.u0 = new Float64Array(3);
    intoNext(this.u0, down, sets.chain.rotation, 0);
    const runs = parallelRuns(sets, joint, inLink);
    this.roof = { most: this.value.scale };
    // One step inboard reaches an arc of directions at most, and is cheap to follow exactly.
    this.capHelps = runs.length > 1;
    let next: DirectionFunction = this.value;
    for (let s = runs.length - 1; s >= 0; s--) {
      if (s + 1 >= EXACT) {
        const full = s + 1 < runs.length && runs[s + 1]!.full;
        next = full ? new PolarTabled(next) : new Tabled(next);
      }
      const step = new InwardStep(runs[s]!, next, this.value.scale, this.roof);
      this.steps.unshift(step);
      next = step;
    }
  }

  /** Steps from the joint back to the base, runs of parallel axes counted once. */
  get stepCount(): number {
    return this.steps.length;
  }

  /** No pose puts more on the check than this, which holds whatever the levels; N, N·m or Pa. */
  get ceiling(): number {
    return this.value.scale;
  }

  /** Nothing in the travel exceeds this. Intervals bounded by `enough` are not refined further. */
  bound(level: number, enough: number): number {
    const top = this.steps[0] ?? this.value;
    return top.of(this.u0[0]!, this.u0[1]!, this.u0[2]!, level, enough);
  }

  /**
   * Bound over every direction of gravity, whatever the inboard joints allow. Where they can turn the arm any way it is as tight as
   * `bound` and far cheaper, for the inboard searches would find the same value everywhere.
   */
  cap(level: number, enough: number): number {
    const cap = this.value.cap(level, enough);
    // With room for rounding, by which the tables may lie below it
    this.roof.most = Math.min(this.roof.most, cap + ROUNDING * this.value.scale);
    return cap;
  }

  /**
   * The better of `cap` and `bound` at little cost: the cap first, the bound only where the cap exceeds `wanted`, and no caps any more once one
   * came out far above the bound of its level.
   */
  best(level: number, wanted: number, enough: number): number {
    const cap = this.capHelps ? this.cap(level, enough) : Number.POSITIVE_INFINITY;
    if (cap <= wanted) return cap;
    const bound = this.bound(level, enough);
    if (level > 0 && cap > bound * CAP_WORTH) this.capHelps = false;
    return Math.min(cap, bound);
  }

  /** Pose at which the tables of this level see their maximum; `pose` [n] is filled. */
  follow(pose: Float64Array, level: number, enough: number): void {
    const u = Float64Array.from(this.u0);
    for (const step of this.steps) step.carryBest(u, pose, level, enough);
    const d = this.value.direction(u[0]!, u[1]!, u[2]!, level, enough);
    followOutward(this.sets, this.joint, this.inLink, d, pose, level);
  }

  /** Poses outboard that weights and push each want where the check is worst, as of `follow`; both [n] are filled. */
  apart(weights: Float64Array, push: Float64Array, level: number, enough: number): void {
    this.follow(weights, level, enough);
    push.set(weights);
    this.value.followPush(push, level);
  }
}
