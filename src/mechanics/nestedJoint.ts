/**
 * The checks of one joint in the nested sweep: what the outboard tree can make of them for one inboard choice after another. A node
 * that cannot matter to a check closes all poses below it for that check; a direction of gravity whose cell of the sphere has been
 * found hopeless for a check is passed over at once.
 */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import { beaten, type Leaders, offer } from './gridSweepLeaders.ts';
import type { PoseValue } from './gridSweepPose.ts';
import { HarmonicRow } from './harmonicRow.ts';
import { NestedBound } from './nestedBound.ts';
import type { NestedCase } from './nestedCase.ts';
import { NestedCells } from './nestedCells.ts';
import { type FormTable, feelsLoad } from './nestedForms.ts';
import { pairLoad, pairValue } from './nestedLoad.ts';
import type { NestedTree } from './nestedTree.ts';

export class NestedJoint {
  readonly joint: number;
  private readonly table: FormTable;
  private readonly load: NestedCase;
  private readonly tree: NestedTree;
  private readonly cells: NestedCells | null;
  private readonly bound: NestedBound;
  private readonly exact: PoseValue | null;
  private readonly row: HarmonicRow;
  private readonly rowParts: Flat;
  private readonly leaf: Flat;
  private readonly none: Flat;
  /** Checks (slots of the leaders) in two parts: those that the outboard turns leave alone, then those that feel them. */
  private readonly checks: Int32Array;
  private readonly alone: number;
  private readonly active: Int32Array;
  private readonly frames: Flat;
  private readonly centres: Flat;
  private readonly u: Flat;
  private readonly w = new Float64Array(WRENCH);
  /** Index of the first pose of the inboard choice [0] and of the node in hand at level ℓ [ℓ + 1]. */
  private readonly index: Flat;
  private uAt = 0;

  /**
   * `u`: where the inboard vectors will stand; `exact`: values at a pose, where the case leaves something free; `floor` (by check) and
   * `blocks`: for the cells of the sphere, where there are to be any.
   */
  constructor(
    table: FormTable,
    load: NestedCase,
    joint: number,
    tree: NestedTree,
    u: Flat,
    exact: PoseValue | null,
    floor: Flat | null,
    blocks: number,
  ) {
    this.joint = joint;
    this.table = table;
    this.load = load;
    this.tree = tree;
    this.u = u;
    this.exact = exact;
    this.none = new Float64Array(load.blocks);
    this.bound = new NestedBound(table, load);
    const own: number[] = [];
    for (let c = 0; c < table.checks; c++) if (table.joint[c] === joint && feelsLoad(table, c)) own.push(c);
    const feels = (c: number) => load.tool || load.motion !== null || table.feelsMoment[c] === 1;
    this.checks = Int32Array.from([...own.filter((c) => !feels(c)), ...own.filter(feels)]);
    this.alone = own.filter((c) => !feels(c)).length;
    this.active = new Int32Array((tree.levels + 2) * own.length);
    this.frames = new Float64Array(tree.frameSize * (tree.levels + 1));
    this.centres = new Float64Array(load.width * (tree.levels + 1));
    this.index = new Float64Array(tree.levels + 1);
    this.row = new HarmonicRow(table, load, joint);
    this.rowParts = new Float64Array(3 * load.width);
    this.leaf = new Float64Array(load.width);
    // bounds of their own: what a cell asks in between is about another u
    const bound = new NestedBound(table, load);
    this.cells = floor && blocks > 0 ? new NestedCells(load, table, bound, tree, this.checks, floor, blocks) : null;
  }

  /** Takes every pose of one inboard choice into account: u at `uAt`, the index of its first pose. */
  at(uAt: number, index: number, leaders: Leaders): void {
    const { checks, active, alone, cells, tree, load, u, w } = this;
    this.uAt = uAt;
    this.index[0] = index;
    const cell = cells ? cells.cellOf(u, uAt) : 0;
    let open = 0;
    let loaded = false;
    for (let k = 0; k < checks.length; k++) {
      if (cells && !cells.possible(cell, k)) continue;
      const c = checks[k]!;
      if (!loaded) pairLoad(load, this.joint, u, uAt, tree.rootCentre, 0, true, w, 0);
      loaded = true;
      if (k < alone) {
        this.take(c, uAt, tree.rootCentre, 0, index, leaders);
        continue;
      }
      this.bound.direct(c, u, uAt);
      this.bound.outward(c, w, u, uAt, tree.rootCentre, 0, tree.rootRadius);
      if (!this.isBeaten(c, 0, leaders)) active[open++] = c;
    }
    if (open === 0) return;
    if (tree.levels === 0) this.offerRow(tree.rows!, 0, 0, open, 0, leaders);
    else this.tabulated(0, 0, 0, open, leaders);
  }

  /** Children of node `parent` of a tabulated level; the checks still open start at `from` in `active`. */
  private tabulated(level: number, parent: number, from: number, count: number, leaders: Leaders): void {
    const { tree, load, index } = this;
    const turns = tree.turns[level]!;
    const centre = tree.centre[level]!;
    const offset = tree.offset[level]!;
    for (let e = parent * turns; e < (parent + 1) * turns; e++) {
      index[level + 1] = index[0]! + offset[e]!;
      const open = this.stillOpen(level, centre, load.width * e, from, count, leaders);
      if (open === 0) continue;
      if (level + 1 < tree.tabulated) this.tabulated(level + 1, e, from + count, open, leaders);
      else if (tree.rows) this.offerRow(tree.rows, 3 * load.width * e, from + count, open, level + 1, leaders);
      else this.deep(level + 1, tree.frames, tree.frameSize * e, from + count, open, leaders);
    }
  }

  /** Children of a node in the making, below the tabulated levels. */
  private deep(level: number, parent: Flat, parentAt: number, from: number, count: number, leaders: Leaders): void {
    const { tree, load, frames, centres, rowParts, index } = this;
    if (level === tree.levels) {
      tree.row(parent, parentAt, rowParts, 0);
      this.offerRow(rowParts, 0, from, count, level, leaders);
      return;
    }
    const own = tree.frameSize * level;
    const at = load.width * level;
    const offset = tree.stepOffset(level);
    for (let k = 0; k < tree.turns[level]!; k++) {
      tree.step(level, k, parent, parentAt, frames, own, centres, at);
      index[level + 1] = index[level]! + offset[k]!;
      const open = this.stillOpen(level, centres, at, from, count, leaders);
      if (open > 0) this.deep(level + 1, frames, own, from + count, open, leaders);
    }
  }

  /** Hands on the checks that a node of a level may matter to; how many. */
  private stillOpen(level: number, Y: Flat, at: number, from: number, count: number, leaders: Leaders): number {
    const { active, tree, w, u, uAt } = this;
    const radius = tree.radius[level]!;
    pairLoad(this.load, this.joint, u, uAt, Y, at, true, w, 0);
    let open = 0;
    for (let k = from; k < from + count; k++) {
      const c = active[k]!;
      this.bound.outward(c, w, u, uAt, Y, at, radius);
      if (!this.isBeaten(c, level + 1, leaders)) active[from + count + open++] = c;
    }
    return open;
  }

  /** Whether what was bounded last, at poses from `index[place]` on, cannot matter to check c. */
  private isBeaten(c: number, place: number, leaders: Leaders): boolean {
    const bound = this.bound.result[0]!;
    return bound < leaders.best[c]! - leaders.tie[c]! || beaten(leaders, c, bound, this.index[place]!);
  }

  /** Offers the samples of a row (its parts at `at`) to the checks still open; its first pose stands at `index[place]`. */
  private offerRow(parts: Flat, at: number, from: number, count: number, place: number, leaders: Leaders): void {
    const { row, tree, active, u, uAt } = this;
    if (this.exact) {
      this.offerEach(parts, at, from, count, this.index[place]!, leaders);
      return;
    }
    row.set(u, uAt, parts, at);
    row.index[0] = this.index[place]!;
    for (let k = from; k < from + count; k++) row.offer(active[k]!, tree.samples, leaders);
  }

  /** The same sample by sample, where a case leaves something free at a pose. */
  private offerEach(parts: Flat, at: number, from: number, count: number, index: number, leaders: Leaders): void {
    const { load, tree, leaf, u, uAt, active } = this;
    for (let k = 0; k < tree.samples.turns; k++) {
      tree.sample(parts, at, k, leaf);
      pairLoad(load, this.joint, u, uAt, leaf, 0, true, this.w, 0);
      const here = index + tree.samples.offset[k]!;
      for (let a = from; a < from + count; a++) this.take(active[a]!, uAt, leaf, 0, here, leaders);
    }
  }

  /** Offers check c at the pose of u and Y, whose joint load is in `w`. */
  private take(c: number, uAt: number, Y: Flat, at: number, index: number, leaders: Leaders): void {
    const { exact, w } = this;
    const floor = leaders.best[c]! - leaders.tie[c]!;
    let value: number;
    if (exact) {
      this.bound.outward(c, w, this.u, uAt, Y, at, this.none);
      if (beaten(leaders, c, this.bound.result[0]!, index)) return;
      exact.set(index);
      if (beaten(leaders, c, exact.bound(c, floor), index)) return;
      value = exact.value(c, floor);
    } else value = pairValue(this.table, c, w);
    if (!(value < floor)) offer(leaders, c, value, index);
  }
}
