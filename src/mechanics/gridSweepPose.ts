/** The value of checks at one pose of a grid under a case, the worst over what the case leaves free there. */
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import { type CheckForm, checkValue, type Form } from './form.ts';
import { freeScratch, hasFree, newFreeWorst, worstOverFree } from './freeLoads.ts';
import { looseBound, reduceForm, support } from './freeLoadsForm.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';
import { type Grid, poseAt } from './gridSweepGrid.ts';

/** Directions of a half circle; between two of them a convex support is at most 1/cos(π/2/12) of the larger end. */
const DIRECTIONS = 12;
const BETWEEN = (1 + 1e-12) / Math.cos(Math.PI / 2 / DIRECTIONS);
const CIRCLE = Float64Array.from({ length: 3 * 2 * DIRECTIONS }, (_, k) => {
  const angle = (Math.PI * Math.floor(k / 3)) / DIRECTIONS;
  return k % 3 === 0 ? Math.cos(angle) : k % 3 === 1 ? Math.sin(angle) : 0;
});

/** Weights of the torque, in the form's own torque factor, that a bound of a form for some torques tries. */
const WEIGHTS = [0.25, 0.5, 1, 2, 4];

export class PoseValue {
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly checks: readonly CheckForm[];
  private readonly grid: Grid;
  private readonly free: boolean;
  private readonly pose: Float64Array;
  private readonly parts;
  private readonly partsScratch;
  private readonly worst;
  private readonly scratch;
  private readonly e = new Float64Array(3);
  private index = -1;

  constructor(chain: Chain, load: ChainCase, checks: readonly CheckForm[], grid: Grid) {
    const { n } = chain;
    this.chain = chain;
    this.load = load;
    this.checks = checks;
    this.grid = grid;
    this.free = hasFree(load);
    this.pose = new Float64Array(n);
    this.parts = newPoseLoad(n);
    this.partsScratch = poseLoadScratch(n);
    this.worst = newFreeWorst(n);
    this.scratch = freeScratch(n);
  }

  /** Makes the pose of that index the one that `value` speaks about. */
  set(index: number): void {
    if (index === this.index) return;
    this.index = index;
    poseAt(this.grid, index, this.pose);
    poseLoad(this.chain, this.load, this.pose, this.parts, this.partsScratch);
  }

  /** Worst value of check c at the pose set; below `floor` it need not be the worst. */
  value(c: number, floor = Number.NEGATIVE_INFINITY): number {
    const check = this.checks[c]!;
    if (!this.free) return checkValue(check, this.parts.fixed, WRENCH * check.joint);
    return worstOverFree(check, this.load, this.parts, this.worst, this.scratch, floor);
  }

  /** A bound of that, no better than it must be to show that the check stays below `floor`. */
  bound(c: number, floor: number): number {
    if (!this.free) return Number.POSITIVE_INFINITY;
    const check = this.checks[c]!;
    let bound = Number.NEGATIVE_INFINITY;
    for (const f of check.forms) {
      const own = this.formBound(check, f, floor);
      if (!(own <= bound)) bound = own;
    }
    return bound;
  }

  private formBound(check: CheckForm, f: Form, floor: number): number {
    let own = this.weighed(check, f, 0, 0, floor);
    for (const [side, limit] of [
      [1, f.torqueFrom],
      [-1, f.torqueTo],
    ] as const) {
      if (own < floor || !Number.isFinite(limit)) continue;
      // where the form holds, any weight of (torque - limit) may be added to it: try some of the size of its own torque factors
      let scale = 0;
      for (let r = 0; r < f.rows; r++) scale = Math.max(scale, Math.abs(f.P[WRENCH * r + 5]!));
      for (const share of WEIGHTS) own = Math.min(own, this.weighed(check, f, side * share * scale, limit, floor));
    }
    return own;
  }

  /** Bound of a form with `weight` times (torque - `limit`) added. */
  private weighed(check: CheckForm, f: Form, weight: number, limit: number, floor: number): number {
    const { form } = this.scratch;
    reduceForm(form, f, check.joint, this.load, this.parts, weight, limit);
    const loose = looseBound(form);
    return loose < floor || f.rows > 2 ? loose : this.overDirections(f.rows, loose);
  }

  /** The reduced form over directions e: one row has two, two rows a circle. `start`: another bound. */
  private overDirections(rows: number, start: number): number {
    const { e } = this;
    const { form } = this.scratch;
    if (rows === 1) {
      e[0] = 1;
      e[1] = 0;
      const there = support(form, e);
      e[0] = -1;
      return Math.min(start, Math.max(there, support(form, e)) + 1e-12 * Math.abs(start));
    }
    let most = 0;
    for (let k = 0; k < 2 * DIRECTIONS; k++) {
      e[0] = CIRCLE[3 * k]!;
      e[1] = CIRCLE[3 * k + 1]!;
      const value = support(form, e);
      if (!(value <= most)) most = value;
    }
    return Math.min(start, most * BETWEEN);
  }
}
