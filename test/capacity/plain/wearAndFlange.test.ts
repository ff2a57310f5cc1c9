import { describe, expect, it } from 'vitest';
import { flangeFace, wearLife } from '../../../src/capacity/plain/index.ts';

describe('wear life of a bushing', () => {
  it('Wentzell, Machine Design, Example 19.2, p. 421 (recomputed; a companion gives 2788 h and notes that the book prints another figure)', () => {
    const life = wearLife(0.000254, 2.417296e-16, 210290.1 * 0.49784);
    if ('unassessed' in life) throw new Error(life.unassessed);
    expect(Math.abs(life.value / 10036800 - 1)).toBeLessThanOrEqual(0.002);
    expect(Math.round(life.value / 3600)).toBe(2788);
  });

  it('by the way slid instead of the time: depth = volume over area, volume = factor × load × way', () => {
    const [factor, depth, d, L, F, v] = [5e-16, 1e-4, 0.03, 0.025, 800, 0.2];
    const life = wearLife(depth, factor, (F / (d * L)) * v);
    if ('unassessed' in life) throw new Error(life.unassessed);
    const way = v * life.value;
    expect((factor * F * way) / (d * L)).toBeCloseTo(depth, 12);
  });

  it('falls as the inverse of factor and rate, rises with the depth; without sliding it has no end', () => {
    const of = (depth: number, factor: number, rate: number) => {
      const life = wearLife(depth, factor, rate);
      return 'value' in life ? life.value : Number.NaN;
    };
    expect(of(1e-4, 1e-16, 1e5) / of(1e-4, 2e-16, 1e5)).toBeCloseTo(2, 12);
    expect(of(1e-4, 1e-16, 1e5) / of(1e-4, 1e-16, 3e5)).toBeCloseTo(3, 12);
    expect(of(2e-4, 1e-16, 1e5) / of(1e-4, 1e-16, 1e5)).toBeCloseTo(2, 12);
    expect(of(1e-4, 1e-16, 0)).toBe(Number.POSITIVE_INFINITY);
  });

  it('is unassessed for what is missing or no number', () => {
    expect(wearLife(1e-4, null, 1)).toHaveProperty('unassessed');
    expect(wearLife(null, 1e-16, 1)).toHaveProperty('unassessed');
    for (const [depth, factor, rate] of [
      [0, 1e-16, 1],
      [1e-4, 0, 1],
      [1e-4, 1e-16, -1],
      [1e-4, 1e-16, Number.NaN],
    ] as const) {
      expect(wearLife(depth, factor, rate)).toHaveProperty('unassessed');
    }
  });
});

describe('face of a flange', () => {
  it('is the ring from bore to flange; summed ring by ring it is the same, and slides at the mean diameter', () => {
    const face = flangeFace(0.02, 0.032);
    if ('unassessed' in face) throw new Error(face.unassessed);
    expect(face.value.diameter).toBeCloseTo(0.026, 15);
    const steps = 2000;
    const wide = 0.006 / steps;
    let area = 0;
    for (let k = 0; k < steps; k++) area += 2 * Math.PI * (0.01 + (k + 0.5) * wide) * wide;
    expect(area / face.value.area).toBeCloseTo(1, 9);
  });

  it('is unassessed without a flange, or with one no larger than the bore', () => {
    expect(flangeFace(0.02, null)).toHaveProperty('unassessed');
    for (const flange of [0.02, 0.01, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(flangeFace(0.02, flange)).toHaveProperty('unassessed');
    }
  });
});
