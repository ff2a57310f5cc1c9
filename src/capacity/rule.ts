/** What every rule of `shaft/`, `plain/` and `play/` hands back and says about itself. */

export type { Rule, Trust } from './rolling/index.ts';

/** A value, or why there is none and what to fill in. */
export type Assessed<T = number> = { readonly value: T } | { readonly unassessed: string };

/** The number as a value; a sentence where it is not a number, so that nothing broken can pass. Infinity is a value (no load). */
export function assessed(value: number, reason: string): Assessed {
  return Number.isNaN(value) ? { unassessed: reason } : { value };
}

/** A quantity known only between limits, smallest first. */
export interface Range {
  readonly from: number;
  readonly to: number;
}

/** Demand over limit: 1 is the limit. Not a number, a negative demand or limit: unassessed. A missing limit (null) says what to fill in. */
export function utilisation(demand: number, limit: number | null, fillIn: string): Assessed {
  if (limit === null) return { unassessed: fillIn };
  if (!(demand >= 0 && limit >= 0)) return { unassessed: 'the demand or its limit is not a usable number' };
  if (limit === 0) return { value: demand === 0 ? 0 : Number.POSITIVE_INFINITY };
  return { value: demand / limit };
}
