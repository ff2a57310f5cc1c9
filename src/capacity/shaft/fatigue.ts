/** Fatigue safety of a section: load cycles, notch, material and finish to the four criteria. */
import type { Shaft } from '../../arm/arm.ts';
import type { Material } from '../materials.ts';
import type { Assessed } from '../rule.ts';
import { type Criterion, elliptic, gerber, goodman, type LoadCycle, soderberg, stressCycle } from './criteria.ts';
import { type Endurance, enduranceStrength } from './endurance.ts';
import { fatigueFactors } from './notch.ts';
import type { RoundSection } from './section.ts';
import type { NotchFactors } from './stress.ts';

export interface Notch {
  /** Geometric stress-concentration factors, ≥ 1. */
  readonly factors: NotchFactors;
  /** m; null: not given, then the full factors count. */
  readonly radius: number | null;
}

export interface FatigueSafety {
  /** The lower of Goodman and elliptic: what the target is held against. Infinity without load. */
  readonly safety: number;
  readonly goodman: number;
  readonly elliptic: number;
  /** For comparison: Soderberg keeps yield out as well, Gerber follows the middle of test data. */
  readonly soderberg: number;
  readonly gerber: number;
  readonly endurance: Endurance;
  readonly Kf: NotchFactors;
  /** The cycle (fibre) that governs `safety`. */
  readonly governing: LoadCycle;
}

/** Worst over the cycles of all fibres. The first cycle's yield is a check of its own (`stress.ts`). */
export function fatigueSafety(
  cycles: readonly LoadCycle[],
  section: RoundSection,
  notch: Notch,
  finish: Shaft['finish'],
  material: Material,
  reliability: number,
): Assessed<FatigueSafety> {
  const endurance = enduranceStrength(material, section.diameter, finish, reliability);
  if ('unassessed' in endurance) return endurance;
  const Kf = fatigueFactors(material, notch.factors, notch.radius);
  const strengths = { Se: endurance.value.Se, Sy: material.Sy, Sut: material.Sut };
  const stresses = cycles.map((cycle) => stressCycle(cycle, section, Kf));
  const worst = (criterion: Criterion) => {
    const safeties = stresses.map((stress) => criterion(stress, strengths));
    return safeties.some(Number.isNaN) ? Number.NaN : Math.min(...safeties);
  };
  const result = {
    goodman: worst(goodman),
    elliptic: worst(elliptic),
    soderberg: worst(soderberg),
    gerber: worst(gerber),
  };
  const safety = Math.min(result.goodman, result.elliptic);
  const at = stresses.findIndex((s) => goodman(s, strengths) === safety || elliptic(s, strengths) === safety);
  const governing = cycles[at];
  if (Number.isNaN(safety) || !governing) {
    return { unassessed: 'the load cycle, the section or a stress-concentration factor is not a usable number' };
  }
  return { value: { safety, ...result, endurance: endurance.value, Kf, governing } };
}
