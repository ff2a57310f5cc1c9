/** At rest: what a joint carries is the weight and tip force of all that stands outboard of it, at every scale. */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Arm, Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import {
  times,
  transposed,
  turned,
  turnedArm,
  turnedInertia,
  withFixedJoints,
  withFullInertia,
} from '../armVariants.ts';
import { randomArm, randomRotation } from '../randomArm.ts';
import { add, atJoint, cross, less, scaled, turnAbout, worldArm, worldTipForce } from '../worldArm.ts';
import { expectSameLoads, jointLoads, type Loads, poseIn } from './jointLoads.ts';

const FORCES = ['none', 'base', 'tool', 'any'] as const;
/** An arm of any size and mass, 1e-3 to 1e3 in each, with or without fixed joints. */
const anyArm = fc
  .record({
    seed: fc.nat(100_000),
    joints: fc.integer({ min: 1, max: 9 }),
    length: fc.integer({ min: -3, max: 3 }),
    mass: fc.integer({ min: -3, max: 3 }),
    force: fc.constantFrom(...FORCES),
    fixed: fc.boolean(),
  })
  .map(({ seed, joints, length, mass, force, fixed }) => {
    const arm = withFullInertia(
      randomArm(seed, { joints, force, size: 0.4 * 10 ** length, mass: 3 * 10 ** mass }),
      seed,
    );
    return { seed, arm: fixed ? withFixedJoints(arm, seed) : arm };
  });

const runs = { numRuns: 150, seed: 20_001 };

describe('joint loads at rest', () => {
  it('balance every outboard sub-chain: weights and tip force from world positions (fast-check seed 20001)', () => {
    fc.assert(
      fc.property(anyArm, ({ seed, arm }) => {
        const load = arm.cases[0]!;
        const pose = poseIn(arm, seed);
        const any = load.tipForce?.direction === 'any' ? seededRandom(seed).direction() : null;
        const world = worldArm(arm, load, pose);
        const push = worldTipForce(world, load, any);
        const expected: Loads = world.joints.map((joint, i) => {
          let force = push;
          let moment = cross(world.tip, push);
          for (const body of world.bodies) {
            if (body.joints <= i) continue;
            const weight = scaled(arm.gravity, body.mass);
            force = add(force, weight);
            moment = add(moment, cross(body.centre, weight));
          }
          return atJoint(joint, force, moment, [0, 0, 0]);
        });
        expectSameLoads(jointLoads(arm, pose, { any }), expected, 1e-11);
      }),
      runs,
    );
  });

  it('do not change when arm and gravity turn together (fast-check seed 20002)', () => {
    fc.assert(
      fc.property(anyArm, ({ seed, arm }) => {
        const by = randomRotation(seededRandom(seed + 1));
        const pose = poseIn(arm, seed);
        const any = arm.cases[0]!.tipForce?.direction === 'any' ? seededRandom(seed).direction() : null;
        const plain = jointLoads(arm, pose, { any });
        expectSameLoads(jointLoads(turnedArm(arm, by), pose, { any: any && turned(by, any) }), plain, 1e-12);
      }),
      { ...runs, seed: 20_002 },
    );
  });

  it('are linear in the masses: twice the sum of two arms is the sum of twice each (fast-check seed 20003)', () => {
    fc.assert(
      fc.property(anyArm, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), ({ seed, arm }, k) => {
        const pose = poseIn(arm, seed);
        const random = seededRandom(seed + 2);
        const shares = arm.joints.map(() => random.next());
        const one = withoutForce(withMasses(arm, (mass, i) => mass * shares[i]!));
        const rest = withoutForce(withMasses(arm, (mass, i) => mass * (1 - shares[i]!)));
        const [a, b] = [jointLoads(one, pose), jointLoads(rest, pose)];
        const sum = a.map((load, i) => ({
          force: scaled(add(load.force, b[i]!.force), k),
          moment: scaled(add(load.moment, b[i]!.moment), k),
        }));
        // The payload is in both halves in full, so the whole has it twice.
        const whole = withoutForce(withMasses(arm, (mass) => k * mass, 2 * k));
        expectSameLoads(jointLoads(whole, pose), sum, 1e-12);
      }),
      { ...runs, seed: 20_003 },
    );
  });

  it('keep the force and scale the moment with lengths (fast-check seed 20004)', () => {
    fc.assert(
      fc.property(anyArm, fc.double({ min: 1e-3, max: 1e3, noNaN: true }), ({ seed, arm }, k) => {
        const pose = poseIn(arm, seed);
        const expected = jointLoads(arm, pose).map((load) => ({ ...load, moment: scaled(load.moment, k) }));
        expectSameLoads(jointLoads(withLengths(arm, k), pose), expected, 1e-12);
      }),
      { ...runs, seed: 20_004 },
    );
  });

  it('grow with the factor of the case, whatever is in it (fast-check seed 20005)', () => {
    fc.assert(
      fc.property(anyArm, fc.double({ min: 0.1, max: 10, noNaN: true }), ({ seed, arm }, factor) => {
        const load = arm.cases[0]!;
        const both: Arm = {
          ...arm,
          cases: [
            { ...load, factor: 1 },
            { ...load, factor },
          ],
        };
        const pose = poseIn(arm, seed);
        const any = load.tipForce?.direction === 'any' ? seededRandom(seed).direction() : null;
        const expected = jointLoads(both, pose, { any }).map(({ force, moment }) => ({
          force: scaled(force, factor),
          moment: scaled(moment, factor),
        }));
        expectSameLoads(jointLoads(both, pose, { any, of: 1 }), expected, 1e-12);
      }),
      { ...runs, seed: 20_005 },
    );
  });

  it('are those of the arm with its fixed links merged by hand (fast-check seed 20006)', () => {
    fc.assert(
      fc.property(anyArm, ({ seed, arm }) => {
        const fixed = withFixedJoints(arm, seed);
        const pose = poseIn(fixed, seed);
        const merged = mergedByHand(fixed);
        expect(merged.joints.every((joint) => joint.kind === 'revolute')).toBe(true);
        // Housing frames of the merged arm are the same frames, so the loads are the same numbers.
        expectSameLoads(jointLoads(fixed, pose), jointLoads(merged, pose), 1e-12);
      }),
      { ...runs, seed: 20_006 },
    );
  });

  it('are those of the arm with every axis made the z axis of its frame (fast-check seed 20007)', () => {
    fc.assert(
      fc.property(anyArm, ({ seed, arm }) => {
        const pose = poseIn(arm, seed);
        const { along, turns } = axesAlongZ(arm, seed);
        const revolute = turns.filter((_, k) => arm.joints[k]!.kind === 'revolute');
        const expected = jointLoads(along, pose).map(({ force, moment }, i) => ({
          force: turned(revolute[i]!, force),
          moment: turned(revolute[i]!, moment),
        }));
        expectSameLoads(jointLoads(arm, pose), expected, 1e-12);
      }),
      { ...runs, seed: 20_007 },
    );
  });

  it('put a base-fixed tip force on every joint whole, and a tool-fixed one with the tool (seeds 1–20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const arm = weightless(
        randomArm(seed, { joints: 1 + (seed % 6), force: seed % 2 ? 'base' : 'tool', payload: false }),
      );
      const load = arm.cases[0]!;
      for (const { force } of jointLoads(arm, poseIn(arm, seed))) {
        expect(Math.hypot(...force) / (load.factor * load.tipForce!.magnitude)).toBeCloseTo(1, 12);
      }
      // Tool-fixed: the moment on the last joint is the same in the link's frame at every pose.
      if (load.tipForce!.direction !== 'tool') continue;
      const n = arm.joints.length;
      const inLink = [poseIn(arm, 1), poseIn(arm, 2)].map((pose) => {
        const wrench = jointLoads(arm, pose)[n - 1]!;
        return turned(transposed(turnAbout(arm.joints[n - 1]!.axis, pose[n - 1]!)), wrench.moment);
      });
      expect(Math.hypot(...less(inLink[0]!, inLink[1]!))).toBeLessThan(1e-12 * Math.hypot(...inLink[0]!) + 1e-300);
    }
  });

  it('leave out what stands on the ground before the first revolute joint', () => {
    const arm = randomArm(5, { joints: 3 });
    const base = { ...arm.joints[0]!, kind: 'fixed' as const, support: null };
    const heavy = (mass: number): Arm => ({
      ...arm,
      joints: [{ ...base, link: { ...base.link, mass } }, ...arm.joints],
    });
    expect(jointLoads(heavy(1000), [0.1, 0.2, 0.3])).toEqual(jointLoads(heavy(0), [0.1, 0.2, 0.3]));
  });

  it('refuse an arm without a revolute joint', () => {
    const arm = randomArm(1, { joints: 1 });
    const stiff: Arm = { ...arm, joints: [{ ...arm.joints[0]!, kind: 'fixed' }] };
    expect(() => flattenArm(stiff)).toThrow(RangeError);
  });
});

function withMasses(arm: Arm, mass: (mass: number, index: number) => number, payload = 1): Arm {
  return {
    ...arm,
    joints: arm.joints.map((joint, i) => ({ ...joint, link: { ...joint.link, mass: mass(joint.link.mass, i) } })),
    cases: arm.cases.map((load) => ({
      ...load,
      payload: load.payload && { ...load.payload, mass: payload * load.payload.mass },
    })),
  };
}

function withoutForce(arm: Arm): Arm {
  return { ...arm, cases: arm.cases.map((load) => ({ ...load, tipForce: null })) };
}

function weightless(arm: Arm): Arm {
  return { ...arm, gravity: [0, 0, 0] };
}

function withLengths(arm: Arm, k: number): Arm {
  const far = (v: Vec3) => scaled(v, k);
  return {
    ...arm,
    joints: arm.joints.map((joint) => ({
      ...joint,
      placement: { ...joint.placement, position: far(joint.placement.position) },
      link: { ...joint.link, centre: far(joint.link.centre) },
    })),
    tip: { ...arm.tip, position: far(arm.tip.position) },
    cases: arm.cases.map((load) => ({
      ...load,
      payload: load.payload && { ...load.payload, centre: far(load.payload.centre) },
    })),
  };
}

/** Fixed links lumped into the link before them: mass and centre (enough at rest), frames of later joints composed. */
function mergedByHand(arm: Arm): Arm {
  const joints: Arm['joints'][number][] = [];
  // Where the present file link stands in the frame of the last revolute link (or of the base).
  let at: Arm['tip'] = { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] };
  for (const joint of arm.joints) {
    at = {
      position: add(at.position, turned(at.rotation, joint.placement.position)),
      rotation: times(at.rotation, joint.placement.rotation),
    };
    if (joint.kind === 'revolute') {
      joints.push({ ...joint, placement: at });
      at = { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] };
      continue;
    }
    const host = joints.pop();
    if (!host) continue;
    const centre = add(at.position, turned(at.rotation, joint.link.centre));
    const mass = host.link.mass + joint.link.mass;
    const middle = scaled(add(scaled(host.link.centre, host.link.mass), scaled(centre, joint.link.mass)), 1 / mass);
    joints.push({ ...host, link: { name: host.link.name, mass, centre: middle, inertia: null } });
  }
  const tip = {
    position: add(at.position, turned(at.rotation, arm.tip.position)),
    rotation: times(at.rotation, arm.tip.rotation),
  };
  return { ...arm, joints, tip };
}

/** The same arm with the frame of each joint turned (by `turns`, new to old) so that its axis is z. */
function axesAlongZ(arm: Arm, seed: number): { along: Arm; turns: ReturnType<typeof times>[] } {
  const random = seededRandom(seed + 3);
  const turns = arm.joints.map(({ axis }) => {
    const other = random.direction();
    const x = unit(cross(other, axis));
    const y = cross(axis, x);
    return [x[0], y[0], axis[0], x[1], y[1], axis[1], x[2], y[2], axis[2]] as ReturnType<typeof times>;
  });
  const joints = arm.joints.map((joint, k) => {
    const before = k === 0 ? null : transposed(turns[k - 1]!);
    const back = transposed(turns[k]!);
    const { position, rotation } = joint.placement;
    return {
      ...joint,
      axis: [0, 0, 1] as const,
      placement: {
        position: before ? turned(before, position) : position,
        rotation: times(before ? times(before, rotation) : rotation, turns[k]!),
      },
      link: {
        ...joint.link,
        centre: turned(back, joint.link.centre),
        inertia: joint.link.inertia && turnedInertia(back, joint.link.inertia),
      },
    };
  });
  const last = transposed(turns[turns.length - 1]!);
  const tip = { position: turned(last, arm.tip.position), rotation: times(last, arm.tip.rotation) };
  return { along: { ...arm, joints, tip }, turns };
}

function unit(v: Vec3): Vec3 {
  return scaled(v, 1 / Math.hypot(...v));
}
