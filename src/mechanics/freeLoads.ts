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
import {
  climb,
  type FreeScratch,
  type FreeWorst,
  freeScratch,
  newFreeWorst,
  startsOnCircle,
  startsOnSphere,
} from './freeLoadsAscent.ts';
import { directionBound } from './freeLoadsBound.ts';
import { looseBound, reduceForm } from './freeLoadsForm.ts';
import { newPoseLoad, type PoseLoad, pairCount, pairIndex, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';

export { type FreeScratch, type FreeWorst, freeScratch, newFreeWorst };

/** How the free parts of a case are taken at a pose, in words for the reader. */
export const sweepRule =
  'A tip force of direction "any" points where it loads the check most: solved at every pose. Accelerations take the signs that ' +
  'load the check most: every combination that can be worst is tried. Speeds start from each joint at its limit, the others join ' +
  'where they add most, and each then takes its exact best, zero included: the value is one the arm can reach, and the bound ' +
  'of the worst-pose search covers every other choice of speeds.';

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
