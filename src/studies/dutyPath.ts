/**
 * What one pass of a path does to the bearings of an arm.
 *
 * The motion (`../capacity/duty/pathMotion.ts`) is sampled at every pose given and between them so finely that no joint turns further than
 * `STEP` from sample to sample. At each sample stands the joint load with the path's own speeds and accelerations. Over a step the
 * power of the load is taken as the mean of its ends, times the angle the joint sweeps, so the load counts where the joint turns.
 *
 * **What a case leaves free.** A tip force of direction `any` points, at each pose and for each bearing, where it loads it most. A case
 * with `motion` may at each pose have any speed and acceleration within its limits, or those of the path, whichever load more: a path of
 * few poses does not know how hard the arm is stopped. Radial load, thrust and moment each take their worst, together or not, so the load is never
 * less than what can happen. In motion both branches of a gear or belt count, whatever the sign of the torque. Such cases are looked at
 * every `FREE_STEP` of any joint.
 */
import { angleAt, type DutyPart, motionAt, type PathMotion, turnsIn } from '../capacity/duty/index.ts';
import { type Chain, type ChainCase, WRENCH } from '../mechanics/chain.ts';
import { anyTorque, type CheckForm, checkValue } from '../mechanics/form.ts';
import { freeScratch, hasFree, newFreeWorst, worstOverFree } from '../mechanics/freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../mechanics/freeLoadsPose.ts';
import { dynamicLoads, poseScratch } from '../mechanics/newtonEuler.ts';

const DEGREE = Math.PI / 180;
/** Largest turn of a joint between samples, rad: the error of the mean is then some 1e-4 of the load's swing. */
const STEP = 3 * DEGREE;
const FREE_STEP = 0.5 * DEGREE;
/** Most samples between two poses of a path. */
const MOST_BETWEEN = 256;
/** How far outside its travel counts as rounding, rad. */
const EDGE = 1e-6;

/** One pass. Arrays over joints are [n], over parts [parts]. */
export interface PathWear {
  readonly samples: number;
  /** rad swept by each joint, both ways. */
  readonly swept: Float64Array;
  /** Load of each part that, held over what is swept, wears as much, N; NaN where nothing is swept or a load is not a number. */
  readonly load: Float64Array;
  /** Largest load of each part, N, and where: time s, pose [n] rad, joint load [6] in the canonical housing frame. */
  readonly peak: Float64Array;
  readonly peakTime: Float64Array;
  readonly peakPose: Float64Array;
  readonly peakWrench: Float64Array;
  /** rad/s. */
  readonly peakSpeed: Float64Array;
  /** rad/s². */
  readonly peakAccel: Float64Array;
  /** Furthest outside travel between the poses given, rad. */
  readonly outside: Float64Array;
}

function raised(load: number, exponent: number): number {
  if (exponent === 3) return load * load * load;
  return exponent === 1 ? load : load ** exponent;
}

/** Runs a path under a case. `parts`: of this chain's joints. */
export function pathWear(chain: Chain, load: ChainCase, path: PathMotion, parts: readonly DutyPart[]): PathWear {
  const run = new PathRun(chain, load, path, parts);
  for (let k = 0; k + 1 < path.rows; k++) run.piece(k);
  return run.result();
}

class PathRun {
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly path: PathMotion;
  private readonly parts: readonly DutyPart[];
  private readonly free: boolean;
  /** Sizes of each part, in motion without the ranges of the torque. */
  private readonly checks: readonly (readonly CheckForm[])[];
  /** The case with the path's own motion: its tip force stays free, its rates do not. */
  private readonly driven: ChainCase;
  private readonly q: Float64Array;
  private readonly rates: { readonly speed: Float64Array; readonly accel: Float64Array };
  private readonly w: Float64Array;
  private readonly scratch;
  private readonly at;
  private readonly atScratch;
  private readonly found;
  private readonly foundScratch;
  /** Largest of each size of a part. */
  private readonly sizes = new Float64Array(3);
  private readonly shares = new Float64Array(2);
  /** Shares of the piece at hand where each joint turns back. [2n], and how many [n]. */
  private readonly turns: Float64Array;
  private readonly turnCount: Int32Array;
  /** Angle of each joint at the sample before, and swept since the sample at which loads were taken. */
  private readonly last: Float64Array;
  private readonly since: Float64Array;
  private readonly before: Float64Array;
  private readonly wear: Float64Array;
  private readonly out: PathWear;
  private samples = 0;

  constructor(chain: Chain, load: ChainCase, path: PathMotion, parts: readonly DutyPart[]) {
    const { n } = chain;
    const flat = (size: number) => new Float64Array(size);
    this.chain = chain;
    this.load = load;
    this.path = path;
    this.parts = parts;
    this.free = hasFree(load);
    this.checks = parts.map(({ sizes }) => (load.speed ? sizes.map(anyTorque) : sizes));
    this.driven = { ...load, speed: null, accel: null };
    this.q = flat(n);
    this.rates = { speed: flat(n), accel: flat(n) };
    this.w = flat(WRENCH * n);
    this.scratch = poseScratch(n);
    this.at = newPoseLoad(n);
    this.atScratch = poseLoadScratch(n);
    this.found = newFreeWorst(n);
    this.foundScratch = freeScratch(n);
    this.turns = flat(2 * n);
    this.turnCount = new Int32Array(n);
    this.last = flat(n);
    this.since = flat(n);
    this.before = flat(parts.length);
    this.wear = flat(parts.length);
    this.out = {
      samples: 0,
      swept: flat(n),
      load: flat(parts.length),
      peak: flat(parts.length).fill(Number.NEGATIVE_INFINITY),
      peakTime: flat(parts.length),
      peakPose: flat(n * parts.length),
      peakWrench: flat(WRENCH * parts.length),
      peakSpeed: flat(n),
      peakAccel: flat(n),
      outside: flat(n),
    };
    motionAt(path, 0, 0, this.q, this.rates.speed, this.rates.accel);
    this.last.set(this.q);
    this.take(path.time[0]!, true);
  }

  /** From one pose given to the next. */
  piece(k: number): void {
    const { path, q, rates, since, last, out } = this;
    const { n } = path;
    const count = this.samplesIn(k);
    const h = path.time[k + 1]! - path.time[k]!;
    for (let s = 1; s <= count; s++) {
      motionAt(path, k, s / count, q, rates.speed, rates.accel);
      for (let j = 0; j < n; j++) {
        const swept =
          this.turnCount[j] === 0 ? Math.abs(q[j]! - last[j]!) : this.around(k, j, (s - 1) / count, s / count);
        since[j]! += swept;
        out.swept[j]! += swept;
        last[j] = q[j]!;
      }
      const end = s === count && k + 2 === path.rows;
      if (!this.free || end || this.moved()) this.take(path.time[k]! + (h * s) / count, false);
    }
  }

  private moved(): boolean {
    for (let j = 0; j < this.chain.n; j++) if (this.since[j]! >= FREE_STEP) return true;
    return false;
  }

  /** How many samples piece k needs; leaves where its joints turn back. */
  private samplesIn(k: number): number {
    const { path, turns, turnCount, shares } = this;
    const { n, pose } = path;
    let most = 0;
    for (let j = 0; j < n; j++) {
      const count = turnsIn(path, k, j, shares);
      turnCount[j] = count;
      for (let c = 0; c < count; c++) turns[2 * j + c] = shares[c]!;
      const swept = count === 0 ? Math.abs(pose[(k + 1) * n + j]! - pose[k * n + j]!) : this.around(k, j, 0, 1);
      if (swept > most) most = swept;
    }
    return Math.min(MOST_BETWEEN, Math.max(1, Math.ceil(most / (this.free ? FREE_STEP : STEP))));
  }

  /** Swept by joint j over a part of piece k in which it may turn back. */
  private around(k: number, j: number, from: number, to: number): number {
    const { turns, turnCount } = this;
    let at = angleOf(this.path, k, from, j);
    let swept = 0;
    for (let c = 0; c < turnCount[j]!; c++) {
      const share = turns[2 * j + c]!;
      if (!(share > from && share < to)) continue;
      const next = angleOf(this.path, k, share, j);
      swept += Math.abs(next - at);
      at = next;
    }
    return swept + Math.abs(angleOf(this.path, k, to, j) - at);
  }

  /** Takes the loads at the present state and counts what was swept since the last ones. */
  private take(time: number, first: boolean): void {
    const { chain, driven, q, rates, w, out, parts, since, before, wear } = this;
    this.samples++;
    dynamicLoads(chain, driven, q, rates, w, this.scratch);
    if (this.free) this.setParts();
    for (let j = 0; j < chain.n; j++) {
      const speed = Math.abs(rates.speed[j]!);
      const accel = Math.abs(rates.accel[j]!);
      if (speed > out.peakSpeed[j]!) out.peakSpeed[j] = speed;
      if (accel > out.peakAccel[j]!) out.peakAccel[j] = accel;
      if (chain.full[j] === 1) continue;
      const beyond = Math.max(chain.from[j]! - q[j]!, q[j]! - chain.to[j]!);
      if (beyond > EDGE && beyond > out.outside[j]!) out.outside[j] = beyond;
    }
    for (let b = 0; b < parts.length; b++) {
      const part = parts[b]!;
      const at = WRENCH * part.joint;
      const P = this.free ? this.freely(b) : part.at(w, at);
      // A load that is not a number stays one.
      if (!(P <= out.peak[b]!)) {
        out.peak[b] = P;
        out.peakTime[b] = time;
        for (let j = 0; j < chain.n; j++) out.peakPose[chain.n * b + j] = q[j]!;
        for (let c = 0; c < WRENCH; c++) out.peakWrench[WRENCH * b + c] = w[at + c]!;
      }
      const now = raised(P, part.exponent);
      const swept = since[part.joint]!;
      if (!first && swept > 0) wear[b]! += (swept * (before[b]! + now)) / 2;
      before[b] = now;
    }
    since.fill(0);
  }

  /** The parts of the load at the present pose: what the case leaves free, or the path's own motion with a free tip force. */
  private setParts(): void {
    poseLoad(this.chain, this.load, this.q, this.at, this.atScratch);
  }

  /** A load that nothing exceeds which the case or the path can put on a part here. */
  private freely(b: number): number {
    const part = this.parts[b]!;
    const checks = this.checks[b]!;
    const { at, load, driven, found, foundScratch, sizes, w } = this;
    const o = WRENCH * part.joint;
    for (let s = 0; s < checks.length; s++) {
      const check = checks[s]!;
      let most = load.speed ? worstOverFree(check, load, at, found, foundScratch) : Number.NEGATIVE_INFINITY;
      let along: number;
      if (load.force === 'any') {
        // The fixed part is swapped for the one with the path's rates and put back: other parts still need it.
        for (let c = 0; c < WRENCH; c++) {
          const still = at.fixed[o + c]!;
          at.fixed[o + c] = w[o + c]!;
          w[o + c] = still;
        }
        along = worstOverFree(check, driven, at, found, foundScratch);
        for (let c = 0; c < WRENCH; c++) {
          const moving = at.fixed[o + c]!;
          at.fixed[o + c] = w[o + c]!;
          w[o + c] = moving;
        }
      } else along = checkValue(check, w, o);
      if (!(along <= most)) most = along;
      sizes[s] = most;
    }
    return part.fromSizes(sizes, 0);
  }

  result(): PathWear {
    const { out, parts, wear } = this;
    for (let b = 0; b < parts.length; b++) {
      const { joint, exponent } = parts[b]!;
      const swept = out.swept[joint]!;
      out.load[b] = swept > 0 ? (wear[b]! / swept) ** (1 / exponent) : Number.NaN;
    }
    return { ...out, samples: this.samples };
  }
}

function angleOf(path: PathMotion, k: number, share: number, j: number): number {
  const { n, pose } = path;
  // Exactly the poses given at the ends.
  if (share === 0) return pose[k * n + j]!;
  if (share === 1) return pose[(k + 1) * n + j]!;
  return angleAt(path, k, share, j);
}
