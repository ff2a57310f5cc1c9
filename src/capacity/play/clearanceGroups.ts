/** Radial internal clearance of a bearing before it is fitted: ISO 5753-1 groups, or as given. */
import type { Bearing, RollingKind } from '../../arm/arm.ts';
import type { Assessed, Range, Rule } from '../rule.ts';

export const CLEARANCE_RULE: Rule = {
  name: 'internal clearance',
  formula: 'diametral play by bore and group',
  source: 'ISO 5753-1, radial contact ball and cylindrical roller bearings, cylindrical bore',
  trust: 'from memory',
  units: 'm',
  range: 'balls: bore 2.5 to 65 mm (C5: above 6); cylindrical and needle rollers: 10 to 65 mm; C2 to C5',
};

type Group = 'C2' | 'CN' | 'C3' | 'C4' | 'C5';
type Limits = readonly [least: number, most: number];
/** Bore above, up to (mm); least and most clearance (µm) of C2, CN, C3, C4, C5. */
type Row = readonly [over: number, incl: number, C2: Limits, CN: Limits, C3: Limits, C4: Limits, C5: Limits | null];

const BALL: readonly Row[] = [
  [2.5, 6, [0, 7], [2, 13], [8, 23], [14, 29], null],
  [6, 10, [0, 7], [2, 13], [8, 23], [14, 29], [20, 37]],
  [10, 18, [0, 9], [3, 18], [11, 25], [18, 33], [25, 45]],
  [18, 24, [0, 10], [5, 20], [13, 28], [20, 36], [28, 48]],
  [24, 30, [1, 11], [5, 20], [13, 28], [23, 41], [30, 53]],
  [30, 40, [1, 11], [6, 20], [15, 33], [28, 46], [40, 64]],
  [40, 50, [1, 11], [6, 23], [18, 36], [30, 51], [45, 73]],
  [50, 65, [1, 15], [8, 28], [23, 43], [38, 61], [55, 90]],
];

const ROLLER: readonly Row[] = [
  [10, 24, [0, 25], [20, 45], [35, 60], [50, 75], [65, 90]],
  [24, 30, [0, 25], [20, 45], [35, 60], [50, 75], [70, 95]],
  [30, 40, [5, 30], [25, 50], [45, 70], [60, 85], [80, 105]],
  [40, 50, [5, 35], [30, 60], [50, 80], [70, 100], [95, 125]],
  [50, 65, [10, 40], [40, 70], [60, 90], [80, 110], [110, 140]],
];

const GROUP_AT = { C2: 2, CN: 3, C3: 4, C4: 5, C5: 6 } as const;

const TABLE: Readonly<Partial<Record<RollingKind, readonly Row[]>>> = {
  'deep-groove': BALL,
  'cylindrical-roller': ROLLER,
  needle: ROLLER,
};

const MICRON = 1e-6;
/** Bores in metres come from millimetres by a product; a hair decides no row. */
const HAIR = 1e-6;

function fromTable(kind: RollingKind, group: Group, bore: number): Assessed<Range> {
  const rows = TABLE[kind];
  if (!rows) return { unassessed: 'no table of clearance groups covers this kind: fill in a measured `clearance_um`' };
  const mm = bore * 1e3;
  const row = rows.find(([over, incl]) => mm > over + HAIR && mm <= incl + HAIR);
  const limits = row?.[GROUP_AT[group]];
  if (!limits)
    return { unassessed: 'the table of clearance groups does not reach here: fill in a measured `clearance_um`' };
  return { value: { from: limits[0] * MICRON, to: limits[1] * MICRON } };
}

/**
 * Diametral clearance before fitting, m. A bearing of an `adjusted` pair is set free of play when it is mounted, whatever its group;
 * a measured clearance counts as it is given. A bushing has its running clearance.
 */
export function internalClearance(bearing: Bearing, adjusted: boolean): Assessed<Range> {
  if (bearing.kind === 'plain-bushing') {
    const c = bearing.clearance;
    if (c === null) return { unassessed: 'fill in the running clearance of the bushing' };
    return c >= 0
      ? { value: { from: c, to: c } }
      : { unassessed: 'the clearance of the bushing is not a usable number' };
  }
  const { clearance, kind, bore } = bearing;
  if (typeof clearance === 'object') {
    if (clearance.from <= clearance.to && Number.isFinite(clearance.from + clearance.to)) return { value: clearance };
    return { unassessed: 'the measured clearance is not a range of usable numbers' };
  }
  if (adjusted) return { value: { from: 0, to: 0 } };
  return fromTable(kind, clearance, bore);
}
