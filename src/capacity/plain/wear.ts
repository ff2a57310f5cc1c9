/** How long a bushing wears until it is too loose: depth grows with pressure times the way slid (Archard's law by its usual factor). */
import type { Assessed, Rule } from '../rule.ts';
import { assessed } from '../rule.ts';

export const WEAR_RULE: Rule = {
  name: 'wear life of a bushing',
  formula: 'h = K p v t, so t = h/(K × mean of p v over the duty)',
  source: 'Wentzell, Machine Design, ex. 19.2 (recomputed)',
  trust: 'recomputed',
  units: 's',
  range: 'steady wear after running in, within the PV limit; K is that of the material and its mating shaft',
};

/**
 * s of duty time until the wear is `depth` m deep. `factor` in 1/Pa (volume worn per load and way, m³/(N·m)); `rate` the mean of pressure
 * times sliding speed over the duty, Pa·m/s, ≥ 0: without sliding the life has no end.
 */
export function wearLife(depth: number | null, factor: number | null, rate: number): Assessed {
  if (factor === null)
    return { unassessed: 'the wear factor is not known: ask the maker and fill in `wear_factor_mm3_N_m`' };
  if (depth === null) return { unassessed: 'fill in `wear_depth_mm`, the depth at which the bushing is worn out' };
  if (!(depth > 0 && factor > 0 && rate >= 0))
    return { unassessed: 'wear depth, factor or rate is not a usable number' };
  return rate === 0
    ? { value: Number.POSITIVE_INFINITY }
    : assessed(depth / (factor * rate), 'the wear is not a number');
}
