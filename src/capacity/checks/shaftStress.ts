/**
 * Von Mises stress of the shaft against its yield strength over the safety asked for, at every section where the bending moment or the
 * section can be worst: hub, points of support, drive, and ends of sections, each on both sides. One check a joint: the sections share
 * one allowable, and the place of the worst is told. Formula and factors: `../shaft/stress.ts`; the stress of the thrust is added in full,
 * which is never below the fibre's own and above it by less than the thrust stress.
 */
import type { Form } from '../../mechanics/form.ts';
import { stressForms, YIELD_RULE } from '../shaft/index.ts';
import { type CapacityCheck, formCheck, missingCheck } from './check.ts';
import { named, type PairParts, type RingParts } from './jointParts.ts';
import { placeName } from './shaftPlaces.ts';

export function stressChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  const name = named(parts, null, { check: 'stress', label: 'stress of the shaft', unit: 'Pa', rule: YIELD_RULE });
  if ('unassessed' in parts.shaft) return [missingCheck(name, parts.shaft.unassessed)];
  const shaft = parts.shaft.value;
  const forms: Form[] = [];
  const places: string[] = [];
  for (let k = 0; k < shaft.points.length; k++) {
    const own = stressForms(shaft, k);
    if ('unassessed' in own) return [missingCheck(name, own.unassessed)];
    forms.push(...own.value);
    const place = placeName(parts, shaft.points[k]!.station);
    for (let i = 0; i < own.value.length; i++) places.push(place);
  }
  const { material } = shaft;
  const safety = parts.targets.shaftYieldSafety;
  if (safety.value === null) return [formCheck(name, forms, { places, unassessed: safety.source })];
  const why = safety.given ? 'arm file' : `default: ${safety.source}`;
  return [
    formCheck(name, forms, {
      places,
      allowable: material.Sy / safety.value,
      source: `yield strength of ${material.name}, ${material.condition} (${material.source}), over ${safety.value} (${why})`,
      notes: [
        `strength: ${material.note}`,
        'stress concentration with its effect in fatigue, as the yield rule has it',
      ],
    }),
  ];
}
