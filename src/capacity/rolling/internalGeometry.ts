/**
 * Number and size of the rolling elements, as given or, where not, by a stated guess from the boundary dimensions.
 *
 * Element diameter Dw = share · (D - d); pitch diameter (d + D)/2; number per row:
 *   - deep groove (assembled by shifting the rings): 1 + floor( fill / (2 asin(Dw/Dpw)) ), fill the arc from first to last ball;
 *   - others: floor( π / asin(gap · Dw/Dpw) ), gap the spacing in element diameters;
 *   - crossed rollers: as before, half of them leaning each way, so two rows of half the number.
 * Rollers: effective length = share of the width (crossed: of their diameter, which their square section bounds). Balls no larger
 * than 0.75 of the width.
 *
 * Source: common practice. Shares of deep groove, angular contact and cylindrical roller bearings were fitted, from below, to the
 * dynamic ratings of the handbook's 02 and 03 series; those of the other kinds are plausible, unfitted guesses.
 */
import type { RollingBearing, RollingKind } from '../../arm/arm.ts';
import { elementOf, isEstimated, isPositive } from './bearingKind.ts';
import { contactAngle, pitchDiameter } from './contactAngle.ts';
import { isUnassessed, type Note, type Rated, rated, unassessed } from './outcome.ts';

export interface InternalGeometry {
  /** Ball or (mean) roller diameter Dw, m. */
  readonly elementDiameter: number;
  /** Effective roller length, m; 0 for balls. */
  readonly rollerLength: number;
  /** Dpw, m. */
  readonly pitchDiameter: number;
  /** Elements a row. */
  readonly elements: number;
  readonly rows: 1 | 2;
  /** rad */
  readonly contactAngle: number;
  /** Dw cos α / Dpw. */
  readonly gamma: number;
}

interface Proportions {
  /** Dw over D - d. */
  readonly share: number;
  /** Spacing in element diameters, or the fill arc (rad) of a deep groove bearing. */
  readonly gap: number;
  /** Effective roller length over the width (crossed rollers: over Dw). */
  readonly length: number;
}

export const PROPORTIONS: Readonly<Record<RollingKind, Proportions>> = {
  'deep-groove': { share: 0.3125, gap: Math.PI, length: 0 },
  'angular-contact': { share: 0.29, gap: 1.3, length: 0 },
  'four-point': { share: 0.29, gap: 1.3, length: 0 },
  'self-aligning-ball': { share: 0.22, gap: 1.4, length: 0 },
  'cylindrical-roller': { share: 0.26, gap: 1.2, length: 0.4 },
  needle: { share: 0.18, gap: 1.2, length: 0.6 },
  'tapered-roller': { share: 0.25, gap: 1.2, length: 0.4 },
  'crossed-roller': { share: 0.18, gap: 1.25, length: 0.8 },
};

const LARGEST_BALL = 0.75;

/** Internal geometry of a bearing; a note says whether the rolling elements were guessed. */
export function internalGeometry(bearing: RollingBearing): Rated<InternalGeometry> {
  const pitch = pitchDiameter(bearing);
  if (isUnassessed(pitch)) return pitch;
  const angle = contactAngle(bearing);
  if (isUnassessed(angle)) return angle;
  const p = PROPORTIONS[bearing.kind];
  const notes: Note[] = [...pitch.notes, ...angle.notes];
  const ball = elementOf(bearing.kind) === 'ball';
  const crossed = bearing.kind === 'crossed-roller';

  let diameter = bearing.ballDiameter;
  if (diameter === null) {
    diameter = p.share * (bearing.outer - bearing.bore);
    if (ball) diameter = Math.min(diameter, LARGEST_BALL * bearing.width);
  }
  if (!isPositive(diameter) || diameter >= (bearing.outer - bearing.bore) / 2) return unassessed('bad-geometry');
  const half = Math.asin(Math.min(1, diameter / pitch.value));

  let elements = bearing.balls;
  if (elements === null) {
    if (bearing.kind === 'deep-groove') elements = 1 + Math.floor(p.gap / (2 * half));
    else elements = Math.floor(Math.PI / Math.asin(Math.min(1, (p.gap * diameter) / pitch.value)));
    if (crossed) elements = 2 * Math.floor(elements / 2);
  }
  // More elements than fit side by side, or too few to carry a load that turns.
  if (!(elements >= 3) || !Number.isInteger(elements) || elements * half > Math.PI * (1 + 1e-9)) {
    return unassessed('bad-geometry');
  }
  if (bearing.ballDiameter === null || bearing.balls === null || isEstimated(bearing)) notes.push('geometry-estimated');

  return rated(
    {
      elementDiameter: diameter,
      rollerLength: ball ? 0 : crossed ? p.length * diameter : p.length * bearing.width,
      pitchDiameter: pitch.value,
      elements: crossed ? elements / 2 : elements,
      rows: crossed ? 2 : bearing.rows,
      contactAngle: angle.value,
      gamma: (diameter * Math.cos(angle.value)) / pitch.value,
    },
    ...notes,
  );
}
