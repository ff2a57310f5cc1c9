/** The loads of a case as gravity on a set of masses, where they are that: weights, payload, and a tip force along gravity. */
import type { Flat } from '../math/vector.ts';
import type { Chain, ChainCase } from './chain.ts';
import type { GravityMass } from './outwardSets.ts';

export interface GravityLoad extends GravityMass {
  /** m/s², ≥ 0. */
  readonly g: number;
  /** Unit direction of gravity, base frame. */
  readonly down: readonly [number, number, number];
}

/** Directions closer than this are the same; rounding of a normalised vector. */
const SAME = 1e-14;

/**
 * The case as gravity alone, or null where it is more than that (motion, a force that is free, fixed in the tool or across gravity).
 * A tip force F along gravity is an extra mass F/g at the tip, a negative one where it points up; without gravity the force itself is
 * the only load, on massless links.
 */
export function gravityLoad(chain: Chain, load: ChainCase): GravityLoad | null {
  if (load.speed !== null || load.force === 'any' || load.force === 'tool') return null;
  const [gx, gy, gz] = chain.gravity;
  const g = Math.hypot(gx, gy, gz);
  const [fx, fy, fz] = load.forceUnit;
  if (load.force === 'none') {
    return { g, down: g > 0 ? [gx / g, gy / g, gz / g] : [0, 0, -1], mass: load.mass, first: load.first };
  }
  const n = chain.n;
  const mass = g > 0 ? Float64Array.from(load.mass) : new Float64Array(n);
  const first: Flat = g > 0 ? Float64Array.from(load.first) : new Float64Array(3 * n);
  if (g > 0) {
    const across = Math.hypot(gy * fz - gz * fy, gz * fx - gx * fz, gx * fy - gy * fx) / g;
    if (across > SAME) return null;
  }
  const along = g > 0 ? Math.sign(gx * fx + gy * fy + gz * fz) : 1;
  const extra = (along * load.magnitude) / (g > 0 ? g : 1);
  mass[n - 1]! += extra;
  for (let k = 0; k < 3; k++) first[3 * (n - 1) + k]! += extra * chain.tipOrigin[k]!;
  return g > 0 ? { g, down: [gx / g, gy / g, gz / g], mass, first } : { g: 1, down: [fx, fy, fz], mass, first };
}
