/** The certified worst of weights against an adversary that knows nothing of tables: 180 random arms of 1 to 9 joints, 20 kinds. */
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { GravityClimb } from '../../src/mechanics/gravityClimb.ts';
import { gravityLoad } from '../../src/mechanics/gravityLoad.ts';
import { GravitySearch, gapOf, isHomogeneous } from '../../src/mechanics/gravitySearch.ts';
import { randomArm } from '../randomArm.ts';
import { allChecks, type Claim, contradictions } from './adversary.ts';
import { WEIGHT_KINDS, withTravel } from './armKinds.ts';

/** Rounds until every gap is closed or the level is reached: bounds must hold at any level, so long arms stay coarse. */
function claims(arm: Arm, gap: number, top: number): readonly Claim[] {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const checks = allChecks(arm, chain).filter(isHomogeneous);
  const search = new GravitySearch(chain, load, gravityLoad(chain, load)!, checks, new GravityClimb(chain, load));
  const open = () => search.entries.some((entry) => entry.level < top && gapOf(entry) > gap);
  while (open()) search.round(gap);
  return search.entries.map(({ check, found, pose, bound }) => ({ check, found, pose, bound, free: null }));
}

/** Coarsest gap and finest level for so many joints. */
function effort(joints: number): readonly [number, number] {
  return joints <= 3 ? [5e-3, 7] : joints <= 5 ? [2e-2, 4] : [0.1, joints === 6 ? 1 : 0];
}

describe('no pose of 10,000, some climbed, exceeds a bound of weights', () => {
  WEIGHT_KINDS.forEach((kind, k) => {
    const first = 10 * k + 1;
    it(`${kind.name}: 1–9 joints, seeds ${first}–${first + 8}`, () => {
      const said: string[] = [];
      for (let joints = 1; joints <= 9; joints++) {
        const seed = first + joints - 1;
        const arm = kind.make(seed, joints);
        const found = contradictions(arm, 0, claims(arm, ...effort(joints)), { seed, poses: 10_000, climbs: 1 });
        said.push(...found.map((line) => `seed ${seed}: ${line}`));
      }
      expect(said).toEqual([]);
    });
  });
});

describe('what the adversary found', () => {
  it('a last joint of 1e-9 to 1e-6 rad of travel keeps its reach (seeds 1–12)', () => {
    const said: string[] = [];
    for (let seed = 1; seed <= 12; seed++) {
      const arm = withTravel(randomArm(seed, { joints: 1 + (seed % 6), full: 0 }), 1e-9 * 10 ** (seed % 4));
      const found = contradictions(arm, 0, claims(arm, 1e-3, 3), { seed, poses: 500, climbs: 2 });
      said.push(...found.map((line) => `seed ${seed}: ${line}`));
    }
    expect(said).toEqual([]);
  });
});
