/**
 * What a shaft section sees over many poses and cases: the history that the load cycle is taken from (`../capacity/shaft/loadCycle.ts`).
 *
 * A case that leaves something free at a pose (a tip force of any direction, motion) gives a whole convex patch of bending moments there.
 * Its extent h_k in K directions of the section (`support`, exact for tip force and accelerations, a bound for speeds) makes a polygon round
 * it, whose corners join the history: never less than what can happen; more by at most 1/cos(π/K) - 1 (0.5 %) of the free part, apart from
 * speeds and from a drive whose force turns about with the torque, which are bounded.
 *
 * A cycle depends on the extent of the history alone, so entries within the reach of others are dropped.
 */

import type { Assessed } from '../capacity/rule.ts';
import { HISTORY_STRIDE, type JointShaft, sectionHistory } from '../capacity/shaft/index.ts';
import { shaftForms } from '../mechanics/beamForms.ts';
import { type Chain, type ChainCase, WRENCH } from '../mechanics/chain.ts';
import { type Form, form } from '../mechanics/form.ts';
import { hasFree } from '../mechanics/freeLoads.ts';
import { newReducedForm, type ReducedForm, reduceForm, support } from '../mechanics/freeLoadsForm.ts';
import { newPoseLoad, type PoseLoad, poseLoad, poseLoadScratch } from '../mechanics/freeLoadsPose.ts';

/** Loads of one case at many poses. */
export interface CaseLoads {
  readonly load: ChainCase;
  /** Joint loads without the free parts, [6n] a pose. */
  readonly fixed: Float64Array;
  /** With the free parts, a pose; empty where the case leaves nothing free. */
  readonly parts: readonly PoseLoad[];
}

/** `poses` [n] a pose, rad. */
export function caseLoads(chain: Chain, load: ChainCase, poses: Float64Array): CaseLoads {
  const { n } = chain;
  const count = poses.length / n;
  const scratch = poseLoadScratch(n);
  const fixed = new Float64Array(WRENCH * n * count);
  const parts: PoseLoad[] = [];
  const free = hasFree(load);
  let at = newPoseLoad(n);
  for (let k = 0; k < count; k++) {
    poseLoad(chain, load, poses.subarray(n * k, n * k + n), at, scratch);
    fixed.set(at.fixed, WRENCH * n * k);
    if (!free) continue;
    parts.push(at);
    at = newPoseLoad(n);
  }
  return { load, fixed, parts };
}

const DIRECTIONS = 32;
const STEP = (2 * Math.PI) / DIRECTIONS;
const RING = Array.from({ length: DIRECTIONS }, (_, k) => [Math.cos(k * STEP), Math.sin(k * STEP), 0]);
const TORQUE = form({ P: [[0, 0, 0, 0, 0, 1]] });

/** History of one side of a point of a joint's shaft in one case. `angles`: the joint's own, rad, one a pose. */
export function caseHistory(
  shaft: JointShaft,
  joint: number,
  point: number,
  side: 'momentBefore' | 'momentAfter',
  one: CaseLoads,
  angles: Float64Array,
): Assessed<Float64Array> {
  if (one.parts.length > 0) return freeHistory(shaft, joint, point, side, one, angles);
  return sectionHistory(shaft, point, side, jointWrenches(one, joint, angles.length), angles);
}

/** Joint loads of one joint, [6] a pose. */
function jointWrenches({ fixed }: CaseLoads, joint: number, poses: number): Float64Array {
  const out = new Float64Array(WRENCH * poses);
  const stride = fixed.length / poses;
  for (let k = 0; k < poses; k++) {
    out.set(fixed.subarray(stride * k + WRENCH * joint, stride * k + WRENCH * joint + WRENCH), WRENCH * k);
  }
  return out;
}

function freeHistory(
  shaft: JointShaft,
  joint: number,
  point: number,
  side: 'momentBefore' | 'momentAfter',
  { load, parts }: CaseLoads,
  angles: Float64Array,
): Assessed<Float64Array> {
  const forms = shaftForms(shaft.beam, shaft.loading, shaft.points[point]!.station, side);
  if ('unassessed' in forms) return forms;
  const reduced = newReducedForm(parts[0]!.n);
  const extent = new Float64Array(DIRECTIONS);
  const value = new Float64Array(HISTORY_STRIDE * DIRECTIONS * parts.length);
  const share = shaft.torque[point]!;
  parts.forEach((at, p) => {
    const most = torqueExtent(reduced, joint, load, at, 1);
    const least = -torqueExtent(reduced, joint, load, at, -1);
    extents(forms, reduced, joint, load, at, least, most, extent);
    for (let k = 0; k < DIRECTIONS; k++) {
      const [h, next] = [extent[k]!, extent[(k + 1) % DIRECTIONS]!];
      const [a, b] = [k * STEP, (k + 1) * STEP];
      const x = (h * Math.sin(b) - next * Math.sin(a)) / Math.sin(STEP);
      const y = (next * Math.cos(a) - h * Math.cos(b)) / Math.sin(STEP);
      const o = HISTORY_STRIDE * (DIRECTIONS * p + k);
      value[o] = -y;
      value[o + 1] = x;
      value[o + 2] = share * (k % 2 === 0 ? most : least);
      value[o + 3] = angles[p]!;
    }
  });
  return { value };
}

function torqueExtent(reduced: ReducedForm, joint: number, load: ChainCase, at: PoseLoad, sign: 1 | -1): number {
  reduceForm(reduced, TORQUE, joint, load, at, 0, 0);
  return support(reduced, sign === 1 ? [1, 0, 0] : [-1, 0, 0]);
}

/** Weights of the torque beyond the end of a branch, as shares of what the drive makes of it in the form. */
const WEIGHTS = [0, 0.5, 1, 2];

/**
 * Extent of the bending moment in each direction, over the drive's branches that the torque can reach. Where a branch holds from a torque
 * on, any weight ≥ 0 of the torque beyond that end may be added and the extent stays one: the least of a few weights is taken.
 */
function extents(
  forms: readonly Form[],
  reduced: ReducedForm,
  joint: number,
  load: ChainCase,
  at: PoseLoad,
  least: number,
  most: number,
  out: Float64Array,
): void {
  out.fill(Number.NEGATIVE_INFINITY);
  const own = new Float64Array(DIRECTIONS);
  for (const f of forms) {
    if (f.torqueFrom > most || f.torqueTo < least) continue;
    own.fill(Number.POSITIVE_INFINITY);
    const drive = Math.hypot(f.P[5]!, f.P[11]!);
    for (const weight of WEIGHTS) {
      if (weight === 0 || f.torqueFrom > least) lower(f, weight * drive, f.torqueFrom, reduced, joint, load, at, own);
      if (weight > 0 && f.torqueTo < most) lower(f, -weight * drive, f.torqueTo, reduced, joint, load, at, own);
    }
    for (let k = 0; k < DIRECTIONS; k++) if (!(own[k]! <= out[k]!)) out[k] = own[k]!;
  }
}

/** Lowers the extents to those of the form plus `extra` times the torque beyond `limit`. */
function lower(
  f: Form,
  extra: number,
  limit: number,
  reduced: ReducedForm,
  joint: number,
  load: ChainCase,
  at: PoseLoad,
  out: Float64Array,
): void {
  reduceForm(reduced, f, joint, load, at, extra, extra === 0 ? 0 : limit);
  for (let k = 0; k < DIRECTIONS; k++) {
    const h = support(reduced, RING[k]!);
    if (!(h >= out[k]!)) out[k] = h;
  }
}

/** Directions whose extreme entries make the reach within which others are dropped, and the two of the torque. */
const CORNERS = 16;
const COSINE = Float64Array.from({ length: CORNERS }, (_, k) => Math.cos((2 * Math.PI * k) / CORNERS));
const SINE = Float64Array.from({ length: CORNERS }, (_, k) => Math.sin((2 * Math.PI * k) / CORNERS));

/**
 * The entries that a cycle can depend on, turned into the frame of the shaft's fibres (so their angle is 0): those on or outside the
 * polygon of the extreme entries in 16 directions, which holds every other, and those of extreme torque. What is not a number is kept.
 */
export function outerEntries(history: Float64Array, turnsWith: 'link' | 'housing'): Float64Array {
  const turned = history.slice();
  for (let o = 0; o < turned.length; o += HISTORY_STRIDE) {
    const q = turnsWith === 'link' ? turned[o + 3]! : 0;
    const c = Math.cos(q);
    const s = Math.sin(q);
    const x = turned[o]!;
    const y = turned[o + 1]!;
    turned[o] = x * c + y * s;
    turned[o + 1] = y * c - x * s;
    turned[o + 3] = 0;
  }
  const corners = extremeEntries(turned);
  let kept = 0;
  for (let o = 0; o < turned.length; o += HISTORY_STRIDE) {
    if (isInside(turned, o, corners)) continue;
    for (let k = 0; k < HISTORY_STRIDE; k++) turned[kept++] = turned[o + k]!;
  }
  return turned.slice(0, kept);
}

/** Entries that stand out: their values, so that they outlive the thinning in place. */
interface Extremes {
  /** Corners of a convex polygon, anticlockwise. */
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly leastTorque: number;
  readonly mostTorque: number;
}

function extremeEntries(history: Float64Array): Extremes {
  const best = new Float64Array(CORNERS).fill(Number.NEGATIVE_INFINITY);
  const x = new Float64Array(CORNERS);
  const y = new Float64Array(CORNERS);
  let leastTorque = Number.POSITIVE_INFINITY;
  let mostTorque = Number.NEGATIVE_INFINITY;
  for (let o = 0; o < history.length; o += HISTORY_STRIDE) {
    const hx = history[o]!;
    const hy = history[o + 1]!;
    const torque = history[o + 2]!;
    for (let k = 0; k < CORNERS; k++) {
      const reach = COSINE[k]! * hx + SINE[k]! * hy;
      if (!(reach > best[k]!)) continue;
      best[k] = reach;
      x[k] = hx;
      y[k] = hy;
    }
    if (torque < leastTorque) leastTorque = torque;
    if (torque > mostTorque) mostTorque = torque;
  }
  return { x, y, leastTorque, mostTorque };
}

/** Whether an entry lies strictly within the polygon and the range of torques; false where it is not a number. */
function isInside(history: Float64Array, o: number, { x, y, leastTorque, mostTorque }: Extremes): boolean {
  const hx = history[o]!;
  const hy = history[o + 1]!;
  const torque = history[o + 2]!;
  if (!(torque > leastTorque && torque < mostTorque) && leastTorque < mostTorque) return false;
  for (let k = 0; k < CORNERS; k++) {
    const ax = x[k]!;
    const ay = y[k]!;
    const next = k + 1 < CORNERS ? k + 1 : 0;
    const ux = x[next]! - ax;
    const uy = y[next]! - ay;
    if ((ux !== 0 || uy !== 0) && !(ux * (hy - ay) - uy * (hx - ax) > 0)) return false;
  }
  return x.some((v, k) => v !== x[0] || y[k] !== y[0]);
}
