/** How far a bushing lets its journal tilt. */
import type { Assessed, Rule } from '../rule.ts';

export const BUSHING_TILT_RULE: Rule = {
  name: 'bushing clearance tilt',
  formula: 'tilt each way = c/L, c diametral',
  source: 'geometry: the journal touches opposite sides at the two ends',
  trust: 'recomputed',
  units: 'rad',
  range: 'stiff journal and bushing, c much smaller than L',
};

/** Tilt each way, rad, of a journal with diametral clearance c (m) over the length L (m). */
export function bushingTilt(clearance: number | null, length: number): Assessed {
  if (clearance === null) return { unassessed: 'fill in the running clearance of the bushing' };
  if (!(clearance >= 0 && length > 0))
    return { unassessed: 'clearance and length of the bushing must be usable numbers' };
  return { value: clearance / length };
}
