/** Sliding speed in a plain bushing, turning or swinging. */
import type { Assessed, Rule } from '../rule.ts';
import { assessed } from '../rule.ts';

export const SLIDING_RULE: Rule = {
  name: 'sliding speed',
  formula: 'turning v = |ω| d/2; swing ±θ, f times a second: mean 2 θ f d, peak π θ f d (sine)',
  source: 'kinematics',
  trust: 'recomputed',
  units: 'm/s',
  range: 'any bore > 0',
};

const REASON = 'bore, speed or swing is not a usable number';

/** m/s at a turning speed ω, rad/s of either sign. */
export function turningSpeed(omega: number, bore: number): Assessed {
  return assessed(bore > 0 ? (Math.abs(omega) * bore) / 2 : Number.NaN, REASON);
}

export interface SwingSpeed {
  /** Mean of |v| over a cycle: what PV is taken with. */
  readonly mean: number;
  /** At mid swing of a sine motion: what a limit of speed is held against. */
  readonly peak: number;
}

/** Swing of ±`halfAngle` (rad, ≥ 0), `frequency` cycles (there and back) a second, ≥ 0. */
export function swingSpeed(halfAngle: number, frequency: number, bore: number): Assessed<SwingSpeed> {
  if (!(halfAngle >= 0 && frequency >= 0 && bore > 0 && Number.isFinite(halfAngle * frequency * bore))) {
    return { unassessed: REASON };
  }
  return {
    value: { mean: 2 * halfAngle * frequency * bore, peak: Math.PI * halfAngle * frequency * bore },
  };
}
