/**
 * A segment of the duty that may be anywhere in travel. Stated rule: every joint swings over its whole travel, there and back, as often as the
 * segment says, and every bearing carries all that time the most that the case can put on it anywhere in the travel. Radial load,
 * thrust and moment each count with a bound that nothing in the travel exceeds, whether they come together or not: the life that follows is
 * one that is reached, whatever the arm does there. The mean over the travel would be a longer life, but one that an arm dwelling in its
 * hardest corner does not reach.
 *
 * Beside it stands the load that was found: attained at a pose, with one joint load. What lies between the two is not known.
 */
import type { DutyPart } from '../capacity/duty/index.ts';
import { type Chain, type ChainCase, WRENCH } from '../mechanics/chain.ts';
import { anyTorque, type CheckForm, checkValue } from '../mechanics/form.ts';
import { poseScratch, staticLoads } from '../mechanics/newtonEuler.ts';
import { Polish, type Polished, polish } from '../mechanics/polish.ts';
import type { TravelBounds } from '../mechanics/travelBounds.ts';
import { samplePoses } from './samplePoses.ts';

/** Poses looked at for a start of each climb. */
const STARTS = 200;

export interface TravelLoad {
  /** N; nothing in the travel exceeds it. */
  readonly bound: number;
  /** N; attained at `pose` [n] rad with the joint load `wrench` [6], canonical housing frame. */
  readonly found: number;
  readonly pose: readonly number[];
  readonly wrench: Float64Array;
}

/** One entry a part. */
export function travelLoads(
  chain: Chain,
  load: ChainCase,
  parts: readonly DutyPart[],
  bounds: TravelBounds,
): readonly TravelLoad[] {
  const checks = parts.flatMap((part) => part.sizes);
  const most = Float64Array.from(bounds(chain, load, checks));
  const starts = bestStarts(chain, load, checks);
  let at = 0;
  return parts.map((part): TravelLoad => {
    const from = at;
    at += part.sizes.length;
    let found = Number.NEGATIVE_INFINITY;
    let pose: readonly number[] = [];
    let wrench: Float64Array = new Float64Array(WRENCH).fill(Number.NaN);
    part.sizes.forEach((check, s) => {
      const top = hardest(chain, load, check, starts[from + s]!);
      const P = part.at(top.wrench, 0);
      if (P <= found) return;
      found = P;
      pose = [...top.pose];
      wrench = top.wrench;
    });
    // A bound below what occurs would be no bound: NaN stays NaN.
    const upper = part.fromSizes(most, from);
    return { bound: upper >= found || Number.isNaN(upper) ? upper : found, found, pose, wrench };
  });
}

/** Arms of more joints than this are not climbed in motion: each pose would cost too much. */
const CLIMB_IN_MOTION = 8;

/**
 * A pose that loads a check hard, with a load that occurs there: any will do as one that is found. Without the ranges of the torque the climb
 * is far quicker. Long arms in motion: the pose that is hardest at rest, with the hardest motion there.
 */
function hardest(chain: Chain, load: ChainCase, check: CheckForm, start: Float64Array): Hardest {
  const anyway = anyTorque(check);
  if (!load.speed || chain.n <= CLIMB_IN_MOTION) return polish(chain, load, anyway, start);
  const { pose } = polish(chain, { ...load, speed: null, accel: null }, anyway, start);
  const moving = new Polish(chain, load, anyway);
  moving.value(pose);
  return { pose, wrench: Float64Array.from(moving.worst.wrench) };
}

type Hardest = Pick<Polished, 'pose' | 'wrench'>;

/** For each check the best of a set of poses, at rest and without what is free. */
function bestStarts(chain: Chain, load: ChainCase, checks: readonly CheckForm[]): readonly Float64Array[] {
  const { n } = chain;
  const poses = samplePoses(chain, STARTS);
  const out = new Float64Array(WRENCH * n);
  const scratch = poseScratch(n);
  const best = checks.map(() => ({ value: Number.NEGATIVE_INFINITY, pose: poses.slice(0, n) }));
  for (let k = 0; k + n <= poses.length; k += n) {
    const pose = poses.subarray(k, k + n);
    staticLoads(chain, load, pose, out, scratch);
    checks.forEach((check, c) => {
      const value = checkValue(check, out, WRENCH * check.joint);
      if (!(value > best[c]!.value)) return;
      best[c]!.value = value;
      best[c]!.pose.set(pose);
    });
  }
  return best.map(({ pose }) => pose);
}
