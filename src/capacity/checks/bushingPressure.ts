/**
 * Projected pressure of a plain bushing, p = Fr/(d L), against its limit and the target. In a pair the couple goes to both bearings
 * as radial loads, so each bushing carries Fr alone; a journal that slopes more than the clearance lets it is the check `slope`.
 */
import { PRESSURE_RULE } from '../plain/index.ts';
import { type CapacityCheck, formCheck, missingCheck } from './check.ts';
import { isRingParts, named, type PairParts, type RingParts, radialNorms } from './jointParts.ts';
import { scaledForms } from './normSums.ts';

export function pressureChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  if (isRingParts(parts)) return [];
  return (['A', 'B'] as const).flatMap((side): readonly CapacityCheck[] => {
    const outcome = parts.bearings[side];
    if ('unassessed' in outcome || outcome.value.kind !== 'plain-bushing') return [];
    const bushing = outcome.value;
    const name = named(parts, side, {
      check: 'pressure',
      label: 'projected pressure',
      unit: 'Pa',
      rule: PRESSURE_RULE,
    });
    const area = bushing.bore * bushing.width;
    if (!(area > 0)) return [missingCheck(name, 'bore and length of the bushing must be positive numbers')];
    const forms = scaledForms(radialNorms(parts, side), 1 / area);
    const limits = [
      { value: bushing.pressureLimit, source: bushing.source ?? 'limit of the bushing in the arm file' },
      { value: parts.targets.pressure.value, source: 'target of the arm file' },
    ].filter((limit): limit is { value: number; source: string } => limit.value !== null);
    if (limits.length === 0) {
      return [formCheck(name, forms, { unassessed: 'fill in `pressure_limit_MPa` of the bushing' })];
    }
    const least = limits.reduce((a, b) => (b.value < a.value ? b : a));
    return [formCheck(name, forms, { allowable: least.value, source: least.source })];
  });
}
