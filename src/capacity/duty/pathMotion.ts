/**
 * A path of poses over time as one smooth motion. Method: through the poses of each joint goes the cubic spline (twice continuously
 * differentiable; of all curves through the points the one of least squared acceleration), so that speeds and accelerations at and
 * between the poses come from one motion, and a path of few poses can be sampled as finely as its loads need.
 *
 *   - A path that ends at the pose where it began (a full-turn joint: whole turns on) repeats for ever: the spline is periodic.
 *   - Any other path is a cut of a longer motion: the first two and the last two pieces are one cubic each (not-a-knot). Three poses
 *     make a parabola, two a steady speed.
 *
 * Error for a smooth motion: speeds to third, accelerations to second order in the spacing. The spline may swing past the poses that
 * are given, where they are few and the motion sudden; what it sweeps there counts. Poses with noise in them give noisy accelerations:
 * smooth a log before it is read. Source: textbook cubic spline (de Boor 1978, from memory); tested against a known motion.
 */
import type { Rule } from '../rolling/index.ts';

export const PATH_MOTION_RULE: Rule = {
  name: 'motion along a path',
  formula:
    'cubic spline through the poses: periodic where the path closes, else not-a-knot; speed and acceleration its derivatives',
  source: 'textbook cubic spline',
  trust: 'recomputed',
  units: 'rad, s',
  range: 'two poses or more, times rising, poses free of noise',
};

/** Poses closer than this are the same pose, rad. */
const SAME_POSE = 1e-6;
const TURN = 2 * Math.PI;

export interface PathMotion {
  /** Revolute joints. */
  readonly n: number;
  /** Poses given, ≥ 2. */
  readonly rows: number;
  /** s, rising. [rows] */
  readonly time: Float64Array;
  /** rad. [rows · n], pose by pose. */
  readonly pose: Float64Array;
  /** Accelerations at the poses, rad/s²; linear between them. [rows · n] */
  readonly accel: Float64Array;
  readonly closed: boolean;
  /** s from the first to the last pose. */
  readonly duration: number;
}

/**
 * The motion through `pose` [rows][n] at `time` [rows]; `full` [n]: 1 where a joint turns right round. Throws a RangeError where times do
 * not rise or lengths differ, which `readArm` and `readPathCsv` refuse.
 */
export function pathMotion(
  time: readonly number[],
  pose: readonly (readonly number[])[],
  full: ArrayLike<number>,
): PathMotion {
  const rows = time.length;
  const n = full.length;
  if (rows < 2 || pose.length !== rows) throw new RangeError(`${pose.length} poses at ${rows} times`);
  const flat = new Float64Array(rows * n);
  for (let k = 0; k < rows; k++) {
    const row = pose[k]!;
    if (row.length !== n) throw new RangeError(`a pose of ${row.length} angles for ${n} joints`);
    if (k > 0 && !(time[k]! > time[k - 1]!)) throw new RangeError(`time ${time[k]} does not rise`);
    for (let j = 0; j < n; j++) flat[k * n + j] = row[j]!;
  }
  let closed = true;
  for (let j = 0; j < n; j++) {
    const drift = flat[(rows - 1) * n + j]! - flat[j]!;
    const off = full[j] === 1 ? drift - TURN * Math.round(drift / TURN) : drift;
    if (!(Math.abs(off) <= SAME_POSE)) closed = false;
  }
  const accel = new Float64Array(rows * n);
  const times = Float64Array.from(time);
  if (closed) periodicBends(times, flat, n, accel);
  else openBends(times, flat, n, accel);
  return { n, rows, time: times, pose: flat, accel, closed, duration: time[rows - 1]! - time[0]! };
}

/** Slope of the straight line over piece k of joint j. */
function chord(time: Float64Array, pose: Float64Array, n: number, k: number, j: number): number {
  return (pose[(k + 1) * n + j]! - pose[k * n + j]!) / (time[k + 1]! - time[k]!);
}

/**
 * Second derivatives M of the spline: h_{k-1} M_{k-1} + 2 (h_{k-1} + h_k) M_k + h_k M_{k+1} = 6 (chord_k - chord_{k-1}) at every inner pose.
 * Not-a-knot ends: M_0 = (1 + r) M_1 - r M_2 with r = h_0/h_1, and so at the other end.
 */
function openBends(time: Float64Array, pose: Float64Array, n: number, M: Float64Array): void {
  const rows = time.length;
  if (rows === 2) return;
  const h = (k: number) => time[k + 1]! - time[k]!;
  if (rows === 3) {
    for (let j = 0; j < n; j++) {
      const bend = (2 * (chord(time, pose, n, 1, j) - chord(time, pose, n, 0, j))) / (h(0) + h(1));
      for (let k = 0; k < 3; k++) M[k * n + j] = bend;
    }
    return;
  }
  const last = rows - 1;
  const first = h(0) / h(1);
  const end = h(last - 1) / h(last - 2);
  const below = new Float64Array(rows);
  const main = new Float64Array(rows);
  const above = new Float64Array(rows);
  for (let k = 1; k < last; k++) {
    below[k] = h(k - 1);
    main[k] = 2 * (h(k - 1) + h(k));
    above[k] = h(k);
  }
  main[1]! += h(0) * (1 + first);
  above[1]! -= h(0) * first;
  main[last - 1]! += h(last - 1) * (1 + end);
  below[last - 1]! -= h(last - 1) * end;
  const matrix = factored(below, main, above, 1, last - 1);
  const right = new Float64Array(rows);
  for (let j = 0; j < n; j++) {
    for (let k = 1; k < last; k++) right[k] = 6 * (chord(time, pose, n, k, j) - chord(time, pose, n, k - 1, j));
    solve(matrix, right);
    for (let k = 1; k < last; k++) M[k * n + j] = right[k]!;
    M[j] = (1 + first) * right[1]! - first * right[2]!;
    M[last * n + j] = (1 + end) * right[last - 1]! - end * right[last - 2]!;
  }
}

/** The same all round: the piece before the first pose is the last one. Cyclic system by Sherman and Morrison's formula. */
function periodicBends(time: Float64Array, pose: Float64Array, n: number, M: Float64Array): void {
  const count = time.length - 1;
  if (count === 1) return;
  const h = (k: number) => time[k + 1]! - time[k]!;
  const before = (k: number) => (k === 0 ? count - 1 : k - 1);
  const right = new Float64Array(count);
  const load = (j: number) => {
    let slope = chord(time, pose, n, count - 1, j);
    for (let k = 0; k < count; k++) {
      const next = chord(time, pose, n, k, j);
      right[k] = 6 * (next - slope);
      slope = next;
    }
  };
  const store = (j: number) => {
    for (let k = 0; k < count; k++) M[k * n + j] = right[k]!;
    M[count * n + j] = right[0]!;
  };
  if (count === 2) {
    // Both neighbours of a pose are the other one: 2H M_k + H M_other, H = h0 + h1.
    const H = h(0) + h(1);
    for (let j = 0; j < n; j++) {
      load(j);
      const [a, b] = [right[0]!, right[1]!];
      right[0] = (2 * a - b) / (3 * H);
      right[1] = (2 * b - a) / (3 * H);
      store(j);
    }
    return;
  }
  const below = new Float64Array(count);
  const main = new Float64Array(count);
  const above = new Float64Array(count);
  for (let k = 0; k < count; k++) {
    below[k] = h(before(k));
    main[k] = 2 * (h(before(k)) + h(k));
    above[k] = h(k);
  }
  // The two corner entries are both h(count - 1): A = T + u uᵀ corner/γ, u = (γ, 0 … 0, corner).
  const corner = h(count - 1);
  const gamma = -main[0]!;
  main[0]! -= gamma;
  main[count - 1]! -= (corner * corner) / gamma;
  const matrix = factored(below, main, above, 0, count - 1);
  const u = new Float64Array(count);
  u[0] = gamma;
  u[count - 1] = corner;
  solve(matrix, u);
  const scale = 1 + u[0]! + (corner / gamma) * u[count - 1]!;
  for (let j = 0; j < n; j++) {
    load(j);
    solve(matrix, right);
    const share = (right[0]! + (corner / gamma) * right[count - 1]!) / scale;
    for (let k = 0; k < count; k++) right[k]! -= share * u[k]!;
    store(j);
  }
}

/** A tridiagonal matrix on [from, to], factored once: diagonally dominant, so no pivoting. */
interface Factored {
  readonly from: number;
  readonly to: number;
  /** below_k / pivot_{k-1}, 1 / pivot_k and above_k. */
  readonly lower: Float64Array;
  readonly inverse: Float64Array;
  readonly above: Float64Array;
}

function factored(below: Float64Array, main: Float64Array, above: Float64Array, from: number, to: number): Factored {
  const lower = new Float64Array(to + 1);
  const inverse = new Float64Array(to + 1);
  inverse[from] = 1 / main[from]!;
  for (let k = from + 1; k <= to; k++) {
    lower[k] = below[k]! * inverse[k - 1]!;
    inverse[k] = 1 / (main[k]! - lower[k]! * above[k - 1]!);
  }
  return { from, to, lower, inverse, above };
}

/** Solves in place. */
function solve({ from, to, lower, inverse, above }: Factored, x: Float64Array): void {
  for (let k = from + 1; k <= to; k++) x[k]! -= lower[k]! * x[k - 1]!;
  x[to]! *= inverse[to]!;
  for (let k = to - 1; k >= from; k--) x[k] = (x[k]! - above[k]! * x[k + 1]!) * inverse[k]!;
}

/** Pose, speed and acceleration at the share (0 to 1) of piece k, to `q`, `v`, `a` [n]. Nothing is allocated. */
export function motionAt(
  path: PathMotion,
  k: number,
  share: number,
  q: Float64Array,
  v: Float64Array,
  a: Float64Array,
): void {
  const { n, time, pose, accel } = path;
  const h = time[k + 1]! - time[k]!;
  const B = share;
  const A = 1 - share;
  const qa = (A * A * A - A) * ((h * h) / 6);
  const qb = (B * B * B - B) * ((h * h) / 6);
  const va = ((1 - 3 * A * A) * h) / 6;
  const vb = ((3 * B * B - 1) * h) / 6;
  for (let j = 0; j < n; j++) {
    const q0 = pose[k * n + j]!;
    const q1 = pose[(k + 1) * n + j]!;
    const m0 = accel[k * n + j]!;
    const m1 = accel[(k + 1) * n + j]!;
    q[j] = A * q0 + B * q1 + qa * m0 + qb * m1;
    v[j] = (q1 - q0) / h + va * m0 + vb * m1;
    a[j] = A * m0 + B * m1;
  }
}

/** Angle of joint j at the share of piece k, rad. */
export function angleAt(path: PathMotion, k: number, share: number, j: number): number {
  const { n, time, pose, accel } = path;
  const h = time[k + 1]! - time[k]!;
  const A = 1 - share;
  const bend = (A * A * A - A) * accel[k * n + j]! + (share * share * share - share) * accel[(k + 1) * n + j]!;
  return A * pose[k * n + j]! + share * pose[(k + 1) * n + j]! + (bend * h * h) / 6;
}

/**
 * Shares (0 to 1, exclusive, rising) of piece k where joint j turns back, to `out` [2]; how many there are. The speed is a parabola
 * over the piece.
 */
export function turnsIn(path: PathMotion, k: number, j: number, out: Float64Array): number {
  const { n, time, pose, accel } = path;
  const h = time[k + 1]! - time[k]!;
  const m0 = accel[k * n + j]!;
  const m1 = accel[(k + 1) * n + j]!;
  // speed(B) = c + b B + a B², over the piece
  const c = (pose[(k + 1) * n + j]! - pose[k * n + j]!) / h - (h * (2 * m0 + m1)) / 6;
  const b = h * m0;
  const a = (h * (m1 - m0)) / 2;
  const end = c + b + a;
  const sameSign = c > 0 ? end > 0 : c < 0 ? end < 0 : false;
  // Between ends of one sign the speed crosses zero only past its own turning point.
  if (sameSign && m0 * m1 >= 0) return 0;
  const square = b * b - 4 * a * c;
  if (!(square > 0)) return 0;
  const half = -(b + (b < 0 ? -1 : 1) * Math.sqrt(square)) / 2;
  const r1 = half === 0 ? Number.NaN : c / half;
  const r2 = a === 0 ? Number.NaN : half / a;
  let count = 0;
  for (const r of [Math.min(r1, r2), Math.max(r1, r2)]) if (r > 0 && r < 1) out[count++] = r;
  // One of the two may not exist: min and max of a NaN are NaN.
  if (count === 0 && Number.isNaN(r1) !== Number.isNaN(r2)) {
    const r = Number.isNaN(r1) ? r2 : r1;
    if (r > 0 && r < 1) out[count++] = r;
  }
  return count;
}
