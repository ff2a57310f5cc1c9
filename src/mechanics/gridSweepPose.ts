/** The value of checks at one pose of a grid under a case, the worst over what the case leaves free there. */
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import { type CheckForm, checkValue, type Form } from './form.ts';
import { freeScratch, hasFree, newFreeWorst, worstOverFree } from './freeLoads.ts';
import { LIN, looseBound, PART, type ReducedForm, reduceForm, support } from './freeLoadsForm.ts';
import { newPoseLoad, pairCount, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';
import { type Grid, poseAt } from './gridSweepGrid.ts';

/**
 * Directions among which every unit vector e of so many components is a sum of neighbours with weights that add up to `between` at most.
 * The best of e · y + line over the free parts is then at most `between` times its largest value among them (or 0), plus what the line
 * can lack: (between - 1) of its size.
 */
interface Directions {
  readonly count: number;
  /** [3 count] */
  readonly e: Float64Array;
  readonly between: number;
}

const CIRCLE = 24;
/** Squares along an edge of the cube whose corners are the directions of the sphere. */
const CUBE = 6;

function circle(): Directions {
  const e = Float64Array.from({ length: 3 * CIRCLE }, (_, k) => {
    const angle = (2 * Math.PI * Math.floor(k / 3)) / CIRCLE;
    return k % 3 === 0 ? Math.cos(angle) : k % 3 === 1 ? Math.sin(angle) : 0;
  });
  return { count: CIRCLE, e, between: (1 + 1e-12) / Math.cos(Math.PI / CIRCLE) };
}

function sphere(): Directions {
  const found: number[] = [];
  let nearest = 1;
  for (let face = 0; face < 6; face++) {
    const corner = (i: number, j: number): number[] => {
      const v = [face & 1 ? -1 : 1, (2 * i) / CUBE - 1, (2 * j) / CUBE - 1];
      const size = Math.hypot(...v);
      return [0, 1, 2].map((k) => v[(k + 3 - (face >> 1)) % 3]! / size);
    };
    for (let i = 0; i <= CUBE; i++) {
      for (let j = 0; j <= CUBE; j++) {
        found.push(...corner(i, j));
        if (i === CUBE || j === CUBE) continue;
        nearest = Math.min(nearest, planeOf(corner(i, j), corner(i + 1, j), corner(i + 1, j + 1)));
        nearest = Math.min(nearest, planeOf(corner(i, j), corner(i, j + 1), corner(i + 1, j + 1)));
      }
    }
  }
  return { count: found.length / 3, e: Float64Array.from(found), between: (1 + 1e-12) / nearest };
}

/** Distance from the centre to the plane through three points of the sphere. */
function planeOf(a: readonly number[], b: readonly number[], c: readonly number[]): number {
  const p = b.map((value, k) => value - a[k]!);
  const q = c.map((value, k) => value - a[k]!);
  const n = [0, 1, 2].map((k) => p[(k + 1) % 3]! * q[(k + 2) % 3]! - p[(k + 2) % 3]! * q[(k + 1) % 3]!);
  return Math.abs(n[0]! * a[0]! + n[1]! * a[1]! + n[2]! * a[2]!) / Math.hypot(...n);
}

const LINE: Directions = { count: 2, e: Float64Array.of(1, 0, 0, -1, 0, 0), between: 1 + 1e-12 };
const BY_ROWS = [LINE, LINE, circle(), sphere()] as const;

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
    return loose < floor ? loose : this.overDirections(f.rows, loose);
  }

  /** The reduced form over directions e of as many components as it has rows. `start`: another bound. */
  private overDirections(rows: number, start: number): number {
    const { e } = this;
    const { form } = this.scratch;
    const { count, e: all, between } = BY_ROWS[rows]!;
    let most = 0;
    for (let k = 0; k < count; k++) {
      e[0] = all[3 * k]!;
      e[1] = all[3 * k + 1]!;
      e[2] = all[3 * k + 2]!;
      const value = support(form, e);
      if (!(value <= most)) most = value;
    }
    return Math.min(start, most * between + (between - 1) * lineSize(form));
  }
}

/** Most that the linear part of a reduced form can be, either way. */
function lineSize(form: ReducedForm): number {
  let size = Math.abs(form.fixed[LIN]!);
  if (form.hasTip) size += Math.hypot(form.tip[9]!, form.tip[10]!, form.tip[11]!);
  if (!form.hasMotion) return size;
  for (let j = 0; j < form.n; j++) size += Math.abs(form.accel[PART * j + LIN]!);
  for (let k = 0; k < pairCount(form.n); k++) size += Math.abs(form.rate[PART * k + LIN]!);
  return size;
}
