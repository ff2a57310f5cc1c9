/** The list of load checks of an arm: which there are, in what order, and what each says of a wrench. */
import { describe, expect, it } from 'vitest';
import type { Arm, PairSupport, RingSupport, Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { checkValue } from '../../src/mechanics/form.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { withFixedJoints } from '../armVariants.ts';
import { randomArm } from '../randomArm.ts';
import { pairLoads, radial } from './pairLoads.ts';

const OF_JOINT = ['moment', 'torque', 'torque+', 'torque-', 'thrust+', 'thrust-'];

/** An arm of three joints: on a pair, on a ring, and without support; fixed joints between. */
function mixedArm(seed: number): Arm {
  const arm = randomArm(seed, { joints: 3, drives: true });
  const ring: RingSupport = { arrangement: 'ring', hub: 0, station: 0.03, bearing: null, shaft: null };
  const supports = [arm.joints[0]!.support, ring, null];
  return withFixedJoints({ ...arm, joints: arm.joints.map((joint, k) => ({ ...joint, support: supports[k]! })) }, seed);
}

describe('load checks', () => {
  it('run from ground to tip, bearings before joint, with joint indices of the chain (seed 3)', () => {
    const arm = mixedArm(3);
    const checks = loadChecks(arm, flattenArm(arm));
    const names = checks.map(({ joint, bearing, check }) => `${joint} ${bearing ?? '-'} ${check}`);
    expect(names).toEqual([
      '0 A radial',
      '0 A axial',
      '0 B radial',
      '0 B axial',
      ...OF_JOINT.map((check) => `0 - ${check}`),
      '1 ring radial',
      '1 ring axial',
      '1 ring moment',
      ...OF_JOINT.map((check) => `1 - ${check}`),
      ...OF_JOINT.map((check) => `2 - ${check}`),
    ]);
    for (const { check, unit } of checks) expect(unit).toBe(/moment|torque/.test(check) ? 'N·m' : 'N');
  });

  it('of a joint say its tilting moment, torque and thrust, by size and each way (seeds 1–50)', () => {
    for (let seed = 1; seed <= 50; seed++) {
      const random = seededRandom(seed);
      const w = Float64Array.from({ length: 6 }, () => random.between(-100, 100));
      const arm = mixedArm(seed);
      const values = new Map(
        loadChecks(arm, flattenArm(arm))
          .filter(({ joint }) => joint === 2)
          .map((check) => [check.check, checkValue(check, w, 0)]),
      );
      const [, , fz, mx, my, mz] = w as unknown as [number, number, number, number, number, number];
      expect(values.get('moment')).toBeCloseTo(Math.sqrt(mx * mx + my * my), 10);
      expect(values.get('torque')).toBe(Math.abs(mz));
      expect(values.get('torque+')).toBe(Math.max(mz, 0));
      expect(values.get('torque-')).toBe(Math.max(-mz, 0));
      expect(values.get('thrust+')).toBe(Math.max(fz, 0));
      expect(values.get('thrust-')).toBe(Math.max(-fz, 0));
    }
  });

  it('of a pair take its own stations, thrust and drive, wherever the wrench lies in its array (seeds 1–50)', () => {
    for (let seed = 1; seed <= 50; seed++) {
      const random = seededRandom(seed);
      const w = Float64Array.from({ length: 6 }, () => random.between(-100, 100));
      const arm = randomArm(seed, { joints: 1, drives: true });
      const { support, drive } = arm.joints[0]!;
      const { stationA, stationB, thrust } = support as PairSupport;
      const expected = pairLoads(w, stationA, stationB, thrust, drive);
      const longer = Float64Array.of(1, 2, 3, ...w, 4);
      for (const check of loadChecks(arm, flattenArm(arm))) {
        if (!check.bearing) continue;
        const load: Vec3 = expected[check.bearing as 'A' | 'B'];
        const value = check.check === 'radial' ? radial(load) : Math.abs(load[2]);
        expect(Math.abs(checkValue(check, longer, 3) - value)).toBeLessThanOrEqual(1e-12 * (1 + value));
      }
    }
  });
});
