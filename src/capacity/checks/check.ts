/**
 * One capacity check: what is demanded of a part at a joint load, and what the part may be asked for. The engine, the command line,
 * the page and the report share one list of them (`capacityChecks`).
 *
 * A demand that is a convex function of the joint load comes as a `CheckForm`, so that the certified worst pose covers it. Where the
 * demand is not such a maximum itself (a sum of two norms, an iterated thrust), the form lies above it, never below, and `atPose` gives the
 * demand itself. A demand without a convex form has `atPose` alone. A check holds functions: rebuild the list from the arm in a worker.
 */

import type { Numbers } from '../../math/vector.ts';
import { type CheckForm, checkValue, type Form, formHolds, formValue } from '../../mechanics/form.ts';
import type { Rule } from '../rule.ts';
import { fewerForms } from './fewerForms.ts';

/** Demand at the joint load w[at..at+5] (canonical housing frame), in the check's unit; NaN where the load is not finite. */
export type DemandAt = (w: Numbers, at: number) => number;

export interface CapacityCheck {
  /** Unique together with joint and bearing: `static`, `thrust`, `pressure`, `flange pressure`, `stress`, `slope`, `deflection`, `equivalent`, `support`. */
  readonly check: string;
  /** In words. */
  readonly label: string;
  /** Chain index of the joint, and its index in the arm file. */
  readonly joint: number;
  readonly jointIndex: number;
  readonly bearing: 'A' | 'B' | 'ring' | null;
  /** SI, of demand and allowable. */
  readonly unit: string;
  readonly rule: Rule;
  /** Convex, equal to the demand or above it; null where there is none. */
  readonly form: CheckForm | null;
  /** The demand itself where `form` lies above it or there is none; null: the form is the demand, or no demand can be computed. */
  readonly atPose: DemandAt | null;
  /** Place on the part that each form speaks of, such as `hub`; null where all speak of one. */
  readonly places: readonly string[] | null;
  /** Null together with `unassessed`: the demand is only reported. */
  readonly allowable: number | null;
  /** A demand up to this is rounding and counts as none, unit of the demand. */
  readonly floor: number;
  /** Null: a demand above the allowable is over. Else it is not assessed, for this reason. */
  readonly beyond: string | null;
  /** Why it cannot be assessed and what to fill in; null where it can. */
  readonly unassessed: string | null;
  /** Where the allowable comes from. */
  readonly source: string | null;
  /** What was assumed, in words. */
  readonly notes: readonly string[];
}

/** What a check is called and belongs to. */
export type CheckName = Pick<CapacityCheck, 'check' | 'label' | 'joint' | 'jointIndex' | 'bearing' | 'unit' | 'rule'>;

type Rest = Partial<Omit<CapacityCheck, keyof CheckName | 'form'>>;

/** A check with a convex demand; `rest.places` goes with the forms given. Forms that never matter are left out. */
export function formCheck(name: CheckName, forms: readonly Form[], rest: Rest): CapacityCheck {
  const { check, joint, bearing, unit } = name;
  const { places } = rest;
  const kept = fewerForms(forms.map((form, k) => ({ form, place: places?.[k] ?? null })));
  return {
    ...blank(name),
    ...rest,
    form: { check, joint, bearing, unit, forms: kept.map(({ form }) => form) },
    places: places ? kept.map(({ place }) => place!) : null,
  };
}

/** A check whose demand has no convex form. */
export function poseCheck(name: CheckName, atPose: DemandAt, rest: Rest): CapacityCheck {
  return { ...blank(name), atPose, ...rest };
}

/** A check that cannot be computed at all. */
export function missingCheck(name: CheckName, unassessed: string): CapacityCheck {
  return { ...blank(name), unassessed };
}

function blank(name: CheckName): CapacityCheck {
  return {
    ...name,
    form: null,
    atPose: null,
    places: null,
    allowable: null,
    floor: 0,
    beyond: null,
    unassessed: null,
    source: null,
    notes: [],
  };
}

/** The demand at a joint load; NaN where it cannot be computed. Nothing is allocated. */
export function demandAt(check: CapacityCheck, w: Numbers, at: number): number {
  if (check.atPose) return check.atPose(w, at);
  return check.form ? checkValue(check.form, w, at) : Number.NaN;
}

/** Place that the largest form at a joint load speaks of; null where the check has no places. */
export function placeAt(check: CapacityCheck, w: Numbers, at: number): string | null {
  if (!check.places || !check.form) return null;
  let most = Number.NEGATIVE_INFINITY;
  let place: string | null = null;
  check.form.forms.forEach((f, k) => {
    if (!formHolds(f, w, at)) return;
    const value = formValue(f, w, at);
    if (value > most) {
      most = value;
      place = check.places![k]!;
    }
  });
  return place;
}

/** The convex forms of a list, for a sweep or the certified worst; rows find their check again by joint, bearing and name. */
export function capacityForms(checks: readonly CapacityCheck[]): readonly CheckForm[] {
  return checks.flatMap((check) => (check.form ? [check.form] : []));
}
