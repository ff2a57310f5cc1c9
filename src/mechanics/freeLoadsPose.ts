/**
 * What a case leaves free at a pose: the direction of a tip force (`any`), the accelerations and the speeds within their limits.
 * The joint load is then
 *
 *     w = fixed + P·(v, r × v) + Σ_j q̈_j · accel_j + Σ_{j≤k} q̇_j q̇_k · rate_jk
 *
 * with v a free unit vector, P the size of the tip force and r the tip seen from the joint. `poseLoad` fills these parts;
 * `freeLoads.ts` takes the worst over them. All wrenches are what stands outboard puts ON the joint, in the joint's canonical
 * housing frame, about the joint origin: force (N), then moment (N·m).
 *
 * Motion: a point at x outboard of joint k has from q̇_j q̇_k (j ≤ k) the acceleration c z_j × (z_k × (x - p_k)), c = 1 for j = k
 * and 2 otherwise (Jacobi's identity), so each wrench follows from mass, first moment h and second moment S = Σ m x xᵀ of what
 * stands outboard: force -c z_j × (z_k × h), moment -c (S z_j) × z_k. Own derivation; tested against the recursion.
 */
import { dot3, type Flat, multiply33, type Numbers, rotate3, rotateBack3 } from '../math/vector.ts';
import { type Chain, type ChainCase, INERTIA, WRENCH } from './chain.ts';
import { type PoseScratch, poseScratch, staticLoads, tipReach } from './newtonEuler.ts';

/** Pairs (j, k), j ≤ k, of n joints. */
export function pairCount(n: number): number {
  return (n * (n + 1)) / 2;
}

/** Place of the pair (j, k), j ≤ k, among the pairs. */
export function pairIndex(n: number, j: number, k: number): number {
  return j * n - (j * (j - 1)) / 2 + (k - j);
}

/** The parts of every joint load at one pose. Parts that the case does not have are not written. */
export interface PoseLoad {
  readonly n: number;
  /** Gravity and a tip force of known direction. [6n] */
  readonly fixed: Flat;
  /** Tip origin from the joint origin, m, for a tip force of direction `any`. [3n] */
  readonly reach: Flat;
  /** Housing frame to base frame. [9n] */
  readonly frame: Flat;
  /** Wrench on joint i per unit acceleration of joint j, at 6(n i + j). [6n²] */
  readonly accel: Flat;
  /** Wrench on joint i per q̇_j q̇_k, at 6(pairs·i + pairIndex(j, k)). [6n·pairs] */
  readonly rate: Flat;
}

export function newPoseLoad(n: number): PoseLoad {
  const flat = (size: number) => new Float64Array(size);
  return {
    n,
    fixed: flat(WRENCH * n),
    reach: flat(3 * n),
    frame: flat(9 * n),
    accel: flat(WRENCH * n * n),
    rate: flat(WRENCH * n * pairCount(n)),
  };
}

/** Scratch of `poseLoad`, one a thread. */
export interface PoseLoadScratch {
  readonly pose: PoseScratch;
  /** Link to base frame. [9n] */
  readonly link: Flat;
  /** Joint origins in the base frame. [3n] */
  readonly place: Flat;
  /** Of what stands outboard of joint i, about its origin, base axes: mass [n], first moment [3n], second moment [9n]. */
  readonly mass: Flat;
  readonly first: Flat;
  readonly second: Flat;
  readonly tmp: Flat;
}

export function poseLoadScratch(n: number): PoseLoadScratch {
  const flat = (size: number) => new Float64Array(size);
  return {
    pose: poseScratch(n),
    link: flat(9 * n),
    place: flat(3 * n),
    mass: flat(n),
    first: flat(3 * n),
    second: flat(9 * n),
    tmp: flat(48),
  };
}

/** Fills `out` for a case at `pose` [n] rad. */
export function poseLoad(chain: Chain, load: ChainCase, pose: Numbers, out: PoseLoad, scratch: PoseLoadScratch): void {
  staticLoads(chain, load, pose, out.fixed, scratch.pose);
  if (load.force === 'any') tipReach(chain, pose, out.reach, scratch.pose);
  if (load.force !== 'any' && !load.speed) return;
  setFrames(chain, out, scratch);
  if (!load.speed) return;
  gatherOutboard(chain, load, scratch);
  for (let i = 0; i < chain.n; i++) {
    for (let j = 0; j < chain.n; j++) {
      accelWrench(chain, out, scratch, i, j);
      for (let k = j; k < chain.n; k++) rateWrench(chain, out, scratch, i, j, k);
    }
  }
}

/** Frames and origins in the base frame, from the cosines and sines that the static pass left. */
function setFrames(chain: Chain, out: PoseLoad, scratch: PoseLoadScratch): void {
  const { link, place } = scratch;
  const { cos, sin } = scratch.pose;
  for (let i = 0; i < chain.n; i++) {
    const a = 9 * i;
    if (i === 0) {
      for (let k = 0; k < 9; k++) out.frame[k] = chain.rotation[k]!;
      for (let k = 0; k < 3; k++) place[k] = chain.origin[k]!;
    } else {
      multiply33(out.frame, a, link, a - 9, chain.rotation, a);
      rotate3(place, 3 * i, link, a - 9, chain.origin, 3 * i);
      for (let k = 0; k < 3; k++) place[3 * i + k]! += place[3 * i - 3 + k]!;
    }
    const c = cos[i]!;
    const s = sin[i]!;
    for (let row = 0; row < 9; row += 3) {
      const x = out.frame[a + row]!;
      const y = out.frame[a + row + 1]!;
      link[a + row] = c * x + s * y;
      link[a + row + 1] = c * y - s * x;
      link[a + row + 2] = out.frame[a + row + 2]!;
    }
  }
}

/** Mass, first and second moment of everything outboard of each joint, about its origin, base axes. */
function gatherOutboard(chain: Chain, load: ChainCase, scratch: PoseLoadScratch): void {
  const { link, place, mass, first, second, tmp } = scratch;
  for (let i = chain.n - 1; i >= 0; i--) {
    const a = 9 * i;
    const I = load.inertia;
    const o = INERTIA.stride * i;
    // second moment from the inertia: S = ½ tr(I) 1 - I
    const half = (I[o + INERTIA.xx]! + I[o + INERTIA.yy]! + I[o + INERTIA.zz]!) / 2;
    tmp[0] = half - I[o + INERTIA.xx]!;
    tmp[4] = half - I[o + INERTIA.yy]!;
    tmp[8] = half - I[o + INERTIA.zz]!;
    tmp[1] = -I[o + INERTIA.xy]!;
    tmp[2] = -I[o + INERTIA.xz]!;
    tmp[5] = -I[o + INERTIA.yz]!;
    tmp[3] = tmp[1]!;
    tmp[6] = tmp[2]!;
    tmp[7] = tmp[5]!;
    multiply33(tmp, 9, link, a, tmp, 0);
    for (let r = 0; r < 3; r++) {
      for (let c = 0; c < 3; c++) second[a + 3 * r + c] = dot3(tmp, 9 + 3 * r, link, a + 3 * c);
    }
    rotate3(first, 3 * i, link, a, load.first, 3 * i);
    mass[i] = load.mass[i]!;
    if (i === chain.n - 1) continue;
    const m = mass[i + 1]!;
    for (let r = 0; r < 3; r++) {
      const dr = place[3 * i + 3 + r]! - place[3 * i + r]!;
      const hr = first[3 * i + 3 + r]!;
      for (let c = 0; c < 3; c++) {
        const dc = place[3 * i + 3 + c]! - place[3 * i + c]!;
        const hc = first[3 * i + 3 + c]!;
        second[a + 3 * r + c]! += second[a + 9 + 3 * r + c]! + hr * dc + dr * hc + m * dr * dc;
      }
      first[3 * i + r]! += hr + m * dr;
    }
    mass[i]! += m;
  }
}

/** tmp[at..] = a × b, with b read before it is written over. */
function crossInto(tmp: Flat, at: number, a: Numbers, ao: number, stride: number, b: Numbers, bo: number): void {
  const x = a[ao]!;
  const y = a[ao + stride]!;
  const z = a[ao + 2 * stride]!;
  const bx = b[bo]!;
  const by = b[bo + 1]!;
  const bz = b[bo + 2]!;
  tmp[at] = y * bz - z * by;
  tmp[at + 1] = z * bx - x * bz;
  tmp[at + 2] = x * by - y * bx;
}

/** Writes minus (force at tmp[30], moment about the origin of joint m at tmp[33]) to `target`, about joint i ≤ m in its housing frame. */
function store(target: Flat, at: number, out: PoseLoad, scratch: PoseLoadScratch, i: number, m: number): void {
  const { tmp, place } = scratch;
  if (i < m) {
    for (let r = 0; r < 3; r++) tmp[36 + r] = place[3 * m + r]! - place[3 * i + r]!;
    crossInto(tmp, 39, tmp, 36, 1, tmp, 30);
    for (let r = 0; r < 3; r++) tmp[33 + r]! += tmp[39 + r]!;
  }
  rotateBack3(target, at, out.frame, 9 * i, tmp, 30);
  rotateBack3(target, at + 3, out.frame, 9 * i, tmp, 33);
  for (let k = 0; k < WRENCH; k++) target[at + k] = -target[at + k]!;
}

/** The axis of joint j in the base frame is the third column of its frame: entries at 9j + 2, stride 3. */
const AXIS = 2;

function accelWrench(chain: Chain, out: PoseLoad, scratch: PoseLoadScratch, i: number, j: number): void {
  const { tmp, place, mass, first, second } = scratch;
  const m = Math.max(i, j);
  const z = 9 * j + AXIS;
  // d = p_m - p_j, acceleration of p_m: z × d
  for (let r = 0; r < 3; r++) tmp[r] = place[3 * m + r]! - place[3 * j + r]!;
  crossInto(tmp, 3, out.frame, z, 3, tmp, 0);
  crossInto(tmp, 30, out.frame, z, 3, first, 3 * m);
  for (let r = 0; r < 3; r++) tmp[30 + r]! += mass[m]! * tmp[3 + r]!;
  // moment: h × (z × d) + (tr(S) 1 - S) z
  crossInto(tmp, 33, first, 3 * m, 1, tmp, 3);
  const s = 9 * m;
  const trace = second[s]! + second[s + 4]! + second[s + 8]!;
  for (let r = 0; r < 3; r++) {
    let sz = 0;
    for (let c = 0; c < 3; c++) sz += second[s + 3 * r + c]! * out.frame[z + 3 * c]!;
    tmp[33 + r]! += trace * out.frame[z + 3 * r]! - sz;
  }
  store(out.accel, WRENCH * (chain.n * i + j), out, scratch, i, m);
}

function rateWrench(chain: Chain, out: PoseLoad, scratch: PoseLoadScratch, i: number, j: number, k: number): void {
  const { tmp, place, mass, first, second } = scratch;
  const { n } = chain;
  const m = Math.max(i, k);
  const zj = 9 * j + AXIS;
  const zk = 9 * k + AXIS;
  const factor = j === k ? 1 : 2;
  // acceleration of p_m over q̇_j q̇_k
  for (let r = 0; r < 3; r++) tmp[r] = place[3 * m + r]! - place[3 * k + r]!;
  crossInto(tmp, 3, out.frame, zk, 3, tmp, 0);
  crossInto(tmp, 3, out.frame, zj, 3, tmp, 3);
  crossInto(tmp, 30, out.frame, zk, 3, first, 3 * m);
  crossInto(tmp, 30, out.frame, zj, 3, tmp, 30);
  for (let r = 0; r < 3; r++) tmp[30 + r] = factor * (tmp[30 + r]! + mass[m]! * tmp[3 + r]!);
  crossInto(tmp, 33, first, 3 * m, 1, tmp, 3);
  for (let r = 0; r < 3; r++) {
    let sz = 0;
    for (let c = 0; c < 3; c++) sz += second[9 * m + 3 * r + c]! * out.frame[zj + 3 * c]!;
    tmp[6 + r] = sz;
    tmp[9 + r] = out.frame[zk + 3 * r]!;
  }
  crossInto(tmp, 12, tmp, 6, 1, tmp, 9);
  for (let r = 0; r < 3; r++) tmp[33 + r] = factor * (tmp[33 + r]! + tmp[12 + r]!);
  store(out.rate, WRENCH * (pairCount(n) * i + pairIndex(n, j, k)), out, scratch, i, m);
}
