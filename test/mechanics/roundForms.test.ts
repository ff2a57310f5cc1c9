import { describe, expect, it } from 'vitest';
import { type Random, seededRandom } from '../../src/math/random.ts';
import { type Form, form, formHolds, formValue } from '../../src/mechanics/form.ts';
import { allRound, roundForms, sameAllRound } from '../../src/mechanics/roundForms.ts';

/** A form as gears and belts make it: bending that turns with the load, with a part of force and torque along the axis and a constant that do not. */
function gearForm(random: Random, rows: 2 | 3, torque: readonly [number, number]): Form {
  const draw = () => random.between(-2, 2);
  const [a, b, d, e] = [draw(), draw(), draw(), draw()];
  const P = [
    [a, b, draw(), d, e, draw()],
    [-b, a, draw(), -e, d, draw()],
    [0, 0, draw(), 0, 0, draw()],
  ].slice(0, rows);
  const c = [draw(), draw(), draw()].slice(0, rows);
  return form({ P, c, l: [0, 0, draw(), 0, 0, draw()], o: draw(), torque });
}

const RANGES = [
  [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
  [0.7, Number.POSITIVE_INFINITY],
  [Number.NEGATIVE_INFINITY, -0.7],
  [-0.7, 0.7],
] as const;

const mostOf = (forms: readonly Form[], w: Float64Array) => Math.max(...forms.map((f) => formValue(f, w, 0)));

function turned(w: Float64Array, angle: number): Float64Array {
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const out = w.slice();
  for (const k of [0, 3]) {
    out[k] = c * w[k]! - s * w[k + 1]!;
    out[k + 1] = s * w[k]! + c * w[k + 1]!;
  }
  return out;
}

describe('forms that are the same all round', () => {
  it('lie nowhere below the form within its torque range, and keep their value as the load turns (seeds 1–80)', () => {
    let held = 0;
    for (let seed = 1; seed <= 80; seed++) {
      const random = seededRandom(seed);
      const f = gearForm(random, seed % 2 ? 2 : 3, RANGES[seed % 4]!);
      const round = allRound([f])!;
      expect(round.every(sameAllRound)).toBe(true);
      for (let draw = 0; draw < 50; draw++) {
        const w = Float64Array.from({ length: 6 }, () => random.between(-3, 3));
        expect(mostOf(round, turned(w, random.between(-4, 4)))).toBeCloseTo(mostOf(round, w), 9);
        if (!formHolds(f, w, 0)) continue;
        held++;
        expect(mostOf(round, w)).toBeGreaterThanOrEqual(formValue(f, w, 0) - 1e-12);
      }
    }
    expect(held).toBeGreaterThan(1000);
  });

  it('are met where one thing alone is added across the axis, if the load can turn right round (two rows, seeds 1–40)', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const random = seededRandom(seed);
      const made = gearForm(random, 2, RANGES[0]);
      // torque alone, or the constant alone
      const P = made.P.map((v, k) => (k % 6 === 2 || (seed % 2 === 0 && k % 6 === 5) ? 0 : v));
      const f: Form = { ...made, P, c: seed % 2 === 0 ? made.c : new Float64Array(2) };
      const round = allRound([f])!;
      const w = Float64Array.from({ length: 6 }, () => random.between(-3, 3));
      let most = Number.NEGATIVE_INFINITY;
      for (let k = 0; k < 2000; k++) most = Math.max(most, formValue(f, turned(w, (2 * Math.PI * k) / 2000), 0));
      expect(Math.abs(mostOf(round, w) - most)).toBeLessThan(1e-4 * (1 + Math.abs(most)));
    }
  });

  it('leave forms as they are that need nothing, and refuse those of another kind', () => {
    const radial = form({
      P: [
        [1, 0, 0, 0, 2, 0],
        [0, 1, 0, -2, 0, 0],
      ],
      l: [0, 0, 0.5, 0, 0, 0],
    });
    expect(roundForms([radial])!.map((one) => one.form)).toEqual([radial]);
    expect(allRound([radial])).toEqual([radial]);
    expect(
      roundForms([
        form({
          P: [
            [1, 0, 0, 0, 2, 0],
            [0, 1.1, 0, -2, 0, 0],
          ],
        }),
      ]),
    ).toBeNull();
    expect(roundForms([form({ P: [[1, 0, 0, 0, 0, 0]] })])).toBeNull();
    expect(
      roundForms([
        form({
          P: [
            [1, 0, 0, 0, 2, 0],
            [0, 1, 0, -2, 0, 0],
            [0.1, 0, 0, 0, 0, 1],
          ],
        }),
      ]),
    ).toBeNull();
    expect(roundForms([{ ...radial, l: Float64Array.from([0.1, 0, 0, 0, 0, 0]) }])).toBeNull();
  });

  it('would be broken by leaving out the constant or one of the signs (seeds 1–40)', () => {
    const broken = { constant: 0, sign: 0 };
    for (let seed = 1; seed <= 40; seed++) {
      const random = seededRandom(seed);
      const f = gearForm(random, 2, RANGES[0]);
      const round = roundForms([f])!;
      expect(round.length).toBe(4);
      const whole = allRound([f])!;
      const without = whole.map((one) => ({ ...one, o: one.o - Math.hypot(...f.c) }));
      for (let draw = 0; draw < 400; draw++) {
        const w = Float64Array.from({ length: 6 }, () => random.between(-3, 3));
        const value = formValue(f, w, 0);
        if (mostOf(without, w) < value - 1e-9) broken.constant++;
        if (mostOf(whole.slice(0, 2), w) < value - 1e-9) broken.sign++;
      }
    }
    expect(broken.constant).toBeGreaterThan(0);
    expect(broken.sign).toBeGreaterThan(0);
  });
});
