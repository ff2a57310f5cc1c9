/**
 * Equivalent load over a duty: P_m = ( Σ n_i P_i^p / Σ n_i )^(1/p), weighted by revolutions n_i, not by time.
 * Source: Palmgren and Miner's linear sum; verified by a published example (Jindal, Machine Design, example 18-9).
 */
import { type Rated, rated, unassessed } from './outcome.ts';
import type { Rule } from './rule.ts';

export const DUTY_LOAD_RULE: Rule = {
  name: 'equivalent load over the duty',
  formula: 'P_m = (Σ n_i P_i^p / Σ n_i)^(1/p), n_i revolutions',
  source: 'linear damage sum, Palmgren and Miner',
  trust: 'verified',
  units: 'N',
  range: 'at least some turning',
};

/**
 * Equivalent load, N. `loads` N ≥ 0 and `revolutions` ≥ 0 in step. A segment without turning counts nothing for life; a load that is not
 * usable, or infinite while turning, is refused or makes the mean infinite.
 */
export function equivalentLoad(loads: ArrayLike<number>, revolutions: ArrayLike<number>, exponent: number): Rated {
  if (loads.length !== revolutions.length) return unassessed('bad-duty');
  let damage = 0;
  let turns = 0;
  for (let i = 0; i < loads.length; i++) {
    const n = revolutions[i]!;
    const P = loads[i]!;
    if (!(n >= 0) || !(P >= 0) || n === Number.POSITIVE_INFINITY) return unassessed('bad-duty');
    if (n === 0) continue;
    damage += n * P ** exponent;
    turns += n;
  }
  return turns > 0 ? rated((damage / turns) ** (1 / exponent)) : unassessed('no-turning');
}
