/** The proof that nothing within the travel exceeds what was found by more than a small gap; it runs whenever the arm rests. */
import { create } from 'zustand';
import type { ArmFile } from '../../arm/armFile.ts';
import type { WorstResult } from '../../studies/worstArm.ts';
import type { EarlierWorst } from '../../studies/worstKept.ts';
import { armOf, useDocument } from './documentStore.ts';
import { type ProofRun, startProof } from './runs.ts';

export type ProofStatus = 'idle' | 'running' | 'ended' | 'stopped' | 'failed';

export interface ProofState {
  readonly gap: number;
  readonly status: ProofStatus;
  /** The best so far; its rows are empty before the first answer. */
  readonly best: WorstResult | null;
  readonly of: ArmFile | null;
  readonly trouble: string | null;
}

/** Asked for without being asked: quick for most arms, and the rest says how far it came. */
const GAP = 0.01;
const SECONDS = 30;
/** Asked for by the button. */
const LONG_SECONDS = 120;
/** A moment of rest after the last edit. */
const REST_MS = 500;

export const useProof = create<ProofState>(() => ({ gap: GAP, status: 'idle', best: null, of: null, trouble: null }));

let run: ProofRun | null = null;
let turn = 0;
/** The last answer with all its rows, of whatever arm: a later layout takes over what it leaves as it was. */
let last: EarlierWorst | null = null;

function drop(): void {
  turn++;
  run?.stop();
  run = null;
}

/** Stops and keeps the best so far. */
export function stopProof(): void {
  drop();
  useProof.setState({ status: 'stopped' });
}

function prove(file: ArmFile, seconds: number): void {
  drop();
  const mine = turn;
  const { gap, of } = useProof.getState();
  useProof.setState({ status: 'running', of: file, trouble: null, ...(of === file ? {} : { best: null }) });
  const { arm } = armOf(file);
  const keep = (best: WorstResult) => {
    if (turn !== mine || best.rows.length === 0) return;
    last = { arm, worst: best };
    useProof.setState({ best });
  };
  run = startProof(arm, { gap, seconds, earlier: last }, keep);
  run.result.then(
    (best) => {
      if (turn !== mine) return;
      run = null;
      keep(best);
      useProof.setState({ status: 'ended' });
    },
    (error: unknown) => {
      if (turn !== mine) return;
      run = null;
      useProof.setState({ status: 'failed', trouble: error instanceof Error ? error.message : String(error) });
    },
  );
}

/** Proves the arm on the sheet, with time to spare. */
export function proveNow(): void {
  const { file } = useDocument.getState();
  if (file) prove(file, LONG_SECONDS);
}

/** Proves each arm that rests on the sheet; a proof of an arm that has changed is dropped. */
export function proveAfterEdits(): void {
  let wait: ReturnType<typeof setTimeout> | undefined;
  useDocument.subscribe((state, before) => {
    if (state.file === before.file && state.draft === before.draft) return;
    clearTimeout(wait);
    if (useProof.getState().status === 'running') {
      drop();
      useProof.setState({ status: 'idle' });
    }
    const { file, draft } = state;
    if (!file || draft) return;
    wait = setTimeout(() => {
      if (useDocument.getState().file === file && useProof.getState().of !== file) prove(file, SECONDS);
    }, REST_MS);
  });
}
