/**
 * Capacity against load: the checks of `capacity/checks` at one pose, or joined to the rows of a sweep or of the certified worst. A check that
 * cannot be assessed keeps its row and says what to fill in.
 */
import type { Arm } from '../arm/arm.ts';
import { type CapacityCheck, capacityChecks, demandAt, placeAt } from '../capacity/index.ts';
import { rotateBack3 } from '../math/vector.ts';
import { type Chain, type ChainCase, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import type { CheckForm } from '../mechanics/form.ts';
import { type FreeWorst, freePart, hasFree, newFreeWorst } from '../mechanics/freeLoads.ts';
import { newPoseLoad, type PoseLoad, poseLoad, poseLoadScratch } from '../mechanics/freeLoadsPose.ts';
import { looseForms, type QuickScratch, quickScratch, worstAndBound } from './assessFree.ts';
import { judge, type Scope } from './assessVerdict.ts';
import { type CheckRow, isMissing, type Wrench } from './results.ts';
import { NOWHERE } from './rowsWithoutPose.ts';

/** What an arm's parts can take, prepared once for any number of poses and rows. It holds functions: a worker makes its own. */
export interface ArmCapacity {
  readonly checks: readonly CapacityCheck[];
  /** Of each check, its forms one by one, for cases that leave something free. */
  readonly forms: readonly (readonly CheckForm[])[];
  /** Rows of what cannot be computed for want of data. */
  readonly missing: readonly CheckRow[];
}

export function armCapacity(arm: Arm, chain: Chain): ArmCapacity {
  const checks = capacityChecks(arm, chain);
  return { checks, forms: checks.map(looseForms), missing: missingRows(arm, checks) };
}

export interface PoseAssessment {
  readonly case: string;
  readonly rows: readonly CheckRow[];
}

/**
 * Every check at one pose ([n] rad), for the named cases in the order of the arm (default: all). Over what a case leaves free each check
 * takes its own worst; checks without a convex form are left out there. `capacity`: of this arm.
 */
export function assessPose(
  arm: Arm,
  chain: Chain,
  capacity: ArmCapacity,
  pose: readonly number[],
  caseNames: readonly string[] | null = null,
): readonly PoseAssessment[] {
  if (pose.length !== chain.n) throw new RangeError(`a pose of ${pose.length} angles for ${chain.n} joints`);
  const at = newPoseLoad(chain.n);
  const scratch = poseLoadScratch(chain.n);
  const found = newFreeWorst(chain.n);
  const freely = quickScratch(chain.n);
  return chain.cases
    .filter((load) => !caseNames || caseNames.includes(load.name))
    .map((load) => {
      poseLoad(chain, load, pose, at, scratch);
      const rows = capacity.checks.flatMap((check, k) => {
        const upper = takeWorst(check, capacity.forms[k]!, load, at, found, freely);
        return upper === null ? [] : [poseRow(arm, chain, check, load, pose, found, upper)];
      });
      return { case: load.name, rows: byJoint([...rows, ...capacity.missing]) };
    });
}

/**
 * Leaves the worst choice of the free parts and its joint load in `found` and returns what nothing at the pose exceeds; null where the check
 * cannot be taken over free parts.
 */
function takeWorst(
  check: CapacityCheck,
  forms: readonly CheckForm[],
  load: ChainCase,
  at: PoseLoad,
  found: FreeWorst,
  scratch: QuickScratch,
): number | null {
  if (hasFree(load)) {
    return check.form ? worstAndBound(check.form, forms, check.allowable, load, at, found, scratch) : null;
  }
  if (!check.form && !check.atPose) return null;
  found.wrench.set(at.fixed.subarray(WRENCH * check.joint, WRENCH * check.joint + WRENCH));
  return demandAt(check, found.wrench, 0);
}

function poseRow(
  arm: Arm,
  chain: Chain,
  check: CapacityCheck,
  load: ChainCase,
  pose: readonly number[],
  found: FreeWorst,
  upper: number,
): CheckRow {
  const value = demandAt(check, found.wrench, 0);
  const place = placeAt(check, found.wrench, 0);
  return {
    ...head(arm, check),
    value,
    case: load.name,
    pose: [...pose],
    free: freePart(load, found),
    wrench: fileWrench(chain, check.joint, found.wrench),
    allowable: check.allowable,
    ...judge(check, value, Number.isNaN(upper) ? upper : Math.max(value, upper), 'pose'),
    source: check.source,
    ...(place === null ? {} : { where: place }),
  };
}

function head(arm: Arm, check: CapacityCheck) {
  return {
    joint: arm.joints[check.jointIndex]!.name,
    jointIndex: check.jointIndex,
    bearing: check.bearing,
    check: check.check,
    unit: check.unit,
    bound: null,
    gap: null,
    certified: null,
  } as const;
}

function fileWrench(chain: Chain, joint: number, wrench: Float64Array): Wrench {
  const out = new Float64Array(WRENCH);
  wrenchToFile(chain, joint, wrench, 0, out);
  return { force: [out[0]!, out[1]!, out[2]!], moment: [out[3]!, out[4]!, out[5]!] };
}

/** The joint load of a row, back in the canonical housing frame that checks read. */
function canonicalWrench(chain: Chain, joint: number, { force, moment }: Wrench): Float64Array {
  const out = new Float64Array(WRENCH);
  rotateBack3(out, 0, chain.housing, 9 * joint, force, 0);
  rotateBack3(out, 3, chain.housing, 9 * joint, moment, 0);
  return out;
}

export interface JoinOptions {
  /** Default: the whole travel where a row has a bound, else a grid. `part of the grid` for a sweep that was stopped. */
  readonly scope?: Scope;
  /** Gap asked of the search; rows whose demand lies below their safe form are certified anew by it. */
  readonly gap?: number;
}

/**
 * Gives the rows of a sweep or of the certified worst their verdicts. A row whose joint, bearing and name match a check is held against it;
 * other rows (pure loads) stay as they are. Where a check's form only lies above its demand, `value` becomes the demand at the row's pose,
 * which is attained, and the gap grows to it.
 */
export function rowsWithVerdict(
  chain: Chain,
  rows: readonly CheckRow[],
  checks: readonly CapacityCheck[],
  options: JoinOptions = {},
): readonly CheckRow[] {
  const byKey = new Map(checks.map((check) => [key(check), check]));
  return rows.map((row) => {
    const check = byKey.get(key(row));
    return check ? joined(chain, row, check, options) : row;
  });
}

/** The check that a row is held against, with its rule and notes; null for a pure load row. */
export function checkOf(checks: readonly CapacityCheck[], row: CheckRow): CapacityCheck | null {
  return checks.find((check) => key(check) === key(row)) ?? null;
}

function key(of: Pick<CheckRow, 'jointIndex' | 'bearing' | 'check'>): string {
  return `${of.jointIndex} ${of.bearing} ${of.check}`;
}

function joined(chain: Chain, row: CheckRow, check: CapacityCheck, options: JoinOptions): CheckRow {
  // Not looked at: the row says why.
  if (isMissing(row)) return { ...row, allowable: check.allowable, source: check.source };
  const scope = options.scope ?? (row.bound === null ? 'grid' : 'travel');
  const wrench = canonicalWrench(chain, check.joint, row.wrench);
  const value = check.atPose && !Number.isNaN(row.value) ? check.atPose(wrench, 0) : row.value;
  const upper = Math.max(row.bound ?? row.value, value);
  const gap = row.bound === null || value === row.value ? row.gap : row.bound > 0 ? (row.bound - value) / row.bound : 0;
  const enough = options.gap ?? row.gap ?? 0;
  const place = placeAt(check, wrench, 0);
  return {
    ...row,
    value,
    gap,
    certified: row.certified === null || gap === row.gap ? row.certified : gap !== null && gap <= enough,
    allowable: check.allowable,
    ...judge(check, value, upper, scope),
    source: check.source,
    ...(place === null ? {} : { where: place }),
  };
}

/** A row for every check that cannot be computed at all. What only a duty can tell has rows of its own (`dutyRows`). */
function missingRows(arm: Arm, checks: readonly CapacityCheck[]): readonly CheckRow[] {
  const missing = checks.filter((check) => !check.form && !check.atPose);
  return missing.map((check) => ({
    ...head(arm, check),
    value: Number.NaN,
    case: '',
    pose: [],
    free: null,
    wrench: NOWHERE,
    allowable: null,
    utilisation: null,
    verdict: 'unassessed',
    reason: check.unassessed,
    source: null,
  }));
}

/** Rows of one joint together, joints from ground to tip, those of the whole arm last, else in the order given. */
export function byJoint(rows: readonly CheckRow[]): readonly CheckRow[] {
  const place = ({ jointIndex }: CheckRow) => (jointIndex < 0 ? Number.POSITIVE_INFINITY : jointIndex);
  return rows
    .map((row, i) => ({ row, i }))
    .sort((a, b) => (place(a.row) === place(b.row) ? a.i - b.i : place(a.row) - place(b.row)))
    .map(({ row }) => row);
}

/** Everything about capacity that a list of rows can say: verdicts joined, checks that cannot be computed added, joints in order. */
export function assessRows(
  chain: Chain,
  capacity: ArmCapacity,
  rows: readonly CheckRow[],
  options: JoinOptions = {},
): readonly CheckRow[] {
  return byJoint([...rowsWithVerdict(chain, rows, capacity.checks, options), ...capacity.missing]);
}
