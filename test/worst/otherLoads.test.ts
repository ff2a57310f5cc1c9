/** The certified worst of every load that is more than weights against the same adversary: 189 random arms of 1 to 9 joints, 21 kinds. */
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import { allChecks, type Claim, contradictions, some } from './adversary.ts';
import { OTHER_KINDS } from './armKinds.ts';

const GAP = 2e-2;
/** Checks of an arm looked at, and slices of work: a bound must hold however far the search has come. */
const CHECKS = 4;
const SLICES = 18;
/** In motion both cost more. */
const MOVING = { checks: 2, slices: 8 };

function claims(arm: Arm, seed: number): readonly Claim[] {
  const chain = flattenArm(arm);
  const { checks, slices } = arm.cases[0]!.motion ? MOVING : { checks: CHECKS, slices: SLICES };
  const search = new WorstCase(chain, chain.cases[0]!, some(allChecks(arm, chain), checks, seed));
  for (let k = 0; k < slices && search.open(GAP); k++) search.step(GAP);
  return search.rows();
}

describe('no pose of 10,000, some climbed, exceeds a bound of other loads', () => {
  OTHER_KINDS.forEach((kind, k) => {
    const first = 1000 + 10 * k + 1;
    it(`${kind.name}: 1–9 joints, seeds ${first}–${first + 8}`, () => {
      const said: string[] = [];
      for (let joints = 1; joints <= 9; joints++) {
        const seed = first + joints - 1;
        const arm = kind.make(seed, joints);
        const found = contradictions(arm, 0, claims(arm, seed), {
          seed,
          poses: 10_000,
          climbs: arm.cases[0]!.motion ? 1 : 2,
        });
        said.push(...found.map((line) => `seed ${seed}: ${line}`));
      }
      expect(said).toEqual([]);
    });
  });
});
