/** What the joints' shifts add up to at the tip, and whose share is how large. */
import type { Vec3 } from '../../arm/arm.ts';
import type { Assessed, Rule } from '../rule.ts';

export const TIP_ERROR_RULE: Rule = {
  name: 'tip error',
  formula: 'at a pose: length of the vector sum of the joints’ displacements; bound: sum of the joints’ bounds',
  source: 'small displacements add',
  trust: 'recomputed',
  units: 'm',
  range: 'displacements small against the reach',
};

export interface TipError {
  /** m. */
  readonly total: number;
  /** One a joint, summing to `total`: its displacement along the total (may be negative), or its bound. m. */
  readonly shares: readonly number[];
}

/** Tip displacement at one pose from one displacement a joint, all turned into one frame. */
export function tipErrorAtPose(displacements: readonly Vec3[]): Assessed<TipError> {
  const sum = [0, 1, 2].map((i) => displacements.reduce((total, d) => total + d[i]!, 0)) as [number, number, number];
  const total = Math.hypot(...sum);
  if (Number.isNaN(total)) return { unassessed: 'the displacement of a joint is not a number' };
  const shares = displacements.map((d) => (total === 0 ? 0 : (d[0] * sum[0] + d[1] * sum[1] + d[2] * sum[2]) / total));
  return { value: { total, shares } };
}

/** Bound of the tip displacement from one bound a joint, whatever the directions. */
export function tipErrorBound(bounds: readonly number[]): Assessed<TipError> {
  if (!bounds.every((bound) => bound >= 0)) return { unassessed: 'the bound of a joint is not a usable number' };
  return { value: { total: bounds.reduce((sum, bound) => sum + bound, 0), shares: bounds } };
}
