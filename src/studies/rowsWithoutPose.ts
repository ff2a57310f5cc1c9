/** Rows that speak of no one pose: without a joint load, and with a value alone or none. */
import type { CheckRow, Wrench } from './results.ts';

/** `jointIndex` of rows that speak for the arm as a whole. */
export const WHOLE_ARM = -1;

export const NOWHERE: Wrench = {
  force: [Number.NaN, Number.NaN, Number.NaN],
  moment: [Number.NaN, Number.NaN, Number.NaN],
};

export type Head = Pick<CheckRow, 'joint' | 'jointIndex' | 'bearing' | 'check' | 'unit'>;

/** A row that says a value and holds it against nothing. */
export function reported(head: Head & Pick<CheckRow, 'value'>): CheckRow {
  return {
    ...head,
    case: '',
    pose: [],
    free: null,
    wrench: NOWHERE,
    bound: null,
    gap: null,
    certified: null,
    allowable: null,
    utilisation: null,
    verdict: null,
    reason: null,
    source: null,
  };
}

/** A row without a value, unassessed for `reason`. */
export function missingRow(head: Head, reason: string): CheckRow {
  return { ...reported({ ...head, value: Number.NaN }), verdict: 'unassessed', reason };
}
