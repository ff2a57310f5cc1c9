/** How an arm is flattened: canonical frames, bodies, reach, and the checker of what kernels take for granted. */
import { describe, expect, it } from 'vitest';
import type { Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { assertChain, type Chain, casePayload, flattenArm, housingReference } from '../../src/mechanics/chain.ts';
import { poseScratch, tipReach } from '../../src/mechanics/newtonEuler.ts';
import { transposed, turned, withFixedJoints, withFullInertia } from '../armVariants.ts';
import { randomArm } from '../randomArm.ts';
import { cross, dot, less, size, worldArm } from '../worldArm.ts';
import { poseIn } from './jointLoads.ts';

const column = (m: Float64Array, at: number, c: number): Vec3 => [m[at + c]!, m[at + 3 + c]!, m[at + 6 + c]!];

describe('the flattened chain', () => {
  it('stands each housing on its axis, from the frame’s x axis or, near it, the y axis (seed 21)', () => {
    const random = seededRandom(21);
    const axes: Vec3[] = [[1, 0, 0], [-1, 0, 0], [0, 1, 0], [0, 0, 1], [0, 0, -1]]; // biome-ignore format: one row
    for (const c of [0.899, -0.899, 0.901, -0.901]) axes.push([c, 0, Math.sqrt(1 - c * c)]);
    for (let k = 0; k < 100; k++) axes.push(random.direction());
    for (const axis of axes) {
      const x = housingReference(axis);
      expect(Math.abs(size(x) - 1)).toBeLessThan(1e-14);
      expect(Math.abs(dot(x, axis))).toBeLessThan(1e-14);
      const from: Vec3 = Math.abs(axis[0]) < 0.9 ? [1, 0, 0] : [0, 1, 0];
      // In the plane of the axis and the frame's own axis, on its side.
      expect(Math.abs(dot(x, cross(axis, from)))).toBeLessThan(1e-14);
      expect(dot(x, from)).toBeGreaterThan(0.4);
      const arm = randomArm(1, { joints: 1 });
      const { housing } = flattenArm({ ...arm, joints: [{ ...arm.joints[0]!, axis }] });
      expect(size(less(column(housing, 0, 0), x))).toBeLessThan(1e-15);
      expect(size(less(column(housing, 0, 1), cross(axis, x)))).toBeLessThan(1e-15);
      expect(size(less(column(housing, 0, 2), axis))).toBe(0);
    }
  });

  it('reaches the tip from each joint as the frames of the file do (seeds 1–60)', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const plain = randomArm(seed, { joints: 1 + (seed % 8) });
      const arm = seed % 2 ? withFixedJoints(plain, seed) : plain;
      const chain = flattenArm(arm);
      const pose = poseIn(arm, seed);
      const out = new Float64Array(3 * chain.n);
      tipReach(chain, pose, out, poseScratch(chain.n));
      const world = worldArm(arm, arm.cases[0]!, pose);
      world.joints.forEach((joint, i) => {
        const expected = turned(transposed(joint.housing), less(world.tip, joint.origin));
        const [x, y, z] = out.subarray(3 * i, 3 * i + 3) as unknown as Vec3;
        const h = chain.housing.subarray(9 * i, 9 * i + 9);
        const reached: Vec3 = [0, 3, 6].map((r) => h[r]! * x + h[r + 1]! * y + h[r + 2]! * z) as unknown as Vec3;
        expect(size(less(reached, expected))).toBeLessThan(1e-13);
      });
    }
  });

  it('carries the masses of its bodies and payload, times the factor (seeds 1–40)', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const arm = withFullInertia(withFixedJoints(randomArm(seed, { joints: 1 + (seed % 5) }), seed), seed);
      const chain = flattenArm(arm);
      const [load, chained] = [arm.cases[0]!, chain.cases[0]!];
      const payload = casePayload(chain, load)!;
      expect(payload).toMatchObject({ name: 'payload', link: chain.n - 1, mass: load.payload!.mass });
      for (let i = 0; i < chain.n; i++) {
        const here = [...chain.bodies, payload].filter(({ link }) => link === i);
        const sum = (of: (body: (typeof here)[number]) => number) => load.factor * here.reduce((s, b) => s + of(b), 0);
        expect(Math.abs(chained.mass[i]! - sum((b) => b.mass))).toBeLessThan(1e-13);
        for (let k = 0; k < 3; k++) {
          expect(Math.abs(chained.first[3 * i + k]! - sum((b) => b.first[k]!))).toBeLessThan(1e-13);
        }
        for (let k = 0; k < 6; k++) {
          expect(Math.abs(chained.inertia[6 * i + k]! - sum((b) => b.inertia[k]!))).toBeLessThan(1e-13);
        }
      }
      const links = arm.joints
        .slice(arm.joints.findIndex(({ kind }) => kind === 'revolute'))
        .map(({ link }) => link.name);
      expect(chain.bodies.map(({ name }) => name)).toEqual(links);
      expect(casePayload(chain, { ...load, payload: null })).toBeNull();
    }
  });

  it('has a checker that finds what is not a rotation, a mirrored frame, and travel that runs backwards', () => {
    const chain = flattenArm(randomArm(4, { joints: 3 }));
    const spoilt = (change: (copy: Chain) => void) => {
      const copy = structuredClone(chain);
      change(copy);
      return () => assertChain(copy);
    };
    expect(spoilt(() => {})).not.toThrow();
    for (const frames of ['rotation', 'housing'] as const) {
      expect(spoilt((c) => c[frames].fill(0, 9, 12))).toThrow('joint 1: not a rotation');
      expect(
        spoilt((c) => {
          c[frames][13]! += 1e-9;
        }),
      ).toThrow('joint 1: not a rotation');
      expect(
        spoilt((c) => {
          for (let k = 18; k < 27; k++) c[frames][k] = -c[frames][k]!;
        }),
      ).toThrow('joint 2: not a rotation');
    }
    expect(spoilt((c) => c.tipRotation.fill(Number.NaN))).toThrow('tip: not a rotation');
    expect(
      spoilt((c) => {
        c.from[0] = c.to[0]! + 1e-9;
      }),
    ).toThrow('joint 0: travel runs backwards');
    expect(spoilt((c) => c.to.fill(Number.NaN))).toThrow('joint 0: travel runs backwards');
  });
});
