import { describe, expect, it } from 'vitest';
import type { Arm, Joint } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue, form } from '../../src/mechanics/form.ts';
import { GravityClimb } from '../../src/mechanics/gravityClimb.ts';
import { gravityLoad } from '../../src/mechanics/gravityLoad.ts';
import { GravitySearch, gapOf, isHomogeneous } from '../../src/mechanics/gravitySearch.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { randomArm } from '../randomArm.ts';

const EYE = [1, 0, 0, 0, 1, 0, 0, 0, 1] as const;

function search(
  arm: Arm,
  checks?: (chain: Chain) => readonly CheckForm[],
  gap = 1e-3,
  before: GravitySearch | null = null,
) {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const list = (checks?.(chain) ?? loadChecks(arm, chain)).filter(isHomogeneous);
  const made = new GravitySearch(chain, load, gravityLoad(chain, load)!, list, new GravityClimb(chain, load), before);
  while (made.open(gap)) made.round(gap);
  return { chain, load, made };
}

/** Every bound against random poses, some of them climbed; every found against the plain kernel. */
function holds(arm: Arm, seed: number, poses: number): void {
  // The inequalities are the same at every level: a coarse gap keeps long arms quick.
  const { chain, load, made } = search(arm, undefined, arm.joints.length > 6 ? 2e-2 : 2e-3);
  const out = new Float64Array(6 * chain.n);
  const scratch = poseScratch(chain.n);
  const pose = new Float64Array(chain.n);
  const climb = new GravityClimb(chain, load);
  for (const entry of made.entries) {
    const slack = 1e-9 * entry.ceiling;
    staticLoads(chain, load, entry.pose, out, scratch);
    const attained = checkValue(entry.check, out, 6 * entry.check.joint);
    expect(Math.abs(attained - entry.found)).toBeLessThanOrEqual(1e-9 * Math.abs(attained) + slack);
    expect(entry.found).toBeLessThanOrEqual(entry.bound);
    for (let i = 0; i < chain.n; i++) {
      expect(entry.pose[i]!).toBeGreaterThanOrEqual(chain.from[i]!);
      expect(entry.pose[i]!).toBeLessThanOrEqual(chain.to[i]!);
    }
  }
  const random = seededRandom(seed + 50_000);
  const angle = (i: number) => {
    // Corners of the travel hold many worst poses
    const pick = random.next();
    if (pick < 0.15) return chain.from[i]!;
    return pick < 0.3 ? chain.to[i]! : random.between(chain.from[i]!, chain.to[i]!);
  };
  let over = 0;
  for (let k = 0; k < poses; k++) {
    for (let i = 0; i < chain.n; i++) pose[i] = angle(i);
    staticLoads(chain, load, pose, out, scratch);
    for (const entry of made.entries) {
      if (checkValue(entry.check, out, 6 * entry.check.joint) > entry.bound) over++;
    }
  }
  for (const entry of made.entries) {
    for (let i = 0; i < chain.n; i++) pose[i] = angle(i);
    if (climb.climb(entry.check, pose) > entry.bound) over++;
  }
  expect(over).toBe(0);
}

describe('certified worst under gravity', () => {
  const kinds = [
    ['generic', {}],
    ['turning right round', { full: 1 }],
    ['parallel axes', { parallel: 0.7, coincident: 0.3 }],
    ['one degree of travel', { travel: Math.PI / 180, full: 0 }],
    ['no payload, coincident origins', { payload: false, coincident: 0.6 }],
    ['force along gravity', { force: 'none' as const }],
  ] as const;
  for (const [name, options] of kinds) {
    it(`holds against random and climbed poses: ${name} (1–9 joints, seeds 1–9)`, () => {
      for (let seed = 1; seed <= 9; seed++) {
        const arm = randomArm(seed, { joints: 1 + ((seed - 1) % 9), ...options });
        const downward = name === 'force along gravity';
        holds(downward ? forced(arm, seed % 2 === 0 ? 1 : -1) : arm, seed, 1000);
      }
    });
  }

  it('closes the gap to 0.1 % for every check of arms up to six joints (seeds 1–12)', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const { made } = search(randomArm(seed, { joints: 1 + ((seed - 1) % 6) }));
      const open = made.entries.filter((entry) => gapOf(entry) > 1e-3);
      expect(open.map((entry) => `${entry.check.check} ${entry.check.joint} ${gapOf(entry)}`)).toEqual([]);
    }
  });

  it('finds the pose that finer tables lead to where coarser ones led to a lower top: 1 %, then 0.1 % (parallel axes, seeds 21–24)', () => {
    for (let seed = 21; seed <= 24; seed++) {
      const { made } = search(randomArm(seed, { joints: 6, parallel: 0.7 }), undefined, 1e-2);
      while (made.open(1e-3)) made.round(1e-3);
      expect(made.entries.filter((entry) => gapOf(entry) > 1e-3).map((entry) => entry.check.check)).toEqual([]);
    }
  });

  it('is never below the maximum of a grid (three joints, seeds 1–12)', () => {
    const below: string[] = [];
    for (let seed = 1; seed <= 12; seed++) {
      const { chain, load, made } = search(randomArm(seed, { joints: 3 }));
      const out = new Float64Array(18);
      const scratch = poseScratch(3);
      const at = (i: number, k: number) => chain.from[i]! + ((chain.to[i]! - chain.from[i]!) * k) / 12;
      for (let a = 0; a <= 12; a++) {
        for (let b = 0; b <= 12; b++) {
          for (let c = 0; c <= 12; c++) {
            staticLoads(chain, load, [at(0, a), at(1, b), at(2, c)], out, scratch);
            for (const entry of made.entries) {
              const value = checkValue(entry.check, out, 6 * entry.check.joint);
              if (value > entry.found + 1e-12 * entry.ceiling)
                below.push(`seed ${seed} ${entry.check.check} ${value} ${entry.found}`);
            }
          }
        }
      }
    }
    expect(below).toEqual([]);
  });

  it('covers forms of three rows and norms with a linear part (seeds 1–8)', () => {
    for (let seed = 1; seed <= 8; seed++) {
      const random = seededRandom(seed);
      const row = () => Array.from({ length: 6 }, () => random.between(-1, 1));
      const arm = randomArm(seed, { joints: 1 + (seed % 4) });
      const { chain, load, made } = search(
        arm,
        (chain) =>
          Array.from({ length: chain.n }, (_, joint) => ({
            check: 'stress',
            joint,
            bearing: null,
            unit: 'Pa',
            forms: [form({ P: [row(), row(), row()] }), form({ P: [row(), row()], l: row() })],
          })),
        1e-2,
      );
      const out = new Float64Array(6 * chain.n);
      const scratch = poseScratch(chain.n);
      for (const entry of made.entries) expect(gapOf(entry)).toBeLessThan(1e-2);
      for (let k = 0; k < 2000; k++) {
        const pose = Array.from(chain.from, (low, i) => random.between(low, chain.to[i]!));
        staticLoads(chain, load, pose, out, scratch);
        for (const entry of made.entries) {
          expect(checkValue(entry.check, out, 6 * entry.check.joint)).toBeLessThanOrEqual(entry.bound);
        }
      }
    }
  });
});

describe('closed forms', () => {
  const link = (
    position: readonly [number, number, number],
    axis: readonly [number, number, number],
    mass: number,
    centre: readonly [number, number, number],
  ): Joint => ({
    ...randomArm(1, { joints: 1 }).joints[0]!,
    placement: { position, rotation: EYE },
    axis,
    travel: { from: -3, to: 3, full: false },
    link: { name: 'link', mass, centre, inertia: null },
    support: null,
    drive: null,
  });
  const arm = (joints: Joint[]): Arm => ({
    ...randomArm(1, { joints: 1 }),
    gravity: [0, 0, -9.80665],
    joints,
    tip: { position: [0, 0, 0], rotation: EYE },
    cases: [{ name: 'own weight', payload: null, tipForce: null, motion: null, factor: 1 }],
  });
  const row = (made: GravitySearch, check: string, joint: number) =>
    made.entries.find((entry) => entry.check.check === check && entry.check.joint === joint)!;

  it('one joint about a level axis: torque m g r', () => {
    const { made } = search(arm([link([0, 0, 0], [0, 1, 0], 4, [0.3, 0.1, 0.4])]), undefined, 1e-5);
    const torque = row(made, 'torque', 0);
    expect(torque.found).toBeCloseTo(4 * 9.80665 * 0.5, 7);
    expect(torque.bound).toBeGreaterThanOrEqual(4 * 9.80665 * 0.5);
    expect(gapOf(torque)).toBeLessThan(1e-5);
  });

  it('two links in a plane: both torques at full stretch', () => {
    const joints = [link([0, 0, 0], [0, 1, 0], 2, [0.2, 0, 0]), link([0.4, 0, 0], [0, 1, 0], 1, [0.15, 0, 0])];
    const { made } = search(arm(joints), undefined, 1e-5);
    expect(row(made, 'torque', 0).found).toBeCloseTo(9.80665 * (2 * 0.2 + 1 * 0.55), 6);
    expect(row(made, 'torque', 1).found).toBeCloseTo(9.80665 * 0.15, 6);
    expect(gapOf(row(made, 'torque', 0))).toBeLessThan(1e-5);
  });

  it('vertical axes: moment is weight times reach, torque nothing, thrust the weight', () => {
    const joints = [
      link([0, 0, 0.5], [0, 0, 1], 3, [0.2, 0, 0]),
      link([0.4, 0, 0], [0, 0, 1], 2, [0.15, 0, 0]),
      link([0.3, 0, 0], [0, 0, 1], 1, [0.05, 0, 0]),
      link([0, 0, -0.1], [0, 0, 1], 0.5, [0, 0, -0.1]),
    ];
    const { made } = search(arm(joints), undefined, 1e-5);
    const reach = 3 * 0.2 + 2 * 0.55 + 1 * 0.75 + 0.5 * 0.7;
    expect(row(made, 'moment', 0).found).toBeCloseTo(9.80665 * reach, 6);
    expect(gapOf(row(made, 'moment', 0))).toBeLessThan(1e-5);
    expect(Math.abs(row(made, 'torque', 0).bound)).toBeLessThan(1e-9);
    expect(gapOf(row(made, 'torque', 0))).toBe(0);
    expect(row(made, 'thrust-', 0).found).toBeCloseTo(9.80665 * 6.5, 9);
    expect(row(made, 'thrust+', 0).found).toBe(0);
  });

  it('no weight, no travel: nothing, exactly', () => {
    const still = { ...link([0, 0, 0], [0, 1, 0], 0, [0.3, 0, 0]), travel: { from: 0, to: 0, full: false } };
    const { made } = search(arm([still, still]));
    for (const entry of made.entries) {
      expect(entry.found).toBe(0);
      expect(entry.bound).toBe(0);
      expect(gapOf(entry)).toBe(0);
    }
  });

  it('a load that is not finite is never certified', () => {
    const { made } = search(arm([link([0, 0, 0], [0, 1, 0], Number.POSITIVE_INFINITY, [0.3, 0, 0])]));
    for (const entry of made.entries) expect(gapOf(entry)).toBe(1);
  });
});

describe('outward sets of an earlier layout', () => {
  it('serve again where nothing outboard changed, with the same answer', () => {
    const arm = randomArm(11, { joints: 6 });
    const first = search(arm).made;
    const heavier: Arm = {
      ...arm,
      joints: arm.joints.map((joint, k) =>
        k === 2 ? { ...joint, link: { ...joint.link, mass: joint.link.mass + 1 } } : joint,
      ),
    };
    const again = search(heavier, undefined, 1e-3, first).made;
    const fresh = search(heavier).made;
    expect([0, 1, 2, 3, 4, 5].map((k) => again.sets.shares(k, first.sets))).toEqual([
      false,
      false,
      false,
      true,
      true,
      true,
    ]);
    // Not to the bit: what was kept starts the climbs of what is searched anew
    again.entries.forEach((entry, k) => {
      const other = fresh.entries[k]!;
      expect(gapOf(entry)).toBeLessThanOrEqual(1e-3);
      expect(Math.abs(entry.bound - other.bound)).toBeLessThanOrEqual(1.001e-3 * other.bound);
      expect(Math.abs(entry.found - other.found)).toBeLessThanOrEqual(1.001e-3 * other.bound);
    });
  });
});

/** The arm with its tip force along gravity, down (+1) or up (-1). */
function forced(arm: Arm, way: 1 | -1): Arm {
  const g = Math.hypot(...arm.gravity);
  const unit = [(way * arm.gravity[0]) / g, (way * arm.gravity[1]) / g, (way * arm.gravity[2]) / g] as const;
  return {
    ...arm,
    cases: arm.cases.map((c) => ({ ...c, tipForce: { magnitude: 25, direction: 'base' as const, unit } })),
  };
}
