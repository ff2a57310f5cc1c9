/** Poses spread over the whole travel, for what needs many poses at once and cannot be proved: always the same for the same arm. */
import type { Chain } from '../mechanics/chain.ts';
import { type Grid, gridOf, poseAt } from '../mechanics/gridSweepGrid.ts';

/** A grid with fewer samples a joint than this sees neither the middle of a travel nor half a turn. */
const LEAST_SAMPLES = 3;
/** Share of the travel by which spread poses reach beyond each end and are held there, so that ends are met as well. */
const BEYOND = 0.06;

/**
 * At most `most` poses, one after another [n] rad: the finest grid (ends of each travel included) that fits; for arms of too many joints for
 * that, poses spread evenly by an additive sequence (Roberts 2018: steps are powers of the root of x^(n+1) = x + 1).
 */
export function samplePoses(chain: Chain, most: number): Float64Array {
  let grid = gridWithin(chain, LEAST_SAMPLES, most);
  if (!grid) return spreadPoses(chain, most);
  for (let samples = LEAST_SAMPLES + 1; ; samples++) {
    const finer = gridWithin(chain, samples, most);
    // Where no joint has travel another sample adds nothing.
    if (!finer || finer.poses === grid.poses) break;
    grid = finer;
  }
  const { poses } = grid;
  const out = new Float64Array(chain.n * poses);
  const pose = new Float64Array(chain.n);
  for (let k = 0; k < poses; k++) {
    poseAt(grid, k, pose);
    out.set(pose, chain.n * k);
  }
  return out;
}

function gridWithin(chain: Chain, samples: number, most: number): Grid | null {
  const outcome = gridOf(chain, { samples });
  return outcome.ok && outcome.grid.poses <= most ? outcome.grid : null;
}

function spreadPoses(chain: Chain, count: number): Float64Array {
  const { n } = chain;
  let root = 2;
  for (let k = 0; k < 60; k++) root = (1 + root) ** (1 / (n + 1));
  const out = new Float64Array(n * count);
  for (let k = 0; k < count; k++) {
    for (let j = 0; j < n; j++) {
      const u = (0.5 + (k + 1) * root ** -(j + 1)) % 1;
      const share = chain.full[j] === 1 ? u : Math.min(1, Math.max(0, (1 + 2 * BEYOND) * u - BEYOND));
      out[n * k + j] = chain.from[j]! + share * (chain.to[j]! - chain.from[j]!);
    }
  }
  return out;
}
