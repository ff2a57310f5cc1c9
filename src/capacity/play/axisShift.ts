/**
 * How a joint's axis stands off its place, and what that does to a point of the arm. Housing frame, z along the axis; small angles.
 *
 * The axis passes a station with a radial shift, and leans: `lean` is the change of shift per unit of length along z, so the
 * axis' rotation vector is z × lean. A point at `reach` from the joint origin moves by shift + lean·(reach_z - station) across the
 * axis and by -lean · reach_xy along it.
 */
import type { Vec3 } from '../../arm/arm.ts';

export interface AxisShift {
  /** m along the axis from the joint origin. */
  readonly station: number;
  /** m. */
  readonly shift: readonly [number, number];
  /** rad. */
  readonly lean: readonly [number, number];
}

/** Displacement of a point fixed to the link at `reach` (m, from the joint origin), in the housing frame, m. */
export function pointShift(axis: AxisShift, reach: Vec3): [number, number, number] {
  const along = reach[2] - axis.station;
  const [lx, ly] = axis.lean;
  return [axis.shift[0] + lx * along, axis.shift[1] + ly * along, -(lx * reach[0] + ly * reach[1])];
}

/** The axis through two given shifts at the stations of A and B; NaN where both stand at one place. */
export function axisThrough(
  stationA: number,
  shiftA: readonly [number, number],
  stationB: number,
  shiftB: readonly [number, number],
): AxisShift {
  const span = stationB - stationA;
  const lean = (i: 0 | 1) => (span === 0 ? Number.NaN : (shiftB[i] - shiftA[i]) / span);
  return { station: stationA, shift: shiftA, lean: [lean(0), lean(1)] };
}
