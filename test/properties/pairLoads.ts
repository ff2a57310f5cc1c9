/** Loads of a bearing pair as plain vectors, through the check forms that the engine sweeps. */
import type { Drive, PairSupport, Vec3 } from '../../src/arm/arm.ts';
import { axialForms, axialLoads, radialForms, radialVector } from '../../src/mechanics/bearingPair.ts';
import { type CheckForm, checkValue } from '../../src/mechanics/form.ts';
import { cross, scaled } from '../worldArm.ts';

export interface PairLoads {
  /** Load ON each bearing, N. */
  readonly A: Vec3;
  readonly B: Vec3;
}

/** Joint load as the kernels take it: force, then moment about the joint origin, z the joint axis. */
export function wrench(force: Vec3, moment: Vec3): Float64Array {
  return Float64Array.of(...force, ...moment);
}

/** Of a force at a point: the joint load it makes. */
export function forceAt(force: Vec3, point: Vec3): Float64Array {
  return wrench(force, cross(point, force));
}

export function pairLoads(
  w: Float64Array,
  stationA: number,
  stationB: number,
  thrust: PairSupport['thrust'] = 'A',
  drive: Drive | null = null,
): PairLoads {
  const pair = { stationA, stationB, drive };
  const [a, b] = axialLoads(thrust, w[2]!);
  return {
    A: [...radialVector(radialForms(pair, 'A'), w, 0), a],
    B: [...radialVector(radialForms(pair, 'B'), w, 0), b],
  };
}

/** Value of the radial (axial) check of one bearing. */
export function checkOf(
  check: 'radial' | 'axial',
  bearing: 'A' | 'B',
  w: Float64Array,
  stationA: number,
  stationB: number,
  thrust: PairSupport['thrust'] = 'A',
  drive: Drive | null = null,
): number {
  const forms = check === 'radial' ? radialForms({ stationA, stationB, drive }, bearing) : axialForms(thrust, bearing);
  return checkValue({ check, joint: 0, bearing, unit: 'N', forms } satisfies CheckForm, w, 0);
}

export const radial = (load: Vec3): number => Math.hypot(load[0], load[1]);
export const opposite = (load: Vec3): Vec3 => scaled(load, -1);
