/**
 * A segment of the duty that may be anywhere in travel. Stated rule: every joint swings over its whole travel, there and back, as often as the
 * segment says, and every bearing carries all that time the most that the case can put on it anywhere in the travel. Radial load,
 * thrust and moment each count with a bound that nothing in the travel exceeds, whether they come together or not: the life that follows is
 * one that is reached, whatever the arm does there. The mean over the travel would be a longer life, but one that an arm dwelling in its
 * hardest corner does not reach.
 *
 * Beside it stands the load that was found: attained at a pose, with one joint load. What lies between the two is not known.
 */
import { anyTorque, type DutyPart } from '../capacity/duty/index.ts';
import { type Chain, type ChainCase, WRENCH } from '../mechanics/chain.ts';
import { type CheckForm, checkValue } from '../mechanics/form.ts';
import { poseScratch, staticLoads } from '../mechanics/newtonEuler.ts';
import { polish } from '../mechanics/polish.ts';
import type { TravelBounds } from './dutyBounds.ts';
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
      // Any real load will do as one that is found; without the torque's ranges the climb is far quicker.
      const top = polish(chain, load, anyTorque(check), starts[from + s]!);
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
