/**
 * The verdict of one check. `pass` needs that nothing in the scope looked at exceeds the allowable; `over` needs a value that is attained; in
 * between the check is `unassessed` and says why. What is not a number never passes.
 */
import type { CapacityCheck } from '../capacity/index.ts';
import type { Verdict } from './results.ts';

/** What a row speaks for: one pose, the poses of a grid (all of them, or those so far), poses drawn, or the whole travel by proof. */
export type Scope = 'pose' | 'grid' | 'part of the grid' | 'samples' | 'travel';

export const REASONS = {
  pose: 'at this pose only',
  grid: 'on this grid only',
  'part of the grid': 'on the poses looked at so far: the sweep was stopped',
  samples: 'from sampled poses only',
  'no limit': 'there is nothing to hold it against',
  'not a number': 'the value could not be computed',
  'open gap': 'nothing found exceeds the allowable, but the proven bound does: the gap is still open, allow more time',
  'safe bound': 'below the allowable where it was looked at; the safe bound used between is above it',
} as const;

export interface Judged {
  /** Null where the check is only reported. */
  readonly verdict: Verdict | null;
  /** Over the allowable: the attained value at one pose, else the upper one; null where there is no allowable. */
  readonly utilisation: number | null;
  readonly reason: string | null;
}

/**
 * `attained`: a demand that occurs; `upper`: what no demand in the scope exceeds (the same number where they are one). Both in the check's
 * unit.
 */
export function judge(
  check: Pick<CapacityCheck, 'allowable' | 'floor' | 'beyond' | 'unassessed'>,
  attained: number,
  upper: number,
  scope: Scope,
): Judged {
  const { allowable, floor, beyond, unassessed } = check;
  if (Number.isNaN(attained) || Number.isNaN(upper)) {
    return { verdict: 'unassessed', utilisation: null, reason: unassessed ?? REASONS['not a number'] };
  }
  if (unassessed !== null) return { verdict: 'unassessed', utilisation: null, reason: unassessed };
  if (allowable === null) return { verdict: null, utilisation: null, reason: null };
  if (!(allowable >= 0)) return { verdict: 'unassessed', utilisation: null, reason: REASONS['no limit'] };
  const over = (value: number) => (value <= floor ? 0 : value / allowable);
  const most = over(Math.max(attained, upper));
  const utilisation = scope === 'pose' ? over(attained) : most;
  if (attained > floor && attained > allowable) {
    return beyond === null
      ? { verdict: 'over', utilisation, reason: null }
      : { verdict: 'unassessed', utilisation: null, reason: beyond };
  }
  // Only a utilisation of at most 1 passes: anything else, a number or not, does not.
  if (!(most <= 1)) {
    return {
      verdict: 'unassessed',
      utilisation: most,
      reason: scope === 'travel' ? REASONS['open gap'] : REASONS['safe bound'],
    };
  }
  if (scope === 'part of the grid') return { verdict: 'unassessed', utilisation, reason: REASONS[scope] };
  return { verdict: 'pass', utilisation, reason: scope === 'travel' ? null : REASONS[scope] };
}
