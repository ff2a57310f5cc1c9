/**
 * Load below which the elements of a running bearing may slide: about 0.01 C for balls and 0.02 C for rollers (common practice; makers
 * give formulas with speed and viscosity). It matters where the bearing turns fast; a slow joint shrugs it off, so it only warns.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { elementOf, isPositive } from './bearingKind.ts';
import type { Note } from './outcome.ts';
import type { Rule } from './rule.ts';

export const MINIMUM_LOAD_RULE: Rule = {
  name: 'minimum load',
  formula: 'P ≥ 0.01 C (balls), 0.02 C (rollers)',
  source: 'common practice',
  trust: 'common practice',
  units: 'N',
  range: 'a warning only',
};

/** Usual minimum load, N, of a bearing rated C; NaN where C is not positive. */
export function minimumLoad(bearing: RollingBearing, C: number): number {
  return isPositive(C) ? (elementOf(bearing.kind) === 'ball' ? 0.01 : 0.02) * C : Number.NaN;
}

/** The warning, where the equivalent load P, N, is known to lie below the minimum. */
export function minimumLoadNotes(bearing: RollingBearing, C: number, P: number): readonly Note[] {
  return P < minimumLoad(bearing, C) ? ['load-below-minimum'] : [];
}
