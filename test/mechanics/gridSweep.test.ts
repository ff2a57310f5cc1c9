import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue, form } from '../../src/mechanics/form.ts';
import { hasFree, worstAtPose } from '../../src/mechanics/freeLoads.ts';
import { type Grid, type GridChoice, gridOf, poseAt } from '../../src/mechanics/gridSweepGrid.ts';
import { newLeaders, TIE } from '../../src/mechanics/gridSweepLeaders.ts';
import { PlainSweep } from '../../src/mechanics/gridSweepPlain.ts';
import { checkSizes } from '../../src/mechanics/gridSweepSizes.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { sweepArm } from '../../src/studies/sweepArm.ts';
import { inlinePool } from '../../src/worker/inlinePool.ts';
import { randomArm } from '../randomArm.ts';

function gridFor(chain: Chain, choice: GridChoice): Grid {
  const outcome = gridOf(chain, choice);
  if (!outcome.ok) throw new Error('refused');
  return outcome.grid;
}

/** Every pose by the plain recursion, every value kept: the largest, then the first that counts as equal to it. */
function bruteForce(chain: Chain, checks: readonly CheckForm[], grid: Grid, k: number) {
  const load = chain.cases[k]!;
  const sizes = checkSizes(chain, load, checks);
  const values = checks.map(() => new Float64Array(grid.poses));
  const pose = new Float64Array(chain.n);
  const loads = new Float64Array(6 * chain.n);
  const scratch = poseScratch(chain.n);
  for (let p = 0; p < grid.poses; p++) {
    poseAt(grid, p, pose);
    staticLoads(chain, load, pose, loads, scratch);
    checks.forEach((check, c) => {
      values[c]![p] = hasFree(load)
        ? worstAtPose(chain, load, pose, check).value
        : checkValue(check, loads, 6 * check.joint);
    });
  }
  return values.map((own, c) => {
    const most = own.reduce((a, b) => Math.max(a, b));
    const index = own.findIndex((value) => value >= most - TIE * sizes[c]!);
    return { index, value: own[index]!, most, size: sizes[c]! };
  });
}

async function expectBruteForce(arm: Arm, choice: GridChoice, given: readonly CheckForm[] | null = null) {
  const chain = flattenArm(arm);
  const checks = given ?? loadChecks(arm, chain);
  const grid = gridFor(chain, choice);
  const result = await sweepArm(arm, choice, { pool: inlinePool(), checks });
  expect(result).toMatchObject({ poses: grid.poses, done: grid.poses, partial: false });
  expect(result.eachCase).toHaveLength(checks.length * chain.cases.length);
  chain.cases.forEach((load, k) => {
    bruteForce(chain, checks, grid, k).forEach((brute, c) => {
      const row = result.eachCase[c * chain.cases.length + k]!;
      const pose = new Float64Array(chain.n);
      poseAt(grid, brute.index, pose);
      const where = `${arm.name}, ${load.name}, joint ${row.joint} ${row.bearing} ${row.check}`;
      expect(row.pose, where).toEqual([...pose]);
      expect(row.value, where).toBe(brute.value);
      expect(Math.abs(row.value - brute.most), where).toBeLessThanOrEqual(1e-12 * brute.size);
    });
  });
}

const FORCES = ['none', 'base', 'tool'] as const;

describe('grid sweep = brute force over the same grid, pose for pose', () => {
  it('random arms of 1 to 6 joints, no, base-fixed and tool-fixed tip force (seeds 1–36)', async () => {
    for (let seed = 1; seed <= 36; seed++) {
      const joints = 1 + (seed % 6);
      const samples = [0, 40, 20, 9, 6, 5, 4][joints]!;
      const arm = randomArm(seed, { joints, force: FORCES[seed % 3]!, drives: seed % 4 === 0 });
      await expectBruteForce(arm, { samples });
    }
  });

  it('parallel axes, coincident origins, full turns (seeds 101–112)', async () => {
    for (let seed = 101; seed <= 112; seed++) {
      const joints = 2 + (seed % 4);
      const arm = randomArm(seed, { joints, force: FORCES[seed % 3]!, parallel: 0.7, coincident: 0.4, full: 0.5 });
      await expectBruteForce(arm, { samples: 14 - 2 * joints });
    }
  });

  it('first axis along gravity, where most poses tie (seeds 121–129)', async () => {
    for (let seed = 121; seed <= 129; seed++) {
      const arm = randomArm(seed, { joints: 4, force: FORCES[seed % 3]!, parallel: seed % 2 });
      const first = arm.joints[0]!;
      const eye = [1, 0, 0, 0, 1, 0, 0, 0, 1] as const;
      const upright = {
        ...arm,
        gravity: [0, 0, -9.80665] as const,
        joints: [{ ...first, axis: [0, 0, 1] as const, placement: { position: [0, 0, 0.1] as const, rotation: eye } }],
      };
      await expectBruteForce({ ...upright, joints: [...upright.joints, ...arm.joints.slice(1)] }, { samples: 7 });
    }
  });

  it('some joints without travel (seeds 131–136)', async () => {
    for (let seed = 131; seed <= 136; seed++) {
      const arm = randomArm(seed, { joints: 5, force: FORCES[seed % 3]! });
      const held = arm.joints.map((joint, j) =>
        (seed + j) % 2 === 0
          ? joint
          : { ...joint, travel: { from: joint.travel.from, to: joint.travel.from, full: false } },
      );
      await expectBruteForce({ ...arm, joints: held }, { samples: 9 });
    }
  });

  it('a tip force along gravity and against it (seeds 141–144)', async () => {
    for (let seed = 141; seed <= 144; seed++) {
      const arm = randomArm(seed, { joints: 4 });
      const g = Math.hypot(...arm.gravity);
      const sign = seed % 2 ? 1 : -1;
      const [x, y, z] = arm.gravity;
      const unit = [(sign * x) / g, (sign * y) / g, (sign * z) / g] as const;
      const load = { ...arm.cases[0]!, tipForce: { magnitude: 70, direction: 'base' as const, unit } };
      await expectBruteForce({ ...arm, cases: [load] }, { samples: 7 });
    }
  });

  it('several cases, each its own; the worst over them by value, then by order (seeds 151–153)', async () => {
    for (let seed = 151; seed <= 153; seed++) {
      const arm = randomArm(seed, { joints: 3, force: 'base' });
      const light = { ...arm.cases[0]!, name: 'light', factor: 0.5 };
      const tool = randomArm(seed, { joints: 3, force: 'tool' }).cases[0]!;
      const three = {
        ...arm,
        cases: [light, arm.cases[0]!, { ...tool, name: 'tool' }, { ...arm.cases[0]!, name: 'again' }],
      };
      await expectBruteForce(three, { samples: 8 });
      const result = await sweepArm(three, { samples: 8 }, { pool: inlinePool() });
      expect(result.rows).toHaveLength(result.eachCase.length / 4);
      result.rows.forEach((row, c) => {
        const own = result.eachCase.slice(4 * c, 4 * c + 4);
        expect(row.value).toBe(Math.max(...own.map((one) => one.value)));
        expect(row).toEqual(own.find((one) => one.value === row.value));
        expect(row.case).not.toBe('again');
      });
    }
  });

  it('forms with three rows, linear parts and offsets (seeds 161–166)', async () => {
    for (let seed = 161; seed <= 166; seed++) {
      const arm = randomArm(seed, { joints: 4, force: FORCES[seed % 3]! });
      const chain = flattenArm(arm);
      const checks: CheckForm[] = chain.names.map((_, joint) => ({
        check: 'made up',
        joint,
        bearing: null,
        unit: 'N',
        forms: [
          form({ P: [[1, 0, 0, 0, 3, 0], [0, 1, 0, -3, 0, 0], [0, 0, 0, 0, 0, 2]], l: [0, 0, 0.7, 1, 0, 0], o: 3 }),
          form({ P: [[0.4, 0, 0, 0, 0, 0]], c: [12], l: [0, 0, -0.7, 0, 0, 0], torque: [0, Number.POSITIVE_INFINITY] }),
        ],
      })); // biome-ignore format: matrices
      await expectBruteForce(arm, { samples: 7 }, checks);
    }
  });

  it('tip forces of any direction and motion, with and without drives (seeds 171–182)', async () => {
    for (let seed = 171; seed <= 182; seed++) {
      const motion = seed % 3 !== 0;
      const force = seed % 3 === 2 ? 'none' : 'any';
      const arm = randomArm(seed, { joints: 1 + (seed % 3), force, motion, drives: seed % 4 === 0 });
      await expectBruteForce(arm, { samples: 4 });
    }
  });

  it('a first axis along gravity in motion, parallel axes (seeds 191–193)', async () => {
    for (let seed = 191; seed <= 193; seed++) {
      const arm = randomArm(seed, { joints: 3, motion: true, parallel: 1 });
      const along = { ...arm, gravity: arm.joints[0]!.axis };
      await expectBruteForce(along, { samples: 4 });
    }
  });
});

describe('grid sweep, what it reports', () => {
  it('gives the joint load in the frame of the file at the governing pose', async () => {
    const arm = randomArm(201, { joints: 3, force: 'base' });
    const result = await sweepArm(arm, { samples: 6 }, { pool: inlinePool() });
    const chain = flattenArm(arm);
    for (const row of result.rows) {
      const loads = new Float64Array(18);
      staticLoads(chain, chain.cases[0]!, row.pose, loads, poseScratch(3));
      const i = row.jointIndex;
      expect(Math.hypot(...row.wrench.force)).toBeCloseTo(
        Math.hypot(loads[6 * i]!, loads[6 * i + 1]!, loads[6 * i + 2]!),
        9,
      );
      const axis = arm.joints[i]!.axis;
      const torque = axis[0] * row.wrench.moment[0] + axis[1] * row.wrench.moment[1] + axis[2] * row.wrench.moment[2];
      expect(torque).toBeCloseTo(loads[6 * i + 5]!, 9);
      expect(row.verdict).toBeNull();
    }
  });

  it('gives the choice that attains the worst of a free case', async () => {
    const arm = randomArm(202, { joints: 2, force: 'any', motion: true });
    const result = await sweepArm(arm, { samples: 4 }, { pool: inlinePool() });
    for (const row of result.rows) {
      expect(Math.hypot(...row.free!.tipForce!)).toBeCloseTo(1, 12);
      expect(row.free!.speed).toHaveLength(2);
      expect(row.free!.accel).toHaveLength(2);
    }
  });

  it('sweeps the named cases alone', async () => {
    const arm = randomArm(203, { joints: 2 });
    const two = { ...arm, cases: [arm.cases[0]!, { ...arm.cases[0]!, name: 'double', factor: 2 }] };
    const result = await sweepArm(two, { samples: 4 }, { pool: inlinePool(), cases: ['double'] });
    expect(new Set(result.eachCase.map((row) => row.case))).toEqual(new Set(['double']));
    await expect(sweepArm(two, { samples: 4 }, { pool: inlinePool(), cases: [] })).rejects.toThrow(RangeError);
  });

  it('never hides a value that is not finite: NaN, with the first pose that failed', async () => {
    for (const mass of [Number.NaN, Number.POSITIVE_INFINITY]) {
      const arm = randomArm(204, { joints: 3 });
      const broken = arm.joints.map((joint, j) => (j === 1 ? { ...joint, link: { ...joint.link, mass } } : joint));
      const result = await sweepArm({ ...arm, joints: broken }, { samples: 4 }, { pool: inlinePool() });
      for (const row of result.rows) {
        if (row.jointIndex <= 1 && row.check === 'moment') {
          expect(row.value).toBeNaN();
          expect(row.reason).toContain('not a finite');
          expect(row.pose).toEqual(arm.joints.map((joint) => joint.travel.from));
        }
        if (row.jointIndex === 2) expect(row.value).toBeGreaterThanOrEqual(0);
      }
      expect(result.rows.filter((row) => Number.isNaN(row.value)).length).toBeGreaterThan(4);
    }
  });

  it('counts every failed value', () => {
    const arm = randomArm(205, { joints: 2 });
    const chain = flattenArm({ ...arm, gravity: [0, Number.NaN, -9.81] });
    const checks = loadChecks(arm, chain);
    const grid = gridFor(chain, { samples: 5 });
    const leaders = newLeaders(checkSizes(chain, chain.cases[0]!, checks));
    new PlainSweep(chain, chain.cases[0]!, checks, grid).run([0, 0], [grid.count[0]! - 1, grid.count[1]! - 1], leaders);
    const moment = checks.findIndex((check) => check.check === 'moment');
    expect(leaders.failed[moment]).toBe(grid.poses);
    expect(leaders.firstFailed[moment]).toBe(0);
  });
});
