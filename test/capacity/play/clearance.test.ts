import { describe, expect, it } from 'vitest';
import type { PlainBushing, RollingBearing } from '../../../src/arm/arm.ts';
import {
  INTERFERENCE_SHARE,
  interference,
  internalClearance,
  ringDeviation,
  seatDeviation,
  workingClearance,
} from '../../../src/capacity/play/index.ts';
import type { Assessed, Range } from '../../../src/capacity/rule.ts';

const MICRON = 1e-6;
const BEARING: RollingBearing = {
  kind: 'deep-groove',
  bore: 0.02,
  outer: 0.042,
  width: 0.012,
  C: null,
  C0: null,
  contactAngle: null,
  e: null,
  Y: null,
  Y0: null,
  f0: null,
  pitchDiameter: null,
  ballDiameter: null,
  balls: null,
  rows: 1,
  clearance: 'CN',
  shaftFit: null,
  housingFit: null,
  misalignment: null,
  stiffness: null,
  source: null,
};
const BUSHING: PlainBushing = {
  kind: 'plain-bushing',
  bore: 0.02,
  outer: 0.026,
  width: 0.02,
  pressureLimit: null,
  speedLimit: null,
  pvLimit: null,
  flangeOuter: null,
  wearFactor: null,
  wearDepth: null,
  clearance: 4e-5,
  stiffness: null,
  source: null,
};

/** Limits in µm, rounded from metres; the reason where there are none. */
function microns(result: Assessed<Range>): [number, number] | string {
  if ('unassessed' in result) return result.unassessed;
  const round = (x: number) => Math.round(x / MICRON / 0.001) * 0.001 + 0;
  return [round(result.value.from), round(result.value.to)];
}

const zone = (code: string, mm: number, seat: 'shaft' | 'hole') => microns(seatDeviation(code, mm / 1e3, seat));

describe('ISO 286 zones', () => {
  it.each([
    ['h6', 20, [-13, 0]],
    ['h7', 60, [-30, 0]],
    ['m6', 20, [8, 21]],
    ['m6', 40, [9, 25]],
    ['n6', 15, [12, 23]],
    ['p6', 25, [22, 35]],
    ['js6', 20, [-6.5, 6.5]],
  ])('shaft %s of %i mm (IT6 to IT8, m, n, p verified)', (code, mm, limits) => {
    expect(zone(code, mm, 'shaft')).toEqual(limits);
  });

  it.each([
    ['k5', 20, [2, 11]],
    ['k6', 12, [1, 12]],
    ['j6', 30, [-4, 9]],
    ['j5', 10, [-2, 4]],
    ['g6', 20, [-20, -7]],
    ['f7', 20, [-41, -20]],
    ['k8', 20, [0, 33]],
  ])('shaft %s of %i mm (from memory)', (code, mm, limits) => {
    expect(zone(code, mm, 'shaft')).toEqual(limits);
  });

  it.each([
    ['H7', 42, [0, 25]],
    ['JS7', 20, [-10.5, 10.5]],
    ['J7', 20, [-9, 12]],
    ['K7', 20, [-15, 6]],
    ['M7', 20, [-21, 0]],
    ['N7', 20, [-28, -7]],
    ['P7', 20, [-35, -14]],
    ['P8', 20, [-55, -22]],
    ['G7', 20, [7, 28]],
    ['F8', 20, [20, 53]],
    ['N7', 3, [-14, -4]],
  ])('hole %s of %i mm (from memory)', (code, mm, limits) => {
    expect(zone(code, mm, 'hole')).toEqual(limits);
  });

  // Second route: the formulas of ISO 286-1 (from memory) at the geometric mean D of a step, i = 0.45 D^(1/3) + 0.001 D µm.
  const steps = [
    [1, 3],
    [3, 6],
    [6, 10],
    [10, 18],
    [18, 30],
    [30, 50],
    [50, 80],
    [80, 120],
    [120, 180],
  ] as const;
  it.each(steps)('table against formula, over %i to %i mm', (over, incl) => {
    // the standard departs most from its formulas, by about 2 µm, in the smallest step
    const D = Math.sqrt(over * incl);
    const coarse = over === 1 ? 2.1 : 0;
    const unit = 0.45 * Math.cbrt(D) + 0.001 * D;
    const limits = (code: string, seat: 'shaft' | 'hole' = 'shaft') => {
      const result = zone(code, incl, seat);
      if (typeof result === 'string') throw new Error(result);
      return result;
    };
    const within = (value: number, formula: number, rounding: number) =>
      expect(Math.abs(value - formula)).toBeLessThanOrEqual(rounding);
    [7, 10, 16, 25].forEach((factor, i) => {
      const width = -limits(`h${5 + i}`)[0];
      // the standard rounds the smallest step up to a series of its own (4, 6, 10, 14)
      within(width, factor * unit, over === 1 ? 1.4 : 0.5 + 0.05 * factor * unit);
    });
    within(-limits('f7')[1], 5.5 * D ** 0.41, Math.max(1, coarse));
    within(-limits('g6')[1], 2.5 * D ** 0.34, Math.max(1, coarse));
    within(limits('k6')[0], 0.6 * Math.cbrt(D), Math.max(1.1, coarse));
    within(limits('n6')[0], 5 * D ** 0.34, Math.max(2, coarse));
    // m: the step from IT6 to IT7; p: IT7 and up to 5 µm more
    within(limits('m6')[0], limits('h6')[0] - limits('h7')[0], Math.max(2, coarse));
    const p = limits('p6')[0] + limits('h7')[0];
    expect(p).toBeGreaterThanOrEqual(over === 1 ? -4 : 0);
    expect(p).toBeLessThanOrEqual(5);
    for (const [code, like] of [
      ['j5', 'h5'],
      ['j6', 'h6'],
    ] as const) {
      expect(limits(code)[1] - limits(code)[0]).toBe(-limits(like)[0]);
    }
    for (const grade of [6, 7]) {
      expect(limits(`J${grade}`, 'hole')[1] - limits(`J${grade}`, 'hole')[0]).toBe(limits(`H${grade}`, 'hole')[1]);
    }
    // The rule of K to N: a hole n in grade 7 fits a shaft in grade 6 as tightly as N7 fits h6 (basic hole = basic shaft).
    for (const [hole, shaft] of [
      ['K7', 'k6'],
      ['M7', 'm6'],
      ['N7', 'n6'],
      ['P7', 'p6'],
    ] as const) {
      if (over === 1) continue;
      const byShaft = limits(shaft)[1];
      const byHole = -limits(hole, 'hole')[0];
      expect(byHole).toBe(byShaft);
    }
  });

  it.each([
    ['k5', 'hole'],
    ['H7', 'shaft'],
    ['j7', 'shaft'],
    ['J8', 'hole'],
    ['K5', 'hole'],
    ['r6', 'shaft'],
    ['h9', 'shaft'],
    ['h4', 'shaft'],
    ['', 'shaft'],
    ['7', 'shaft'],
    ['h', 'shaft'],
    ['h6h6', 'shaft'],
  ] as const)('“%s” of a %s is not covered', (code, seat) => {
    expect(seatDeviation(code, 0.02, seat)).toHaveProperty('unassessed');
  });

  it.each([0, -0.01, 0.2, Number.NaN])('no zone for a size of %f m', (size) => {
    expect(seatDeviation('h6', size, 'shaft')).toHaveProperty('unassessed');
  });
});

describe('clearance before fitting', () => {
  const clearance = (change: Partial<RollingBearing>, adjusted = false) =>
    microns(internalClearance({ ...BEARING, ...change }, adjusted));

  it('ISO 5753-1 groups by bore (from memory)', () => {
    expect(clearance({})).toEqual([5, 20]);
    expect(clearance({ clearance: 'C3' })).toEqual([13, 28]);
    expect(clearance({ bore: 0.01 })).toEqual([2, 13]);
    expect(clearance({ bore: 0.012, clearance: 'C4' })).toEqual([18, 33]);
    expect(clearance({ clearance: 'C5' })).toEqual([28, 48]);
    expect(clearance({ kind: 'cylindrical-roller', bore: 0.025 })).toEqual([20, 45]);
    expect(clearance({ kind: 'needle', bore: 0.025, clearance: 'C5' })).toEqual([70, 95]);
  });

  it('groups rise at every bore and kind, and limits do not fall with the bore', () => {
    for (const kind of ['deep-groove', 'cylindrical-roller'] as const) {
      for (const [k, group] of (['C2', 'CN', 'C3', 'C4', 'C5'] as const).entries()) {
        let last: readonly [number, number] = [-1, -1];
        for (const mm of [11, 12, 15, 17, 20, 25, 30, 35, 40, 45, 50, 55, 60]) {
          const here = clearance({ kind, bore: mm / 1e3, clearance: group });
          if (typeof here === 'string') throw new Error(here);
          expect(here[0]).toBeGreaterThanOrEqual(last[0]);
          expect(here[1]).toBeGreaterThanOrEqual(last[1]);
          last = here;
          const next = (['CN', 'C3', 'C4', 'C5', 'C5'] as const)[k]!;
          const higher = clearance({ kind, bore: mm / 1e3, clearance: next });
          if (typeof higher === 'string') throw new Error(higher);
          expect(higher[0]).toBeGreaterThanOrEqual(here[0]);
          expect(higher[1]).toBeGreaterThanOrEqual(here[1]);
          // Groups overlap: no clearance between the least of one and the most of the next is left out.
          expect(higher[0]).toBeLessThanOrEqual(here[1]);
        }
      }
    }
  });

  it('as measured; none in an adjusted pair; a bushing has its own', () => {
    expect(clearance({ clearance: { from: 3e-6, to: 7e-6 } })).toEqual([3, 7]);
    expect(clearance({ kind: 'angular-contact' }, true)).toEqual([0, 0]);
    expect(clearance({ kind: 'angular-contact', clearance: { from: 1e-6, to: 2e-6 } }, true)).toEqual([1, 2]);
    expect(microns(internalClearance(BUSHING, false))).toEqual([40, 40]);
  });

  it('what is not known says what to fill in', () => {
    for (const change of [
      { kind: 'angular-contact' },
      { kind: 'self-aligning-ball' },
      { clearance: 'C5', bore: 0.005 },
      { bore: 0.07 },
      { bore: 0.002 },
      { bore: Number.NaN },
      { kind: 'needle', bore: 0.008 },
      { clearance: { from: 2e-6, to: 1e-6 } },
      { clearance: { from: Number.NaN, to: 1e-6 } },
    ] as const) {
      expect(internalClearance({ ...BEARING, ...change }, false)).toHaveProperty('unassessed');
    }
    expect(internalClearance({ ...BUSHING, clearance: null }, false)).toHaveProperty('unassessed');
    expect(internalClearance({ ...BUSHING, clearance: -1e-6 }, false)).toHaveProperty('unassessed');
  });
});

describe('working clearance', () => {
  const working = (change: Partial<RollingBearing>, adjusted = false) => {
    const result = workingClearance({ ...BEARING, ...change }, adjusted);
    if ('unassessed' in result) throw new Error(result.unassessed);
    return result.value;
  };

  it('20 mm bore CN, k5 and H7, worked by hand', () => {
    // Shaft k5 +2..+11, bore -10..0: interference 2 to 21 µm. Housing H7 of 42 mm 0..25, ring -11..0: -36 to 0 µm.
    const fitted = { shaftFit: 'k5', housingFit: 'H7' };
    const shaft = interference({ ...BEARING, ...fitted }, 'shaft');
    const housing = interference({ ...BEARING, ...fitted }, 'housing');
    expect(shaft && microns(shaft)).toEqual([2, 21]);
    expect(housing && microns(housing)).toEqual([-36, 0]);
    const { play, fitted: races, preloaded, fitsNotGiven } = working(fitted);
    // 5 - 0.9·21 = -13.9; 20 - 0.7·2 = 18.6; the loose outer ring adds 0 to 36.
    expect(races.from / MICRON).toBeCloseTo(-13.9, 9);
    expect(races.to / MICRON).toBeCloseTo(18.6, 9);
    expect(play.from).toBe(0);
    expect(play.to / MICRON).toBeCloseTo(54.6, 9);
    expect(preloaded).toBe('possibly');
    expect(fitsNotGiven).toEqual([]);
  });

  it('no fit given: the clearance of the loose bearing, and said so', () => {
    const { play, fitsNotGiven, preloaded } = working({});
    expect(microns({ value: play })).toEqual([5, 20]);
    expect(fitsNotGiven).toEqual(['shaft', 'housing']);
    expect(preloaded).toBe('never');
  });

  it('a tighter fit never raises the clearance between the raceways; a very tight one preloads it always', () => {
    const order = ['f7', 'g6', 'h6', 'js6', 'k6', 'm6', 'n6', 'p6'];
    let last = { from: Number.POSITIVE_INFINITY, to: Number.POSITIVE_INFINITY };
    for (const shaftFit of order) {
      const { fitted } = working({ shaftFit });
      expect(fitted.from).toBeLessThanOrEqual(last.from);
      expect(fitted.to).toBeLessThanOrEqual(last.to);
      last = fitted;
    }
    expect(working({ shaftFit: 'p6', clearance: 'C2' }).preloaded).toBe('always');
    expect(working({ shaftFit: 'p6', clearance: 'C2' }).play).toEqual({ from: 0, to: 0 });
    expect(INTERFERENCE_SHARE.from).toBeLessThan(INTERFERENCE_SHARE.to);
  });

  it('an adjusted pair has no play whatever its fits; a bushing keeps its own', () => {
    expect(working({ kind: 'angular-contact', shaftFit: 'k5' }, true).play).toEqual({ from: 0, to: 0 });
    const bushing = workingClearance(BUSHING, false);
    expect('value' in bushing && bushing.value.play).toEqual({ from: 4e-5, to: 4e-5 });
  });

  it('unassessed where the group, a fit or the ring tolerance is not known', () => {
    const changes = [
      { clearance: 'C5', bore: 0.005 },
      { shaftFit: 'r6' },
      { housingFit: 'k5' },
      { bore: 0.09, clearance: { from: 0, to: 1e-5 }, shaftFit: 'k5' },
    ] as const;
    for (const change of changes) {
      expect(workingClearance({ ...BEARING, ...change }, false)).toHaveProperty('unassessed');
    }
    expect(ringDeviation(0.2, 'outside')).toHaveProperty('unassessed');
    expect(microns(ringDeviation(0.02, 'bore'))).toEqual([-10, 0]);
    expect(microns(ringDeviation(0.03, 'bore'))).toEqual([-10, 0]);
    expect(microns(ringDeviation(0.0301, 'bore'))).toEqual([-12, 0]);
  });
});
