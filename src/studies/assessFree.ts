/**
 * A check at one pose over what its case leaves free, quickly: a value that is attained, and a bound. Forms are taken one by one, largest
 * loose bound first, without regard to their torque ranges, and those that cannot matter are skipped. Where that leaves a verdict open,
 * the searches that heed the ranges settle it.
 */
import type { CapacityCheck } from '../capacity/index.ts';
import type { ChainCase } from '../mechanics/chain.ts';
import { type CheckForm, checkValue, type Form } from '../mechanics/form.ts';
import {
  boundOverFree,
  type FreeScratch,
  type FreeWorst,
  freeScratch,
  looseBoundOverFree,
  newFreeWorst,
  worstOverFree,
} from '../mechanics/freeLoads.ts';
import type { PoseLoad } from '../mechanics/freeLoadsPose.ts';

/** Each form of a check as a check of its own that holds for every torque; empty where the check has none. */
export function looseForms({ form }: Pick<CapacityCheck, 'form'>): readonly CheckForm[] {
  if (!form) return [];
  const open = (f: Form): Form => ({
    ...f,
    torqueFrom: Number.NEGATIVE_INFINITY,
    torqueTo: Number.POSITIVE_INFINITY,
  });
  return form.forms.map((f) => ({ ...form, forms: [open(f)] }));
}

/** One a thread. */
export interface QuickScratch {
  readonly trial: FreeWorst;
  readonly search: FreeScratch;
}

export function quickScratch(n: number): QuickScratch {
  return { trial: newFreeWorst(n), search: freeScratch(n) };
}

/**
 * The worst found goes to `out` (its value is the form's, attained); returns what no choice of the free parts exceeds. `loose`: as
 * `looseForms` gives it. Both NaN where the load is not finite.
 */
export function worstAndBound(
  form: CheckForm,
  loose: readonly CheckForm[],
  allowable: number | null,
  load: ChainCase,
  at: PoseLoad,
  out: FreeWorst,
  scratch: QuickScratch,
): number {
  const { trial, search } = scratch;
  const ranked = loose
    .map((one) => ({ one, bound: looseBoundOverFree(one, load, at, search) }))
    .sort((a, b) => b.bound - a.bound);
  out.value = Number.NEGATIVE_INFINITY;
  for (const { one, bound } of ranked) {
    if (bound <= out.value) break;
    worstOverFree(one, load, at, trial, search);
    trial.value = checkValue(form, trial.wrench, 0);
    if (trial.value <= out.value) continue;
    keep(trial, out);
    if (Number.isNaN(out.value)) return Number.NaN;
  }
  const settled = (bound: number) => allowable === null || bound <= allowable || out.value > allowable;
  let upper = Math.max(out.value, ranked[0]?.bound ?? Number.NaN);
  if (settled(upper)) return upper;
  upper = out.value;
  for (const { one, bound } of ranked) {
    if (bound <= Math.max(upper, allowable ?? upper)) upper = Math.max(upper, bound);
    else upper = Math.max(upper, Math.min(bound, boundOverFree(one, load, at, search)));
  }
  if (settled(upper)) return upper;
  worstOverFree(form, load, at, trial, search);
  if (trial.value > out.value) keep(trial, out);
  return settled(upper) ? upper : Math.max(out.value, Math.min(upper, boundOverFree(form, load, at, search)));
}

function keep(from: FreeWorst, to: FreeWorst): void {
  to.value = from.value;
  to.tipForce.set(from.tipForce);
  to.speed.set(from.speed);
  to.accel.set(from.accel);
  to.wrench.set(from.wrench);
}
