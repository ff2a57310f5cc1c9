/** The two ways of the selected joint: what each would carry at worst, worked out while the panel is open. */
import { create } from 'zustand';
import type { CompareResult } from '../../studies/compareArm.ts';
import type { CompareOptions } from '../../studies/comparePlan.ts';
import type { ArmOnSheet } from './documentStore.ts';
import { type CompareRun, startCompare } from './runs.ts';
import { stepFor, unaskedNames, useSweep } from './sweepStore.ts';

export interface CompareState {
  readonly options: CompareOptions;
  readonly running: boolean;
  readonly result: CompareResult | null;
  readonly trouble: string | null;
}

export const useCompare = create<CompareState>(() => ({ options: {}, running: false, result: null, trouble: null }));

export function setCompareOptions(change: CompareOptions): void {
  useCompare.setState((state) => ({ options: { ...state.options, ...change } }));
}

/** The numbers of one joint mean nothing for the next. */
export function forgetCompareOptions(): void {
  useCompare.setState({ options: {}, result: null, trouble: null });
}

let run: CompareRun | null = null;
let turn = 0;

/** Compares joint `joint` (its name) over the same grid as the sweep; an older comparison under way is dropped. */
export function compareNow(sheet: ArmOnSheet, joint: string): void {
  run?.stop();
  const mine = ++turn;
  const { options } = useCompare.getState();
  const { case: name, of, ofCases } = useSweep.getState();
  const cases = of === sheet.file ? ofCases : unaskedNames(sheet.file, name);
  useCompare.setState({ running: true, trouble: null });
  run = startCompare(sheet.arm, joint, options, {
    step: stepFor(sheet.file),
    cases: cases.length > 0 ? cases : sheet.arm.cases.map((load) => load.name),
  });
  run.result.then(
    (result) => {
      if (turn !== mine) return;
      const refused = 'refused' in result ? result.refused : null;
      useCompare.setState({ running: false, result: 'refused' in result ? null : result, trouble: refused });
    },
    (error: unknown) => {
      if (turn !== mine) return;
      useCompare.setState({
        running: false,
        result: null,
        trouble: error instanceof Error ? error.message : String(error),
      });
    },
  );
}

export function stopCompare(): void {
  turn++;
  run?.stop();
  run = null;
}
