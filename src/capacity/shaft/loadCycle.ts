/**
 * The cycle a shaft section sees over a set of poses: the real range between them, fibre by fibre round the circumference.
 *
 * A bending moment vector (Mx, My) on the section stresses the fibre at angle φ (from housing x, about z) as does the moment
 * `Mx sin φ - My cos φ`, positive in tension. A shaft that turns with the link carries its fibres along: φ = ψ + q, ψ the fibre's own
 * angle. A shaft that stays with the housing keeps φ = ψ. Gravity turns relative to a turning shaft, so the stress swings
 * through part of a cycle; a full reversal is not assumed, only found where it happens.
 */
import type { Shaft } from '../../arm/arm.ts';
import type { Assessed, Range, Rule } from '../rule.ts';
import type { LoadCycle } from './criteria.ts';

export const LOAD_CYCLE_RULE: Rule = {
  name: 'shaft load cycle',
  formula: 'Ma, Mm = (max ∓ min)/2 over the poses of Mx sin φ - My cos φ at each fibre; Ta, Tm alike',
  source: 'statics; largest range as one cycle repeated for ever; ranges of bending and torsion taken as simultaneous',
  trust: 'common practice',
  units: 'N·m',
  range: 'any set of poses; the order of the poses does not matter',
};

/** Layout of a history: one pose after another, [Mx, My, T, q], N·m and rad, moments ON the section in the housing frame. */
export const HISTORY_STRIDE = 4;

/** Fibres looked at. Between two of them an amplitude is at most 1/cos(π/FIBRES) (0.015 %) larger, and is raised by that. */
const FIBRES = 180;
const BETWEEN_FIBRES = 1 / Math.cos(Math.PI / FIBRES);

/** One load cycle a fibre, from ψ = 0 in even steps round the circumference. */
export function loadCycles(history: Float64Array, turnsWith: Shaft['turnsWith']): Assessed<readonly LoadCycle[]> {
  const poses = history.length / HISTORY_STRIDE;
  if (!(poses >= 1) || !Number.isInteger(poses)) return { unassessed: 'no poses to take the load cycle from' };
  const most = new Float64Array(FIBRES).fill(Number.NEGATIVE_INFINITY);
  const least = new Float64Array(FIBRES).fill(Number.POSITIVE_INFINITY);
  const cosine = Float64Array.from({ length: FIBRES }, (_, k) => Math.cos((2 * Math.PI * k) / FIBRES));
  const sine = Float64Array.from({ length: FIBRES }, (_, k) => Math.sin((2 * Math.PI * k) / FIBRES));
  let torqueMost = Number.NEGATIVE_INFINITY;
  let torqueLeast = Number.POSITIVE_INFINITY;
  for (let p = 0; p < history.length; p += HISTORY_STRIDE) {
    const Mx = history[p]!;
    const My = history[p + 1]!;
    const T = history[p + 2]!;
    const q = turnsWith === 'link' ? history[p + 3]! : 0;
    if (!Number.isFinite(Mx + My + T + q)) return { unassessed: 'the load on the shaft is not a number in some pose' };
    // The moment seen from the shaft: turned back by q.
    const mx = Mx * Math.cos(q) + My * Math.sin(q);
    const my = My * Math.cos(q) - Mx * Math.sin(q);
    for (let k = 0; k < FIBRES; k++) {
      const moment = mx * sine[k]! - my * cosine[k]!;
      if (moment > most[k]!) most[k] = moment;
      if (moment < least[k]!) least[k] = moment;
    }
    if (T > torqueMost) torqueMost = T;
    if (T < torqueLeast) torqueLeast = T;
  }
  const torqueAmplitude = (torqueMost - torqueLeast) / 2;
  const torqueMean = (torqueMost + torqueLeast) / 2;
  const value = Array.from({ length: FIBRES }, (_, k) => ({
    momentAmplitude: (BETWEEN_FIBRES * (most[k]! - least[k]!)) / 2,
    momentMean: (BETWEEN_FIBRES * (most[k]! + least[k]!)) / 2,
    torqueAmplitude,
    torqueMean,
  }));
  return { value };
}

/**
 * Cycles, one of which is at least as hard as the real one when a fibre's moment is known only to lie within `moment`. An inner range
 * has (amplitude, mean) within the triangle (half the range, its middle), (0, either end). Every criterion's 1/n is convex in
 * them, so its worst stands at a corner: the whole range swung through, or its outer end held still. The same for the torque.
 */
function corners(moment: Range, torque: Range): LoadCycle[] {
  const ends = ({ from, to }: Range) => [
    { amplitude: (to - from) / 2, mean: (to + from) / 2 },
    { amplitude: 0, mean: Math.abs(to) > Math.abs(from) ? to : from },
  ];
  return ends(moment).flatMap((m) =>
    ends(torque).map((t) => ({
      momentAmplitude: m.amplitude,
      momentMean: m.mean,
      torqueAmplitude: t.amplitude,
      torqueMean: t.mean,
    })),
  );
}

const sound = (range: Range): boolean => Number.isFinite(range.from + range.to) && range.from <= range.to;

/**
 * Bound from the largest bending moment alone (N·m, whatever its direction) and the range of the torque: full reversal, or the
 * moment held. Holds for a shaft that turns and for one that does not.
 */
export function cyclesFromPeak(peakMoment: number, torque: Range): Assessed<readonly LoadCycle[]> {
  const moment = { from: -peakMoment, to: peakMoment };
  if (!(sound(moment) && sound(torque))) return { unassessed: 'a range of the load on the shaft is not a number' };
  return { value: corners(moment, torque) };
}

/** Bound from ranges of both components of the moment in a frame that the shaft's fibres keep to (housing, for a standing shaft). */
export function cyclesFromRanges(Mx: Range, My: Range, torque: Range): Assessed<readonly LoadCycle[]> {
  if (![Mx, My, torque].every(sound)) return { unassessed: 'a range of the load on the shaft is not a number' };
  const half = (range: Range) => (range.to - range.from) / 2;
  const middle = (range: Range) => (range.to + range.from) / 2;
  const value = Array.from({ length: FIBRES }, (_, k) => {
    const s = Math.sin((2 * Math.PI * k) / FIBRES);
    const c = Math.cos((2 * Math.PI * k) / FIBRES);
    const swing = half(Mx) * Math.abs(s) + half(My) * Math.abs(c);
    const mean = middle(Mx) * s - middle(My) * c;
    return corners({ from: BETWEEN_FIBRES * (mean - swing), to: BETWEEN_FIBRES * (mean + swing) }, torque);
  }).flat();
  return { value };
}
