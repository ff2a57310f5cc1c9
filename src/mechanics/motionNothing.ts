/**
 * Whether a check stays at nothing whatever an arm in motion does, such as thrust on a joint of a linkage that moves in a plane.
 *
 * Every part of a joint load (weight, tip force, that of each acceleration and of each product of speeds) is a trigonometric polynomial of at most
 * second degree in each angle. Five evenly spread angles give such a polynomial exactly, and over the whole turn it is at most 1.99 times its
 * largest value there (the Lebesgue constant of five points: (2/sin 18° + 2/sin 54° + 1)/5). So 5^n poses bound every part everywhere.
 */
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm } from './form.ts';
import { LIN, looseBound, newReducedForm, PART, reduceForm } from './freeLoadsForm.ts';
import { newPoseLoad, pairCount, poseLoad, poseLoadScratch } from './freeLoadsPose.ts';

const POINTS = 5;
const LEBESGUE = 1.99;

/**
 * Bound of a check over all poses and motions by the values at 5^n poses; Infinity as soon as a pose gives more than `least`, or where poses would
 * be more than `most`.
 */
export function nothingBound(chain: Chain, load: ChainCase, check: CheckForm, least: number, most = 20_000): number {
  const { n } = chain;
  const count = POINTS ** n;
  if (!(count <= most)) return Number.POSITIVE_INFINITY;
  const at = newPoseLoad(n);
  const scratch = poseLoadScratch(n);
  const reduced = newReducedForm(n);
  const pose = new Float64Array(n);
  let largest = 0;
  for (let k = 0; k < count; k++) {
    for (let j = 0, left = k; j < n; j++) {
      pose[j] = (2 * Math.PI * (left % POINTS)) / POINTS;
      left = Math.floor(left / POINTS);
    }
    poseLoad(chain, load, pose, at, scratch);
    for (const f of check.forms) {
      reduceForm(reduced, f, check.joint, load, at, 0, 0);
      // by its size: a linear part below nothing at every pose may rise above it between them
      const linear = reduced.fixed[LIN]!;
      const value = looseBound(reduced) - linear + Math.abs(linear);
      if (!(value <= least)) return Number.POSITIVE_INFINITY;
      if (value > largest) largest = value;
    }
  }
  // each part by itself has at most this value at the poses
  const parts = PART * (4 + n + pairCount(n));
  return parts * LEBESGUE ** n * largest;
}
