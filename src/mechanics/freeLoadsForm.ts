/**
 * One check form at one pose, reduced to what its free parts can do. With e a unit vector of as many components as the form has
 * rows, the form is the maximum over e of
 *
 *     e · y + lin,      (y, lin) = fixed + Σ_r tip_r·v + Σ_j a_j accel_j + Σ_{j≤k} s_j s_k rate_jk
 *
 * with v a unit vector and a_j, s_j within ±1 (limits folded in). `pick` takes the best free parts for one e, `support` the value
 * at one e or, for speeds, a bound of it; both also serve vectors e that are not of unit length.
 */
import type { Flat, Numbers } from '../math/vector.ts';
import { type ChainCase, WRENCH } from './chain.ts';
import type { Form } from './form.ts';
import { type PoseLoad, pairCount, pairIndex } from './freeLoadsPose.ts';

/** Components of a reduced quantity: up to three rows of the form, then its linear part. */
export const PART = 4;
/** Index of the linear part. */
export const LIN = 3;

export interface ReducedForm {
  n: number;
  rows: number;
  hasTip: boolean;
  hasMotion: boolean;
  /** [4] */
  readonly fixed: Flat;
  /** For each part r a vector on the tip direction, housing frame. [12] */
  readonly tip: Flat;
  /** [4n] */
  readonly accel: Flat;
  /** [4·pairs] */
  readonly rate: Flat;
  /** The free parts as picked: v [3], a [n], s [n] and the parts (y, lin) they give [4]. */
  readonly v: Flat;
  readonly a: Flat;
  readonly s: Flat;
  readonly y: Flat;
  /** n·n scratch: coefficients of s_j s_k at one e. */
  readonly q: Flat;
  readonly trial: Flat;
}

export function newReducedForm(n: number): ReducedForm {
  const flat = (size: number) => new Float64Array(size);
  return {
    n,
    rows: 1,
    hasTip: false,
    hasMotion: false,
    fixed: flat(PART),
    tip: flat(3 * PART),
    accel: flat(PART * n),
    rate: flat(PART * pairCount(n)),
    v: flat(3),
    a: flat(n),
    s: flat(n),
    y: flat(PART),
    q: flat(n * n),
    trial: flat(n),
  };
}

/** P·w and l·w of one wrench, times `scale`, to out[at..at+3]; unused rows get 0. `extra` times the torque is added to l·w. */
function project(f: Form, extra: number, w: Numbers, wo: number, scale: number, out: Flat, at: number): void {
  for (let r = 0; r < LIN; r++) {
    let sum = 0;
    if (r < f.rows) for (let k = 0; k < WRENCH; k++) sum += f.P[WRENCH * r + k]! * w[wo + k]!;
    out[at + r] = scale * sum;
  }
  let sum = extra * w[wo + 5]!;
  for (let k = 0; k < WRENCH; k++) sum += f.l[k]! * w[wo + k]!;
  out[at + LIN] = scale * sum;
}

/**
 * Reduces form `f` plus `extra` times (torque - `limit`) for joint `i` at the pose of `at`.
 */
export function reduceForm(
  out: ReducedForm,
  f: Form,
  i: number,
  load: ChainCase,
  at: PoseLoad,
  extra: number,
  limit: number,
): void {
  const { n } = at;
  out.rows = f.rows;
  out.hasTip = load.force === 'any';
  out.hasMotion = load.speed !== null;
  project(f, extra, at.fixed, WRENCH * i, 1, out.fixed, 0);
  for (let r = 0; r < f.rows; r++) out.fixed[r]! += f.c[r]!;
  out.fixed[LIN]! += f.o - (extra === 0 ? 0 : extra * limit);
  if (out.hasTip) {
    const P = load.magnitude;
    const x = at.reach[3 * i]!;
    const y = at.reach[3 * i + 1]!;
    const z = at.reach[3 * i + 2]!;
    for (let r = 0; r < PART; r++) {
      const lin = r === LIN;
      const row = lin ? f.l : f.P;
      const o = lin ? 0 : WRENCH * r;
      const used = lin || r < f.rows;
      // β·(r × v) = v·(β × r)
      const bx = used ? row[o + 3]! : 0;
      const by = used ? row[o + 4]! : 0;
      const bz = used ? row[o + 5]! + (lin ? extra : 0) : 0;
      out.tip[3 * r] = P * ((used ? row[o]! : 0) + by * z - bz * y);
      out.tip[3 * r + 1] = P * ((used ? row[o + 1]! : 0) + bz * x - bx * z);
      out.tip[3 * r + 2] = P * ((used ? row[o + 2]! : 0) + bx * y - by * x);
    }
  }
  if (!load.speed || !load.accel) return;
  for (let j = 0; j < n; j++) {
    project(f, extra, at.accel, WRENCH * (n * i + j), load.accel[j]!, out.accel, PART * j);
    for (let k = j; k < n; k++) {
      const pair = pairIndex(n, j, k);
      const scale = load.speed[j]! * load.speed[k]!;
      project(f, extra, at.rate, WRENCH * (pairCount(n) * i + pair), scale, out.rate, PART * pair);
    }
  }
}

/** e·(rows) + lin of the four numbers at parts[at..]. */
function along(parts: Numbers, at: number, e: Numbers): number {
  return parts[at]! * e[0]! + parts[at + 1]! * e[1]! + parts[at + 2]! * e[2]! + parts[at + LIN]!;
}

/** Value at e, exact for tip force and accelerations; speeds by Σ max(C_jj, 0) + Σ_{j<k} |C_jk|. Convex in e. `e` [3]. */
export function support(p: ReducedForm, e: Numbers): number {
  let sum = along(p.fixed, 0, e);
  if (p.hasTip) {
    let square = 0;
    for (let k = 0; k < 3; k++) {
      const c = p.tip[k]! * e[0]! + p.tip[3 + k]! * e[1]! + p.tip[6 + k]! * e[2]! + p.tip[9 + k]!;
      square += c * c;
    }
    sum += Math.sqrt(square);
  }
  if (!p.hasMotion) return sum;
  const { n } = p;
  for (let j = 0; j < n; j++) {
    sum += Math.abs(along(p.accel, PART * j, e));
    for (let k = j; k < n; k++) {
      const q = along(p.rate, PART * pairIndex(n, j, k), e);
      sum += j === k ? Math.max(q, 0) : Math.abs(q);
    }
  }
  return sum;
}

/** Bound of the form over everything free by the triangle inequality: cheap, and loose. */
export function looseBound(p: ReducedForm): number {
  const size = (parts: Numbers, at: number, lin: number) =>
    Math.sqrt(parts[at]! ** 2 + parts[at + 1]! ** 2 + parts[at + 2]! ** 2) + lin;
  let sum = size(p.fixed, 0, p.fixed[LIN]!);
  if (p.hasTip) {
    // ‖T v‖ ≤ Frobenius norm, t·v ≤ ‖t‖
    let rows = 0;
    let lin = 0;
    for (let k = 0; k < 9; k++) rows += p.tip[k]! ** 2;
    for (let k = 9; k < 12; k++) lin += p.tip[k]! ** 2;
    sum += Math.sqrt(rows) + Math.sqrt(lin);
  }
  if (!p.hasMotion) return sum;
  for (let j = 0; j < p.n; j++) sum += size(p.accel, PART * j, Math.abs(p.accel[PART * j + LIN]!));
  for (let k = 0; k < pairCount(p.n); k++) sum += size(p.rate, PART * k, Math.abs(p.rate[PART * k + LIN]!));
  return sum;
}

/**
 * Picks the free parts that are best along e and leaves their (y, lin) in p.y. Tip direction and accelerations are exact for
 * this e; speeds are the best found by `pickSpeeds`.
 */
export function pick(p: ReducedForm, e: Numbers): void {
  if (p.hasTip) pickTip(p, e);
  if (p.hasMotion) {
    for (let j = 0; j < p.n; j++) p.a[j] = along(p.accel, PART * j, e) < 0 ? -1 : 1;
    pickSpeeds(p, e);
  }
  gather(p);
}

function pickTip(p: ReducedForm, e: Numbers): void {
  let square = 0;
  for (let k = 0; k < 3; k++) {
    const c = p.tip[k]! * e[0]! + p.tip[3 + k]! * e[1]! + p.tip[6 + k]! * e[2]! + p.tip[9 + k]!;
    p.v[k] = c;
    square += c * c;
  }
  const length = Math.sqrt(square);
  if (length > 0) for (let k = 0; k < 3; k++) p.v[k] = p.v[k]! / length;
  else {
    p.v[0] = 1;
    p.v[1] = 0;
    p.v[2] = 0;
  }
}

/** (y, lin) of the picked free parts, to p.y. */
export function gather(p: ReducedForm): void {
  for (let r = 0; r < PART; r++) {
    let sum = p.fixed[r]!;
    if (p.hasTip) for (let k = 0; k < 3; k++) sum += p.tip[3 * r + k]! * p.v[k]!;
    if (p.hasMotion) {
      for (let j = 0; j < p.n; j++) {
        sum += p.a[j]! * p.accel[PART * j + r]!;
        if (p.s[j] === 0) continue;
        for (let k = j; k < p.n; k++) sum += p.s[j]! * p.s[k]! * p.rate[PART * pairIndex(p.n, j, k) + r]!;
      }
    }
    p.y[r] = sum;
  }
}

/** ‖y‖ + lin of the picked parts. */
export function pickedValue(p: ReducedForm): number {
  return Math.sqrt(p.y[0]! ** 2 + p.y[1]! ** 2 + p.y[2]! ** 2) + p.y[LIN]!;
}

/**
 * Speeds that make Σ q_jk s_j s_k large within ±1. From each joint as first (at its limit) the others join one by one where they
 * do most good; then each in turn takes its exact best until nothing changes. Zero is the answer where nothing is gained.
 */
function pickSpeeds(p: ReducedForm, e: Numbers): void {
  const { n, q, trial, s } = p;
  for (let j = 0; j < n; j++) {
    for (let k = j; k < n; k++) {
      const c = along(p.rate, PART * pairIndex(n, j, k), e);
      q[n * j + k] = c;
      q[n * k + j] = c;
    }
  }
  let best = 0;
  s.fill(0);
  for (let seed = 0; seed < n; seed++) {
    trial.fill(0);
    trial[seed] = 1;
    const value = climbSpeeds(p, seed);
    if (!(value > best)) continue;
    best = value;
    s.set(trial);
  }
}

/** Coordinate ascent from `trial`; returns the value. The first pass walks on from `seed`. */
function climbSpeeds(p: ReducedForm, seed: number): number {
  const { n, q, trial } = p;
  let total = q[n * seed + seed]!;
  for (let pass = 0; pass < 20; pass++) {
    let changed = false;
    for (let step = pass === 0 ? 1 : 0; step < n; step++) {
      const j = (seed + step) % n;
      const old = trial[j]!;
      let slope = 0;
      for (let k = 0; k < n; k++) if (k !== j) slope += q[n * j + k]! * trial[k]!;
      const square = q[n * j + j]!;
      // best of square·x² + slope·x within ±1
      let x = slope < 0 ? -1 : 1;
      if (square < 0 && Math.abs(slope) < -2 * square) x = -slope / (2 * square);
      const gain = square * (x * x - old * old) + slope * (x - old);
      if (!(gain > 1e-15 * Math.abs(total))) continue;
      trial[j] = x;
      total += gain;
      changed = true;
    }
    if (!changed) break;
  }
  return total;
}
