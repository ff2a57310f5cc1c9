/** Pressure times speed: the heat a dry bushing must shed, and the three limits of a bushing material. */
import type { PlainBushing } from '../../arm/arm.ts';
import type { Assessed, Rule } from '../rule.ts';
import { utilisation } from '../rule.ts';

export const PV_RULE: Rule = {
  name: 'bushing PV',
  formula: 'PV = p v, p the edge pressure (equal to F/(d L) without a couple), v the mean sliding speed',
  source: 'Wentzell, Machine Design, ex. 19.1 (without couple); edge pressure with a couple: safe side',
  trust: 'verified',
  units: 'Pa·m/s',
  range: 'steady state; limits are those of the bushing material as the file gives them',
};

export interface BushingUse {
  /** Utilisations against the limits of the file; 1 is the limit. */
  readonly pressure: Assessed;
  readonly speed: Assessed;
  readonly pv: Assessed;
}

/** `pressure` Pa (edge), `meanSpeed` for PV and `peakSpeed` for the limit of speed, m/s. A target of the arm may stand in for a limit. */
export function bushingUse(
  pressure: number,
  meanSpeed: number,
  peakSpeed: number,
  limits: Pick<PlainBushing, 'pressureLimit' | 'speedLimit' | 'pvLimit'>,
): BushingUse {
  return {
    pressure: utilisation(pressure, limits.pressureLimit, 'fill in the pressure limit of the bushing'),
    speed: utilisation(peakSpeed, limits.speedLimit, 'fill in the speed limit of the bushing'),
    pv: utilisation(pressure * meanSpeed, limits.pvLimit, 'fill in the PV limit of the bushing'),
  };
}
