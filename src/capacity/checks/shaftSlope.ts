/**
 * Slope of the shaft at each bearing of a pair against what the bearing bears (its own limit and the target, the smaller); a ring holds
 * the axis by itself and has none. Linear in the joint load for a given shaft, so the check is exact.
 */
import { SLOPE_RULE, slopeForms, slopeLimit } from '../shaft/index.ts';
import { type CapacityCheck, formCheck, missingCheck } from './check.ts';
import { isRingParts, named, type PairParts, type RingParts } from './jointParts.ts';
import { heldStation, supportNotes } from './shaftSupport.ts';

export function slopeChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  if (isRingParts(parts)) return [];
  return (['A', 'B'] as const).map((side): CapacityCheck => {
    const name = named(parts, side, { check: 'slope', label: 'slope of the shaft', unit: 'rad', rule: SLOPE_RULE });
    if ('unassessed' in parts.shaft) return missingCheck(name, parts.shaft.unassessed);
    const station = side === 'A' ? parts.support.stationA : parts.support.stationB;
    const forms = slopeForms(parts.shaft.value, heldStation(parts.shaft.value, station));
    if ('unassessed' in forms) return missingCheck(name, forms.unassessed);
    const bearing = parts.bearings[side];
    const own = 'unassessed' in bearing ? bearing : slopeLimit(bearing.value);
    const target = parts.targets.slope.value;
    const notes = supportNotes(parts);
    if ('unassessed' in own) {
      if (target === null) return formCheck(name, forms.value, { unassessed: own.unassessed, notes });
      const source = `target of the arm file alone; of the bearing itself nothing is known: ${own.unassessed}`;
      return formCheck(name, forms.value, { allowable: target, source, notes });
    }
    const { limit, source } = own.value;
    const byTarget = target !== null && target < limit;
    return formCheck(name, forms.value, {
      allowable: byTarget ? target : limit,
      source: byTarget ? 'target of the arm file' : source,
      notes,
    });
  });
}
