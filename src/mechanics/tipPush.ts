/**
 * The most that a tip force free to point anywhere puts on a check form along e, over every outboard pose, with the form's own constants:
 *
 *     P(e) = max over r of F ‖α_e + β_e × r‖ + e·c + o
 *
 * convex and homogeneous in (e, 1). The norm is what a weight at the tip does under gravity that may point anywhere; it is looked up in lazy
 * tables, which never lie below it.
 */
import { SphereTable } from '../math/sphereTable.ts';
import type { Form } from './form.ts';
import { FreeDirection } from './freeDirection.ts';
import { followOutward } from './inwardSteps.ts';
import { COARSE_CELLS, type OutwardSets } from './outwardSets.ts';

export class TipPush {
  /** P of no unit vector e exceeds this. */
  readonly most: number;
  private readonly c: readonly [number, number];
  private readonly o: number;
  private readonly free: FreeDirection;
  private readonly tip: OutwardSets;
  private readonly joint: number;
  private readonly inLink: boolean;
  private readonly tables: SphereTable[] = [];

  /** `tip`: outward sets of the tip as a mass of the force's size (unit gravity). `form`: of two rows at most, o ≥ ‖c‖. */
  constructor(tip: OutwardSets, joint: number, form: Form, inLink: boolean) {
    if (form.rows > 2) throw new Error('a push is looked up over e of two components');
    this.c = [form.c[0] ?? 0, form.c[1] ?? 0];
    this.o = form.o;
    this.tip = tip;
    this.joint = joint;
    this.inLink = inLink;
    this.free = new FreeDirection(tip, joint, form, 1, inLink);
    this.most = this.free.scale + Math.hypot(...this.c) + Math.abs(form.o);
  }

  /** Angles outboard at which the push does most along a unit e, into `pose`. */
  follow(e0: number, e1: number, pose: Float64Array, level: number): void {
    const d = this.free.direction(e0, e1, 0, 1, level);
    followOutward(this.tip, this.joint, this.inLink, d, pose, level);
  }

  at(e0: number, e1: number, el: number, level: number): number {
    let table = this.tables[level];
    if (table === undefined) {
      table = new SphereTable(COARSE_CELLS << level, (x, y, z) => this.free.most(x, y, 0, z, level));
      this.tables[level] = table;
    }
    return table.at(e0, e1, el) + e0 * this.c[0] + e1 * this.c[1] + el * this.o;
  }
}
