/**
 * A table of bearings to start from: the ISO 15 dimension series with estimated ratings. `models/bearings.json` is this table as text, in the
 * form of the arm file's `bearings`; a test holds the two equal. Millimetres and degrees here are those of that file.
 *
 * Names are our own: kind, dimension series, bore. `dg-02-20` is a deep groove ball bearing of series 02 with a 20 mm bore, `ac` angular
 * contact at 25°, `cr` cylindrical rollers.
 */
import type { RollingBearing, RollingKind } from '../../arm/arm.ts';
import type { BearingFile } from '../../arm/armFile.ts';
import { toSI } from '../../units/unit.ts';
import { ESTIMATED_SOURCE } from './bearingKind.ts';
import { type BoundaryDimensions, type DimensionSeries, ISO_DIMENSIONS } from './isoDimensions.ts';
import { isUnassessed } from './outcome.ts';
import { estimateRatings } from './ratingEstimate.ts';

type RollingFile = Extract<BearingFile, { kind: RollingKind }>;

interface Family {
  readonly prefix: string;
  readonly kind: RollingKind;
  readonly contactAngleDeg: number | null;
  readonly series: readonly DimensionSeries[];
  /** Smallest bore, mm, that the kind is commonly made in. */
  readonly from: number;
}

const FAMILIES: readonly Family[] = [
  { prefix: 'dg', kind: 'deep-groove', contactAngleDeg: null, series: ['18', '19', '10', '02', '03'], from: 3 },
  { prefix: 'ac', kind: 'angular-contact', contactAngleDeg: 25, series: ['19', '10', '02', '03'], from: 10 },
  { prefix: 'cr', kind: 'cylindrical-roller', contactAngleDeg: null, series: ['10', '02', '03'], from: 15 },
];

const NOTE =
  'Boundary dimensions of ISO 15 (series 18, 19, 10, 02, 03, bores 3 to 60 mm); ratings estimated by ISO 281 and ISO 76 from guessed ' +
  'internal proportions. No maker’s data. Replace every rating by that of the maker you buy from.';

/** A bearing with nothing known but kind, dimensions (m) and contact angle (rad). */
export function bareBearing(
  kind: RollingKind,
  bore: number,
  outer: number,
  width: number,
  contactAngle: number | null = null,
): RollingBearing {
  return {
    kind,
    bore,
    outer,
    width,
    C: null,
    C0: null,
    contactAngle,
    e: null,
    Y: null,
    Y0: null,
    f0: null,
    pitchDiameter: null,
    ballDiameter: null,
    balls: null,
    rows: 1,
    clearance: 'CN',
    shaftFit: null,
    housingFit: null,
    misalignment: null,
    stiffness: null,
    source: null,
  };
}

/** To three figures: an estimate has no more. */
function threeFigures(x: number): number {
  return Number(x.toPrecision(3));
}

function entry(family: Family, [bore, outer, width]: BoundaryDimensions): RollingFile {
  const angle = family.contactAngleDeg;
  const bare = bareBearing(
    family.kind,
    toSI(bore, 'mm'),
    toSI(outer, 'mm'),
    toSI(width, 'mm'),
    angle === null ? null : toSI(angle, 'deg'),
  );
  const outcome = estimateRatings(bare);
  if (isUnassessed(outcome)) throw new Error(`no estimate for ${family.kind} ${bore} x ${outer} x ${width}`);
  const { C, C0, f0, geometry } = outcome.value;
  return {
    kind: family.kind,
    bore_mm: bore,
    outer_mm: outer,
    width_mm: width,
    C_N: threeFigures(C),
    C0_N: threeFigures(C0),
    ...(angle === null ? {} : { contact_angle_deg: angle }),
    ...(f0 === null ? {} : { f0: threeFigures(f0) }),
    ball_diameter_mm: threeFigures(1000 * geometry.elementDiameter),
    balls: geometry.elements,
    source: ESTIMATED_SOURCE,
  };
}

/** The table in the form of the arm file's `bearings`, by kind, series and rising bore. */
export function bearingTable(): Readonly<Record<string, RollingFile>> {
  const table: Record<string, RollingFile> = {};
  for (const family of FAMILIES) {
    for (const series of family.series) {
      for (const row of ISO_DIMENSIONS[series]) {
        if (row[0] >= family.from) table[`${family.prefix}-${series}-${row[0]}`] = entry(family, row);
      }
    }
  }
  return table;
}

/** The text of `models/bearings.json`. */
export function bearingTableText(): string {
  return `${JSON.stringify({ note: NOTE, bearings: bearingTable() }, null, 2)}\n`;
}
