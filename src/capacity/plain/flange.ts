/** Thrust on the flange of a plain bushing, or on a thrust washer of its size: a ring from the bore to the outside of the flange. */
import type { Assessed, Rule } from '../rule.ts';

export const FLANGE_RULE: Rule = {
  name: 'flange pressure',
  formula: 'p = |Fa| / (π/4 (Df² - d²)); it slides at the mean diameter (Df + d)/2',
  source: 'projected area of the face, as for the bore (textbook practice); mean diameter: common practice',
  trust: 'common practice',
  units: 'Pa',
  range: 'thrust square on the face; a tilted journal presses on its edge, which is the check of slope',
};

export interface FlangeFace {
  /** m². */
  readonly area: number;
  /** Diameter at which it slides on the mean, m. */
  readonly diameter: number;
}

/** The face of a flange from `bore` to `flange`, diameters in m. */
export function flangeFace(bore: number, flange: number | null): Assessed<FlangeFace> {
  if (flange === null) return { unassessed: 'the bushing has no flange: fill in `flange_outer_mm`' };
  if (!(bore > 0 && flange > bore && Number.isFinite(flange))) {
    return { unassessed: 'the flange must be larger than the bore of the bushing' };
  }
  return { value: { area: (Math.PI / 4) * (flange * flange - bore * bore), diameter: (flange + bore) / 2 } };
}
