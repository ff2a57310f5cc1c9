/**
 * The life of a rolling bearing over a duty of segments, each with its equivalent load and its revolutions a second of duty time:
 *
 *     P = (Σ n_i P_i^p / Σ n_i)^(1/p),   L10 = 10^6 (C/P)^p / Σ n_i,   life = a1 L10
 *
 * Its use is the life asked for over the life reached: the share of the bearing that the demanded time wears (linear damage sum).
 */
import type { RollingBearing } from '../../arm/arm.ts';
import {
  dynamicRating,
  equivalentLoad,
  isUnassessed,
  lifeExponent,
  lifeNotes,
  lifeRevolutions,
  lifeSeconds,
  minimumLoadNotes,
  type Rule,
  reliabilityFactor,
  sentence,
  staticRating,
  weibullSlope,
} from '../rolling/index.ts';
import type { Assessed } from '../rule.ts';

export const DUTY_LIFE_RULE: Rule = {
  name: 'life over the duty',
  formula:
    'life = a1 · 10⁶ (C/P)^p / n, P over the duty by revolutions, n revolutions a second of duty time; use = life asked/life',
  source: 'ISO 281:2007; linear damage sum of Palmgren and Miner',
  trust: 'verified',
  units: 's',
  range: 'segments that turn; load up to C/2 and C0; clean, lubricated, not misaligned',
};

export interface BearingLife {
  /** Equivalent load over the duty, N; 0 where nothing loads it, Infinity where it cannot carry its load. */
  readonly load: number;
  /** Revolutions (or what swings count as) a second of duty time. */
  readonly turning: number;
  /** 90 %: revolutions, and s of duty time. */
  readonly revolutions: number;
  readonly basic: number;
  readonly a1: number;
  /** At the reliability asked for, s of duty time. */
  readonly life: number;
  /** Weibull slope, for the life of all bearings together. */
  readonly slope: number;
  /** What was assumed. */
  readonly notes: readonly string[];
  /** Whether a load is beyond what the formula holds for: the life is then only a guide. */
  readonly beyondFormula: boolean;
  /** Where the formula is stretched: load beyond it, or too little to make the elements roll. */
  readonly warnings: readonly string[];
}

/** `loads` N and `turning` rev/s, one a segment; the turning of each already times its share of the time. */
export function bearingLife(
  bearing: RollingBearing,
  loads: ArrayLike<number>,
  turning: ArrayLike<number>,
  reliability: number,
): Assessed<BearingLife> {
  const exponent = lifeExponent(bearing.kind);
  const C = dynamicRating(bearing);
  if (isUnassessed(C)) return { unassessed: sentence(C.unassessed) };
  const a1 = reliabilityFactor(reliability);
  if (isUnassessed(a1)) return { unassessed: sentence(a1.unassessed) };
  const load = equivalentLoad(loads, turning, exponent);
  if (isUnassessed(load)) return { unassessed: sentence(load.unassessed) };
  const perSecond = Array.from(turning).reduce((sum, n) => sum + n, 0);
  const revolutions = lifeRevolutions(C.value, load.value, exponent);
  const basic = lifeSeconds(revolutions, perSecond);
  if (Number.isNaN(basic)) return { unassessed: 'a load or a rating of the bearing is not a usable number' };
  const C0 = staticRating(bearing);
  const heaviest = Array.from(loads).reduce((most, P, i) => (turning[i]! > 0 ? Math.max(most, P) : most), 0);
  const most = isUnassessed(C0) ? Number.POSITIVE_INFINITY : C0.value;
  const beyond = lifeNotes(C.value, most, heaviest);
  const warnings = [...beyond, ...minimumLoadNotes(bearing, C.value, load.value)];
  return {
    value: {
      load: load.value,
      turning: perSecond,
      revolutions,
      basic,
      a1: a1.value,
      life: a1.value * basic,
      slope: weibullSlope(bearing.kind),
      notes: C.notes.map(sentence),
      beyondFormula: beyond.length > 0,
      warnings: warnings.map(sentence),
    },
  };
}
