/**
 * Basic rating life.
 *
 *     L10 = 10^6 (C/P)^p revolutions, 90 % reliability        p = 3 balls, 10/3 rollers
 *     Ln  = a1 L10                                            time = revolutions / (revolutions a second)
 *
 * Source: ISO 281:2007; the forms and exponents stand in every source read (verified by worked examples of three textbooks).
 */
import { isPositive } from './bearingKind.ts';
import type { Note } from './outcome.ts';
import type { Rule } from './rule.ts';

export const LIFE_RULE: Rule = {
  name: 'basic rating life',
  formula: 'L10 = 10⁶ (C/P)^p revolutions',
  source: 'ISO 281:2007',
  trust: 'verified',
  units: 'revolutions, s',
  range: 'P up to C/2 and C0; clean, lubricated, not misaligned',
};

/** L10 in revolutions: Infinity without load, 0 at an infinite one, NaN where C is not positive or P not a load. */
export function lifeRevolutions(C: number, P: number, exponent: number): number {
  return isPositive(C) && P >= 0 ? 1e6 * (C / P) ** exponent : Number.NaN;
}

/** Life in s at `perSecond` revolutions (or equivalent revolutions) a second, > 0; Infinity where nothing turns. */
export function lifeSeconds(revolutions: number, perSecond: number): number {
  if (Number.isNaN(revolutions) || !(perSecond >= 0)) return Number.NaN;
  return perSecond === 0 ? Number.POSITIVE_INFINITY : revolutions / perSecond;
}

/** C, N, that gives `revolutions` at the load P, the reliability factor a1 included. */
export function ratingNeeded(P: number, revolutions: number, exponent: number, a1 = 1): number {
  return P >= 0 && revolutions >= 0 && a1 > 0 ? P * (revolutions / 1e6 / a1) ** (1 / exponent) : Number.NaN;
}

/** Whether the life formula holds at this load (P ≤ C/2 and P ≤ C0, ISO 281:2007, from memory). */
export function lifeNotes(C: number, C0: number, P: number): readonly Note[] {
  return P > C / 2 || P > C0 ? ['load-beyond-life-formula'] : [];
}
