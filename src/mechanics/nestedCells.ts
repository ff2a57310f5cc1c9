/**
 * Cells of the sphere of gravity directions in one joint's housing frame. For each check a cell is found hopeless or possible when a
 * direction first falls in it: hopeless where the check, bounded over the whole cell and over all that the outboard tree can make,
 * stays below its floor (a value that some pose is known to reach). Floors are set once for a job, so a cell says the same whoever
 * asks first. With a base-fixed force a cell is a pair of cells, one of each direction.
 *
 * Cells are squares of a cube around the sphere, projected; the point farthest from a cell's centre is one of its corners.
 */
import type { Flat } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import type { NestedBound } from './nestedBound.ts';
import type { NestedCase } from './nestedCase.ts';
import type { FormTable } from './nestedForms.ts';
import { pairLoad } from './nestedLoad.ts';
import type { NestedTree } from './nestedTree.ts';

const UNKNOWN = 0;
const HOPELESS = 1;
const POSSIBLE = 2;

/** Levels of the tree that a cell is held against. */
const MOST_LEVELS = 2;
/** Cells stand in blocks of this edge; a block found hopeless speaks for its cells. */
const BLOCK = 4;

export class NestedCells {
  private readonly state: Uint8Array;
  private readonly blockState: Uint8Array;
  private readonly edge: number;
  private readonly load: NestedCase;
  private readonly bound: NestedBound;
  private readonly tree: NestedTree;
  private readonly table: FormTable;
  private readonly checks: Int32Array;
  private readonly floor: Float64Array;
  private readonly centre: Flat;
  private readonly spread: Flat;
  private readonly w = new Float64Array(WRENCH);
  private readonly leaf: Flat;
  private readonly none: Flat;

  /** `blocks`: blocks of cells along an edge of the cube. `floor` is read by check. */
  constructor(
    load: NestedCase,
    table: FormTable,
    bound: NestedBound,
    tree: NestedTree,
    checks: Int32Array,
    floor: Float64Array,
    blocks: number,
  ) {
    this.load = load;
    this.table = table;
    this.bound = bound;
    this.tree = tree;
    this.checks = checks;
    this.floor = floor;
    this.edge = BLOCK * blocks;
    this.state = new Uint8Array((6 * this.edge ** 2) ** load.pairs * checks.length);
    this.blockState = new Uint8Array((6 * blocks ** 2) ** load.pairs * checks.length);
    this.centre = new Float64Array(3 * load.pairs);
    this.spread = new Float64Array(load.pairs);
    this.leaf = new Float64Array(load.width);
    this.none = new Float64Array(load.blocks);
  }

  /** The cell of u at `at`. */
  cellOf(u: Flat, at: number): number {
    const cell = this.squareOf(u[at]!, u[at + 1]!, u[at + 2]!);
    if (this.load.pairs === 1) return cell;
    return 6 * this.edge * this.edge * cell + this.squareOf(u[at + 3]!, u[at + 4]!, u[at + 5]!);
  }

  /** Whether some pose with u in the cell may matter to the check of that number. */
  possible(cell: number, number: number): boolean {
    const at = cell * this.checks.length + number;
    const known = this.state[at]!;
    if (known !== UNKNOWN) return known === POSSIBLE;
    const c = this.checks[number]!;
    const possible = this.blockPossible(cell, number) && this.examine(cell, c, this.edge);
    this.state[at] = possible ? POSSIBLE : HOPELESS;
    return possible;
  }

  private blockPossible(cell: number, number: number): boolean {
    const block = this.blockOf(cell);
    const at = block * this.checks.length + number;
    const known = this.blockState[at]!;
    if (known !== UNKNOWN) return known === POSSIBLE;
    const possible = this.examine(block, this.checks[number]!, this.edge / BLOCK);
    this.blockState[at] = possible ? POSSIBLE : HOPELESS;
    return possible;
  }

  private blockOf(cell: number): number {
    if (this.load.pairs === 1) return this.blockOfSquare(cell);
    const cells = 6 * this.edge ** 2;
    const blocks = cells / BLOCK ** 2;
    return blocks * this.blockOfSquare(Math.floor(cell / cells)) + this.blockOfSquare(cell % cells);
  }

  private blockOfSquare(square: number): number {
    const { edge } = this;
    const j = square % edge;
    const row = (square - j) / edge;
    return Math.floor(row / BLOCK) * (edge / BLOCK) + Math.floor(j / BLOCK);
  }

  private squareOf(x: number, y: number, z: number): number {
    const ax = Math.abs(x);
    const ay = Math.abs(y);
    const az = Math.abs(z);
    let face = 0;
    let a = y;
    let b = z;
    let most = x;
    if (ay > ax && ay >= az) {
      face = 2;
      a = z;
      b = x;
      most = y;
    } else if (az > ax && az > ay) {
      face = 4;
      a = x;
      b = y;
      most = z;
    }
    if (most === 0) return 0;
    if (most < 0) {
      face++;
      most = -most;
    }
    const half = this.edge / 2;
    // up to the far edge of the last cell
    const i = Math.min(this.edge - 1, Math.floor((a / most + 1) * half));
    const j = Math.min(this.edge - 1, Math.floor((b / most + 1) * half));
    return (face * this.edge + i) * this.edge + j;
  }

  /** Centre and radius of a cell of direction p, in the size of u_p; `edge` of them along an edge of the cube. */
  private place(p: number, cell: number, edge: number): void {
    const { centre, spread } = this;
    const size = this.bound.size[p]!;
    const face = Math.floor(cell / (edge * edge));
    const x = (2 * (Math.floor(cell / edge) % edge) + 1) / edge - 1;
    const y = (2 * (cell % edge) + 1) / edge - 1;
    const axis = face >> 1;
    const length = Math.sqrt(1 + x * x + y * y);
    centre[3 * p + axis] = ((face & 1 ? -1 : 1) * size) / length;
    centre[3 * p + ((axis + 1) % 3)] = (size * x) / length;
    centre[3 * p + ((axis + 2) % 3)] = (size * y) / length;
    let most = 0;
    for (let k = 0; k < 4; k++) {
      const cx = x + (k & 1 ? 1 : -1) / edge;
      const cy = y + (k & 2 ? 1 : -1) / edge;
      // |a - b|² = 2 - 2 a·b of the unit vectors
      const along = (1 + x * cx + y * cy) / (length * Math.sqrt(1 + cx * cx + cy * cy));
      const apart = Math.sqrt(Math.max(0, 2 - 2 * along));
      if (apart > most) most = apart;
    }
    // a direction on the edge between two cells may be counted to either
    spread[p] = size * (most * (1 + 1e-9) + 1e-12);
  }

  private examine(cell: number, c: number, edge: number): boolean {
    const { load, tree } = this;
    const cells = 6 * edge * edge;
    if (load.pairs === 2) this.place(0, Math.floor(cell / cells), edge);
    this.place(load.pairs - 1, cell % cells, edge);
    this.bound.direct(c, this.centre, 0);
    if (!this.reaches(c, tree.rootCentre, 0, tree.rootRadius)) return false;
    return tree.levels > 0 ? this.below(c, 0, 0) : this.inRow(c, 0);
  }

  /** Whether some child of a node, as deep as is worth the trouble, reaches the floor. */
  private below(c: number, level: number, parent: number): boolean {
    const { tree, load } = this;
    const turns = tree.turns[level]!;
    const deeper = level + 1 < Math.min(tree.tabulated, MOST_LEVELS);
    const last = level + 1 === tree.levels && level + 1 < MOST_LEVELS;
    for (let e = parent * turns; e < (parent + 1) * turns; e++) {
      if (!this.reaches(c, tree.centre[level]!, load.width * e, tree.radius[level]!)) continue;
      if (deeper ? this.below(c, level + 1, e) : !last || this.inRow(c, e)) return true;
    }
    return false;
  }

  private inRow(c: number, row: number): boolean {
    const { tree, leaf, none } = this;
    for (let k = 0; k < tree.samples.turns; k++) {
      tree.sample(tree.rows!, 3 * this.load.width * row, k, leaf);
      if (this.reaches(c, leaf, 0, none)) return true;
    }
    return false;
  }

  private reaches(c: number, Y: Flat, at: number, radius: Flat): boolean {
    pairLoad(this.load, this.table.joint[c]!, this.centre, 0, Y, at, true, this.w, 0);
    this.bound.both(c, this.w, this.centre, this.spread, Y, at, radius);
    return !(this.bound.result[0]! < this.floor[c]!);
  }
}
