import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../../src/arm/arm.ts';
import {
  axisThrough,
  bentAxis,
  lostMotion,
  type PlayPair,
  playReachBound,
  playTilt,
  pointShift,
  reversals,
  seatedAxis,
  springAxis,
  tipErrorAtPose,
  tipErrorBound,
} from '../../../src/capacity/play/index.ts';
import type { Assessed } from '../../../src/capacity/rule.ts';
import { seededRandom } from '../../../src/math/random.ts';
import { prepareBeam, solveShaft } from '../../../src/mechanics/beamStepped.ts';

function taken<T>(result: Assessed<T>): T {
  if ('unassessed' in result) throw new Error(result.unassessed);
  return result.value;
}

const pair = (span: number, playA: number, playB: number): PlayPair => ({ stationA: 0, stationB: span, playA, playB });

describe('tilt from play', () => {
  it('geometry example: 18 µm in both bearings over 30 mm, reach 0.4 m (recomputed)', () => {
    const joint = pair(0.03, 1.8e-5, 1.8e-5);
    expect(taken(playTilt(joint))).toBeCloseTo(0.0006, 12);
    expect(2 * taken(playTilt(joint))).toBeCloseTo(0.0012, 12);
    // Measured from the middle of the pair, square to the axis and along it: tilt × reach = 0.24 mm.
    const tilted = axisThrough(0, [-0.9e-5, 0], 0.03, [0.9e-5, 0]);
    expect(pointShift(tilted, [0, 0, 0.015 + 0.4])[0]).toBeCloseTo(0.00024, 12);
    expect(pointShift(tilted, [0.4, 0, 0.015])[2]).toBeCloseTo(-0.00024, 12);
    expect(taken(playReachBound(joint, [0, 0, 0.415]))).toBeCloseTo(0.00024, 12);
  });

  it('the point moves as the rotation vector z × lean turns it (second route), seed 111', () => {
    const random = seededRandom(111);
    for (let trial = 0; trial < 50; trial++) {
      const small = () => random.between(-1e-3, 1e-3);
      const axis = axisThrough(random.between(-1, 0), [small(), small()], random.between(0.1, 1), [small(), small()]);
      const reach: Vec3 = [random.between(-1, 1), random.between(-1, 1), random.between(-1, 1)];
      const [wx, wy] = [-axis.lean[1], axis.lean[0]];
      const [rx, ry, rz] = [reach[0], reach[1], reach[2] - axis.station];
      // ω × r with ωz = 0
      const turned = [wy * rz, -wx * rz, wx * ry - wy * rx];
      const found = pointShift(axis, reach);
      expect(found[0]).toBeCloseTo(axis.shift[0] + turned[0]!, 12);
      expect(found[1]).toBeCloseTo(axis.shift[1] + turned[1]!, 12);
      expect(found[2]).toBeCloseTo(turned[2]!, 12);
    }
  });

  it('the bound holds for any place of the journals, and is attained beyond the bearings (seed 112)', () => {
    const random = seededRandom(112);
    for (let trial = 0; trial < 60; trial++) {
      const joint = {
        stationA: random.between(-0.05, 0.05),
        stationB: random.between(0.06, 0.2),
        playA: random.between(0, 1e-4),
        playB: random.between(0, 1e-4),
      };
      const reach: Vec3 = [random.between(-1, 1), random.between(-1, 1), random.between(-0.5, 0.5)];
      const bound = taken(playReachBound(joint, reach));
      const angleOf = Math.atan2(reach[1], reach[0]);
      let found = 0;
      for (let k = 0; k < 400; k++) {
        const journal = (play: number, along: number): [number, number] => [
          (play / 2) * Math.cos(along),
          (play / 2) * Math.sin(along),
        ];
        const a = k === 0 ? angleOf : random.between(0, 7);
        const b = k === 0 ? angleOf + Math.PI : random.between(0, 7);
        const axis = axisThrough(joint.stationA, journal(joint.playA, a), joint.stationB, journal(joint.playB, b));
        const moved = Math.hypot(...pointShift(axis, reach));
        expect(moved).toBeLessThanOrEqual(bound * (1 + 1e-9));
        found = Math.max(found, moved);
      }
      const share = (reach[2] - joint.stationA) / (joint.stationB - joint.stationA);
      if (share < 0 || share > 1) expect(found / bound).toBeCloseTo(1, 9);
    }
  });

  it('more play never lowers tilt or bound; more span never raises the tilt', () => {
    const play = fc.double({ min: 0, max: 1e-3, noNaN: true });
    const span = fc.double({ min: 0.005, max: 0.5, noNaN: true });
    const k = fc.double({ min: 1, max: 5, noNaN: true });
    fc.assert(
      fc.property(play, play, span, k, (a, b, D, more) => {
        const tilt = taken(playTilt(pair(D, a, b)));
        expect(taken(playTilt(pair(D, more * a, b)))).toBeGreaterThanOrEqual(tilt);
        expect(taken(playTilt(pair(more * D, a, b)))).toBeLessThanOrEqual(tilt);
        const reach: Vec3 = [0.3, -0.2, 0.7];
        expect(taken(playReachBound(pair(D, a, more * b), reach))).toBeGreaterThanOrEqual(
          taken(playReachBound(pair(D, a, b), reach)),
        );
      }),
      { seed: 113, numRuns: 200 },
    );
  });

  it('seated by its loads: an overhung load leans the axis its way, and the play closes up (equal to the bound)', () => {
    const joint = pair(0.05, 2e-5, 3e-5);
    // Overhung beyond B: B carries along the load, A against it.
    const axis = taken(seatedAxis(joint, [-60, 0], [160, 0]));
    expect(axis.shift).toEqual([-1e-5, 0]);
    expect(axis.lean[0]).toBeCloseTo(taken(playTilt(joint)), 12);
    expect(pointShift(axis, [0, 0, 0.2])[0]).toBeCloseTo(taken(playReachBound(joint, [0, 0, 0.2])), 12);
    // Between the bearings both go the same way: shift, and only the difference of the plays leans.
    const between = taken(seatedAxis(joint, [0, 50], [0, 50]));
    expect(between.lean[1]).toBeCloseTo((1.5e-5 - 1e-5) / 0.05, 12);
  });

  it('refuses zero span, negative or broken play, a journal left undecided', () => {
    for (const bad of [pair(0, 1e-5, 1e-5), pair(0.1, -1e-6, 0), pair(0.1, 0, Number.NaN), pair(Number.NaN, 0, 0)]) {
      expect(playTilt(bad)).toHaveProperty('unassessed');
      expect(playReachBound(bad, [0, 0, 1])).toHaveProperty('unassessed');
      expect(seatedAxis(bad, [1, 0], [1, 0])).toHaveProperty('unassessed');
    }
    expect(playReachBound(pair(0.1, 1e-5, 1e-5), [0, Number.NaN, 0])).toHaveProperty('unassessed');
    expect(seatedAxis(pair(0.1, 1e-5, 1e-5), [0, 0], [1, 0])).toHaveProperty('unassessed');
    expect(seatedAxis(pair(0.1, 1e-5, 1e-5), [Number.NaN, 0], [1, 0])).toHaveProperty('unassessed');
    expect(taken(seatedAxis(pair(0.1, 0, 0), [0, 0], [0, 0])).lean).toEqual([0, 0]);
  });
});

describe('lost motion', () => {
  it('finds the two loads most apart (against trying all pairs), seed 114', () => {
    const random = seededRandom(114);
    for (let trial = 0; trial < 200; trial++) {
      const count = 1 + random.below(12);
      const spread = random.between(0.1, 6.3);
      const angles = Array.from({ length: count }, () => random.between(-spread / 2, spread / 2) + 2);
      const loads = Float64Array.from(angles.flatMap((a) => [30 * Math.cos(a), 30 * Math.sin(a)]));
      const found = taken(lostMotion(loads, 2e-5, 0));
      let turn = 0;
      let shift = 0;
      for (const a of angles) {
        for (const b of angles) {
          turn = Math.max(turn, Math.acos(Math.max(-1, Math.min(1, Math.cos(a - b)))));
          shift = Math.max(shift, 1e-5 * Math.hypot(Math.cos(a) - Math.cos(b), Math.sin(a) - Math.sin(b)));
        }
      }
      expect(found.turn).toBeCloseTo(turn, 6);
      expect(found.shift).toBeCloseTo(shift, 12);
      expect(found.reverses).toBe(turn > Math.PI / 2);
      const apart = Math.cos(angles[found.fromPose]! - angles[found.toPose]!);
      expect(apart).toBeCloseTo(Math.cos(found.turn), 9);
    }
  });

  it('a reaction that turns over loses the whole play; a steady one none', () => {
    expect(taken(lostMotion(Float64Array.from([0, 50, 1, 3, 0, -20]), 3e-5, 0))).toMatchObject({
      shift: 3e-5,
      fromPose: 0,
      toPose: 2,
      reverses: true,
    });
    expect(taken(lostMotion(Float64Array.from([0, 50, 0, 20]), 3e-5, 0)).shift).toBe(0);
  });

  it('along a path: poses where the load jumps over, light loads passed by', () => {
    const path = Float64Array.from([10, 0, 5, 1, -0.1, 0, -8, 0, -8, 2, 9, 0]);
    expect(taken(reversals(path, 0))).toEqual([2, 5]);
    expect(taken(reversals(path, 1))).toEqual([3, 5]);
    const wandering = Float64Array.from(
      Array.from({ length: 37 }, (_, i) => [Math.cos((i * Math.PI) / 18), Math.sin((i * Math.PI) / 18)]).flat(),
    );
    expect(taken(reversals(wandering, 0))).toEqual([]);
    expect(taken(lostMotion(wandering, 1e-5, 0)).shift).toBeCloseTo(1e-5, 15);
  });

  it('unassessed: no load anywhere, loads or play that are no numbers', () => {
    expect(lostMotion(new Float64Array(4), 1e-5, 0)).toHaveProperty('unassessed');
    expect(lostMotion(new Float64Array(0), 1e-5, 0)).toHaveProperty('unassessed');
    expect(lostMotion(Float64Array.from([1, Number.NaN]), 1e-5, 0)).toHaveProperty('unassessed');
    expect(lostMotion(Float64Array.from([1, 0]), Number.NaN, 0)).toHaveProperty('unassessed');
    expect(reversals(Float64Array.from([1, Number.NaN]), 0)).toHaveProperty('unassessed');
    expect(reversals(Float64Array.from([1, 0]), Number.NaN)).toHaveProperty('unassessed');
  });
});

describe('elastic tilt', () => {
  const loads = [{ station: 0.11, fx: 120, fy: -200, mx: 3, my: -2 }];
  /** Loads on the bearings at 0 and 0.05 m of that example (statics, recomputed). */
  const [A, B] = [
    [-104, 300],
    [224, -500],
  ] as const;

  function bent(EI: number, kA: number, kB: number) {
    const supports = [
      { station: 0, stiffness: kA, tiltStiffness: 0 },
      { station: 0.05, stiffness: kB, tiltStiffness: 0 },
    ];
    const beam = prepareBeam([{ from: 0, to: 0.11, EI, GA: Number.POSITIVE_INFINITY }], supports, [0.11]);
    if ('unassessed' in beam) throw new Error(beam.unassessed);
    const solution = solveShaft(beam, loads);
    if ('unassessed' in solution) throw new Error(solution.unassessed);
    return taken(bentAxis(solution, 0.11));
  }

  it('a stiff shaft on springs is the beam with EI without end (second route)', () => {
    const springs = taken(springAxis(0, A, 3e7, 0.05, B, 8e7));
    const beam = bent(1e12, 3e7, 8e7);
    for (const i of [0, 1] as const) {
      expect(beam.lean[i] / springs.lean[i]).toBeCloseTo(1, 6);
      expect(beam.shift[i] / (springs.shift[i] + springs.lean[i] * 0.11)).toBeCloseTo(1, 6);
    }
  });

  it('the tip goes with the load; softer bearings and a thinner shaft never lessen it; all stiff: nothing', () => {
    const tip: Vec3 = [0, 0, 0.4];
    const moved = (EI: number, k: number) => pointShift(bent(EI, k, k), tip);
    expect(moved(500, 5e7)[0]).toBeGreaterThan(0);
    expect(moved(500, 5e7)[1]).toBeLessThan(0);
    let last = 0;
    for (const k of [1e9, 1e8, 1e7]) {
      const size = Math.hypot(...moved(500, k));
      expect(size).toBeGreaterThan(last);
      last = size;
    }
    expect(Math.hypot(...moved(100, 1e7))).toBeGreaterThan(last);
    expect(Math.hypot(...moved(1e15, 1e18))).toBeLessThan(1e-13);
  });

  it('unassessed: stiffness missing or not positive, loads broken, zero span, hub off the shaft', () => {
    expect(springAxis(0, A, null, 0.05, B, 8e7)).toEqual({ unassessed: expect.stringContaining('stiffness') });
    expect(springAxis(0, A, 0, 0.05, B, 8e7)).toHaveProperty('unassessed');
    expect(springAxis(0, A, 1e7, 0, B, 8e7)).toHaveProperty('unassessed');
    expect(springAxis(0, [Number.NaN, 0], 1e7, 0.05, B, 8e7)).toHaveProperty('unassessed');
  });
});

describe('tip error', () => {
  it('at a pose the displacements add as vectors, and the shares sum to the total', () => {
    const error = taken(
      tipErrorAtPose([
        [3e-4, 0, 0],
        [0, 4e-4, 0],
        [0, 0, 0],
      ]),
    );
    expect(error.total).toBeCloseTo(5e-4, 15);
    expect(error.shares[0]).toBeCloseTo(1.8e-4, 15);
    expect(error.shares.reduce((a, b) => a + b, 0)).toBeCloseTo(error.total, 15);
    expect(
      taken(
        tipErrorAtPose([
          [1e-4, 0, 0],
          [-1e-4, 0, 0],
        ]),
      ),
    ).toEqual({ total: 0, shares: [0, 0] });
  });

  it('never above the bound of the same joints', () => {
    const v = fc.double({ min: -1, max: 1, noNaN: true });
    fc.assert(
      fc.property(fc.array(fc.tuple(v, v, v), { minLength: 1, maxLength: 7 }), (displacements) => {
        const pose = taken(tipErrorAtPose(displacements));
        const bound = taken(tipErrorBound(displacements.map((d) => Math.hypot(...d))));
        expect(pose.total).toBeLessThanOrEqual(bound.total * (1 + 1e-12));
      }),
      { seed: 115, numRuns: 200 },
    );
    expect(tipErrorBound([1e-4, Number.NaN])).toHaveProperty('unassessed');
    expect(tipErrorBound([1e-4, -1])).toHaveProperty('unassessed');
    expect(tipErrorAtPose([[0, Number.NaN, 0]])).toHaveProperty('unassessed');
  });
});
