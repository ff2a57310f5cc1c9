/** Life over the duty, fatigue, play and tip error of the arm that rests on the sheet: worked out in a worker a moment after each edit. */
import { create } from 'zustand';
import type { ArmFile } from '../../arm/armFile.ts';
import { LASTING_PARTS, type LastingPart, lastingPending } from '../../studies/lastingRows.ts';
import type { CheckRow } from '../../studies/results.ts';
import { armOf, useDocument } from './documentStore.ts';
import { type LastingRun, startLasting } from './runs.ts';

type Parts = Partial<Readonly<Record<LastingPart, readonly CheckRow[]>>>;

export interface LastingState {
  readonly of: ArmFile | null;
  /** Parts that are worked out of `of`. */
  readonly parts: Parts;
  readonly trouble: string | null;
}

/** A moment of rest after the last edit. */
const REST_MS = 350;

export const useLasting = create<LastingState>(() => ({ of: null, parts: {}, trouble: null }));

let run: LastingRun | null = null;
let turn = 0;

function workOut(file: ArmFile): void {
  run?.stop();
  const mine = ++turn;
  useLasting.setState({ of: file, parts: {}, trouble: null });
  run = startLasting(armOf(file).arm, (part, rows) => {
    if (turn === mine) useLasting.setState(({ parts }) => ({ parts: { ...parts, [part]: rows } }));
  });
  run.result.then(
    () => {
      if (turn === mine) run = null;
    },
    (error: unknown) => {
      if (turn !== mine) return;
      run = null;
      useLasting.setState({ trouble: error instanceof Error ? error.message : String(error) });
    },
  );
}

/** Whether the parts of a file are known or on their way; an undo may come back to one whose work was stopped half way. */
function inHand(file: ArmFile): boolean {
  const { of, parts, trouble } = useLasting.getState();
  if (of !== file) return false;
  return run !== null || trouble !== null || LASTING_PARTS.every((part) => parts[part] !== undefined);
}

/** Follows every edit that stays; what is being dragged is not kept up with. */
export function lastingAfterEdits(): void {
  let wait: ReturnType<typeof setTimeout> | undefined;
  useDocument.subscribe((state, before) => {
    if (state.file === before.file && state.draft === before.draft) return;
    clearTimeout(wait);
    const { file, draft } = state;
    if (!file || draft || inHand(file)) return;
    turn++;
    run?.stop();
    run = null;
    wait = setTimeout(() => workOut(file), REST_MS);
  });
}

const WAITING = 'being worked out';

/** The rows of an arm as far as they are known; what is not there yet is unassessed and says so. */
export function lastingOf(file: ArmFile, { of, parts, trouble }: LastingState): readonly CheckRow[] {
  const { arm, chain } = armOf(file);
  const reason = of === file && trouble !== null ? `could not be worked out: ${trouble}` : WAITING;
  return LASTING_PARTS.flatMap((part) => {
    const known = of === file ? parts[part] : undefined;
    return known ?? lastingPending(arm, chain, part, reason);
  });
}
