import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { dutyPart, motionAt, pathMotion } from '../../src/capacity/duty/index.ts';
import { jointParts } from '../../src/capacity/index.ts';
import { bareBearing } from '../../src/capacity/rolling/index.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm, WRENCH } from '../../src/mechanics/chain.ts';
import { dynamicLoads, poseScratch } from '../../src/mechanics/newtonEuler.ts';
import { pathWear } from '../../src/studies/dutyPath.ts';
import { randomArm } from '../randomArm.ts';

const ball = { ...bareBearing('deep-groove', 0.02, 0.042, 0.012), C: 9400, C0: 5000 };

function ready(arm: Arm) {
  const joints = arm.joints.map((joint) => {
    const { support } = joint;
    return support && support.arrangement !== 'ring'
      ? { ...joint, support: { ...support, bearingA: 'ball', bearingB: 'ball' } }
      : joint;
  });
  const whole = { ...arm, joints, bearings: { ball } };
  const chain = flattenArm(whole);
  const parts = chain.jointIndex.flatMap((_, joint) =>
    (['A', 'B'] as const).flatMap((side) => {
      const part = dutyPart(jointParts(whole, chain, joint)!, side);
      return 'value' in part ? [part.value] : [];
    }),
  );
  return { chain, parts };
}

/** A closed path of sines within the travel. */
function sines(chain: ReturnType<typeof flattenArm>, seed: number, rows: number, period: number) {
  const random = seededRandom(seed);
  const waves = Array.from(chain.from, (from, j) => {
    const to = chain.to[j]!;
    return {
      middle: (from + to) / 2,
      half: 0.45 * (to - from),
      phase: random.between(0, 6),
      often: 1 + random.below(2),
    };
  });
  const time = Array.from({ length: rows }, (_, k) => (period * k) / (rows - 1));
  const pose = time.map((t, k) =>
    waves.map(({ middle, half, phase, often }) => {
      const at = k === rows - 1 ? 0 : (2 * Math.PI * t) / period;
      return middle + half * Math.sin(often * at + phase);
    }),
  );
  return pathMotion(time, pose, chain.full);
}

/** The same integral the slow and plain way: very many samples of the motion, the load of each by itself. */
function bruteForce(
  { chain, parts }: ReturnType<typeof ready>,
  path: ReturnType<typeof pathMotion>,
  between: number,
): { readonly load: number[]; readonly swept: number[] } {
  const { n } = chain;
  const [q, v, a] = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
  const w = new Float64Array(WRENCH * n);
  const wear = parts.map(() => 0);
  const swept = new Array<number>(n).fill(0);
  for (let k = 0; k + 1 < path.rows; k++) {
    const h = (path.time[k + 1]! - path.time[k]!) / between;
    for (let s = 0; s < between; s++) {
      motionAt(path, k, (s + 0.5) / between, q, v, a);
      dynamicLoads(chain, chain.cases[0]!, q, { speed: v, accel: a }, w, poseScratch(n));
      for (let j = 0; j < n; j++) swept[j]! += Math.abs(v[j]!) * h;
      parts.forEach((part, b) => {
        wear[b]! += part.at(w, WRENCH * part.joint) ** part.exponent * Math.abs(v[part.joint]!) * h;
      });
    }
  }
  return { load: wear.map((sum, b) => Math.cbrt(sum / swept[parts[b]!.joint]!)), swept };
}

describe('one pass of a path', () => {
  it('gives the angle swept and the equivalent load that a fine sum of the same motion gives (seeds 1–12)', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const force = (['none', 'base', 'tool'] as const)[seed % 3]!;
      const arm = ready(randomArm(seed, { joints: 1 + (seed % 4), force, drives: seed % 4 === 0, full: 0 }));
      const path = sines(arm.chain, seed, 25, 4);
      const found = pathWear(arm.chain, arm.chain.cases[0]!, path, arm.parts);
      const plain = bruteForce(arm, path, 400);
      arm.chain.names.forEach((_, j) => {
        expect(found.swept[j]! / plain.swept[j]!).toBeCloseTo(1, 4);
      });
      arm.parts.forEach((_, b) => {
        expect(found.load[b]! / plain.load[b]!).toBeCloseTo(1, 2);
        expect(Math.abs(found.load[b]! / plain.load[b]! - 1)).toBeLessThan(3e-3);
        expect(found.peak[b]!).toBeGreaterThanOrEqual(found.load[b]! * (1 - 1e-12));
      });
    }
  });

  it('a tip force of any direction wears no less than any direction held, and not more than the sum of worsts (seeds 1–6)', () => {
    for (let seed = 1; seed <= 6; seed++) {
      const arm = ready(randomArm(seed, { joints: 2 + (seed % 2), force: 'any', full: 0 }));
      const { chain, parts } = arm;
      const load = chain.cases[0]!;
      const path = sines(chain, seed, 17, 6);
      const free = pathWear(chain, load, path, parts);
      const random = seededRandom(seed);
      for (let draw = 0; draw < 12; draw++) {
        const held = pathWear(chain, { ...load, force: 'base', forceUnit: random.direction() }, path, parts);
        parts.forEach((_, b) => {
          expect(held.load[b]!).toBeLessThanOrEqual(free.load[b]! * (1 + 1e-3));
        });
      }
      const none = pathWear(chain, { ...load, force: 'none' }, path, parts);
      parts.forEach((_, b) => {
        expect(free.load[b]!).toBeGreaterThan(none.load[b]!);
      });
    }
  });

  it('finds the hardest pose, whose load the kernel gives again', () => {
    const arm = ready(randomArm(3, { joints: 3, full: 0 }));
    const { chain, parts } = arm;
    const path = sines(chain, 3, 200, 1000);
    const found = pathWear(chain, chain.cases[0]!, path, parts);
    const w = new Float64Array(WRENCH * chain.n);
    const rest = { speed: new Float64Array(chain.n), accel: new Float64Array(chain.n) };
    parts.forEach((part, b) => {
      const pose = found.peakPose.slice(chain.n * b, chain.n * (b + 1));
      dynamicLoads(chain, chain.cases[0]!, pose, rest, w, poseScratch(chain.n));
      // Slow enough that rest is near.
      expect(part.at(w, WRENCH * part.joint) / found.peak[b]!).toBeCloseTo(1, 3);
      expect(part.at(found.peakWrench, WRENCH * b)).toBe(found.peak[b]!);
      expect(found.peakTime[b]!).toBeGreaterThanOrEqual(0);
      expect(found.peakTime[b]!).toBeLessThanOrEqual(1000);
    });
  });

  it('passes on a load that is not a number, and a path that leaves the travel between its poses', () => {
    const arm = ready(randomArm(5, { joints: 2, full: 0 }));
    const { chain, parts } = arm;
    const path = sines(chain, 5, 9, 3);
    const load = chain.cases[0]!;
    const broken = { ...load, mass: load.mass.map(() => Number.NaN) };
    expect([...pathWear(chain, broken, path, parts).load].every(Number.isNaN)).toBe(true);
    const tight = { ...chain, to: chain.to.map((to, j) => to - 0.3 * (to - chain.from[j]!)) };
    expect(pathWear(tight, load, path, parts).outside.some((d) => d > 0.01)).toBe(true);
    expect(pathWear(chain, load, path, parts).outside.every((d) => d === 0)).toBe(true);
  });
});
