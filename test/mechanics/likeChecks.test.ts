import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, type Form, form, formValue } from '../../src/mechanics/form.ts';
import { factorBetween, UNLIKE } from '../../src/mechanics/likeChecks.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import { randomArm } from '../randomArm.ts';

const check = (name: string, forms: readonly Form[], joint = 0): CheckForm => ({
  check: name,
  joint,
  bearing: null,
  unit: 'N',
  forms,
});

/** The form times `factor`, its two rows turned into each other by `angle`. */
function turned(f: Form, factor: number, angle: number): Form {
  const [c, s] = [factor * Math.cos(angle), factor * Math.sin(angle)];
  const P = f.P.map((v, k) => (k < 6 ? c * v - s * f.P[k + 6]! : s * f.P[k - 6]! + c * v));
  const offset = Float64Array.from([c * f.c[0]! - s * f.c[1]!, s * f.c[0]! + c * f.c[1]!]);
  return { ...f, P, c: offset, l: f.l.map((v) => factor * v), o: factor * f.o };
}

describe('checks that are one function but for a factor', () => {
  it('are known whatever the rows they are written in, and agree at every load (seeds 1–60)', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const random = seededRandom(seed);
      const row = () => Array.from({ length: 6 }, () => random.between(-2, 2));
      const f = form({ P: [row(), row()], c: [random.next(), 0.3], l: row(), o: random.next() });
      const factor = 10 ** random.between(-9, 6);
      const g = turned(f, factor, random.between(-3, 3));
      const found = factorBetween(check('b', [g]), check('a', [f]));
      expect(found).not.toBeNull();
      expect(Math.abs(found! / factor - 1)).toBeLessThan(1e-13);
      for (let draw = 0; draw < 30; draw++) {
        const w = Float64Array.from({ length: 6 }, () => random.between(-3, 3));
        const most = factor * (1 + 6 * 2 * 3 * 3);
        expect(Math.abs(formValue(g, w, 0) - found! * formValue(f, w, 0))).toBeLessThan(UNLIKE * most);
      }
    }
  });

  it('are told from others: one entry, the torque range, the joint, the number of forms, one of two factors', () => {
    const f = form({ P: [[1, 0, 0, 0, 2, 0], [0, 1, 0, -2, 0, 0.5]], c: [1, 0] }); // biome-ignore format: rows
    const a = check('a', [f]);
    expect(factorBetween(check('b', [turned(f, 3, 1)]), a)).toBeCloseTo(3, 12);
    expect(factorBetween(check('b', [{ ...f, P: f.P.with(4, 2.0000001) }]), a)).toBeNull();
    expect(factorBetween(check('b', [{ ...f, c: Float64Array.from([1, 1e-6]) }]), a)).toBeNull();
    expect(factorBetween(check('b', [{ ...f, o: 1 }]), a)).toBeNull();
    expect(factorBetween(check('b', [{ ...f, l: f.l.with(2, 0.1) }]), a)).toBeNull();
    expect(factorBetween(check('b', [{ ...f, torqueFrom: 0 }]), a)).toBeNull();
    expect(factorBetween(check('b', [f], 1), a)).toBeNull();
    expect(factorBetween(check('b', [f, f]), a)).toBeNull();
    const two = check('a', [f, turned(f, 2, 0)]);
    expect(factorBetween(check('b', [turned(f, 3, 1), turned(f, 6, 2)]), two)).toBeCloseTo(3, 12);
    expect(factorBetween(check('b', [turned(f, 3, 1), turned(f, 5, 2)]), two)).toBeNull();
  });

  it('take over value and bound of the one they go with (tip force any, tool and base, seeds 1–9)', () => {
    for (let seed = 1; seed <= 9; seed++) {
      const arm = randomArm(seed, { joints: 3, force: (['any', 'tool', 'base'] as const)[seed % 3]! });
      const chain = flattenArm(arm);
      const own = loadChecks(arm, chain).filter((one) => one.check === 'radial' && one.joint === seed % 3);
      const scaled = own.map((one) => ({
        ...one,
        check: 'scaled',
        forms: one.forms.map((f) => turned(f, 1e-6, 0.7)),
      }));
      const search = new WorstCase(chain, chain.cases[0]!, [...own, ...scaled]);
      while (search.open(0.01)) search.step(0.01);
      const rows = search.rows();
      own.forEach((_, k) => {
        const [row, follower] = [rows[k]!, rows[own.length + k]!];
        expect(follower.gap).toBeLessThanOrEqual(0.01);
        expect(Math.abs(follower.found / (1e-6 * row.found) - 1)).toBeLessThan(1e-6);
        expect(Math.abs(follower.bound / (1e-6 * row.bound) - 1)).toBeLessThan(1e-5);
      });
    }
  });
});
