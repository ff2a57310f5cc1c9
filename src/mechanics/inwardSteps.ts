/** Carries a function of gravity's direction from a joint back to the base: one maximum over an arc for each step. */
import { ArcMax } from '../math/arcMax.ts';
import { PolarTable } from '../math/polarTable.ts';
import { SphereTable } from '../math/sphereTable.ts';
import { IDENTITY33, multiply33 } from '../math/vector.ts';
import { COARSE_CELLS, type OutwardSets, POLAR_RATIO } from './outwardSets.ts';

/** Turns v back by q about z, in place. */
export function turnBack(v: Float64Array, q: number): void {
  const c = Math.cos(q);
  const s = Math.sin(q);
  const x = v[0]!;
  const y = v[1]!;
  v[0] = c * x + s * y;
  v[1] = c * y - s * x;
}

/** out = Rᵀ v with R the k-th matrix of a list. */
export function intoNext(out: Float64Array, v: ArrayLike<number>, r: Float64Array, k: number): void {
  const [x, y, z] = [v[0]!, v[1]!, v[2]!];
  const at = 9 * k;
  for (let j = 0; j < 3; j++) out[j] = r[at + j]! * x + r[at + 3 + j]! * y + r[at + 6 + j]! * z;
}

/** Angles of the joints outboard that reach farthest along d (housing frame of a joint, or its link frame), into `pose`; d is used up. */
export function followOutward(
  sets: OutwardSets,
  joint: number,
  inLink: boolean,
  d: Float64Array,
  pose: Float64Array,
  level: number,
): void {
  const { n, rotation } = sets.chain;
  const first = inLink ? joint + 1 : joint;
  if (inLink && first < n) intoNext(d, d, rotation, first);
  for (let k = first; k < n; k++) {
    const q = sets.argument(k, d[0]!, d[1]!, d[2]!, level);
    pose[k] = q;
    turnBack(d, q);
    if (k + 1 < n) intoNext(d, d, rotation, k + 1);
  }
}

/**
 * Neighbouring joints with parallel axes turn gravity by the sum of their angles alone, so they are one step whose travel is
 * the sum of theirs. R leads from the first one's canonical frame (all angles 0) to the housing frame after the last.
 */
export interface ParallelRun {
  readonly joints: readonly number[];
  /** +1 or -1: sense of each joint about the first one's axis. */
  readonly senses: readonly number[];
  readonly from: number;
  /** Sum of the travels. */
  readonly width: number;
  readonly full: boolean;
  readonly travelFrom: Float64Array;
  readonly travelTo: Float64Array;
  readonly r: Float64Array;
}

const PARALLEL = 1e-13;

/** The steps from the base to the housing of a joint; `inLink`: to its link. */
export function parallelRuns(sets: OutwardSets, joint: number, inLink = false): ParallelRun[] {
  const { chain } = sets;
  const runs: ParallelRun[] = [];
  const end = inLink ? joint + 1 : joint;
  const after = (j: number) =>
    j === joint ? Float64Array.from(IDENTITY33) : chain.rotation.slice(9 * (j + 1), 9 * (j + 2));
  let k = 0;
  while (k < end) {
    const joints = [k];
    const senses = [1];
    let r = after(k);
    // R z = ±z: the next axis is parallel to the first of the run
    while (k + joints.length < end && Math.hypot(r[2]!, r[5]!) < PARALLEL) {
      const next = k + joints.length;
      joints.push(next);
      senses.push(r[8]! > 0 ? 1 : -1);
      const product = new Float64Array(9);
      multiply33(product, 0, r, 0, after(next), 0);
      r = product;
    }
    let from = 0;
    let width = 0;
    joints.forEach((j, at) => {
      from += senses[at]! > 0 ? chain.from[j]! : -chain.to[j]!;
      width += chain.to[j]! - chain.from[j]!;
    });
    const full = joints.some((j) => chain.full[j] === 1) || width >= 2 * Math.PI;
    runs.push({ joints, senses, from, width, full, travelFrom: chain.from, travelTo: chain.to, r });
    k += joints.length;
  }
  return runs;
}

/** Upper bound, at a level, of a convex homogeneous function of a direction; `enough` is for a unit vector. */
export interface DirectionFunction {
  of(x: number, y: number, z: number, level: number, enough: number): number;
}

/** The same function from lazy tables. */
export class Tabled implements DirectionFunction {
  private readonly inner: DirectionFunction;
  private readonly tables: SphereTable[] = [];
  private enough = 0;

  constructor(inner: DirectionFunction) {
    this.inner = inner;
  }

  of(x: number, y: number, z: number, level: number, enough: number): number {
    this.enough = enough;
    let table = this.tables[level];
    if (table === undefined) {
      table = new SphereTable(COARSE_CELLS << level, (a, b, c) => this.inner.of(a, b, c, level, this.enough));
      this.tables[level] = table;
    }
    return table.at(x, y, z);
  }
}

/** The same for a function that does not change about z. */
export class PolarTabled implements DirectionFunction {
  private readonly inner: DirectionFunction;
  private readonly tables: PolarTable[] = [];
  private enough = 0;

  constructor(inner: DirectionFunction) {
    this.inner = inner;
  }

  of(x: number, y: number, z: number, level: number, enough: number): number {
    this.enough = enough;
    let table = this.tables[level];
    if (table === undefined) {
      const cells = (POLAR_RATIO * COARSE_CELLS) << level;
      table = new PolarTable(cells, (rho, c) => this.inner.of(rho, 0, c, level, this.enough));
      this.tables[level] = table;
    }
    return table.at(Math.sqrt(x * x + y * y), z);
  }
}

/** What a function of direction exceeds nowhere, for a unit vector; lowered as more is known. */
export interface Roof {
  most: number;
}

/** Gravity carried over one step inward: the maximum of the next function over the step's arc. */
export class InwardStep implements DirectionFunction {
  private readonly run: ParallelRun;
  private readonly next: DirectionFunction;
  private readonly arc: ArcMax;
  private readonly scale: number;
  private readonly roof: Roof;
  private dx = 0;
  private dy = 0;
  private dz = 0;
  private enough = 0;
  private up = Number.NaN;
  private down = Number.NaN;

  /** `scale`: what the value of a unit vector cannot exceed by its terms' sizes. `roof`: what it never exceeds, whatever its direction. */
  constructor(run: ParallelRun, next: DirectionFunction, scale: number, roof: Roof) {
    this.run = run;
    this.next = next;
    this.scale = scale;
    this.roof = roof;
    this.arc = new ArcMax(run.from, run.from + (run.full ? 2 * Math.PI : run.width));
  }

  of(x: number, y: number, z: number, level: number, enough: number): number {
    return this.search(x, y, z, level, enough, this.roof.most);
  }

  /** `most` as of a roof. */
  private search(x: number, y: number, z: number, level: number, enough: number, most: number): number {
    if (Number.isNaN(this.up)) {
      this.up = this.carry(0, 0, 1, 0, Number.NEGATIVE_INFINITY);
      this.down = this.carry(0, 0, -1, 0, Number.NEGATIVE_INFINITY);
    }
    this.dx = x;
    this.dy = y;
    this.dz = z;
    this.enough = enough;
    const rho = Math.sqrt(x * x + y * y);
    if (rho <= 1e-13 * Math.abs(z)) {
      // Gravity along the axis: the angle makes no difference.
      this.arc.arg = 0.5 * (this.arc.from + this.arc.to);
      return this.carry(0, 0, z, level, enough) + rho * this.scale;
    }
    const kappa = z > 0 ? z * this.down : -z * this.up;
    const length = Math.sqrt(rho * rho + z * z);
    return this.arc.run(this, level, kappa, rho * this.scale, enough * length, most * length);
  }

  /** Turns u (housing frame before the step) into the frame after it at the best angle, and writes the angles into the pose. */
  carryBest(u: Float64Array, pose: Float64Array, level: number, enough: number): void {
    this.search(u[0]!, u[1]!, u[2]!, level, enough, Number.POSITIVE_INFINITY);
    const { run } = this;
    const angle = this.arc.arg;
    // Rounding must not carry a joint past its travel.
    const part = run.width > 0 ? Math.min(1, Math.max(0, (angle - run.from) / run.width)) : 0;
    run.joints.forEach((j, at) => {
      const low = run.travelFrom[j]!;
      const high = run.travelTo[j]!;
      const q = run.senses[at]! > 0 ? low + part * (high - low) : high - part * (high - low);
      pose[j] = Math.min(high, Math.max(low, q));
    });
    turnBack(u, angle);
    intoNext(u, u, run.r, 0);
  }

  at(q: number, level: number): number {
    const c = Math.cos(q);
    const s = Math.sin(q);
    return this.carry(c * this.dx + s * this.dy, c * this.dy - s * this.dx, this.dz, level, this.enough);
  }

  private carry(x: number, y: number, z: number, level: number, enough: number): number {
    const { r } = this.run;
    return this.next.of(
      r[0]! * x + r[3]! * y + r[6]! * z,
      r[1]! * x + r[4]! * y + r[7]! * z,
      r[2]! * x + r[5]! * y + r[8]! * z,
      level,
      enough,
    );
  }
}
