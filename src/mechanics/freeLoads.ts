/**
 * The worst of a check over what a case leaves free at a pose, with the choice that attains it, and a bound on it. See `sweepRule`
 * for the rules in words.
 *
 * A form is the maximum over unit vectors e of its support along e (`freeLoadsForm.ts`), so: one row has two e; two rows have a
 * circle, three a sphere of them. From every e the best free parts are taken, then e turns to where they point: this never falls.
 */
import type { Vec3 } from '../arm/arm.ts';
import { type Flat, type Numbers, rotate3 } from '../math/vector.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import { type CheckForm, checkValue, type Form } from './form.ts';
import { directionBound } from './freeLoadsBound.ts';
import {
  LIN,
  looseBound,
  newReducedForm,
  PART,
  pick,
  pickedValue,
  type ReducedForm,
  reduceForm,
} from './freeLoadsForm.ts';
import { newPoseLoad, type PoseLoad, pairCount, pairIndex, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';

/** How the free parts of a case are taken at a pose, in words for the reader. */
export const sweepRule =
  'A tip force of direction "any" points where it loads the check most: solved at every pose. Accelerations take the signs that ' +
  'load the check most: every combination that can be worst is tried. Speeds start from each joint at its limit, the others join ' +
  'where they add most, and each then takes its exact best, zero included: the value is one the arm can reach, and the bound ' +
  'of the worst-pose search covers every other choice of speeds.';

/** The worst over the free parts at one pose. */
export interface FreeWorst {
  value: number;
  /** Unit vector of a tip force of direction `any`, base frame. [3] */
  readonly tipForce: Flat;
  /** rad/s and rad/s². [n] */
  readonly speed: Flat;
  readonly accel: Flat;
  /** Joint load with this choice, canonical housing frame. [6] */
  readonly wrench: Flat;
}

export function newFreeWorst(n: number): FreeWorst {
  const flat = (size: number) => new Float64Array(size);
  return { value: Number.NaN, tipForce: flat(3), speed: flat(n), accel: flat(n), wrench: flat(WRENCH) };
}

/** Scratch of `worstOverFree` and `boundOverFree`, one a thread. */
export interface FreeScratch {
  readonly form: ReducedForm;
  readonly trial: FreeWorst;
  readonly e: Flat;
  readonly samples: Flat;
  readonly cuts: Flat;
}

export function freeScratch(n: number): FreeScratch {
  const flat = (size: number) => new Float64Array(size);
  return { form: newReducedForm(n), trial: newFreeWorst(n), e: flat(3), samples: flat(SAMPLES), cuts: flat(2 * n) };
}

const SAMPLES = 24;
/** Directions to the faces, edges and corners of a cube. */
const CUBE: readonly Numbers[] = [-1, 0, 1].flatMap((x) =>
  [-1, 0, 1].flatMap((y) =>
    [-1, 0, 1].flatMap((z) => (x || y || z ? [[x, y, z].map((c) => c / Math.hypot(x, y, z))] : [])),
  ),
);

/** Whether a case leaves anything free at a pose. */
export function hasFree(load: ChainCase): boolean {
  return load.force === 'any' || load.speed !== null;
}

/**
 * Maximum of `check` over the free parts of the case at the pose of `at` (filled by `poseLoad`); the choice and the joint load go to
 * `out`. The value is attained: `dynamicLoads` (or `staticLoads`) with the choice gives it. NaN where the load is not finite. A value
 * below `floor` need not be the maximum.
 */
export function worstOverFree(
  check: CheckForm,
  load: ChainCase,
  at: PoseLoad,
  out: FreeWorst,
  scratch: FreeScratch,
  floor = Number.NEGATIVE_INFINITY,
): number {
  const i = check.joint;
  out.tipForce.fill(0);
  out.speed.fill(0);
  out.accel.fill(0);
  for (let k = 0; k < WRENCH; k++) out.wrench[k] = at.fixed[WRENCH * i + k]!;
  out.value = Number.NaN;
  if (!hasFree(load)) {
    out.value = checkValue(check, out.wrench, 0);
    return out.value;
  }
  for (const f of check.forms) {
    reduceForm(scratch.form, f, i, load, at, 0, 0);
    // an earlier form gives more than this one can
    if (looseBound(scratch.form) < out.value) continue;
    maximise(check, load, at, out, scratch);
    if (Number.isNaN(out.value)) return out.value;
    if (f.torqueFrom > Number.NEGATIVE_INFINITY) holdTorque(check, f, load, at, out, scratch, 1, f.torqueFrom, floor);
    if (f.torqueTo < Number.POSITIVE_INFINITY) holdTorque(check, f, load, at, out, scratch, -1, f.torqueTo, floor);
  }
  return out.value;
}

/** `worstOverFree` at one pose [n] rad, for callers that ask once: allocates what it needs. */
export function worstAtPose(chain: Chain, load: ChainCase, pose: Numbers, check: CheckForm): FreeWorst {
  const at = newPoseLoad(chain.n);
  const out = newFreeWorst(chain.n);
  poseLoad(chain, load, pose, at, poseLoadScratch(chain.n));
  worstOverFree(check, load, at, out, freeScratch(chain.n));
  return out;
}

/** A choice as plain data; null parts are not free in the case. */
export interface FreePart {
  readonly tipForce: Vec3 | null;
  readonly speed: readonly number[] | null;
  readonly accel: readonly number[] | null;
}

/** The choice as plain data; null where the case leaves nothing free. */
export function freePart(load: ChainCase, worst: FreeWorst): FreePart | null {
  if (!hasFree(load)) return null;
  const [x, y, z] = [worst.tipForce[0]!, worst.tipForce[1]!, worst.tipForce[2]!];
  return {
    tipForce: load.force === 'any' ? [x, y, z] : null,
    speed: load.speed ? [...worst.speed] : null,
    accel: load.speed ? [...worst.accel] : null,
  };
}

/**
 * Where the best of a form lies beyond one end of its torque range, the best within may lie at the end: weigh the torque so
 * (by bisection on the weight) that the best comes to the end, and try what stands on both sides of it. With any weight the best is at
 * least that within the range: done where it is no more than what is found, or below `floor`.
 */
function holdTorque(
  check: CheckForm,
  f: Form,
  load: ChainCase,
  at: PoseLoad,
  out: FreeWorst,
  scratch: FreeScratch,
  side: 1 | -1,
  limit: number,
  floor: number,
): void {
  const { trial, form } = scratch;
  let most = Number.POSITIVE_INFINITY;
  const short = (weight: number) => {
    reduceForm(form, f, check.joint, load, at, side * weight, limit);
    most = Math.min(most, maximise(check, load, at, out, scratch));
    return side * (trial.wrench[5]! - limit) < 0;
  };
  const open = () => most > out.value && most >= floor;
  if (!short(0)) return;
  let low = 0;
  let high = 1;
  for (let k = 0; k < 40 && open() && short(high); k++) {
    low = high;
    high *= 4;
  }
  for (let k = 0; k < 50 && high - low > 1e-15 * high && open(); k++) {
    const middle = (low + high) / 2;
    if (short(middle)) low = middle;
    else high = middle;
  }
}

/** Best of the reduced form from every start, returned; keeps in `out` the best value of the whole check met on the way. */
function maximise(check: CheckForm, load: ChainCase, at: PoseLoad, out: FreeWorst, scratch: FreeScratch): number {
  const { form: p, e } = scratch;
  scratch.trial.value = Number.NaN;
  let best = Number.NEGATIVE_INFINITY;
  const from = () => {
    const value = climb(p, e);
    if (value <= best) return;
    best = value;
    keep(check, load, at, out, scratch);
  };
  e.fill(0);
  if (p.rows === 1) {
    for (const sign of [1, -1]) {
      e[0] = sign;
      from();
    }
  } else if (p.rows === 2) startsOnCircle(scratch, from);
  else startsOnSphere(scratch, from);
  return best;
}

/** Local maxima of a ring of samples, and one direction of every arc on which the signs of the accelerations stay. */
function startsOnCircle(scratch: FreeScratch, from: () => void): void {
  const { form: p, e, samples, cuts } = scratch;
  if (!p.hasMotion && turnToBest(p, e)) {
    from();
    return;
  }
  for (let k = 0; k < SAMPLES; k++) {
    turn(e, (2 * Math.PI * k) / SAMPLES);
    pick(p, e);
    samples[k] = e[0]! * p.y[0]! + e[1]! * p.y[1]! + p.y[LIN]!;
  }
  for (let k = 0; k < SAMPLES; k++) {
    const here = samples[k]!;
    if (here < samples[(k + 1) % SAMPLES]! || here < samples[(k + SAMPLES - 1) % SAMPLES]!) continue;
    turn(e, (2 * Math.PI * k) / SAMPLES);
    from();
  }
  if (!p.hasMotion) return;
  let count = 0;
  for (let j = 0; j < p.n; j++) {
    const x = p.accel[PART * j]!;
    const y = p.accel[PART * j + 1]!;
    const size = Math.hypot(x, y);
    const ratio = -p.accel[PART * j + LIN]! / size;
    if (!(Math.abs(ratio) <= 1)) continue;
    const middle = Math.atan2(y, x);
    cuts[count++] = wrap(middle + Math.acos(ratio));
    cuts[count++] = wrap(middle - Math.acos(ratio));
  }
  const sorted = cuts.subarray(0, count).sort();
  for (let k = 0; k < count; k++) {
    const next = k + 1 < count ? sorted[k + 1]! : sorted[0]! + 2 * Math.PI;
    turn(e, (sorted[k]! + next) / 2);
    from();
  }
}

/**
 * A tip force alone, with no linear part: in the principal axes of G = Σ tip tipᵀ the value y·e + √(eᵀ G e) is even in both
 * components of e apart from y·e, so the best e has the signs of y. There, with λ1 ≥ λ2, its slope over (sin cos) is
 * y2/sin - y1/cos - (λ1 - λ2)/√(eᵀ G e), which only falls: one zero, by bisection. False where the form has a linear part.
 */
function turnToBest(p: ReducedForm, e: Flat): boolean {
  const { tip, fixed } = p;
  if (tip[9] !== 0 || tip[10] !== 0 || tip[11] !== 0) return false;
  let [xx, yy, xy] = [0, 0, 0];
  for (let k = 0; k < 3; k++) {
    xx += tip[k]! * tip[k]!;
    yy += tip[3 + k]! * tip[3 + k]!;
    xy += tip[k]! * tip[3 + k]!;
  }
  const axis = Math.atan2(2 * xy, xx - yy) / 2;
  const ax = Math.cos(axis);
  const ay = Math.sin(axis);
  const major = ax * ax * xx + ay * ay * yy + 2 * ax * ay * xy;
  const minor = Math.max(0, xx + yy - major);
  const y1 = ax * fixed[0]! + ay * fixed[1]!;
  const y2 = ax * fixed[1]! - ay * fixed[0]!;
  let low = 0;
  let high = Math.PI / 2;
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    if (middle === low || middle === high) break;
    const c = Math.cos(middle);
    const s = Math.sin(middle);
    const root = Math.sqrt(major * c * c + minor * s * s);
    if ((Math.abs(y2) * c - Math.abs(y1) * s) * root > (major - minor) * s * c) low = middle;
    else high = middle;
  }
  const along = Math.cos(low) * (y1 < 0 ? -1 : 1);
  const across = Math.sin(low) * (y2 < 0 ? -1 : 1);
  e[0] = ax * along - ay * across;
  e[1] = ay * along + ax * across;
  e[2] = 0;
  return true;
}

function turn(e: Flat, angle: number): void {
  e[0] = Math.cos(angle);
  e[1] = Math.sin(angle);
  e[2] = 0;
}

function wrap(angle: number): number {
  return angle - 2 * Math.PI * Math.floor(angle / (2 * Math.PI));
}

/**
 * The 26 directions of a cube and, so that no cell of signs of the accelerations is missed, every point where two of them change
 * sign, moved a little to each of its four sides; cells without such a corner hold an extreme point of one change, moved to its two.
 */
function startsOnSphere(scratch: FreeScratch, from: () => void): void {
  const { form: p, e } = scratch;
  for (const start of CUBE) {
    for (let k = 0; k < 3; k++) e[k] = start[k]!;
    from();
  }
  if (!p.hasMotion) return;
  for (let j = 0; j < p.n; j++) {
    cellsBeside(p, e, j, from);
    for (let k = j + 1; k < p.n; k++) cellsAround(p, e, j, k, from);
  }
}

const NUDGE = 1e-7;

/** Both sides of the change of sign of a_j, at its points nearest to and farthest from the x axis. */
function cellsBeside(p: ReducedForm, e: Flat, j: number, from: () => void): void {
  const at = PART * j;
  const size = Math.hypot(p.accel[at]!, p.accel[at + 1]!, p.accel[at + 2]!);
  const height = -p.accel[at + LIN]! / size;
  if (!(Math.abs(height) < 1)) return;
  const [x, y, z] = [p.accel[at]! / size, p.accel[at + 1]! / size, p.accel[at + 2]! / size];
  const across = Math.hypot(y, z);
  const d = across > 1e-9 ? [across, (-x * y) / across, (-x * z) / across] : [0, 1, 0];
  for (const turned of [-1, 1]) {
    for (const side of [-1, 1]) {
      const h = height + side * NUDGE;
      const w = turned * Math.sqrt(Math.max(0, 1 - h * h));
      e[0] = h * x + w * d[0]!;
      e[1] = h * y + w * d[1]!;
      e[2] = h * z + w * d[2]!;
      from();
    }
  }
}

/** The four sides of each point where both a_j and a_k change sign. */
function cellsAround(p: ReducedForm, e: Flat, j: number, k: number, from: () => void): void {
  const A = p.accel.subarray(PART * j, PART * j + PART);
  const B = p.accel.subarray(PART * k, PART * k + PART);
  const aa = A[0]! ** 2 + A[1]! ** 2 + A[2]! ** 2;
  const bb = B[0]! ** 2 + B[1]! ** 2 + B[2]! ** 2;
  const ab = A[0]! * B[0]! + A[1]! * B[1]! + A[2]! * B[2]!;
  const det = aa * bb - ab * ab;
  if (!(det > 1e-14 * aa * bb)) return;
  const c = [A[1]! * B[2]! - A[2]! * B[1]!, A[2]! * B[0]! - A[0]! * B[2]!, A[0]! * B[1]! - A[1]! * B[0]!];
  for (const sideA of [-1, 1]) {
    for (const sideB of [-1, 1]) {
      const ra = -A[LIN]! + sideA * NUDGE * Math.sqrt(aa);
      const rb = -B[LIN]! + sideB * NUDGE * Math.sqrt(bb);
      const s = (ra * bb - rb * ab) / det;
      const t = (rb * aa - ra * ab) / det;
      const left = 1 - (s * s * aa + t * t * bb + 2 * s * t * ab);
      if (!(left >= 0)) continue;
      for (const turned of [-1, 1]) {
        const w = turned * Math.sqrt(left / det);
        for (let r = 0; r < 3; r++) e[r] = s * A[r]! + t * B[r]! + w * c[r]!;
        from();
      }
    }
  }
}

/** Ascent from e; leaves the picked parts in p and returns their value. */
function climb(p: ReducedForm, e: Flat): number {
  pick(p, e);
  let value = pickedValue(p);
  if (p.rows === 1) return value;
  for (let step = 0; step < 400; step++) {
    const size = Math.sqrt(p.y[0]! ** 2 + p.y[1]! ** 2 + p.y[2]! ** 2);
    if (!(size > 0)) return value;
    // on a circle the turn stays near where it is: the way along y may leave the maximum that a sample found
    if (p.rows === 2 && p.hasTip && newton(p, e)) step += 20;
    else for (let k = 0; k < 3; k++) e[k] = p.y[k]! / size;
    pick(p, e);
    const next = pickedValue(p);
    if (!(next > value + 1e-15 * Math.abs(value))) return Math.max(next, value);
    value = next;
  }
  return value;
}

/**
 * With accelerations and speeds held, turns e (two rows) to the local maximum of Y·e + ‖N(e)‖ by Newton's method, uphill where the
 * function is hollow. False where N vanishes on the way.
 */
function newton(p: ReducedForm, e: Flat): boolean {
  const { tip } = p;
  // Y: the rows without the tip force
  let yx = p.y[0]!;
  let yy = p.y[1]!;
  for (let k = 0; k < 3; k++) {
    yx -= tip[k]! * p.v[k]!;
    yy -= tip[3 + k]! * p.v[k]!;
  }
  let angle = Math.atan2(e[1]!, e[0]!);
  for (let step = 0; step < 30; step++) {
    const c = Math.cos(angle);
    const s = Math.sin(angle);
    let nn = 0;
    let nd = 0;
    let dd = 0;
    let nl = 0;
    for (let k = 0; k < 3; k++) {
      const N = c * tip[k]! + s * tip[3 + k]! + tip[9 + k]!;
      const D = c * tip[3 + k]! - s * tip[k]!;
      nn += N * N;
      nd += N * D;
      dd += D * D;
      nl += N * (N - tip[9 + k]!);
    }
    const size = Math.sqrt(nn);
    if (!(size > 0)) return false;
    const slope = c * yy - s * yx + nd / size;
    const bend = -(c * yx + s * yy) + (dd - nl - (nd / size) ** 2) / size;
    const move = bend < 0 ? Math.max(-0.2, Math.min(0.2, -slope / bend)) : 0.1 * Math.sign(slope);
    angle += move;
    if (Math.abs(move) < 1e-15) break;
  }
  turn(e, angle);
  return true;
}

/** Turns the picked parts into a choice and its joint load (`trial`), and keeps it in `out` where the whole check is worst yet. */
function keep(check: CheckForm, load: ChainCase, at: PoseLoad, out: FreeWorst, scratch: FreeScratch): void {
  const { form: p, trial } = scratch;
  const { n } = at;
  const i = check.joint;
  const w = trial.wrench;
  for (let k = 0; k < WRENCH; k++) w[k] = at.fixed[WRENCH * i + k]!;
  if (p.hasTip) {
    const P = load.magnitude;
    const [x, y, z] = [p.v[0]!, p.v[1]!, p.v[2]!];
    const [rx, ry, rz] = [at.reach[3 * i]!, at.reach[3 * i + 1]!, at.reach[3 * i + 2]!];
    w[0]! += P * x;
    w[1]! += P * y;
    w[2]! += P * z;
    w[3]! += P * (ry * z - rz * y);
    w[4]! += P * (rz * x - rx * z);
    w[5]! += P * (rx * y - ry * x);
    rotate3(trial.tipForce, 0, at.frame, 9 * i, p.v, 0);
  }
  if (load.speed && load.accel) {
    for (let j = 0; j < n; j++) {
      trial.accel[j] = p.a[j]! * load.accel[j]!;
      trial.speed[j] = p.s[j]! * load.speed[j]!;
    }
    for (let j = 0; j < n; j++) {
      addScaled(w, at.accel, WRENCH * (n * i + j), trial.accel[j]!);
      if (trial.speed[j] === 0) continue;
      for (let k = j; k < n; k++) {
        const product = trial.speed[j]! * trial.speed[k]!;
        addScaled(w, at.rate, WRENCH * (pairCount(n) * i + pairIndex(n, j, k)), product);
      }
    }
  }
  trial.value = checkValue(check, w, 0);
  if (trial.value <= out.value) return;
  out.value = trial.value;
  out.wrench.set(w);
  out.tipForce.set(trial.tipForce);
  out.speed.set(trial.speed);
  out.accel.set(trial.accel);
}

function addScaled(w: Flat, from: Numbers, at: number, scale: number): void {
  for (let k = 0; k < WRENCH; k++) w[k]! += scale * from[at + k]!;
}

/** The part of a bound that rounding could have taken, relative. */
const OUTWARD = 1 + 1e-12;

/**
 * Bound of `check` over the free parts at the pose of `at`: no choice exceeds it. For one and two rows without speeds it equals the
 * worst (to about 1e-9); speeds count by `Σ max(C_jj, 0) v_j² + Σ |C_jk| v_j v_k` along each e. Infinity where the load is not finite.
 */
export function boundOverFree(check: CheckForm, load: ChainCase, at: PoseLoad, scratch: FreeScratch): number {
  let bound = Number.NEGATIVE_INFINITY;
  for (const f of check.forms) {
    const value = formBound(check, f, load, at, scratch);
    if (!(value <= bound)) bound = value;
  }
  return Number.isFinite(bound) ? bound + (OUTWARD - 1) * Math.abs(bound) : Number.POSITIVE_INFINITY;
}

/** As `boundOverFree` by the triangle inequality alone: cheap, for skipping poses that cannot matter. */
export function looseBoundOverFree(check: CheckForm, load: ChainCase, at: PoseLoad, scratch: FreeScratch): number {
  let bound = Number.NEGATIVE_INFINITY;
  for (const f of check.forms) {
    reduceForm(scratch.form, f, check.joint, load, at, 0, 0);
    const value = looseBound(scratch.form);
    if (!(value <= bound)) bound = value;
  }
  return Number.isFinite(bound) ? bound + (OUTWARD - 1) * Math.abs(bound) : Number.POSITIVE_INFINITY;
}

/**
 * A form that holds from a torque on may have any weight ≥ 0 of (torque - from) added: it stays a bound where the form holds. The
 * least over weights is convex in the weight, so a golden-section search finds it; any weight tried is a bound.
 */
function formBound(check: CheckForm, f: Form, load: ChainCase, at: PoseLoad, scratch: FreeScratch): number {
  const { form: p } = scratch;
  const i = check.joint;
  const weighed = (weight: number, limit: number) => {
    reduceForm(p, f, i, load, at, weight, limit);
    return directionBound(p);
  };
  let best = weighed(0, 0);
  for (const [side, limit] of [
    [1, f.torqueFrom],
    [-1, f.torqueTo],
  ] as const) {
    if (!Number.isFinite(limit)) continue;
    // What the torque can be: no form, no bound.
    const most = torqueReach(i, load, at, side);
    if (side * limit > most + 1e-12 * Math.abs(most)) return Number.NEGATIVE_INFINITY;
    let scale = 0;
    for (const entry of f.P) scale = Math.max(scale, Math.abs(entry));
    let low = 0;
    let high = 4 * scale;
    for (let k = 0; k < 24; k++) {
      const a = low + 0.382 * (high - low);
      const b = low + 0.618 * (high - low);
      const va = weighed(side * a, limit);
      const vb = weighed(side * b, limit);
      best = Math.min(best, va, vb);
      if (va <= vb) high = b;
      else low = a;
    }
  }
  return best;
}

/** The largest of side × torque over the free parts (speeds bounded). */
function torqueReach(i: number, load: ChainCase, at: PoseLoad, side: 1 | -1): number {
  const { n } = at;
  let most = side * at.fixed[WRENCH * i + 5]!;
  if (load.force === 'any') most += load.magnitude * Math.hypot(at.reach[3 * i]!, at.reach[3 * i + 1]!);
  if (!load.speed || !load.accel) return most;
  for (let j = 0; j < n; j++) {
    most += load.accel[j]! * Math.abs(at.accel[WRENCH * (n * i + j) + 5]!);
    for (let k = j; k < n; k++) {
      const c = at.rate[WRENCH * (pairCount(n) * i + pairIndex(n, j, k)) + 5]!;
      most += load.speed[j]! * load.speed[k]! * (j === k ? Math.max(side * c, 0) : Math.abs(c));
    }
  }
  return most;
}
