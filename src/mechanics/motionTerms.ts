/** Small operations on series that the parts of a load in motion are made of, and what stands outboard of a joint. See `motionChain.ts`. */
import type { Flat } from '../math/vector.ts';
import { type Chain, type ChainCase, INERTIA } from './chain.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';
import { type Series, type SeriesBox, termCount } from './motionSeries.ts';

/** Second moments Σ m r rᵀ about the link origins, from the inertias: ½ tr(I) 1 - I. [9n] */
export function secondMoments(load: ChainCase, n: number): Flat {
  const out = new Float64Array(9 * n);
  for (let k = 0; k < n; k++) {
    const o = INERTIA.stride * k;
    const about = (entry: number) => load.inertia[o + entry]!;
    const half = (about(INERTIA.xx) + about(INERTIA.yy) + about(INERTIA.zz)) / 2;
    const [xy, xz, yz] = [-about(INERTIA.xy), -about(INERTIA.xz), -about(INERTIA.yz)];
    const rows = [half - about(INERTIA.xx), xy, xz, xy, half - about(INERTIA.yy), yz, xz, yz, half - about(INERTIA.zz)];
    out.set(rows, 9 * k);
  }
  return out;
}

/**
 * How far what stands outboard of a joint stands off its axis in the middle of the travel: |h| / √(M Σ m r²), both across the axis. 0 where it
 * is balanced about the axis, 1 where it is one point off it.
 */
export function standsOff(chain: Chain, load: ChainCase, joint: number): number {
  const { n, from, to } = chain;
  const at = newPoseLoad(n);
  const scratch = poseLoadScratch(n);
  const still: ChainCase = { ...load, speed: new Float64Array(n), accel: new Float64Array(n) };
  poseLoad(
    chain,
    still,
    Float64Array.from(from, (low, k) => (low + to[k]!) / 2),
    at,
    scratch,
  );
  const { mass, first, second } = scratch;
  const axis = [0, 1, 2].map((r) => at.frame[9 * joint + 3 * r + 2]!);
  const h = [0, 1, 2].map((r) => first[3 * joint + r]!);
  const along = h.reduce((sum, part, r) => sum + part * axis[r]!, 0);
  const trace = second[9 * joint]! + second[9 * joint + 4]! + second[9 * joint + 8]!;
  let square = trace;
  for (let r = 0; r < 3; r++)
    for (let c = 0; c < 3; c++) square -= axis[r]! * second[9 * joint + 3 * r + c]! * axis[c]!;
  const across = Math.hypot(...h) ** 2 - along * along;
  return square > 0 && across > 0 ? Math.sqrt(across / (mass[joint]! * square)) : 0;
}

/** v += b × p, p constant. */
export function addCross(v: Series, b: Series, p: ArrayLike<number>, po: number): void {
  const [x, y, z] = [p[po]!, p[po + 1]!, p[po + 2]!];
  v.grow(b.live);
  for (let t = 0; t < 3 * termCount(b.live); t += 3) {
    const [bx, by, bz] = [b.c[t]!, b.c[t + 1]!, b.c[t + 2]!];
    v.c[t]! += by * z - bz * y;
    v.c[t + 1]! += bz * x - bx * z;
    v.c[t + 2]! += bx * y - by * x;
  }
  v.rest += Math.hypot(x, y, z) * b.rest;
}

/** K += p Fᵀ, p constant. */
export function addOuter(K: Series, p: ArrayLike<number>, po: number, F: Series): void {
  K.grow(F.live);
  const [x, y, z] = [p[po]!, p[po + 1]!, p[po + 2]!];
  for (let t = 0; t < termCount(F.live); t++) {
    for (let k = 0; k < 3; k++) {
      const f = F.c[3 * t + k]!;
      K.c[9 * t + k]! += x * f;
      K.c[9 * t + 3 + k]! += y * f;
      K.c[9 * t + 6 + k]! += z * f;
    }
  }
  K.rest += Math.hypot(x, y, z) * F.rest;
}

/** K += F pᵀ, p constant. */
export function addOuterBack(K: Series, F: Series, p: ArrayLike<number>, po: number): void {
  K.grow(F.live);
  const [x, y, z] = [p[po]!, p[po + 1]!, p[po + 2]!];
  for (let t = 0; t < termCount(F.live); t++) {
    for (let r = 0; r < 3; r++) {
      const f = F.c[3 * t + r]!;
      K.c[9 * t + 3 * r]! += f * x;
      K.c[9 * t + 3 * r + 1]! += f * y;
      K.c[9 * t + 3 * r + 2]! += f * z;
    }
  }
  K.rest += Math.hypot(x, y, z) * F.rest;
}

/** out += a × b. */
export function addProductCross(box: SeriesBox, out: Series, a: Series, b: Series): void {
  for (let k = 0; k < 3; k++) {
    const [p, q] = [(k + 1) % 3, (k + 2) % 3];
    box.addProduct(out, k, a, p, b, q, 1);
    box.addProduct(out, k, a, q, b, p, -1);
  }
}

/** out += scale · (v along a constant direction). */
export function addAlong(out: Series, v: Series, way: ArrayLike<number>, scale: number): void {
  out.grow(v.live);
  for (let t = 0; t < termCount(v.live); t++) {
    out.c[t]! += scale * (way[0]! * v.c[3 * t]! + way[1]! * v.c[3 * t + 1]! + way[2]! * v.c[3 * t + 2]!);
  }
  out.rest += Math.abs(scale) * Math.hypot(way[0]!, way[1]!, way[2]!) * v.rest;
}

/** out's part += a number. */
export function addToPart(out: Series, part: number, v: Series): void {
  out.grow(v.live);
  for (let t = 0; t < termCount(v.live); t++) out.c[3 * t + part]! += v.c[t]!;
  out.rest += v.rest;
}

/** out += scale · part of a vector. */
export function addPart(out: Series, v: Series, part: number, scale: number): void {
  out.grow(v.live);
  for (let t = 0; t < termCount(v.live); t++) out.c[t]! += scale * v.c[3 * t + part]!;
  out.rest += Math.abs(scale) * v.rest;
}

/** out += scale · entry of a matrix. Two entries of one matrix together owe at most √2 of its remainder, so each owes 1/√2. */
export function addEntry(out: Series, K: Series, entry: number, scale: number): void {
  out.grow(K.live);
  for (let t = 0; t < termCount(K.live); t++) out.c[t]! += scale * K.c[9 * t + entry]!;
  out.rest += Math.abs(scale) * Math.SQRT1_2 * K.rest;
}

/** c = (-K_xz, -K_yz, K_xx + K_yy). */
export function setRateVector(c: Series, K: Series): void {
  c.grow(K.live);
  for (let t = 0; t < termCount(K.live); t++) {
    c.c[3 * t] = -K.c[9 * t + 2]!;
    c.c[3 * t + 1] = -K.c[9 * t + 5]!;
    c.c[3 * t + 2] = K.c[9 * t]! + K.c[9 * t + 4]!;
  }
  c.rest = Math.SQRT2 * K.rest;
}
