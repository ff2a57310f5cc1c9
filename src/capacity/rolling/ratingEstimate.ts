/**
 * Basic ratings where the maker's are missing, from the internal geometry. Millimetres and newtons, as the standards have them:
 *
 *     balls    C  = 1.3 f_c (i cos α)^0.7 Z^(2/3) Dw^1.8        (Dw > 25.4: 3.647 Dw^1.4)
 *              C0 = f0 i Z Dw² cos α
 *     rollers  C  = bm f_c (i Lwe cos α)^(7/9) Z^(3/4) Dwe^(29/27)      bm = 1.1; needle 1.0, as of a drawn cup
 *              C0 = 44 (1 - Dwe cos α / Dpw) i Z Lwe Dwe cos α
 *
 * Source: ISO 281:2007 clauses 5 and 7, ISO 76:2006 clauses 5 and 7 (formulas from memory; f_c, f0, 44 and 3.647 recomputed).
 * An estimate is a stand-in until the maker's rating is known, and every outcome made from one says so.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { elementOf, isEstimated, isPositive } from './bearingKind.ts';
import { type BallRows, ballDynamicFactor, rollerDynamicFactor } from './dynamicRatingFactor.ts';
import { type InternalGeometry, internalGeometry } from './internalGeometry.ts';
import { isUnassessed, type Note, type Rated, rated, unassessed } from './outcome.ts';
import type { Rule } from './rule.ts';
import { grooveStaticFactor, selfAligningStaticFactor } from './staticRatingFactor.ts';

export const RATING_ESTIMATE_RULE: Rule = {
  name: 'estimated ratings',
  formula: 'C by f_c, C0 by f0, on guessed or given rolling elements',
  source: 'ISO 281:2007, ISO 76:2006; proportions by common practice',
  trust: 'from memory',
  units: 'N',
  range: 'stand-in only: replace by the maker’s rating',
};

export interface RatingEstimate {
  /** N */
  readonly C: number;
  /** N */
  readonly C0: number;
  /** N/mm²; null for rollers, which have none. */
  readonly f0: number | null;
  readonly geometry: InternalGeometry;
}

/** Range of γ that the tables of f_c cover. */
const BALL_GAMMA = [0.05, 0.4] as const;
const ROLLER_GAMMA = [0.01, 0.3] as const;

/** C of a ball row set of known geometry, N. */
export function ballDynamicRating(g: InternalGeometry, rows: BallRows): number {
  const Dw = 1000 * g.elementDiameter;
  const size = Dw <= 25.4 ? Dw ** 1.8 : 25.4 ** 0.4 * Dw ** 1.4;
  const fc = ballDynamicFactor(g.gamma, rows);
  return 1.3 * fc * (g.rows * Math.cos(g.contactAngle)) ** 0.7 * g.elements ** (2 / 3) * size;
}

/** C0 of a ball row set of known geometry, N. */
export function ballStaticRating(g: InternalGeometry, f0: number): number {
  return f0 * g.rows * g.elements * (1000 * g.elementDiameter) ** 2 * Math.cos(g.contactAngle);
}

/** C of a roller row set of known geometry, N; `bm` is the standard's factor for contemporary material and make. */
export function rollerDynamicRating(g: InternalGeometry, bm: number): number {
  const length = 1000 * g.rollerLength * g.rows * Math.cos(g.contactAngle);
  return (
    bm * rollerDynamicFactor(g.gamma) * length ** (7 / 9) * g.elements ** 0.75 * (1000 * g.elementDiameter) ** (29 / 27)
  );
}

/** C0 of a roller row set of known geometry, N. */
export function rollerStaticRating(g: InternalGeometry): number {
  const area = 1e6 * g.rollerLength * g.elementDiameter;
  return 44 * (1 - g.gamma) * g.rows * g.elements * area * Math.cos(g.contactAngle);
}

/** Ratings from boundary dimensions and whatever internal geometry is given. Given ratings are not looked at. */
export function estimateRatings(bearing: RollingBearing): Rated<RatingEstimate> {
  const outcome = internalGeometry(bearing);
  if (isUnassessed(outcome)) return outcome;
  const g = outcome.value;
  const ball = elementOf(bearing.kind) === 'ball';
  const [least, most] = ball ? BALL_GAMMA : ROLLER_GAMMA;
  const notes: Note[] = [...outcome.notes, 'C-estimated', 'C0-estimated'];
  if (g.gamma < least || g.gamma > most) notes.push('geometry-beyond-table');

  if (!ball) {
    const C = rollerDynamicRating(g, bearing.kind === 'needle' ? 1 : 1.1);
    return rated({ C, C0: rollerStaticRating(g), f0: null, geometry: g }, ...notes);
  }
  const selfAligning = bearing.kind === 'self-aligning-ball';
  const doubleRadial = bearing.kind === 'deep-groove' && bearing.rows === 2;
  const rows: BallRows = selfAligning ? 'self-aligning' : doubleRadial ? 'double-radial' : 'single-or-angular';
  const f0 = selfAligning ? selfAligningStaticFactor(g.gamma) : grooveStaticFactor(g.gamma);
  return rated({ C: ballDynamicRating(g, rows), C0: ballStaticRating(g, f0), f0, geometry: g }, ...notes);
}

/** C, N: the maker's, or the estimate with its note. */
export function dynamicRating(bearing: RollingBearing): Rated {
  if (bearing.C !== null) return given(bearing, bearing.C, 'C-estimated');
  const estimate = estimateRatings(bearing);
  return isUnassessed(estimate) ? estimate : rated(estimate.value.C, ...without(estimate.notes, 'C0-estimated'));
}

/** C0, N: the maker's, or the estimate with its note. */
export function staticRating(bearing: RollingBearing): Rated {
  if (bearing.C0 !== null) return given(bearing, bearing.C0, 'C0-estimated');
  const estimate = estimateRatings(bearing);
  return isUnassessed(estimate) ? estimate : rated(estimate.value.C0, ...without(estimate.notes, 'C-estimated'));
}

/** f0, N/mm², of a ball bearing: given, or by the closed form on the internal geometry. */
export function staticFactor(bearing: RollingBearing): Rated {
  if (bearing.f0 !== null) {
    if (!isPositive(bearing.f0)) return unassessed('bad-factor');
    return isEstimated(bearing) ? rated(bearing.f0, 'f0-estimated') : rated(bearing.f0);
  }
  const outcome = internalGeometry(bearing);
  if (isUnassessed(outcome)) return outcome;
  const { gamma } = outcome.value;
  const f0 = bearing.kind === 'self-aligning-ball' ? selfAligningStaticFactor(gamma) : grooveStaticFactor(gamma);
  return rated(f0, ...outcome.notes, 'f0-estimated');
}

function given(bearing: RollingBearing, rating: number, note: Note): Rated {
  if (!isPositive(rating)) return unassessed('bad-rating');
  return isEstimated(bearing) ? rated(rating, note) : rated(rating);
}

function without(notes: readonly Note[], note: Note): readonly Note[] {
  return notes.filter((n) => n !== note);
}
