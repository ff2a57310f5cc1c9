/**
 * The one colour scale of the sheet: utilisation 0 to 1 runs away from the paper by lightness alone (sepia ink, faint to full), and
 * above 1 a hue of its own with a hatch. What is not rated has no colour at all: an outline and a sparse hatch.
 */
import { scaleLinear } from 'd3-scale';
import type { Governing } from '../../studies/assessGoverning.ts';
import { attainedShare, type CheckRow, type Verdict } from '../../studies/results.ts';

export type SheetTone = 'paper' | 'night';

const STOPS = [0, 0.25, 0.5, 0.75, 1];
const RAMP: Readonly<Record<SheetTone, readonly string[]>> = {
  paper: ['#f3e7cd', '#dcbf8f', '#b98d58', '#855a33', '#4b2d17'],
  night: ['#37332c', '#5f5139', '#8f7647', '#c6a667', '#f6e3b0'],
};
const ramps = {
  paper: scaleLinear<string>().domain(STOPS).range(RAMP.paper).clamp(true),
  night: scaleLinear<string>().domain(STOPS).range(RAMP.night).clamp(true),
};

/**
 * How something is shown that is held against a limit. `open`: a utilisation is known, but the verdict is not `pass`, so it is shown
 * with the hatch of what is not assessed; `unrated`: nothing is known to hold it against.
 */
export type Standing = 'within' | 'open' | 'over' | 'unrated';

export interface Held {
  readonly verdict: Verdict | null;
  /** What is attained over the allowable; null where there is nothing to hold it against. */
  readonly found: number | null;
  /** What nothing exceeds over the allowable: the same, or more while a proof is under way. */
  readonly most: number | null;
}

/** A row, or the governing check of a part, as it is shown against its limit. */
export function heldOf(of: CheckRow | Governing | null | undefined): Held | null {
  if (!of) return null;
  const row = 'row' in of ? of.row : of;
  const attained = row ? attainedShare(row) : null;
  return { verdict: of.verdict, most: of.utilisation, found: attained ?? of.utilisation };
}

/** Only a verdict of `pass` is shown as within; what is above 1 or not a number never is. */
export function standing(held: Held | null | undefined): Standing {
  if (!held || held.found === null) return held?.verdict === 'over' ? 'over' : 'unrated';
  if (held.verdict === 'over' || !(held.found <= 1)) return 'over';
  return held.verdict === 'pass' && held.most !== null && held.most <= 1 ? 'within' : 'open';
}

/** Ink of a utilisation of 0 to 1, as `rgb(r, g, b)`: a form that CSS, SVG and three all read. */
export function utilisationColour(utilisation: number, tone: SheetTone): string {
  return ramps[tone](utilisation);
}

/** Fill of a shape that stands so, and what is laid over it; names of the patterns in `DraftingPatterns`. */
export function standingFill(held: Held | null | undefined, tone: SheetTone): { fill: string; over: string | null } {
  switch (standing(held)) {
    case 'within':
      return { fill: utilisationColour(held!.found!, tone), over: null };
    case 'open':
      return { fill: utilisationColour(held!.found!, tone), over: 'url(#hatch-unrated)' };
    case 'over':
      return { fill: 'url(#hatch-over)', over: null };
    case 'unrated':
      return { fill: 'var(--paper)', over: null };
  }
}

/** Where a bar ends: the limit stands at `LIMIT_AT` of its length, what is beyond the end is cut and marked. */
export const BAR_FULL = 1.3;

export const SCALE_STOPS = STOPS;
