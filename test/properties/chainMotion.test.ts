/** In motion: the momentum and energy of the bodies, counted in the base frame, against the loads on the joints. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Arm, Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { withFixedJoints, withFullInertia } from '../armVariants.ts';
import { randomArm } from '../randomArm.ts';
import {
  add,
  atJoint,
  cross,
  dot,
  energy,
  less,
  outboardMomentum,
  scaled,
  type WorldArm,
  worldArm,
  worldTipForce,
} from '../worldArm.ts';
import { expectSameLoads, jointLoads, type Loads, loadsApart, poseIn } from './jointLoads.ts';

interface Moving {
  seed: number;
  arm: Arm;
  pose: number[];
  speed: number[];
  accel: number[];
}

/** An arm of any size and mass (1e-3 to 1e3 in each) with all inertias, somewhere in its travel and moving. */
const moving: fc.Arbitrary<Moving> = fc
  .record({
    seed: fc.nat(100_000),
    joints: fc.integer({ min: 1, max: 7 }),
    length: fc.integer({ min: -3, max: 3 }),
    mass: fc.integer({ min: -3, max: 3 }),
    force: fc.constantFrom('none' as const, 'base' as const, 'tool' as const),
    fixed: fc.boolean(),
  })
  .map(({ seed, joints, length, mass, force, fixed }) => {
    const plain = randomArm(seed, { joints, force, size: 0.4 * 10 ** length, mass: 3 * 10 ** mass });
    const whole = withFullInertia(plain, seed);
    const arm = fixed ? withFixedJoints(whole, seed) : whole;
    const random = seededRandom(seed + 9);
    const pose = poseIn(arm, seed);
    const speed = pose.map(() => random.between(-3, 3));
    const accel = pose.map(() => random.between(-10, 10));
    return { seed, arm, pose, speed, accel };
  });

/** d/dt at t = 0 of what `of` says along q + q̇ t + q̈ t²/2: sixth-order central difference, error near 1e-12. */
function rate<T extends readonly number[]>({ arm, pose, speed, accel }: Moving, of: (world: WorldArm) => T): T {
  const step = 1e-3;
  const weights = [1 / 60, -3 / 20, 3 / 4];
  let sum: number[] | null = null;
  for (const [k, t] of [3, 2, 1].entries()) {
    for (const side of [-1, 1]) {
      const time = side * t * step;
      const q = pose.map((p, i) => p + speed[i]! * time + (accel[i]! * time * time) / 2);
      const v = speed.map((s, i) => s + accel[i]! * time);
      const at = of(worldArm(arm, arm.cases[0]!, q, v));
      const before: readonly number[] = sum ?? at.map(() => 0);
      sum = at.map((x, i) => before[i]! + (side * weights[k]! * x) / step);
    }
  }
  return sum as unknown as T;
}

describe('joint loads in motion', () => {
  it('are weight and tip force less the rate of momentum outboard (fast-check seed 20011)', () => {
    fc.assert(
      fc.property(moving, (state) => {
        const { arm, pose, speed, accel } = state;
        const load = arm.cases[0]!;
        const world = worldArm(arm, load, pose, speed);
        const push = worldTipForce(world, load);
        const expected: Loads = world.joints.map((joint, i) => {
          const change = rate(state, (w) => {
            const { linear, angular } = outboardMomentum(w, i);
            return [...linear, ...angular];
          });
          let force = less(push, change.slice(0, 3) as unknown as Vec3);
          let moment = less(cross(world.tip, push), change.slice(3) as unknown as Vec3);
          for (const body of world.bodies) {
            if (body.joints <= i) continue;
            const weight = scaled(arm.gravity, body.mass);
            force = add(force, weight);
            moment = add(moment, cross(body.centre, weight));
          }
          return atJoint(joint, force, moment, [0, 0, 0]);
        });
        expectSameLoads(jointLoads(arm, pose, { rates: { speed, accel } }), expected, 1e-9);
      }),
      { numRuns: 60, seed: 20_011 },
    );
  });

  it('spend what the energy gains: drives plus tip force, against kinetic and potential (fast-check seed 20012)', () => {
    fc.assert(
      fc.property(moving, (state) => {
        const { arm, pose, speed, accel } = state;
        const load = arm.cases[0]!;
        const world = worldArm(arm, load, pose, speed);
        const [kinetic, potential] = rate(state, (w) => {
          const e = energy(w, arm.gravity);
          return [e.kinetic, e.potential] as const;
        });
        const loads = jointLoads(arm, pose, { rates: { speed, accel } });
        // A drive holds against the joint load's moment about the axis.
        const powers = world.joints.map(
          (joint, i) => -dot(loads[i]!.moment, arm.joints[joint.index]!.axis) * speed[i]!,
        );
        const drives = powers.reduce((sum, p) => sum + p, 0);
        const tip = dot(worldTipForce(world, load), world.tipVelocity);
        const sizes = [...powers, kinetic, potential, tip].map(Math.abs);
        expect(Math.abs(drives + tip - kinetic - potential)).toBeLessThan(1e-9 * Math.max(...sizes));
      }),
      { numRuns: 60, seed: 20_012 },
    );
  });

  it('are the loads at rest where nothing moves (fast-check seed 20013)', () => {
    fc.assert(
      fc.property(moving, ({ arm, pose }) => {
        const zero = pose.map(() => 0);
        expectSameLoads(jointLoads(arm, pose, { rates: { speed: zero, accel: zero } }), jointLoads(arm, pose), 1e-12);
      }),
      { numRuns: 100, seed: 20_013 },
    );
  });

  it('are affine in the accelerations and even in the speeds, which add as a quadratic (fast-check seed 20014)', () => {
    fc.assert(
      fc.property(moving, fc.double({ min: -3, max: 3, noNaN: true }), ({ arm, pose, speed, accel }, k) => {
        const zero = pose.map(() => 0);
        const at = (s: number, a: number) =>
          jointLoads(arm, pose, { rates: { speed: speed.map((v) => s * v), accel: accel.map((v) => a * v) } });
        const rest = jointLoads(arm, pose, { rates: { speed: zero, accel: zero } });
        expectSameLoads(at(-1, 1), at(1, 1), 1e-12);
        const [spinning, pushed, both] = [at(1, 0), at(0, 1), at(k, k)];
        const sum = rest.map((load, i) => {
          const part = (which: 'force' | 'moment') =>
            add(
              load[which],
              add(
                scaled(less(spinning[i]![which], load[which]), k * k),
                scaled(less(pushed[i]![which], load[which]), k),
              ),
            );
          return { force: part('force'), moment: part('moment') };
        });
        expectSameLoads(both, sum, 1e-11);
      }),
      { numRuns: 100, seed: 20_014 },
    );
  });

  it('differ from those at rest wherever the arm moves (seeds 1–20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const arm = randomArm(seed, { joints: 4 });
      const pose = poseIn(arm, seed);
      const rates = { speed: [1, 1, 1, 1], accel: [0, 0, 0, 0] };
      expect(loadsApart(jointLoads(arm, pose, { rates }), jointLoads(arm, pose))).toBeGreaterThan(1e-4);
    }
  });
});
