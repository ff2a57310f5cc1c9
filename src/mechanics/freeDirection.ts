import { ArcMax } from '../math/arcMax.ts';
import type { Form } from './form.ts';
import type { OutwardSets } from './outwardSets.ts';

/**
 * The most of a check form along e with gravity free to point anywhere, over every outboard pose. For a fixed e, with u = cos φ β̂ + sin φ w
 * and w ⊥ β̂ of unit length,
 *
 *     Mg α·u + g S(u × β) = cos φ (Mg α·β̂) + sin φ Y(w),   Y(w) = Mg α·w + g|β| S(w × β̂)
 *
 * so the best is the hypotenuse of Mg α·β̂ and the most of Y over the circle of w.
 */
export class FreeDirection {
  private readonly sets: OutwardSets;
  private readonly joint: number;
  private readonly g: number;
  private readonly mg: number;
  private readonly inLink: boolean;
  /** Rows of P (zero beyond the form's), with l as the fourth: α (3) and β (3) each. [24] */
  private readonly ab = new Float64Array(24);
  /** No value for unit e exceeds this. */
  readonly scale: number;
  private readonly arc = new ArcMax(0, 2 * Math.PI);
  /** Two unit vectors across β̂ with t2 = β̂ × t1. */
  private readonly t1 = new Float64Array(3);
  private readonly t2 = new Float64Array(3);
  private along1 = 0;
  private along2 = 0;
  private lever = 0;

  /** `inLink`: outboard of the joint's link, its own turn left out. */
  constructor(sets: OutwardSets, joint: number, form: Form, g: number, inLink: boolean) {
    this.sets = sets;
    this.joint = joint;
    this.g = g;
    this.mg = sets.outboard[joint]! * g;
    this.inLink = inLink;
    this.ab.set(form.P);
    this.ab.set(form.l, 18);
    this.scale = sizeOf(this.ab, this.mg, g * sets.reach[joint]!);
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

  /** Direction in which the outboard first moment counts where `most` is met. [3] */
  direction(e0: number, e1: number, e2: number, el: number, level: number): Float64Array {
    this.lever = 0;
    this.most(e0, e1, e2, el, level);
    const { t1, t2 } = this;
    const [c, s] = [Math.cos(this.arc.arg), Math.sin(this.arc.arg)];
    const out = Float64Array.from(t1, (v, k) => s * v - c * t2[k]!);
    if (this.lever === 0) out.set([0, 0, 1]);
    return out;
  }

  at(t: number, level: number): number {
    const c = Math.cos(t);
    const s = Math.sin(t);
    const { t1, t2 } = this;
    const x = s * t1[0]! - c * t2[0]!;
    const y = s * t1[1]! - c * t2[1]!;
    const z = s * t1[2]! - c * t2[2]!;
    const load = this.inLink ? this.sets.beyond(this.joint, x, y, z, level) : this.sets.at(this.joint, x, y, z, level);
    return c * this.along1 + s * this.along2 + this.lever * load;
  }
}

/** What forms of rows [α β] cannot exceed for a force and a moment of these sizes. */
function sizeOf(ab: Float64Array, force: number, moment: number): number {
  let size = 0;
  for (let o = 0; o < 24; o += 6) {
    size += Math.abs(force) * Math.hypot(ab[o]!, ab[o + 1]!, ab[o + 2]!);
    size += moment * Math.hypot(ab[o + 3]!, ab[o + 4]!, ab[o + 5]!);
  }
  return size;
}
