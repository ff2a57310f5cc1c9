/**
 * The grid of a sweep: every combination of evenly spaced angles within travel. Poses are numbered with the first joint slowest:
 * index = Σ (sample of joint j) · stride[j], and nothing is held per pose.
 */
import type { Chain } from './chain.ts';

/** Either the largest spacing (rad), shortened to fit each travel, or the samples of each joint (2 or more). */
export type GridChoice = { readonly step: number } | { readonly samples: number };

/**
 * Samples of joint j: `from + k · step`, both ends of its travel included. A full turn ends where it began, so its last sample is
 * left out and no pose is counted twice. A joint without travel has one sample. Arrays are [n].
 */
export interface Grid {
  readonly n: number;
  /** rad */
  readonly from: Float64Array;
  readonly step: Float64Array;
  /** The last sample, rad. */
  readonly to: Float64Array;
  readonly count: Float64Array;
  readonly stride: Float64Array;
  readonly poses: number;
}

/** More poses than this are refused. */
export const POSE_LIMIT = 1e12;

export interface GridRefusal {
  readonly code: 'step' | 'samples' | 'too-many-poses';
  readonly path: 'step' | 'samples';
  readonly found: number;
  /** Poses of the grid asked for; NaN where there is none. */
  readonly poses: number;
  readonly limit: number;
  /** The smallest step (rad) or the largest number of samples that is not refused; null where none is. */
  readonly fits: number | null;
}

export type GridOutcome =
  | { readonly ok: true; readonly grid: Grid }
  | { readonly ok: false; readonly refusal: GridRefusal };

/** Angle of sample k of joint j, rad. */
export function sampleAngle(grid: Grid, j: number, k: number): number {
  return k === grid.count[j]! - 1 ? grid.to[j]! : grid.from[j]! + k * grid.step[j]!;
}

/** The pose of an index into `out` [n], rad. */
export function poseAt(grid: Grid, index: number, out: Float64Array): void {
  let rest = index;
  for (let j = 0; j < grid.n; j++) {
    const k = Math.floor(rest / grid.stride[j]!);
    rest -= k * grid.stride[j]!;
    out[j] = sampleAngle(grid, j, k);
  }
}

/** Gaps between samples of a travel at a step; an angle that is a whole number of steps up to rounding stays one. */
function gapsAt(range: number, step: number): number {
  return Math.max(1, Math.ceil(range / step - 1e-9));
}

function gapsOf(choice: GridChoice, range: number): number {
  return 'step' in choice ? gapsAt(range, choice.step) : choice.samples - 1;
}

function countOf(chain: Chain, j: number, choice: GridChoice): number {
  const range = chain.to[j]! - chain.from[j]!;
  if (!(range > 0)) return 1;
  const gaps = gapsOf(choice, range);
  return chain.full[j] ? gaps : gaps + 1;
}

function posesOf(chain: Chain, choice: GridChoice): number {
  let poses = 1;
  for (let j = 0; j < chain.n; j++) poses *= countOf(chain, j, choice);
  return poses;
}

/** The coarsest choice is one gap a joint; bisect between what is refused and that. */
function smallestStep(chain: Chain, refused: number): number | null {
  let low = refused;
  let high = 2 * Math.PI;
  if (posesOf(chain, { step: high }) > POSE_LIMIT) return null;
  while (high - low > 1e-9 * high) {
    const middle = (low + high) / 2;
    if (posesOf(chain, { step: middle }) > POSE_LIMIT) low = middle;
    else high = middle;
  }
  return high;
}

function mostSamples(chain: Chain, refused: number): number | null {
  if (posesOf(chain, { samples: 2 }) > POSE_LIMIT) return null;
  let fits = 2;
  let high = refused;
  while (high - fits > 1) {
    const middle = Math.floor((fits + high) / 2);
    if (posesOf(chain, { samples: middle }) > POSE_LIMIT) high = middle;
    else fits = middle;
  }
  return fits;
}

/** The grid of a choice, or why there is none. */
export function gridOf(chain: Chain, choice: GridChoice): GridOutcome {
  const path = 'step' in choice ? 'step' : 'samples';
  const found = 'step' in choice ? choice.step : choice.samples;
  const sound =
    'step' in choice ? found > 0 && found < Number.POSITIVE_INFINITY : Number.isInteger(found) && found >= 2;
  const refuse = (code: GridRefusal['code'], poses: number, fits: number | null): GridOutcome => ({
    ok: false,
    refusal: { code, path, found, poses, limit: POSE_LIMIT, fits },
  });
  if (!sound) return refuse(path, Number.NaN, path === 'samples' ? 2 : null);
  const poses = posesOf(chain, choice);
  if (!(poses <= POSE_LIMIT)) {
    return refuse('too-many-poses', poses, path === 'step' ? smallestStep(chain, found) : mostSamples(chain, found));
  }
  const { n } = chain;
  const count = Float64Array.from({ length: n }, (_, j) => countOf(chain, j, choice));
  const stride = new Float64Array(n);
  let below = 1;
  for (let j = n - 1; j >= 0; j--) {
    stride[j] = below;
    below *= count[j]!;
  }
  const step = Float64Array.from({ length: n }, (_, j) => {
    const range = chain.to[j]! - chain.from[j]!;
    return range > 0 ? range / gapsOf(choice, range) : 0;
  });
  const to = Float64Array.from({ length: n }, (_, j) =>
    chain.full[j] || count[j] === 1 ? chain.from[j]! + (count[j]! - 1) * step[j]! : chain.to[j]!,
  );
  return { ok: true, grid: { n, from: Float64Array.from(chain.from), step, to, count, stride, poses } };
}
