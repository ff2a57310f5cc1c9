import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  equivalentLoad,
  lifeExponent,
  lifeNotes,
  lifeRatio,
  lifeRevolutions,
  lifeSeconds,
  ratingNeeded,
  reliabilityAt,
  reliabilityFactor,
  survival,
  systemLife,
  turningRate,
  weibullSlope,
} from '../../../src/capacity/rolling/index.ts';
import { known, SEED } from './bearings.ts';
import { RELIABILITY_ROWS } from './reference/loadTables.ts';

const HOUR = 3600;
/** Textbook distribution: x0 0.02, θ 4.459, b 1.483 (Shigley ch. 11, verified). */
const TEXTBOOK = { x0: 0.02, spread: 4.459 - 0.02, slope: 1.483 };
const rate = (rpm: number) => rpm / 60;

function near(found: number, expected: number, tolerance: number): void {
  expect(Math.abs(found / expected - 1), `${found} against ${expected}`).toBeLessThan(tolerance);
}

describe('basic rating life, worked examples (verified)', () => {
  test('Wentzell example 20.1: 22463.52 N, 10675.73 N, 1750/min give 9.316 million revolutions, 88.73 h', () => {
    const L = lifeRevolutions(22463.52, 10675.73, 3);
    near(L / 1e6, 9.316234, 0.001);
    near(lifeSeconds(L, rate(1750)) / HOUR, 88.72604, 0.001);
  });

  test('Wentzell example 20.2: 200 h at 1750/min need 29 454 N', () => {
    near(ratingNeeded(10675.73, rate(1750) * 200 * HOUR, 3), 29453.53, 0.001);
  });

  test('Jindal example 18-4: 41 kN, 20 kN, 720/min give 199.42 h', () => {
    near(lifeSeconds(lifeRevolutions(41000, 20000, 3), rate(720)) / HOUR, 199.4242, 0.001);
  });

  test('exponent 3 for balls, 10/3 for rollers: half the load gives 8 times and 10.08 times the life', () => {
    for (const kind of ['deep-groove', 'angular-contact', 'self-aligning-ball', 'four-point'] as const)
      expect(lifeExponent(kind)).toBe(3);
    for (const kind of ['cylindrical-roller', 'needle', 'tapered-roller', 'crossed-roller'] as const) {
      expect(lifeExponent(kind)).toBe(10 / 3);
    }
    near(lifeRevolutions(1, 0.5, 3) / lifeRevolutions(1, 1, 3), 8, 1e-12);
    near(lifeRevolutions(1, 0.5, 10 / 3) / lifeRevolutions(1, 1, 10 / 3), 10.0794, 1e-5);
  });
});

describe('reliability', () => {
  test.each(RELIABILITY_ROWS)('a1 at %d %% is %d to its last digit (recomputed)', (percent, a1) => {
    const digits = a1 === 1 ? 12 : a1 >= 0.1 ? 2 : 3;
    expect(Math.abs(known(reliabilityFactor(percent / 100)) - a1)).toBeLessThanOrEqual(0.5 * 10 ** -digits + 1e-12);
  });

  test('14 kN, 2 kN: 343 million revolutions, and at 95 and 99 % by the closed form (recomputed)', () => {
    const L10 = lifeRevolutions(14000, 2000, 3);
    near(L10 / 1e6, 343, 1e-9);
    near(known(reliabilityFactor(0.95)), 0.6379117, 1e-6);
    near(known(reliabilityFactor(0.99)), 0.2483317, 1e-6);
    // The table's rounded 0.64 and 0.25 give 219.52 and 85.75.
    near((known(reliabilityFactor(0.95)) * L10) / 219.52e6, 1, 0.01);
    near((known(reliabilityFactor(0.99)) * L10) / 85.75e6, 1, 0.01);
  });

  test('outside 0.9 to 0.9995 the standard says nothing', () => {
    for (const R of [0.89, 0.9996, 1, 0, -1, Number.NaN])
      expect(reliabilityFactor(R)).toEqual({ unassessed: 'reliability-range' });
  });

  test('factor and survival are each other’s inverse', () => {
    for (let R = 0.5; R < 0.99999; R += 0.0103) near(survival(lifeRatio(R)), R, 1e-12);
    expect(survival(0.05)).toBe(1);
    expect(survival(Number.NaN)).toBeNaN();
    expect(lifeRatio(1)).toBeNaN();
  });

  test('reliability at a demanded life never claims more than the standard, and says where it stretches it', () => {
    expect(reliabilityAt(100, 100)).toEqual({ value: expect.closeTo(0.9, 12), notes: [] });
    expect(reliabilityAt(1, 100)).toEqual({ value: 0.9995, notes: ['reliability-capped'] });
    expect(reliabilityAt(0, 100)).toEqual({ value: 0.9995, notes: ['reliability-capped'] });
    expect(reliabilityAt(5, Number.POSITIVE_INFINITY)).toEqual({ value: 0.9995, notes: ['reliability-capped'] });
    expect(reliabilityAt(200, 100)).toHaveProperty('notes', ['reliability-extrapolated']);
    for (const [t, L] of [
      [Number.NaN, 1],
      [1, Number.NaN],
      [-1, 1],
      [1, -1],
    ] as const)
      expect(known(reliabilityAt(t, L))).toBeNaN();
    expect(known(reliabilityAt(5, 0))).toBe(0);
  });
});

describe('reliability, worked examples of textbooks with their own distributions', () => {
  test('Jindal example 18-7 (verified): two parameters, slope 1.17, 0.98, 504 million revolutions need 44 589 N', () => {
    const twoParameter = { x0: 0, spread: Math.log(1 / 0.9) ** (-1 / 1.17), slope: 1.17 };
    const L = rate(1400) * 6000 * HOUR;
    near(L / 1e6, 504, 1e-9);
    near(ratingNeeded(3500, L, 3, lifeRatio(0.98, twoParameter)), 44589.04, 0.001);
  });

  // Shigley 10th ed. solutions, ch. 11 (verified): rating needed, and reliability of the bearing chosen.
  test.each([
    ['11-1 ball', 3000, 525, 0.9, 24255.33, 3, 25500, 3000, 0.9195092],
    ['11-2 ball', 4514.94, 1248, 0.9, 48718.08, 3, 55900, 4520, 0.9450217],
    // Printed 0.962; its own numbers give 0.9695.
    ['11-5 ball', 4514.945, 1248, 0.95, 57035.77, 3, 63700, 4520, 0.969549],
    ['11-6 roller', 13918.49, 1248, 0.95, 136438.6, 10 / 3, 138000, 13920, 0.9527318],
  ])('%s', (_, load, xD, R, needed, p, chosen, chosenLoad, reliability) => {
    near(ratingNeeded(load, xD * 1e6, p, lifeRatio(R, TEXTBOOK)), needed, 0.003);
    near(survival((xD * 1e6) / lifeRevolutions(chosen, chosenLoad, p), TEXTBOOK), reliability, 0.003);
  });

  test('11-6, second roller: 20 kN, 456, 0.95 need 144.9 kN', () => {
    near(ratingNeeded(20000, 456e6, 10 / 3, lifeRatio(0.95, TEXTBOOK)), 144944.1, 0.003);
  });

  test('11-3 and 11-2 by the plain life formula: 118.2 kN and 48.6 kN; reliability of 123 kN 0.917', () => {
    near(ratingNeeded(13920, 1248e6, 10 / 3), 118169, 0.003);
    near(ratingNeeded(4514.94, 1248e6, 3), 48609.82, 0.003);
    near(survival(1248e6 / lifeRevolutions(123000, 13920, 10 / 3), TEXTBOOK), 0.9167427, 0.003);
  });
});

describe('equivalent load over a duty', () => {
  test('Jindal example 18-9 (verified): weighted by revolutions 3954.3 N; 648 million revolutions need 34 219 N', () => {
    const speeds = [1440, 1080, 720];
    const shares = [0.25, 0.5, 0.25];
    const revolutions = speeds.map((n, i) => n * shares[i]!);
    expect(revolutions.reduce((a, b) => a + b)).toBe(1080);
    const P = known(equivalentLoad([3000, 4000, 5000], revolutions, 3));
    near(P, 3954.342, 0.001);
    near(ratingNeeded(P, rate(1080) * 10000 * HOUR, 3), 34218.89, 0.001);
  });

  test('one load is its own mean; standing still counts nothing, whatever the load', () => {
    near(known(equivalentLoad([800, 800, 800], [1, 5, 2], 10 / 3)), 800, 1e-12);
    near(known(equivalentLoad([800, 1e9], [3, 0], 3)), 800, 1e-12);
    expect(known(equivalentLoad([0, 0], [3, 1], 3))).toBe(0);
  });

  test('the life under the mean is that of the damage summed segment by segment (Palmgren, Miner)', () => {
    const loads = [500, 1200, 90, 3000];
    const turns = [4, 2, 40, 0.5];
    const C = 9000;
    let damage = 0;
    loads.forEach((P, i) => {
      damage += turns[i]! / lifeRevolutions(C, P, 3);
    });
    const total = turns.reduce((a, b) => a + b);
    near(lifeRevolutions(C, known(equivalentLoad(loads, turns, 3)), 3), total / damage, 1e-12);
  });

  test('an infinite load makes the mean infinite; what is no number is refused', () => {
    expect(known(equivalentLoad([1, Number.POSITIVE_INFINITY], [1, 1], 3))).toBe(Number.POSITIVE_INFINITY);
    for (const [loads, turns] of [
      [[Number.NaN], [1]],
      [[-1], [1]],
      [[1], [Number.NaN]],
      [[1], [-1]],
      [[1, 2], [1]],
    ] as const) {
      expect(equivalentLoad(loads, turns, 3)).toEqual({ unassessed: 'bad-duty' });
    }
    // Not even a segment at rest may hide a load that is no number.
    expect(equivalentLoad([1, Number.NaN], [1, 0], 3)).toEqual({ unassessed: 'bad-duty' });
    expect(equivalentLoad([5, 6], [0, 0], 3)).toEqual({ unassessed: 'no-turning' });
    expect(equivalentLoad([], [], 3)).toEqual({ unassessed: 'no-turning' });
  });
});

describe('system life', () => {
  test('slopes: 10/9 balls, 9/8 rollers', () => {
    expect(weibullSlope('deep-groove')).toBe(10 / 9);
    expect(weibullSlope('tapered-roller')).toBe(9 / 8);
  });

  test('one slope: the closed form; two equal ball bearings keep 2^-0.9 = 0.536 of one', () => {
    const lives = [4e6, 9e6, 2e7];
    const e = 10 / 9;
    const closed = lives.reduce((sum, L) => sum + L ** -e, 0) ** (-1 / e);
    near(systemLife(lives, [e, e, e]), closed, 1e-12);
    near(systemLife([5, 5], [e, e]), 5 * 2 ** -0.9, 1e-12);
    near(systemLife([7], [9 / 8]), 7, 1e-12);
  });

  test('mixed slopes: the product of the reliabilities at that time is 0.9', () => {
    const lives = [4e6, 9e6, 5e6];
    const slopes = [10 / 9, 9 / 8, 9 / 8];
    const t = systemLife(lives, slopes);
    const R = lives.reduce((product, L, i) => product * 0.9 ** ((t / L) ** slopes[i]!), 1);
    near(R, 0.9, 1e-12);
  });

  test('limits: nothing wears, one is dead, one is not known', () => {
    const e = 10 / 9;
    expect(systemLife([], [])).toBe(Number.POSITIVE_INFINITY);
    expect(systemLife([Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY], [e, e])).toBe(Number.POSITIVE_INFINITY);
    near(systemLife([Number.POSITIVE_INFINITY, 6], [e, e]), 6, 1e-12);
    expect(systemLife([0, 6], [e, e])).toBe(0);
    for (const bad of [Number.NaN, -1]) expect(systemLife([bad, 6], [e, e])).toBeNaN();
    expect(systemLife([1], [e, e])).toBeNaN();
    expect(systemLife([1], [Number.NaN])).toBeNaN();
  });
});

describe('limits of life', () => {
  test('no load lives for ever, an infinite one not at all, no number has none', () => {
    expect(lifeRevolutions(1e4, 0, 3)).toBe(Number.POSITIVE_INFINITY);
    expect(lifeRevolutions(1e4, Number.POSITIVE_INFINITY, 3)).toBe(0);
    for (const [C, P] of [
      [0, 1],
      [-1, 1],
      [Number.NaN, 1],
      [1, Number.NaN],
      [1, -1],
    ] as const) {
      expect(lifeRevolutions(C, P, 3)).toBeNaN();
      expect(lifeSeconds(lifeRevolutions(C, P, 3), 0)).toBeNaN();
    }
    expect(lifeSeconds(5, 0)).toBe(Number.POSITIVE_INFINITY);
    expect(lifeSeconds(5, Number.NaN)).toBeNaN();
    expect(ratingNeeded(Number.NaN, 1, 3)).toBeNaN();
    expect(ratingNeeded(1, 1, 3, 0)).toBeNaN();
  });

  test('the formula’s own range is marked', () => {
    expect(lifeNotes(10000, 6000, 5000)).toEqual([]);
    expect(lifeNotes(10000, 6000, 5001)).toEqual(['load-beyond-life-formula']);
    expect(lifeNotes(10000, 4000, 4500)).toEqual(['load-beyond-life-formula']);
  });

  test('turning at 2π rad/s is one revolution a second, either way', () => {
    expect(turningRate(2 * Math.PI)).toBe(1);
    expect(turningRate(-2 * Math.PI)).toBe(1);
    expect(turningRate(Number.NaN)).toBeNaN();
  });
});

describe(`properties (seed ${SEED})`, () => {
  const positive = () => fc.double({ min: 1, max: 1e6, noNaN: true });

  test('a larger C never lowers life, a larger P never raises it, a higher reliability never lengthens it', () => {
    const exponent = () => fc.constantFrom(3, 10 / 3);
    fc.assert(
      fc.property(positive(), positive(), fc.double({ min: 1, max: 10, noNaN: true }), exponent(), (C, P, k, p) => {
        const L = lifeRevolutions(C, P, p);
        return lifeRevolutions(C * k, P, p) >= L && lifeRevolutions(C, P * k, p) <= L;
      }),
      { seed: SEED, numRuns: 1000 },
    );
    let last = Number.POSITIVE_INFINITY;
    for (let R = 0.9; R <= 0.9995; R += 0.0001) {
      const a1 = known(reliabilityFactor(R));
      expect(a1).toBeLessThan(last);
      last = a1;
    }
  });

  test('rating needed and life are each other’s inverse', () => {
    fc.assert(
      fc.property(
        positive(),
        positive(),
        (C, P) => Math.abs(ratingNeeded(P, lifeRevolutions(C, P, 3), 3) / C - 1) < 1e-9,
      ),
      { seed: SEED, numRuns: 300 },
    );
  });

  test('a mean lies between the least and the largest load; the system below its shortest life and above a share of it', () => {
    fc.assert(
      fc.property(fc.array(fc.tuple(positive(), positive()), { minLength: 1, maxLength: 12 }), (pairs) => {
        const values = pairs.map((pair) => pair[0]);
        const P = known(
          equivalentLoad(
            values,
            pairs.map((pair) => pair[1]),
            10 / 3,
          ),
        );
        const least = Math.min(...values);
        const slopes = pairs.map((_, i) => (i % 2 ? 10 / 9 : 9 / 8));
        const t = systemLife(values, slopes);
        return (
          P >= least * (1 - 1e-12) &&
          P <= Math.max(...values) * (1 + 1e-12) &&
          t <= least * (1 + 1e-12) &&
          t >= least * values.length ** -0.9 * (1 - 1e-12)
        );
      }),
      { seed: SEED, numRuns: 500 },
    );
  });
});
