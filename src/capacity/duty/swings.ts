/**
 * What a joint turns along a path, and how: the angle swept, where it turns back, and the swings between. Every stroke from one turn to the
 * next is half a swing of ± half its size. A stroke shorter than a dead band is no stroke: rounding and noise turn nothing back.
 */
import { angleAt, type PathMotion, turnsIn } from './pathMotion.ts';

/** Dead band, rad (0.1°; common practice: about the play of a gearbox). */
export const DEAD_BAND = (0.1 * Math.PI) / 180;

export interface PathSwings {
  /** rad in one pass of the path, both directions counted. */
  readonly swept: number;
  /** Turns back in one pass; of a closed path all round, so that they are even. */
  readonly reversals: number;
  /** Half the size of each stroke between them, rad; empty where the joint stands still or only turns on. */
  readonly halfSwings: Float64Array;
  /** Swept by strokes that do not come back (turning on, or a path without a reversal), rad. */
  readonly turnedOn: number;
}

/** Angles of joint j at the poses and at its turns between them, in order. */
function angles(path: PathMotion, j: number): number[] {
  const turns = new Float64Array(2);
  const list = [path.pose[j]!];
  for (let k = 0; k + 1 < path.rows; k++) {
    const count = turnsIn(path, k, j, turns);
    for (let c = 0; c < count; c++) list.push(angleAt(path, k, turns[c]!, j));
    list.push(path.pose[(k + 1) * path.n + j]!);
  }
  return list;
}

/** The extremes among a list of angles that lie apart by more than the dead band, in turn high and low, with both ends. */
function extremes(list: readonly number[], band: number): number[] {
  const found = [list[0]!];
  let peak = list[0]!;
  let way = 0;
  for (const q of list) {
    if (way === 0) {
      // The start is whatever lies furthest the other way of the first stroke.
      if (Math.abs(q - found[0]!) > band) {
        way = Math.sign(q - found[0]!);
        peak = q;
      }
    } else if (way * (q - peak) >= 0) peak = q;
    else if (Math.abs(q - peak) > band) {
      found.push(peak);
      way = -way;
      peak = q;
    }
  }
  if (way !== 0) found.push(peak);
  return found;
}

/** Counts the swings of joint j along a path. */
export function pathSwings(path: PathMotion, j: number, band = DEAD_BAND): PathSwings {
  const list = angles(path, j);
  let swept = 0;
  for (let k = 1; k < list.length; k++) swept += Math.abs(list[k]! - list[k - 1]!);
  const comesBack = Math.abs(list[list.length - 1]! - list[0]!) < band;
  let round = list;
  if (path.closed && comesBack) {
    // Begin at the highest angle, so that no stroke is cut in two.
    let top = 0;
    for (let k = 1; k < list.length; k++) if (list[k]! > list[top]!) top = k;
    round = [...list.slice(top), ...list.slice(1, top + 1)];
  }
  const found = extremes(round, band);
  const strokes = found.length - 1;
  if (strokes <= 0) return { swept, reversals: 0, halfSwings: new Float64Array(0), turnedOn: swept };
  const around = path.closed && comesBack;
  if (!around && strokes === 1) return { swept, reversals: 0, halfSwings: new Float64Array(0), turnedOn: swept };
  const halfSwings = Float64Array.from({ length: strokes }, (_, k) => Math.abs(found[k + 1]! - found[k]!) / 2);
  return { swept, reversals: around ? strokes : strokes - 1, halfSwings, turnedOn: 0 };
}

/** The angle swept by strokes whose half swing lies below `critical`, as a share of all that is swept; 0 where nothing is. */
export function smallSwingShare(swings: PathSwings, critical: number): number {
  let small = 0;
  let all = swings.turnedOn;
  for (const half of swings.halfSwings) {
    all += 2 * half;
    if (!(half >= critical)) small += 2 * half;
  }
  return all > 0 ? small / all : 0;
}
