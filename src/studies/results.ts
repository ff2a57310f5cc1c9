/**
 * What the studies hand to the sheet, the report and the command line: plain data, SI and radians, serialisable. Vectors are in
 * the housing frame of their joint as the arm file has it. The joint load is what everything outboard puts ON the joint.
 */

export type BearingName = 'A' | 'B' | 'ring';
export type Triple = readonly [number, number, number];

/** The parts of a case that a pose leaves free, as they were taken for a result; null parts were not free. */
export interface FreeChoice {
  /** Unit vector of a tip force of direction `any`, base frame. */
  readonly tipForce: Triple | null;
  /** rad/s and rad/s² of each revolute joint, for a case with motion. */
  readonly speed: readonly number[] | null;
  readonly accel: readonly number[] | null;
}

export interface Wrench {
  /** N */
  readonly force: Triple;
  /** N·m about the joint origin */
  readonly moment: Triple;
}

export interface BearingLoad {
  /** Size of the radial load on the bearing, N; over the free parts of the case, the worst. */
  readonly radial: number;
  readonly radialVector: Triple;
  /** Along the joint axis, signed, N; 0 on a bearing that carries none. */
  readonly axial: number;
  /** Size of the tilting moment about the centre of a ring bearing, which carries it by itself, N·m; null for A and B. */
  readonly moment: number | null;
}

export interface PoseJoint extends Wrench {
  readonly joint: string;
  /** N·m, the joint load's moment about the axis. */
  readonly torque: number;
  readonly bearings: Partial<Readonly<Record<BearingName, BearingLoad>>>;
}

export interface PoseResult {
  readonly case: string;
  readonly pose: readonly number[];
  /** Words for what the case leaves free (then the joint load is without it, the bearing loads with its worst); null otherwise. */
  readonly free: string | null;
  readonly joints: readonly PoseJoint[];
}

export type Verdict = 'pass' | 'over' | 'unassessed';

/** One row of a sweep, a worst-pose search or an assessment. */
export interface CheckRow {
  /** Name of the joint, or of the arm where `jointIndex` is -1. */
  readonly joint: string;
  /** Index into the arm file's joints; -1: the row speaks for the arm as a whole (`system life`, `tip error`). */
  readonly jointIndex: number;
  readonly bearing: BearingName | null;
  readonly check: string;
  readonly unit: string;
  /** Attained at `pose` in `case`; NaN where it failed. */
  readonly value: number;
  readonly case: string;
  readonly pose: readonly number[];
  readonly free: FreeChoice | null;
  readonly wrench: Wrench;
  /** Nothing within the travel exceeds it; null where the study proves nothing (grid sweep). */
  readonly bound: number | null;
  /** (bound - value)/bound */
  readonly gap: number | null;
  readonly certified: boolean | null;
  /** Null where capacity is not known; then a verdict, if any, is `unassessed`. */
  readonly allowable: number | null;
  readonly utilisation: number | null;
  /** Null on pure load rows, which have nothing to be held against. */
  readonly verdict: Verdict | null;
  readonly reason: string | null;
  readonly source: string | null;
  /** Place on the part where the value stands, such as `hub`; only where a check looks at several. */
  readonly where?: string;
}

/**
 * Whether a row stands for a check that could not even be computed for want of data: `unassessed`, no value (NaN) and no pose. Its reason
 * says what to fill in. Any other row whose value is not a number is a failure.
 */
export function isMissing(row: CheckRow): boolean {
  return row.verdict === 'unassessed' && row.pose.length === 0 && Number.isNaN(row.value);
}

/** Whether the row's value is a time that should be long: then its allowable is the least that is asked for. */
export function moreIsBetter(row: Pick<CheckRow, 'check'>): boolean {
  return /\blife$/.test(row.check);
}

/** The share of the allowable that the value found takes up: demand over allowable, or of a life the one asked for over it; null where none. */
export function attainedShare(row: Pick<CheckRow, 'check' | 'value' | 'allowable'>): number | null {
  if (row.allowable === null || !(row.allowable > 0)) return null;
  return moreIsBetter(row) ? row.allowable / row.value : row.value / row.allowable;
}

export interface SweepResult {
  /** Poses of the whole grid (per case). */
  readonly poses: number;
  /** Poses assessed; less than `poses` where the sweep was stopped. */
  readonly done: number;
  readonly partial: boolean;
  readonly seconds: number;
  /** Worst over all cases. */
  readonly rows: readonly CheckRow[];
  readonly eachCase: readonly CheckRow[];
}
