/**
 * The value of a check form at a direction of gravity, over every outboard pose: V_i of gravityCheck.ts, and its maximum over all
 * directions.
 */
import { UnitMax } from '../math/unitMax.ts';
import type { Form } from './form.ts';
import { FreeDirection } from './freeDirection.ts';
import type { DirectionFunction } from './inwardSteps.ts';
import type { OutwardSets } from './outwardSets.ts';
import type { TipPush } from './tipPush.ts';

/**
 * V_i: the maximum over the unit vectors e of a form, at a direction of gravity or over all of them. With a push of the tip on top it is
 *
 *     V_i(u) = max over e of [ M g α_e·u + g S_i(u × β_e) + |u| P(e) ],    P ≥ 0 the most that the push does along e
 *
 * which is convex and homogeneous still, in u and in (e, 1).
 */
export class DirectionValue implements DirectionFunction {
  /** No value for a unit u exceeds this. */
  readonly scale: number;
  private readonly sets: OutwardSets;
  private readonly joint: number;
  private readonly g: number;
  private readonly mg: number;
  /** Rows of P (zero beyond the form's), with l as the fourth: α (3) and β (3) each. [24] */
  private readonly ab = new Float64Array(24);
  /** Mg α·u and u × β of each row at the present u. [4], [12] */
  private readonly lin = new Float64Array(4);
  private readonly d = new Float64Array(12);
  private readonly over: UnitMax;
  private readonly hasLinear: boolean;
  private readonly free: FreeDirection;
  private readonly overFree: UnitMax;
  private readonly inLink: boolean;
  private readonly push: TipPush | null;
  /** Length of the present u. */
  private size = 1;

  /** `inLink`: all in the frame of the joint's link, which the form must not tell from its housing's; the joint's own turn is then one of u. */
  constructor(sets: OutwardSets, joint: number, form: Form, g: number, inLink = false, push: TipPush | null = null) {
    this.sets = sets;
    this.inLink = inLink;
    this.push = push;
    this.joint = joint;
    this.g = g;
    this.mg = sets.outboard[joint]! * g;
    this.ab.set(form.P);
    this.ab.set(form.l, 18);
    this.hasLinear = form.l.some((v) => v !== 0);
    this.over = new UnitMax(form.rows);
    this.overFree = new UnitMax(form.rows);
    this.free = new FreeDirection(sets, joint, form, g, inLink);
    this.scale = this.free.scale + (push?.most ?? 0);
  }

  of(x: number, y: number, z: number, level: number, enough: number): number {
    const { ab, lin, d } = this;
    for (let r = 0; r < 4; r++) {
      const o = 6 * r;
      lin[r] = this.mg * (ab[o]! * x + ab[o + 1]! * y + ab[o + 2]! * z);
      d[3 * r] = y * ab[o + 5]! - z * ab[o + 4]!;
      d[3 * r + 1] = z * ab[o + 3]! - x * ab[o + 5]!;
      d[3 * r + 2] = x * ab[o + 4]! - y * ab[o + 3]!;
    }
    const length = Math.sqrt(x * x + y * y + z * z);
    this.size = length;
    const kappa = this.hasLinear ? this.mix(0, 0, 0, -1, 0) : 0;
    return this.over.run(this, level, kappa, this.scale * length, enough * length);
  }

  cap(level: number, enough: number): number {
    const { free, push } = this;
    const kappa = this.hasLinear ? free.most(0, 0, 0, -1, 0) + (push?.at(0, 0, -1, 0) ?? 0) : 0;
    const sum = {
      unit: (e0: number, e1: number, e2: number, at: number) =>
        free.most(e0, e1, e2, 1, at) + (push?.at(e0, e1, 1, at) ?? 0),
    };
    return this.overFree.run(sum, level, kappa, this.scale, enough);
  }

  /** Direction in which the first moment counts at gravity (x, y, z), housing frame. [3] */
  direction(x: number, y: number, z: number, level: number, enough: number): Float64Array {
    this.of(x, y, z, level, enough);
    const { d } = this;
    const { e } = this.over;
    const out = new Float64Array(3);
    for (let j = 0; j < 3; j++) out[j] = e[0]! * d[j]! + e[1]! * d[3 + j]! + e[2]! * d[6 + j]! + d[9 + j]!;
    // A check that the first moment does not touch: any pose outboard will do, take them along gravity.
    if (!out.some((v) => v !== 0)) out.set([x, y, z]);
    return out;
  }

  /** Pose outboard that the push wants along the e of the last value. */
  followPush(pose: Float64Array, level: number): void {
    const { e } = this.over;
    this.push?.follow(e[0]!, e[1]!, pose, level);
  }

  unit(e0: number, e1: number, e2: number, level: number): number {
    return this.mix(e0, e1, e2, 1, level);
  }

  private mix(e0: number, e1: number, e2: number, el: number, level: number): number {
    const { d, lin } = this;
    const x = e0 * d[0]! + e1 * d[3]! + e2 * d[6]! + el * d[9]!;
    const y = e0 * d[1]! + e1 * d[4]! + e2 * d[7]! + el * d[10]!;
    const z = e0 * d[2]! + e1 * d[5]! + e2 * d[8]! + el * d[11]!;
    const own = e0 * lin[0]! + e1 * lin[1]! + e2 * lin[2]! + el * lin[3]!;
    const { sets, joint, push } = this;
    const moment = this.inLink ? sets.beyond(joint, x, y, z, level) : sets.at(joint, x, y, z, level);
    return own + this.g * moment + (push === null ? 0 : this.size * push.at(e0, e1, el, level));
  }
}
