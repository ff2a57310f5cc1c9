import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import {
  cross3,
  dot3,
  type Flat,
  IDENTITY33,
  multiply33,
  multiplyBack33,
  norm3,
  rotate3,
  rotateBack3,
} from '../../src/math/vector.ts';
import { randomRotation } from '../randomArm.ts';
import { turnAbout } from '../worldArm.ts';

const near = (a: ArrayLike<number>, b: ArrayLike<number>, within = 1e-14) => {
  expect(a.length).toBe(b.length);
  for (let k = 0; k < a.length; k++) expect(Math.abs(a[k]! - b[k]!)).toBeLessThanOrEqual(within);
};
const at = (a: Flat, from: number, count: number) => a.subarray(from, from + count);

describe('three-vectors and matrices in flat arrays', () => {
  it('have the cross product of a right-handed frame, and a vector dotted with its cross is nothing (seed 11)', () => {
    const out = new Float64Array(3);
    cross3(out, 0, [1, 0, 0], 0, [0, 1, 0], 0);
    expect([...out]).toEqual([0, 0, 1]);
    cross3(out, 0, [0, 1, 0], 0, [0, 0, 1], 0);
    expect([...out]).toEqual([1, 0, 0]);
    const random = seededRandom(11);
    for (let k = 0; k < 200; k++) {
      const [a, b] = [random.direction(), random.direction()];
      cross3(out, 0, a, 0, b, 0);
      expect(Math.abs(dot3(out, 0, a, 0))).toBeLessThan(1e-15);
      // |a × b|² + (a·b)² = 1 (Lagrange)
      expect(norm3(out, 0) ** 2 + dot3(a, 0, b, 0) ** 2).toBeCloseTo(1, 14);
    }
  });

  it('turn as Rodrigues says, and back again (seed 12)', () => {
    const random = seededRandom(12);
    for (let k = 0; k < 200; k++) {
      const axis = random.direction();
      const angle = random.between(-7, 7);
      const v = random.direction();
      const c = Math.cos(angle);
      const s = Math.sin(angle);
      const along = dot3(axis, 0, v, 0);
      const aside = new Float64Array(3);
      cross3(aside, 0, axis, 0, v, 0);
      const expected = v.map((x, i) => c * x + s * aside[i]! + (1 - c) * along * axis[i]!);
      const m = turnAbout(axis, angle);
      const out = new Float64Array(3);
      rotate3(out, 0, m, 0, v, 0);
      near(out, expected);
      // In place is allowed for the way back.
      rotateBack3(out, 0, m, 0, out, 0);
      near(out, v);
    }
  });

  it('work at any offset and touch nothing else (seed 13)', () => {
    const random = seededRandom(13);
    const m = Float64Array.of(7, 7, ...randomRotation(random), 7);
    const v = Float64Array.of(7, ...random.direction(), 7);
    const out = new Float64Array(9).fill(7);
    rotate3(out, 1, m, 2, v, 1);
    rotateBack3(out, 5, m, 2, out, 1);
    near(at(out, 5, 3), at(v, 1, 3));
    expect([out[0], out[4], out[8]]).toEqual([7, 7, 7]);
    cross3(out, 1, v, 1, v, 1);
    near(at(out, 1, 3), [0, 0, 0]);
    expect(dot3(v, 1, v, 1)).toBeCloseTo(1, 14);
  });

  it('multiply as turns follow one another; Aᵀ A is the identity (seed 14)', () => {
    const random = seededRandom(14);
    for (let k = 0; k < 100; k++) {
      const a = randomRotation(random);
      const b = randomRotation(random);
      const v = random.direction();
      const ab = new Float64Array(9);
      multiply33(ab, 0, a, 0, b, 0);
      const [once, twice] = [new Float64Array(3), new Float64Array(3)];
      rotate3(once, 0, b, 0, v, 0);
      rotate3(twice, 0, a, 0, once, 0);
      rotate3(once, 0, ab, 0, v, 0);
      near(once, twice);
      const back = new Float64Array(9);
      multiplyBack33(back, 0, a, 0, a, 0);
      near(back, IDENTITY33);
      multiplyBack33(back, 0, a, 0, ab, 0);
      near(back, b);
    }
  });
});
