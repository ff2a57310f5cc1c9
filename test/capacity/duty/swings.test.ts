import { describe, expect, it } from 'vitest';
import { pathMotion, pathSwings, smallSwingShare } from '../../../src/capacity/duty/index.ts';

/** A path of one joint, fine enough that the spline adds nothing worth counting. */
function path(angles: readonly number[], full = 0) {
  return pathMotion(
    angles.map((_, k) => k),
    angles.map((q) => [q]),
    [full],
  );
}

/** Straight strokes between the corners given, in small steps. */
function strokes(corners: readonly number[], steps = 400): number[] {
  const out = [corners[0]!];
  for (let c = 1; c < corners.length; c++) {
    // Slow at the ends, so that the motion turns where the corner is.
    for (let s = 1; s <= steps; s++) {
      const share = (1 - Math.cos((Math.PI * s) / steps)) / 2;
      out.push(corners[c - 1]! + share * (corners[c]! - corners[c - 1]!));
    }
  }
  return out;
}

const halves = (swings: { halfSwings: Float64Array }) => [...swings.halfSwings].map((half) => Number(half.toFixed(4)));

describe('swings of a path, counted by hand', () => {
  it('a sine there and back: two reversals, two strokes of half its size, 4θ swept', () => {
    const swings = pathSwings(path(Array.from({ length: 201 }, (_, k) => 0.5 * Math.sin((2 * Math.PI * k) / 200))), 0);
    expect(swings.reversals).toBe(2);
    expect(halves(swings)).toEqual([0.5, 0.5]);
    expect(swings.swept).toBeCloseTo(2, 6);
    expect(swings.turnedOn).toBe(0);
  });

  it('a closed path 0, 1, 0.6, 0.9, 0: four reversals; strokes 0.4, 0.3, 0.9 and 1', () => {
    const swings = pathSwings(path(strokes([0, 1, 0.6, 0.9, 0])), 0);
    expect(swings.reversals).toBe(4);
    expect(halves(swings).sort()).toEqual([0.15, 0.2, 0.45, 0.5]);
    expect(swings.swept).toBeCloseTo(2.6, 4);
  });

  it('the same path begun elsewhere swings the same', () => {
    const swings = pathSwings(path(strokes([0.6, 0.9, 0, 1, 0.6])), 0);
    expect(swings.reversals).toBe(4);
    expect(halves(swings).sort()).toEqual([0.15, 0.2, 0.45, 0.5]);
  });

  it('an open path 0, 1, 0.5: one reversal between two strokes', () => {
    const swings = pathSwings(path(strokes([0, 1, 0.5])), 0);
    expect(swings.reversals).toBe(1);
    expect(halves(swings)).toEqual([0.5, 0.25]);
  });

  it('turning on is no swing, whether the joint comes round or not', () => {
    const round = pathSwings(
      path(
        Array.from({ length: 61 }, (_, k) => (2 * Math.PI * k) / 60),
        1,
      ),
      0,
    );
    expect(round.reversals).toBe(0);
    expect(round.turnedOn).toBeCloseTo(2 * Math.PI, 9);
    const one = pathSwings(path(strokes([0, 2])), 0);
    expect([one.reversals, one.halfSwings.length]).toEqual([0, 0]);
    expect(one.turnedOn).toBeCloseTo(2, 9);
  });

  it('a trembling below the dead band turns nothing back, though it is swept', () => {
    const angles = strokes([0, 1, 0]).map((q, k) => q + (k % 2 === 0 ? 0 : 8e-4));
    const swings = pathSwings(path(angles), 0);
    expect(swings.reversals).toBe(2);
    expect(swings.swept).toBeGreaterThan(2.02);
    expect(pathSwings(path([0.2, 0.2, 0.2]), 0)).toMatchObject({ swept: 0, reversals: 0, turnedOn: 0 });
  });

  it('says how much of the turning is in small swings', () => {
    const swings = pathSwings(path(strokes([0, 1, 0.6, 0.9, 0])), 0);
    expect(smallSwingShare(swings, 0.3)).toBeCloseTo(0.7 / 2.6, 4);
    expect(smallSwingShare(swings, 0.1)).toBe(0);
    expect(smallSwingShare(swings, Number.NaN)).toBe(1);
  });
});
