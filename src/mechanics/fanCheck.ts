/**
 * A check form of three rows (bending and torsion together) as a fan of forms of two rows: with e = (cos ψ ê, sin ψ),
 *
 *     ‖ y ‖ = max over ψ in [-90°, 90°] of  cos ψ ‖(y1, y2)‖ + sin ψ y3
 *
 * and each ψ is a form of two rows with a linear part. The worst over all poses is, as a function of (cos ψ, sin ψ), convex and homogeneous, so the
 * bounds at two angles of the fan bound all angles between them (arcBound). Angles are added only where they can matter.
 */
import { arcBound } from '../math/arcMax.ts';
import { WRENCH } from './chain.ts';
import { type Form, form } from './form.ts';
import { GravityCheck } from './gravityCheck.ts';
import type { OutwardSets } from './outwardSets.ts';
import type { RoundForm } from './roundForms.ts';
import { TipPush } from './tipPush.ts';

/** What a search needs of a form's bounds; see GravityCheck. */
export type SphereCheck = Pick<GravityCheck, 'ceiling' | 'stepCount' | 'best' | 'follow' | 'apart'>;

interface Rib {
  readonly angle: number;
  readonly check: GravityCheck;
  bound: number;
  level: number;
}

const UPRIGHT = { lean: new Float64Array(WRENCH), leanO: 0 };
/** Angle between the first ribs; each level allows half of it. */
const WIDEST = Math.PI / 4;

export class FanCheck implements SphereCheck {
  readonly ceiling: number;
  readonly stepCount: number;
  private readonly make: (angle: number) => Rib;
  private ribs: Rib[];
  /** Price of overshooting the linear part. */
  private readonly kappa: number;

  /** `tip`: as of `TipPush`; null: no push. `lean`: in cos ψ ‖(y1, y2)‖ the norm is this much more. */
  constructor(
    sets: OutwardSets,
    joint: number,
    f: Form,
    g: number,
    down: ArrayLike<number>,
    inLink = false,
    tip: OutwardSets | null = null,
    { lean, leanO }: Pick<RoundForm, 'lean' | 'leanO'> = UPRIGHT,
  ) {
    const rows = [0, 1, 2].map((r) => f.P.slice(WRENCH * r, WRENCH * (r + 1)));
    const search = (part: Form) =>
      new GravityCheck(sets, joint, part, g, down, inLink, tip && new TipPush(tip, joint, part, inLink));
    this.make = (angle) => {
      const c = Math.cos(angle);
      const s = Math.sin(angle);
      const scaled = [rows[0]!, rows[1]!].map((row) => Array.from(row, (v) => c * v));
      const l = Array.from(f.l, (v, k) => v + s * rows[2]![k]! + c * lean[k]!);
      const [a, b, third] = [f.c[0]!, f.c[1]!, f.c[2]!];
      const part = form({ P: scaled, l, c: [c * a, c * b], o: f.o + s * third + c * leanO });
      return { angle, check: search(part), bound: Number.POSITIVE_INFINITY, level: -1 };
    };
    this.ribs = [-2, -1, 0, 1, 2].map((k) => this.make(k * WIDEST));
    this.kappa = search(form({ P: [[0, 0, 0, 0, 0, 0]], l: Array.from(f.l), o: f.o })).ceiling;
    this.ceiling = Math.SQRT2 * this.ribs.reduce((most, rib) => Math.max(most, rib.check.ceiling), 0);
    this.stepCount = this.ribs[0]!.check.stepCount;
  }

  best(level: number, _wanted: number, enough: number): number {
    for (let k = 0; k < this.ribs.length - 1; ) {
      const left = this.ribs[k]!;
      const right = this.ribs[k + 1]!;
      if (this.between(left, right) <= enough) {
        k++;
        continue;
      }
      this.sharpen(left, level, enough);
      this.sharpen(right, level, enough);
      const width = right.angle - left.angle;
      if (this.between(left, right) <= enough || width <= 1.001 * (WIDEST / 2) * 0.5 ** level) k++;
      else this.ribs.splice(k + 1, 0, this.make(0.5 * (left.angle + right.angle)));
    }
    let most = Number.NEGATIVE_INFINITY;
    for (let k = 0; k < this.ribs.length - 1; k++)
      most = Math.max(most, this.between(this.ribs[k]!, this.ribs[k + 1]!));
    return most;
  }

  follow(pose: Float64Array, level: number, enough: number): void {
    this.highest().check.follow(pose, level, enough);
  }

  apart(weights: Float64Array, push: Float64Array, level: number, enough: number): void {
    this.highest().check.apart(weights, push, level, enough);
  }

  private highest(): Rib {
    return this.ribs.reduce((most, rib) => (rib.level >= 0 && rib.bound > most.bound ? rib : most), this.first());
  }

  private first(): Rib {
    const first = this.ribs.find((rib) => rib.level >= 0) ?? this.ribs[0]!;
    return first;
  }

  private sharpen(rib: Rib, level: number, enough: number): void {
    if (rib.level >= level) return;
    rib.level = level;
    rib.bound = Math.min(rib.bound, rib.check.best(level, enough, enough));
  }

  private between(left: Rib, right: Rib): number {
    if (left.level < 0 || right.level < 0) return Number.POSITIVE_INFINITY;
    return arcBound(left.bound, right.bound, right.angle - left.angle, this.kappa, Number.POSITIVE_INFINITY);
  }
}
