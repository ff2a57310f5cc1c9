/**
 * The most that a tip force free to point anywhere puts on a check form along e, over every outboard pose: a weight at the tip under gravity
 * that may point anywhere. P(e) = max over r of F ‖α_e + β_e × r‖ is convex and homogeneous in (e, 1) and never negative; it is looked up in lazy
 * tables, which never lie below it.
 */
import { SphereTable } from '../math/sphereTable.ts';
import type { Form } from './form.ts';
import { FreeDirection } from './freeDirection.ts';
import { COARSE_CELLS, type OutwardSets } from './outwardSets.ts';

export class TipPush {
  /** P of no unit vector e exceeds this. */
  readonly most: number;
  private readonly free: FreeDirection;
  private readonly tables: SphereTable[] = [];

  /** `tip`: outward sets of the tip as a mass of the force's size (unit gravity). `form`: of two rows at most. */
  constructor(tip: OutwardSets, joint: number, form: Form, inLink: boolean) {
    if (form.rows > 2) throw new Error('a push is looked up over e of two components');
    this.free = new FreeDirection(tip, joint, form, 1, inLink);
    this.most = this.free.scale;
  }

  at(e0: number, e1: number, el: number, level: number): number {
    let table = this.tables[level];
    if (table === undefined) {
      table = new SphereTable(COARSE_CELLS << level, (x, y, z) => this.free.most(x, y, 0, z, level));
      this.tables[level] = table;
    }
    return table.at(e0, e1, el);
  }
}
