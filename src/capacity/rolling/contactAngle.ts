/**
 * Nominal contact angle and pitch diameter, given or worked back.
 *
 * Tapered and self-aligning bearings: e = 1.5 tan α; Y = 0.4 cot α (one row), 0.67 cot α (two rows of rollers) or 0.65 cot α (two
 * rows of balls); Y0 = 0.22 cot α (one row), 0.44 cot α (two). Source: ISO 281:2007 and ISO 76:2006, from memory.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { hasSoundDimensions, isPositive } from './bearingKind.ts';
import { isUnassessed, type Rated, rated, unassessed } from './outcome.ts';
import type { Rule } from './rule.ts';

const DEGREE = Math.PI / 180;
/** Smallest angle of the angular contact ball factors used here, and the largest of a radial bearing (ISO 281:2007). */
export const ANGULAR_CONTACT_FROM = 10 * DEGREE;
export const RADIAL_BEARING_TO = 45 * DEGREE;
/** A hair, for 45 deg that went through a conversion. */
const HAIR = 1e-9;

export const CONTACT_ANGLE_RULE: Rule = {
  name: 'contact angle',
  formula: 'tan α = e/1.5 = 0.4/Y = 0.22/Y0 (one row); 0.67/Y or 0.65/Y (balls), 0.44/Y0 (two rows)',
  source: 'ISO 281:2007, ISO 76:2006: radial bearings with α ≠ 0',
  trust: 'from memory',
  units: 'rad',
  range: 'angular contact balls 10° to 45°, other kinds above 0° to 45°',
};

/** Contact angle, rad: 0 for radial contact; given; 45° for crossed rollers; or worked back from the maker's factors. */
export function contactAngle(bearing: RollingBearing): Rated {
  const { kind, rows } = bearing;
  if (kind === 'deep-groove' || kind === 'cylindrical-roller' || kind === 'needle') return rated(0);
  const least = kind === 'angular-contact' || kind === 'four-point' ? ANGULAR_CONTACT_FROM : Number.MIN_VALUE;
  if (bearing.contactAngle !== null) {
    const a = bearing.contactAngle;
    return a >= least - HAIR && a > 0 && a <= RADIAL_BEARING_TO + HAIR ? rated(a) : unassessed('contact-angle-range');
  }
  if (kind === 'crossed-roller') return rated(45 * DEGREE, 'contact-angle-usual');
  if (kind !== 'tapered-roller' && kind !== 'self-aligning-ball') return unassessed('contact-angle-missing');
  const upper = kind === 'tapered-roller' ? 0.67 : 0.65;
  let tangent: number;
  if (bearing.e !== null) tangent = bearing.e / 1.5;
  else if (bearing.Y !== null) tangent = (rows === 1 ? 0.4 : upper) / bearing.Y;
  else if (bearing.Y0 !== null) tangent = (rows === 1 ? 0.22 : 0.44) / bearing.Y0;
  else return unassessed('contact-angle-missing');
  if (!isPositive(tangent)) return unassessed('bad-factor');
  const angle = Math.atan(tangent);
  return angle <= RADIAL_BEARING_TO + HAIR
    ? rated(angle, 'contact-angle-from-factors')
    : unassessed('contact-angle-range');
}

/** Pitch diameter, m: given, or (bore + outer)/2 (common practice). */
export function pitchDiameter(bearing: RollingBearing): Rated {
  if (!hasSoundDimensions(bearing)) return unassessed('bad-dimensions');
  if (bearing.pitchDiameter === null) return rated((bearing.bore + bearing.outer) / 2, 'pitch-diameter-mean');
  const d = bearing.pitchDiameter;
  return d > bearing.bore && d < bearing.outer ? rated(d) : unassessed('bad-geometry');
}

/** How far the pressure centre lies off the middle of the bearing's width, m: (dpw/2) tan α. From memory; ball and tapered alike. */
export function pressureCentreOffset(bearing: RollingBearing): Rated {
  const angle = contactAngle(bearing);
  if (isUnassessed(angle)) return angle;
  const pitch = pitchDiameter(bearing);
  if (isUnassessed(pitch)) return pitch;
  return rated((pitch.value / 2) * Math.tan(angle.value), ...angle.notes, ...pitch.notes);
}
