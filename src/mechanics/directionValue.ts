/**
 * The value of a check form at a direction of gravity, over every outboard pose: V_i of gravityCheck.ts, and its maximum over all
 * directions.
 */
import { ArcMax } from '../math/arcMax.ts';
import { UnitMax } from '../math/unitMax.ts';
import type { Form } from './form.ts';
import type { DirectionFunction } from './inwardSteps.ts';
import type { OutwardSets } from './outwardSets.ts';

/** V_i: the maximum over the unit vectors e of a form, at a direction of gravity or over all of them. */
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

  constructor(sets: OutwardSets, joint: number, form: Form, g: number) {
    this.sets = sets;
    this.joint = joint;
    this.g = g;
    this.mg = sets.outboard[joint]! * g;
    this.ab.set(form.P);
    this.ab.set(form.l, 18);
    this.hasLinear = form.l.some((v) => v !== 0);
    this.over = new UnitMax(form.rows);
    this.overFree = new UnitMax(form.rows);
    let scale = 0;
    for (let r = 0; r < 4; r++) {
      const a = Math.hypot(this.ab[6 * r]!, this.ab[6 * r + 1]!, this.ab[6 * r + 2]!);
      const b = Math.hypot(this.ab[6 * r + 3]!, this.ab[6 * r + 4]!, this.ab[6 * r + 5]!);
      scale += Math.abs(this.mg) * a + g * sets.reach[joint]! * b;
    }
    this.scale = scale;
    this.free = new FreeDirection(sets, joint, g, this.ab, scale);
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
    const kappa = this.hasLinear ? this.mix(0, 0, 0, -1, 0) : 0;
    const length = Math.sqrt(x * x + y * y + z * z);
    return this.over.run(this, level, kappa, this.scale * length, enough * length);
  }

  cap(level: number, enough: number): number {
    const kappa = this.hasLinear ? this.free.most(0, 0, 0, -1, 0) : 0;
    return this.overFree.run(this.free, level, kappa, this.scale, enough);
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

  unit(e0: number, e1: number, e2: number, level: number): number {
    return this.mix(e0, e1, e2, 1, level);
  }

  private mix(e0: number, e1: number, e2: number, el: number, level: number): number {
    const { d, lin } = this;
    const x = e0 * d[0]! + e1 * d[3]! + e2 * d[6]! + el * d[9]!;
    const y = e0 * d[1]! + e1 * d[4]! + e2 * d[7]! + el * d[10]!;
    const z = e0 * d[2]! + e1 * d[5]! + e2 * d[8]! + el * d[11]!;
    const own = e0 * lin[0]! + e1 * lin[1]! + e2 * lin[2]! + el * lin[3]!;
    return own + this.g * this.sets.at(this.joint, x, y, z, level);
  }
}

/**
 * The same maximum with gravity free to point anywhere. For a fixed e, with u = cos φ β̂ + sin φ w, w ⊥ β̂ of unit length,
 *
 *     Mg α·u + g S(u × β) = cos φ (Mg α·β̂) + sin φ Y(w),   Y(w) = Mg α·w + g|β| S(w × β̂)
 *
 * so the best is the hypotenuse of Mg α·β̂ and the most of Y over the circle of w.
 */
class FreeDirection {
  private readonly sets: OutwardSets;
  private readonly joint: number;
  private readonly g: number;
  private readonly mg: number;
  private readonly ab: Float64Array;
  private readonly scale: number;
  private readonly arc = new ArcMax(0, 2 * Math.PI);
  /** Two unit vectors across β̂ with t2 = β̂ × t1. */
  private readonly t1 = new Float64Array(3);
  private readonly t2 = new Float64Array(3);
  private along1 = 0;
  private along2 = 0;
  private lever = 0;

  constructor(sets: OutwardSets, joint: number, g: number, ab: Float64Array, scale: number) {
    this.sets = sets;
    this.joint = joint;
    this.g = g;
    this.mg = sets.outboard[joint]! * g;
    this.ab = ab;
    this.scale = scale;
  }

  unit(e0: number, e1: number, e2: number, level: number): number {
    return this.most(e0, e1, e2, 1, level);
  }

  most(e0: number, e1: number, e2: number, el: number, level: number): number {
    const { ab, mg, t1, t2 } = this;
    const ax = mg * (e0 * ab[0]! + e1 * ab[6]! + e2 * ab[12]! + el * ab[18]!);
    const ay = mg * (e0 * ab[1]! + e1 * ab[7]! + e2 * ab[13]! + el * ab[19]!);
    const az = mg * (e0 * ab[2]! + e1 * ab[8]! + e2 * ab[14]! + el * ab[20]!);
    const bx = e0 * ab[3]! + e1 * ab[9]! + e2 * ab[15]! + el * ab[21]!;
    const by = e0 * ab[4]! + e1 * ab[10]! + e2 * ab[16]! + el * ab[22]!;
    const bz = e0 * ab[5]! + e1 * ab[11]! + e2 * ab[17]! + el * ab[23]!;
    const size = Math.sqrt(bx * bx + by * by + bz * bz);
    if (!(size > 0)) return Math.sqrt(ax * ax + ay * ay + az * az);
    const nx = bx / size;
    const ny = by / size;
    const nz = bz / size;
    // Any direction well away from β̂ starts the pair
    const flat = Math.abs(nz) < 0.8;
    const hx = flat ? ny : 0;
    const hy = flat ? -nx : nz;
    const hz = flat ? 0 : -ny;
    const h = Math.sqrt(hx * hx + hy * hy + hz * hz);
    t1[0] = hx / h;
    t1[1] = hy / h;
    t1[2] = hz / h;
    t2[0] = ny * t1[2]! - nz * t1[1]!;
    t2[1] = nz * t1[0]! - nx * t1[2]!;
    t2[2] = nx * t1[1]! - ny * t1[0]!;
    this.along1 = ax * t1[0]! + ay * t1[1]! + az * t1[2]!;
    this.along2 = ax * t2[0]! + ay * t2[1]! + az * t2[2]!;
    this.lever = this.g * size;
    const across = this.arc.run(this, level, 0, this.scale, Number.NEGATIVE_INFINITY);
    const along = ax * nx + ay * ny + az * nz;
    return across > 0 ? Math.sqrt(along * along + across * across) : Math.abs(along);
  }

  at(t: number, level: number): number {
    const c = Math.cos(t);
    const s = Math.sin(t);
    const { t1, t2 } = this;
    const load = this.sets.at(
      this.joint,
      s * t1[0]! - c * t2[0]!,
      s * t1[1]! - c * t2[1]!,
      s * t1[2]! - c * t2[2]!,
      level,
    );
    return c * this.along1 + s * this.along2 + this.lever * load;
  }
}
