/**
 * What a rule hands back: a value with remarks, or the reason why there is none. Both are codes; `sentence` is the one place that
 * makes words of them. A value may be Infinity (no wear at no load; a thrust that a bearing cannot carry) and is NaN where a
 * number that went in was not usable; NaN never passes a check.
 */

const REASONS = {
  'bad-dimensions': 'bore, outer diameter and width must be positive, and the bore smaller than the outer diameter',
  'bad-rating': 'the ratings C and C0 must be positive numbers',
  'bad-factor': 'the factors e, Y, Y0 and f0 must be positive numbers',
  'bad-geometry': 'the rolling elements do not fit between bore and outer diameter: check their number and diameters',
  'contact-angle-missing':
    'fill in the contact angle (or, of a tapered or self-aligning bearing, the maker’s e, Y or Y0)',
  'contact-angle-range': 'the contact angle lies outside what the standard’s factors cover',
  'no-thrust-partner': 'only angular contact and tapered roller bearings of a single row form an adjusted pair',
  'pressure-centres-meet':
    'the pressure centres of the pair meet or cross: move the bearings apart or stand them back to back',
  'zero-span': 'the two bearings of the pair stand at the same place',
  'reliability-range': 'the reliability must lie between 0.9 and 0.9995',
  'no-turning': 'the duty does not turn this bearing: the static check governs, and a life in revolutions says nothing',
  'no-misalignment-figure':
    'fill in the maker’s limit of misalignment: there is no common figure for this kind of bearing',
  'bad-duty': 'loads and revolutions of the duty must be finite numbers, none negative, and of equal count',
} as const;

const NOTES = {
  'C-estimated': 'dynamic rating estimated, replace by the maker’s rating',
  'C0-estimated': 'static rating estimated, replace by the maker’s rating',
  'f0-estimated': 'f0 estimated from the dimensions',
  'geometry-estimated': 'number and size of the rolling elements estimated from the dimensions',
  'geometry-beyond-table': 'the proportions lie outside the rating standard’s table; its formula was carried on',
  'pitch-diameter-mean': 'pitch diameter taken as the mean of bore and outer diameter',
  'contact-angle-usual': 'contact angle not given; 45°, usual for crossed rollers, taken',
  'contact-angle-from-factors': 'contact angle worked back from the maker’s factors',
  'e-from-Y': 'e worked back from Y by continuity',
  'Y-from-e': 'Y worked back from e by continuity',
  'e-and-Y-disagree': 'the maker’s e and Y do not belong together: Y is used; check both',
  'axial-below-table': 'axial load below the standard’s table: the factors of its first row hold',
  'axial-beyond-table': 'axial load beyond the standard’s table: the factors of its last row hold',
  'load-beyond-life-formula': 'load above half of C, or above C0: the life formula does not hold there',
  'small-arc':
    'the swing is smaller than the spacing of the rolling elements: wear (false brinelling), not fatigue, may govern',
  'load-below-minimum': 'load below the usual minimum: the rolling elements may slide instead of roll',
  'reliability-capped': 'reliability beyond what the standard covers: its limit of 0.9995 is shown',
  'reliability-extrapolated': 'reliability below 0.9: the standard’s curve was carried on',
  'row-unloaded': 'one row of the adjusted pair is unloaded',
} as const;

export type Reason = keyof typeof REASONS;
export type Note = keyof typeof NOTES;

export interface Valued<T> {
  readonly value: T;
  readonly notes: readonly Note[];
}
export interface Unassessed {
  readonly unassessed: Reason;
}
export type Rated<T = number> = Valued<T> | Unassessed;

export function rated<T>(value: T, ...notes: Note[]): Valued<T> {
  return { value, notes };
}

export function unassessed(reason: Reason): Unassessed {
  return { unassessed: reason };
}

export function isUnassessed<T>(outcome: Rated<T>): outcome is Unassessed {
  return 'unassessed' in outcome;
}

/** The words for a reason (what to fill in or change) or a note. */
export function sentence(code: Reason | Note): string {
  return code in REASONS ? REASONS[code as Reason] : NOTES[code as Note];
}
