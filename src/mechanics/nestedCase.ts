/** One case as the nested sweep reads it: what stands in each link, what the base hands outward, what is free at a pose. */
import { cross3 } from '../math/vector.ts';
import type { Chain, ChainCase } from './chain.ts';
import { jointSizes } from './gridSweepSizes.ts';

/**
 * Inboard vectors u_p: gravity, then a base-fixed force where there is one. Outboard numbers Y in blocks of three: the first moment,
 * [the tip's reach, for a force fixed in the base or free], [a tool-fixed force, its moment]; `width` numbers in `blocks` blocks.
 */
export interface NestedCase {
  readonly n: number;
  readonly pairs: number;
  readonly blocks: number;
  readonly width: number;
  readonly tool: boolean;
  /** Size of a tip force of any direction, N; 0 where there is none. */
  readonly freeForce: number;
  /** Most that speeds and accelerations can add to the force (N) and moment (N·m) of each joint; null at rest. [2n] */
  readonly motion: Float64Array | null;
  /** u_p in the base frame: m/s² and N. [3 pairs] */
  readonly base: Float64Array;
  /** Factor of u_p in the force of joint i: mass outboard, kg; then 1. [pairs n] */
  readonly weight: Float64Array;
  /** What link i itself adds to each block (link frame). [width n] */
  readonly own: Float64Array;
  /** From link i to the origin outboard of it (the next joint's, at last the tip's), m. [3n] */
  readonly lever: Float64Array;
}

/** A base-fixed force along gravity as the mass that weighs as much (kg, either sign); null where it points elsewhere. */
function forceAsMass(chain: Chain, load: ChainCase): number | null {
  if (load.force !== 'base') return null;
  const [gx, gy, gz] = chain.gravity;
  const [x, y, z] = load.forceUnit;
  const g = Math.hypot(gx, gy, gz);
  const across = Math.hypot(gy * z - gz * y, gz * x - gx * z, gx * y - gy * x);
  if (!(across <= 2 ** -51 * g)) return null;
  return g > 0 ? (Math.sign(gx * x + gy * y + gz * z) * load.magnitude) / g : null;
}

/** Sizes of the joint loads less those at rest. */
function motionSizes(chain: Chain, load: ChainCase): Float64Array | null {
  if (!load.speed) return null;
  const rest = jointSizes(chain, { ...load, speed: null, accel: null });
  return jointSizes(chain, load).map((size, k) => size - rest[k]!);
}

export function nestedCase(chain: Chain, load: ChainCase): NestedCase {
  const { n } = chain;
  const tool = load.force === 'tool';
  const tipMass = forceAsMass(chain, load);
  const pairs = load.force === 'base' && tipMass === null ? 2 : 1;
  const any = load.force === 'any';
  const blocks = pairs + (any ? 1 : 0) + (tool ? 2 : 0);
  const width = 3 * blocks;
  const base = new Float64Array(3 * pairs);
  base.set(chain.gravity);
  if (pairs === 2) for (let k = 0; k < 3; k++) base[3 + k] = load.magnitude * load.forceUnit[k]!;
  const weight = new Float64Array(pairs * n);
  const own = new Float64Array(width * n);
  const lever = new Float64Array(3 * n);
  let mass = tipMass ?? 0;
  for (let i = n - 1; i >= 0; i--) {
    const next = i === n - 1 ? chain.tipOrigin : chain.origin.subarray(3 * i + 3, 3 * i + 6);
    lever.set(next, 3 * i);
    for (let k = 0; k < 3; k++) {
      own[width * i + k] = load.first[3 * i + k]! + mass * next[k]!;
      if (pairs === 2 || any) own[width * i + 3 + k] = next[k]!;
    }
    mass += load.mass[i]!;
    weight[pairs * i] = mass;
    if (pairs === 2) weight[pairs * i + 1] = 1;
  }
  if (tool) {
    const last = width * (n - 1) + 3;
    for (let k = 0; k < 3; k++) own[last + k] = load.magnitude * load.forceUnit[k]!;
    cross3(own, last + 3, chain.tipOrigin, 0, own, last);
  }
  const freeForce = any ? load.magnitude : 0;
  return { n, pairs, blocks, width, tool, freeForce, motion: motionSizes(chain, load), base, weight, own, lever };
}
