/**
 * The life over a duty against published and recomputed examples. Figures and tags as they stand in the sources named beside them.
 */
import { describe, expect, it } from 'vitest';
import type { RollingBearing } from '../../../src/arm/arm.ts';
import { bearingLife } from '../../../src/capacity/duty/index.ts';
import { bareBearing, OSCILLATION_RULE, swingRate } from '../../../src/capacity/rolling/index.ts';

const HOUR = 3600;

function ball(C: number): RollingBearing {
  return { ...bareBearing('deep-groove', 0.02, 0.042, 0.012), C, C0: 0.6 * C };
}

function life(C: number, loads: number[], turning: number[], reliability = 0.9) {
  const outcome = bearingLife(ball(C), loads, turning, reliability);
  if ('unassessed' in outcome) throw new Error(outcome.unassessed);
  return outcome.value;
}

describe('life over a duty', () => {
  it('three loads by revolutions (Jindal, Machine Design, example 18-9; verified)', () => {
    const turning = [1440 * 0.25, 1080 * 0.5, 720 * 0.25].map((rpm) => rpm / 60);
    const found = life(34218.89, [3000, 4000, 5000], turning);
    expect(found.load / 3954.342).toBeCloseTo(1, 5);
    expect(found.turning * 60).toBeCloseTo(1080, 9);
    expect(found.revolutions / 648e6).toBeCloseTo(1, 4);
    expect(found.basic / HOUR / 10000).toBeCloseTo(1, 4);
  });

  it('one load at one speed (Wentzell, example 20.1 and Jindal, example 18-4; verified)', () => {
    expect(life(22463.52, [10675.73], [1750 / 60]).basic / HOUR / 88.72604).toBeCloseTo(1, 5);
    expect(life(41000, [20000], [720 / 60]).basic / HOUR / 199.4242).toBeCloseTo(1, 5);
  });

  it('a swing (recomputed from kinematics)', () => {
    expect(OSCILLATION_RULE.trust).toBe('recomputed');
    for (const [degrees, frequency, rpm, hours] of [
      [30, 1, 20, 833333.3],
      [90, 0.5, 30, 555555.6],
    ] as const) {
      const rate = swingRate((degrees * Math.PI) / 180, frequency);
      expect(rate * 60).toBeCloseTo(rpm, 9);
      expect(life(10000, [1000], [rate]).basic / HOUR / hours).toBeCloseTo(1, 6);
    }
  });

  it('a reliability other than 90 % (ISO 281:2007 a1 by its closed form; recomputed)', () => {
    const expected = [
      [0.9, 1],
      [0.95, 0.6379117],
      [0.99, 0.2483317],
    ] as const;
    for (const [R, a1] of expected) {
      const found = life(14000, [2000], [1], R);
      expect(found.a1).toBeCloseTo(a1, 6);
      expect(found.life / (343e6 * a1)).toBeCloseTo(1, 6);
    }
    expect(bearingLife(ball(14000), [2000], [1], 0.5)).toHaveProperty('unassessed');
  });

  it('splits and merges: a segment in two halves is the same; still time only stretches the life', () => {
    const whole = life(10000, [900, 1500], [0.2, 0.1]);
    const halves = life(10000, [900, 900, 1500], [0.1, 0.1, 0.1]);
    expect(halves.life / whole.life).toBeCloseTo(1, 12);
    const still = life(10000, [900, 1500, 9999], [0.2, 0.1, 0]);
    expect(still.life).toBe(whole.life);
  });

  it('at the limits: no load wears nothing, an impossible load leaves no life, no turning and no number have none', () => {
    expect(life(10000, [0], [1]).life).toBe(Number.POSITIVE_INFINITY);
    expect(life(10000, [Number.POSITIVE_INFINITY], [1]).life).toBe(0);
    expect(bearingLife(ball(10000), [100], [0], 0.9)).toHaveProperty('unassessed');
    expect(bearingLife(ball(10000), [Number.NaN], [1], 0.9)).toHaveProperty('unassessed');
    expect(bearingLife(ball(Number.NaN), [100], [1], 0.9)).toHaveProperty('unassessed');
  });

  it('remarks on loads beyond the formula and below the usual minimum', () => {
    expect(life(10000, [7000], [1]).warnings.join()).toContain('above half of C');
    expect(life(10000, [50], [1]).warnings.join()).toContain('below the usual minimum');
    expect(life(10000, [1000], [1]).warnings).toEqual([]);
    expect(life(10000, [1000], [1]).notes).toEqual([]);
    const marked = { ...ball(10000), source: 'estimated, replace by the maker’s rating' };
    const outcome = bearingLife(marked, [1000], [1], 0.9);
    expect('value' in outcome && outcome.value.notes.join()).toContain('estimated');
  });
});
