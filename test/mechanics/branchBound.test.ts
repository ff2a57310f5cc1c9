import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import type { BoxSearchState } from '../../src/mechanics/boxSearch.ts';
import { BranchBound } from '../../src/mechanics/branchBound.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue } from '../../src/mechanics/form.ts';
import { freeScratch, newFreeWorst, worstOverFree } from '../../src/mechanics/freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../../src/mechanics/freeLoadsPose.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';

type Kind = Omit<RandomArmOptions, 'joints'>;
const KINDS: readonly [string, Kind][] = [
  ['weights', {}],
  ['weights and drives', { drives: true }],
  ['tip force any', { force: 'any' }],
  ['tip force any and drives', { force: 'any', drives: true }],
  ['tip force fixed in the base', { force: 'base' }],
  ['tip force fixed in the tool', { force: 'tool', drives: true }],
  ['full turns', { force: 'any', full: 1 }],
  ['parallel axes at one place', { force: 'any', parallel: 0.8, coincident: 0.6 }],
  ['one-degree travel', { force: 'any', full: 0, travel: Math.PI / 180 }],
  ['hardly any travel', { force: 'tool', full: 0, travel: 1e-9 }],
];

function changed(arm: Arm, seed: number): Arm {
  // every third arm: no gravity, no mass, gravity along the first axis
  if (seed % 9 === 0) return { ...arm, gravity: [0, 0, 0] };
  if (seed % 9 === 3) {
    const joints = arm.joints.map((joint) => ({ ...joint, link: { ...joint.link, mass: 0 } }));
    return { ...arm, joints, cases: arm.cases.map((load) => ({ ...load, payload: null })) };
  }
  if (seed % 9 === 6) {
    const R = arm.joints[0]!.placement.rotation;
    const [x, y, z] = arm.joints[0]!.axis;
    const row = (k: number) => -9.80665 * (R[k]! * x + R[k + 1]! * y + R[k + 2]! * z);
    return { ...arm, gravity: [row(0), row(3), row(6)] };
  }
  return arm;
}

function picked(arm: Arm, chain: Chain, seed: number): CheckForm[] {
  return loadChecks(arm, chain).filter((_, k) => (k + seed) % 7 === 0);
}

/** The value the plain engine gives at the state's pose with its free parts. */
function attained(chain: Chain, check: CheckForm, state: BoxSearchState): number {
  const loads = new Float64Array(6 * chain.n);
  staticLoads(chain, chain.cases[0]!, state.pose, loads, poseScratch(chain.n), state.free?.tipForce ?? null);
  return checkValue(check, loads, 6 * check.joint);
}

describe('branch and bound over boxes of joint angles', () => {
  KINDS.forEach(([name, options], index) => {
    const first = 1 + 20 * index;
    it(`bounds every random pose and attains what it finds: ${name}, 1–9 joints (seeds ${first}–${first + 11})`, () => {
      for (let seed = first; seed < first + 12; seed++) {
        const arm = changed(randomArm(seed, { joints: 1 + (seed % 9), ...options }), seed);
        const chain = flattenArm(arm);
        const load = chain.cases[0]!;
        const { n } = chain;
        const checks = picked(arm, chain, seed);
        const states = checks.map((check) => new BranchBound(chain, load, check, { gap: 0.01 }).step(400));
        states.forEach((state, k) => {
          const value = attained(chain, checks[k]!, state);
          expect(Math.abs(value - state.found)).toBeLessThanOrEqual(1e-9 * Math.abs(value));
          expect(state.bound).toBeGreaterThanOrEqual(state.found);
          state.pose.forEach((q, i) => {
            expect(q).toBeGreaterThanOrEqual(chain.from[i]!);
            expect(q).toBeLessThanOrEqual(chain.to[i]!);
          });
        });
        const random = seededRandom(seed);
        const at = newPoseLoad(n);
        const out = newFreeWorst(n);
        const [scratch, free] = [poseLoadScratch(n), freeScratch(n)];
        const over: string[] = [];
        for (let trial = 0; trial < 400; trial++) {
          const pose = Array.from(chain.from, (low, i) => {
            const high = chain.to[i]!;
            return trial % 3 === 0 && random.below(2) ? (random.below(2) ? low : high) : random.between(low, high);
          });
          poseLoad(chain, load, pose, at, scratch);
          checks.forEach((check, k) => {
            const value = worstOverFree(check, load, at, out, free);
            if (!(value <= states[k]!.bound + 1e-11 * Math.abs(value)))
              over.push(`seed ${seed} ${check.check}: ${value}`);
          });
        }
        expect(over).toEqual([]);
      }
    });
  });

  it('closes the gap asked for on small arms, and finds no less than a grid (seeds 1–24)', () => {
    for (let seed = 1; seed <= 24; seed++) {
      const joints = 1 + (seed % 3);
      const arm = randomArm(seed, { joints, force: (['none', 'any', 'base', 'tool'] as const)[seed % 4]! });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const at = newPoseLoad(joints);
      const out = newFreeWorst(joints);
      const [scratch, free] = [poseLoadScratch(joints), freeScratch(joints)];
      for (const check of picked(arm, chain, seed)) {
        const search = new BranchBound(chain, load, check, { gap: 0.002 });
        const state = search.step(400_000);
        expect(state.done).toBe(true);
        expect(state.bound - state.found).toBeLessThanOrEqual(0.002 * state.bound + 1e-8 * search.ceiling);
        let grid = Number.NEGATIVE_INFINITY;
        const steps = joints === 3 ? 8 : 24;
        for (let k = 0; k < (steps + 1) ** joints; k++) {
          const pose = Array.from(chain.from, (low, i) => {
            const m = Math.floor(k / (steps + 1) ** i) % (steps + 1);
            return low + ((chain.to[i]! - low) * m) / steps;
          });
          poseLoad(chain, load, pose, at, scratch);
          grid = Math.max(grid, worstOverFree(check, load, at, out, free));
        }
        expect(state.found).toBeGreaterThanOrEqual(grid - 1e-9 * Math.abs(grid));
      }
    }
  });

  it('narrows as it works and never steps back (seeds 1–6)', () => {
    for (let seed = 1; seed <= 6; seed++) {
      const arm = randomArm(seed, { joints: 5, force: 'any' });
      const chain = flattenArm(arm);
      for (const check of picked(arm, chain, seed).slice(0, 2)) {
        const search = new BranchBound(chain, chain.cases[0]!, check, { gap: 1e-4 });
        let before = search.state();
        for (let k = 0; k < 8; k++) {
          const next = search.step(200);
          expect(next.bound).toBeLessThanOrEqual(before.bound);
          expect(next.found).toBeGreaterThanOrEqual(before.found);
          before = next;
        }
      }
    }
  });

  it('gives the same answer every time, and an honest bound where the queue is small (seeds 1–6)', () => {
    for (let seed = 1; seed <= 6; seed++) {
      const arm = randomArm(seed, { joints: 4, force: 'any' });
      const chain = flattenArm(arm);
      const check = picked(arm, chain, seed)[0]!;
      const run = (most: number) => new BranchBound(chain, chain.cases[0]!, check, { gap: 1e-3, most }).step(20_000);
      expect(run(1 << 20)).toEqual(run(1 << 20));
      const small = run(40);
      const large = run(1 << 20);
      expect(small.bound).toBeGreaterThanOrEqual(large.found);
      expect(small.done).toBe(true);
    }
  });

  it('takes poses to start from (seed 5)', () => {
    const arm = randomArm(5, { joints: 6, force: 'any' });
    const chain = flattenArm(arm);
    const check = picked(arm, chain, 5)[0]!;
    const best = new BranchBound(chain, chain.cases[0]!, check, { gap: 0.005 }).step(100_000);
    const seeded = new BranchBound(chain, chain.cases[0]!, check, { gap: 0.005, seeds: [best.pose] }).state();
    expect(seeded.found).toBeGreaterThanOrEqual(best.found * (1 - 1e-12));
  });

  it('proves closed forms: the reach of a vertical-axis arm under a free tip force, a single joint under its weight', () => {
    const arm = randomArm(2, { joints: 1, payload: false });
    const chain = flattenArm(arm);
    const check = loadChecks(arm, chain).find((c) => c.check === 'thrust+')!;
    // weight along the axis does not depend on the angle
    const state = new BranchBound(chain, chain.cases[0]!, check, { gap: 1e-9 }).step(1000);
    expect(state.bound - state.found).toBeLessThanOrEqual(1e-9 * (1 + state.bound));
  });
});
