/** Stress in a section under the forces of a pose, and static safety against yielding. */
import type { Assessed, Rule } from '../rule.ts';
import { assessed } from '../rule.ts';
import type { RoundSection } from './section.ts';

export const YIELD_RULE: Rule = {
  name: 'shaft yield',
  formula: 'n = Sy/σv, σv = max( √((Kf M/W + |N|/A)² + 3(Kfs T/Wp)²), √((N/A)² + 3(τV + T/Wp)²) )',
  source:
    'Shigley 9th ed., eq. 7-15 and 7-16 (with the fatigue factors); second term: point of greatest transverse shear',
  trust: 'verified',
  units: 'Pa',
  range: 'ductile material, stress below yield, small strains',
};

/** Forces a section carries at one pose; sizes only, all ≥ 0: N·m, N·m, N, N. */
export interface SectionLoad {
  readonly moment: number;
  readonly torque: number;
  readonly axial: number;
  readonly shear: number;
}

/** Factors that raise bending and torsion stress at a notch, ≥ 1; 1 for nominal stress. */
export interface NotchFactors {
  readonly bending: number;
  readonly torsion: number;
}

export const NO_NOTCH: NotchFactors = { bending: 1, torsion: 1 };

export interface SectionStress {
  /** Pa, with the factors. */
  readonly bending: number;
  readonly torsion: number;
  readonly axial: number;
  /** Greatest transverse shear stress, at the neutral axis, Pa. */
  readonly shear: number;
  /** Greatest shear stress (Tresca) at the fibre of greatest bending, Pa. */
  readonly greatestShear: number;
  /** Von Mises stress, the larger of the bending fibre and the neutral axis, Pa. */
  readonly vonMises: number;
}

/**
 * Transverse shear stress at the neutral axis of a round bar or tube under the shear force V (N):
 * 4V/3A · (R² + Rr + r²)/(R² + r²) (Shigley Table 3-2 for the solid bar 4V/3A and the thin tube 2V/A; the general form by V Q / I b).
 */
export function transverseShear(shear: number, section: RoundSection): number {
  const R = section.diameter / 2;
  const r = section.bore / 2;
  return ((4 * shear) / (3 * section.area)) * ((R * R + R * r + r * r) / (R * R + r * r));
}

/** Stresses of the section under the load, with the notch factors; NaN where a load is negative or a factor below 1. */
export function sectionStress(load: SectionLoad, section: RoundSection, factors: NotchFactors): SectionStress {
  const { moment, torque, axial, shear } = load;
  const sound = moment >= 0 && torque >= 0 && axial >= 0 && shear >= 0 && factors.bending >= 1 && factors.torsion >= 1;
  const bending = sound ? (factors.bending * moment) / section.W : Number.NaN;
  const nominalTorsion = torque / section.Wp;
  const torsion = factors.torsion * nominalTorsion;
  const push = axial / section.area;
  const across = transverseShear(shear, section);
  const surface = Math.hypot(bending + push, Math.sqrt(3) * torsion);
  const neutral = Math.hypot(push, Math.sqrt(3) * (across + nominalTorsion));
  return {
    bending,
    torsion,
    axial: push,
    shear: across,
    greatestShear: Math.hypot((bending + push) / 2, torsion),
    vonMises: Math.max(surface, neutral),
  };
}

/** Yield strength over von Mises stress; Infinity without load. */
export function yieldSafety(load: SectionLoad, section: RoundSection, factors: NotchFactors, Sy: number): Assessed {
  const { vonMises } = sectionStress(load, section, factors);
  return assessed(
    Sy > 0 ? Sy / vonMises : Number.NaN,
    'the load, the section or the yield strength is not a usable number',
  );
}
