/** The list of checks: complete, named once, honest about what is missing; and what must never rise or fall. */
import { describe, expect, it } from 'vitest';
import type { BearingFile } from '../../../src/arm/armFile.ts';
import { capacityChecks, capacityForms, targetsOf } from '../../../src/capacity/index.ts';
import { seededRandom } from '../../../src/math/random.ts';
import { flattenArm } from '../../../src/mechanics/chain.ts';
import { wholeFile } from '../../arm/wholeFile.ts';
import { armOf, at, CLEVIS, GROOVE, listed, oneJoint } from './oneJoint.ts';

const SIZE = { bore_mm: 20, outer_mm: 42, width_mm: 12 } as const;
const ANGULAR: BearingFile = { kind: 'angular-contact', ...SIZE, contact_angle_deg: 25, C0_N: 6000 };

describe('the list of capacity checks', () => {
  const arm = armOf(wholeFile());
  const checks = capacityChecks(arm, flattenArm(arm));

  it('names each check once a joint and bearing, with a rule that tells formula, source, units and range', () => {
    const keys = checks.map((check) => `${check.jointIndex} ${check.bearing} ${check.check}`);
    expect(new Set(keys).size).toBe(keys.length);
    for (const { rule } of checks) {
      for (const part of [rule.name, rule.formula, rule.source, rule.units, rule.range])
        expect(part.length).toBeGreaterThan(0);
    }
  });

  it('covers pair, adjusted pair, bushing, ring and every shaft of a file that has all of them', () => {
    const keys = new Set(checks.map((check) => `${check.jointIndex} ${check.bearing ?? 'shaft'} ${check.check}`));
    const pair = ['A static', 'B static', 'A slope', 'B slope', 'A equivalent', 'B equivalent', 'shaft stress'];
    for (const name of pair) expect(keys).toContain(`0 ${name}`);
    for (const name of ['A static', 'A slope', 'B pressure', 'B slope', 'shaft stress'])
      expect(keys).toContain(`1 ${name}`);
    for (const name of ['ring static', 'shaft stress']) expect(keys).toContain(`2 ${name}`);
  });

  it('has for every check an allowable with its source, or a reason, or nothing to hold it against', () => {
    for (const check of checks) {
      if (check.unassessed !== null) expect(check.allowable).toBeNull();
      else if (check.allowable !== null) {
        expect(check.allowable).toBeGreaterThan(0);
        expect(check.source!.length).toBeGreaterThan(10);
      } else expect(['equivalent', 'deflection']).toContain(check.check);
    }
    expect(checks.filter((check) => check.allowable !== null).length).toBeGreaterThan(6);
  });

  it('hands out a form for each convex check, under the same name', () => {
    const forms = capacityForms(checks);
    expect(forms.length).toBe(checks.filter((check) => check.form).length);
    expect(forms.every((one) => one.forms.length > 0)).toBe(true);
  });

  it('is NaN, never a number, at a load that is none', () => {
    for (const check of checks) {
      if (!check.form && !check.atPose) continue;
      const wrench = [Number.NaN, Number.NaN, Number.NaN, Number.NaN, Number.NaN, Number.NaN];
      expect(at(check, wrench).demand, `${check.bearing} ${check.check}`).toBeNaN();
    }
  });
});

describe('what is missing', () => {
  it.each([
    ['no support', {}, 'support', null, 'fill in `support`'],
    ['no bearing named', { support: { ...CLEVIS, bearings: undefined } }, 'static', 'A', 'fill in a name'],
    ['no shaft', { support: { ...CLEVIS, shaft: undefined } }, 'stress', null, 'fill in `shaft`'],
    ['no shaft, slope', { support: { ...CLEVIS, shaft: undefined } }, 'slope', 'B', 'fill in `shaft`'],
    ['no material', { support: { ...CLEVIS, shaft: { diameter_mm: 20 } } }, 'stress', null, 'fill in `material`'],
    [
      'an unknown material',
      { support: { ...CLEVIS, shaft: { diameter_mm: 20, material: 'oak' } } },
      'stress',
      null,
      'not in the table',
    ],
    [
      'no partner',
      { support: CLEVIS, bearings: { left: ANGULAR, right: GROOVE } },
      'static',
      'A',
      'fill in `adjusted`',
    ],
    [
      'no contact angle',
      { support: CLEVIS, bearings: { left: { kind: 'four-point', ...SIZE, C0_N: 9000 }, right: GROOVE } },
      'static',
      'A',
      'fill in the contact angle',
    ],
  ] as const)('%s: the check stays, unassessed, and says what to fill in', (_, parts, check, bearing, words) => {
    const support = 'support' in parts ? JSON.parse(JSON.stringify(parts.support)) : undefined;
    const bearings = 'bearings' in parts ? parts.bearings : undefined;
    const found = listed(oneJoint({ ...(support ? { support } : {}), ...(bearings ? { bearings } : {}) })).of(
      check,
      bearing,
    );
    expect(found.unassessed).toContain(words);
    expect(found.allowable).toBeNull();
  });

  it('a bearing named but not in the table', () => {
    const found = listed(oneJoint({ support: CLEVIS, bearings: { left: GROOVE } })).of('static', 'B');
    expect(found.unassessed).toContain('“right” is not in the table');
  });

  it('pressure centres that meet are refused, not divided by', () => {
    const support = { ...CLEVIS, span_mm: 12, thrust: 'both', adjusted: 'face-to-face' } as const;
    const steep: BearingFile = { ...ANGULAR, contact_angle_deg: 40 };
    const { of } = listed(oneJoint({ support, bearings: { left: steep, right: steep } }));
    expect(of('static', 'A').unassessed).toContain('pressure centres');
  });

  it('an estimated rating is labelled where its verdict is explained', () => {
    const bare: BearingFile = { kind: 'deep-groove', ...SIZE };
    const check = listed(oneJoint({ support: CLEVIS, bearings: { left: bare, right: bare } })).of('static', 'A');
    expect(check.allowable).toBeGreaterThan(1000);
    expect(check.source).toContain('replace by the maker’s rating');
  });
});

describe('monotonicity, 100 random loads, seed 31', () => {
  const random = seededRandom(31);
  const loads = Array.from({ length: 100 }, () => [
    ...random.direction().map((v) => 900 * v),
    ...random.direction().map((v) => 70 * v),
  ]);

  it('more load never lowers a demand', () => {
    const arm = armOf(wholeFile());
    const checks = capacityChecks(arm, flattenArm(arm)).filter((check) => check.form || check.atPose);
    for (const w of loads) {
      for (const check of checks) {
        let last = 0;
        for (const scale of [0, 0.3, 1, 1.7, 4]) {
          const { demand } = at(
            check,
            w.map((v) => scale * v),
          );
          // A belt's pretension may ease a bearing that a small torque loads the other way; nothing else eases.
          const eased = arm.joints[check.jointIndex]!.drive?.kind === 'belt';
          if (!eased) expect(demand).toBeGreaterThanOrEqual(last * (1 - 1e-12));
          last = demand;
        }
      }
    }
  });

  it('a larger C0 never lowers a safety, and changes nothing else', () => {
    const rated = (C0_N: number) =>
      listed(oneJoint({ support: CLEVIS, bearings: { left: { ...GROOVE, C0_N }, right: GROOVE } })).of('static', 'A');
    const rising = [1000, 2400, 2401, 9000].map(rated);
    for (const w of loads) {
      const use = rising.map((check) => at(check, w).demand / check.allowable!);
      for (let k = 1; k < use.length; k++) expect(use[k]!).toBeLessThan(use[k - 1]!);
      for (const check of rising) expect(at(check, w).demand).toBe(at(rising[0]!, w).demand);
    }
  });

  it('more span never raises what a pure couple puts on a bearing', () => {
    const spans = [20, 40, 41, 80, 200].map((span_mm) => listed(oneJoint({ support: { ...CLEVIS, span_mm } })));
    for (const w of loads) {
      const couple = [0, 0, 0, w[3]!, w[4]!, 0];
      for (const side of ['A', 'B'] as const) {
        const demands = spans.map(({ of }) => at(of('static', side), couple).demand);
        for (let k = 1; k < demands.length; k++) expect(demands[k]!).toBeLessThan(demands[k - 1]!);
      }
    }
  });

  it('a thicker shaft is never stressed, sloped or bent more', () => {
    const shafts = [12, 16, 16.5, 30].map((diameter_mm) =>
      listed(oneJoint({ support: { ...CLEVIS, shaft: { ...CLEVIS.shaft, diameter_mm } } })),
    );
    for (const w of loads) {
      for (const [check, bearing] of [
        ['stress', null],
        ['slope', 'A'],
        ['slope', 'B'],
        ['deflection', null],
      ] as const) {
        const demands = shafts.map(({ of }) => at(of(check, bearing), w).demand);
        for (let k = 1; k < demands.length; k++) expect(demands[k]!).toBeLessThan(demands[k - 1]!);
      }
    }
  });
});

describe('targets', () => {
  it('are those of the file where it gives them, else defaults that say so', () => {
    const bare = targetsOf(oneJoint({ support: CLEVIS }));
    expect(bare.staticSafetyBall).toMatchObject({ value: 1.5, given: false });
    expect(bare.staticSafetyRoller).toMatchObject({ value: 2.25, given: false });
    expect(bare.staticSafetyBall.source).toContain('starts and stops');
    expect(bare.life).toMatchObject({ value: 20000 * 3600, given: false });
    for (const target of Object.values(bare)) {
      expect(target.given).toBe(false);
      expect(target.source.length).toBeGreaterThan(10);
    }
    // What depends on material or task has no default that would fit every arm.
    for (const open of [bare.slope, bare.tipError, bare.pressure, bare.pv]) expect(open.value).toBeNull();
    const given = targetsOf(armOf(wholeFile()));
    expect(given.staticSafetyRoller).toEqual({ value: 1.5, given: true, source: 'arm file' });
    expect(given.tipError).toMatchObject({ value: 0.0005, given: true });
    // A rating life of 95 % asks no less of a shaft than is usual.
    expect(given.shaftReliability).toMatchObject({ value: 0.99, given: false });
  });

  it('are the guide values by kind where a case holds starts and stops', () => {
    const moving = oneJoint({
      support: CLEVIS,
      link: { name: 'swing', mass_kg: 10, centre_mm: [100, 0, 0], inertia_kg_m2: { xx: 0.1, yy: 0.1, zz: 0.1 } },
      cases: [{ name: 'stop', motion: { speed_deg_s: [90], accel_deg_s2: [400] } }],
    });
    expect(targetsOf(moving).staticSafetyBall.value).toBe(1);
    expect(targetsOf(moving).staticSafetyRoller.value).toBe(1.5);
  });
});
