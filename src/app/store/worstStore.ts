/**
 * The worst of every check as it is known now: what the grid found, under the bound that the proof has reached so far; beside it what no search
 * over poses covers.
 */
import { create } from 'zustand';
import type { ArmFile } from '../../arm/armFile.ts';
import { byJoint, rowsWithVerdict } from '../../studies/assess.ts';
import type { CheckRow } from '../../studies/results.ts';
import type { WorstResult } from '../../studies/worstArm.ts';
import { type ArmOnSheet, armOf, presentArm, useDocument } from './documentStore.ts';
import { capacityOf } from './engine.ts';
import { lastingOf, useLasting } from './lastingStore.ts';
import { useProof } from './proofStore.ts';
import type { Swept } from './runs.ts';
import { casesWaiting, useSweep } from './sweepStore.ts';

export interface WorstState {
  /** All rows; undefined before anything was worked out. */
  readonly rows: readonly CheckRow[] | undefined;
  /** Those of sweep and proof alone: each has a load at a pose. */
  readonly searched: readonly CheckRow[] | undefined;
  /** The file they speak of. */
  readonly of: ArmFile | null;
}

const GRID_ONLY = 'within the limit at the poses of the grid; not proved yet between them';

const NOTHING: WorstState = { rows: undefined, searched: undefined, of: null };

export const useWorst = create<WorstState>(() => NOTHING);

function key(row: CheckRow): string {
  return `${row.jointIndex} ${row.bearing} ${row.check}`;
}

/** The higher value found, under the proven bound. A bound that is not a number proves nothing. */
function joined(found: CheckRow, proven: CheckRow | undefined, gap: number): CheckRow {
  if (!proven || proven.bound === null || !Number.isFinite(proven.bound) || Number.isNaN(found.value)) return found;
  if (!(found.value > proven.value)) return Number.isNaN(proven.value) ? found : proven;
  const bound = Math.max(proven.bound, found.value);
  const left = bound > 0 ? (bound - found.value) / bound : 0;
  return { ...found, bound, gap: left, certified: left <= gap };
}

/**
 * Rows of a sweep joined to those of a proof (of the same arm and cases; either may be missing), each with its verdict. What the grid found passes
 * nothing by itself: between its poses there may be worse.
 */
export function worstRows(
  sheet: ArmOnSheet,
  sweep: Swept | null,
  proof: readonly CheckRow[],
  gap: number,
  waiting: readonly string[] = [],
): readonly CheckRow[] {
  const capacity = capacityOf(sheet.arm, sheet.chain);
  const proven = new Map(proof.map((row) => [key(row), row]));
  const rows = sweep ? sweep.rows.map((row) => joined(row, proven.get(key(row)), gap)) : proof;
  const judged = rows.flatMap((row) =>
    rowsWithVerdict(
      sheet.chain,
      [row],
      capacity.checks,
      row.bound === null && sweep?.partial ? { scope: 'part of the grid' } : { gap },
    ),
  );
  const honest = judged.map((row) =>
    row.bound === null && row.verdict === 'pass'
      ? {
          ...row,
          verdict: 'unassessed' as const,
          reason: waiting.length > 0 ? `not swept yet: ${waiting.join(', ')}` : GRID_ONLY,
        }
      : row,
  );
  const leftOut = sweep?.leftOut.map((row) => {
    const instead = proven.get(key(row));
    return instead && !Number.isNaN(instead.value)
      ? rowsWithVerdict(sheet.chain, [instead], capacity.checks, { gap })[0]!
      : row;
  });
  return byJoint([...honest, ...(leftOut ?? []), ...capacity.missing]);
}

/** The rows of a proof for one case, or over all. */
function proofRows(proof: WorstResult, name: string | null): readonly CheckRow[] {
  return name === null ? proof.rows : proof.eachCase.filter((row) => row.case === name);
}

/** Whether what was worked out for one file can stand on the sheet of another: an edit of the same arm, not an arm of other joints. */
function sameJoints(of: ArmFile, present: ArmFile): boolean {
  const { names } = armOf(of).chain;
  const now = armOf(present).chain.names;
  return names.length === now.length && names.every((name, k) => name === now[k]);
}

/** Keeps the rows in step with the sweep, the proof and what lasts. */
export function followWorst(): void {
  const update = () => {
    const sweep = useSweep.getState();
    const proof = useProof.getState();
    // The newer of two arms: while one is being dragged a sweep is ahead of the proof, after an edit the proof may be there first.
    const present = presentArm()?.file;
    const of = proof.best && proof.of === present && sweep.of !== present ? proof.of : sweep.of;
    if (!of || !present || !sameJoints(of, present)) {
      useWorst.setState(NOTHING);
      return;
    }
    const swept = sweep.of === of ? sweep.result : null;
    const proven = proof.best && proof.of === of ? proofRows(proof.best, swept ? sweep.ofCase : sweep.case) : [];
    const waiting = swept ? casesWaiting(armOf(of), sweep) : [];
    const searched = worstRows(armOf(of), swept, proven, proof.gap, waiting);
    useWorst.setState({ of, searched, rows: withLasting(of, searched) });
  };
  useSweep.subscribe((state, before) => {
    if (state.result !== before.result) update();
  });
  useProof.subscribe((state, before) => {
    if (state.best !== before.best) update();
  });
  useLasting.subscribe(() => {
    const { of, searched } = useWorst.getState();
    if (of && searched) useWorst.setState({ rows: withLasting(of, searched) });
  });
  useDocument.subscribe((state, before) => {
    if (state.file !== before.file) update();
  });
}

function withLasting(of: ArmFile, searched: readonly CheckRow[]): readonly CheckRow[] {
  return byJoint([...searched, ...lastingOf(of, useLasting.getState())]);
}
