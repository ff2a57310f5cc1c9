/**
 * Projected pressure of a plain bushing, p = Fr/(d L), and of the thrust on its flange, against its limit and the target. In a pair the couple goes to both bearings
 * as radial loads, so each bushing carries Fr alone; a journal that slopes more than the clearance lets it is the check `slope`.
 */
import type { PlainBushing } from '../../arm/arm.ts';
import { axialForms } from '../../mechanics/bearingPair.ts';
import { FLANGE_RULE, flangeFace, PRESSURE_RULE } from '../plain/index.ts';
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
    return [formCheck(name, forms, pressureLimit(parts, bushing)), ...flangeCheck(parts, side, bushing)];
  });
}

/** What a pressure on the bushing is held against. */
function pressureLimit(parts: PairParts, bushing: PlainBushing): Partial<CapacityCheck> {
  const limits = [
    { value: bushing.pressureLimit, source: bushing.source ?? 'limit of the bushing in the arm file' },
    { value: parts.targets.pressure.value, source: 'target of the arm file' },
  ].filter((limit): limit is { value: number; source: string } => limit.value !== null);
  if (limits.length === 0) return { unassessed: 'fill in `pressure_limit_MPa` of the bushing' };
  const least = limits.reduce((a, b) => (b.value < a.value ? b : a));
  return { allowable: least.value, source: least.source };
}

/** Pressure on the flange where the bushing has one and thrust can reach it. */
function flangeCheck(parts: PairParts, side: 'A' | 'B', bushing: PlainBushing): readonly CapacityCheck[] {
  const { thrust } = parts.support;
  if (bushing.flangeOuter === null || (thrust !== 'both' && thrust !== side)) return [];
  const name = named(parts, side, {
    check: 'flange pressure',
    label: 'pressure on the flange',
    unit: 'Pa',
    rule: FLANGE_RULE,
  });
  const face = flangeFace(bushing.bore, bushing.flangeOuter);
  if ('unassessed' in face) return [missingCheck(name, face.unassessed)];
  // Thrust of one way is linear, not a norm: every part of the form is divided.
  const per = (v: number) => v / face.value.area;
  const forms = axialForms(thrust, side).map((f) => ({ ...f, P: f.P.map(per), c: f.c.map(per), l: f.l.map(per) }));
  return [formCheck(name, forms, pressureLimit(parts, bushing))];
}
