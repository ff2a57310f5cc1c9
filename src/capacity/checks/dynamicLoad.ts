/**
 * Dynamic equivalent load P of a rolling bearing at a pose. It is not convex in the load where the factors follow the axial load, and one
 * pose has no life: it is reported, and the duty turns it into a life.
 */

import type { RollingBearing } from '../../arm/arm.ts';
import { type CheckForm, checkValue } from '../../mechanics/form.ts';
import {
  DYNAMIC_EQUIVALENT_RULE,
  type DynamicForm,
  dynamicEquivalent,
  dynamicForm,
  isUnassessed,
  needsPartner,
  sentence,
} from '../rolling/index.ts';
import type { Assessed } from '../rule.ts';
import { rowLoad } from './adjustedParts.ts';
import { NO_PARTNER } from './bearingStatic.ts';
import { type CapacityCheck, type DemandAt, poseCheck } from './check.ts';
import {
  axialOn,
  type BearingSide,
  isRingParts,
  named,
  type PairParts,
  type RingParts,
  radialNorms,
  tiltingNorms,
} from './jointParts.ts';

export interface DynamicLoad {
  readonly bearing: RollingBearing;
  readonly form: DynamicForm;
  /** P at a joint load, N. Nothing is allocated. */
  readonly at: DemandAt;
  readonly notes: readonly string[];
}

/** P of one bearing of a joint, ready for many poses; null for a bushing, which has none. */
export function dynamicLoad(parts: PairParts | RingParts, side: BearingSide): Assessed<DynamicLoad> | null {
  const outcome = isRingParts(parts) ? parts.bearing : parts.bearings[side === 'B' ? 'B' : 'A'];
  if ('unassessed' in outcome) return outcome;
  const bearing = outcome.value;
  if (bearing.kind === 'plain-bushing') return null;
  const factors = dynamicForm(bearing);
  if (isUnassessed(factors)) return { unassessed: sentence(factors.unassessed) };
  const form = factors.value;
  const notes = factors.notes.map(sentence);
  const size = (forms: CheckForm['forms']): CheckForm => {
    return { check: 'size', joint: parts.joint, bearing: null, unit: 'N', forms };
  };
  const radial = size(radialNorms(parts, side));
  if (isRingParts(parts)) {
    if (form.momentArm === null) return { unassessed: 'this kind of bearing carries no moment by itself' };
    const moment = size(tiltingNorms(parts));
    const at: DemandAt = (w, o) =>
      dynamicEquivalent(form, checkValue(radial, w, o), w[o + 2]!, checkValue(moment, w, o));
    return { value: { bearing, form, at, notes } };
  }
  if (parts.adjusted) {
    if ('unassessed' in parts.adjusted) return parts.adjusted;
    const load = rowLoad(parts.adjusted.value, side === 'B' ? 'B' : 'A');
    const out = new Float64Array(2);
    const at: DemandAt = (w, o) => {
      load(w, o, out);
      return dynamicEquivalent(form, out[0]!, out[1]!);
    };
    return { value: { bearing, form, at, notes } };
  }
  if (needsPartner(bearing)) return { unassessed: NO_PARTNER };
  const { support } = parts;
  const which = side === 'B' ? 'B' : 'A';
  const at: DemandAt = (w, o) => dynamicEquivalent(form, checkValue(radial, w, o), axialOn(support, which, w[o + 2]!));
  return { value: { bearing, form, at, notes } };
}

export function dynamicChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  const sides: readonly BearingSide[] = isRingParts(parts) ? ['ring'] : ['A', 'B'];
  return sides.flatMap((side) => {
    const load = dynamicLoad(parts, side);
    // What is missing is said once, by the static check of the same bearing.
    if (load === null || 'unassessed' in load) return [];
    const name = named(parts, side, {
      check: 'equivalent',
      label: 'dynamic equivalent load',
      unit: 'N',
      rule: DYNAMIC_EQUIVALENT_RULE,
    });
    return [poseCheck(name, load.value.at, { notes: load.value.notes })];
  });
}
