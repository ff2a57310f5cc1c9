/** How far the shaft gives way at the hub. Reported only: what it does at the tip is a matter of the tip error. */

import type { Rule } from '../rule.ts';
import { deflectionForms } from '../shaft/index.ts';
import { type CapacityCheck, formCheck } from './check.ts';
import { named, type PairParts, type RingParts } from './jointParts.ts';
import { supportNotes } from './shaftSupport.ts';

export const DEFLECTION_RULE: Rule = {
  name: 'deflection at the hub',
  formula: 'beam of stepped sections on two supports or a ring, with shear',
  source: 'beam theory; Roark; Shigley Table A-9 for the uniform shaft',
  trust: 'recomputed',
  units: 'm',
  range: 'linear, small slopes; housing and links stiff',
};

/** Without a shaft there is nothing to report; `stress` says what to fill in. */
export function deflectionChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  if ('unassessed' in parts.shaft) return [];
  const name = named(parts, null, {
    check: 'deflection',
    label: 'deflection of the shaft at the hub',
    unit: 'm',
    rule: DEFLECTION_RULE,
  });
  const forms = deflectionForms(parts.shaft.value, parts.support.hub);
  if ('unassessed' in forms) return [];
  return [formCheck(name, forms.value, { notes: supportNotes(parts) })];
}
