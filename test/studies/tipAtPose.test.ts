/** Tip error at one pose as a check: the same figure as the study of play, under a bound where a case leaves something free. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { armGives, tipErrorAt } from '../../src/studies/play.ts';
import { TipErrors } from '../../src/studies/playTip.ts';
import { tipAtPose } from '../../src/studies/tipAtPose.ts';

function model(name: string): Arm {
  const reading = readArm(readFileSync(`models/${name}.arm.json`, 'utf8'));
  if (!reading.ok) throw new Error(`${name} is not sound`);
  return reading.arm;
}

const asking = (arm: Arm, tipError: number | null): Arm => ({ ...arm, targets: { ...arm.targets, tipError } });
const ARMS = ['two-link', 'four-joint-vertical', 'picking-arm'] as const;

describe.each(ARMS)('tip error at a pose of %s, seed 5', (name) => {
  const arm = model(name);
  const chain = flattenArm(arm);
  const gives = armGives(arm, chain);
  const random = seededRandom(5);
  const poses = Array.from({ length: 12 }, () =>
    chain.names.map((_, j) => random.between(chain.from[j]!, chain.to[j]!)),
  );

  it('is that of the play study where the case leaves nothing free, and its shares add up', () => {
    for (const pose of poses) {
      tipAtPose(arm, chain, pose).forEach(({ row, made }, k) => {
        const load = chain.cases[k]!;
        expect(row.case).toBe(load.name);
        if (load.force !== 'any') expect(row.value).toBe(tipErrorAt(arm, chain, pose, load).total);
        expect(made!.shares.reduce((sum, share) => sum + share, 0)).toBeCloseTo(row.value, 12);
      });
    }
  });

  it('stays under its bound for any direction of a free tip force, and passes by the bound alone', () => {
    let free = 0;
    for (const pose of poses) {
      for (const [k, load] of chain.cases.entries()) {
        if (load.force !== 'any') continue;
        free++;
        const errors = new TipErrors(chain, load, gives);
        let most = 0;
        for (let t = 0; t < 60; t++) {
          most = Math.max(most, errors.at(pose, random.direction()).total);
        }
        const at = (target: number) => tipAtPose(asking(arm, target), chain, pose, null, gives)[k]!.row;
        // Asked for what a direction reaches and no more, it must not pass.
        expect(at(most * (1 - 1e-9)).verdict).not.toBe('pass');
        const { value } = at(1);
        expect(at(value * (1 - 1e-9)).verdict).toBe('over');
        expect(at(1).verdict).toBe('pass');
      }
    }
    if (name !== 'two-link') expect(free).toBeGreaterThan(0);
  });

  it('is unassessed, and says what to fill in, without a demand or where a joint is not known', () => {
    const pose = poses[0]!;
    const [without] = tipAtPose(asking(arm, null), chain, pose);
    expect(without!.row).toMatchObject({ verdict: 'unassessed', allowable: null });
    expect(without!.row.reason).toContain('tip_error_mm');
    expect(Number.isFinite(without!.row.value)).toBe(true);
    const bare = { ...arm, joints: arm.joints.map((joint, k) => (k === 0 ? { ...joint, support: null } : joint)) };
    const [open] = tipAtPose(asking(bare, 1), flattenArm(bare), pose);
    expect(open).toMatchObject({ made: null, row: { verdict: 'unassessed' } });
    expect(open!.row.reason).toContain('fill in `support`');
    expect(Number.isNaN(open!.row.value)).toBe(true);
  });

  it('refuses a pose of the wrong length', () => {
    expect(() => tipAtPose(arm, chain, [])).toThrow(RangeError);
  });
});
