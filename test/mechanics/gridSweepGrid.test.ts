import { describe, expect, it } from 'vitest';
import type { Chain } from '../../src/mechanics/chain.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import {
  type Grid,
  type GridChoice,
  gridOf,
  POSE_LIMIT,
  poseAt,
  sampleAngle,
} from '../../src/mechanics/gridSweepGrid.ts';
import { randomArm } from '../randomArm.ts';

const DEGREE = Math.PI / 180;

function chainWith(travels: readonly (readonly [number, number, boolean?])[]): Chain {
  const arm = randomArm(1, { joints: travels.length });
  return flattenArm({
    ...arm,
    joints: arm.joints.map((joint, j) => {
      const [from, to, full = false] = travels[j]!;
      return { ...joint, travel: { from: from * DEGREE, to: to * DEGREE, full } };
    }),
  });
}

function grid(chain: Chain, choice: GridChoice): Grid {
  const outcome = gridOf(chain, choice);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
  return outcome.grid;
}

function degrees(of: Grid, j: number): number[] {
  return Array.from({ length: of.count[j]! }, (_, k) => Math.round((sampleAngle(of, j, k) / DEGREE) * 1e9) / 1e9);
}

describe('the grid of a sweep', () => {
  it('shortens a step to fit, both ends included', () => {
    expect(degrees(grid(chainWith([[-10, 90]]), { step: 30 * DEGREE }), 0)).toEqual([-10, 15, 40, 65, 90]);
    expect(degrees(grid(chainWith([[0, 90]]), { step: 30 * DEGREE }), 0)).toEqual([0, 30, 60, 90]);
    expect(degrees(grid(chainWith([[0, 10]]), { step: 30 * DEGREE }), 0)).toEqual([0, 10]);
  });

  it('ends exactly on both ends of the travel', () => {
    const chain = chainWith([[-17.3, 101.9]]);
    for (const choice of [{ step: 0.013 }, { samples: 37 }]) {
      const own = grid(chain, choice);
      expect(sampleAngle(own, 0, 0)).toBe(chain.from[0]);
      expect(sampleAngle(own, 0, own.count[0]! - 1)).toBe(chain.to[0]);
    }
  });

  it('does not count the pose where a full turn closes twice', () => {
    expect(degrees(grid(chainWith([[-180, 180, true]]), { step: 90 * DEGREE }), 0)).toEqual([-180, -90, 0, 90]);
    expect(degrees(grid(chainWith([[-180, 180, true]]), { samples: 5 }), 0)).toEqual([-180, -90, 0, 90]);
    expect(degrees(grid(chainWith([[-180, 180, false]]), { samples: 5 }), 0)).toEqual([-180, -90, 0, 90, 180]);
  });

  it('keeps a step that divides a travel, whatever rounding says', () => {
    for (const step of [1, 3, 5, 7.5, 15, 22.5, 30, 45]) {
      expect(grid(chainWith([[-180, 180, true]]), { step: step * DEGREE }).poses).toBe(360 / step);
      expect(grid(chainWith([[-90, 90]]), { step: step * DEGREE }).poses).toBe(180 / step + 1);
    }
  });

  it('gives one sample to a joint without travel', () => {
    const own = grid(chainWith([[20, 20], [0, 90]]), { samples: 4 }); // biome-ignore format: pairs
    expect([...own.count]).toEqual([1, 4]);
    expect(own.poses).toBe(4);
    expect(degrees(own, 0)).toEqual([20]);
  });

  it('numbers poses with the first joint slowest', () => {
    const own = grid(chainWith([[0, 10], [0, 20], [0, 30]]), { samples: 3 }); // biome-ignore format: pairs
    expect(own.poses).toBe(27);
    const pose = new Float64Array(3);
    const seen = new Set<string>();
    for (let p = 0; p < 27; p++) {
      poseAt(own, p, pose);
      seen.add(pose.join());
    }
    expect(seen.size).toBe(27);
    poseAt(own, 9 * 2 + 3 * 1 + 0, pose);
    expect([...pose].map((q) => Math.round(q / DEGREE))).toEqual([10, 10, 0]);
  });

  it('refuses too many poses and says the smallest step that fits', () => {
    const chain = chainWith(Array.from({ length: 7 }, () => [-170, 170] as const));
    const outcome = gridOf(chain, { step: 1 * DEGREE });
    if (outcome.ok) throw new Error('not refused');
    const { refusal } = outcome;
    expect(refusal).toMatchObject({ code: 'too-many-poses', path: 'step', limit: POSE_LIMIT });
    expect(refusal.poses).toBeCloseTo(341 ** 7, -10);
    expect(grid(chain, { step: refusal.fits! }).poses).toBeLessThanOrEqual(POSE_LIMIT);
    expect(gridOf(chain, { step: refusal.fits! * (1 - 1e-6) }).ok).toBe(false);
  });

  it('refuses too many samples and says the most that fit', () => {
    const chain = chainWith(Array.from({ length: 7 }, () => [-170, 170] as const));
    const outcome = gridOf(chain, { samples: 100 });
    if (outcome.ok) throw new Error('not refused');
    expect(outcome.refusal.fits).toBe(51);
    expect(grid(chain, { samples: 51 }).poses).toBe(51 ** 7);
    expect(gridOf(chain, { samples: 52 }).ok).toBe(false);
  });

  it('says so where no grid is coarse enough', () => {
    const chain = chainWith(Array.from({ length: 41 }, () => [-170, 170] as const));
    for (const choice of [{ step: 1 }, { samples: 2 }]) {
      const outcome = gridOf(chain, choice);
      expect(outcome).toMatchObject({ ok: false, refusal: { code: 'too-many-poses', fits: null } });
    }
  });

  it('refuses a step or a number of samples that is none', () => {
    const chain = chainWith([[0, 90]]);
    for (const step of [0, -1, Number.NaN, Number.POSITIVE_INFINITY]) {
      expect(gridOf(chain, { step })).toMatchObject({ ok: false, refusal: { code: 'step' } });
    }
    for (const samples of [0, 1, -3, 2.5, Number.NaN]) {
      expect(gridOf(chain, { samples })).toMatchObject({ ok: false, refusal: { code: 'samples', fits: 2 } });
    }
  });
});
