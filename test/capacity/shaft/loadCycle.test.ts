import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { findMaterial } from '../../../src/capacity/materials.ts';
import {
  cyclesFromPeak,
  cyclesFromRanges,
  fatigueSafety,
  HISTORY_STRIDE,
  type LoadCycle,
  loadCycles,
  roundSection,
} from '../../../src/capacity/shaft/index.ts';
import { seededRandom } from '../../../src/math/random.ts';

function cyclesOf(poses: readonly (readonly [number, number, number, number])[], turnsWith: 'link' | 'housing') {
  const result = loadCycles(Float64Array.from(poses.flat()), turnsWith);
  if ('unassessed' in result) throw new Error(result.unassessed);
  return result.value;
}

const most = (cycles: readonly LoadCycle[], field: keyof LoadCycle) =>
  Math.max(...cycles.map((cycle) => Math.abs(cycle[field])));

/** The raise for the gap between fibres: 180 of them. */
const RAISED = 1 / Math.cos(Math.PI / 180);

const steps = (count: number) => Array.from({ length: count }, (_, i) => i / (count - 1));

describe('load cycle of a shaft section: limits known beforehand', () => {
  it('a load fixed in space on a shaft turning right round: full reversal at every fibre, no mean', () => {
    const cycles = cyclesOf(
      steps(721).map((s) => [30, -40, 7, 2 * Math.PI * s]),
      'link',
    );
    for (const cycle of cycles) {
      expect(cycle.momentAmplitude).toBeCloseTo(50 * RAISED, 2);
      expect(cycle.momentMean).toBeCloseTo(0, 2);
      expect(cycle.torqueAmplitude).toBe(0);
      expect(cycle.torqueMean).toBe(7);
    }
  });

  it('the same load on a shaft that stays with the housing: steady, no amplitude', () => {
    const cycles = cyclesOf(
      steps(721).map((s) => [30, -40, 7, 2 * Math.PI * s]),
      'housing',
    );
    expect(most(cycles, 'momentAmplitude')).toBe(0);
    // 50 N·m at the most, seen at a fibre up to 1° off
    expect(most(cycles, 'momentMean')).toBeGreaterThanOrEqual(50);
    expect(most(cycles, 'momentMean')).toBeLessThanOrEqual(50 * RAISED);
  });

  it('a load that turns with the shaft: steady on the shaft, full reversal on a housing-fixed one', () => {
    const turning = steps(721).map((s) => {
      const q = 2 * Math.PI * s;
      return [50 * Math.cos(q), 50 * Math.sin(q), 0, q] as const;
    });
    expect(most(cyclesOf(turning, 'link'), 'momentAmplitude')).toBeLessThan(1e-12);
    expect(most(cyclesOf(turning, 'housing'), 'momentAmplitude')).toBeCloseTo(50 * RAISED, 2);
  });

  it('swing of ±θ under a load fixed in space: no reversal, the amplitude is M sin θ at the side fibre', () => {
    for (const theta of [0.1, 0.5, 1.2]) {
      const cycles = cyclesOf(
        steps(401).map((s) => [60, 0, 0, theta * (2 * s - 1)]),
        'link',
      );
      expect(most(cycles, 'momentAmplitude')).toBeCloseTo(60 * Math.sin(theta) * RAISED, 6);
      // The fibre in line with the load keeps (M + M cos θ)/2 as mean, (M - M cos θ)/2 as amplitude.
      const inLine = cycles[45]!;
      expect(inLine.momentMean).toBeCloseTo(30 * (1 + Math.cos(theta)) * RAISED, 6);
      expect(inLine.momentAmplitude).toBeCloseTo(30 * (1 - Math.cos(theta)) * RAISED, 6);
    }
  });

  it('the sign convention: moment +Mx pulls the fibre at 90°, +My presses the fibre at 0°', () => {
    const cycles = cyclesOf([[10, 4, 0, 0]], 'housing');
    expect(cycles[45]!.momentMean).toBeCloseTo(10 * RAISED, 9);
    expect(cycles[0]!.momentMean).toBeCloseTo(-4 * RAISED, 9);
  });

  it('order and repetition of poses change nothing; further poses never lower an amplitude', () => {
    const random = seededRandom(81);
    const pose = () =>
      [random.between(-50, 50), random.between(-50, 50), random.between(-9, 9), random.between(-3, 3)] as const;
    const poses = Array.from({ length: 30 }, pose);
    const cycles = cyclesOf(poses, 'link');
    expect(cyclesOf([...poses].reverse().concat(poses), 'link')).toEqual(cycles);
    const longer = cyclesOf([...poses, pose(), pose()], 'link');
    cycles.forEach((cycle, i) => {
      expect(longer[i]!.momentAmplitude).toBeGreaterThanOrEqual(cycle.momentAmplitude);
      expect(longer[i]!.torqueAmplitude).toBeGreaterThanOrEqual(cycle.torqueAmplitude);
    });
  });

  it('no fibre between those looked at has a larger amplitude (seed 82)', () => {
    const random = seededRandom(82);
    for (let trial = 0; trial < 30; trial++) {
      const poses = Array.from({ length: 1 + random.below(5) }, () => {
        return [random.between(-50, 50), random.between(-50, 50), 0, random.between(-3, 3)] as const;
      });
      const found = most(cyclesOf(poses, 'link'), 'momentAmplitude');
      for (let k = 0; k < 3000; k++) {
        const psi = (k / 3000) * 2 * Math.PI;
        const values = poses.map(([Mx, My, , q]) => Mx * Math.sin(psi + q) - My * Math.cos(psi + q));
        const amplitude = (Math.max(...values) - Math.min(...values)) / 2;
        expect(amplitude).toBeLessThanOrEqual(found * (1 + 1e-12));
      }
    }
  });
});

describe('bounds of the load cycle', () => {
  const steel = (() => {
    const found = findMaterial('steel-1045-cd');
    if ('unassessed' in found) throw new Error(found.unassessed);
    return found.value;
  })();
  const notch = { factors: { bending: 1.7, torsion: 1.4 }, radius: 0.001 };
  const safeties = (cycles: ReturnType<typeof loadCycles>) => {
    if ('unassessed' in cycles) throw new Error(cycles.unassessed);
    const result = fatigueSafety(cycles.value, roundSection(0.02, 0), notch, 'machined', steel, 0.99);
    if ('unassessed' in result) throw new Error(result.unassessed);
    return result.value;
  };
  const range = (values: readonly number[]) => ({ from: Math.min(...values), to: Math.max(...values) });
  const component = fc.double({ min: -80, max: 80, noNaN: true });
  const history = fc.array(fc.tuple(component, component, component, fc.double({ min: -3.2, max: 3.2, noNaN: true })), {
    minLength: 1,
    maxLength: 6,
  });

  it('from the peak moment, and from component ranges: never safer than the real cycle, in every criterion', () => {
    fc.assert(
      fc.property(history, (poses) => {
        const flat = Float64Array.from(poses.flat());
        const torque = range(poses.map((p) => p[2]));
        const peak = Math.max(...poses.map((p) => Math.hypot(p[0], p[1])));
        // The raise between fibres is part of the real cycle's figure, not of the peak's.
        const byPeak = safeties(cyclesFromPeak(peak * RAISED, torque));
        const byRanges = safeties(
          cyclesFromRanges(range(poses.map((p) => p[0])), range(poses.map((p) => p[1])), torque),
        );
        const link = safeties(loadCycles(flat, 'link'));
        const housing = safeties(loadCycles(flat, 'housing'));
        for (const criterion of ['safety', 'goodman', 'elliptic', 'soderberg', 'gerber'] as const) {
          expect(byPeak[criterion]).toBeLessThanOrEqual(link[criterion] * (1 + 1e-9));
          expect(byPeak[criterion]).toBeLessThanOrEqual(housing[criterion] * (1 + 1e-9));
          expect(byRanges[criterion]).toBeLessThanOrEqual(housing[criterion] * (1 + 1e-9));
        }
      }),
      { seed: 83, numRuns: 60 },
    );
  });

  it('a single pose: the ranges are points and give that pose; a larger peak never raises a safety', () => {
    const point = (x: number) => ({ from: x, to: x });
    const one = safeties(loadCycles(Float64Array.from([20, -30, 5, 0]), 'housing'));
    expect(safeties(cyclesFromRanges(point(20), point(-30), point(5))).goodman).toBeCloseTo(one.goodman, 9);
    let last = Number.POSITIVE_INFINITY;
    for (const peak of [0, 1, 10, 100]) {
      const { safety } = safeties(cyclesFromPeak(peak, { from: -2, to: 3 }));
      expect(safety).toBeLessThanOrEqual(last);
      last = safety;
    }
  });

  it('unassessed: no poses, a torn history, broken numbers, a range upside down', () => {
    expect(loadCycles(new Float64Array(0), 'link')).toHaveProperty('unassessed');
    expect(loadCycles(new Float64Array(HISTORY_STRIDE + 1), 'link')).toHaveProperty('unassessed');
    for (let i = 0; i < HISTORY_STRIDE; i++) {
      const torn = new Float64Array(2 * HISTORY_STRIDE);
      torn[HISTORY_STRIDE + i] = Number.NaN;
      expect(loadCycles(torn, 'link')).toHaveProperty('unassessed');
    }
    const good = { from: 0, to: 1 };
    expect(cyclesFromPeak(Number.NaN, good)).toHaveProperty('unassessed');
    expect(cyclesFromPeak(-1, good)).toHaveProperty('unassessed');
    expect(cyclesFromPeak(1, { from: 1, to: 0 })).toHaveProperty('unassessed');
    expect(cyclesFromRanges(good, { from: Number.NaN, to: 1 }, good)).toHaveProperty('unassessed');
  });
});
