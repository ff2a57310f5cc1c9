/** Round sections, solid or hollow. */
import type { Rule } from '../rule.ts';

export const SECTION_RULE: Rule = {
  name: 'round section',
  formula: 'I = π(d⁴ - b⁴)/64, J = 2I, W = 2I/d, Wp = 2W, A = π(d² - b²)/4',
  source: 'geometry',
  trust: 'recomputed',
  units: 'm, m², m³, m⁴',
  range: 'd > 0, 0 ≤ bore < d',
};

export interface RoundSection {
  readonly diameter: number;
  readonly bore: number;
  /** m². */
  readonly area: number;
  /** Second moment of area about a diameter, m⁴; the polar one is twice that. */
  readonly I: number;
  readonly J: number;
  /** Section moduli of bending and torsion, m³. */
  readonly W: number;
  readonly Wp: number;
}

/** Every property is NaN where the diameters make no section. */
export function roundSection(diameter: number, bore: number): RoundSection {
  const sound = diameter > 0 && bore >= 0 && bore < diameter && Number.isFinite(diameter);
  const area = sound ? (Math.PI * (diameter ** 2 - bore ** 2)) / 4 : Number.NaN;
  const I = sound ? (Math.PI * (diameter ** 4 - bore ** 4)) / 64 : Number.NaN;
  const W = (2 * I) / diameter;
  return { diameter, bore, area, I, J: 2 * I, W, Wp: 2 * W };
}

/**
 * Share κ of the area that carries transverse shear evenly, for the shear stiffness κGA of a beam:
 * 6(1+ν)(1+m²)² / ((7+6ν)(1+m²)² + (20+12ν)m²), m = bore/diameter (Cowper 1966, from memory; its ends, solid 6(1+ν)/(7+6ν) and thin
 * tube 2(1+ν)/(4+3ν), follow from it).
 */
export function shearShare(diameter: number, bore: number, poisson: number): number {
  const m2 = (bore / diameter) ** 2;
  const s = (1 + m2) ** 2;
  return (6 * (1 + poisson) * s) / ((7 + 6 * poisson) * s + (20 + 12 * poisson) * m2);
}
