import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { type Chain, type ChainCase, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue, form } from '../../src/mechanics/form.ts';
import {
  boundOverFree,
  type FreeWorst,
  freeScratch,
  looseBoundOverFree,
  newFreeWorst,
  worstAtPose,
  worstOverFree,
} from '../../src/mechanics/freeLoads.ts';
import { newPoseLoad, pairCount, pairIndex, poseLoad, poseLoadScratch } from '../../src/mechanics/freeLoadsPose.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';

function setUp(seed: number, options: RandomArmOptions) {
  const arm = randomArm(seed, options);
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const random = seededRandom(seed + 77);
  const pose = Array.from(chain.from, (low, i) => random.between(low, chain.to[i]!));
  const at = newPoseLoad(chain.n);
  poseLoad(chain, load, pose, at, poseLoadScratch(chain.n));
  return { arm, chain, load, random, pose, at, checks: [...loadChecks(arm, chain), ...hardChecks(chain.n)] };
}

/** Forms of three rows with a linear part and an offset, as stresses and equivalent loads have them. */
function hardChecks(n: number): CheckForm[] {
  const bend = [0.3, 0, 0.1, 0, 2, 0.4];
  const other = [0, 0.3, 0, -2, 0, -0.3];
  const twist = [0, 0, 0, 0, 0, 1.7];
  return [0, n - 1].flatMap((joint) => [
    {
      check: 'stress',
      joint,
      bearing: null,
      unit: 'Pa',
      forms: [
        form({ P: [bend, other, twist], c: [1, -2, 0], l: [0, 0, 0.2, 0, 0, 0], o: 3 }),
        form({ P: [bend, other, twist], c: [1, -2, 0], l: [0, 0, -0.2, 0, 0, 0], o: 3 }),
      ],
    },
    {
      check: 'equivalent',
      joint,
      bearing: null,
      unit: 'N',
      forms: [form({ P: [bend, other], l: [0.1, 0, 0.5, 0, 0, 0.2] })],
    },
  ]);
}

/** The loads that the plain engine gives for a choice. */
function plainLoads(chain: Chain, load: ChainCase, pose: readonly number[], choice: FreeWorst) {
  const out = new Float64Array(6 * chain.n);
  const tip = load.force === 'any' ? choice.tipForce : null;
  if (load.speed) dynamicLoads(chain, load, pose, choice, out, poseScratch(chain.n), tip);
  else staticLoads(chain, load, pose, out, poseScratch(chain.n), tip);
  return out;
}

const KINDS: readonly Omit<RandomArmOptions, 'joints'>[] = [
  { force: 'any' },
  { force: 'any', drives: true },
  { motion: true },
  { motion: true, drives: true, force: 'tool' },
  { motion: true, force: 'any' },
  { motion: true, force: 'any', drives: true },
  { force: 'base' },
];

describe('parts of the joint load that a pose leaves free', () => {
  it('add up to the recursion: rates, accelerations and tip force, 60 random arms (seeds 1–60)', () => {
    for (let seed = 1; seed <= 60; seed++) {
      const { chain, load, random, pose, at } = setUp(seed, {
        joints: 1 + (seed % 9),
        motion: true,
        force: seed % 2 ? 'any' : 'tool',
      });
      const { n } = chain;
      const speed = pose.map(() => random.between(-3, 3));
      const accel = pose.map(() => random.between(-9, 9));
      const v = random.direction();
      const tip = load.force === 'any' ? v : null;
      const plain = new Float64Array(6 * n);
      dynamicLoads(chain, load, pose, { speed, accel }, plain, poseScratch(n), tip);
      const size = Math.hypot(...plain);
      for (let i = 0; i < n; i++) {
        const w = Array.from(at.fixed.subarray(6 * i, 6 * i + 6));
        for (let j = 0; j < n; j++) {
          for (let c = 0; c < 6; c++) w[c]! += accel[j]! * at.accel[6 * (n * i + j) + c]!;
          for (let k = j; k < n; k++) {
            const o = 6 * (pairCount(n) * i + pairIndex(n, j, k));
            for (let c = 0; c < 6; c++) w[c]! += speed[j]! * speed[k]! * at.rate[o + c]!;
          }
        }
        if (tip) {
          const f = [0, 1, 2].map((c) => [0, 1, 2].reduce((s, r) => s + at.frame[9 * i + 3 * r + c]! * v[r]!, 0));
          const [x, y, z] = f.map((c) => c * load.magnitude) as [number, number, number];
          const [a, b, c] = at.reach.subarray(3 * i, 3 * i + 3);
          [x, y, z, b! * z - c! * y, c! * x - a! * z, a! * y - b! * x].forEach((part, k) => {
            w[k]! += part;
          });
        }
        for (let c = 0; c < 6; c++) expect(Math.abs(w[c]! - plain[6 * i + c]!)).toBeLessThan(1e-11 * (1 + size));
      }
    }
  });
});

describe('worst over what a pose leaves free', () => {
  it('is attained by the plain engine to 1e-9, for every check and kind of load (seeds 1–70)', () => {
    for (let seed = 1; seed <= 70; seed++) {
      const { chain, load, pose, at, checks } = setUp(seed, { joints: 1 + (seed % 6), ...KINDS[seed % 7]! });
      const worst = newFreeWorst(chain.n);
      const scratch = freeScratch(chain.n);
      for (const check of checks) {
        const value = worstOverFree(check, load, at, worst, scratch);
        const w = plainLoads(chain, load, pose, worst).subarray(6 * check.joint, 6 * check.joint + 6);
        const scale = Math.hypot(...w) + Math.abs(value);
        expect(Math.abs(checkValue(check, w, 0) - value)).toBeLessThan(1e-9 * scale);
        for (let k = 0; k < 6; k++) expect(Math.abs(worst.wrench[k]! - w[k]!)).toBeLessThan(1e-9 * scale);
        if (load.force === 'any') expect(Math.hypot(...worst.tipForce)).toBeCloseTo(1, 12);
        for (let j = 0; j < chain.n && load.speed; j++) {
          expect(Math.abs(worst.speed[j]!)).toBeLessThanOrEqual(load.speed[j]!);
          expect(Math.abs(worst.accel[j]!)).toBeLessThanOrEqual(load.accel![j]!);
        }
      }
    }
  });

  it('is not exceeded by random choices, and its bounds by none (seeds 1–70)', () => {
    for (let seed = 1; seed <= 70; seed++) {
      const { chain, load, random, pose, at, checks } = setUp(seed, { joints: 1 + (seed % 6), ...KINDS[seed % 7]! });
      const scratch = freeScratch(chain.n);
      const exact = !load.speed;
      const out = newFreeWorst(chain.n);
      const values = checks.map((check) => worstOverFree(check, load, at, out, scratch));
      const bounds = checks.map((check) => boundOverFree(check, load, at, scratch));
      const loose = checks.map((check) => looseBoundOverFree(check, load, at, scratch));
      checks.forEach((_, k) => {
        expect(bounds[k]!).toBeGreaterThanOrEqual(values[k]!);
        expect(loose[k]!).toBeGreaterThanOrEqual(bounds[k]! - 1e-9 * Math.abs(bounds[k]!));
      });
      const choice = newFreeWorst(chain.n);
      for (let trial = 0; trial < 150; trial++) {
        choice.tipForce.set(random.direction());
        for (let j = 0; j < chain.n && load.speed; j++) {
          choice.speed[j] = load.speed[j]! * (trial % 2 ? random.between(-1, 1) : random.below(3) - 1);
          choice.accel[j] = load.accel![j]! * (random.below(2) ? 1 : -1);
        }
        const all = plainLoads(chain, load, pose, choice);
        const broken = checks.filter((check, k) => {
          const value = checkValue(check, all, 6 * check.joint);
          const least = exact ? Math.min(bounds[k]!, values[k]! + 1e-9 * Math.abs(value)) : bounds[k]!;
          return !(value <= least + 1e-12 * Math.abs(value));
        });
        expect(broken, `seed ${seed}`).toEqual([]);
      }
    }
  });

  it('meets its bound where the rule is exact: tip force any, no drives (seeds 1–40)', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const { chain, load, at, checks } = setUp(seed, { joints: 1 + (seed % 6), force: 'any' });
      const scratch = freeScratch(chain.n);
      const out = newFreeWorst(chain.n);
      for (const check of checks) {
        const value = worstOverFree(check, load, at, out, scratch);
        const bound = boundOverFree(check, load, at, scratch);
        expect(bound - value).toBeLessThanOrEqual((check.check === 'stress' ? 1e-3 : 1e-8) * Math.abs(bound));
      }
    }
  });

  it('meets its bound where torque ranges bind: tip force any with drives (seeds 1–40)', () => {
    let gaps = 0;
    let count = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const { chain, load, at, arm } = setUp(seed, { joints: 1 + (seed % 6), force: 'any', drives: true });
      const scratch = freeScratch(chain.n);
      const out = newFreeWorst(chain.n);
      for (const check of loadChecks(arm, chain)) {
        const value = worstOverFree(check, load, at, out, scratch);
        const gap = (boundOverFree(check, load, at, scratch) - value) / value;
        count++;
        if (gap > 1e-6) gaps++;
      }
    }
    expect(count).toBeGreaterThan(500);
    expect(gaps / count).toBeLessThan(0.02);
  });

  it('takes the exact worst signs of accelerations: every sign tried, up to 7 joints (seeds 1–40)', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const { chain, load, pose, at, checks } = setUp(seed, { joints: 1 + (seed % 7), motion: true });
      load.speed!.fill(0);
      const { n } = chain;
      const scratch = freeScratch(n);
      const out = newFreeWorst(n);
      for (const check of checks) {
        const value = worstOverFree(check, load, at, out, scratch);
        let brute = Number.NEGATIVE_INFINITY;
        const w = new Float64Array(6);
        for (let signs = 0; signs < 1 << n; signs++) {
          for (let c = 0; c < 6; c++) {
            w[c] = at.fixed[6 * check.joint + c]!;
            for (let j = 0; j < n; j++) {
              const a = load.accel![j]! * (signs & (1 << j) ? 1 : -1);
              w[c]! += a * at.accel[6 * (n * check.joint + j) + c]!;
            }
          }
          brute = Math.max(brute, checkValue(check, w, 0));
        }
        expect(Math.abs(value - brute), `${seed} ${check.check} ${check.joint} ${pose}`).toBeLessThan(
          1e-10 * (1 + Math.abs(brute)),
        );
      }
    }
  });

  it('takes speeds no worse than every vertex of their box, nearly always (seeds 1–40)', () => {
    let short = 0;
    let count = 0;
    for (let seed = 1; seed <= 40; seed++) {
      const { chain, load, at, checks } = setUp(seed, { joints: 1 + (seed % 6), motion: true });
      load.accel!.fill(0);
      const { n } = chain;
      const scratch = freeScratch(n);
      const out = newFreeWorst(n);
      for (const check of checks) {
        const value = worstOverFree(check, load, at, out, scratch);
        let brute = Number.NEGATIVE_INFINITY;
        const w = new Float64Array(6);
        for (let vertex = 0; vertex < 3 ** n; vertex++) {
          for (let c = 0; c < 6; c++) w[c] = at.fixed[6 * check.joint + c]!;
          const s = Array.from({ length: n }, (_, j) => load.speed![j]! * ((Math.floor(vertex / 3 ** j) % 3) - 1));
          for (let j = 0; j < n; j++) {
            for (let k = j; k < n; k++) {
              const o = 6 * (pairCount(n) * check.joint + pairIndex(n, j, k));
              for (let c = 0; c < 6; c++) w[c]! += s[j]! * s[k]! * at.rate[o + c]!;
            }
          }
          brute = Math.max(brute, checkValue(check, w, 0));
        }
        count++;
        if (value < brute - 1e-9 * Math.abs(brute)) short++;
      }
    }
    expect(count).toBeGreaterThan(1000);
    expect(short / count).toBeLessThan(0.01);
  });

  it('takes one row in closed form: torque under a free tip force is weight torque plus force times distance', () => {
    const { chain, load, pose, at, checks } = setUp(5, { joints: 3, force: 'any' });
    const check = checks.find((c) => c.check === 'torque' && c.joint === 1)!;
    const [x, y] = at.reach.subarray(3, 5);
    const expected = Math.abs(at.fixed[11]!) + load.magnitude * Math.hypot(x!, y!);
    expect(worstAtPose(chain, load, pose, check).value).toBeCloseTo(expected, 10);
  });

  it('never calls a broken load safe: NaN stays NaN, its bound is infinite', () => {
    const { chain, load, checks } = setUp(3, { joints: 3, force: 'any' });
    const at = newPoseLoad(3);
    poseLoad(chain, load, [Number.NaN, 0, 0], at, poseLoadScratch(3));
    const scratch = freeScratch(3);
    for (const check of checks) {
      expect(worstOverFree(check, load, at, newFreeWorst(3), scratch)).toBeNaN();
      expect(boundOverFree(check, load, at, scratch)).toBe(Number.POSITIVE_INFINITY);
      expect(looseBoundOverFree(check, load, at, scratch)).toBe(Number.POSITIVE_INFINITY);
    }
  });
});
