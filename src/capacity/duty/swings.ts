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
function angles(path: PathMotion, j: number): Float64Array {
  const { n, rows, pose } = path;
  const turns = new Float64Array(2);
  const list = new Float64Array(3 * rows);
  let size = 0;
  list[size++] = pose[j]!;
  for (let k = 0; k + 1 < rows; k++) {
    const count = turnsIn(path, k, j, turns);
    for (let c = 0; c < count; c++) list[size++] = angleAt(path, k, turns[c]!, j);
    list[size++] = pose[(k + 1) * n + j]!;
  }
  return list.subarray(0, size);
}

/**
 * The extremes among a list of angles that lie apart by more than the dead band, in turn high and low, with both ends. The list is read
 * once round from `start`; its last entry stands for its first.
 */
function extremes(list: Float64Array, start: number, band: number): number[] {
  const count = list.length;
  const first = list[start]!;
  const found = [first];
  let peak = first;
  let way = 0;
  for (let k = 0; k < count; k++) {
    const at = start + k < count ? start + k : start + k - count + 1;
    const q = list[at]!;
    if (way === 0) {
      if (Math.abs(q - first) > band) {
        way = Math.sign(q - first);
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
  let top = 0;
  for (let k = 1; k < list.length; k++) {
    swept += Math.abs(list[k]! - list[k - 1]!);
    if (list[k]! > list[top]!) top = k;
  }
  const around = path.closed && Math.abs(list[list.length - 1]! - list[0]!) < band;
  // Round a closed path from its highest angle, so that no stroke is cut in two.
  const found = extremes(list, around ? top : 0, band);
  const strokes = found.length - 1;
  if (strokes <= 0 || (!around && strokes === 1)) {
    return { swept, reversals: 0, halfSwings: new Float64Array(0), turnedOn: swept };
  }
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
