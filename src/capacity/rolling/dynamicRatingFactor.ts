/**
 * The factor f_c of the basic dynamic rating in closed form.
 *
 * γ = Dw cos α / Dpw. Balls, r_i and r_e groove radii over Dw:
 *
 *     f_c = λ · 0.41 · 98.0665 · (2 r_i/(2 r_i - 1))^0.41 · γ^0.3 (1-γ)^1.39 / (1+γ)^(1/3)
 *           · { 1 + [ 1.04 ((1-γ)/(1+γ))^1.72 ( (r_i/r_e) (2 r_e - 1)/(2 r_i - 1) )^0.41 ]^(10/3) }^-0.3
 *
 * Rollers: f_c = 207.9 · 0.83 · γ^(2/9) (1-γ)^(29/27) / (1+γ)^(1/4) · { 1 + [ 1.04 ((1-γ)/(1+γ))^(143/108) ]^(9/2) }^(-2/9).
 *
 * Source: ISO/TR 1281-1 (Lundberg and Palmgren 1947). Recomputed: the load integral rounded to 0.41 falls on every row of the
 * tables of ISO 281:2007 (the often printed lead constant 39.9 lies 0.74 % low).
 */
import type { Rule } from './rule.ts';

export const DYNAMIC_FACTOR_RULE: Rule = {
  name: 'f_c of the dynamic rating',
  formula: 'closed form in γ = Dw cos α / Dpw',
  source: 'ISO/TR 1281-1; ISO 281:2007 tables 2 and 7',
  trust: 'recomputed',
  units: 'for millimetres and newtons',
  range: 'γ 0.05 to 0.40 (balls), 0.01 to 0.30 (rollers)',
};

export type BallRows = 'single-or-angular' | 'double-radial' | 'self-aligning';

/** Reduction factors λ: 0.95, 0.90 (two rows of radial contact), 1 (ISO/TR 1281-1). */
const REDUCTION: Readonly<Record<BallRows, number>> = {
  'single-or-angular': 0.95,
  'double-radial': 0.9,
  'self-aligning': 1,
};

/** f_c of radial ball bearings; NaN unless 0 < γ < 1. Grooves 0.52 Dw; self-aligning: 0.53 Dw inside, a sphere outside. */
export function ballDynamicFactor(gamma: number, rows: BallRows): number {
  if (!(gamma > 0 && gamma < 1)) return Number.NaN;
  const selfAligning = rows === 'self-aligning';
  const ri = selfAligning ? 0.53 : 0.52;
  const re = selfAligning ? 0.5 * (1 / gamma + 1) : 0.52;
  const inner = (2 * ri) / (2 * ri - 1);
  const slope = (1 - gamma) / (1 + gamma);
  const ring = 1.04 * slope ** 1.72 * (((ri / re) * (2 * re - 1)) / (2 * ri - 1)) ** 0.41;
  return (
    REDUCTION[rows] *
    0.41 *
    98.0665 *
    inner ** 0.41 *
    gamma ** 0.3 *
    ((1 - gamma) ** 1.39 / (1 + gamma) ** (1 / 3)) *
    (1 + ring ** (10 / 3)) ** -0.3
  );
}

/** f_c of radial roller bearings; NaN unless 0 < γ < 1. */
export function rollerDynamicFactor(gamma: number): number {
  if (!(gamma > 0 && gamma < 1)) return Number.NaN;
  const ring = 1.04 * ((1 - gamma) / (1 + gamma)) ** (143 / 108);
  return (
    207.9 * 0.83 * gamma ** (2 / 9) * ((1 - gamma) ** (29 / 27) / (1 + gamma) ** 0.25) * (1 + ring ** 4.5) ** (-2 / 9)
  );
}
