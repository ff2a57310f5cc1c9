import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { checkValue } from '../../src/mechanics/form.ts';
import { worstAtPose } from '../../src/mechanics/freeLoads.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { MotionSearch } from '../../src/mechanics/motionSearch.ts';
import { standsOff } from '../../src/mechanics/motionTerms.ts';
import { dynamicLoads, poseScratch } from '../../src/mechanics/newtonEuler.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import { randomArm } from '../randomArm.ts';

/** One joint with a level axis and a hub midway between its bearings, that swings a point mass of 3 kg on a bar of 0.5 m right round. */
function swing(speed: number, accel: number): Arm {
  const arm = randomArm(1, { joints: 1, motion: true });
  const joint = arm.joints[0]!;
  const none = { xx: 0, yy: 0, zz: 0, xy: 0, xz: 0, yz: 0 };
  return {
    ...arm,
    gravity: [0, 0, -9.80665],
    joints: [
      {
        ...joint,
        placement: { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
        axis: [0, 1, 0],
        travel: { from: -Math.PI, to: Math.PI, full: true },
        link: { name: 'bar', mass: 3, centre: [0.5, 0, 0], inertia: none },
        drive: null,
        support: {
          arrangement: 'clevis',
          hub: 0,
          span: 0.1,
          offset: 0,
          overhang: 0,
          side: '-',
          thrust: 'A',
          stationA: -0.05,
          stationB: 0.05,
          adjusted: null,
          bearingA: null,
          bearingB: null,
          shaft: null,
        },
      },
    ],
    cases: [{ ...arm.cases[0]!, payload: null, tipForce: null, factor: 1, motion: { speed: [speed], accel: [accel] } }],
  };
}

/** Links one after the other, all turning about level axes in one upright plane. */
function planar(joints: number): Arm {
  const one = swing(3, 20);
  const none = { xx: 0.02, yy: 0.03, zz: 0.03, xy: 0, xz: 0, yz: 0 };
  const link = (k: number) => ({
    ...one.joints[0]!,
    name: `joint ${k}`,
    placement: { ...one.joints[0]!.placement, position: [k > 0 ? 0.4 : 0, 0, 0] as const },
    link: { name: `link ${k}`, mass: 2 + k, centre: [0.2, 0, 0.01] as const, inertia: none },
  });
  const all = (value: number) => Array.from({ length: joints }, () => value);
  return {
    ...one,
    joints: Array.from({ length: joints }, (_, k) => link(k)),
    cases: [{ ...one.cases[0]!, motion: { speed: all(3), accel: all(20) } }],
  };
}

function searched(arm: Arm, name: string, bearing: 'A' | 'B' | null, gap: number, boxes = 40_000) {
  const chain = flattenArm(arm);
  const check = loadChecks(arm, chain).find((c) => c.check === name && c.bearing === bearing)!;
  const search = new MotionSearch(chain, chain.cases[0]!, check, { gap });
  search.step(boxes);
  return search;
}

describe('a bar swinging right round', () => {
  // half of m (g + r √(ω⁴ + α²)): weight, and what pulls outward and along, best together in one pose
  it.each([
    [0, 0],
    [4, 0],
    [0, 30],
    [4, 30],
  ])('loads both bearings alike at %d rad/s and %d rad/s²', (speed, accel) => {
    const radial = 0.5 * 3 * (9.80665 + 0.5 * Math.hypot(speed * speed, accel));
    const torque = 3 * (0.5 * 9.80665 + 0.25 * accel);
    const search = searched(swing(speed, accel), 'radial', 'A', 0.001);
    expect(search.found).toBeCloseTo(radial, 6);
    expect(search.bound).toBeGreaterThanOrEqual(radial * (1 - 1e-12));
    expect(search.bound).toBeLessThanOrEqual(radial / 0.999);
    const turning = searched(swing(speed, accel), 'torque+', null, 0.001);
    expect(turning.found).toBeCloseTo(torque, 6);
    expect(turning.bound).toBeLessThanOrEqual(torque / 0.999);
  });
});

describe('the certified worst in motion', () => {
  it.each(Array.from({ length: 12 }, (_, k) => k + 1))(
    'holds against random motions and closes: arm of seed %i',
    (seed) => {
      const force = (['none', 'any', 'base', 'tool'] as const)[seed % 4]!;
      const joints = 1 + (seed % 3);
      const arm = randomArm(seed, { joints, motion: true, force, drives: seed % 5 === 0, travel: 3 });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const random = seededRandom(seed + 5000);
      const scratch = poseScratch(chain.n);
      const wrenches = new Float64Array(6 * chain.n);
      for (const check of loadChecks(arm, chain).filter((_, k) => k % 6 === seed % 6)) {
        const search = new MotionSearch(chain, load, check, { gap: 0.02 });
        search.step(joints === 1 ? 30_000 : 2000);
        const { bound, found, pose, free, wrench } = search.state();
        const title = `${check.check} of joint ${check.joint}`;
        if (joints === 1) expect(bound - found, title).toBeLessThanOrEqual(0.02 * bound + 1e-9 * search.ceiling);
        const part = { speed: free!.speed!, accel: free!.accel! };
        dynamicLoads(chain, load, pose, part, wrenches, scratch, free!.tipForce ?? undefined);
        const at = 6 * check.joint;
        for (let k = 0; k < 6; k++) expect(wrench[k]!).toBeCloseTo(wrenches[at + k]!, 8);
        expect(Math.abs(checkValue(check, wrenches, at) - found), title).toBeLessThanOrEqual(1e-9 * search.ceiling);
        for (let k = 0; k < 300; k++) {
          const q = Float64Array.from(chain.from, (low, j) => random.between(low, chain.to[j]!));
          expect(worstAtPose(chain, load, q, check).value, title).toBeLessThanOrEqual(bound);
        }
      }
    },
  );

  it.each([1, 2, 3, 4])('knows that a linkage in a plane has no thrust and does not tilt: %i joints', (joints) => {
    const arm = planar(joints);
    const chain = flattenArm(arm);
    for (const check of loadChecks(arm, chain).filter((c) => c.check === 'thrust+' || c.check === 'moment')) {
      const search = new MotionSearch(chain, chain.cases[0]!, check, { gap: 0.001 });
      expect(search.done, check.check).toBe(true);
      expect(search.bound).toBeLessThanOrEqual(1e-9 * search.ceiling);
      // a centre of mass out of the plane tilts it
      const [first, ...rest] = arm.joints;
      const { link } = first!;
      const tilted: Arm = {
        ...arm,
        joints: [{ ...first!, link: { ...link, centre: [link.centre[0], 0.01, link.centre[2]] } }, ...rest],
      };
      const other = flattenArm(tilted);
      if (check.joint > 0 || check.check !== 'moment') continue;
      expect(new MotionSearch(other, other.cases[0]!, check, { gap: 0.5 }).found).toBeGreaterThan(0.01);
    }
  });

  it('tells what stands off its axis from what is balanced about it', () => {
    const arm = swing(1, 1);
    const chain = flattenArm(arm);
    // a point mass off the axis
    expect(standsOff(chain, chain.cases[0]!, 0)).toBeCloseTo(1, 12);
    const [joint] = arm.joints;
    const link = { ...joint!.link, centre: [0, 0.3, 0] as const, inertia: { ...joint!.link.inertia!, yy: 0.1 } };
    const balanced = flattenArm({ ...arm, joints: [{ ...joint!, link }] });
    expect(standsOff(balanced, balanced.cases[0]!, 0)).toBe(0);
  });

  it('keeps a bound that is one when its boxes run out', () => {
    const arm = randomArm(9, { joints: 4, motion: true });
    const chain = flattenArm(arm);
    const check = loadChecks(arm, chain).find((c) => c.check === 'radial' && c.joint === 1)!;
    const search = new MotionSearch(chain, chain.cases[0]!, check, { gap: 1e-3, most: 200 });
    search.step(100_000);
    expect(search.done).toBe(true);
    expect(search.bound).toBeGreaterThan(search.found / 0.999);
  });
});

describe('what is attained by rounding alone', () => {
  it('stands under a bound of nothing: a skew axis without gravity, thrust on a body that whirls', () => {
    const one = swing(1, 2);
    const arm: Arm = { ...one, gravity: [0, 0, 0], joints: [{ ...one.joints[0]!, axis: skew(-0.102, 0.922, -0.68) }] };
    const chain = flattenArm(arm);
    const checks = loadChecks(arm, chain);
    const search = new WorstCase(chain, chain.cases[0]!, checks);
    while (!search.begun) search.step(0.01);
    for (let k = 0; k < 60 && search.open(0.01); k++) search.step(0.01);
    for (const row of search.rows()) {
      expect(row.bound, row.check.check).toBeGreaterThanOrEqual(row.found);
      if (row.check.check.startsWith('thrust')) expect(row.bound).toBeLessThan(1e-6);
    }
  });
});

function skew(x: number, y: number, z: number): [number, number, number] {
  const size = Math.hypot(x, y, z);
  return [x / size, y / size, z / size];
}
