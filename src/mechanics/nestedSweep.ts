/**
 * The worst pose of every check over a box of the grid: the same answer as looking at each pose.
 *
 * Gravity in a joint's housing frame depends on the joints inboard alone, the first moment outboard on the joint itself and those
 * outboard of it: the load of joint i is a function of a pair (u, Y) and the grid is every u with every Y. So u is carried from the
 * ground outward once for all joints, Y stands tabulated as a tree once for each joint (`NestedTree`), and where a u meets a tree whole
 * branches are skipped that cannot matter (`NestedJoint`). Turns that make no difference (a first axis along gravity) are made once.
 */
import { rotateBack3 } from '../math/vector.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import type { CheckForm } from './form.ts';
import { hasFree } from './freeLoads.ts';
import type { Grid } from './gridSweepGrid.ts';
import { type Leaders, offer } from './gridSweepLeaders.ts';
import { PoseValue } from './gridSweepPose.ts';
import { type NestedBalls, nestedBalls } from './nestedBalls.ts';
import { type NestedCase, nestedCase } from './nestedCase.ts';
import { type FormTable, feelsLoad, formTable } from './nestedForms.ts';
import { NestedJoint } from './nestedJoint.ts';
import { pairValue } from './nestedLoad.ts';
import { type Stage, stagesOf } from './nestedStages.ts';
import { NestedTree, TreeMemory } from './nestedTree.ts';

/** Blocks of cells along an edge of the cube at most, for one and for two inboard vectors; a cell should serve so many directions. */
const MOST_BLOCKS = [0, 32, 2] as const;
const DIRECTIONS_A_CELL = 16;

export class NestedSweep {
  private readonly chain: Chain;
  private readonly grid: Grid;
  private readonly load: NestedCase;
  private readonly table: FormTable;
  private readonly floor: Float64Array | null;
  private readonly exact: PoseValue | null;
  /** For each joint with checks: blocks of cells along an edge of the cube. -1: no checks. */
  private readonly cellBlocks: Int32Array;
  /** Joints as last made, and the outboard samples they were made for: boxes mostly differ inboard. */
  private readonly made: (NestedJoint | null)[];
  private readonly madeFor: string[];
  private readonly memory: readonly TreeMemory[];
  private readonly tmp = new Float64Array(3);
  // The box under way.
  private stages: readonly Stage[] = [];
  private inTurns: Int32Array = new Int32Array(0);
  private u: Float64Array;
  /** The joint that stands first at a stage, where it has checks. */
  private joints: (NestedJoint | null)[] = [];
  private lastStage = -1;

  /** `floor`: for each check a value that some pose of the grid reaches (less what rounding may do), or null. */
  constructor(
    chain: Chain,
    load: ChainCase,
    checks: readonly CheckForm[],
    grid: Grid,
    floor: Float64Array | null = null,
  ) {
    this.chain = chain;
    this.grid = grid;
    this.load = nestedCase(chain, load);
    this.table = formTable(checks);
    this.floor = floor;
    this.exact = hasFree(load) ? new PoseValue(chain, load, checks, grid) : null;
    this.made = new Array(chain.n).fill(null);
    this.madeFor = new Array(chain.n).fill('');
    this.memory = Array.from({ length: chain.n }, () => new TreeMemory());
    const stages = stagesOf(
      grid,
      new Float64Array(chain.n),
      grid.count.map((count) => count - 1),
    );
    this.u = new Float64Array(3 * this.load.pairs * (stages.length + 1));
    this.cellBlocks = this.countBlocks(stages);
  }

  private countBlocks(stages: readonly Stage[]): Int32Array {
    const { chain, load, table } = this;
    const cellBlocks = new Int32Array(chain.n).fill(-1);
    const { inTurns } = nestedBalls(chain, load, stages);
    let directions = 1;
    stages.forEach((stage, s) => {
      if (stage.first && table.joint.includes(stage.joint)) {
        const served = (directions / DIRECTIONS_A_CELL) ** (1 / load.pairs);
        cellBlocks[stage.joint] = Math.min(MOST_BLOCKS[load.pairs]!, Math.floor(Math.sqrt(served / 96)));
      }
      directions *= inTurns[s]!;
    });
    return cellBlocks;
  }

  /** Takes the poses of a box (first and last sample of each joint) into account. Slots of `leaders` are the checks. */
  run(low: ArrayLike<number>, high: ArrayLike<number>, leaders: Leaders): void {
    const { chain, grid, load, table } = this;
    this.stages = stagesOf(grid, low, high);
    const balls = nestedBalls(chain, load, this.stages);
    this.inTurns = balls.inTurns;
    this.lastStage = -1;
    let directions = 1;
    this.joints = this.stages.map((stage, s) => {
      const met = directions;
      directions *= balls.inTurns[s]!;
      if (!stage.first || this.cellBlocks[stage.joint]! < 0) return null;
      this.lastStage = s;
      return this.jointAt(s, balls, met, low, high);
    });
    let index = 0;
    for (let j = 0; j < chain.n; j++) index += low[j]! * grid.stride[j]!;
    for (let p = 0; p < load.pairs; p++) rotateBack3(this.u, 3 * p, chain.rotation, 0, load.base, 3 * p);
    for (let c = 0; c < table.checks; c++) if (!feelsLoad(table, c)) offer(leaders, c, this.constant(c), index);
    this.inward(0, index, leaders);
  }

  private jointAt(
    s: number,
    balls: NestedBalls,
    directions: number,
    low: ArrayLike<number>,
    high: ArrayLike<number>,
  ): NestedJoint {
    const { chain, load, table, stages } = this;
    const i = stages[s]!.joint;
    let key = '';
    for (let j = i; j < chain.n; j++) key += `${low[j]}-${high[j]} `;
    const known = this.made[i];
    if (known && this.madeFor[i] === key) return known;
    const tree = new NestedTree(chain, load, stages, balls, s, directions, this.memory[i]!);
    const joint = new NestedJoint(table, load, i, tree, this.u, this.exact, this.floor, this.cellBlocks[i]!);
    this.made[i] = joint;
    this.madeFor[i] = key;
    return joint;
  }

  /** Value of a check that no load changes. */
  private constant(c: number): number {
    return pairValue(this.table, c, new Float64Array(WRENCH));
  }

  /** u before stage s stands at 3 pairs s; makes its turns, one after another, and goes outward. */
  private inward(s: number, index: number, leaders: Leaders): void {
    const { chain, load, u, tmp } = this;
    const { pairs } = load;
    const at = 3 * pairs * s;
    this.joints[s]?.at(at, index, leaders);
    if (s >= this.lastStage) return;
    const stage = this.stages[s]!;
    const next = at + 3 * pairs;
    for (let k = 0; k < this.inTurns[s]!; k++) {
      const cos = stage.cos[k]!;
      const sin = stage.sin[k]!;
      for (let p = 0; p < pairs; p++) {
        const x = u[at + 3 * p]!;
        const y = u[at + 3 * p + 1]!;
        const o = next + 3 * p;
        if (stage.last) {
          tmp[0] = cos * x + sin * y;
          tmp[1] = cos * y - sin * x;
          tmp[2] = u[at + 3 * p + 2]!;
          rotateBack3(u, o, chain.rotation, 9 * (stage.joint + 1), tmp, 0);
        } else {
          u[o] = cos * x + sin * y;
          u[o + 1] = cos * y - sin * x;
          u[o + 2] = u[at + 3 * p + 2]!;
        }
      }
      this.inward(s + 1, index + stage.offset[k]!, leaders);
    }
  }
}
