/** Going to where a check is worst: its joint, bearing, case and pose, everywhere on the sheet at once. */
import type { CheckRow, Triple } from '../../studies/results.ts';
import { playTo, setPose } from './poseStore.ts';
import { selectJoint, showCase } from './viewStore.ts';

/** The row that was last gone to: at its pose and case, what the case left free stands as the row took it. */
let gone: CheckRow | null = null;

/** Unit vector (base frame) of a tip force that may point anywhere, as the row gone to took it; null away from its pose. */
export function tipForceAt(pose: readonly number[], name: string): Triple | null {
  if (!gone?.free?.tipForce || gone.case !== name || gone.pose.length !== pose.length) return null;
  return gone.pose.every((angle, i) => Math.abs(angle - pose[i]!) < 1e-9) ? gone.free.tipForce : null;
}

export function goToWorst(row: CheckRow, play = true): void {
  // Some rows speak of the whole duty and stand at no pose.
  if (row.pose.length === 0) return;
  gone = row;
  if (row.jointIndex >= 0) selectJoint(row.jointIndex, row.bearing);
  showCase(row.case);
  if (play) playTo(row.pose);
  else setPose(row.pose);
}

/** The row that is in most trouble: over its limit or nearest to it, else (nothing rated) the largest radial load. */
export function hardestRow(rows: readonly CheckRow[]): CheckRow | null {
  let hardest: CheckRow | null = null;
  for (const row of rows) {
    if (row.bearing === null || row.pose.length === 0 || (row.utilisation === null && row.check !== 'radial')) continue;
    if (!hardest || order(row) > order(hardest)) hardest = row;
  }
  return hardest;
}

/** Rated rows before unrated ones: a load alone counts less than any utilisation. */
function order(row: CheckRow): number {
  if (Number.isNaN(row.value)) return Number.POSITIVE_INFINITY;
  return row.utilisation !== null ? 1 + row.utilisation : row.value / (row.value + 1e6);
}
