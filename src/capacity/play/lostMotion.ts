/** Where the load on a bearing comes to lie on the other side of its play as the arm moves. */
import type { Assessed, Rule } from '../rule.ts';

export const LOST_MOTION_RULE: Rule = {
  name: 'lost motion',
  formula: 'journal moves c sin(Δ/2), Δ the angle between the loads of two poses; a reversal where Δ exceeds 90°',
  source: 'geometry: the journal lies c/2 off centre on the side of its load',
  trust: 'recomputed',
  units: 'm',
  range: 'stiff parts; poses without load on the bearing are passed over',
};

/** Layout of a history of radial loads on one bearing: [x, y] N a pose, housing frame. */
export const LOAD_STRIDE = 2;

export interface LostMotion {
  /** Largest angle between the loads of two poses, 0 to π, rad. */
  readonly turn: number;
  /** Shift of the journal between those poses, m. */
  readonly shift: number;
  readonly fromPose: number;
  readonly toPose: number;
  /** Whether the load reverses: `turn` above 90°. */
  readonly reverses: boolean;
}

/**
 * The two poses whose loads point the most apart, and how far the journal travels between them. Loads below `least` (N, ≥ 0) seat
 * nothing and are passed over; none left, or a load that is not a number, is unassessed.
 */
export function lostMotion(loads: Float64Array, play: number, least: number): Assessed<LostMotion> {
  if (!(play >= 0 && least >= 0)) return { unassessed: 'play and least load must be usable numbers' };
  const seated: { pose: number; angle: number }[] = [];
  for (let i = 0; i + 1 < loads.length; i += LOAD_STRIDE) {
    const [x, y] = [loads[i]!, loads[i + 1]!];
    if (!Number.isFinite(x + y)) return { unassessed: 'the load on the bearing is not a number in some pose' };
    const size = Math.hypot(x, y);
    if (size > 0 && size >= least) seated.push({ pose: i / LOAD_STRIDE, angle: Math.atan2(y, x) });
  }
  if (seated.length === 0) return { unassessed: 'no pose loads the bearing' };
  seated.sort((a, b) => a.angle - b.angle || a.pose - b.pose);
  const count = seated.length;
  const first = seated[0]!;
  let best = { turn: 0, a: first.pose, b: first.pose };
  // For each load the one nearest its opposite is the last within half a turn of it, or the next.
  let j = 0;
  const angleAt = (k: number) => seated[k % count]!.angle + (k >= count ? 2 * Math.PI : 0);
  for (let i = 0; i < count; i++) {
    if (j < i) j = i;
    while (j + 1 < i + count && angleAt(j + 1) - seated[i]!.angle <= Math.PI) j++;
    for (const k of [j, j + 1]) {
      const apart = Math.abs(angleAt(k) - seated[i]!.angle);
      const turn = Math.min(apart, Math.abs(2 * Math.PI - apart));
      if (turn > best.turn) best = { turn, a: seated[i]!.pose, b: seated[k % count]!.pose };
    }
  }
  return {
    value: {
      turn: best.turn,
      shift: play * Math.sin(best.turn / 2),
      fromPose: Math.min(best.a, best.b),
      toPose: Math.max(best.a, best.b),
      reverses: best.turn > Math.PI / 2,
    },
  };
}

/**
 * Poses along a path where the load jumps to the other side: it points more than 90° away from where it pointed at the loaded pose
 * before. Pose indices, rising. (A load that wanders round slowly takes its journal along: that shows in `lostMotion` alone.)
 */
export function reversals(loads: Float64Array, least: number): Assessed<readonly number[]> {
  if (!(least >= 0)) return { unassessed: 'the least load must be a usable number' };
  const found: number[] = [];
  let sideX = 0;
  let sideY = 0;
  for (let i = 0; i + 1 < loads.length; i += LOAD_STRIDE) {
    const [x, y] = [loads[i]!, loads[i + 1]!];
    if (!Number.isFinite(x + y)) return { unassessed: 'the load on the bearing is not a number in some pose' };
    const size = Math.hypot(x, y);
    if (!(size > 0 && size >= least)) continue;
    if (x * sideX + y * sideY < 0) found.push(i / LOAD_STRIDE);
    sideX = x;
    sideY = y;
  }
  return { value: found };
}
