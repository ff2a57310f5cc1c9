import { type Rational, rational } from './rational.ts';

/**
 * Exact factors to the coherent SI unit. Sources: "SI" = The International System of Units (SI Brochure), 9th ed. 2019, tables 2, 4, 7 and 8;
 * "811" = NIST Special Publication 811, 2008, appendix B.8 (bold, that is exact, factors). Both from memory; the inch, pound and standard-gravity
 * definitions (0.0254 m, 0.453 592 37 kg, 9.806 65 m/s²) carry all the others.
 */

/** Exponents of length, mass, time and plane angle. Angle is kept apart so that a turn a second is not mistaken for 1/s. */
export interface Dimension {
  readonly length: number;
  readonly mass: number;
  readonly time: number;
  readonly angle: number;
}

/** A unit: value_SI = value · ratio · π^pi. */
export interface Unit {
  readonly dimension: Dimension;
  readonly ratio: Rational;
  readonly pi: number;
}

export interface UnitRow extends Unit {
  /** Spellings; the first is the one shown. */
  readonly symbols: readonly string[];
  readonly source: string;
}

function dimension(length: number, mass: number, time: number, angle = 0): Dimension {
  return { length, mass, time, angle };
}

const LENGTH = dimension(1, 0, 0);
const MASS = dimension(0, 1, 0);
const TIME = dimension(0, 0, 1);
const ANGLE = dimension(0, 0, 0, 1);
const FORCE = dimension(1, 1, -2);
const MOMENT = dimension(2, 1, -2);
const PRESSURE = dimension(-1, 1, -2);
const TURNING = dimension(0, 0, -1, 1);

const G0_NUM = 980_665n;
const POUND_NUM = 45_359_237n;
const POUND_FORCE = { num: POUND_NUM * G0_NUM, den: 10n ** 13n };
const SQUARE_INCH = { num: 254n * 254n, den: 10n ** 8n };

function row(
  symbols: readonly string[],
  of: Dimension,
  num: bigint,
  den: bigint,
  source: string,
  pi: number = 0,
): UnitRow {
  return { symbols, dimension: of, ratio: rational(num, den), pi, source };
}

export const UNIT_TABLE: readonly UnitRow[] = [
  row(['m'], LENGTH, 1n, 1n, 'SI'),
  row(['mm'], LENGTH, 1n, 1000n, 'SI'),
  row(['cm'], LENGTH, 1n, 100n, 'SI'),
  // µ exists twice in Unicode: micro sign and Greek mu.
  row(['µm', 'μm', 'um'], LENGTH, 1n, 1_000_000n, 'SI'),
  row(['in', 'inch', 'inches', '"', '″', '”'], LENGTH, 254n, 10_000n, '811: 2.54 E-02 exact'),
  row(['ft', 'foot', 'feet', "'", '′', '’'], LENGTH, 3048n, 10_000n, '811: 3.048 E-01 exact'),
  row(['thou', 'mil'], LENGTH, 254n, 10_000_000n, '811: 2.54 E-05 exact'),

  row(['kg'], MASS, 1n, 1n, 'SI'),
  row(['g'], MASS, 1n, 1000n, 'SI'),
  row(['t'], MASS, 1000n, 1n, 'SI table 8: tonne'),
  row(['lb', 'lbs', 'lbm'], MASS, POUND_NUM, 100_000_000n, '811: avoirdupois pound, 0.453 592 37 kg exact'),
  row(['oz'], MASS, POUND_NUM, 1_600_000_000n, '811: avoirdupois ounce, pound / 16'),

  row(['s', 'sec'], TIME, 1n, 1n, 'SI'),
  row(['ms'], TIME, 1n, 1000n, 'SI'),
  row(['min'], TIME, 60n, 1n, 'SI table 8'),
  row(['h', 'hr'], TIME, 3600n, 1n, 'SI table 8'),
  row(['d', 'day', 'days'], TIME, 86_400n, 1n, 'SI table 8'),

  row(['rad'], ANGLE, 1n, 1n, 'SI table 4'),
  row(['mrad'], ANGLE, 1n, 1000n, 'SI table 4'),
  row(['°', 'deg', 'º'], ANGLE, 1n, 180n, 'SI table 8: π/180 rad', 1),
  row(['arcmin'], ANGLE, 1n, 10_800n, 'SI table 8: 1/60 degree', 1),
  row(['arcsec'], ANGLE, 1n, 648_000n, 'SI table 8: 1/3600 degree', 1),
  row(['rev', 'r', 'turn', 'turns'], ANGLE, 2n, 1n, '811: revolution, 2π rad', 1),

  row(['N'], FORCE, 1n, 1n, 'SI table 4'),
  row(['mN'], FORCE, 1n, 1000n, 'SI table 4'),
  row(['daN'], FORCE, 10n, 1n, 'SI table 4'),
  row(['kN'], FORCE, 1000n, 1n, 'SI table 4'),
  row(['MN'], FORCE, 1_000_000n, 1n, 'SI table 4'),
  row(['kgf', 'kp'], FORCE, G0_NUM, 100_000n, '811: 9.806 65 N exact'),
  row(['lbf'], FORCE, POUND_FORCE.num, POUND_FORCE.den, '811: pound times standard gravity'),
  row(['ozf'], FORCE, POUND_FORCE.num, POUND_FORCE.den * 16n, '811: pound-force / 16'),
  row(['kip', 'kips'], FORCE, POUND_FORCE.num * 1000n, POUND_FORCE.den, '811: 1000 lbf'),

  row(['Nm'], MOMENT, 1n, 1n, 'SI table 5'),
  row(['Nmm'], MOMENT, 1n, 1000n, 'SI table 5'),
  row(['Ncm'], MOMENT, 1n, 100n, 'SI table 5'),
  row(['kNm'], MOMENT, 1000n, 1n, 'SI table 5'),

  row(['Pa'], PRESSURE, 1n, 1n, 'SI table 4'),
  row(['kPa'], PRESSURE, 1000n, 1n, 'SI table 4'),
  row(['MPa'], PRESSURE, 1_000_000n, 1n, 'SI table 4'),
  row(['GPa'], PRESSURE, 1_000_000_000n, 1n, 'SI table 4'),
  row(['bar'], PRESSURE, 100_000n, 1n, '811: 1 E+05 exact'),
  row(['psi'], PRESSURE, POUND_FORCE.num * SQUARE_INCH.den, POUND_FORCE.den * SQUARE_INCH.num, '811: lbf/in²'),
  row(['ksi'], PRESSURE, 1000n * POUND_FORCE.num * SQUARE_INCH.den, POUND_FORCE.den * SQUARE_INCH.num, '811: kip/in²'),

  row(['rpm'], TURNING, 2n, 60n, '811: revolution per minute, 2π/60 rad/s', 1),
];
