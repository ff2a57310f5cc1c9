/**
 * The tables X, Y, e of ISO 281:2007 table 3. Arguments rise; between rows the factors are linear in the argument, beyond the ends
 * the end rows hold (practice; a note says so).
 */
import type { Trust } from './rule.ts';

export interface LoadFactors {
  readonly source: string;
  readonly trust: Trust;
  /** f0 Fa/C0r (deep groove) or i f0 Fa/C0r (angular contact), N/mm². */
  readonly argument: readonly number[];
  readonly e: readonly number[];
  /** One row: factor of Fa above e. */
  readonly Y: readonly number[];
  /** X of one row above e; two rows. */
  readonly X: number;
  readonly X2rows: number;
  /** Two rows: Y up to e and above; empty where one row's hold for two. */
  readonly Y1rows: readonly number[];
  readonly Y2rows: readonly number[];
}

/** Radial contact, one row or two. e and Y verified in Rules of Thumb for Mechanical Engineers, table 7a, p. 156. */
export const DEEP_GROOVE: LoadFactors = {
  source: 'ISO 281:2007 table 3; e and Y read in Rules of Thumb for Mechanical Engineers, table 7a',
  trust: 'verified',
  argument: [0.172, 0.345, 0.689, 1.03, 1.38, 2.07, 3.45, 5.17, 6.89],
  e: [0.19, 0.22, 0.26, 0.28, 0.3, 0.34, 0.38, 0.42, 0.44],
  Y: [2.3, 1.99, 1.71, 1.55, 1.45, 1.31, 1.15, 1.04, 1.0],
  X: 0.56,
  X2rows: 0.56,
  Y1rows: [],
  Y2rows: [],
};

/** From memory; X + Y e = 1 within 0.008 and two rows = 2^0.7 times one row within 0.011 in every row. */
export const ANGULAR_CONTACT_10: LoadFactors = {
  source: 'ISO 281:2007 table 3',
  trust: 'from memory',
  argument: [0.175, 0.35, 0.7, 1.05, 1.4, 2.1, 3.5, 5.25, 7.0],
  e: [0.29, 0.32, 0.36, 0.38, 0.4, 0.44, 0.49, 0.54, 0.54],
  Y: [1.88, 1.71, 1.52, 1.41, 1.34, 1.23, 1.1, 1.01, 1.0],
  X: 0.46,
  X2rows: 0.75,
  Y1rows: [2.18, 1.98, 1.76, 1.63, 1.55, 1.42, 1.27, 1.17, 1.16],
  Y2rows: [3.06, 2.78, 2.47, 2.29, 2.18, 2.0, 1.79, 1.64, 1.63],
};

/** From memory; X + Y e = 1 within 0.006, two rows = 2^0.7 times one row within 0.006 in every row. */
export const ANGULAR_CONTACT_15: LoadFactors = {
  source: 'ISO 281:2007 table 3',
  trust: 'from memory',
  argument: [0.178, 0.357, 0.714, 1.07, 1.43, 2.14, 3.57, 5.35, 7.14],
  e: [0.38, 0.4, 0.43, 0.46, 0.47, 0.5, 0.55, 0.56, 0.56],
  Y: [1.47, 1.4, 1.3, 1.23, 1.19, 1.12, 1.02, 1.0, 1.0],
  X: 0.44,
  X2rows: 0.72,
  Y1rows: [1.65, 1.57, 1.46, 1.38, 1.34, 1.26, 1.14, 1.12, 1.12],
  Y2rows: [2.39, 2.28, 2.11, 2.0, 1.93, 1.82, 1.66, 1.63, 1.63],
};

export interface AngleRow {
  /** Degrees. */
  readonly alpha: number;
  readonly e: number;
  readonly X: number;
  readonly Y: number;
  readonly X2rows: number;
  readonly Y1rows: number;
  readonly Y2rows: number;
}

/** 20° and more: no longer by load. X, Y recomputed by the relations of ISO/TR 1281-1; e from memory. */
export const ANGULAR_CONTACT_BY_ANGLE: readonly AngleRow[] = [
  { alpha: 20, e: 0.57, X: 0.43, Y: 1.0, X2rows: 0.7, Y1rows: 1.09, Y2rows: 1.63 },
  { alpha: 25, e: 0.68, X: 0.41, Y: 0.87, X2rows: 0.67, Y1rows: 0.92, Y2rows: 1.41 },
  { alpha: 30, e: 0.8, X: 0.39, Y: 0.76, X2rows: 0.63, Y1rows: 0.78, Y2rows: 1.24 },
  { alpha: 35, e: 0.95, X: 0.37, Y: 0.66, X2rows: 0.6, Y1rows: 0.66, Y2rows: 1.07 },
  { alpha: 40, e: 1.14, X: 0.35, Y: 0.57, X2rows: 0.57, Y1rows: 0.55, Y2rows: 0.93 },
  { alpha: 45, e: 1.34, X: 0.33, Y: 0.5, X2rows: 0.54, Y1rows: 0.47, Y2rows: 0.81 },
];

/** Linear look-up in rising `x`; the end values hold beyond the ends; NaN at NaN. */
export function lookUp(x: ArrayLike<number>, y: ArrayLike<number>, at: number): number {
  if (Number.isNaN(at)) return at;
  const last = x.length - 1;
  if (at <= x[0]!) return y[0]!;
  if (at >= x[last]!) return y[last]!;
  let i = 0;
  while (x[i + 1]! < at) i++;
  return y[i]! + ((y[i + 1]! - y[i]!) * (at - x[i]!)) / (x[i + 1]! - x[i]!);
}
