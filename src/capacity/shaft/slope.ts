/** Slope of the shaft at a bearing against the misalignment that the bearing bears. */
import type { Bearing, RollingKind } from '../../arm/arm.ts';
import type { Assessed, Rule, Trust } from '../rule.ts';

export const SLOPE_RULE: Rule = {
  name: 'slope at the bearing',
  formula: 'utilisation = slope / limit',
  source: 'beam; limit given by the file, else the lower figure of Shigley 9th ed., Table 7-2, or of common practice',
  trust: 'verified',
  units: 'rad',
  range: 'slope of the shaft alone; misalignment of the seats comes on top',
};

export interface SlopeLimit {
  readonly limit: number;
  readonly source: string;
  readonly trust: Trust;
}

const TABLE = 'Shigley 9th ed., Table 7-2 (lower figure)';
const ARCMIN = Math.PI / 180 / 60;

/** rad; null: no figure is known. */
const LIMITS: Readonly<Record<RollingKind, SlopeLimit | null>> = {
  'deep-groove': { limit: 0.001, source: TABLE, trust: 'verified' },
  'cylindrical-roller': { limit: 0.0008, source: TABLE, trust: 'verified' },
  'tapered-roller': { limit: 0.0005, source: TABLE, trust: 'verified' },
  'self-aligning-ball': { limit: 0.026, source: TABLE, trust: 'verified' },
  'angular-contact': { limit: ARCMIN, source: 'common practice: 1 to 2 arcmin', trust: 'common practice' },
  needle: { limit: ARCMIN, source: 'common practice: 1 to 2 arcmin', trust: 'common practice' },
  'crossed-roller': null,
  'four-point': null,
};

/**
 * The slope a bearing bears, rad: as the file gives it, else by its kind. A plain bushing bears its clearance over its length, then
 * its edges carry.
 */
export function slopeLimit(bearing: Bearing): Assessed<SlopeLimit> {
  if (bearing.kind === 'plain-bushing') {
    const limit = bearing.clearance === null ? Number.NaN : bearing.clearance / bearing.width;
    if (!(limit >= 0)) return { unassessed: 'the bushing gives no running clearance: fill in `clearance`' };
    return { value: { limit, source: 'geometry: clearance / length', trust: 'recomputed' } };
  }
  if (bearing.misalignment !== null) {
    if (!(bearing.misalignment > 0)) return { unassessed: 'the limiting misalignment must be a positive number' };
    return { value: { limit: bearing.misalignment, source: bearing.source ?? 'arm file', trust: 'common practice' } };
  }
  const value = LIMITS[bearing.kind];
  return value ? { value } : { unassessed: 'no limiting misalignment is known for this kind: fill in `misalignment`' };
}
