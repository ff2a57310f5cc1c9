/**
 * Number and size of the rolling elements, as given or, where not, by a stated guess from the boundary dimensions.
 *
 * Element diameter Dw = max( share · (D - d) - wall, least · (D - d) ): the rings of small bearings do not thin in proportion. Balls no
 * larger than 0.75 of the width. Pitch diameter (d + D)/2. Number a row:
 *   - deep groove (assembled by shifting the rings): 1 + floor( fill / (2 asin(Dw/Dpw)) ), fill the arc from first to last ball;
 *   - others: floor( π / asin(gap · Dw/Dpw) ), gap the spacing in element diameters;
 *   - crossed rollers: as before, half of them leaning each way, so two rows of half the number.
 * Effective roller length = max( length · B - flange, 0.3 B ); crossed rollers: length · Dw, which their square section bounds.
 *
 * Source: common practice. Numbers of deep groove, angular contact and cylindrical roller bearings were fitted to the dynamic ratings of
 * the handbook's 02 and 03 series (bores from 10 and, rollers, 25 mm); those of the other kinds are plausible, unfitted guesses.
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
  /** Dw over D - d, m taken off for the walls, and the least Dw over D - d. */
  readonly share: number;
  readonly wall: number;
  readonly least: number;
  /** Spacing in element diameters, or the fill arc (rad) of a deep groove bearing. */
  readonly gap: number;
  /** Effective roller length over the width (crossed rollers: over Dw), and m taken off for the flanges. */
  readonly length: number;
  readonly flange: number;
}

function balls(share: number, wall: number, least: number, gap: number): Proportions {
  return { share, wall, least, gap, length: 0, flange: 0 };
}

const PROPORTIONS: Readonly<Record<RollingKind, Proportions>> = {
  'deep-groove': balls(0.335, 0.0005, 0.26, Math.PI),
  'angular-contact': balls(0.335, 0.001, 0.24, 1.35),
  'four-point': balls(0.335, 0.001, 0.24, 1.35),
  'self-aligning-ball': balls(0.22, 0, 0.22, 1.4),
  'cylindrical-roller': { share: 0.25, wall: 0.0012, least: 0.18, gap: 1.2, length: 0.55, flange: 0.003 },
  needle: { share: 0.18, wall: 0, least: 0.18, gap: 1.2, length: 0.6, flange: 0 },
  'tapered-roller': { share: 0.24, wall: 0, least: 0.24, gap: 1.2, length: 0.4, flange: 0 },
  'crossed-roller': { share: 0.18, wall: 0, least: 0.18, gap: 1.25, length: 0.8, flange: 0 },
};

/** Over the width. */
const LARGEST_BALL = 0.75;
const SHORTEST_ROLLER = 0.3;

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
    const section = bearing.outer - bearing.bore;
    diameter = Math.max(p.share * section - p.wall, p.least * section);
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

  let rollerLength = 0;
  if (crossed) rollerLength = p.length * diameter;
  else if (!ball) rollerLength = Math.max(p.length * bearing.width - p.flange, SHORTEST_ROLLER * bearing.width);

  return rated(
    {
      elementDiameter: diameter,
      rollerLength,
      pitchDiameter: pitch.value,
      elements: crossed ? elements / 2 : elements,
      rows: crossed ? 2 : bearing.rows,
      contactAngle: angle.value,
      gamma: (diameter * Math.cos(angle.value)) / pitch.value,
    },
    ...notes,
  );
}
