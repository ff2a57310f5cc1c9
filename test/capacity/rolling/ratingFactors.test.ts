import { describe, expect, test } from 'vitest';
import { ballDynamicFactor, rollerDynamicFactor } from '../../../src/capacity/rolling/dynamicRatingFactor.ts';
import { grooveStaticFactor, selfAligningStaticFactor } from '../../../src/capacity/rolling/staticRatingFactor.ts';
import { DYNAMIC_FACTORS, STATIC_FACTORS } from './reference/factorTables.ts';

describe('f_c against the tables of ISO 281:2007 (recomputed)', () => {
  const columns = [
    [
      'single row, and angular contact',
      DYNAMIC_FACTORS.singleOrAngular,
      (g: number) => ballDynamicFactor(g, 'single-or-angular'),
      0.0015,
    ],
    [
      'two rows of radial contact',
      DYNAMIC_FACTORS.doubleRadial,
      (g: number) => ballDynamicFactor(g, 'double-radial'),
      0.0015,
    ],
    ['self-aligning', DYNAMIC_FACTORS.selfAligning, (g: number) => ballDynamicFactor(g, 'self-aligning'), 0.0025],
    ['rollers', DYNAMIC_FACTORS.roller, rollerDynamicFactor, 0.001],
  ] as const;
  test.each(columns)('%s: every row to the rounding of the table', (_, rows, factor, tolerance) => {
    expect(rows.length).toBeGreaterThanOrEqual(20);
    for (const [gamma, table] of rows) {
      expect(Math.abs(factor(gamma) / table - 1), `γ ${gamma}`).toBeLessThan(tolerance);
    }
  });

  test('two rows of radial contact are 0.90/0.95 of one row at every γ', () => {
    for (let gamma = 0.02; gamma < 0.6; gamma += 0.01) {
      expect(ballDynamicFactor(gamma, 'double-radial') / ballDynamicFactor(gamma, 'single-or-angular')).toBeCloseTo(
        90 / 95,
        12,
      );
    }
  });

  test('outside 0 < γ < 1 there is no factor', () => {
    for (const gamma of [0, -0.1, 1, 1.2, Number.NaN]) {
      expect(ballDynamicFactor(gamma, 'single-or-angular')).toBeNaN();
      expect(rollerDynamicFactor(gamma)).toBeNaN();
    }
  });
});

/** Complete elliptic integrals by the midpoint rule, which converges geometrically for periodic integrands. */
function integrals(m: number): [number, number] {
  const n = 4000;
  let K = 0;
  let E = 0;
  for (let i = 0; i < n; i++) {
    const s = Math.sqrt(1 - m * Math.sin(((i + 0.5) * Math.PI) / (2 * n)) ** 2);
    K += Math.PI / (2 * n) / s;
    E += (Math.PI / (2 * n)) * s;
  }
  return [K, E];
}

/** Peak Hertz pressure, MPa, of a ball (diameter 1 mm) on a race under a load in N, by quadrature and its own search. */
function peakPressure(load: number, along: number, groove: number): number {
  const sum = 4 - 1 / groove + along;
  const tau = Math.abs(1 / groove + along) / sum;
  let low = 1.0001;
  let high = 1000;
  for (let i = 0; i < 50; i++) {
    const k = (low + high) / 2;
    const [K, E] = integrals(1 - 1 / k ** 2);
    if (((k * k + 1) * E - 2 * K) / ((k * k - 1) * E) < tau) low = k;
    else high = k;
  }
  const [, E] = integrals(1 - 1 / low ** 2);
  const a = ((6 * low ** 2 * E * load) / (Math.PI * sum * (207000 / 0.91))) ** (1 / 3);
  return (1.5 * load) / (Math.PI * a * (a / low));
}

describe('f0 against the table of ISO 76:2006 (recomputed)', () => {
  test('all 41 rows within 0.06', () => {
    expect(STATIC_FACTORS).toHaveLength(41);
    for (const [gamma, table] of STATIC_FACTORS) {
      expect(Math.abs(grooveStaticFactor(gamma) - table), `γ ${gamma}`).toBeLessThan(0.06);
    }
  });

  test('the load that f0 stands for brings the worse of both races to 4200 MPa, by quadrature', () => {
    for (const gamma of [0.02, 0.09, 0.1, 0.2, 0.35]) {
      const Q = grooveStaticFactor(gamma) / 0.2;
      const inner = peakPressure(Q, (2 * gamma) / (1 - gamma), 0.52);
      const outer = peakPressure(Q, (-2 * gamma) / (1 + gamma), 0.53);
      expect(Math.max(inner, outer)).toBeGreaterThan(4199);
      expect(Math.max(inner, outer)).toBeLessThan(4201);
      // The outer race governs up to 0.09, the inner from 0.10.
      expect(outer > inner).toBe(gamma <= 0.09);
    }
  });

  test('self-aligning: a ball in a sphere, whose closed form is a circle of contact', () => {
    // Peak of a circular contact p³ = 6 Q E'²/(π³ R²) with E' = E/(2(1-ν²)) and 1/R = 2 (1 - γ/(1+γ)) for a ball of 1 mm.
    for (const gamma of [0.05, 0.12, 0.2, 0.3]) {
      const curvature = 2 * (1 - gamma / (1 + gamma));
      const modulus = 207000 / 0.91 / 2;
      const Q = (4600 ** 3 * Math.PI ** 3) / (6 * modulus ** 2 * curvature ** 2);
      expect(selfAligningStaticFactor(gamma) / (0.2 * Q)).toBeCloseTo(1, 6);
    }
  });

  test('outside its range there is no factor', () => {
    for (const gamma of [-0.01, 1, Number.NaN]) {
      expect(grooveStaticFactor(gamma)).toBeNaN();
      expect(selfAligningStaticFactor(gamma)).toBeNaN();
    }
  });
});
