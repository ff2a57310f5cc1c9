/**
 * How far the shaft may slope in a bearing, rad. The maker's limit where given; else by kind the lower figure of a range, whose upper
 * figure needs more than normal clearance and a light load.
 *
 * Source: Shigley 9th ed. table 7-2, p. 379 (verified) for deep groove, self-aligning, cylindrical and tapered; common practice for
 * angular contact and needle (1 to 2 arc minutes). Ring bearings have no common figure: their seats must be flat, and stiff.
 */
import type { RollingBearing, RollingKind } from '../../arm/arm.ts';
import { isPositive } from './bearingKind.ts';
import { type Rated, rated, unassessed } from './outcome.ts';
import type { Rule, Trust } from './rule.ts';

const ARC_MINUTE = Math.PI / 180 / 60;

export interface MisalignmentRange {
  /** rad; the limit used. */
  readonly usual: number;
  /** rad; at most, in the best of circumstances. */
  readonly most: number;
  readonly trust: Trust;
}

export const MISALIGNMENT: Readonly<Record<RollingKind, MisalignmentRange | null>> = {
  'deep-groove': { usual: 0.001, most: 0.003, trust: 'verified' },
  'self-aligning-ball': { usual: 0.026, most: 0.052, trust: 'verified' },
  'cylindrical-roller': { usual: 0.0008, most: 0.0012, trust: 'verified' },
  'tapered-roller': { usual: 0.0005, most: 0.0012, trust: 'verified' },
  'angular-contact': { usual: ARC_MINUTE, most: 2 * ARC_MINUTE, trust: 'common practice' },
  needle: { usual: ARC_MINUTE, most: 2 * ARC_MINUTE, trust: 'common practice' },
  'crossed-roller': null,
  'four-point': null,
};

export const MISALIGNMENT_RULE: Rule = {
  name: 'limiting misalignment',
  formula: 'the maker’s limit, or the lower figure by kind',
  source: 'Shigley 9th ed. table 7-2; common practice',
  trust: 'verified',
  units: 'rad',
  range: 'pairs of bearings; not rings',
};

/** Limiting slope, rad. */
export function misalignmentLimit(bearing: RollingBearing): Rated {
  if (bearing.misalignment !== null) {
    return isPositive(bearing.misalignment) ? rated(bearing.misalignment) : unassessed('no-misalignment-figure');
  }
  const range = MISALIGNMENT[bearing.kind];
  return range ? rated(range.usual) : unassessed('no-misalignment-figure');
}
