/**
 * The worst of every check over a grid of poses: value, pose, case and the whole joint load there.
 *
 * Ties: values that agree to within rounding count as equal (see `gridSweepLeaders`); of these the lowest case governs, then the lowest
 * pose of the grid. The value of a row is that of the plain recursion at its pose; for a case that leaves something free, the worst
 * over it by `worstOverFree`, with the choice that attains it.
 */
import type { Arm } from '../arm/arm.ts';
import { type Chain, flattenArm, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import { type CheckForm, checkValue } from '../mechanics/form.ts';
import { type FreePart, freePart, hasFree, worstAtPose } from '../mechanics/freeLoads.ts';
import { type Grid, type GridChoice, gridOf, poseAt } from '../mechanics/gridSweepGrid.ts';
import { TIE } from '../mechanics/gridSweepLeaders.ts';
import { planSweep, SweepMerge, type SweepPlan, sweepJob, sweepSeedJob } from '../mechanics/gridSweepPlan.ts';
import type { JobPool } from '../mechanics/job.ts';
import { loadChecks } from '../mechanics/loadChecks.ts';
import { poseScratch, staticLoads } from '../mechanics/newtonEuler.ts';
import type { CheckRow, SweepResult } from './results.ts';
import { NOWHERE } from './rowsWithoutPose.ts';

export interface SweepOptions {
  readonly pool: JobPool;
  /** Names of the cases to sweep, in the order of the arm; null or left out: all. A name that no case has selects nothing. */
  readonly cases?: readonly string[] | null;
  /** Left out or null: `loadChecks` of the arm. */
  readonly checks?: readonly CheckForm[] | null;
  /** Poses looked at (per case), of all. */
  readonly onProgress?: ((done: number, poses: number) => void) | undefined;
  /** Stops the sweep between chunks; the result is then partial. */
  readonly signal?: AbortSignal | undefined;
}

/**
 * Sweeps the grid of `choice`. One row a check over all cases, and one a check and case (in the order of checks, then of cases).
 * Rows of checks of which no pose was looked at before a stop have no pose and the value NaN, and are unassessed; a value that failed at
 * any pose is NaN, with the first such pose. Throws a RangeError on a choice that `gridOf` refuses, and where no case is left.
 */
export async function sweepArm(arm: Arm, choice: GridChoice, options: SweepOptions): Promise<SweepResult> {
  const started = performance.now();
  const whole = flattenArm(arm);
  const { cases: names = null } = options;
  const cases = whole.cases.filter((load) => !names || names.includes(load.name));
  if (cases.length === 0) throw new RangeError('a sweep needs at least one case');
  const chain: Chain = { ...whole, cases };
  const outcome = gridOf(chain, choice);
  if (!outcome.ok) throw new RangeError(`a grid of ${outcome.refusal.poses} poses was refused`);
  const { grid } = outcome;
  const checks = options.checks ?? loadChecks(arm, chain);
  const plan = planSweep(chain, checks, grid);
  const merge = await runSweep(plan, options);
  const eachCase = checks.flatMap((_, c) => cases.map((_, k) => caseRow(plan, merge, c, k)));
  const rows = checks.map((_, c) => worstRow(plan, c, eachCase.slice(c * cases.length, (c + 1) * cases.length)));
  return {
    poses: grid.poses,
    done: merge.done,
    partial: merge.done < grid.poses,
    seconds: (performance.now() - started) / 1000,
    rows,
    eachCase,
  };
}

async function runSweep(plan: SweepPlan, options: SweepOptions): Promise<SweepMerge> {
  const { pool, onProgress, signal } = options;
  const stop = signal ? { signal } : {};
  const merge = new SweepMerge(plan);
  const seeds: Float64Array[] = [];
  const first = await pool.run({
    kind: sweepSeedJob,
    shared: plan,
    chunks: plan.chain.cases.length,
    input: (chunk) => chunk,
    onOutput: (chunk, packed) => {
      seeds[chunk] = packed;
      merge.addSeed(chunk, packed);
    },
    ...stop,
  });
  if (first.stopped) return merge;
  await pool.run({
    kind: sweepJob,
    shared: { plan, seeds },
    chunks: plan.chunks,
    input: (chunk) => chunk,
    onOutput: (chunk, packed) => {
      merge.add(chunk, packed);
      onProgress?.(merge.done, plan.grid.poses);
    },
    ...stop,
  });
  return merge;
}

function caseRow(plan: SweepPlan, merge: SweepMerge, c: number, k: number): CheckRow {
  const { chain, grid, checks } = plan;
  const check = checks[c]!;
  const load = chain.cases[k]!;
  const { index, failed } = merge.governing(k, c);
  const common = {
    joint: chain.names[check.joint]!,
    jointIndex: chain.jointIndex[check.joint]!,
    bearing: check.bearing,
    check: check.check,
    unit: check.unit,
    case: load.name,
    bound: null,
    gap: null,
    certified: null,
    allowable: null,
    utilisation: null,
    source: null,
  };
  if (index < 0) {
    const reason = 'the sweep was stopped before any pose was looked at';
    return { ...common, value: Number.NaN, pose: [], free: null, wrench: NOWHERE, verdict: 'unassessed', reason };
  }
  const at = valueAt(chain, grid, check, k, index);
  const file = new Float64Array(WRENCH);
  wrenchToFile(chain, check.joint, at.wrench, 0, file);
  return {
    ...common,
    value: failed ? Number.NaN : at.value,
    pose: [...at.pose],
    free: at.free,
    wrench: { force: [file[0]!, file[1]!, file[2]!], moment: [file[3]!, file[4]!, file[5]!] },
    verdict: null,
    reason: failed ? 'the load is not a finite number at this pose' : null,
  };
}

interface ValueAt {
  readonly value: number;
  readonly pose: Float64Array;
  readonly wrench: Float64Array;
  readonly free: FreePart | null;
}

function valueAt(chain: Chain, grid: Grid, check: CheckForm, k: number, index: number): ValueAt {
  const load = chain.cases[k]!;
  const pose = new Float64Array(chain.n);
  poseAt(grid, index, pose);
  if (hasFree(load)) {
    const worst = worstAtPose(chain, load, pose, check);
    return { value: worst.value, pose, wrench: worst.wrench, free: freePart(load, worst) };
  }
  const loads = new Float64Array(WRENCH * chain.n);
  staticLoads(chain, load, pose, loads, poseScratch(chain.n));
  const wrench = loads.slice(WRENCH * check.joint, WRENCH * (check.joint + 1));
  return { value: checkValue(check, wrench, 0), pose, wrench, free: null };
}

/** Over the cases: a failed value first, then the largest, the lowest case among those that count as equal to it. */
function worstRow(plan: SweepPlan, c: number, rows: readonly CheckRow[]): CheckRow {
  const failed = rows.find((row) => row.pose.length > 0 && Number.isNaN(row.value));
  if (failed) return failed;
  const seen = rows.filter((row) => row.pose.length > 0);
  const most = Math.max(...seen.map((row) => row.value));
  const count = plan.checks.length;
  const size = Math.max(...plan.chain.cases.map((_, k) => plan.sizes[count * k + c]!));
  const tie = Number.isFinite(size) ? TIE * size : 0;
  return seen.find((row) => row.value >= most - tie) ?? rows[0]!;
}
