/** Which check governs each bearing: over the grid, and at the pose on stage. */
import { type Governing, governing } from '../../studies/assessGoverning.ts';
import type { CheckRow } from '../../studies/results.ts';
import type { TipPose } from '../../studies/tipAtPose.ts';
import { type ArmOnSheet, useArm } from './documentStore.ts';
import { assessedRows, tipAt } from './engine.ts';
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

interface AtPose {
  readonly sheet: ArmOnSheet;
  readonly pose: readonly number[];
  readonly case: string;
  readonly rows: readonly CheckRow[];
  readonly tip: TipPose | undefined;
}

let last: AtPose | null = null;

function useAtPose(): AtPose | null {
  const sheet = useArm();
  const pose = usePose();
  const name = useView((state) => state.case);
  if (!sheet || pose.length !== sheet.chain.n) return null;
  if (last?.sheet !== sheet || last.pose !== pose || last.case !== name) {
    const tip = tipAt(sheet.arm, sheet.chain, pose, name);
    const rows = [...assessedRows(sheet.arm, sheet.chain, pose, name), ...(tip ? [tip.row] : [])];
    last = { sheet, pose, case: name, rows, tip };
  }
  return last;
}

const NO_ROWS: readonly CheckRow[] = [];

/** Every check at the pose on stage, the tip error included, worked out once for each pose, arm and case. */
export function usePoseRows(): readonly CheckRow[] {
  return useAtPose()?.rows ?? NO_ROWS;
}

/** What makes the tip error at the pose on stage. */
export function useTipMade(): TipPose['made'] {
  return useAtPose()?.tip?.made ?? null;
}
