import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue, form } from '../../src/mechanics/form.ts';
import { type Grid, gridOf, poseAt, sampleAngle } from '../../src/mechanics/gridSweepGrid.ts';
import {
  beaten,
  governing,
  mergeLeaders,
  newLeaders,
  offer,
  packLeaders,
  TIE,
} from '../../src/mechanics/gridSweepLeaders.ts';
import { chunkBox, planSweep } from '../../src/mechanics/gridSweepPlan.ts';
import { PoseValue } from '../../src/mechanics/gridSweepPose.ts';
import { coarseGrid } from '../../src/mechanics/gridSweepSeed.ts';
import { checkSizes } from '../../src/mechanics/gridSweepSizes.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { nestedBalls } from '../../src/mechanics/nestedBalls.ts';
import { nestedCase } from '../../src/mechanics/nestedCase.ts';
import { stagesOf } from '../../src/mechanics/nestedStages.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { randomArm } from '../randomArm.ts';

function gridFor(chain: ReturnType<typeof flattenArm>, samples: number): Grid {
  const outcome = gridOf(chain, { samples });
  if (!outcome.ok) throw new Error('refused');
  return outcome.grid;
}

describe('leaders', () => {
  const tie = TIE * 8;

  it('give the largest value and, of those that count as equal, the lowest index, in any order', () => {
    const values = [1, 5, 5 - tie / 2, 5 - 3 * tie, 5, 4, 5 - tie / 4];
    const random = seededRandom(1);
    for (let round = 0; round < 50; round++) {
      const order = values.map((_, k) => k).sort(() => random.next() - 0.5);
      const leaders = newLeaders(Float64Array.of(8));
      for (const k of order) offer(leaders, 0, values[k]!, k);
      expect(leaders.best[0]).toBe(5);
      expect(governing(leaders, 0)).toBe(1);
    }
  });

  it('let an earlier pose govern that is lower by no more than a tie, and no chain of ties lead further', () => {
    const leaders = newLeaders(Float64Array.of(8));
    for (const [k, value] of [5 - 1.6 * tie, 5 - 0.8 * tie, 5].entries()) offer(leaders, 0, value, k);
    expect(governing(leaders, 0)).toBe(1);
  });

  it('are the same put together from parts as offered one by one', () => {
    const random = seededRandom(2);
    const all = newLeaders(Float64Array.of(8, 1));
    const parts = Array.from({ length: 5 }, () => newLeaders(Float64Array.of(8, 1)));
    for (let k = 0; k < 400; k++) {
      const value = 5 + tie * random.below(4);
      for (const slot of [0, 1]) {
        offer(all, slot, value, k);
        offer(parts[Math.floor(k / 80)]!, slot, value, k);
      }
    }
    const merged = newLeaders(Float64Array.of(8, 1));
    for (const part of parts) mergeLeaders(merged, packLeaders(part));
    for (const slot of [0, 1]) {
      expect(governing(merged, slot)).toBe(governing(all, slot));
      expect(merged.best[slot]).toBe(all.best[slot]);
    }
  });

  it('count what is not finite and name its first pose, whatever else is larger', () => {
    const leaders = newLeaders(Float64Array.of(1));
    offer(leaders, 0, 3, 0);
    offer(leaders, 0, Number.NaN, 7);
    offer(leaders, 0, Number.POSITIVE_INFINITY, 4);
    expect(leaders.failed[0]).toBe(2);
    expect(governing(leaders, 0)).toBe(4);
    expect(leaders.best[0]).toBe(3);
    expect(governing(newLeaders(Float64Array.of(1)), 0)).toBe(-1);
  });

  it('are not beaten by what could tie at an earlier pose', () => {
    const leaders = newLeaders(Float64Array.of(8));
    offer(leaders, 0, 5, 10);
    expect(beaten(leaders, 0, 5, 11)).toBe(true);
    expect(beaten(leaders, 0, 5, 9)).toBe(false);
    expect(beaten(leaders, 0, 5 - 2 * tie, 9)).toBe(true);
    expect(beaten(leaders, 0, 5.1, 11)).toBe(false);
  });
});

describe('stages', () => {
  it('make every sample of a joint, whatever its number, and none that is not there', () => {
    const arm = randomArm(1, { joints: 1, full: 0 });
    const chain = flattenArm(arm);
    for (const samples of [2, 3, 16, 17, 24, 37, 72, 100, 361, 1000, 4801]) {
      const grid = gridFor(chain, samples);
      const stages = stagesOf(grid, [0], [samples - 1]);
      let made = [{ angle: 0, index: 0 }];
      for (const stage of stages) {
        made = made.flatMap(({ angle, index }) =>
          Array.from(stage.offset, (offset, k) => ({
            angle: angle + Math.atan2(stage.sin[k]!, stage.cos[k]!),
            index: index + offset,
          })),
        );
      }
      expect(new Set(made.map(({ index }) => index)).size).toBe(samples);
      for (const { angle, index } of made) {
        expect(index).toBeGreaterThanOrEqual(0);
        expect(index).toBeLessThan(samples);
        expect(Math.cos(angle - sampleAngle(grid, 0, index))).toBeCloseTo(1, 12);
      }
    }
  });

  it('hold in their balls what the joints make of gravity, seen from every joint (seeds 1–20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const arm = randomArm(seed, { joints: 5, force: seed % 2 ? 'base' : 'tool' });
      const chain = flattenArm(arm);
      const load = nestedCase(chain, chain.cases[0]!);
      const grid = gridFor(chain, 40);
      const random = seededRandom(seed);
      const low = grid.count.map((count) => random.below(count));
      const high = grid.count.map((count, j) => Math.min(count - 1, low[j]! + random.below(12)));
      const stages = stagesOf(grid, low, high);
      const balls = nestedBalls(chain, load, stages);
      const scratch = poseScratch(5);
      for (let round = 0; round < 50; round++) {
        const pose = low.map((k, j) => sampleAngle(grid, j, k + random.below(high[j]! - k + 1)));
        staticLoads(chain, chain.cases[0]!, pose, new Float64Array(30), scratch);
        stages.forEach((stage, s) => {
          if (!stage.first || stage.joint === 0) return;
          // gravity in the housing frame: undo the turn of the joint itself
          const i = stage.joint;
          const [c, n] = [Math.cos(pose[i]!), Math.sin(pose[i]!)];
          const [x, y, z] = scratch.gravity.subarray(3 * i, 3 * i + 3);
          const at = 3 * load.pairs * s;
          const apart = Math.hypot(
            c * x! - n * y! - balls.inCentre[at]!,
            n * x! + c * y! - balls.inCentre[at + 1]!,
            z! - balls.inCentre[at + 2]!,
          );
          expect(apart).toBeLessThanOrEqual(balls.inRadius[load.pairs * s]! + 1e-12 * 9.81);
        });
      }
    }
  });
});

describe('chunks', () => {
  it('are disjoint boxes that make up the grid (seeds 1–12)', () => {
    for (let seed = 1; seed <= 12; seed++) {
      const arm = randomArm(seed, { joints: 3, force: seed % 2 ? 'any' : 'none' });
      const chain = flattenArm(seed % 3 ? arm : { ...arm, gravity: [0, Number.NaN, 0] });
      const grid = gridFor(chain, 30);
      const plan = planSweep(chain, loadChecks(arm, chain), grid);
      const seen = new Uint8Array(grid.poses);
      const low = new Float64Array(3);
      const high = new Float64Array(3);
      for (let chunk = 0; chunk < plan.chunks; chunk++) {
        const poses = chunkBox(plan, chunk, low, high);
        let counted = 0;
        for (let a = low[0]!; a <= high[0]!; a++) {
          for (let b = low[1]!; b <= high[1]!; b++) {
            for (let c = low[2]!; c <= high[2]!; c++) {
              seen[a * grid.stride[0]! + b * grid.stride[1]! + c]!++;
              counted++;
            }
          }
        }
        expect(counted).toBe(poses);
      }
      expect(seen.every((times) => times === 1)).toBe(true);
    }
  });

  it('stay few however many poses there are', () => {
    const arm = randomArm(3, { joints: 6, force: 'any' });
    const chain = flattenArm(arm);
    const plan = planSweep(chain, loadChecks(arm, chain), gridFor(chain, 90));
    expect(plan.chunks).toBeLessThanOrEqual(2 ** 15);
    expect(plan.grid.poses).toBeGreaterThan(1e11);
  });

  it('start from poses of the grid itself: a coarse grid keeps their indices', () => {
    const chain = flattenArm(randomArm(5, { joints: 4, full: 0.5 }));
    const grid = gridFor(chain, 23);
    const coarse = coarseGrid(grid, 300);
    expect(coarse.poses).toBeLessThan(grid.poses);
    const [a, b] = [new Float64Array(4), new Float64Array(4)];
    const sample = new Float64Array(4);
    for (let k = 0; k < coarse.poses; k++) {
      let rest = k;
      let index = 0;
      for (let j = 3; j >= 0; j--) {
        sample[j] = rest % coarse.count[j]!;
        rest = Math.floor(rest / coarse.count[j]!);
        index += sample[j]! * coarse.stride[j]!;
      }
      poseAt(grid, index, a);
      poseAt(coarse, index, b);
      a.forEach((angle, j) => {
        expect(b[j]).toBeCloseTo(angle, 12);
      });
    }
  });
});

describe('sizes and bounds at a pose', () => {
  it('a size is reached by no load, at rest or in motion (seeds 1–30)', () => {
    for (let seed = 1; seed <= 30; seed++) {
      const arm = randomArm(seed, { joints: 4, force: 'tool', motion: true, drives: seed % 2 === 0 });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const checks = loadChecks(arm, chain);
      const sizes = checkSizes(chain, load, checks);
      const random = seededRandom(seed);
      const out = new Float64Array(24);
      for (let round = 0; round < 40; round++) {
        const pose = Array.from({ length: 4 }, () => random.between(-3, 3));
        const pick = (limits: Float64Array) => Array.from(limits, (limit) => (random.next() < 0.5 ? limit : -limit));
        const rates = { speed: pick(load.speed!), accel: pick(load.accel!) };
        dynamicLoads(chain, load, pose, rates, out, poseScratch(4));
        checks.forEach((check, c) => {
          expect(checkValue(check, out, 6 * check.joint)).toBeLessThanOrEqual(sizes[c]!);
        });
      }
    }
  });

  it('the quick bound of a free case is never below its worst: loads, drives, three rows, linear parts (seeds 1–24)', () => {
    for (let seed = 1; seed <= 24; seed++) {
      const motion = seed % 3 > 0;
      const force = seed % 3 === 1 ? 'none' : 'any';
      const arm = randomArm(seed, { joints: 3, force, motion, drives: seed % 2 === 0 });
      const chain = flattenArm(arm);
      const made: CheckForm = {
        check: 'made up',
        joint: 1,
        bearing: null,
        unit: 'N',
        forms: [
          form({ P: [[1, 0, 0, 0, 3, 0], [0, 1, 0, -3, 0, 0], [0, 0, 0, 0, 0, 2]], l: [0, 0, 0.7, 1, 0, 0], o: 3 }),
          form({ P: [[1, 0, 0, 0, 3, 0], [0, 1, 0, -3, 0, 0]], l: [0, 0, -0.7, 0, 0, 0], torque: [0, 9] }),
        ],
      }; // biome-ignore format: matrices
      const checks = [...loadChecks(arm, chain), made];
      const grid = gridFor(chain, 6);
      const at = new PoseValue(chain, chain.cases[0]!, checks, grid);
      const random = seededRandom(seed);
      for (let round = 0; round < 4; round++) {
        at.set(random.below(grid.poses));
        checks.forEach((_, c) => {
          const value = at.value(c);
          const bound = at.bound(c, Number.NEGATIVE_INFINITY);
          if (Number.isNaN(value)) return;
          expect(bound).toBeGreaterThanOrEqual(value - 1e-9 * Math.abs(value));
        });
      }
    }
  });
});
