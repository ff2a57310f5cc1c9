/** How far bore and outside diameter of a bearing's rings may deviate, ISO 492, class Normal. */
import type { Assessed, Range, Rule } from '../rule.ts';

export const RING_TOLERANCE_RULE: Rule = {
  name: 'ring tolerance',
  formula: 'deviation of the mean bore or outside diameter, always to the minus side',
  source: 'ISO 492, class Normal',
  trust: 'from memory',
  units: 'm',
  range: 'bore 2.5 to 80 mm, outside diameter 6 to 150 mm',
};

/** Over, up to and including (mm), lower deviation (µm); the upper one is 0. */
type Row = readonly [over: number, incl: number, lower: number];

const BORE: readonly Row[] = [
  [2.5, 10, -8],
  [10, 18, -8],
  [18, 30, -10],
  [30, 50, -12],
  [50, 80, -15],
];

const OUTSIDE: readonly Row[] = [
  [6, 18, -8],
  [18, 30, -9],
  [30, 50, -11],
  [50, 80, -13],
  [80, 120, -15],
  [120, 150, -18],
];

const HAIR = 1e-6;

export function ringDeviation(diameter: number, ring: 'bore' | 'outside'): Assessed<Range> {
  const mm = diameter * 1e3;
  const row = (ring === 'bore' ? BORE : OUTSIDE).find(([over, incl]) => mm > over - HAIR && mm <= incl + HAIR);
  if (!row)
    return { unassessed: 'ring tolerances are known for bores of 2.5 to 80 mm and outside diameters of 6 to 150 mm' };
  return { value: { from: row[2] * 1e-6, to: 0 } };
}
