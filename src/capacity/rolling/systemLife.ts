/**
 * Life that all bearings together reach with 90 % reliability: the time t with
 *
 *     Σ (t / L10_i)^(e_i) = 1           e = 10/9 balls, 9/8 rollers (slopes of the two-parameter Weibull distribution)
 *
 * which for one slope is t = ( Σ L10_i^-e )^(-1/e). Source: product of the reliabilities of independent parts; slopes of Lundberg
 * and Palmgren, ISO/TR 1281-1 (from memory). All lives must be L10 in one unit of time.
 */
import type { RollingKind } from '../../arm/arm.ts';
import { elementOf } from './bearingKind.ts';
import type { Rule } from './rule.ts';

export const SYSTEM_LIFE_RULE: Rule = {
  name: 'system life',
  formula: 'Σ (t/L10_i)^e_i = 1, e = 10/9 balls, 9/8 rollers',
  source: 'product of reliabilities; slopes of Lundberg and Palmgren',
  trust: 'from memory',
  units: 's',
  range: 'independent bearings, two-parameter Weibull',
};

/** Weibull slope e of a bearing kind. */
export function weibullSlope(kind: RollingKind): number {
  return elementOf(kind) === 'ball' ? 10 / 9 : 9 / 8;
}

/**
 * System L10 in the unit of `lives`. Infinity where nothing wears (or there are no bearings), 0 where one life is 0, NaN where one life
 * is not known. By bisection between the bounds min L · n^(-1/e) and min L.
 */
export function systemLife(lives: ArrayLike<number>, slopes: ArrayLike<number>): number {
  if (lives.length !== slopes.length) return Number.NaN;
  let shortest = Number.POSITIVE_INFINITY;
  let slope = Number.POSITIVE_INFINITY;
  for (let i = 0; i < lives.length; i++) {
    if (!(lives[i]! >= 0) || !(slopes[i]! > 0)) return Number.NaN;
    shortest = Math.min(shortest, lives[i]!);
    slope = Math.min(slope, slopes[i]!);
  }
  if (shortest === 0 || shortest === Number.POSITIVE_INFINITY) return shortest;
  let low = lives.length ** (-1 / slope);
  let high = 1;
  for (let k = 0; k < 60; k++) {
    const middle = (low + high) / 2;
    let sum = 0;
    for (let i = 0; i < lives.length; i++) sum += ((middle * shortest) / lives[i]!) ** slopes[i]!;
    if (sum < 1) low = middle;
    else high = middle;
  }
  return shortest * low;
}
