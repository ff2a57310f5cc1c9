import { describe, expect, it } from 'vitest';
import type { Arm, PairSupport } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { type Chain, flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue } from '../../src/mechanics/form.ts';
import { bearingChecks } from '../../src/mechanics/loadChecks.ts';
import { poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { type CompareResult, compareArm } from '../../src/studies/compareArm.ts';
import { type ComparePlan, planCompare } from '../../src/studies/comparePlan.ts';
import type { CheckRow } from '../../src/studies/results.ts';
import { randomArm } from '../randomArm.ts';

/** Worst of each check over the poses, by plain recursion. */
function worstRows(chain: Chain, checks: readonly CheckForm[], poses: readonly (readonly number[])[]): CheckRow[] {
  const loads = new Float64Array(WRENCH * chain.n);
  const scratch = poseScratch(chain.n);
  const best = checks.map(() => ({ value: -1, pose: poses[0]! }));
  for (const pose of poses) {
    staticLoads(chain, chain.cases[0]!, pose, loads, scratch);
    checks.forEach((check, k) => {
      const value = checkValue(check, loads, WRENCH * check.joint);
      if (value > best[k]!.value) best[k] = { value, pose };
    });
  }
  return checks.map(
    (check, k): CheckRow => ({
      joint: chain.names[check.joint]!,
      jointIndex: chain.jointIndex[check.joint]!,
      bearing: check.bearing,
      check: check.check,
      unit: check.unit,
      value: best[k]!.value,
      case: chain.cases[0]!.name,
      pose: best[k]!.pose,
      free: null,
      wrench: { force: [0, 0, 0], moment: [0, 0, 0] },
      bound: null,
      gap: null,
      certified: null,
      allowable: null,
      utilisation: null,
      verdict: null,
      reason: null,
      source: null,
    }),
  );
}

function withSupport(arm: Arm, index: number, support: Partial<PairSupport>): Arm {
  const joints = arm.joints.map((joint, k) =>
    k === index ? { ...joint, support: { ...joint.support, ...support } as PairSupport } : joint,
  );
  return { ...arm, joints };
}

function plan(arm: Arm, name: string, options = {}): ComparePlan {
  const made = planCompare(arm, flattenArm(arm), name, options);
  if ('refused' in made) throw new Error(made.refused);
  return made;
}

function posesOf(chain: Chain, seed: number, count: number): number[][] {
  const random = seededRandom(seed);
  return Array.from({ length: count }, () => Array.from(chain.from, (from, i) => random.between(from, chain.to[i]!)));
}

function compared(arm: Arm, name: string, options = {}, seed = 1): CompareResult {
  const made = plan(arm, name, options);
  const chain = flattenArm(arm);
  return compareArm(made, worstRows(chain, made.checks, posesOf(chain, seed, 60)));
}

describe('compareArm', () => {
  it('equals each layout computed directly as the support of the file, at every span (seeds 1–20, with drives)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const arm = randomArm(seed, { joints: 1 + (seed % 5), drives: true });
      const chain = flattenArm(arm);
      const index = seed % arm.joints.length;
      const result = compared(arm, arm.joints[index]!.name, {}, seed);
      const poses = posesOf(chain, seed, 60);
      const layouts = [
        [result.clevis, result.clevis.rows],
        [result.cantilever, result.cantilever.rows],
      ] as const;
      for (const [layout, rows] of layouts) {
        const { stationA, stationB, span, arrangement } = layout;
        const direct = withSupport(arm, index, { arrangement, stationA, stationB, span });
        const checks = bearingChecks(index, direct.joints[index]!);
        const expected = worstRows(flattenArm(direct), checks, poses);
        for (const row of expected) {
          const mine = rows.find((r) => r.check === row.check && r.bearing === row.bearing)!;
          expect(mine.value).toBe(row.value);
          expect(mine.pose).toEqual(row.pose);
        }
      }
      for (const { span, clevis, cantilever } of result.spans) {
        if (span === result.clevis.span)
          expect(clevis.map((r) => r.value)).toEqual(result.clevis.rows.slice(0, 2).map((r) => r.value));
        const { overhang, side } = result.cantilever;
        const { hub } = result;
        const sign = side === '-' ? -1 : 1;
        const stationA = hub + sign * overhang;
        const direct = withSupport(arm, index, {
          arrangement: 'cantilever',
          span,
          stationA,
          stationB: stationA + sign * span,
        });
        const expected = worstRows(chain, bearingChecks(index, direct.joints[index]!), poses);
        expect(
          cantilever[0].value / expected.find((r) => r.check === 'radial' && r.bearing === 'A')!.value,
        ).toBeCloseTo(1, 11);
        expect(
          cantilever[1].value / expected.find((r) => r.check === 'radial' && r.bearing === 'B')!.value,
        ).toBeCloseTo(1, 11);
      }
    }
  });

  it('shows what statics says of a force in the hub plane: F/2 each on a clevis, F(1 + a/D) and F a/D on a cantilever', () => {
    const arm = hubPlaneArm();
    const force = 4 * 9.80665;
    const result = compared(arm, 'swing', { overhang: 0.03, cantileverSpan: 0.08, clevisSpan: 0.05 });
    const [a, b] = result.clevis.rows;
    expect(a!.value).toBeCloseTo(force / 2, 9);
    expect(b!.value).toBeCloseTo(force / 2, 9);
    const [near, far] = result.cantilever.rows;
    expect(near!.value).toBeCloseTo(force * (1 + 0.03 / 0.08), 9);
    expect(far!.value).toBeCloseTo((force * 0.03) / 0.08, 9);
    expect(result.ratios.at(-1)).toEqual({ check: 'radial', bearing: null, ratio: near!.value / a!.value });
    expect(result.cantilever.worst.bearing).toBe('A');
  });

  it('leaves what no layout changes the same: thrust and tilting moment', () => {
    const result = compared(randomArm(3, { joints: 3 }), 'joint 2');
    expect(result.clevis.rows.slice(2)).toEqual(result.cantilever.rows.slice(2));
    expect(result.clevis.rows.map((r) => [r.check, r.bearing])).toEqual([
      ['radial', 'A'],
      ['radial', 'B'],
      ['axial', 'A'],
      ['axial', 'B'],
      ['moment', null],
    ]);
  });

  it('shows a row that failed and makes no ratio of nothing', () => {
    const made = plan(hubPlaneArm(), 'swing', {});
    const rows = worstRows(flattenArm(hubPlaneArm()), made.checks, [[0]]);
    const broken = rows.map((row) => (row.bearing === 'B' ? { ...row, value: Number.NaN } : row));
    expect(compareArm(made, broken).clevis.worst.value).toBeNaN();
    const idle = compareArm(
      made,
      rows.map((row) => ({ ...row, value: 0 })),
    );
    expect(idle.ratios.every(({ ratio }) => ratio === null)).toBe(true);
    expect(() => compareArm(made, rows.slice(1))).toThrow(RangeError);
  });
});

describe('planCompare', () => {
  it('keeps the near bearing of a clevis where it stands when it makes the cantilever, on either side', () => {
    const arm = withSupport(hubPlaneArm(), 0, clevisOf(0.01, 0.06, 0.004));
    const minus = plan(arm, 'swing');
    expect(minus.cantilever.stationA).toBeCloseTo(minus.clevis.stationA, 15);
    expect(minus.cantilever.stationB).toBeCloseTo(minus.clevis.stationA - 0.06, 15);
    const plus = plan(arm, 'swing', { side: '+' });
    expect(plus.cantilever.stationA).toBeCloseTo(plus.clevis.stationB, 15);
    expect(plus.cantilever.stationB).toBeCloseTo(plus.clevis.stationB + 0.06, 15);
    expect(minus.assumptions.join('\n')).toContain('overhang 26 mm: the near bearing stays');
    expect(plan(arm, 'swing', { overhang: 0.02 }).assumptions.join('\n')).not.toContain('the near bearing stays');
  });

  it('takes the file as it is and stands the missing clevis on the hub plane with the same span', () => {
    const support = { ...clevisOf(0.02, 0.07, 0), arrangement: 'cantilever', overhang: 0.035, side: '+' } as const;
    const made = plan(withSupport(hubPlaneArm(), 0, { ...support, stationA: 0.055, stationB: 0.125 }), 'swing');
    expect(made.asFile).toBe('cantilever');
    expect([made.cantilever.stationA, made.cantilever.stationB]).toEqual([0.055, 0.125]);
    expect((made.clevis.stationA + made.clevis.stationB) / 2).toBeCloseTo(0.02, 15);
    expect(made.clevis.span).toBe(0.07);
  });

  it('keeps the offset in proportion to the span, so that the hub stays between the bearings', () => {
    const made = plan(withSupport(hubPlaneArm(), 0, clevisOf(0, 0.06, 0.02)), 'swing', { clevisSpan: 0.03 });
    expect(made.clevis.offset).toBeCloseTo(0.01, 15);
    for (const { clevis } of made.spans) {
      expect(clevis.stationA).toBeLessThan(0);
      expect(clevis.stationB).toBeGreaterThan(0);
    }
    expect(made.spans.map((row) => row.span)).toContain(0.03);
    expect([...made.spans].sort((x, y) => x.span - y.span)).toEqual(made.spans);
  });

  it('refuses what cannot be compared, with the reason', () => {
    const arm = hubPlaneArm();
    const chain = flattenArm(arm);
    const reason = (of: Arm, name: string, options = {}) => {
      const made = planCompare(of, chain, name, options);
      return 'refused' in made ? made.refused : '';
    };
    expect(reason(arm, 'elbow')).toContain('there is no joint "elbow"; the joints are "swing"');
    expect(reason(arm, 'swing', { clevisSpan: 0 })).toContain('span must be above 0');
    expect(reason(arm, 'swing', { overhang: -1 })).toContain('overhang must be 0 or more');
    expect(reason(arm, 'swing', { spans: [Number.NaN] })).toContain('span must be above 0');
    const bare = { ...arm, joints: arm.joints.map((joint) => ({ ...joint, support: null })) };
    expect(reason(bare, 'swing')).toContain('no support');
    const ring = { arrangement: 'ring', hub: 0, station: 0, bearing: null, shaft: null } as const;
    expect(reason({ ...arm, joints: arm.joints.map((joint) => ({ ...joint, support: ring })) }, 'swing')).toContain(
      'ring',
    );
  });
});

function clevisOf(hub: number, span: number, offset: number): PairSupport {
  const stationA = hub - span / 2 + offset;
  return {
    arrangement: 'clevis',
    hub,
    span,
    offset,
    overhang: 0,
    side: '-',
    stationA,
    stationB: stationA + span,
    thrust: 'A',
    adjusted: null,
    bearingA: null,
    bearingB: null,
    shaft: null,
  };
}

/** One horizontal axis with 4 kg in the hub plane: no couple on the pair in any pose. */
function hubPlaneArm(): Arm {
  const arm = randomArm(1, { joints: 1, payload: false });
  const joint = arm.joints[0]!;
  return {
    ...arm,
    gravity: [0, 0, -9.80665],
    cases: [{ name: 'own weight', payload: null, tipForce: null, motion: null, factor: 1 }],
    joints: [
      {
        ...joint,
        name: 'swing',
        axis: [0, 1, 0],
        placement: { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
        travel: { from: -1, to: 1, full: false },
        link: { name: 'lever', mass: 4, centre: [0.3, 0, 0.1], inertia: null },
        support: clevisOf(0, 0.06, 0),
        drive: null,
      },
    ],
  };
}
