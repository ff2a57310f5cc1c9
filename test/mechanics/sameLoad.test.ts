import { describe, expect, it } from 'vitest';
import type { Arm, LoadCase } from '../../src/arm/arm.ts';
import { withLinkMass } from '../../src/arm/changeArm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { type LoadedChain, sameCheck, sameJointLoad } from '../../src/mechanics/sameLoad.ts';
import { randomArm } from '../randomArm.ts';
import { Plain, randomFree, randomPose } from '../worst/adversary.ts';
import { withCases, withJoints } from '../worst/armKinds.ts';

const JOINTS = 4;
/** The joint that a change is made at. */
const AT = 2;

function loaded(arm: Arm): LoadedChain {
  const chain = flattenArm(arm);
  return { chain, load: chain.cases[0]! };
}

const load = (change: Partial<LoadCase>) => (arm: Arm) => withCases(arm, (one) => ({ ...one, ...change }));

/** Changes of an arm, and the joints whose load stays with them: at rest, and in motion. */
const CHANGES: readonly {
  name: string;
  change: (arm: Arm) => Arm;
  rest: readonly number[];
  motion: readonly number[];
}[] = [
  { name: 'nothing', change: (arm) => structuredClone(arm), rest: [0, 1, 2, 3], motion: [0, 1, 2, 3] },
  { name: 'mass of a link', change: (arm) => withLinkMass(arm, AT, 9), rest: [3], motion: [3] },
  {
    name: 'centre of a link',
    change: (arm) =>
      withJoints(arm, (joint, k) => (k === AT ? { ...joint, link: { ...joint.link, centre: [0.1, 0, 0.2] } } : joint)),
    rest: [3],
    motion: [3],
  },
  {
    name: 'inertia of a link',
    change: (arm) =>
      withJoints(arm, (joint, k) =>
        k === AT ? { ...joint, link: { ...joint.link, inertia: { xx: 1, yy: 1, zz: 1, xy: 0, xz: 0, yz: 0 } } } : joint,
      ),
    rest: [0, 1, 2, 3],
    motion: [3],
  },
  {
    name: 'length before a joint',
    change: (arm) =>
      withJoints(arm, (joint, k) =>
        k === AT ? { ...joint, placement: { ...joint.placement, position: [0.1, 0.2, 0.3] } } : joint,
      ),
    rest: [2, 3],
    motion: [],
  },
  {
    name: 'travel of a joint',
    change: (arm) =>
      withJoints(arm, (joint, k) => (k === AT ? { ...joint, travel: { from: -1, to: 0.5, full: false } } : joint)),
    rest: [],
    motion: [],
  },
  { name: 'gravity', change: (arm) => ({ ...arm, gravity: [0, 0, -1.62] }), rest: [], motion: [] },
  { name: 'payload', change: load({ payload: null }), rest: [], motion: [] },
  { name: 'factor', change: load({ factor: 3 }), rest: [], motion: [] },
  {
    name: 'force at the tip',
    change: load({ tipForce: { magnitude: 7, direction: 'base', unit: [0, 0, 1] } }),
    rest: [],
    motion: [],
  },
  {
    name: 'force at the tip any way',
    change: load({ tipForce: { magnitude: 7, direction: 'any' } }),
    rest: [],
    motion: [],
  },
  { name: 'a joint less', change: (arm) => ({ ...arm, joints: arm.joints.slice(0, -1) }), rest: [], motion: [] },
];

describe('whether the load of a joint is the same', () => {
  for (const moving of [false, true]) {
    const what = moving ? 'in motion' : 'at rest';
    it.each(CHANGES)(`${what}: $name (seeds 1–3)`, ({ change, rest, motion }) => {
      for (let seed = 1; seed <= 3; seed++) {
        const arm = randomArm(seed, { joints: JOINTS, motion: moving, full: 0 });
        const [a, b] = [loaded(arm), loaded(change(arm))];
        const stays = Array.from({ length: JOINTS }, (_, joint) => joint).filter((joint) => sameJointLoad(a, b, joint));
        expect(stays).toEqual(moving ? motion : rest);
        expect(stays.map((joint) => sameJointLoad(b, a, joint))).toEqual(stays.map(() => true));
      }
    });

    it.each(CHANGES)(`${what}, the plain engine agrees: $name (seeds 11–13)`, ({ change }) => {
      for (let seed = 11; seed <= 13; seed++) {
        const arm = randomArm(seed, { joints: JOINTS, motion: moving, full: 0 });
        const [a, b] = [loaded(arm), loaded(change(arm))];
        if (b.chain.n !== JOINTS) continue;
        const random = seededRandom(seed);
        const pose = new Float64Array(JOINTS);
        const [one, other] = [new Plain(a.chain, a.load), new Plain(b.chain, b.load)];
        for (let k = 0; k < 50; k++) {
          randomPose(a.chain, random, pose);
          const free = randomFree(a.load, JOINTS, random);
          one.at(pose, free);
          other.at(pose, free);
          for (let joint = 0; joint < JOINTS; joint++) {
            if (!sameJointLoad(a, b, joint)) continue;
            expect(other.out.slice(6 * joint, 6 * joint + 6)).toEqual(one.out.slice(6 * joint, 6 * joint + 6));
          }
        }
      }
    });
  }
});

describe('whether two checks are the same', () => {
  const checks = (arm: Arm) => loadChecks(arm, flattenArm(arm));

  it('each is the same as itself made again, and as no other', () => {
    const arm = randomArm(21, { joints: 2, drives: true });
    const [made, again] = [checks(arm), checks(structuredClone(arm))];
    made.forEach((check, k) => {
      again.forEach((other, j) => {
        expect(sameCheck(check, other)).toBe(j === k);
      });
    });
  });

  it('every number of every form counts', () => {
    const check = checks(randomArm(22, { joints: 1, drives: true })).find((one) => one.check === 'radial')!;
    check.forms.forEach((form, k) => {
      const changed = [
        { ...form, o: form.o + 1 },
        { ...form, torqueFrom: -1, torqueTo: 1 },
        ...(['P', 'c', 'l'] as const).map((part) => ({
          ...form,
          [part]: form[part].map((v, j) => (j === 0 ? v + 1 : v)),
        })),
      ];
      for (const other of changed) {
        const forms = check.forms.map((one, j) => (j === k ? other : one));
        expect(sameCheck(check, { ...check, forms })).toBe(false);
      }
    });
    expect(sameCheck(check, { ...check, forms: check.forms.slice(1) })).toBe(false);
    expect(sameCheck(check, { ...check, unit: 'Pa' })).toBe(false);
  });
});
