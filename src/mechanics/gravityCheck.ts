/**
 * A check as a function of the direction of gravity, and its worst over the inboard joints.
 *
 * With unit gravity u in housing frame i and a check form ‖P w + c‖ + l·w, c = 0, the joint load is f = M g u, m = g h × u, so for
 * each unit e (one to three rows) with [α β] = Pᵀe + l
 *
 *     V_i(u) = max over e of [ M g α·u + g S_i(u × β) ]
 *
 * which is convex and homogeneous in u. It is carried back to the base by F_k(u) = max over q_k of F_{k+1}(Rᵀ Rz(q_k)ᵀ u), F_i = V_i,
 * and the bound is F_0 at the base's gravity. The first joints are taken on their exact arcs, the rest from lazy tables.
 */
import { ArcMax } from '../math/arcMax.ts';
import { PolarTable } from '../math/polarTable.ts';
import { SphereTable } from '../math/sphereTable.ts';
import { UnitMax } from '../math/unitMax.ts';
import { multiply33 } from '../math/vector.ts';
import type { Form } from './form.ts';
import { COARSE_CELLS, type OutwardSets, POLAR_RATIO } from './outwardSets.ts';

/** Inboard steps that are taken on exact arcs rather than from tables. */
const EXACT = 2;

export class GravityCheck {
  readonly joint: number;
  private readonly sets: OutwardSets;
  private readonly steps: InwardStep[] = [];
  private readonly value: DirectionValue;
  private readonly u0: Float64Array;

  /** `g` m/s² ≥ 0; `down` its unit direction in the base frame; `form` with c = 0 and o = 0. */
  constructor(sets: OutwardSets, joint: number, form: Form, g: number, down: ArrayLike<number>) {
    this.joint = joint;
    this.sets = sets;
    this.value = new DirectionValue(sets, joint, form, g);
    this.u0 = new Float64Array(3);
    intoNext(this.u0, down, sets.chain.rotation, 0);
    const runs = parallelRuns(sets, joint);
    let next: DirectionFunction = this.value;
    for (let s = runs.length - 1; s >= 0; s--) {
      if (s + 1 >= EXACT) {
        const full = s + 1 < runs.length && runs[s + 1]!.full;
        next = full ? new PolarTabled(next) : new Tabled(next);
      }
      const step = new InwardStep(runs[s]!, next, this.value.scale);
      this.steps.unshift(step);
      next = step;
    }
  }

  /** No pose puts more on the check than this, which holds whatever the levels; N, N·m or Pa. */
  get ceiling(): number {
    return this.value.scale;
  }

  /** Nothing in the travel exceeds this. Intervals bounded by `enough` are not refined further. */
  bound(level: number, enough: number): number {
    const top = this.steps[0] ?? this.value;
    return top.of(this.u0[0]!, this.u0[1]!, this.u0[2]!, level, enough);
  }

  /**
   * Bound over every direction of gravity, whatever the inboard joints allow. Where they can turn the arm any way it is as tight as
   * `bound` and far cheaper, for the inboard searches would find the same value everywhere.
   */
  cap(level: number, enough: number): number {
    return this.value.cap(level, enough);
  }

  /** Pose at which the tables of this level see their maximum; `pose` [n] is filled. */
  follow(pose: Float64Array, level: number, enough: number): void {
    const { chain } = this.sets;
    const u = Float64Array.from(this.u0);
    for (const step of this.steps) step.carryBest(u, pose, level, enough);
    const d = this.value.direction(u[0]!, u[1]!, u[2]!, level, enough);
    for (let k = this.joint; k < chain.n; k++) {
      const q = this.sets.argument(k, d[0]!, d[1]!, d[2]!, level);
      pose[k] = q;
      turnBack(d, q);
      if (k + 1 < chain.n) intoNext(d, d, chain.rotation, k + 1);
    }
  }
}

function turnBack(v: Float64Array, q: number): void {
  const c = Math.cos(q);
  const s = Math.sin(q);
  const x = v[0]!;
  const y = v[1]!;
  v[0] = c * x + s * y;
  v[1] = c * y - s * x;
}

/** out = Rᵀ v with R the k-th matrix of a list. */
function intoNext(out: Float64Array, v: ArrayLike<number>, r: Float64Array, k: number): void {
  const [x, y, z] = [v[0]!, v[1]!, v[2]!];
  const at = 9 * k;
  for (let j = 0; j < 3; j++) out[j] = r[at + j]! * x + r[at + 3 + j]! * y + r[at + 6 + j]! * z;
}

/**
 * Neighbouring joints with parallel axes turn gravity by the sum of their angles alone, so they are one step whose travel is
 * the sum of theirs. R leads from the first one's canonical frame (all angles 0) to the housing frame after the last.
 */
interface ParallelRun {
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

function parallelRuns(sets: OutwardSets, joint: number): ParallelRun[] {
  const { chain } = sets;
  const runs: ParallelRun[] = [];
  let k = 0;
  while (k < joint) {
    const joints = [k];
    const senses = [1];
    let r = chain.rotation.slice(9 * (k + 1), 9 * (k + 2));
    // R z = ±z: the next axis is parallel to the first of the run
    while (k + joints.length < joint && Math.hypot(r[2]!, r[5]!) < PARALLEL) {
      const next = k + joints.length;
      joints.push(next);
      senses.push(r[8]! > 0 ? 1 : -1);
      const product = new Float64Array(9);
      multiply33(product, 0, r, 0, chain.rotation, 9 * (next + 1));
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
interface DirectionFunction {
  of(x: number, y: number, z: number, level: number, enough: number): number;
}

/** The same function from lazy tables. */
class Tabled implements DirectionFunction {
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
class PolarTabled implements DirectionFunction {
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

/** Gravity carried over one step inward: the maximum of the next function over the step's arc. */
class InwardStep implements DirectionFunction {
  private readonly run: ParallelRun;
  private readonly next: DirectionFunction;
  private readonly arc: ArcMax;
  private readonly scale: number;
  private dx = 0;
  private dy = 0;
  private dz = 0;
  private enough = 0;
  private up = Number.NaN;
  private down = Number.NaN;

  constructor(run: ParallelRun, next: DirectionFunction, scale: number) {
    this.run = run;
    this.next = next;
    this.scale = scale;
    this.arc = new ArcMax(run.from, run.from + (run.full ? 2 * Math.PI : run.width));
  }

  of(x: number, y: number, z: number, level: number, enough: number): number {
    if (this.up !== this.up) {
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
    return this.arc.run(this, level, kappa, rho * this.scale, enough * Math.sqrt(rho * rho + z * z));
  }

  /** Turns u (housing frame before the step) into the frame after it at the best angle, and writes the angles into the pose. */
  carryBest(u: Float64Array, pose: Float64Array, level: number, enough: number): void {
    this.of(u[0]!, u[1]!, u[2]!, level, enough);
    const { run } = this;
    const angle = this.arc.arg;
    const part = run.width > 0 ? (angle - run.from) / run.width : 0;
    run.joints.forEach((j, at) => {
      const low = run.travelFrom[j]!;
      const high = run.travelTo[j]!;
      pose[j] = run.senses[at]! > 0 ? low + part * (high - low) : high - part * (high - low);
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

/** V_i: the maximum over the unit vectors e of a form, at a direction of gravity or over all of them. */
class DirectionValue implements DirectionFunction {
  /** No value for a unit u exceeds this. */
  readonly scale: number;
  private readonly sets: OutwardSets;
  private readonly joint: number;
  private readonly g: number;
  private readonly mg: number;
  /** Rows of P (zero beyond the form's), with l as the fourth: α (3) and β (3) each. [24] */
  private readonly ab = new Float64Array(24);
  /** Mg α·u and u × β of each row at the present u. [4], [12] */
  private readonly lin = new Float64Array(4);
  private readonly d = new Float64Array(12);
  private readonly over: UnitMax;
  private readonly hasLinear: boolean;
  private readonly free: FreeDirection;
  private readonly overFree: UnitMax;

  constructor(sets: OutwardSets, joint: number, form: Form, g: number) {
    this.sets = sets;
    this.joint = joint;
    this.g = g;
    this.mg = sets.outboard[joint]! * g;
    this.ab.set(form.P);
    this.ab.set(form.l, 18);
    this.hasLinear = form.l.some((v) => v !== 0);
    this.over = new UnitMax(form.rows);
    this.overFree = new UnitMax(form.rows);
    let scale = 0;
    for (let r = 0; r < 4; r++) {
      const a = Math.hypot(this.ab[6 * r]!, this.ab[6 * r + 1]!, this.ab[6 * r + 2]!);
      const b = Math.hypot(this.ab[6 * r + 3]!, this.ab[6 * r + 4]!, this.ab[6 * r + 5]!);
      scale += Math.abs(this.mg) * a + g * sets.reach[joint]! * b;
    }
    this.scale = scale;
    this.free = new FreeDirection(sets, joint, g, this.ab, scale);
  }

  of(x: number, y: number, z: number, level: number, enough: number): number {
    const { ab, lin, d } = this;
    for (let r = 0; r < 4; r++) {
      const o = 6 * r;
      lin[r] = this.mg * (ab[o]! * x + ab[o + 1]! * y + ab[o + 2]! * z);
      d[3 * r] = y * ab[o + 5]! - z * ab[o + 4]!;
      d[3 * r + 1] = z * ab[o + 3]! - x * ab[o + 5]!;
      d[3 * r + 2] = x * ab[o + 4]! - y * ab[o + 3]!;
    }
    const kappa = this.hasLinear ? this.mix(0, 0, 0, -1, 0) : 0;
    const length = Math.sqrt(x * x + y * y + z * z);
    return this.over.run(this, level, kappa, this.scale * length, enough * length);
  }

  cap(level: number, enough: number): number {
    const kappa = this.hasLinear ? this.free.most(0, 0, 0, -1, 0) : 0;
    return this.overFree.run(this.free, level, kappa, this.scale, enough);
  }

  /** Direction in which the first moment counts at gravity (x, y, z), housing frame. [3] */
  direction(x: number, y: number, z: number, level: number, enough: number): Float64Array {
    this.of(x, y, z, level, enough);
    const { d } = this;
    const { e } = this.over;
    const out = new Float64Array(3);
    for (let j = 0; j < 3; j++) out[j] = e[0]! * d[j]! + e[1]! * d[3 + j]! + e[2]! * d[6 + j]! + d[9 + j]!;
    // A check that the first moment does not touch: any pose outboard will do, take them along gravity.
    if (!out.some((v) => v !== 0)) out.set([x, y, z]);
    return out;
  }

  unit(e0: number, e1: number, e2: number, level: number): number {
    return this.mix(e0, e1, e2, 1, level);
  }

  private mix(e0: number, e1: number, e2: number, el: number, level: number): number {
    const { d, lin } = this;
    const x = e0 * d[0]! + e1 * d[3]! + e2 * d[6]! + el * d[9]!;
    const y = e0 * d[1]! + e1 * d[4]! + e2 * d[7]! + el * d[10]!;
    const z = e0 * d[2]! + e1 * d[5]! + e2 * d[8]! + el * d[11]!;
    const own = e0 * lin[0]! + e1 * lin[1]! + e2 * lin[2]! + el * lin[3]!;
    return own + this.g * this.sets.at(this.joint, x, y, z, level);
  }
}

/**
 * The same maximum with gravity free to point anywhere. For a fixed e, with u = cos φ β̂ + sin φ w, w ⊥ β̂ of unit length,
 *
 *     Mg α·u + g S(u × β) = cos φ (Mg α·β̂) + sin φ Y(w),   Y(w) = Mg α·w + g|β| S(w × β̂)
 *
 * so the best is the hypotenuse of Mg α·β̂ and the most of Y over the circle of w.
 */
class FreeDirection {
  private readonly sets: OutwardSets;
  private readonly joint: number;
  private readonly g: number;
  private readonly mg: number;
  private readonly ab: Float64Array;
  private readonly scale: number;
  private readonly arc = new ArcMax(0, 2 * Math.PI);
  /** Two unit vectors across β̂ with t2 = β̂ × t1. */
  private readonly t1 = new Float64Array(3);
  private readonly t2 = new Float64Array(3);
  private along1 = 0;
  private along2 = 0;
  private lever = 0;

  constructor(sets: OutwardSets, joint: number, g: number, ab: Float64Array, scale: number) {
    this.sets = sets;
    this.joint = joint;
    this.g = g;
    this.mg = sets.outboard[joint]! * g;
    this.ab = ab;
    this.scale = scale;
  }

  unit(e0: number, e1: number, e2: number, level: number): number {
    return this.most(e0, e1, e2, 1, level);
  }

  most(e0: number, e1: number, e2: number, el: number, level: number): number {
    const { ab, mg, t1, t2 } = this;
    const part = (k: number) => e0 * ab[k]! + e1 * ab[6 + k]! + e2 * ab[12 + k]! + el * ab[18 + k]!;
    const ax = mg * part(0);
    const ay = mg * part(1);
    const az = mg * part(2);
    const bx = part(3);
    const by = part(4);
    const bz = part(5);
    const size = Math.sqrt(bx * bx + by * by + bz * bz);
    if (!(size > 0)) return Math.sqrt(ax * ax + ay * ay + az * az);
    const [nx, ny, nz] = [bx / size, by / size, bz / size];
    // Any direction well away from β̂ starts the pair
    const [hx, hy, hz] = Math.abs(nz) < 0.8 ? [ny, -nx, 0] : [0, nz, -ny];
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

  at(t: number, level: number): number {
    const c = Math.cos(t);
    const s = Math.sin(t);
    const { t1, t2 } = this;
    const load = this.sets.at(
      this.joint,
      s * t1[0]! - c * t2[0]!,
      s * t1[1]! - c * t2[1]!,
      s * t1[2]! - c * t2[2]!,
      level,
    );
    return c * this.along1 + s * this.along2 + this.lever * load;
  }
}
