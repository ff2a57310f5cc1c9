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
  return { form: newReducedForm(n), trial: newFreeWorst(n), e: flat(3), samples: flat(SAMPLES), cuts: flat(2 * n) };
}

const SAMPLES = 24;
/** Directions to the faces, edges and corners of a cube. */
const CUBE: readonly Numbers[] = [-1, 0, 1].flatMap((x) =>
  [-1, 0, 1].flatMap((y) =>
    [-1, 0, 1].flatMap((z) => (x || y || z ? [[x, y, z].map((c) => c / Math.hypot(x, y, z))] : [])),
  ),
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

/** The direction of the cube from which a form promises most. */
function bestOfCube(p: ReducedForm, e: Flat): Numbers {
  let best = CUBE[0]!;
  let most = Number.NEGATIVE_INFINITY;
  for (const start of CUBE) {
    for (let k = 0; k < 3; k++) e[k] = start[k]!;
    pick(p, e);
    const value = pickedValue(p);
    if (!(value > most)) continue;
    most = value;
    best = start;
  }
  return best;
}

/**
 * Whether the tip direction v picked by a climb is the best of all, the tip force being all that is free. With s = ‖y‖ at v, the value
 * ‖y0 + T u‖ + t·u of any u is at most (‖y0 + T u‖² + s²)/2s + t·u, equal at v (a mean of squares); that quadratic is largest over the
 * sphere at v if its gradient there is μ v and μ ≥ all eigenvalues of TᵀT/s, so if μ - TᵀT/s has no negative minor of its diagonal.
 */
function isBestTip(p: ReducedForm): boolean {
  const { tip, y, v } = p;
  const s = Math.sqrt(y[0]! ** 2 + y[1]! ** 2 + y[2]! ** 2);
  if (!(s > 0)) return false;
  let mu = 0;
  for (let k = 0; k < 3; k++) {
    mu += v[k]! * ((tip[k]! * y[0]! + tip[3 + k]! * y[1]! + tip[6 + k]! * y[2]!) / s + tip[9 + k]!);
  }
  const product = (j: number, k: number) =>
    (tip[j]! * tip[k]! + tip[3 + j]! * tip[3 + k]! + tip[6 + j]! * tip[6 + k]!) / s;
  const [xx, yy, zz] = [mu - product(0, 0), mu - product(1, 1), mu - product(2, 2)];
  const [xy, xz, yz] = [-product(0, 1), -product(0, 2), -product(1, 2)];
  const det = xx * (yy * zz - yz * yz) - xy * (xy * zz - yz * xz) + xz * (xy * yz - yy * xz);
  return Math.min(xx, yy, zz, xx * yy - xy * xy, xx * zz - xz * xz, yy * zz - yz * yz, det) >= 0;
}

/**
 * The 26 directions of a cube (for a tip force alone the best of them, where what it climbs to is shown to be best) and, so that no cell of signs of the accelerations is missed, every point where two of them change
 * sign, moved a little to each of its four sides; cells without such a corner hold an extreme point of one change, moved to its two.
 */
export function startsOnSphere(scratch: FreeScratch, from: () => void): void {
  const { form: p, e } = scratch;
  const first = p.hasMotion ? null : bestOfCube(p, e);
  if (first) {
    for (let k = 0; k < 3; k++) e[k] = first[k]!;
    from();
    if (isBestTip(p)) return;
  }
  for (const start of CUBE) {
    if (start === first) continue;
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
export function climb(p: ReducedForm, e: Flat): number {
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
