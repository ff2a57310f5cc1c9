/** A grid of poses in words, and why one was refused. */
import type { GridChoice, GridRefusal } from '../mechanics/gridSweepGrid.ts';
import { fromSI } from '../units/unit.ts';
import { countText, degrees } from './shown.ts';

/** How many poses, also where they are too many to count on fingers. */
function manyText(count: number): string {
  return count < 1e12 ? countText(count) : count.toExponential(1);
}

export function gridChoiceText(choice: GridChoice): string {
  return 'step' in choice ? `a step of at most ${degrees(choice.step)}°` : `${choice.samples} samples a joint`;
}

/** Degrees, rounded up to three digits, so that what is proposed is not refused in turn. */
function roundedUp(angle: number): number {
  const exact = fromSI(angle, '°');
  const unit = 10 ** (Math.floor(Math.log10(exact)) - 2);
  return Number((Math.ceil(exact / unit) * unit).toPrecision(3));
}

/** One sentence without a stop at its end: what was asked, the limit, and what would fit. */
export function gridRefusalText(refusal: GridRefusal): string {
  if (refusal.code === 'step') return 'a step must be an angle above 0°';
  if (refusal.code === 'samples') return 'samples must be a whole number of at least 2';
  const asked = gridChoiceText(refusal.path === 'step' ? { step: refusal.found } : { samples: refusal.found });
  const head = `${asked} makes ${manyText(refusal.poses)} poses, more than the ${manyText(refusal.limit)} that are allowed`;
  if (refusal.fits === null) return `${head}; no grid of this arm is coarse enough`;
  return refusal.path === 'step'
    ? `${head}; take a step of ${roundedUp(refusal.fits)}° or more`
    : `${head}; take at most ${refusal.fits} samples`;
}
