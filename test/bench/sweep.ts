/**
 * The grid sweep beside other ways to the same loads, in one run: the outside engine's three calls a pose, our own plain recursion, and that
 * with the checks and their maxima. Rounds take turns and the fastest of each counts, in processor time of this program (its compiler and
 * collector included), so that other work on the machine hits all alike. The sweep is whole: first look, every chunk, the merge.
 */
import { readFileSync } from 'node:fs';
import { loadavg } from 'node:os';
import type { Arm, Vec3 } from '../../src/arm/arm.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue } from '../../src/mechanics/form.ts';
import { type Grid, gridOf, poseAt } from '../../src/mechanics/gridSweepGrid.ts';
import { planSweep, SweepMerge, sweepJob, sweepSeedJob } from '../../src/mechanics/gridSweepPlan.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { sweepArm } from '../../src/studies/sweepArm.ts';
import { nodePool } from '../../src/worker/nodePool.ts';
import { outsideArm } from '../outside/rigidBody.ts';
import { randomArm } from '../randomArm.ts';

const ROUNDS = 5;
/** Poses of one round of what is timed pose by pose. */
const TIMED_POSES = 40_000;
const RAD = Math.PI / 180;

/** Numbers that a benchmark gave, so that none of its work can be left out. */
let sink = 0;

/** Processor time of this program so far, ms. */
function clock(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

function fastest(rounds: readonly number[]): number {
  return Math.min(...rounds);
}

function gridFor(chain: Chain, samples: number): Grid {
  const outcome = gridOf(chain, { samples });
  if (!outcome.ok) throw new Error('the grid was refused');
  return outcome.grid;
}

/** ns a pose of the whole sweep on this thread. */
function sweepOnce(chain: Chain, checks: readonly CheckForm[], grid: Grid): number {
  const start = clock();
  const plan = planSweep(chain, checks, grid);
  const seed = sweepSeedJob.start(plan);
  const seeds = chain.cases.map((_, k) => seed(k));
  const merge = new SweepMerge(plan);
  seeds.forEach((packed, k) => {
    merge.addSeed(k, packed);
  });
  const chunk = sweepJob.start({ plan, seeds });
  for (let k = 0; k < plan.chunks; k++) merge.add(k, chunk(k));
  const time = clock() - start;
  checks.forEach((_, c) => {
    sink += merge.governing(0, c).index;
  });
  return (time * 1e6) / grid.poses;
}

/** ns a pose of the plain recursion; with the values of `checks` and their maxima, where there are any. */
function plainOnce(chain: Chain, checks: readonly CheckForm[], grid: Grid): number {
  const pose = new Float64Array(chain.n);
  const loads = new Float64Array(6 * chain.n);
  const scratch = poseScratch(chain.n);
  const best = new Float64Array(checks.length);
  const at = new Float64Array(checks.length);
  const every = Math.max(1, Math.floor(grid.poses / TIMED_POSES));
  const start = clock();
  for (let k = 0; k < TIMED_POSES; k++) {
    poseAt(grid, k * every, pose);
    staticLoads(chain, chain.cases[0]!, pose, loads, scratch);
    for (let c = 0; c < checks.length; c++) {
      const value = checkValue(checks[c]!, loads, 6 * checks[c]!.joint);
      if (value > best[c]!) {
        best[c] = value;
        at[c] = k;
      }
    }
  }
  const time = clock() - start;
  sink += (best[0] ?? 0) + (at[0] ?? 0) + loads[0]!;
  return (time * 1e6) / TIMED_POSES;
}

function outsideOnce(outside: { bare(pose: ArrayLike<number>): number }, chain: Chain, grid: Grid): number {
  const pose = new Float64Array(chain.n);
  const every = Math.max(1, Math.floor(grid.poses / TIMED_POSES));
  const start = clock();
  for (let k = 0; k < TIMED_POSES; k++) {
    poseAt(grid, k * every, pose);
    sink += outside.bare(pose);
  }
  return ((clock() - start) * 1e6) / TIMED_POSES;
}

function sixJoints(): Arm {
  const reading = readArm(readFileSync('models/six-joint.arm.json', 'utf8'));
  if (!reading.ok) throw new Error('the model has issues');
  return { ...reading.arm, cases: reading.arm.cases.slice(0, 1) };
}

/** Gravity turned by 30° against the base, so that no axis stands along it. */
function tilted(arm: Arm): Arm {
  const [x, y, z] = arm.gravity;
  const [c, s] = [Math.cos(30 * RAD), Math.sin(30 * RAD)];
  const gravity: Vec3 = [x, c * y - s * z, s * y + c * z];
  return { ...arm, name: `${arm.name}, base tilted by 30°`, gravity };
}

const ns = (value: number) => `${value < 10 ? value.toFixed(2) : value.toFixed(0)} ns`;

async function compare(arm: Arm, samples: number, radialOnly: boolean): Promise<string> {
  const chain = flattenArm(arm);
  const checks = loadChecks(arm, chain).filter((check) => !radialOnly || (check.check === 'radial' && check.bearing));
  const grid = gridFor(chain, samples);
  const outside = await outsideArm(arm);
  const times: Record<'sweep' | 'bare' | 'plain' | 'outside', number[]> = {
    sweep: [],
    bare: [],
    plain: [],
    outside: [],
  };
  for (let round = 0; round <= ROUNDS; round++) {
    const sweep = sweepOnce(chain, checks, grid);
    const bare = plainOnce(chain, [], grid);
    const plain = plainOnce(chain, checks, grid);
    const engine = outsideOnce(outside, chain, grid);
    // the first round warms up
    if (round === 0) continue;
    times.sweep.push(sweep);
    times.bare.push(bare);
    times.plain.push(plain);
    times.outside.push(engine);
  }
  outside.close();
  const sweep = fastest(times.sweep);
  const beside = (name: string, rounds: readonly number[]) =>
    `${name} ${ns(fastest(rounds))} (${(fastest(rounds) / sweep).toFixed(0)} times)`;
  return (
    `  ${arm.name}, ${checks.length} checks, ${grid.poses} poses: sweep ${ns(sweep)} a pose; ` +
    `${beside('plain recursion', times.bare)}, ${beside('with the checks', times.plain)}, ` +
    beside('outside engine', times.outside)
  );
}

/** One worker and two, turn by turn; threads already running. Beside the time that passed the processor time of all threads together. */
async function workers(arm: Arm, samples: number): Promise<string> {
  const entry = new URL('nodeWorker.js', import.meta.url);
  const pools = [nodePool(1, entry), nodePool(2, entry)] as const;
  const times: [number[], number[]] = [[], []];
  const busy: [number[], number[]] = [[], []];
  for (let round = 0; round <= ROUNDS; round++) {
    for (const k of [0, 1] as const) {
      const before = clock();
      const result = await sweepArm(arm, { samples: round === 0 ? 9 : samples }, { pool: pools[k] });
      sink += result.rows[0]!.value;
      if (round === 0) continue;
      times[k].push(result.seconds);
      busy[k].push((clock() - before) / 1000);
    }
  }
  for (const pool of pools) pool.close();
  const [one, two] = [fastest(times[0]), fastest(times[1])];
  return (
    `  ${arm.name}, ${samples} samples a joint: one worker ${one.toFixed(2)} s, two ${two.toFixed(2)} s ` +
    `(${(one / two).toFixed(2)} times); processor time ${fastest(busy[0]).toFixed(2)} s and ${fastest(busy[1]).toFixed(2)} s; ` +
    `load of the machine ${loadavg()[0]!.toFixed(1)}`
  );
}

/** Asked for: 20 times the plain recursion, 40 times the outside engine, on the six-joint model, both bearings of every joint. */
export async function* sweepLines(): AsyncGenerator<string> {
  const six = sixJoints();
  const random = { ...randomArm(1, { joints: 6 }), name: 'random arm of six joints (seed 1)' };
  yield 'Grid sweep, radial load on both bearings of every joint (asked: 20 times and 40 times on the first line)';
  yield await compare(six, 13, true);
  yield await compare(tilted(six), 13, true);
  yield await compare(random, 13, true);
  yield await compare(six, 25, true);
  yield 'Grid sweep, every load check';
  yield await compare(six, 13, false);
  yield await compare(random, 13, false);
  if (sink === 0) throw new Error('nothing was computed');
}

/** Asked for: 1.8 times on two cores. */
export async function* workerLines(): AsyncGenerator<string> {
  yield 'Two workers against one (asked: 1.8 times on two idle cores)';
  yield await workers(tilted(sixJoints()), 25);
}
