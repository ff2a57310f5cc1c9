/** From the clearance of a bearing in its box and the fits of its seats to the play it works with. */
import type { Bearing, RollingBearing } from '../../arm/arm.ts';
import type { Assessed, Range, Rule } from '../rule.ts';
import { internalClearance } from './clearanceGroups.ts';
import { seatDeviation } from './fits.ts';
import { ringDeviation } from './ringTolerance.ts';

export const WORKING_CLEARANCE_RULE: Rule = {
  name: 'working clearance',
  formula: 'play = internal clearance - share × interference of each press fit + gap of each loose fit; never below 0',
  source: 'share of the interference 0.7 to 0.9: common trade figure, from memory',
  trust: 'from memory',
  units: 'm, diametral',
  range: 'cylindrical seats, both rings at one temperature; extremes of all tolerances together',
};

/** Share of an interference that a ring passes on to its raceway: least and most. */
export const INTERFERENCE_SHARE: Range = { from: 0.7, to: 0.9 };

export interface WorkingClearance {
  /** Diametral play of the journal in the housing, m, ≥ 0. */
  readonly play: Range;
  /** Clearance between raceways once fitted, m; below 0 the bearing is preloaded. */
  readonly fitted: Range;
  readonly preloaded: 'never' | 'possibly' | 'always';
  /** Seats whose fit is not given: their interference is taken as 0 and their gap as 0. */
  readonly fitsNotGiven: readonly ('shaft' | 'housing')[];
}

const NONE: Range = { from: 0, to: 0 };

/** Interference of one seat, m; negative is a gap. Shaft: seat minus bore; housing: outside diameter minus seat. */
export function interference(bearing: RollingBearing, seat: 'shaft' | 'housing'): Assessed<Range> | null {
  const code = seat === 'shaft' ? bearing.shaftFit : bearing.housingFit;
  if (code === null) return null;
  const diameter = seat === 'shaft' ? bearing.bore : bearing.outer;
  const part = seatDeviation(code, diameter, seat === 'shaft' ? 'shaft' : 'hole');
  if ('unassessed' in part) return part;
  const ring = ringDeviation(diameter, seat === 'shaft' ? 'bore' : 'outside');
  if ('unassessed' in ring) return ring;
  const [outer, inner] = seat === 'shaft' ? [part.value, ring.value] : [ring.value, part.value];
  return { value: { from: outer.from - inner.to, to: outer.to - inner.from } };
}

/** Working clearance of one bearing. In an adjusted pair the fits are part of the adjustment: no play, or the measured one. */
export function workingClearance(bearing: Bearing, adjusted: boolean): Assessed<WorkingClearance> {
  const internal = internalClearance(bearing, adjusted);
  if ('unassessed' in internal) return internal;
  const asIs = { play: internal.value, fitted: internal.value, preloaded: 'never', fitsNotGiven: [] } as const;
  if (bearing.kind === 'plain-bushing' || adjusted) return { value: asIs };
  const seats = (['shaft', 'housing'] as const).map((seat) => ({ seat, fit: interference(bearing, seat) }));
  let { from, to } = internal.value;
  let gapFrom = 0;
  let gapTo = 0;
  for (const { fit } of seats) {
    if (fit !== null && 'unassessed' in fit) return fit;
    const press = fit === null ? NONE : fit.value;
    from -= INTERFERENCE_SHARE.to * Math.max(0, press.to);
    to -= INTERFERENCE_SHARE.from * Math.max(0, press.from);
    gapFrom += Math.max(0, -press.to);
    gapTo += Math.max(0, -press.from);
  }
  if (Number.isNaN(from + to)) return { unassessed: 'the clearance is not a usable number' };
  return {
    value: {
      play: { from: Math.max(0, from) + gapFrom, to: Math.max(0, to) + gapTo },
      fitted: { from, to },
      preloaded: to < 0 ? 'always' : from < 0 ? 'possibly' : 'never',
      fitsNotGiven: seats.filter(({ fit }) => fit === null).map(({ seat }) => seat),
    },
  };
}
