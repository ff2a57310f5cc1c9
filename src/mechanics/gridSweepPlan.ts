/**
 * A sweep as a job: what all chunks share, the box of each chunk, and the one way in which chunks are put together. The chunks follow
 * from the grid and the arm alone, so the result is the same to the bit wherever and in whatever order they are done.
 */
import type { Chain } from './chain.ts';
import type { CheckForm } from './form.ts';
import { hasFree } from './freeLoads.ts';
import type { Grid } from './gridSweepGrid.ts';
import { governing, type Leaders, mergeLeaders, newLeaders, packLeaders } from './gridSweepLeaders.ts';
import { PlainSweep } from './gridSweepPlain.ts';
import { climb, coarseGrid } from './gridSweepSeed.ts';
import { checkSizes } from './gridSweepSizes.ts';
import type { JobKind } from './job.ts';
import { NestedSweep } from './nestedSweep.ts';

/** Poses of a chunk, about: where nothing is free at a pose, where something is, and where every pose is looked at. */
const CHUNK_POSES = { nested: 2 ** 18, free: 2 ** 13, plain: 2 ** 12 } as const;
const MOST_CHUNKS = 2 ** 14;

/** Plain data. */
export interface SweepPlan {
  readonly chain: Chain;
  readonly checks: readonly CheckForm[];
  readonly grid: Grid;
  /** Size of each check's terms under each case, at checks · case + check. */
  readonly sizes: Float64Array;
  /** How many ranges each joint's samples are cut into. [n] */
  readonly parts: Float64Array;
  readonly chunks: number;
}

/** Whether the numbers of a case are finite, so that the nested sweep may be trusted with it. */
function isSound(plan: Pick<SweepPlan, 'sizes' | 'checks'>, k: number): boolean {
  const own = plan.sizes.subarray(plan.checks.length * k, plan.checks.length * (k + 1));
  return own.every(Number.isFinite);
}

export function planSweep(chain: Chain, checks: readonly CheckForm[], grid: Grid): SweepPlan {
  const sizes = new Float64Array(checks.length * chain.cases.length);
  chain.cases.forEach((load, k) => {
    sizes.set(checkSizes(chain, load, checks), checks.length * k);
  });
  const plain = chain.cases.some((_, k) => !isSound({ sizes, checks }, k));
  const wanted = plain ? CHUNK_POSES.plain : chain.cases.some(hasFree) ? CHUNK_POSES.free : CHUNK_POSES.nested;
  const parts = new Float64Array(chain.n).fill(1);
  let chunks = 1;
  const most = Math.min(MOST_CHUNKS, Math.ceil(grid.poses / wanted));
  // from the ground outward, so that what the outboard joints make is made once for many chunks; but a first axis along gravity
  // makes no difference to most loads, so its samples stay together as long as others can be cut
  const order = Array.from({ length: chain.n }, (_, j) => (j + (firstIsIdle(chain) ? 1 : 0)) % chain.n);
  for (const j of order) {
    const cut = Math.min(grid.count[j]!, Math.ceil(most / chunks));
    parts[j] = cut;
    chunks *= cut;
  }
  return { chain, checks, grid, sizes, parts, chunks };
}

function firstIsIdle(chain: Chain): boolean {
  // the axis in the base frame is the third column of the first rotation
  const [gx, gy, gz] = chain.gravity;
  const [x, y, z] = [chain.rotation[2]!, chain.rotation[5]!, chain.rotation[8]!];
  return Math.hypot(gy * z - gz * y, gz * x - gx * z, gx * y - gy * x) <= 1e-12 * Math.hypot(gx, gy, gz);
}

/** First and last sample of each joint in a chunk, and its poses. */
export function chunkBox(plan: SweepPlan, chunk: number, low: Float64Array, high: Float64Array): number {
  const { grid, parts } = plan;
  let rest = chunk;
  let poses = 1;
  for (let j = grid.n - 1; j >= 0; j--) {
    const part = rest % parts[j]!;
    rest = (rest - part) / parts[j]!;
    low[j] = Math.floor((part * grid.count[j]!) / parts[j]!);
    high[j] = Math.floor(((part + 1) * grid.count[j]!) / parts[j]!) - 1;
    poses *= high[j]! - low[j]! + 1;
  }
  return poses;
}

/** Leaders of one case. */
function caseLeaders(plan: SweepPlan, k: number): Leaders {
  const { sizes, checks } = plan;
  return newLeaders(sizes.slice(checks.length * k, checks.length * (k + 1)));
}

/** Poses of the coarsest part of the grid, how much more each next part has, and the most of the whole that any may have. */
const SEED_POSES = { fixed: 4096, free: 512 } as const;
const SEED_GROWTH = 32;
const SEED_SHARE = 1 / 64;

/**
 * Job of the first look: for each case (a chunk each) poses found on ever finer parts of the grid and by climbing from there. What
 * they reach is what the sweep proper may take for granted.
 */
export const sweepSeedJob: JobKind<SweepPlan, number, Float64Array> = {
  name: 'sweepSeed',
  start: (plan) => (k) => {
    const { chain, checks, grid } = plan;
    const leaders = caseLeaders(plan, k);
    if (!isSound(plan, k)) return packLeaders(leaders);
    const load = chain.cases[k]!;
    const start = hasFree(load) ? SEED_POSES.free : SEED_POSES.fixed;
    for (let poses = start; poses === start || poses < SEED_SHARE * grid.poses; poses *= SEED_GROWTH) {
      const coarse = coarseGrid(grid, poses);
      const last = coarse.count.map((count) => count - 1);
      const floor = poses === start ? null : floorOf(leaders);
      new NestedSweep(chain, load, checks, coarse, floor).run(new Float64Array(grid.n), last, leaders);
      climb(chain, load, checks, grid, leaders);
    }
    return packLeaders(leaders);
  },
};

/** What is known to be reached, less what counts as equal. */
function floorOf(leaders: Leaders): Float64Array {
  return leaders.best.map((best, c) => best - leaders.tie[c]!);
}

export interface SweepShared {
  readonly plan: SweepPlan;
  /** What `sweepSeedJob` gave, by case. */
  readonly seeds: readonly Float64Array[];
}

/** The sweep proper: packed leaders of every case over the box of one chunk. */
export const sweepJob: JobKind<SweepShared, number, Float64Array[]> = {
  name: 'sweep',
  start: ({ plan, seeds }) => {
    const { chain, checks, grid } = plan;
    const low = new Float64Array(chain.n);
    const high = new Float64Array(chain.n);
    const cases = chain.cases.map((load, k) => {
      const leaders = caseLeaders(plan, k);
      mergeLeaders(leaders, seeds[k]!);
      const floor = floorOf(leaders);
      return isSound(plan, k)
        ? new NestedSweep(chain, load, checks, grid, floor)
        : new PlainSweep(chain, load, checks, grid);
    });
    return (chunk) => {
      chunkBox(plan, chunk, low, high);
      return cases.map((sweep, k) => {
        const leaders = caseLeaders(plan, k);
        mergeLeaders(leaders, seeds[k]!);
        sweep.run(low, high, leaders);
        return packLeaders(leaders);
      });
    };
  },
};

/** Puts chunks together, in their order. */
export class SweepMerge {
  /** Poses looked at, per case. */
  done = 0;
  private readonly plan: SweepPlan;
  private readonly cases: Leaders[];
  private readonly low: Float64Array;
  private readonly high: Float64Array;

  constructor(plan: SweepPlan) {
    this.plan = plan;
    this.cases = plan.chain.cases.map((_, k) => caseLeaders(plan, k));
    this.low = new Float64Array(plan.chain.n);
    this.high = new Float64Array(plan.chain.n);
  }

  /** What `sweepSeedJob` gave for a case. */
  addSeed(k: number, packed: Float64Array): void {
    mergeLeaders(this.cases[k]!, packed);
  }

  /** What `sweepJob` gave for a chunk. */
  add(chunk: number, packed: readonly Float64Array[]): void {
    packed.forEach((own, k) => {
      mergeLeaders(this.cases[k]!, own);
    });
    this.done += chunkBox(this.plan, chunk, this.low, this.high);
  }

  /** Index of the pose that governs a check under a case, -1 where none was looked at; whether a value failed (then there). */
  governing(k: number, check: number): { readonly index: number; readonly failed: boolean } {
    const leaders = this.cases[k]!;
    return { index: governing(leaders, check), failed: leaders.failed[check]! > 0 };
  }
}
