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
import { pairValue } from './nestedBound.ts';
import { type NestedCase, nestedCase } from './nestedCase.ts';
import { type FormTable, feelsLoad, formTable } from './nestedForms.ts';
import { NestedJoint } from './nestedJoint.ts';
import { type Stage, stagesOf } from './nestedStages.ts';
import { NestedTree } from './nestedTree.ts';

/** Cells along an edge of the cube at most, for one and for two directions; a cell should serve about this many directions. */
const MOST_EDGE = [0, 32, 6] as const;
const DIRECTIONS_A_CELL = 8;

export class NestedSweep {
  private readonly chain: Chain;
  private readonly grid: Grid;
  private readonly load: NestedCase;
  private readonly table: FormTable;
  private readonly floor: Float64Array | null;
  private readonly exact: PoseValue | null;
  private stages: readonly Stage[] = [];
  private inTurns: Int32Array = new Int32Array(0);
  private u = new Float64Array(0);
  /** The joint that stands first at a stage, where it has checks. */
  private joints: (NestedJoint | null)[] = [];
  private lastStage = -1;
  private readonly tmp = new Float64Array(3);

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
  }

  /** Takes the poses of a box (first and last sample of each joint) into account. Slots of `leaders` are the checks. */
  run(low: ArrayLike<number>, high: ArrayLike<number>, leaders: Leaders): void {
    const { chain, grid, load } = this;
    this.stages = stagesOf(grid, low, high);
    const balls = nestedBalls(chain, load, this.stages);
    this.inTurns = balls.inTurns;
    this.u = new Float64Array(3 * load.pairs * (this.stages.length + 1));
    let directions = 1;
    this.lastStage = -1;
    this.joints = this.stages.map((stage, s) => {
      const joint = stage.first ? this.jointAt(s, balls, directions) : null;
      directions *= balls.inTurns[s]!;
      if (joint) this.lastStage = s;
      return joint;
    });
    let index = 0;
    for (let j = 0; j < chain.n; j++) index += low[j]! * grid.stride[j]!;
    for (let p = 0; p < load.pairs; p++) rotateBack3(this.u, 3 * p, chain.rotation, 0, load.base, 3 * p);
    for (let c = 0; c < this.table.checks; c++)
      if (!feelsLoad(this.table, c)) offer(leaders, c, this.constant(c), index);
    this.inward(0, index, leaders);
  }

  /** Value of a check that no load changes. */
  private constant(c: number): number {
    return pairValue(this.table, c, new Float64Array(WRENCH));
  }

  private jointAt(s: number, balls: NestedBalls, directions: number): NestedJoint | null {
    const { chain, load, table, stages } = this;
    const i = stages[s]!.joint;
    if (!table.joint.includes(i)) return null;
    const tree = new NestedTree(chain, load, stages, balls, s);
    const served = (directions / DIRECTIONS_A_CELL) ** (1 / load.pairs);
    const edge = Math.min(MOST_EDGE[load.pairs]!, Math.floor(Math.sqrt(served / 6)));
    return new NestedJoint(table, load, i, tree, this.u, this.exact, this.floor, edge);
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
