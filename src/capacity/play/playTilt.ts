/** What play in the two bearings of a joint lets its axis do: at most, and at a pose whose loads seat the journals. */
import type { Vec3 } from '../../arm/arm.ts';
import type { Assessed, Rule } from '../rule.ts';
import { type AxisShift, axisThrough } from './axisShift.ts';

export const PLAY_TILT_RULE: Rule = {
  name: 'tilt from play',
  formula: 'each way (cA + cB)/(2D), c diametral; a loaded journal lies c/2 off centre on the side of its load',
  source: 'geometry',
  trust: 'recomputed',
  units: 'rad, m',
  range: 'stiff parts, small angles; bearings that hold a slope by themselves tilt less',
};

/** A pair with diametral plays, m. */
export interface PlayPair {
  readonly stationA: number;
  readonly stationB: number;
  readonly playA: number;
  readonly playB: number;
}

const REASON = 'plays and stations of the bearings must be usable numbers';

function unsound({ stationA, stationB, playA, playB }: PlayPair): string | null {
  if (!(playA >= 0 && playB >= 0 && Number.isFinite(playA + playB + stationA + stationB))) return REASON;
  return stationA === stationB ? 'the span between the bearings is zero' : null;
}

/** Largest tilt each way from the centred axis, rad; twice that from stop to stop. */
export function playTilt(pair: PlayPair): Assessed {
  const reason = unsound(pair);
  if (reason !== null) return { unassessed: reason };
  return { value: (pair.playA + pair.playB) / (2 * Math.abs(pair.stationB - pair.stationA)) };
}

/**
 * Where the axis lies when the loads on the bearings (N, housing frame) press both journals to their sides. A bearing without
 * load leaves its journal undecided: unassessed, unless it has no play.
 */
export function seatedAxis(
  pair: PlayPair,
  loadA: readonly [number, number],
  loadB: readonly [number, number],
): Assessed<AxisShift> {
  const reason = unsound(pair);
  if (reason !== null) return { unassessed: reason };
  const seat = (load: readonly [number, number], play: number): [number, number] | null => {
    if (play === 0) return [0, 0];
    const size = Math.hypot(load[0], load[1]);
    return size > 0 && Number.isFinite(size) ? [(load[0] / size) * (play / 2), (load[1] / size) * (play / 2)] : null;
  };
  const shiftA = seat(loadA, pair.playA);
  const shiftB = seat(loadB, pair.playB);
  if (!shiftA || !shiftB) return { unassessed: 'an unloaded bearing leaves its journal anywhere within the play' };
  return { value: axisThrough(pair.stationA, shiftA, pair.stationB, shiftB) };
}

/**
 * Bound of the displacement (m) of a point at `reach` (from the joint origin, housing frame), whatever way the journals lie in their
 * plays. With λ = (reach_z - stationA)/D: across the axis (|1-λ| cA + |λ| cB)/2, along it ρ (cA + cB)/(2D), ρ the
 * distance from the axis. Attained where λ lies outside 0 to 1 (the point beyond the bearings); between them an upper bound.
 */
export function playReachBound(pair: PlayPair, reach: Vec3): Assessed {
  const reason = unsound(pair);
  if (reason !== null) return { unassessed: reason };
  const span = pair.stationB - pair.stationA;
  const share = (reach[2] - pair.stationA) / span;
  const across = (Math.abs(1 - share) * pair.playA + Math.abs(share) * pair.playB) / 2;
  const along = (Math.hypot(reach[0], reach[1]) * (pair.playA + pair.playB)) / (2 * Math.abs(span));
  const bound = Math.hypot(across, along);
  return Number.isNaN(bound) ? { unassessed: 'the reach is not a usable vector' } : { value: bound };
}
