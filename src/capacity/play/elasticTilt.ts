/** How a joint's axis gives way under load: bearings as springs, with the shaft stiff or bending. */
import type { ShaftSolution } from '../../mechanics/beamStepped.ts';
import { beamStateAt } from '../../mechanics/beamStepped.ts';
import type { Assessed, Rule } from '../rule.ts';
import { type AxisShift, axisThrough } from './axisShift.ts';

export const ELASTIC_TILT_RULE: Rule = {
  name: 'elastic tilt',
  formula: 'shift of each bearing load/stiffness; with the shaft: deflection and slope of the beam at the hub',
  source: 'statics; beam on elastic supports',
  trust: 'recomputed',
  units: 'rad, m',
  range: 'linear stiffness about the load; housing and links stiff',
};

/** Stiff shaft on bearings of radial stiffness kA, kB (N/m; null: not known); loads ON the bearings, N, housing frame. */
export function springAxis(
  stationA: number,
  loadA: readonly [number, number],
  kA: number | null,
  stationB: number,
  loadB: readonly [number, number],
  kB: number | null,
): Assessed<AxisShift> {
  if (kA === null || kB === null) return { unassessed: 'fill in the radial stiffness of both bearings' };
  if (!(kA > 0 && kB > 0)) return { unassessed: 'the stiffness of a bearing must be a positive number' };
  const axis = axisThrough(stationA, [loadA[0] / kA, loadA[1] / kA], stationB, [loadB[0] / kB, loadB[1] / kB]);
  return Number.isFinite(axis.lean[0] + axis.lean[1] + axis.shift[0] + axis.shift[1])
    ? { value: axis }
    : { unassessed: 'the loads or stations of the bearings are not usable numbers' };
}

/** The axis as the link feels it: where the bent shaft stands and points at the hub (station m). */
export function bentAxis(solution: ShaftSolution, hub: number): Assessed<AxisShift> {
  const x = beamStateAt(solution.x, hub);
  const y = beamStateAt(solution.y, hub);
  if (!Number.isFinite(x.deflection + y.deflection + x.slope + y.slope)) {
    return { unassessed: 'the hub lies off the shaft, or the load on the shaft is not a number' };
  }
  return { value: { station: hub, shift: [x.deflection, y.deflection], lean: [x.slope, y.slope] } };
}
