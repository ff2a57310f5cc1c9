/** Slope of the shaft at a bearing against the slope that the bearing bears (`utilisation` of `rule.ts`). */
import type { Bearing } from '../../arm/arm.ts';
import { bushingTilt } from '../plain/index.ts';
import { isUnassessed, MISALIGNMENT, misalignmentLimit, sentence } from '../rolling/index.ts';
import type { Assessed, Rule, Trust } from '../rule.ts';

export const SLOPE_RULE: Rule = {
  name: 'slope at the bearing',
  formula:
    'utilisation = slope / limit; limit of a rolling bearing: its misalignment; of a bushing: clearance / length',
  source: 'beam; Shigley 9th ed., Table 7-2; common practice',
  trust: 'verified',
  units: 'rad',
  range: 'slope of the shaft alone; misalignment of the seats comes on top',
};

export interface SlopeLimit {
  /** rad. */
  readonly limit: number;
  readonly source: string;
  readonly trust: Trust;
}

/** The slope a bearing bears: as the file gives it, else by its kind; a plain bushing tilts until its edges carry. */
export function slopeLimit(bearing: Bearing): Assessed<SlopeLimit> {
  if (bearing.kind === 'plain-bushing') {
    const tilt = bushingTilt(bearing.clearance, bearing.width);
    if ('unassessed' in tilt) return tilt;
    return { value: { limit: tilt.value, source: 'clearance over length of the bushing', trust: 'recomputed' } };
  }
  const rated = misalignmentLimit(bearing);
  if (isUnassessed(rated)) return { unassessed: sentence(rated.unassessed) };
  const given = bearing.misalignment !== null;
  const trust = given ? 'common practice' : (MISALIGNMENT[bearing.kind]?.trust ?? 'common practice');
  const byKind = trust === 'verified' ? 'Shigley 9th ed., Table 7-2, lower figure' : 'common practice by kind';
  return { value: { limit: rated.value, source: given ? (bearing.source ?? 'arm file') : byKind, trust } };
}
