import { describe, expect, it } from 'vitest';
import type { Arm, PairSupport } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { outsideTravel, poseArm } from '../../src/studies/poseArm.ts';
import { randomArm } from '../randomArm.ts';

type V = readonly [number, number, number];
const dot = (a: V, b: V) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
const cross = (a: V, b: V): V => [a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0]];
const plus = (a: V, b: V, k = 1): V => [a[0] + k * b[0], a[1] + k * b[1], a[2] + k * b[2]];
const size = (a: V) => Math.hypot(...a);

function randomPose(arm: Arm, seed: number): number[] {
  const random = seededRandom(seed);
  return arm.joints.map((joint) => random.between(joint.travel.from, joint.travel.to));
}

describe('poseArm', () => {
  it('has every joint in balance, in the frame of the file: A + B = f_r, zA z×A + zB z×B = m_r (seeds 1–60)', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const arm = randomArm(seed, { joints: 1 + (seed % 7), force: (['none', 'base', 'tool'] as const)[seed % 3]! });
      const [result] = poseArm(arm, flattenArm(arm), randomPose(arm, seed));
      result!.joints.forEach((joint, i) => {
        const axis = arm.joints[i]!.axis;
        const support = arm.joints[i]!.support as PairSupport;
        const A = joint.bearings.A!;
        const B = joint.bearings.B!;
        const fr = plus(joint.force, axis, -dot(joint.force, axis));
        const mr = plus(joint.moment, axis, -dot(joint.moment, axis));
        const scale = size(A.radialVector) + size(B.radialVector) + 1e-9;
        expect(size(plus(plus(A.radialVector, B.radialVector), fr, -1)) / scale).toBeLessThan(1e-11);
        const couple = plus(
          cross(axis.map((v) => v * support.stationA) as never, A.radialVector),
          cross(axis.map((v) => v * support.stationB) as never, B.radialVector),
        );
        expect(size(plus(couple, mr, -1)) / scale).toBeLessThan(1e-11);
        expect(Math.abs(dot(A.radialVector, axis)) / scale).toBeLessThan(1e-12);
        expect(Math.abs(size(A.radialVector) - A.radial) / scale).toBeLessThan(1e-12);
        expect(joint.torque).toBeCloseTo(dot(joint.moment, axis), 9);
        const thrust = dot(joint.force, axis);
        expect(A.axial + B.axial).toBeCloseTo(thrust, 9);
        if (support.thrust === 'A') expect(B.axial).toBe(0);
        if (support.thrust === 'B') expect(A.axial).toBe(0);
        if (support.thrust === 'both') {
          expect(A.axial).toBeGreaterThanOrEqual(0);
          expect(B.axial).toBeLessThanOrEqual(0);
        }
      });
    }
  });

  it('takes the worst direction of a free tip force for each bearing: never less than any direction tried (seeds 1–20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const arm = randomArm(seed, { joints: 1 + (seed % 5), force: 'any', drives: seed % 2 === 0 });
      const chain = flattenArm(arm);
      const pose = randomPose(arm, seed);
      const [result] = poseArm(arm, chain, pose);
      expect(result!.free).toBe('the direction of the tip force');
      const random = seededRandom(seed);
      const magnitude = arm.cases[0]!.tipForce!.magnitude;
      let closest = 0;
      for (let k = 0; k < 150; k++) {
        const unit = random.direction();
        const [fixed] = poseArm(
          { ...arm },
          flattenArm({ ...arm, cases: [{ ...arm.cases[0]!, tipForce: { magnitude, direction: 'base', unit } }] }),
          pose,
        );
        fixed!.joints.forEach((joint, i) => {
          for (const name of ['A', 'B'] as const) {
            const worst = result!.joints[i]!.bearings[name]!;
            const here = joint.bearings[name]!;
            expect(here.radial).toBeLessThanOrEqual(worst.radial * (1 + 1e-12));
            expect(Math.abs(here.axial)).toBeLessThanOrEqual(Math.abs(worst.axial) * (1 + 1e-12) + 1e-9);
            closest = Math.max(closest, here.radial / worst.radial);
          }
        });
      }
      expect(closest).toBeGreaterThan(0.95);
      const still = new Float64Array(WRENCH * chain.n);
      staticLoads(chain, chain.cases[0]!, pose, still, poseScratch(chain.n));
      result!.joints.forEach((joint, i) => {
        expect(joint.torque).toBe(still[WRENCH * i + 5]);
      });
    }
  });

  it('takes the worst of motion for each bearing: never less than any rates within the limits (seeds 1–12)', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const arm = randomArm(seed, { joints: 1 + (seed % 4), motion: true });
      const chain = flattenArm(arm);
      const pose = randomPose(arm, seed);
      const [result] = poseArm(arm, chain, pose);
      const random = seededRandom(seed);
      const load = chain.cases[0]!;
      const out = new Float64Array(WRENCH * chain.n);
      for (let k = 0; k < 120; k++) {
        const corner = (limit: number) =>
          limit * (random.next() < 0.7 ? Math.sign(random.between(-1, 1)) : random.between(-1, 1));
        const rates = { speed: Array.from(load.speed!, corner), accel: Array.from(load.accel!, corner) };
        dynamicLoads(chain, load, pose, rates, out, poseScratch(chain.n));
        arm.joints.forEach((joint, i) => {
          const { stationA, stationB } = joint.support as PairSupport;
          const w = out.subarray(WRENCH * i, WRENCH * i + WRENCH);
          const span = stationB - stationA;
          // A = (zB f + z × m)/(zB - zA) with z × m = (-my, mx)
          const a = Math.hypot((stationB * w[0]! - w[4]!) / span, (stationB * w[1]! + w[3]!) / span);
          const b = Math.hypot((stationA * w[0]! - w[4]!) / span, (stationA * w[1]! + w[3]!) / span);
          expect(a).toBeLessThanOrEqual(result!.joints[i]!.bearings.A!.radial * (1 + 1e-12));
          expect(b).toBeLessThanOrEqual(result!.joints[i]!.bearings.B!.radial * (1 + 1e-12));
        });
      }
    }
  });

  it('loads a ring bearing with force and moment, and a joint without support with nothing', () => {
    const arm = randomArm(4, { joints: 2 });
    const ring = { arrangement: 'ring', hub: 0.01, station: 0.02, bearing: null, shaft: null } as const;
    const joints = [
      { ...arm.joints[0]!, support: ring },
      { ...arm.joints[1]!, support: null },
    ];
    const changed = { ...arm, joints };
    const [result] = poseArm(changed, flattenArm(changed), [0.3, -0.4]);
    const [first, second] = result!.joints;
    expect(Object.keys(first!.bearings)).toEqual(['ring']);
    expect(second!.bearings).toEqual({});
    const { axis } = joints[0]!;
    const load = first!.bearings.ring!;
    expect(load.axial).toBeCloseTo(dot(first!.force, axis), 9);
    // moment about the ring centre: m - s z × f, its part across the axis
    const about = plus(first!.moment, cross(axis, first!.force), -0.02);
    expect(load.moment).toBeCloseTo(size(plus(about, axis, -dot(about, axis))), 9);
    expect(load.radial).toBeCloseTo(size(cross(axis, first!.force)), 9);
  });

  it('refuses a pose of the wrong length, and shows a pose that is no number as failed', () => {
    const arm = randomArm(5, { joints: 2 });
    const chain = flattenArm(arm);
    expect(() => poseArm(arm, chain, [0])).toThrow(RangeError);
    const [result] = poseArm(arm, chain, [Number.NaN, 0]);
    expect(result!.joints[0]!.bearings.A!.radial).toBeNaN();
  });
});

describe('outsideTravel', () => {
  it('names the joints outside, forgives rounding, and knows no outside of a full turn', () => {
    const arm = randomArm(6, { joints: 2 });
    const joints = [
      { ...arm.joints[0]!, travel: { from: -1, to: 1, full: false } },
      { ...arm.joints[1]!, travel: { from: -Math.PI, to: Math.PI, full: true } },
    ];
    const chain = flattenArm({ ...arm, joints });
    expect(outsideTravel(chain, [1 + 1e-12, 40])).toEqual([]);
    expect(outsideTravel(chain, [1.01, 0])).toEqual([{ joint: 'joint 1', angle: 1.01, from: -1, to: 1 }]);
    expect(outsideTravel(chain, [-1.01, 0])).toHaveLength(1);
    expect(outsideTravel(chain, [Number.NaN, 0])).toHaveLength(1);
  });
});
