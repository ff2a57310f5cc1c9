/** Fatigue criteria: safety of a load cycle of bending and torsion, by distortion energy. */
import type { Rule } from '../rule.ts';
import type { RoundSection } from './section.ts';
import type { NotchFactors } from './stress.ts';

export const FATIGUE_RULE: Rule = {
  name: 'shaft fatigue',
  formula: 'Goodman 1/n = σa/Se + σm/Sut; ASME elliptic 1/n² = (σa/Se)² + (σm/Sy)²; σ² = (Kf M/W)² + 3(Kfs T/Wp)²',
  source: 'Shigley 9th ed., eq. 7-7 to 7-16 (Example 7-1)',
  trust: 'verified',
  units: 'Pa',
  range:
    'ductile material; amplitude and mean of the largest cycle taken as repeated for ever; thrust and transverse shear left out',
};

/** Amplitude and mean of bending at one fibre and of torsion, N·m; amplitudes ≥ 0, means of either sign. */
export interface LoadCycle {
  readonly momentAmplitude: number;
  readonly momentMean: number;
  readonly torqueAmplitude: number;
  readonly torqueMean: number;
}

/** Von Mises stress of the amplitudes and of the means, Pa. A pressing mean counts like a pulling one. */
export interface StressCycle {
  readonly amplitude: number;
  readonly mean: number;
}

export function stressCycle(load: LoadCycle, section: RoundSection, Kf: NotchFactors): StressCycle {
  const stress = (M: number, T: number) =>
    Math.hypot((Kf.bending * M) / section.W, (Math.sqrt(3) * Kf.torsion * T) / section.Wp);
  const sound = load.momentAmplitude >= 0 && load.torqueAmplitude >= 0;
  return {
    amplitude: sound ? stress(load.momentAmplitude, load.torqueAmplitude) : Number.NaN,
    mean: stress(load.momentMean, load.torqueMean),
  };
}

/** Strengths, Pa. */
export interface Strengths {
  readonly Se: number;
  readonly Sy: number;
  readonly Sut: number;
}

const sound = ({ Se, Sy, Sut }: Strengths): boolean => Se > 0 && Sy > 0 && Sut > 0;

/** Each criterion returns n ≥ 0, Infinity without load, NaN where a strength or stress is not usable. */
export type Criterion = (stress: StressCycle, strengths: Strengths) => number;

export const goodman: Criterion = ({ amplitude, mean }, s) =>
  sound(s) ? 1 / (amplitude / s.Se + mean / s.Sut) : Number.NaN;

export const elliptic: Criterion = ({ amplitude, mean }, s) =>
  sound(s) ? 1 / Math.hypot(amplitude / s.Se, mean / s.Sy) : Number.NaN;

export const soderberg: Criterion = ({ amplitude, mean }, s) =>
  sound(s) ? 1 / (amplitude / s.Se + mean / s.Sy) : Number.NaN;

export const gerber: Criterion = ({ amplitude, mean }, s) => {
  if (!sound(s)) return Number.NaN;
  const a = amplitude / s.Se;
  return 2 / (a + Math.hypot(a, (2 * mean) / s.Sut));
};
