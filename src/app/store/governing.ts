/** Which check governs each bearing: over the grid, and at the pose on stage. */
import { type Governing, governing } from '../../studies/assessGoverning.ts';
import type { CheckRow } from '../../studies/results.ts';
import { type ArmOnSheet, useArm } from './documentStore.ts';
import { assessedRows } from './engine.ts';
import { usePose } from './poseStore.ts';
import { useView } from './viewStore.ts';
import { useWorst } from './worstStore.ts';

export type Governed = ReadonlyMap<string, Governing>;

function key(joint: number, bearing: CheckRow['bearing']): string {
  return `${joint} ${bearing}`;
}

function mapOf(rows: readonly CheckRow[]): Governed {
  return new Map(governing(rows).map((each) => [key(each.jointIndex, each.bearing), each]));
}

const made = new WeakMap<readonly CheckRow[], Governed>();
const NONE: Governed = new Map();

/** Governing checks of a list of rows, worked out once for it. */
export function governed(rows: readonly CheckRow[] | undefined): Governed {
  if (!rows) return NONE;
  let map = made.get(rows);
  if (!map) {
    map = mapOf(rows);
    made.set(rows, map);
  }
  return map;
}

/** The worst of a bearing (or of the shaft: null) over the poses swept; undefined where nothing is known. */
export function useGoverning(joint: number, bearing: CheckRow['bearing']): Governing | undefined {
  return useWorst((state) => governed(state.rows).get(key(joint, bearing)));
}

export function governingOf(rows: readonly CheckRow[] | undefined, joint: number, bearing: CheckRow['bearing']) {
  return governed(rows).get(key(joint, bearing));
}

let last: { sheet: ArmOnSheet; pose: readonly number[]; case: string; rows: readonly CheckRow[] } | null = null;

/** Every check at the pose on stage, worked out once for each pose, arm and case. */
export function usePoseRows(): readonly CheckRow[] {
  const sheet = useArm();
  const pose = usePose();
  const name = useView((state) => state.case);
  if (!sheet || pose.length !== sheet.chain.n) return [];
  if (last?.sheet !== sheet || last.pose !== pose || last.case !== name) {
    last = { sheet, pose, case: name, rows: assessedRows(sheet.arm, sheet.chain, pose, name) };
  }
  return last.rows;
}
