/**
 * Climbs from a pose to a local worst of one check within the travel, for every kind of load.
 *
 * With the free parts of the case and the winning linear function of the load held, the value along one joint is a trigonometric
 * polynomial: of first degree for weights and tip forces, of second degree in motion (five factors turn with the joint or do not, so
 * at most two of them count). A few samples give it exactly, and so its best angle; the check is at least that linear
 * function, so no step loses. Joint by joint it comes near, Newton's method on the joints that are off their stops finishes. Slopes are
 * those of the polynomials (envelope theorem: the held parts are the best at the pose), curvatures differences of slopes.
 */
import type { Flat, Numbers } from '../math/vector.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import { type CheckForm, formHolds, formValue } from './form.ts';
import { type FreePart, freePart, freeScratch, newFreeWorst, worstOverFree } from './freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';
import { dynamicLoads, poseScratch, staticLoads } from './newtonEuler.ts';

/** Rounds over the joints, and the gain below which they end. */
const ROUNDS = 60;
const GAIN = 1e-7;
const NEWTON_STEPS = 8;
/** Step of the difference of slopes, rad. */
const STEP = 1e-4;

export interface Polished {
  readonly value: number;
  readonly pose: Float64Array;
  readonly free: FreePart | null;
  /** Joint load with the free parts as chosen, canonical housing frame. [6] */
  readonly wrench: Float64Array;
}

/** Climbs from `start` [n] rad (within travel); deterministic. `value` is NaN where the load is not finite. */
export function polish(chain: Chain, load: ChainCase, check: CheckForm, start: Numbers): Polished {
  const climber = new Polish(chain, load, check);
  const pose = Float64Array.from(start);
  const value = climber.climb(pose);
  return { value, pose, free: freePart(load, climber.worst), wrench: Float64Array.from(climber.worst.wrench) };
}

export class Polish {
  /** The worst over the free parts at the pose last assessed. */
  readonly worst;
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly check: CheckForm;
  private readonly at;
  private readonly scratch;
  private readonly free;
  private readonly plain;
  private readonly loads: Flat;
  private readonly line: Flat;
  private readonly trial: Flat;
  private readonly slope: Flat;
  private readonly shifted: Flat;
  private readonly bend: Flat;
  private readonly move: Flat;
  private readonly held;
  /** a0, then a, b of each degree of the polynomial along one joint. */
  private readonly wave = new Float64Array(5);

  constructor(chain: Chain, load: ChainCase, check: CheckForm) {
    const { n } = chain;
    const flat = (size: number) => new Float64Array(size);
    this.chain = chain;
    this.load = load;
    this.check = check;
    this.worst = newFreeWorst(n);
    this.held = newFreeWorst(n);
    this.at = newPoseLoad(n);
    this.scratch = poseLoadScratch(n);
    this.free = freeScratch(n);
    this.plain = poseScratch(n);
    this.loads = flat(WRENCH * n);
    this.line = flat(WRENCH);
    this.trial = flat(n);
    this.slope = flat(n);
    this.shifted = flat(n);
    this.bend = flat(n * n);
    this.move = flat(n);
  }

  /** Value of the check at `pose`, the worst over what is free; leaves the choice in `worst`. */
  value(pose: Numbers): number {
    poseLoad(this.chain, this.load, pose, this.at, this.scratch);
    return worstOverFree(this.check, this.load, this.at, this.worst, this.free);
  }

  /** Improves `pose` in place; returns its value. */
  climb(pose: Flat): number {
    this.bringInside(pose);
    let value = this.rounds(pose, this.value(pose));
    for (let step = 0; step < NEWTON_STEPS; step++) {
      const next = this.newton(pose, value);
      if (!(next > value)) break;
      const done = !(next - value > 1e-15 * Math.abs(next));
      value = next;
      if (done) break;
    }
    return this.value(pose);
  }

  /** Full turns into the interval of travel, the rest onto their stops. */
  private bringInside(pose: Flat): void {
    const { from, to, full, n } = this.chain;
    for (let k = 0; k < n; k++) {
      const turn = 2 * Math.PI;
      if (full[k]) pose[k]! -= turn * Math.floor((pose[k]! - from[k]!) / turn);
      pose[k] = Math.min(to[k]!, Math.max(from[k]!, pose[k]!));
    }
  }

  private rounds(pose: Flat, start: number): number {
    const { chain } = this;
    let value = start;
    for (let round = 0; round < ROUNDS; round++) {
      const before = value;
      for (let k = 0; k < chain.n; k++) {
        if (chain.from[k] === chain.to[k]) continue;
        const old = pose[k]!;
        this.hold();
        this.sample(pose, k);
        pose[k] = this.bestOf(chain.from[k]!, chain.to[k]!, old);
        const next = pose[k] === old ? value : this.value(pose);
        if (next > value) value = next;
        else if (pose[k] !== old) {
          pose[k] = old;
          this.value(pose);
        }
      }
      if (!(value - before > GAIN * Math.abs(value))) break;
    }
    return value;
  }

  /** Keeps the free parts and the winning linear function of the pose last assessed. */
  private hold(): void {
    const { worst, held, line } = this;
    held.tipForce.set(worst.tipForce);
    held.speed.set(worst.speed);
    held.accel.set(worst.accel);
    const w = worst.wrench;
    let most = Number.NEGATIVE_INFINITY;
    for (const f of this.check.forms) {
      if (!formHolds(f, w, 0)) continue;
      const value = formValue(f, w, 0);
      if (!(value > most)) continue;
      most = value;
      line.set(f.l);
      const y = Array.from(f.c, (c, r) => {
        let sum = c;
        for (let k = 0; k < WRENCH; k++) sum += f.P[WRENCH * r + k]! * w[k]!;
        return sum;
      });
      const size = Math.hypot(...y);
      if (!(size > 0)) continue;
      for (let r = 0; r < f.rows; r++) {
        for (let k = 0; k < WRENCH; k++) line[k]! += (y[r]! / size) * f.P[WRENCH * r + k]!;
      }
    }
  }

  /** The held linear function at a pose with the held free parts. */
  private along(pose: Numbers): number {
    const { chain, load, loads, held, line } = this;
    const tip = load.force === 'any' ? held.tipForce : null;
    if (load.speed) dynamicLoads(chain, load, pose, held, loads, this.plain, tip);
    else staticLoads(chain, load, pose, loads, this.plain, tip);
    const at = WRENCH * this.check.joint;
    let sum = 0;
    for (let k = 0; k < WRENCH; k++) sum += line[k]! * loads[at + k]!;
    return sum;
  }

  /** The polynomial along joint k through the held parts: from three or five evenly spaced angles. */
  private sample(pose: Flat, k: number): void {
    const { wave } = this;
    const old = pose[k]!;
    const count = this.load.speed ? 5 : 3;
    wave.fill(0);
    for (let m = 0; m < count; m++) {
      const angle = (2 * Math.PI * m) / count;
      pose[k] = angle;
      const value = this.along(pose);
      wave[0]! += value / count;
      for (let d = 1; 2 * d < count; d++) {
        wave[2 * d - 1]! += (2 / count) * value * Math.cos(d * angle);
        wave[2 * d]! += (2 / count) * value * Math.sin(d * angle);
      }
    }
    pose[k] = old;
  }

  private wavePart(q: number, derivative: boolean): number {
    const { wave } = this;
    const [c, s, c2, s2] = [Math.cos(q), Math.sin(q), Math.cos(2 * q), Math.sin(2 * q)];
    if (derivative) return wave[2]! * c - wave[1]! * s + 2 * (wave[4]! * c2 - wave[3]! * s2);
    return wave[1]! * c + wave[2]! * s + wave[3]! * c2 + wave[4]! * s2;
  }

  /** Best angle of the polynomial within an interval; `old` where nothing is better. */
  private bestOf(from: number, to: number, old: number): number {
    const { wave } = this;
    let best = old;
    let most = this.wavePart(old, false);
    const offer = (q: number) => {
      const value = this.wavePart(q, false);
      if (!(value > most)) return;
      best = q;
      most = value;
    };
    offer(from);
    offer(to);
    if (!this.load.speed) {
      offer(this.inside(Math.atan2(wave[2]!, wave[1]!), from, to));
      return best;
    }
    // Two maxima at most: bracket every fall of the slope among 16 samples, then halve
    const count = 16;
    for (let m = 0; m < count; m++) {
      let low = (2 * Math.PI * m) / count;
      let high = (2 * Math.PI * (m + 1)) / count;
      if (!(this.wavePart(low, true) > 0 && this.wavePart(high, true) <= 0)) continue;
      for (let step = 0; step < 50; step++) {
        const middle = (low + high) / 2;
        if (this.wavePart(middle, true) > 0) low = middle;
        else high = middle;
      }
      offer(this.inside(low, from, to));
    }
    return best;
  }

  /** An angle turned into the interval; its nearer end where it does not lie within. */
  private inside(angle: number, from: number, to: number): number {
    const turn = 2 * Math.PI;
    const turned = angle + turn * Math.ceil((from - angle) / turn);
    if (turned <= to) return Math.max(turned, from);
    return turned - to < from - (turned - turn) ? to : from;
  }

  /** Slopes of the check by every joint at `pose`, which must be the pose last assessed. */
  private slopes(pose: Flat, out: Flat): void {
    this.hold();
    for (let k = 0; k < this.chain.n; k++) {
      this.sample(pose, k);
      out[k] = this.wavePart(pose[k]!, true);
    }
  }

  /** One step of Newton's method on the joints off their stops, halved until it gains; returns the best value met. */
  private newton(pose: Flat, value: number): number {
    const { chain, slope, shifted, bend, move, trial } = this;
    const { n, from, to, full } = chain;
    this.slopes(pose, slope);
    const loose: number[] = [];
    for (let k = 0; k < n; k++) {
      if (from[k] === to[k]) continue;
      const held = !full[k] && ((pose[k] === from[k] && slope[k]! <= 0) || (pose[k] === to[k] && slope[k]! >= 0));
      if (!held) loose.push(k);
    }
    for (const j of loose) {
      const old = pose[j]!;
      pose[j] = old + STEP;
      this.value(pose);
      this.slopes(pose, shifted);
      pose[j] = old;
      for (const k of loose) bend[n * j + k] = (slope[k]! - shifted[k]!) / STEP;
    }
    let best = value;
    if (solveStep(n, loose, bend, slope, move)) {
      for (let half = 0; half < 6 && best === value; half++) {
        trial.set(pose);
        for (const k of loose) trial[k]! += move[k]! / 2 ** half;
        this.bringInside(trial);
        const next = this.value(trial);
        if (next > best) {
          best = next;
          pose.set(trial);
        }
      }
    }
    this.value(pose);
    return best;
  }
}

/** Solves bend·move = slope over the listed rows, bend made symmetric and positive by a growing diagonal. False where it cannot be. */
function solveStep(n: number, rows: readonly number[], bend: Flat, slope: Flat, move: Flat): boolean {
  const m = rows.length;
  let largest = 0;
  for (const j of rows) for (const k of rows) largest = Math.max(largest, Math.abs(bend[n * j + k]!));
  if (!(largest > 0) || !Number.isFinite(largest)) return false;
  for (let lift = 1e-12 * largest; lift < 10 * largest; lift *= 30) {
    const L = new Float64Array(m * m);
    let sound = true;
    for (let r = 0; r < m && sound; r++) {
      for (let c = 0; c <= r; c++) {
        const [j, k] = [rows[r]!, rows[c]!];
        let sum = (bend[n * j + k]! + bend[n * k + j]!) / 2 + (r === c ? lift : 0);
        for (let s = 0; s < c; s++) sum -= L[m * r + s]! * L[m * c + s]!;
        if (r === c) {
          sound = sum > 1e-13 * largest;
          L[m * r + r] = Math.sqrt(sum);
        } else L[m * r + c] = sum / L[m * c + c]!;
      }
    }
    if (!sound) continue;
    const y = new Float64Array(m);
    for (let r = 0; r < m; r++) {
      let sum = slope[rows[r]!]!;
      for (let s = 0; s < r; s++) sum -= L[m * r + s]! * y[s]!;
      y[r] = sum / L[m * r + r]!;
    }
    for (let r = m - 1; r >= 0; r--) {
      let sum = y[r]!;
      for (let s = r + 1; s < m; s++) sum -= L[m * s + r]! * move[rows[s]!]!;
      move[rows[r]!] = sum / L[m * r + r]!;
    }
    return true;
  }
  return false;
}
