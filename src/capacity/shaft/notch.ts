/** From stress concentration to its effect in fatigue. */
import type { Material } from '../materials.ts';
import type { Rule } from '../rule.ts';
import type { NotchFactors } from './stress.ts';

export const NOTCH_RULE: Rule = {
  name: 'notch sensitivity',
  formula: 'Kf = 1 + q(Kt - 1), q = 1/(1 + √a/√r) (Neuber)',
  source: 'Shigley 9th ed., eq. 6-32 to 6-35 (√a polynomials from memory; q of Example 7-1 agrees, verified)',
  trust: 'from memory',
  units: '-, r in m, Sut in Pa',
  range: 'steel of 345 to 1700 MPa with the notch radius given; else q = 1, on the safe side',
};

const PA_PER_KPSI = 6.894757e6;
const INCH = 0.0254;
const LEAST_SUT = 345e6;
const GREATEST_SUT = 1700e6;

/** √a in √inch as a cubic in Sut (kpsi), for bending (or axial) and for torsion: Shigley eq. 6-35a, 6-35b. */
const ROOT_A = {
  bending: [0.246, -3.08e-3, 1.51e-5, -2.67e-8],
  torsion: [0.19, -2.51e-3, 1.35e-5, -2.67e-8],
} as const;

/** Notch sensitivity, 0 to 1. Not known (another material, no radius, strength out of range): 1, the full stress concentration. */
export function notchSensitivity(material: Material, radius: number | null, load: 'bending' | 'torsion'): number {
  if (radius === null || material.fatigue !== 'steel') return 1;
  if (!(radius >= 0)) return Number.NaN;
  if (!(material.Sut >= LEAST_SUT && material.Sut <= GREATEST_SUT)) return 1;
  const S = material.Sut / PA_PER_KPSI;
  const [c0, c1, c2, c3] = ROOT_A[load];
  const rootA = Math.max(0, c0 + S * (c1 + S * (c2 + S * c3)));
  const rootR = Math.sqrt(radius / INCH);
  return rootR / (rootR + rootA);
}

/** Fatigue stress-concentration factors of a notch with geometric factors `Kt`, `Kts` (≥ 1; below 1 gives NaN). */
export function fatigueFactors(material: Material, geometric: NotchFactors, radius: number | null): NotchFactors {
  const factor = (Kt: number, load: 'bending' | 'torsion') =>
    Kt >= 1 ? 1 + notchSensitivity(material, radius, load) * (Kt - 1) : Number.NaN;
  return { bending: factor(geometric.bending, 'bending'), torsion: factor(geometric.torsion, 'torsion') };
}
