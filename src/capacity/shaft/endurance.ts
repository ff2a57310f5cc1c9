/** Endurance strength of the real shaft: that of a polished specimen, lowered by Marin's factors. */
import type { Shaft } from '../../arm/arm.ts';
import type { Material } from '../materials.ts';
import type { Assessed, Rule } from '../rule.ts';

export const ENDURANCE_RULE: Rule = {
  name: 'endurance strength',
  formula:
    'Se = ka kb kc kd ke Se′; Se′ = 0.5 Sut, at most 700 MPa (steel), or the strength at 5·10⁸ cycles (aluminium)',
  source: 'Shigley 9th ed., eq. 6-8, 6-18 to 6-29 (ka, kb, ke of Example 7-1 verified; other constants from memory)',
  trust: 'from memory',
  units: 'Pa',
  range: 'd up to 254 mm; room temperature (kd = 1); bending, torsion by von Mises (kc = 1); no corrosion, no fretting',
};

/** ka = a Sut^b, Sut in MPa (Shigley Table 6-2, SI form from memory; found on steel, taken for aluminium too). Never above 1. */
const SURFACE: Readonly<Record<Shaft['finish'], readonly [a: number, b: number]>> = {
  ground: [1.58, -0.085],
  machined: [4.51, -0.265],
  'hot-rolled': [57.7, -0.718],
  forged: [272, -0.995],
};

/** ke = 1 - 0.08 z for a standard deviation of 8 % (Shigley Table 6-5; 0.99 verified, the others from memory). */
const RELIABILITY: readonly (readonly [reliability: number, ke: number])[] = [
  [0.5, 1],
  [0.9, 0.897],
  [0.95, 0.868],
  [0.99, 0.814],
  [0.999, 0.753],
  [0.9999, 0.702],
  [0.99999, 0.659],
  [0.999999, 0.62],
];

const ENDURANCE_CAP = 700e6;

export function surfaceFactor(finish: Shaft['finish'], Sut: number): number {
  const [a, b] = SURFACE[finish];
  return Math.min(1, a * (Sut / 1e6) ** b);
}

/**
 * kb of a round bar in turning bending: (d/7.62 mm)^-0.107 to 51 mm, 1.51 d^-0.157 to 254 mm, never above 1 (for a shaft
 * that does not turn the formula with 0.37 d would be kinder; it is not used). NaN out of range.
 */
export function sizeFactor(diameter: number): number {
  const mm = diameter * 1e3;
  if (!(mm > 0 && mm <= 254)) return Number.NaN;
  return Math.min(1, mm <= 51 ? (mm / 7.62) ** -0.107 : 1.51 * mm ** -0.157);
}

/** ke of the next tabulated reliability at or above the one asked for; NaN beyond 0.999999 or below 0. */
export function reliabilityFactor(reliability: number): number {
  if (!(reliability >= 0)) return Number.NaN;
  return RELIABILITY.find(([tabulated]) => reliability <= tabulated)?.[1] ?? Number.NaN;
}

export interface Endurance {
  /** Pa. */
  readonly Se: number;
  readonly specimen: number;
  readonly ka: number;
  readonly kb: number;
  readonly ke: number;
  /** Null: endurance limit; else the cycles that Se holds for. */
  readonly cycles: number | null;
}

export function enduranceStrength(
  material: Material,
  diameter: number,
  finish: Shaft['finish'],
  reliability: number,
): Assessed<Endurance> {
  const { fatigue, Sut } = material;
  const specimen = fatigue === 'steel' ? Math.min(0.5 * Sut, ENDURANCE_CAP) : fatigue.strength;
  const ka = surfaceFactor(finish, Sut);
  const kb = sizeFactor(diameter);
  const ke = reliabilityFactor(reliability);
  if (Number.isNaN(kb)) return { unassessed: 'the size factor covers diameters up to 254 mm' };
  if (Number.isNaN(ke)) return { unassessed: 'the reliability must lie between 0 and 0.999999' };
  const Se = ka * kb * ke * specimen;
  if (!(Se > 0)) return { unassessed: 'the strength of the material is not a positive number' };
  return { value: { Se, specimen, ka, kb, ke, cycles: fatigue === 'steel' ? null : fatigue.cycles } };
}
