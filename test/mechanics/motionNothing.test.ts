import { describe, expect, it } from 'vitest';
import type { Arm, Joint, Vec3 } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { nothingBound } from '../../src/mechanics/motionNothing.ts';
import { randomArm } from '../randomArm.ts';
import { Plain, randomFree, randomPose } from '../worst/adversary.ts';

const EYE = [1, 0, 0, 0, 1, 0, 0, 0, 1] as const;

/** Two joints turning slowly; the second axis stands `tilt` from the first, which stands as far from upright, less `short`. */
function leaning(tilt: number, short: number, turn: number): Arm {
  const template = randomArm(1, { joints: 1 });
  const joint = (name: string, axis: Vec3, mass: number): Joint => ({
    ...template.joints[0]!,
    name,
    placement: { position: [0, 0, 0], rotation: EYE },
    axis,
    travel: { from: -Math.PI, to: Math.PI, full: true },
    link: { name, mass, centre: [0, 0, 0], inertia: { xx: 0, yy: 0, zz: 0, xy: 0, xz: 0, yz: 0 } },
    support: null,
    drive: null,
  });
  const first = Math.PI / 2 - tilt + short;
  const gravity: Vec3 = [
    9.80665 * Math.sin(first) * Math.cos(turn),
    9.80665 * Math.sin(first) * Math.sin(turn),
    -9.80665 * Math.cos(first),
  ];
  return {
    ...template,
    gravity,
    joints: [joint('one', [0, 0, 1], 0), joint('two', [Math.sin(tilt), 0, Math.cos(tilt)], 2)],
    cases: [
      {
        name: 'slowly',
        payload: null,
        tipForce: null,
        motion: { speed: [1e-3, 1e-3], accel: [1e-3, 1e-3] },
        factor: 1,
      },
    ],
  };
}

describe('a check that gives nothing at evenly spread poses', () => {
  it('is not called nothing where it only stays below nothing there: thrust that turns round within a few degrees', () => {
    // Gravity pushes along the second axis within some degrees of one angle of the first, against it everywhere else
    for (const turn of [0, 0.3, 0.6, 0.9, 1.2]) {
      const arm = leaning(Math.PI / 4, 0.002, turn);
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const plain = new Plain(chain, load);
      const thrusts = loadChecks(arm, chain).filter((check) => check.joint === 1 && check.check.startsWith('thrust'));
      expect(thrusts).toHaveLength(2);
      for (const check of thrusts) {
        let most = 0;
        for (let degree = 0; degree < 360; degree++) {
          plain.at([(degree * Math.PI) / 180 - Math.PI, 0], { tipForce: null, speed: [0, 0], accel: [0, 0] });
          most = Math.max(most, plain.value(check));
        }
        expect(most).toBeGreaterThan(1e-3);
        expect(nothingBound(chain, load, check, 1e-6)).toBeGreaterThanOrEqual(most);
      }
    }
  });

  it('is bounded where it is nothing, and by no less than anything met (seeds 1–20)', () => {
    let nothing = 0;
    for (let seed = 1; seed <= 20; seed++) {
      const arm = planar(seed);
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const plain = new Plain(chain, load);
      const random = seededRandom(seed);
      const pose = new Float64Array(chain.n);
      for (const check of loadChecks(arm, chain)) {
        const bound = nothingBound(chain, load, check, 1e-9);
        if (Number.isFinite(bound)) nothing++;
        for (let k = 0; k < 100; k++) {
          randomPose(chain, random, pose);
          plain.at(pose, randomFree(load, chain.n, random));
          expect(plain.value(check)).toBeLessThanOrEqual(bound);
        }
      }
    }
    // Thrust both ways on every joint at the least
    expect(nothing).toBeGreaterThan(40);
  });
});

/** A linkage that moves in its plane: no thrust. */
function planar(seed: number): Arm {
  const arm = randomArm(seed, { joints: 1 + (seed % 3), motion: true, payload: false });
  const flat = ([x, y]: Vec3): Vec3 => [x, y, 0];
  return {
    ...arm,
    gravity: [0, -9.80665, 0],
    joints: arm.joints.map((joint) => ({
      ...joint,
      axis: [0, 0, 1],
      placement: { position: flat(joint.placement.position), rotation: EYE },
      link: { ...joint.link, centre: flat(joint.link.centre) },
    })),
  };
}
