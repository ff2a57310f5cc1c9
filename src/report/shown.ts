/** SI values as people read them: units of checks, angles in degrees, poses. */
import { type Quantity, SHOWN_UNITS, type UnitSystem } from '../units/format.ts';
import { fromSI, toSI } from '../units/unit.ts';

/** What the SI unit of a check measures. Units that are missing here (such as 1 for a safety) are shown as they are. */
const QUANTITY: Readonly<Record<string, Quantity>> = {
  N: 'force',
  N·m: 'moment',
  Pa: 'stress',
  'Pa·m/s': 'pv',
  'm/s': 'speed',
  m: 'length',
  rad: 'slope',
  s: 'life',
};

export interface ShownUnit {
  readonly unit: string;
  /** From SI to the shown unit. */
  of(value: number): number;
}

/** The unit in which a value of SI unit `unit` is shown. */
export function shownUnit(unit: string, system: UnitSystem = 'metric'): ShownUnit {
  const quantity = QUANTITY[unit];
  if (!quantity) return { unit, of: (value) => value };
  const shown = SHOWN_UNITS[system][quantity];
  return { unit: shown, of: (value) => (shown === unit ? value : fromSI(value, shown)) };
}

/**
 * Degrees of an angle in rad, as the shortest decimal that stands for the same angle within the rounding of its conversion (a few
 * ulps of a half turn): what was typed as 30° reads 30 again, and no pose moves by more than 2e-15 rad.
 */
export function degrees(angle: number): number {
  const exact = fromSI(angle, '°');
  for (let digits = 1; digits <= 15; digits++) {
    const tidy = Number(exact.toPrecision(digits));
    if (Math.abs(toSI(tidy, '°') - angle) <= 4 * Number.EPSILON * Math.max(1, Math.abs(angle))) return tidy + 0;
  }
  return exact;
}

/** A pose in degrees with at most two decimals, written as the command line reads it: `-170,45.5,90`. */
export function poseText(pose: readonly number[]): string {
  return pose.map((angle) => String(Math.round(degrees(angle) * 100) / 100 + 0)).join(',');
}

/** A whole number in groups of three, `4 826 809`. */
export function countText(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+(?!\d))/g, ' ');
}

/** Seconds for people: `0.012 s`, `4.3 s`, `2 min 05 s`. */
export function secondsText(seconds: number): string {
  if (seconds < 0.0995) return `${seconds.toFixed(3)} s`;
  if (seconds < 99.5) return `${seconds.toPrecision(2)} s`;
  const whole = Math.round(seconds);
  return `${Math.floor(whole / 60)} min ${String(whole % 60).padStart(2, '0')} s`;
}
