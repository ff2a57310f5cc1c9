/** Plain words about a bushing that stands alone and is asked to hold a couple. */
import type { Rule } from '../rule.ts';
import type { BushingPressure } from './pressure.ts';

export const SINGLE_BUSHING_RULE: Rule = {
  name: 'single bushing under a couple',
  formula: 'warn where M > 0; more so where L < 1.5 d or M > F L/6',
  source: 'common practice; M > F L/6 is where the straight line of pressure crosses zero',
  trust: 'common practice',
  units: '-',
  range: 'a bushing without a partner on the same shaft',
};

/** Below this length over bore a bushing guides an axis poorly. */
export const SHORT_BELOW = 1.5;

export type BushingWarning = 'single-bushing-couple' | 'short-bushing-couple' | 'couple-changes-side';

const SENTENCES: Readonly<Record<BushingWarning, string>> = {
  'single-bushing-couple':
    'One bushing alone holds the axis against tilting, over its own short length. Two bushings well apart would carry the couple with far less load.',
  'short-bushing-couple':
    'The bushing is shorter than one and a half times its bore: it guides the axis poorly and wears at its edges.',
  'couple-changes-side':
    'The couple is so large that the ends of the bushing press on opposite sides: expect edge wear and a loose axis.',
};

/** Warnings for one load on a bushing that stands alone; none where it carries no couple. */
export function singleBushingWarnings(pressure: BushingPressure, bore: number, length: number): BushingWarning[] {
  if (!(pressure.coupleForce > 0)) return [];
  const warnings: BushingWarning[] = ['single-bushing-couple'];
  if (!(length >= SHORT_BELOW * bore)) warnings.push('short-bushing-couple');
  if (pressure.changesSide) warnings.push('couple-changes-side');
  return warnings;
}

export function bushingSentence(warning: BushingWarning): string {
  return SENTENCES[warning];
}
