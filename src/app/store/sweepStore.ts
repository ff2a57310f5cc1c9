/** The grid sweep behind the worst loads of the sheet: what is asked, how far it is, what it found and whether that still holds. */
import { create } from 'zustand';
import type { LoadCase } from '../../arm/arm.ts';
import type { ArmFile } from '../../arm/armFile.ts';
import { gridOf } from '../../mechanics/gridSweepGrid.ts';
import { gridRefusalText } from '../../report/gridText.ts';
import type { CheckRow } from '../../studies/results.ts';
import { type ArmOnSheet, armOf, presentArm, useDocument } from './documentStore.ts';
import { type SweepRun, type Swept, startSweep } from './runs.ts';

export type SweepStatus = 'idle' | 'running' | 'done' | 'stopped' | 'failed';

export interface SweepState {
  /** Step of the grid, rad; null: the finest of `STEPS_DEG` that keeps a sweep at every edit short. */
  readonly step: number | null;
  /** Case to sweep; null: all. */
  readonly case: string | null;
  readonly status: SweepStatus;
  readonly done: number;
  readonly total: number;
  readonly result: Swept | null;
  /** What `result` was made of; where that is not the present arm and what is asked now, it is out of date. */
  readonly of: ArmFile | null;
  readonly ofStep: number;
  readonly ofCase: string | null;
  /** The cases in `result`: all that were asked, or those that could be swept without being asked. */
  readonly ofCases: readonly string[];
  readonly trouble: string | null;
}

/** Degrees that divide most travels evenly. */
const STEPS_DEG = [1, 2, 3, 5, 6, 10, 15, 20, 30, 45, 60, 90, 180];
/** Work that a sweep may take without being asked for, in poses of a case at rest under fixed loads: about half a second on one core. */
const UNASKED = 500_000;
/** What a pose costs where the tip force may point anywhere; in motion it costs more than is done without being asked (measured). */
const ANY_COST = 500;

export const useSweep = create<SweepState>(() => ({
  step: null,
  case: null,
  status: 'idle',
  done: 0,
  total: 0,
  result: null,
  of: null,
  ofStep: 0,
  ofCase: null,
  ofCases: [],
  trouble: null,
}));

const rad = (deg: number) => (deg * Math.PI) / 180;

/** Cases that are asked for by name, or all. */
function askedCases(file: ArmFile, name: string | null): readonly LoadCase[] {
  const { cases } = armOf(file).arm;
  const named = cases.filter((load) => load.name === name);
  return named.length > 0 ? named : cases;
}

/** Of those asked for, the ones that are swept without a press of the button: all at rest. */
function unaskedCases(file: ArmFile, name: string | null): readonly LoadCase[] {
  return askedCases(file, name).filter((load) => !load.motion);
}

/** Poses of the grid times the cost of the cases swept unasked; infinite where the grid is refused or no case is left. */
function work(file: ArmFile, step: number, name: string | null): number {
  const outcome = gridOf(armOf(file).chain, { step });
  const cases = unaskedCases(file, name);
  if (!outcome.ok || cases.length === 0) return Number.POSITIVE_INFINITY;
  const cost = (load: LoadCase) => (load.tipForce?.direction === 'any' ? ANY_COST : 1);
  return outcome.grid.poses * cases.reduce((sum, load) => sum + cost(load), 0);
}

/** The step in force, rad. */
export function stepFor(file: ArmFile, state: Pick<SweepState, 'step' | 'case'> = useSweep.getState()): number {
  if (state.step !== null) return state.step;
  const fits = STEPS_DEG.find((deg) => work(file, rad(deg), state.case) <= UNASKED);
  return rad(fits ?? 90);
}

/** Cases that are swept without being asked, by name. */
export function unaskedNames(file: ArmFile, name: string | null): readonly string[] {
  return unaskedCases(file, name).map((load) => load.name);
}

let run: SweepRun | null = null;
let turn = 0;
/** The arm being swept. */
let sweeping: ArmFile | null = null;

export function stopSweep(): void {
  run?.stop();
}

/** Ends a sweep whose answer is not wanted any more. */
function dropSweep(): void {
  turn++;
  run?.stop();
  run = null;
  useSweep.setState({ status: 'idle', done: 0, total: 0 });
}

/** Sweeps all cases asked for, however long it takes. */
export function sweepNow(): void {
  const sheet = presentArm();
  if (sheet) sweep(sheet, askedCases(sheet.file, useSweep.getState().case));
}

/** Sweeps the present arm; a sweep under way is dropped, its answer never shown. */
function sweep(sheet: ArmOnSheet, loads: readonly LoadCase[]): void {
  run?.stop();
  const state = useSweep.getState();
  const name = state.case !== null && sheet.arm.cases.some((load) => load.name === state.case) ? state.case : null;
  const step = stepFor(sheet.file, { step: state.step, case: name });
  const cases = loads.map((load) => load.name);
  const mine = ++turn;
  const grid = gridOf(sheet.chain, { step });
  if (!grid.ok) {
    run = null;
    useSweep.setState({ case: name, status: 'failed', done: 0, total: 0, trouble: gridRefusalText(grid.refusal) });
    return;
  }
  const { poses } = grid.grid;
  sweeping = sheet.file;
  useSweep.setState({ case: name, status: 'running', done: 0, total: poses, trouble: null });
  run = startSweep(sheet.arm, { step, cases, poses }, (done, total) => {
    if (turn === mine) useSweep.setState({ done, total });
  });
  run.result.then(
    (result) => {
      if (turn !== mine) return;
      run = null;
      useSweep.setState({
        result,
        of: sheet.file,
        ofStep: step,
        ofCase: name,
        ofCases: cases,
        status: result.partial ? 'stopped' : 'done',
        done: result.done,
        total: result.poses,
      });
    },
    (error: unknown) => {
      if (turn !== mine) return;
      run = null;
      useSweep.setState({ status: 'failed', trouble: error instanceof Error ? error.message : String(error) });
    },
  );
}

function sweepUnasked(): void {
  const sheet = presentArm();
  if (sheet) sweep(sheet, unaskedCases(sheet.file, useSweep.getState().case));
}

/** Whether sweeping `file` is short enough to do without being asked. */
function short(file: ArmFile): boolean {
  const { step, case: name } = useSweep.getState();
  return work(file, stepFor(file, { step, case: name }), name) <= UNASKED;
}

/**
 * Follows every edit, a drag included, where a sweep is short work; else the result on the sheet is marked out of date. While one
 * is under way the next waits for it, so that a drag shows loads as it goes and not only when it ends.
 */
export function sweepAfterEdits(): void {
  const follow = () => {
    const { status, of } = useSweep.getState();
    const file = presentArm()?.file;
    if (!file || file === of || status === 'running' || !short(file)) return;
    sweepUnasked();
  };
  useDocument.subscribe((state, before) => {
    if (state.file === before.file && state.draft === before.draft) return;
    // A drag lets each sweep end; another arm, or an edit that stays, is not kept waiting.
    if (useSweep.getState().status === 'running' && state.file !== before.file && sweeping !== state.file) dropSweep();
    follow();
  });
  useSweep.subscribe((state, before) => {
    if (before.status === 'running' && state.status === 'done') follow();
  });
}

/** Asks for another grid or other cases; swept at once where that is short work. */
export function askSweep(change: Partial<Pick<SweepState, 'step' | 'case'>>): void {
  useSweep.setState(change);
  const file = presentArm()?.file;
  if (file && short(file)) sweepUnasked();
}

/** Whether the result on the sheet answers what is asked now. */
export function isCurrent(state: SweepState, file: ArmFile): boolean {
  return state.of === file && state.ofStep === stepFor(file, state) && state.ofCase === state.case;
}

/** The row of one check; undefined where there is none. */
export function rowOf(
  rows: readonly CheckRow[] | undefined,
  joint: number,
  bearing: CheckRow['bearing'],
  check: string,
): CheckRow | undefined {
  return rows?.find((row) => row.jointIndex === joint && row.bearing === bearing && row.check === check);
}

/** Cases that the result was asked for and does not have yet, by name. */
export function casesWaiting({ arm }: ArmOnSheet, state: Pick<SweepState, 'ofCase' | 'ofCases'>): readonly string[] {
  return arm.cases
    .filter((load) => (state.ofCase === null || load.name === state.ofCase) && !state.ofCases.includes(load.name))
    .map((load) => load.name);
}
