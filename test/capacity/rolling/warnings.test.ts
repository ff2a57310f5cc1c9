import { describe, expect, test } from 'vitest';
import {
  ADJUSTED_PAIR_RULE,
  CONTACT_ANGLE_RULE,
  carriesThrust,
  contactAngle,
  DUTY_LOAD_RULE,
  DYNAMIC_EQUIVALENT_RULE,
  DYNAMIC_FACTOR_RULE,
  isRing,
  LIFE_RULE,
  MINIMUM_LOAD_RULE,
  MISALIGNMENT,
  MISALIGNMENT_RULE,
  minimumLoad,
  minimumLoadNotes,
  misalignmentLimit,
  needsPartner,
  OSCILLATION_RULE,
  pitchDiameter,
  RATING_ESTIMATE_RULE,
  RELIABILITY_RULE,
  STATIC_EQUIVALENT_RULE,
  STATIC_FACTOR_RULE,
  SYSTEM_LIFE_RULE,
  sentence,
} from '../../../src/capacity/rolling/index.ts';
import { bearing, DEGREE, EVERY_KIND, known } from './bearings.ts';

describe('minimum load (common practice)', () => {
  test('0.01 C of balls, 0.02 C of rollers', () => {
    expect(minimumLoad(bearing('deep-groove'), 12000)).toBe(120);
    expect(minimumLoad(bearing('needle'), 12000)).toBe(240);
    expect(minimumLoadNotes(bearing('deep-groove'), 12000, 119)).toEqual(['load-below-minimum']);
    expect(minimumLoadNotes(bearing('deep-groove'), 12000, 120)).toEqual([]);
    expect(minimumLoad(bearing('needle'), 0)).toBeNaN();
  });
});

describe('misalignment', () => {
  // Shigley 9th ed. table 7-2, p. 379 (verified): ranges of slope, rad.
  test.each([
    ['tapered-roller', 0.0005, 0.0012],
    ['cylindrical-roller', 0.0008, 0.0012],
    ['deep-groove', 0.001, 0.003],
    ['self-aligning-ball', 0.026, 0.052],
  ] as const)('%s', (kind, usual, most) => {
    expect(MISALIGNMENT[kind]).toMatchObject({ usual, most, trust: 'verified' });
    expect(known(misalignmentLimit(bearing(kind)))).toBe(usual);
  });

  test('angular contact and needle: one arc minute (common practice)', () => {
    for (const kind of ['angular-contact', 'needle'] as const) {
      expect(known(misalignmentLimit(bearing(kind)))).toBeCloseTo(0.00029089, 8);
    }
  });

  test('the maker’s limit goes first; rings and nonsense are unassessed', () => {
    expect(known(misalignmentLimit(bearing('crossed-roller', { misalignment: 0.0002 })))).toBe(0.0002);
    expect(misalignmentLimit(bearing('crossed-roller'))).toEqual({ unassessed: 'no-misalignment-figure' });
    for (const x of [0, -1, Number.NaN]) {
      expect(misalignmentLimit(bearing('deep-groove', { misalignment: x }))).toEqual({
        unassessed: 'no-misalignment-figure',
      });
    }
  });
});

describe('what the kind tells', () => {
  test('rings carry moments, cylinders no thrust, single inclined rows want a partner', () => {
    expect(EVERY_KIND.filter((b) => isRing(b.kind)).map((b) => b.kind)).toEqual(['crossed-roller', 'four-point']);
    expect(EVERY_KIND.filter((b) => !carriesThrust(b.kind)).map((b) => b.kind)).toEqual([
      'cylindrical-roller',
      'needle',
    ]);
    expect(needsPartner(bearing('angular-contact'))).toBe(true);
    expect(needsPartner(bearing('angular-contact', { rows: 2 }))).toBe(false);
    expect(needsPartner(bearing('deep-groove'))).toBe(false);
  });

  test('contact angles', () => {
    expect(contactAngle(bearing('crossed-roller'))).toEqual({
      value: expect.closeTo(Math.PI / 4, 12),
      notes: ['contact-angle-usual'],
    });
    expect(contactAngle(bearing('deep-groove', { contactAngle: 20 * DEGREE }))).toEqual({ value: 0, notes: [] });
    expect(contactAngle(bearing('tapered-roller', { e: 0.375 }))).toEqual({
      value: expect.closeTo(Math.atan(0.25), 12),
      notes: ['contact-angle-from-factors'],
    });
    expect(contactAngle(bearing('self-aligning-ball', { rows: 2, Y0: 2.2 }))).toHaveProperty(
      'value',
      expect.closeTo(Math.atan(0.2), 12),
    );
    expect(contactAngle(bearing('tapered-roller', { Y: 0.1 }))).toEqual({ unassessed: 'contact-angle-range' });
    expect(contactAngle(bearing('tapered-roller', { e: -1 }))).toEqual({ unassessed: 'bad-factor' });
  });

  test('pitch diameter: given, or the mean', () => {
    expect(pitchDiameter(bearing('deep-groove'))).toEqual({ value: 0.0335, notes: ['pitch-diameter-mean'] });
    expect(pitchDiameter(bearing('deep-groove', { pitchDiameter: 0.033 }))).toEqual({ value: 0.033, notes: [] });
  });
});

test('every rule states its formula, source, units and range', () => {
  const rules = [
    ADJUSTED_PAIR_RULE,
    CONTACT_ANGLE_RULE,
    DUTY_LOAD_RULE,
    DYNAMIC_EQUIVALENT_RULE,
    DYNAMIC_FACTOR_RULE,
    LIFE_RULE,
    MINIMUM_LOAD_RULE,
    MISALIGNMENT_RULE,
    OSCILLATION_RULE,
    RATING_ESTIMATE_RULE,
    RELIABILITY_RULE,
    STATIC_EQUIVALENT_RULE,
    STATIC_FACTOR_RULE,
    SYSTEM_LIFE_RULE,
  ];
  expect(new Set(rules.map((rule) => rule.name)).size).toBe(rules.length);
  for (const rule of rules) for (const text of Object.values(rule)) expect(text.length).toBeGreaterThan(0);
});

test('reasons and notes have words', () => {
  expect(sentence('contact-angle-missing')).toMatch(/contact angle/);
  expect(sentence('C-estimated')).toMatch(/estimated, replace by the maker/);
});
