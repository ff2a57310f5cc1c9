/** ISO 286 tolerance zones of bearing seats: limits of size from a code such as `k5` (shaft) or `H7` (housing). */
import type { Assessed, Range, Rule } from '../rule.ts';

export const FIT_RULE: Rule = {
  name: 'fit',
  formula:
    'shaft f, g, h: es, es - IT; k to p: ei, ei + IT; js: ±IT/2. Hole F to H mirror the shaft; K to P: ES = -ei + (ITn - ITn-1)',
  source: 'ISO 286-1 and -2 (IT6 to IT8 and m, n, p verified; the other figures from memory)',
  trust: 'from memory',
  units: 'm',
  range: 'nominal size up to 180 mm, grades 5 to 8; j and J in grades 5, 6 and 6, 7',
};

/** µm by nominal size up to and including `incl` mm (each above the row before). */
interface SizeRow {
  readonly incl: number;
  readonly IT: readonly [IT5: number, IT6: number, IT7: number, IT8: number];
  /** Upper deviation es of f and g; lower deviation ei of k (to IT7), m, n, p. */
  readonly f: number;
  readonly g: number;
  readonly k: number;
  readonly m: number;
  readonly n: number;
  readonly p: number;
  readonly j5: readonly [number, number];
  readonly j6: readonly [number, number];
  readonly J6: readonly [number, number];
  readonly J7: readonly [number, number];
}

// biome-ignore format: a table
const SIZES: readonly SizeRow[] = [
  { incl: 3, IT: [4, 6, 10, 14], f: -6, g: -2, k: 0, m: 2, n: 4, p: 6, j5: [-2, 2], j6: [-2, 4], J6: [-4, 2], J7: [-6, 4] },
  { incl: 6, IT: [5, 8, 12, 18], f: -10, g: -4, k: 1, m: 4, n: 8, p: 12, j5: [-2, 3], j6: [-2, 6], J6: [-3, 5], J7: [-6, 6] },
  { incl: 10, IT: [6, 9, 15, 22], f: -13, g: -5, k: 1, m: 6, n: 10, p: 15, j5: [-2, 4], j6: [-2, 7], J6: [-4, 5], J7: [-7, 8] },
  { incl: 18, IT: [8, 11, 18, 27], f: -16, g: -6, k: 1, m: 7, n: 12, p: 18, j5: [-3, 5], j6: [-3, 8], J6: [-5, 6], J7: [-8, 10] },
  { incl: 30, IT: [9, 13, 21, 33], f: -20, g: -7, k: 2, m: 8, n: 15, p: 22, j5: [-4, 5], j6: [-4, 9], J6: [-5, 8], J7: [-9, 12] },
  { incl: 50, IT: [11, 16, 25, 39], f: -25, g: -9, k: 2, m: 9, n: 17, p: 26, j5: [-5, 6], j6: [-5, 11], J6: [-6, 10], J7: [-11, 14] },
  { incl: 80, IT: [13, 19, 30, 46], f: -30, g: -10, k: 2, m: 11, n: 20, p: 32, j5: [-7, 6], j6: [-7, 12], J6: [-6, 13], J7: [-12, 18] },
  { incl: 120, IT: [15, 22, 35, 54], f: -36, g: -12, k: 3, m: 13, n: 23, p: 37, j5: [-9, 6], j6: [-9, 13], J6: [-6, 16], J7: [-13, 22] },
  { incl: 180, IT: [18, 25, 40, 63], f: -43, g: -14, k: 3, m: 15, n: 27, p: 43, j5: [-11, 7], j6: [-11, 14], J6: [-7, 18], J7: [-14, 26] },
];

const LEAST_GRADE = 5;
const GREATEST_GRADE = 8;
const HAIR = 1e-6;

/** Lower and upper deviation of a shaft, µm; null where the zone is not covered. */
function shaftZone(row: SizeRow, letter: string, grade: number): readonly [number, number] | null {
  const IT = row.IT[grade - LEAST_GRADE]!;
  switch (letter) {
    case 'f':
    case 'g':
      return [row[letter] - IT, row[letter]];
    case 'h':
      return [-IT, 0];
    case 'js':
      return [-IT / 2, IT / 2];
    case 'j':
      return grade === 5 ? row.j5 : grade === 6 ? row.j6 : null;
    case 'k':
      return grade <= 7 ? [row.k, row.k + IT] : [0, IT];
    case 'm':
    case 'n':
    case 'p':
      return [row[letter], row[letter] + IT];
    default:
      return null;
  }
}

/** The same of a hole. K, M, N to grade 8 and P to grade 7 are raised by the step of the grades above 3 mm. */
function holeZone(row: SizeRow, letter: string, grade: number): readonly [number, number] | null {
  const IT = row.IT[grade - LEAST_GRADE]!;
  switch (letter) {
    case 'F':
    case 'G': {
      const EI = -row[letter === 'F' ? 'f' : 'g'];
      return [EI, EI + IT];
    }
    case 'H':
      return [0, IT];
    case 'JS':
      return [-IT / 2, IT / 2];
    case 'J':
      return grade === 6 ? row.J6 : grade === 7 ? row.J7 : null;
    case 'K':
    case 'M':
    case 'N':
    case 'P': {
      const finer = row.IT[grade - LEAST_GRADE - 1];
      const raised = row.incl > 3 && (letter !== 'P' || grade <= 7);
      if (raised && finer === undefined) return null;
      const step = raised ? IT - finer! : 0;
      const ES = -row[letter.toLowerCase() as 'k' | 'm' | 'n' | 'p'] + step;
      return [ES - IT, ES];
    }
    default:
      return null;
  }
}

/**
 * Deviation of a seat from its nominal size (m), limits in m. `code` is letter and grade: small letters for a shaft, capitals for a
 * hole; the other kind is refused, as are zones the table does not cover.
 */
export function seatDeviation(code: string, nominal: number, seat: 'shaft' | 'hole'): Assessed<Range> {
  const match = /^([a-zA-Z]{1,2})(\d{1,2})$/.exec(code.trim());
  const letter = match?.[1] ?? '';
  const grade = Number(match?.[2]);
  const covered = `zones f to p and js of a shaft, F to P and JS of a hole, grades ${LEAST_GRADE} to ${GREATEST_GRADE}`;
  if (!match || !(grade >= LEAST_GRADE && grade <= GREATEST_GRADE)) {
    return { unassessed: `the fit “${code}” is not covered: ${covered}` };
  }
  const mm = nominal * 1e3;
  const row = mm > 0 ? SIZES.find(({ incl }) => mm <= incl + HAIR) : undefined;
  if (!row) return { unassessed: 'fits are known for sizes up to 180 mm' };
  const zone = seat === 'shaft' ? shaftZone(row, letter, grade) : holeZone(row, letter, grade);
  if (!zone) return { unassessed: `the fit “${code}” of a ${seat} is not covered: ${covered}` };
  return { value: { from: zone[0] * 1e-6, to: zone[1] * 1e-6 } };
}
