import { fromSI } from './unit.ts';

/** What is measured, as far as the sheet and the tables show it. */
export type Quantity =
  | 'length'
  | 'clearance'
  | 'angle'
  | 'slope'
  | 'mass'
  | 'inertia'
  | 'force'
  | 'moment'
  | 'stress'
  | 'speed'
  | 'angularSpeed'
  | 'angularAcceleration'
  | 'acceleration'
  | 'stiffness'
  | 'life'
  | 'pv';

export type UnitSystem = 'metric' | 'inch';

/** The unit each quantity is shown in. Every entry is a spelling that `unitOf` reads, so what is shown can be typed back. */
export const SHOWN_UNITS: Readonly<Record<UnitSystem, Readonly<Record<Quantity, string>>>> = {
  metric: {
    length: 'mm',
    clearance: 'µm',
    angle: '°',
    slope: 'mrad',
    mass: 'kg',
    inertia: 'kg·m²',
    force: 'N',
    moment: 'N·m',
    stress: 'MPa',
    speed: 'm/s',
    angularSpeed: '°/s',
    angularAcceleration: '°/s²',
    acceleration: 'm/s²',
    stiffness: 'N/µm',
    life: 'h',
    pv: 'MPa·m/s',
  },
  inch: {
    length: 'in',
    clearance: 'thou',
    angle: '°',
    slope: 'mrad',
    mass: 'lb',
    inertia: 'lb·in²',
    force: 'lbf',
    moment: 'lbf·in',
    stress: 'psi',
    speed: 'ft/min',
    angularSpeed: '°/s',
    angularAcceleration: '°/s²',
    acceleration: 'ft/s²',
    stiffness: 'lbf/in',
    life: 'h',
    pv: 'psi·ft/min',
  },
};

/**
 * A number with `digits` significant digits and no exponent in the range people read (1e-6 to 1e9). Whole digits are never rounded away:
 * 12345.6 at 4 digits is 12346. What is not finite is named, never left blank.
 */
export function formatNumber(value: number, digits = 4): string {
  if (Number.isNaN(value)) return 'not a number';
  if (!Number.isFinite(value)) return value > 0 ? 'infinite' : '-infinite';
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (size >= 1e9 || size < 1e-6) return value.toExponential(digits - 1);
  // toExponential rounds first, so that 9.9996 is read as 10.00 and not as 10.000.
  const order = Number(value.toExponential(digits - 1).split('e')[1]);
  return value.toFixed(Math.max(0, digits - 1 - order));
}

/** An SI value shown in `unit`, such as `12.50 mm` or `45.00°`. */
export function formatIn(value: number, unit: string, digits = 4): string {
  const number = formatNumber(fromSI(value, unit), digits);
  return unit.startsWith('°') ? `${number}${unit}` : `${number} ${unit}`;
}

/** An SI value in the unit its quantity is shown in. */
export function formatQuantity(value: number, quantity: Quantity, system: UnitSystem = 'metric', digits = 4): string {
  return formatIn(value, SHOWN_UNITS[system][quantity], digits);
}
