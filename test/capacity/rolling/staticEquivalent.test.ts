import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { staticEquivalent, staticForm, staticSafety, usualStaticSafety } from '../../../src/capacity/rolling/index.ts';
import { bearing, DEGREE, EVERY_KIND, known, SEED } from './bearings.ts';
import { STATIC_BY_ANGLE_ROWS } from './reference/loadTables.ts';

const load = () => fc.double({ min: 0, max: 1e5, noNaN: true });

describe('worked examples', () => {
  test('floor at Fr: Fr 5000, Fa 1000, X0 0.6, Y0 0.5 give P0 5000, s0 2 (recomputed)', () => {
    const P0 = staticEquivalent(known(staticForm(bearing('deep-groove'))), 5000, 1000);
    expect(P0).toBe(5000);
    expect(staticSafety(10000, P0)).toBe(2);
  });

  // Common published formula of crossed rollers; 0.44 is the two-row Y0 at 45° (recomputed).
  test.each([
    ['with a moment', 1000, 500, 120, 4220],
    ['at the limit of its factors', 1000, 1500, 0, 1660],
  ])('crossed rollers %s: P0 = Fr + 2M/dpw + 0.44 Fa', (_, Fr, Fa, M, P0) => {
    const ring = bearing('crossed-roller', { bore: 0.06, outer: 0.1, pitchDiameter: 0.08 });
    expect(staticEquivalent(known(staticForm(ring)), Fr, Fa, M) / P0).toBeCloseTo(1, 9);
    // A four-point bearing at 45° has the same static factors.
    const fourPoint = { ...ring, kind: 'four-point' as const, contactAngle: 45 * DEGREE };
    expect(staticEquivalent(known(staticForm(fourPoint)), Fr, Fa, M) / P0).toBeCloseTo(1, 9);
  });

  test('by hand: deep groove, Fr 1000, Fa 2000: 0.6 · 1000 + 0.5 · 2000 = 1600', () => {
    expect(staticEquivalent(known(staticForm(bearing('deep-groove'))), 1000, 2000)).toBe(1600);
  });
});

describe('factors by kind (ISO 76:2006 table 2, from memory)', () => {
  test.each(STATIC_BY_ANGLE_ROWS)('angular contact %d°', (degrees, X0, Y0, X0two, Y0two) => {
    const at = (rows: 1 | 2) => known(staticForm(bearing('angular-contact', { rows, contactAngle: degrees * DEGREE })));
    expect(at(1).X0).toBe(X0);
    expect(at(1).Y0).toBeCloseTo(Y0, 9);
    expect(at(2).X0).toBe(X0two);
    expect(at(2).Y0).toBeCloseTo(Y0two, 9);
  });

  test('between the rows linear in the angle; never rising with it', () => {
    let last = Number.POSITIVE_INFINITY;
    for (let degrees = 10; degrees <= 45; degrees += 0.25) {
      const { Y0 } = known(staticForm(bearing('angular-contact', { contactAngle: degrees * DEGREE })));
      expect(Y0).toBeLessThanOrEqual(last + 1e-12);
      last = Y0;
    }
    expect(known(staticForm(bearing('angular-contact', { contactAngle: 22.5 * DEGREE }))).Y0).toBeCloseTo(0.4, 9);
  });

  test('rollers and self-aligning balls by the cotangent; two rows are one pair of one row', () => {
    const at = (rows: 1 | 2) => known(staticForm(bearing('tapered-roller', { rows, contactAngle: Math.atan(0.25) })));
    expect(at(1)).toMatchObject({ X0: 0.5, Y0: expect.closeTo(0.88, 12) });
    expect(at(2)).toMatchObject({ X0: 1, Y0: expect.closeTo(1.76, 12) });
    expect(known(staticForm(bearing('self-aligning-ball', { rows: 2, contactAngle: Math.atan(0.2) }))).Y0).toBeCloseTo(
      2.2,
      12,
    );
  });

  test('the maker’s Y0 is used, and the angle then not asked for', () => {
    expect(known(staticForm(bearing('angular-contact', { Y0: 0.31 })))).toMatchObject({ X0: 0.5, Y0: 0.31 });
    expect(known(staticForm(bearing('tapered-roller', { Y0: 0.9 }))).Y0).toBe(0.9);
  });

  test('the angle of a tapered bearing is worked back from e or Y', () => {
    expect(known(staticForm(bearing('tapered-roller', { e: 0.375 }))).Y0).toBeCloseTo(0.88, 12);
    expect(known(staticForm(bearing('tapered-roller', { Y: 1.6 }))).Y0).toBeCloseTo(0.88, 12);
  });

  test('usual least safety: balls 1, rollers 1.5', () => {
    expect(usualStaticSafety(bearing('deep-groove'))).toBe(1);
    expect(usualStaticSafety(bearing('needle'))).toBe(1.5);
  });
});

describe('limits', () => {
  test('Fa = 0 leaves the radial load, Fr = 0 the thrust', () => {
    for (const b of EVERY_KIND) {
      const form = known(staticForm(b));
      expect(staticEquivalent(form, 700, 0)).toBe(700);
      if (!form.radialOnly) expect(staticEquivalent(form, 0, 700)).toBeCloseTo(700 * form.Y0, 9);
      expect(staticEquivalent(form, 300, 500)).toBe(staticEquivalent(form, 300, -500));
    }
  });

  test('cylindrical and needle rollers carry no thrust: over, though not for rounding', () => {
    for (const kind of ['cylindrical-roller', 'needle'] as const) {
      const form = known(staticForm(bearing(kind)));
      expect(staticEquivalent(form, 500, 1)).toBe(Number.POSITIVE_INFINITY);
      expect(staticSafety(6000, staticEquivalent(form, 500, 1))).toBe(0);
      expect(staticEquivalent(form, 500, 1e-10)).toBe(500);
      expect(staticEquivalent(form, 500, Number.NaN)).toBeNaN();
    }
  });

  test('no load gives an infinite safety, no rating and no number none', () => {
    expect(staticSafety(6000, 0)).toBe(Number.POSITIVE_INFINITY);
    for (const C0 of [0, -5, Number.NaN]) expect(staticSafety(C0, 100)).toBeNaN();
    expect(staticSafety(6000, Number.NaN)).toBeNaN();
    expect(staticSafety(6000, -1)).toBeNaN();
    const form = known(staticForm(bearing('deep-groove')));
    for (const [Fr, Fa, M] of [
      [Number.NaN, 1, 0],
      [1, Number.NaN, 0],
      [-1, 0, 0],
      [1, 1, Number.NaN],
    ] as const) {
      expect(staticEquivalent(form, Fr, Fa, M)).toBeNaN();
    }
  });

  test('a moment on a bearing that carries none gives no number', () => {
    expect(staticEquivalent(known(staticForm(bearing('deep-groove'))), 100, 0, 5)).toBeNaN();
  });

  test.each([
    ['no angle', bearing('angular-contact'), 'contact-angle-missing'],
    ['no angle', bearing('four-point'), 'contact-angle-missing'],
    ['no angle, e, Y or Y0', bearing('tapered-roller'), 'contact-angle-missing'],
    ['angle too steep', bearing('angular-contact', { contactAngle: 60 * DEGREE }), 'contact-angle-range'],
    ['angle too flat', bearing('angular-contact', { contactAngle: 5 * DEGREE }), 'contact-angle-range'],
    ['angle NaN', bearing('tapered-roller', { contactAngle: Number.NaN }), 'contact-angle-range'],
    ['Y0 of nothing', bearing('deep-groove', { Y0: 0 }), 'bad-factor'],
    ['ring without sound dimensions', bearing('crossed-roller', { bore: 1 }), 'bad-dimensions'],
  ])('%s is unassessed', (_, b, reason) => {
    expect(staticForm(b)).toEqual({ unassessed: reason });
  });
});

describe(`properties (seed ${SEED})`, () => {
  const forms = EVERY_KIND.map((b) => known(staticForm(b)));
  const anyForm = () => fc.constantFrom(...forms);

  test('more load never lowers P0, nor raises a safety', () => {
    fc.assert(
      fc.property(anyForm(), load(), load(), load(), load(), (form, Fr, Fa, dr, da) => {
        const less = staticEquivalent(form, Fr, form.radialOnly ? 0 : Fa);
        const more = staticEquivalent(form, Fr + dr, form.radialOnly ? 0 : Fa + da);
        return more >= less && staticSafety(6000, more) <= staticSafety(6000, less);
      }),
      { seed: SEED, numRuns: 1000 },
    );
  });

  test('P0 is convex and in proportion to the load', () => {
    fc.assert(
      fc.property(anyForm(), fc.tuple(load(), load(), load()), fc.tuple(load(), load(), load()), (form, a, b) => {
        const value = (w: readonly number[]) =>
          staticEquivalent(form, w[0]!, form.radialOnly ? 0 : w[1]!, form.momentArm === null ? 0 : w[2]! / 100);
        const middle = a.map((x, i) => (x + b[i]!) / 2);
        const chord = (value(a) + value(b)) / 2;
        return (
          value(middle) <= chord * (1 + 1e-12) + 1e-9 &&
          Math.abs(value(a.map((x) => 3 * x)) - 3 * value(a)) <= 1e-9 * (1 + value(a))
        );
      }),
      { seed: SEED, numRuns: 1000 },
    );
  });
});
