/**
 * Life at a reliability other than 90 %, by a three-parameter Weibull distribution of life over L10:
 *
 *     a1 = x0 + (θ - x0) (ln 1/R)^(1/b)        R = exp( -((x - x0)/(θ - x0))^b ),  x = life / L10
 *
 * ISO 281:2007: x0 = 0.05, b = 1.5, θ - x0 = 0.95/(ln 1/0.9)^(2/3). Recomputed: the closed form gives all 14 rows of the standard's
 * table to their last printed digit, so it serves as the interpolation rule between them.
 */
import { type Rated, rated, unassessed } from './outcome.ts';
import type { Rule } from './rule.ts';

export const RELIABILITY_RULE: Rule = {
  name: 'reliability factor a1',
  formula: 'a1 = 0.05 + 0.95 (ln(1/R)/ln(1/0.9))^(2/3)',
  source: 'ISO 281:2007, reliability table',
  trust: 'recomputed',
  units: '1',
  range: 'R 0.9 to 0.9995',
};

/** Weibull distribution of life over L10. */
export interface LifeDistribution {
  /** Life that every bearing reaches. */
  readonly x0: number;
  /** Characteristic life less x0. */
  readonly spread: number;
  readonly slope: number;
}

export const ISO_LIFE: LifeDistribution = { x0: 0.05, spread: 0.95 / Math.log(1 / 0.9) ** (2 / 3), slope: 1.5 };

const LEAST = 0.9;
const MOST = 0.9995;

/** Life over L10 that the share R of bearings reaches or exceeds; no range but 0 < R < 1. */
export function lifeRatio(R: number, distribution: LifeDistribution = ISO_LIFE): number {
  const { x0, spread, slope } = distribution;
  return R > 0 && R < 1 ? x0 + spread * Math.log(1 / R) ** (1 / slope) : Number.NaN;
}

/** a1 at a reliability of 0.9 to 0.9995; outside, the standard says nothing. */
export function reliabilityFactor(R: number): Rated {
  return R >= LEAST && R <= MOST ? rated(lifeRatio(R)) : unassessed('reliability-range');
}

/** Share of bearings that reach the life x (over L10); no range but x ≥ 0. */
export function survival(x: number, distribution: LifeDistribution = ISO_LIFE): number {
  if (!(x >= 0)) return Number.NaN;
  const { x0, spread, slope } = distribution;
  return x <= x0 ? 1 : Math.exp(-(((x - x0) / spread) ** slope));
}

/** Reliability at a demanded life, both in the same unit; never above 0.9995, where the standard ends. NaN where not usable. */
export function reliabilityAt(demanded: number, L10: number): Rated {
  if (!(demanded >= 0) || !(L10 >= 0)) return rated(Number.NaN);
  if (L10 === Number.POSITIVE_INFINITY || demanded === 0) return rated(MOST, 'reliability-capped');
  const R = survival(demanded / L10);
  if (R > MOST) return rated(MOST, 'reliability-capped');
  // A hair for L10 itself, whose 0.9 comes back rounded.
  return R < LEAST - 1e-12 ? rated(R, 'reliability-extrapolated') : rated(R);
}
