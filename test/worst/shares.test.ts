/** Shares: they sum to the value of every kind of check, and each is what taking its cause away would take away. */
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { lineAlong, type Share, winningLine } from '../../src/mechanics/shares.ts';
import { type ArmShare, sharesOf } from '../../src/studies/sharesArm.ts';
import { withFixedJoints } from '../armVariants.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';
import { allChecks, nameOf, Plain, randomFree, randomPose } from './adversary.ts';
import { withCases, withJoints, withParts } from './armKinds.ts';
import { rowAt } from './rows.ts';

const KINDS: readonly (readonly [string, Omit<RandomArmOptions, 'joints'>])[] = [
  ['weights', {}],
  ['gears and belts', { drives: true }],
  ['a force any way, gears and belts', { drives: true, force: 'any' }],
  ['a force fixed in the tool', { force: 'tool' }],
  ['motion, a force in the base, gears and belts', { drives: true, force: 'base', motion: true }],
];

/** Every check of an arm at one pose with its shares. */
function* atPose(arm: Arm, seed: number) {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const random = seededRandom(seed);
  const pose = new Float64Array(chain.n);
  randomPose(chain, random, pose);
  const free = randomFree(load, chain.n, random);
  const plain = new Plain(chain, load);
  plain.at(pose, free);
  for (const check of allChecks(arm, chain)) {
    const value = plain.value(check);
    const row = rowAt(arm, chain, 0, check, { value, pose, free });
    yield { chain, check, pose, free, plain, value, shares: sharesOf(arm, row, allChecks) };
  }
}

const sum = (shares: readonly Share[]) => shares.reduce((all, share) => all + share.value, 0);
const size = (shares: readonly Share[]) => shares.reduce((all, share) => all + Math.abs(share.value), 0);

describe('shares of a check at a pose', () => {
  for (const [name, options] of KINDS) {
    it(`sum to the value of every kind of check: ${name} (seeds 1–3)`, () => {
      const off: string[] = [];
      const seen = new Set<string>();
      for (let seed = 1; seed <= 3; seed++) {
        const bare = withParts(randomArm(seed, { joints: 1 + (seed % 5), ...options }), seed);
        const arm = seed % 3 === 0 ? withFixedJoints(bare, seed) : bare;
        for (const { check, value, shares } of atPose(arm, seed)) {
          seen.add(check.check);
          if (!(Math.abs(sum(shares) - value) <= 1e-9 * Math.abs(value) + 1e-13 * size(shares))) {
            off.push(`seed ${seed} ${nameOf(check)}: ${sum(shares)} for ${value}`);
          }
          if (shares.some((share) => share.unit !== check.unit)) off.push(`${nameOf(check)}: unit`);
          for (let k = 1; k < shares.length; k++) {
            if (Math.abs(shares[k]!.value) > Math.abs(shares[k - 1]!.value)) off.push(`${nameOf(check)}: order`);
          }
        }
      }
      expect(off).toEqual([]);
      for (const kind of [
        'radial',
        'axial',
        'moment',
        'torque',
        'torque+',
        'static',
        'slope',
        'stress',
        'deflection',
      ]) {
        expect(seen).toContain(kind);
      }
    });

    it(`are what is lost with a body, a payload, a force: ${name} (seeds 11–13)`, () => {
      const off: string[] = [];
      let compared = 0;
      for (let seed = 11; seed <= 13; seed++) {
        const arm = withFixedJoints(withParts(randomArm(seed, { joints: 1 + (seed % 4), ...options }), seed), seed);
        const undriven = withJoints(arm, (joint) => ({ ...joint, drive: null }));
        for (const { chain, check, pose, free, plain, shares } of atPose(arm, seed)) {
          const line = winningLine(check, plain.out, 6 * check.joint)!;
          if (arm.joints[chain.jointIndex[check.joint]!]!.drive && check.check !== 'radial') continue;
          // A joint without a drive, or a radial load, whose line without the drive is that of the joint without one
          const bare = allChecks(undriven, flattenArm(undriven)).find((c) => nameOf(c) === nameOf(check))!;
          const held = check.check === 'radial' ? lineAlong(bare.forms[0]!, line.e) : line;
          const whole = Float64Array.from(plain.out.subarray(6 * check.joint, 6 * check.joint + 6));
          for (const share of shares) {
            if (share.kind === 'drive') continue;
            const less = without(arm, share);
            const rest = new Plain(flattenArm(less), flattenArm(less).cases[0]!);
            rest.at(pose, less.cases[0]!.tipForce || !free ? free : { ...free, tipForce: null });
            let lost = 0;
            for (let k = 0; k < 6; k++) lost += held.coefficients[k]! * (whole[k]! - rest.out[6 * check.joint + k]!);
            compared++;
            if (!(Math.abs(lost - share.value) <= 1e-9 * size(shares) + 1e-14)) {
              off.push(`seed ${seed} ${nameOf(check)} ${share.name}: ${share.value}, lost ${lost}`);
            }
          }
        }
      }
      expect(off).toEqual([]);
      expect(compared).toBeGreaterThan(120);
    });
  }

  it('give the drive the force that it adds: a gear by hand', () => {
    // One joint about the level y axis, weight 10·9.80665 N at 0.5 m across: torque T = 49.03325 N·m, gear at the middle of the pair
    const base = randomArm(1, { joints: 1, parallel: 0, payload: false });
    const joint = base.joints[0]!;
    const arm: Arm = {
      ...base,
      gravity: [0, 0, -9.80665],
      cases: [{ ...base.cases[0]!, tipForce: null, factor: 1 }],
      joints: [
        {
          ...joint,
          placement: { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
          axis: [0, 1, 0],
          travel: { from: -1, to: 1, full: false },
          link: { name: 'beam', mass: 10, centre: [0.5, 0, 0], inertia: null },
          support: {
            arrangement: 'clevis', hub: 0, span: 0.1, offset: 0, overhang: 0, side: '-', thrust: 'A',
            stationA: -0.05, stationB: 0.05, adjusted: null, bearingA: null, bearingB: null, shaft: null,
          }, // biome-ignore format: one row of values
          drive: { kind: 'gear', station: 0, radius: 0.1, pressureAngle: Math.PI / 9, mesh: 0 },
        },
      ],
    };
    const chain = flattenArm(arm);
    const check = allChecks(arm, chain).find((c) => c.check === 'radial' && c.bearing === 'A')!;
    const shares = sharesOf(arm, rowAt(arm, chain, 0, check, { value: 0, pose: [0], free: null }), allChecks);
    // Gear: tangential T/r = 490.33 along the weight or against it, separating tan 20° of it along x; half on each bearing
    const T = 10 * 9.80665 * 0.5;
    const weight = 10 * 9.80665;
    const values = [-1, 1].map((way) => {
      const load = [(Math.tan(Math.PI / 9) * T) / 0.1 / 2, weight / 2 + (way * T) / 0.1 / 2];
      const total = Math.hypot(...(load as [number, number]));
      return { total, own: (load[1]! / total) * (weight / 2) };
    });
    const total = sum(shares);
    const match = values.find((v) => Math.abs(v.total - total) < 1e-9)!;
    expect(match).toBeDefined();
    const of = (kind: ArmShare['kind']) => shares.find((share) => share.kind === kind)!.value;
    expect(of('link')).toBeCloseTo(match.own, 9);
    expect(of('drive')).toBeCloseTo(match.total - match.own, 9);
  });

  it('are none where the load is not finite or the row has no pose', () => {
    const arm = randomArm(3, { joints: 2 });
    const chain = flattenArm(arm);
    const check = allChecks(arm, chain)[0]!;
    expect(sharesOf(arm, rowAt(arm, chain, 0, check, { value: 1, pose: [], free: null }), allChecks)).toEqual([]);
    const pose = [Number.NaN, 0];
    expect(sharesOf(arm, rowAt(arm, chain, 0, check, { value: 1, pose, free: null }), allChecks)).toEqual([]);
  });
});

/** The arm without the cause of a share. */
function without(arm: Arm, share: Share): Arm {
  if (share.kind === 'payload') return withCases(arm, (load) => ({ ...load, payload: null }));
  if (share.kind === 'tip force') return withCases(arm, (load) => ({ ...load, tipForce: null }));
  return withJoints(arm, (joint) => {
    if (joint.link.name !== share.name) return joint;
    return { ...joint, link: { ...joint.link, mass: 0, inertia: { xx: 0, yy: 0, zz: 0, xy: 0, xz: 0, yz: 0 } } };
  });
}
