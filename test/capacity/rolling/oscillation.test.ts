import { describe, expect, test } from 'vitest';
import {
  criticalHalfSwing,
  internalGeometry,
  lifeRevolutions,
  lifeSeconds,
  sweptRevolutions,
  swingLoad,
  swingNotes,
  swingRate,
} from '../../../src/capacity/rolling/index.ts';
import { bearing, DEGREE, known } from './bearings.ts';

describe('worked examples (kinematics, recomputed): P 1 kN, C 10 kN', () => {
  test.each([
    ['±30° once a second', 30, 1, 20, 693.3613, 833333.3, 3e9],
    ['±90° every two seconds: one swing is one turn', 90, 0.5, 30, 1000, 555555.6, 1e9],
  ])('%s', (_, degrees, frequency, rpm, P, hours, swings) => {
    const half = degrees * DEGREE;
    expect((60 * swingRate(half, frequency)) / rpm).toBeCloseTo(1, 9);
    expect(swingLoad(1000, half, 3) / P).toBeCloseTo(1, 6);
    const seconds = lifeSeconds(lifeRevolutions(10000, 1000, 3), swingRate(half, frequency));
    expect(seconds / 3600 / hours).toBeCloseTo(1, 6);
    expect((seconds * frequency) / swings).toBeCloseTo(1, 6);
    // The other way to count: one revolution a swing under the reduced load.
    expect(lifeRevolutions(10000, swingLoad(1000, half, 3), 3) / swings).toBeCloseTo(1, 9);
  });
});

test('a swing counts what its path sweeps, and ±180° there and back two turns', () => {
  const path = [0, 0.4, -0.4, 0];
  let swept = 0;
  for (let i = 1; i < path.length; i++) swept += Math.abs(path[i]! - path[i - 1]!);
  expect(sweptRevolutions(swept)).toBeCloseTo(swingRate(0.4, 1), 12);
  expect(swingRate(Math.PI, 1)).toBeCloseTo(2, 12);
});

describe('small arcs', () => {
  const b = bearing('deep-groove', { balls: 8, ballDiameter: 0.0067, pitchDiameter: 0.0335 });
  const geometry = known(internalGeometry(b));

  test('by hand: Z 8, γ 0.2: 2π/(8 · 0.8) = 0.9817 rad', () => {
    expect(geometry.gamma).toBeCloseTo(0.2, 12);
    expect(criticalHalfSwing(geometry)).toBeCloseTo(0.98175, 5);
    expect(swingNotes(0.98, geometry)).toEqual(['small-arc']);
    expect(swingNotes(0.99, geometry)).toEqual([]);
    expect(swingNotes(0, geometry)).toEqual([]);
  });

  test('at that swing a ball just reaches its neighbour’s place on the outer race, by the motion of the cage', () => {
    // Outer ring at rest, inner ring turned by φ: no slip at both races turns the cage by φ ri/(ri + ro).
    const inner = (geometry.pitchDiameter - geometry.elementDiameter) / 2;
    const outer = (geometry.pitchDiameter + geometry.elementDiameter) / 2;
    const cage = (2 * criticalHalfSwing(geometry) * inner) / (inner + outer);
    expect(cage).toBeCloseTo((2 * Math.PI) / geometry.elements, 12);
  });

  test('geometry that is no geometry warns', () => {
    expect(criticalHalfSwing({ ...geometry, gamma: Number.NaN })).toBeNaN();
    expect(swingNotes(3, { ...geometry, gamma: Number.NaN })).toEqual(['small-arc']);
  });

  test('crossed rollers: each way counts its own rollers', () => {
    const ring = known(internalGeometry(bearing('crossed-roller', { balls: 30, ballDiameter: 0.002 })));
    expect(ring.elements).toBe(15);
  });
});

test('no number in, none out', () => {
  for (const bad of [Number.NaN, -1]) {
    expect(sweptRevolutions(bad)).toBeNaN();
    expect(swingRate(bad, 1)).toBeNaN();
    expect(swingRate(1, bad)).toBeNaN();
    expect(swingLoad(bad, 1, 3)).toBeNaN();
  }
});
