import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import {
  constantThrust,
  dynamicEquivalent,
  dynamicForm,
  inducedThrust,
  largestThrust,
  pressureCentreOffset,
  pressureCentres,
  sharedThrust,
  shareThrust,
  thrustOnA,
} from '../../../src/capacity/rolling/index.ts';
import { bearing, DEGREE, known, SEED } from './bearings.ts';

describe('worked example: tapered pair (Shigley 8th ed. solutions 11-12, first trial; verified)', () => {
  // Its induced thrust is 0.47 Fr/K, K = 1.5 for both rows, no external thrust.
  const law = constantThrust(0.47 / 1.5);
  const shared = sharedThrust(law, law, 2492, 4873, 0);
  const form = known(dynamicForm(bearing('tapered-roller', { Y: 1.5 })));

  test('induced 780.8 and 1526.9 N; both rows carry 1526.9 N', () => {
    expect(Math.abs(shared.SA / 780.8267 - 1)).toBeLessThan(0.003);
    expect(Math.abs(shared.SB / 1526.873 - 1)).toBeLessThan(0.003);
    expect(Math.abs(shared.FaA / 1526.873 - 1)).toBeLessThan(0.003);
    expect(Math.abs(shared.FaB / 1526.873 - 1)).toBeLessThan(0.003);
    expect(shared.governedBy).toBe('B');
  });

  test('equivalent loads 3287 N and 4873 N, the second raised to its radial load', () => {
    expect(Math.abs(dynamicEquivalent(form, 2492, shared.FaA) / 3287.11 - 1)).toBeLessThan(0.003);
    expect(Math.abs(dynamicEquivalent(form, 4873, shared.FaB) / 4873 - 1)).toBeLessThan(0.003);
  });
});

describe('the four cases of the usual tables, by hand (SA 300, SB 500)', () => {
  const a = constantThrust(0.3);
  const b = constantThrust(0.5);
  test.each([
    ['pushed towards A', 200, 700, 500, 'B'],
    ['none', 0, 500, 500, 'B'],
    ['lightly towards B: B still pushes harder', -100, 400, 500, 'B'],
    ['exactly balanced', -200, 300, 500, null],
    ['hard towards B', -900, 300, 1200, 'A'],
  ] as const)('%s: Ka %d N', (_, Ka, FaA, FaB, governedBy) => {
    const shared = sharedThrust(a, b, 1000, 1000, Ka);
    expect([shared.FaA, shared.FaB]).toEqual([FaA, FaB]);
    expect(shared.governedBy).toBe(governedBy);
    expect(shared.unloaded).toBeNull();
  });

  test('a row without radial load is unloaded where nothing pushes it', () => {
    const shared = sharedThrust(a, b, 1000, 0, 800);
    expect(shared).toMatchObject({ FaA: 800, FaB: 0, unloaded: 'B', notes: ['row-unloaded'] });
    // With less thrust than row A induces, the rest lands on B.
    expect(sharedThrust(a, b, 1000, 0, 100)).toMatchObject({ FaA: 300, FaB: 200, unloaded: null });
    expect(sharedThrust(a, b, 0, 1000, -800)).toMatchObject({ FaA: 0, FaB: 800, unloaded: 'A' });
  });
});

describe('pressure centres', () => {
  test('25° on a pitch diameter of 33.5 mm: 7.81 mm off the middle', () => {
    // 33.5/2 · tan 25° = 16.75 · 0.466308 = 7.8107 mm.
    const offset = known(pressureCentreOffset(bearing('angular-contact', { contactAngle: 25 * DEGREE })));
    expect(offset).toBeCloseTo(0.0078107, 7);
  });

  test('back to back widens, face to face narrows, in whichever order the stations stand', () => {
    const o = known(pressureCentres('back-to-back', 0.01, 0.06, 0.008, 0.006));
    expect([o.stationA, o.stationB, o.span]).toEqual([0.002, 0.066, 0.064].map((x) => expect.closeTo(x, 12)));
    const x = known(pressureCentres('face-to-face', 0.01, 0.06, 0.008, 0.006));
    expect([x.stationA, x.stationB, x.span]).toEqual([0.018, 0.054, 0.036].map((v) => expect.closeTo(v, 12)));
    const mirrored = known(pressureCentres('back-to-back', -0.01, -0.06, 0.008, 0.006));
    expect([mirrored.stationA, mirrored.stationB, mirrored.span]).toEqual(
      [-0.002, -0.066, 0.064].map((v) => expect.closeTo(v, 12)),
    );
  });

  test('no span, or centres that meet, are refused', () => {
    expect(pressureCentres('back-to-back', 0.01, 0.01, 0.008, 0.006)).toEqual({ unassessed: 'zero-span' });
    expect(pressureCentres('face-to-face', 0, 0.014, 0.008, 0.006)).toEqual({ unassessed: 'pressure-centres-meet' });
    expect(pressureCentres('face-to-face', 0, 0.01, 0.008, 0.006)).toEqual({ unassessed: 'pressure-centres-meet' });
    expect(pressureCentres('face-to-face', 0, Number.NaN, 0.008, 0.006)).toEqual({ unassessed: 'bad-dimensions' });
  });

  test('no offset: the ring centres', () => {
    expect(known(pressureCentres('face-to-face', 0, 0.05, 0, 0))).toEqual({ stationA: 0, stationB: 0.05, span: 0.05 });
  });
});

describe('which row an axial force loads', () => {
  /**
   * From the contact line: the ball pushes the inner ring along the line from pressure centre to ball, reversed, so the shaft is held
   * against the way from its middle to the pressure centre. Row A resists a shaft force f where f · (centre - station) < 0.
   */
  test.each([
    ['back-to-back', 0.01, 0.06],
    ['back-to-back', -0.01, -0.06],
    ['face-to-face', 0.01, 0.06],
    ['face-to-face', -0.01, -0.06],
  ] as const)('%s, A at %d, B at %d', (adjustment, stationA, stationB) => {
    const centres = known(pressureCentres(adjustment, stationA, stationB, 0.002, 0.002));
    for (const force of [70, -70]) {
      const resistedByA = force * (centres.stationA - stationA) < 0;
      const resistedByB = force * (centres.stationB - stationB) < 0;
      expect(resistedByA).toBe(!resistedByB);
      expect(thrustOnA(adjustment, stationA, stationB, force, 'shaft')).toBe(resistedByA ? 70 : -70);
      expect(thrustOnA(adjustment, stationA, stationB, force, 'housing')).toBe(resistedByA ? -70 : 70);
    }
  });
});

describe('induced thrust by kind', () => {
  test('angular contact from 20°: e; tapered: 1/(2Y)', () => {
    expect(known(inducedThrust(bearing('angular-contact', { contactAngle: 40 * DEGREE }))).c[0]).toBeCloseTo(1.14, 9);
    expect(known(inducedThrust(bearing('tapered-roller', { Y: 1.6 }))).c[0]).toBeCloseTo(0.3125, 12);
  });

  test('other kinds and two rows do not form an adjusted pair', () => {
    for (const b of [
      bearing('deep-groove'),
      bearing('cylindrical-roller'),
      bearing('tapered-roller', { rows: 2, Y: 2 }),
    ]) {
      expect(inducedThrust(b)).toEqual({ unassessed: 'no-thrust-partner' });
    }
    expect(inducedThrust(bearing('angular-contact'))).toEqual({ unassessed: 'contact-angle-missing' });
  });

  test('the e of a row grows less than a third as fast as its load, so the iteration closes in', () => {
    for (const degrees of [10, 12, 15, 17, 19.9]) {
      const law = known(inducedThrust(bearing('angular-contact', { contactAngle: degrees * DEGREE, f0: 14 })));
      for (let i = 1; i < law.c.length; i++) {
        const slope = (law.c[i]! - law.c[i - 1]!) / (law.argument[i]! - law.argument[i - 1]!);
        expect((slope * law.argument[i]!) / law.c[i]!).toBeLessThan(1 / 3);
      }
    }
  });
});

describe(`properties (seed ${SEED})`, () => {
  const laws = [
    ...[12, 15, 18].map((degrees) => bearing('angular-contact', { contactAngle: degrees * DEGREE, f0: 14 })),
    bearing('angular-contact', { contactAngle: 25 * DEGREE }),
    bearing('tapered-roller', { contactAngle: 14 * DEGREE }),
  ].map((b) => known(inducedThrust(b)));
  const radial = () => fc.double({ min: 0, max: 8000, noNaN: true });
  const axial = () => fc.double({ min: -8000, max: 8000, noNaN: true });
  const law = () => fc.constantFrom(...laws);

  test('axial forces balance, each row carries what it induces, and one carries no more', () => {
    fc.assert(
      fc.property(law(), law(), radial(), radial(), axial(), (A, B, FrA, FrB, Ka) => {
        const s = sharedThrust(A, B, FrA, FrB, Ka);
        const scale = 1e-9 * (1 + s.FaA + s.FaB);
        const balanced = Math.abs(s.FaA - s.FaB - Ka) <= scale;
        const enough = s.FaA >= s.SA - scale && s.FaB >= s.SB - scale;
        const tight = Math.min(s.FaA - s.SA, s.FaB - s.SB) <= scale;
        return balanced && enough && tight;
      }),
      { seed: SEED, numRuns: 2000 },
    );
  });

  test('a load-dependent e is the one fixed point: bisection finds the same', () => {
    // Row A alone with 15°: Fa = e(Fa) Fr. e(Fa)/Fa falls, so Fa - e(Fa) Fr changes sign once.
    const A = laws[1]!;
    const e = (Fa: number) => {
      const x = A.scale * Fa;
      let i = 0;
      while (i < A.argument.length - 2 && A.argument[i + 1]! < x) i++;
      const t = Math.min(1, Math.max(0, (x - A.argument[i]!) / (A.argument[i + 1]! - A.argument[i]!)));
      return A.c[i]! + t * (A.c[i + 1]! - A.c[i]!);
    };
    for (let Fr = 20; Fr < 8000; Fr *= 1.3) {
      let low = 0;
      let high = Fr;
      for (let i = 0; i < 100; i++) {
        const middle = (low + high) / 2;
        if (middle < e(middle) * Fr) low = middle;
        else high = middle;
      }
      const out = new Float64Array(2);
      shareThrust(A, constantThrust(0), Fr, 0, 0, out);
      expect(out[0]! / low).toBeCloseTo(1, 10);
    }
  });

  test('swapping the rows and the direction swaps the answer', () => {
    fc.assert(
      fc.property(law(), law(), radial(), radial(), axial(), (A, B, FrA, FrB, Ka) => {
        const s = sharedThrust(A, B, FrA, FrB, Ka);
        const t = sharedThrust(B, A, FrB, FrA, -Ka);
        return s.FaA === t.FaB && s.FaB === t.FaA;
      }),
      { seed: SEED, numRuns: 500 },
    );
  });

  test('more radial load on either row never lowers an axial load; the largest c bounds it', () => {
    fc.assert(
      fc.property(law(), law(), radial(), radial(), axial(), radial(), radial(), (A, B, FrA, FrB, Ka, da, db) => {
        const less = sharedThrust(A, B, FrA, FrB, Ka);
        const more = sharedThrust(A, B, FrA + da, FrB + db, Ka);
        const most = sharedThrust(constantThrust(largestThrust(A)), constantThrust(largestThrust(B)), FrA, FrB, Ka);
        const slack = 1 + 1e-12;
        return (
          more.FaA * slack >= less.FaA &&
          more.FaB * slack >= less.FaB &&
          most.FaA * slack >= less.FaA &&
          most.FaB * slack >= less.FaB
        );
      }),
      { seed: SEED, numRuns: 1000 },
    );
  });

  test('with constant c the axial loads are convex in the loads', () => {
    const A = laws[3]!;
    const B = laws[4]!;
    const triple = () => fc.tuple(radial(), radial(), axial());
    fc.assert(
      fc.property(triple(), triple(), (u, v) => {
        const at = (w: readonly number[]) => sharedThrust(A, B, w[0]!, w[1]!, w[2]!);
        const middle = at(u.map((x, i) => (x + v[i]!) / 2));
        return (
          middle.FaA <= ((at(u).FaA + at(v).FaA) / 2) * (1 + 1e-12) + 1e-9 &&
          middle.FaB <= ((at(u).FaB + at(v).FaB) / 2) * (1 + 1e-12) + 1e-9
        );
      }),
      { seed: SEED, numRuns: 1000 },
    );
  });

  test('what is no load gives no number', () => {
    for (const [FrA, FrB, Ka] of [
      [Number.NaN, 1, 1],
      [1, Number.NaN, 1],
      [1, 1, Number.NaN],
      [-1, 1, 1],
    ] as const) {
      const s = sharedThrust(laws[1]!, laws[3]!, FrA, FrB, Ka);
      expect([s.FaA, s.FaB]).toEqual([Number.NaN, Number.NaN]);
    }
  });
});
