/** Check rows in the contract's JSON shape, and the exit code they ask for. */
import { degrees } from '../report/shown.ts';
import { type CheckRow, isMissing, moreIsBetter } from '../studies/results.ts';
import { WHOLE_ARM } from '../studies/rowsWithoutPose.ts';
import { fromSI } from '../units/unit.ts';
import { EXIT, type ExitCode } from './exit.ts';
import { warn } from './output.ts';

type Json = Readonly<Record<string, unknown>>;

/** One row. Keys about a bound or a capacity stand only where the row has them. */
export function rowObject(row: CheckRow): Json {
  const { free } = row;
  return {
    bearing: row.bearing,
    check: row.check,
    value: row.value,
    unit: row.unit,
    ...(row.where ? { where: row.where } : {}),
    pose_deg: row.pose.map(degrees),
    case: row.case,
    wrench: { force_N: row.wrench.force, moment_Nm: row.wrench.moment },
    ...(free
      ? {
          free: {
            ...(free.tipForce ? { tip_force_base: free.tipForce } : {}),
            ...(free.speed ? { speed_deg_s: free.speed.map((v) => fromSI(v, '°/s')) } : {}),
            ...(free.accel ? { accel_deg_s2: free.accel.map((v) => fromSI(v, '°/s²')) } : {}),
          },
        }
      : {}),
    ...(row.bound === null ? {} : { found: row.value, bound: row.bound, gap: row.gap, certified: row.certified }),
    ...(row.verdict === null
      ? {}
      : {
          allowable: row.allowable,
          utilisation: row.utilisation,
          verdict: row.verdict,
        }),
    ...(row.reason ? { reason: row.reason } : {}),
    ...(row.source ? { source: row.source } : {}),
  };
}

/** Rows gathered under their joints, in order. */
export function jointObjects(rows: readonly CheckRow[]): readonly Json[] {
  const joints = new Map<number, { joint: string; checks: Json[] }>();
  for (const row of rows) {
    if (row.jointIndex === WHOLE_ARM) continue;
    const entry = joints.get(row.jointIndex) ?? { joint: row.joint, checks: [] };
    joints.set(row.jointIndex, entry);
    entry.checks.push(rowObject(row));
  }
  return [...joints.values()];
}

/** Rows that belong to no joint: system life, tip error. */
export function armObjects(rows: readonly CheckRow[]): readonly Json[] {
  return rows.filter((row) => row.jointIndex === WHOLE_ARM).map(rowObject);
}

/** A life without end is a value; any other endless value is a failure, like one that is not a number. */
function isFailed(row: CheckRow): boolean {
  if (isMissing(row)) return false;
  return Number.isNaN(row.value) || (!Number.isFinite(row.value) && !moreIsBetter(row));
}

/**
 * 1 where a check is over its limit or could not be computed; with `strict` also where one was not assessed, or where nothing was
 * held against a limit at all. A `pass` with a utilisation above 1 or none does not count as one.
 */
export function exitOf(rows: readonly CheckRow[], strict: boolean): ExitCode {
  const failed = rows.filter(isFailed);
  const judged = rows.filter((row) => row.verdict !== null);
  const over = judged.filter(
    (row) => row.verdict === 'over' || (row.verdict === 'pass' && !(row.utilisation !== null && row.utilisation <= 1)),
  );
  const unassessed = judged.filter((row) => row.verdict === 'unassessed');
  if (failed.length > 0) warn(`${counted(failed.length)} could not be computed`);
  if (over.length > 0) warn(`${counted(over.length)} over the limit`);
  if (strict && unassessed.length > 0) warn(`${counted(unassessed.length)} not assessed (--strict)`);
  if (strict && judged.length === 0) warn('nothing was held against a limit (--strict)');
  const missed = strict && (unassessed.length > 0 || judged.length === 0);
  return failed.length > 0 || over.length > 0 || missed ? EXIT.over : EXIT.pass;
}

function counted(count: number): string {
  return count === 1 ? '1 check' : `${count} checks`;
}
