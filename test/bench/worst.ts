/**
 * The certified worst: how long a proof takes. Times are processor time of this program (its compiler and collector included) with the time that
 * passed beside it, so that other work on the machine can be told; one thread unless said. Arms follow from fixed seeds.
 */
import { readFileSync } from 'node:fs';
import { loadavg } from 'node:os';
import type { Arm, Vec3 } from '../../src/arm/arm.ts';
import { withPair } from '../../src/arm/changeArm.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import type { CheckForm } from '../../src/mechanics/form.ts';
import { GravityClimb } from '../../src/mechanics/gravityClimb.ts';
import { gravityLoad } from '../../src/mechanics/gravityLoad.ts';
import { GravitySearch, gapOf } from '../../src/mechanics/gravitySearch.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import { runWorst } from '../../src/studies/worstRun.ts';
import { nodePool } from '../../src/worker/nodePool.ts';
import { turned } from '../armVariants.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';

/** Processor time of this program so far, s. */
function clock(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1e6;
}

interface Spent {
  readonly cpu: number;
  readonly wall: number;
}

function model(): Arm {
  const reading = readArm(readFileSync('models/six-joint.arm.json', 'utf8'));
  if (!reading.ok) throw new Error('the model has issues');
  return reading.arm;
}

const isRadial = (check: CheckForm) => check.check === 'radial' && check.bearing !== null;

function searchOf(arm: Arm, radialOnly: boolean): GravitySearch {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const checks = loadChecks(arm, chain).filter((check) => !radialOnly || isRadial(check));
  return new GravitySearch(chain, load, gravityLoad(chain, load)!, checks, new GravityClimb(chain, load));
}

const worstGap = (search: GravitySearch) => Math.max(...search.entries.map(gapOf));

/** Time until each of the gaps (falling) is closed for every check; null where it was not within `most` seconds. */
function timesTo(arm: Arm, radialOnly: boolean, gaps: readonly number[], most: number): readonly (Spent | null)[] {
  const start = clock();
  const begin = performance.now();
  const spent = (): Spent => ({ cpu: clock() - start, wall: (performance.now() - begin) / 1000 });
  const search = searchOf(arm, radialOnly);
  return gaps.map((gap) => {
    while (worstGap(search) > gap && search.open(gap) && spent().cpu < most) {
      search.round(gap, () => spent().cpu > most);
    }
    return worstGap(search) <= gap ? spent() : null;
  });
}

const seconds = (value: number) => {
  if (!Number.isFinite(value)) return 'not reached';
  return value < 0.0995 ? `${(1000 * value).toFixed(0)} ms` : `${value.toFixed(2)} s`;
};
const both = (spent: Spent | null) => (spent ? `${seconds(spent.cpu)} (passed ${seconds(spent.wall)})` : 'not reached');

function warmUp(): void {
  for (let seed = 1; seed <= 6; seed++) timesTo(randomArm(seed, { joints: 4 }), false, [0.01], 5);
}

function* sixJointLines(): Generator<string> {
  const whole = model();
  const arm = { ...whole, cases: whole.cases.slice(0, 1) };
  const chain = flattenArm(arm);
  const poses = Array.from(chain.from, (from, k) => Math.floor(((chain.to[k]! - from) * 180) / Math.PI + 1e-9) + 1);
  const grid = poses.reduce((product, count) => product * count, 1);
  yield `  six-joint model, case "${arm.cases[0]!.name}", the gap of every check closed to`;
  for (const radialOnly of [true, false]) {
    const [coarse, fine] = timesTo(arm, radialOnly, [0.03, 0.001], 60);
    yield `    ${radialOnly ? '12 radial loads' : 'all 60 load checks'}: 3 % in ${both(coarse!)}, 0.1 % in ${both(fine!)}`;
  }
  yield `    a grid of 1° has ${grid.toExponential(2)} poses, and proves nothing between them`;
}

function alongFirst(arm: Arm): Arm {
  const { axis, placement } = arm.joints[0]!;
  const [x, y, z] = turned(placement.rotation, axis);
  const gravity: Vec3 = [-9.80665 * x, -9.80665 * y, -9.80665 * z];
  return { ...arm, gravity };
}

const FAMILIES: readonly (readonly [string, Omit<RandomArmOptions, 'joints'>, (arm: Arm) => Arm])[] = [
  ['generic', {}, (arm) => arm],
  ['full turns', { full: 1 }, (arm) => arm],
  ['parallel axes', { parallel: 0.7 }, (arm) => arm],
  ['gravity along the first axis', {}, alongFirst],
];
const ARMS = 25;
const MOST = 30;

function quantile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)]!;
}

function* hundredLines(): Generator<string> {
  for (const radialOnly of [true, false]) {
    const what = radialOnly ? '12 radial loads' : 'all 60 load checks';
    yield `  100 random six-joint arms (seeds 1–${ARMS} of each kind), ${what}, processor time: median / 95 of 100 / worst`;
    const all: number[][] = [[], []];
    for (const [name, options, change] of FAMILIES) {
      const own: number[][] = [[], []];
      for (let seed = 1; seed <= ARMS; seed++) {
        const arm = change(randomArm(seed, { joints: 6, ...options }));
        timesTo(arm, radialOnly, [0.01, 0.001], MOST).forEach((spent, k) => {
          own[k]!.push(spent?.cpu ?? Number.POSITIVE_INFINITY);
        });
      }
      own.forEach((values, k) => {
        all[k]!.push(...values);
      });
      yield `    ${name.padEnd(28)} ${spread(own)}`;
    }
    const within = (times: readonly number[], limit: number) => times.filter((time) => time <= limit).length;
    yield `    ${'all'.padEnd(28)} ${spread(all)}`;
    yield `    ${within(all[1]!, 3)} of 100 to 0.1 % within 3 s, ${within(all[0]!, 10)} to 1 % within 10 s`;
  }
}

function spread([coarse, fine]: readonly (readonly number[])[]): string {
  const words = (values: readonly number[]) =>
    [0.5, 0.95, 1].map((share) => seconds(quantile(values, share))).join(' / ');
  return `1 % in ${words(coarse!)}; 0.1 % in ${words(fine!)}`;
}

const COUNTS = [3, 6, 9, 12] as const;
const CURVE_ARMS = 8;

function* jointsLines(): Generator<string> {
  for (const gap of [0.02, 0.005]) {
    const arms = `${CURVE_ARMS} generic arms each (seeds 101–${100 + CURVE_ARMS})`;
    yield `  joints against time, ${arms}, every radial load to ${100 * gap} %, median`;
    const times = COUNTS.map((joints) => {
      const each = Array.from({ length: CURVE_ARMS }, (_, k) => {
        const [spent] = timesTo(randomArm(101 + k, { joints }), true, [gap], 60);
        return spent?.cpu ?? Number.POSITIVE_INFINITY;
      });
      return { median: quantile(each, 0.5), most: quantile(each, 1) };
    });
    const longest = Math.max(...times.map(({ median }) => median));
    for (const [k, { median, most }] of times.entries()) {
      const bar = '█'.repeat(Math.max(1, Math.round((40 * median) / longest)));
      const figures = `${seconds(median).padStart(8)}  worst ${seconds(most).padStart(8)}`;
      yield `    ${String(COUNTS[k]).padStart(2)} joints  ${figures}  ${bar}`;
    }
    const power = (from: number, to: number) =>
      (Math.log(times[to]!.median / times[from]!.median) / Math.log(COUNTS[to]! / COUNTS[from]!)).toFixed(2);
    yield `    time grows as joints to the power ${power(0, 3)} from 3 to 12, ${power(1, 3)} from 6 to 12 (wanted: at most 3)`;
  }
}

async function* contractLines(): AsyncGenerator<string> {
  const arm = model();
  const pool = nodePool(2, new URL('nodeWorker.js', import.meta.url));
  const result = await runWorst(arm, { pool, gap: 0.005, seconds: 60 });
  pool.close();
  const open = result.rows.filter((row) => !(row.gap !== null && row.gap <= 0.005));
  const largest = Math.max(...result.rows.map((row) => row.gap ?? 1));
  yield `  six-joint model, ${arm.cases.length} cases, ${result.rows.length} checks, to 0.5 % with two workers`;
  const left = `${open.length} checks open, largest gap ${(100 * largest).toFixed(2)} %`;
  yield `    ${result.certified ? 'certified' : left} after ${seconds(result.seconds)} (wanted: certified in 10 s)`;
}

const ms = (value: number) => `${(1000 * value).toFixed(1)} ms`;

/** Time from a changed span of one joint to bounds of all its checks, and the gap that the coarse sphere leaves. */
function* spanLines(): Generator<string> {
  const whole = model();
  const arm = { ...whole, cases: whole.cases.slice(0, 1) };
  const chain = flattenArm(arm);
  let search = new WorstCase(chain, chain.cases[0]!, loadChecks(arm, chain));
  while (search.open(0.01)) search.step(0.01);
  search.rows();
  yield '  six-joint model, the span of one joint changed: arm to bounds on the coarse sphere, time passed (wanted: under 16 ms)';
  for (const [k, joint] of arm.joints.entries()) {
    const { support } = joint;
    if (!support || support.arrangement === 'ring') continue;
    const times: number[] = [];
    let gap = 0;
    for (let round = 0; round < 20; round++) {
      const wider = withPair(arm, k, { span: support.span * (1.01 + 0.01 * round) });
      const start = performance.now();
      const next = flattenArm(wider);
      search = new WorstCase(next, next.cases[0]!, loadChecks(wider, next), search);
      search.step(0.01);
      const rows = search.rows();
      times.push((performance.now() - start) / 1000);
      gap = Math.max(gap, ...rows.filter((row) => row.check.joint === k).map((row) => row.gap));
      while (search.open(0.01)) search.step(0.01);
      search.rows();
    }
    const figures = `median ${ms(quantile(times, 0.5))}, worst of 20 ${ms(quantile(times, 1))}`;
    yield `    ${joint.name.padEnd(14)} ${figures}; gap then up to ${(100 * gap).toFixed(1)} %`;
  }
}

/** Arms in motion: time until every gap is closed to 1 %, or the largest and the median gap when the time is up. */
function* motionLines(): Generator<string> {
  yield '  motion, radial loads on every bearing to 1 %, one thread, at most 20 s of processor time an arm';
  for (const file of ['swing-joint', 'two-link', 'picking-arm']) {
    const reading = readArm(readFileSync(`models/${file}.arm.json`, 'utf8'));
    if (!reading.ok) throw new Error('the model has issues');
    const { arm } = reading;
    const chain = flattenArm(arm);
    const load = chain.cases.find((each) => each.speed !== null)!;
    const start = clock();
    const search = new WorstCase(chain, load, loadChecks(arm, chain).filter(isRadial));
    while (search.open(0.01) && clock() - start < 20) search.step(0.01);
    const gaps = search.rows().map((row) => row.gap);
    const closed = gaps.filter((gap) => gap <= 0.01).length;
    const open = `largest gap ${(100 * quantile(gaps, 1)).toFixed(1)} %, median ${(100 * quantile(gaps, 0.5)).toFixed(1)} %`;
    yield `    ${file.padEnd(14)} ${chain.n} joints: ${closed} of ${gaps.length} closed in ${seconds(clock() - start)}; ${open}`;
  }
}

export async function* worstLines(): AsyncGenerator<string> {
  yield `certified worst (load on the machine ${loadavg()[0]!.toFixed(1)})`;
  warmUp();
  yield* sixJointLines();
  yield* spanLines();
  yield* hundredLines();
  yield* jointsLines();
  yield* contractLines();
  yield* motionLines();
}
