/**
 * Pressure of a plain bushing. Radial load F spreads evenly over the projected area d·L. A couple M that the bushing must carry by
 * itself adds a straight line of pressure from one end to the other (triangles on opposite sides): each half carries M over an
 * effective span of 2/3 L, and the edge sees 6M/(d L²) more. F and M need not lie in one plane: line loads add as vectors.
 */
import { type Form, form } from '../../mechanics/form.ts';
import type { Assessed, Rule } from '../rule.ts';

export const PRESSURE_RULE: Rule = {
  name: 'bushing pressure',
  formula: 'p = F/(d L); edge: |F/L ± 6 (M × z)/L²|/d; couple on an effective span of 2/3 L',
  source:
    'projected area: textbook practice (Wentzell, Machine Design, ex. 19.1, verified); couple: triangular pattern',
  trust: 'common practice',
  units: 'Pa',
  range: 'stiff journal filling its bushing; clearance or a bent journal makes the true edge pressure higher',
};

/** Share of the length between the resultants of the two triangles. */
export const COUPLE_SPAN = 2 / 3;

/** Load ON the bushing, housing frame (z along the axis): N, and N·m about the middle of its length. */
export interface BushingLoad {
  readonly fx: number;
  readonly fy: number;
  readonly mx: number;
  readonly my: number;
}

export interface BushingPressure {
  /** Projected pressure of the radial load alone, Pa. */
  readonly mean: number;
  /** At the harder-pressed end, Pa; equals `mean` without a couple. */
  readonly edge: number;
  /** One of the two opposite forces that the couple makes, N. */
  readonly coupleForce: number;
  /** True where the couple presses one end against the opposite side (M above F L/6). */
  readonly changesSide: boolean;
}

export function bushingPressure(load: BushingLoad, bore: number, length: number): Assessed<BushingPressure> {
  if (!(bore > 0 && length > 0 && Number.isFinite(bore + length))) {
    return { unassessed: 'bore and length of the bushing must be positive numbers' };
  }
  const { fx, fy, mx, my } = load;
  if (!Number.isFinite(fx + fy + mx + my)) return { unassessed: 'the load on the bushing is not a number' };
  const force = Math.hypot(fx, fy);
  const couple = Math.hypot(mx, my);
  // M × z = (my, -mx)
  const end = (side: 1 | -1) => Math.hypot(fx + (side * 6 * my) / length, fy - (side * 6 * mx) / length);
  return {
    value: {
      mean: force / (bore * length),
      edge: Math.max(end(1), end(-1)) / (bore * length),
      coupleForce: couple / (COUPLE_SPAN * length),
      changesSide: couple > (force * length) / 6,
    },
  };
}

/**
 * Edge pressure as convex forms of the joint load, from the forms of the radial load and of the tilting moment at the middle of the
 * bushing (rows x, y; one pair a drive branch, in the same order).
 */
export function edgePressureForms(
  radial: readonly Form[],
  moment: readonly Form[],
  bore: number,
  length: number,
): readonly Form[] {
  const area = bore * length;
  return radial.flatMap((f, i) => {
    const m = moment[i]!;
    return [1, -1].map((side) => {
      const lever = (side * 6) / length;
      const row = (r: 0 | 1) => {
        const sign = r === 0 ? lever : -lever;
        return Array.from({ length: 6 }, (_, k) => (f.P[6 * r + k]! + sign * m.P[6 * (1 - r) + k]!) / area);
      };
      return form({
        P: [row(0), row(1)],
        c: [(f.c[0]! + lever * m.c[1]!) / area, (f.c[1]! - lever * m.c[0]!) / area],
        torque: [f.torqueFrom, f.torqueTo],
      });
    });
  });
}
