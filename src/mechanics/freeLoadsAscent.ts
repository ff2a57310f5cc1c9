/** The search over the unit vectors of a reduced form: where to start, and how each start climbs to its local best. See `freeLoads.ts`. */
import type { Flat, Numbers } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import { LIN, newReducedForm, PART, pick, pickedValue, type ReducedForm } from './freeLoadsForm.ts';

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
  return {
    form: newReducedForm(n),
    trial: newFreeWorst(n),
    e: flat(3),
    samples: flat(Math.max(SAMPLES, CUBE.length)),
    cuts: flat(2 * n),
  };
}

const SAMPLES = 24;
/** Directions to the faces, edges and corners of a cube. */
const CUBE: readonly Numbers[] = [-1, 0, 1].flatMap((x) =>
  [-1, 0, 1].flatMap((y) =>
    [-1, 0, 1].flatMap((z) => (x || y || z ? [[x, y, z].map((c) => c / Math.hypot(x, y, z))] : [])),
  ),
);
/** Of each, those nearest to it: corners and edges of the cube. */
const BESIDE: readonly (readonly number[])[] = CUBE.map((a, k) =>
  CUBE.flatMap((b, j) => (j !== k && a[0]! * b[0]! + a[1]! * b[1]! + a[2]! * b[2]! > 0.75 ? [j] : [])),
);

/** Local maxima of a ring of samples, and one direction of every arc on which the signs of the accelerations stay. */
export function startsOnCircle(scratch: FreeScratch, from: () => void): void {
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
 * The highest of the 26 directions of a cube (all of them in motion) and, so that no cell of signs of the accelerations is missed, every point where two of them change
 * sign, moved a little to each of its four sides; cells without such a corner hold an extreme point of one change, moved to its two.
 */
export function startsOnSphere(scratch: FreeScratch, from: () => void): void {
  const { form: p, e, samples } = scratch;
  const point = (at: number) => {
    for (let k = 0; k < 3; k++) e[k] = CUBE[at]![k]!;
  };
  for (let at = 0; at < CUBE.length; at++) {
    point(at);
    pick(p, e);
    samples[at] = e[0]! * p.y[0]! + e[1]! * p.y[1]! + e[2]! * p.y[2]! + p.y[LIN]!;
  }
  for (let at = 0; at < CUBE.length; at++) {
    // without motion the support is smooth enough for the highest of neighbours to lead to every top
    if (!p.hasMotion && BESIDE[at]!.some((other) => samples[other]! > samples[at]!)) continue;
    point(at);
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
export function climb(p: ReducedForm, e: Flat): number {
  pick(p, e);
  let value = pickedValue(p);
  if (p.rows === 1) return value;
  for (let step = 0; step < 400; step++) {
    const size = Math.sqrt(p.y[0]! ** 2 + p.y[1]! ** 2 + p.y[2]! ** 2);
    if (!(size > 0)) return value;
    // the turn stays near where it is: the way along y may leave the maximum that a sample found, and is slow where N turns with e
    if (p.hasTip && (p.rows === 2 ? newton(p, e) : newtonOnSphere(p, e))) step += 20;
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

const G = new Float64Array(3);
const ALONG = new Float64Array(3);

/** The same for three rows. With e normalised, the value's curvature along unit tangents t is tᵀ H t - e·grad. */
function newtonOnSphere(p: ReducedForm, e: Flat): boolean {
  const { tip, y, v } = p;
  // the rows without the tip force
  const y0 = y[0]! - tip[0]! * v[0]! - tip[1]! * v[1]! - tip[2]! * v[2]!;
  const y1 = y[1]! - tip[3]! * v[0]! - tip[4]! * v[1]! - tip[5]! * v[2]!;
  const y2 = y[2]! - tip[6]! * v[0]! - tip[7]! * v[1]! - tip[8]! * v[2]!;
  for (let step = 0; step < 30; step++) {
    const [x, yy, z] = [e[0]!, e[1]!, e[2]!];
    const nx = x * tip[0]! + yy * tip[3]! + z * tip[6]! + tip[9]!;
    const ny = x * tip[1]! + yy * tip[4]! + z * tip[7]! + tip[10]!;
    const nz = x * tip[2]! + yy * tip[5]! + z * tip[8]! + tip[11]!;
    const size = Math.sqrt(nx * nx + ny * ny + nz * nz);
    if (!(size > 0)) return false;
    for (let r = 0; r < 3; r++) ALONG[r] = (tip[3 * r]! * nx + tip[3 * r + 1]! * ny + tip[3 * r + 2]! * nz) / size;
    G[0] = y0 + ALONG[0]!;
    G[1] = y1 + ALONG[1]!;
    G[2] = y2 + ALONG[2]!;
    // two tangents across e
    const flat = Math.abs(z) < 0.7;
    const h = flat ? Math.sqrt(x * x + yy * yy) : Math.sqrt(yy * yy + z * z);
    const [sx, sy, sz] = flat ? [yy / h, -x / h, 0] : [0, z / h, -yy / h];
    const [tx, ty, tz] = [yy * sz - z * sy, z * sx - x * sz, x * sy - yy * sx];
    const radial = x * G[0]! + yy * G[1]! + z * G[2]!;
    const a = sx * G[0]! + sy * G[1]! + sz * G[2]!;
    const b = tx * G[0]! + ty * G[1]! + tz * G[2]!;
    const as = sx * ALONG[0]! + sy * ALONG[1]! + sz * ALONG[2]!;
    const at = tx * ALONG[0]! + ty * ALONG[1]! + tz * ALONG[2]!;
    let [ss, st, tt] = [0, 0, 0];
    for (let k = 0; k < 3; k++) {
      const s = sx * tip[k]! + sy * tip[3 + k]! + sz * tip[6 + k]!;
      const t = tx * tip[k]! + ty * tip[3 + k]! + tz * tip[6 + k]!;
      ss += s * s;
      st += s * t;
      tt += t * t;
    }
    const kss = (ss - as * as) / size - radial;
    const kst = (st - as * at) / size;
    const ktt = (tt - at * at) / size - radial;
    const det = kss * ktt - kst * kst;
    const hill = kss < 0 && det > 0;
    const slope = Math.sqrt(a * a + b * b);
    if (!(slope > 0)) break;
    let ms = hill ? (kst * b - ktt * a) / det : (0.1 * a) / slope;
    let mt = hill ? (kst * a - kss * b) / det : (0.1 * b) / slope;
    const move = Math.sqrt(ms * ms + mt * mt);
    if (move > 0.2) {
      ms *= 0.2 / move;
      mt *= 0.2 / move;
    }
    e[0] = x + ms * sx + mt * tx;
    e[1] = yy + ms * sy + mt * ty;
    e[2] = z + ms * sz + mt * tz;
    const length = Math.sqrt(e[0]! * e[0]! + e[1]! * e[1]! + e[2]! * e[2]!);
    for (let k = 0; k < 3; k++) e[k]! /= length;
    if (move < 1e-12) break;
  }
  return true;
}
