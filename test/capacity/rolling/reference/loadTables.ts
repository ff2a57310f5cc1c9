/** X, Y, e and X0, Y0 tables, copied apart from the product's own so that a slip of either shows. Tags stand beside each. */

/** [f0 Fa/C0r, e, Y]. ISO 281 table 3; e and Y read in Rules of Thumb for Mechanical Engineers, table 7a, p. 156; tag: verified. */
export const DEEP_GROOVE_ROWS: [number, number, number][] = [
  [0.172, 0.19, 2.3],
  [0.345, 0.22, 1.99],
  [0.689, 0.26, 1.71],
  [1.03, 0.28, 1.55],
  [1.38, 0.3, 1.45],
  [2.07, 0.34, 1.31],
  [3.45, 0.38, 1.15],
  [5.17, 0.42, 1.04],
  [6.89, 0.44, 1.0],
];

/** [i f0 Fa/C0r, e, Y one row, Y1 two rows, Y2 two rows]. ISO 281 table 3, contact angle 15°; tag: from memory. */
export const ANGULAR_15_ROWS: [number, number, number, number, number][] = [
  [0.178, 0.38, 1.47, 1.65, 2.39],
  [0.357, 0.4, 1.4, 1.57, 2.28],
  [0.714, 0.43, 1.3, 1.46, 2.11],
  [1.07, 0.46, 1.23, 1.38, 2.0],
  [1.43, 0.47, 1.19, 1.34, 1.93],
  [2.14, 0.5, 1.12, 1.26, 1.82],
  [3.57, 0.55, 1.02, 1.14, 1.66],
  [5.35, 0.56, 1.0, 1.12, 1.63],
  [7.14, 0.56, 1.0, 1.12, 1.63],
];

/** [degrees, e, X one row, Y one row, Y1 two rows, X2 two rows, Y2 two rows]. ISO 281 table 3; X, Y tag: recomputed, e tag: from memory. */
export const ANGULAR_BY_ANGLE_ROWS: [number, number, number, number, number, number, number][] = [
  [20, 0.57, 0.43, 1.0, 1.09, 0.7, 1.63],
  [25, 0.68, 0.41, 0.87, 0.92, 0.67, 1.41],
  [30, 0.8, 0.39, 0.76, 0.78, 0.63, 1.24],
  [35, 0.95, 0.37, 0.66, 0.66, 0.6, 1.07],
  [40, 1.14, 0.35, 0.57, 0.55, 0.57, 0.93],
  [45, 1.34, 0.33, 0.5, 0.47, 0.54, 0.81],
];

/** [degrees, X0 one row, Y0 one row, X0 two rows, Y0 two rows]. ISO 76:2006 table 2; tag: from memory. */
export const STATIC_BY_ANGLE_ROWS: [number, number, number, number, number][] = [
  [15, 0.5, 0.46, 1.0, 0.92],
  [20, 0.5, 0.42, 1.0, 0.84],
  [25, 0.5, 0.38, 1.0, 0.76],
  [30, 0.5, 0.33, 1.0, 0.66],
  [35, 0.5, 0.29, 1.0, 0.58],
  [40, 0.5, 0.26, 1.0, 0.52],
  [45, 0.5, 0.22, 1.0, 0.44],
];

/** [reliability in %, a1]. ISO 281:2007 reliability table; tag: recomputed. */
export const RELIABILITY_ROWS: [number, number][] = [
  [90, 1],
  [95, 0.64],
  [96, 0.55],
  [97, 0.47],
  [98, 0.37],
  [99, 0.25],
  [99.2, 0.22],
  [99.4, 0.19],
  [99.6, 0.16],
  [99.8, 0.12],
  [99.9, 0.093],
  [99.92, 0.087],
  [99.94, 0.08],
  [99.95, 0.077],
];

/** [Fa/C0, e, Y]. Shigley table 11-1 (its Fa/C0 is f0 Fa/C0 over 12.3); tag: from memory, several cells read in published solutions. */
export const TEXTBOOK_ROWS: [number, number, number][] = [
  [0.014, 0.19, 2.3],
  [0.021, 0.21, 2.15],
  [0.028, 0.22, 1.99],
  [0.042, 0.24, 1.85],
  [0.056, 0.26, 1.71],
  [0.07, 0.27, 1.63],
  [0.084, 0.28, 1.55],
  [0.11, 0.3, 1.45],
  [0.17, 0.34, 1.31],
  [0.28, 0.38, 1.15],
  [0.42, 0.42, 1.04],
  [0.56, 0.44, 1.0],
];
