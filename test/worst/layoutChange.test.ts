/** A changed layout searched from the one before: only what changed is searched again, and the answer is that of a fresh search. */
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { withLinkMass, withPair } from '../../src/arm/changeArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { GravityClimb } from '../../src/mechanics/gravityClimb.ts';
import { gravityLoad } from '../../src/mechanics/gravityLoad.ts';
import { GravitySearch, gapOf, isHomogeneous } from '../../src/mechanics/gravitySearch.ts';
import { sameJointLoad } from '../../src/mechanics/sameLoad.ts';
import { WorstCase, type WorstRow } from '../../src/mechanics/worstCase.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';
import { allChecks, contradictions, nameOf, some } from './adversary.ts';
import { withCases, withJoints, withParts } from './armKinds.ts';

const GAP = 1e-2;

function weights(arm: Arm, previous: GravitySearch | null = null) {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const checks = allChecks(arm, chain).filter(isHomogeneous);
  const climb = new GravityClimb(chain, load);
  return new GravitySearch(chain, load, gravityLoad(chain, load)!, checks, climb, previous);
}

function finish(search: GravitySearch): GravitySearch {
  while (search.open(GAP)) search.round(GAP);
  return search;
}

/** Joints of which some check is searched anew. */
function anew(search: GravitySearch): readonly number[] {
  return [...new Set(search.entries.filter((entry) => entry.level < 0).map((entry) => entry.check.joint))];
}

/** Every gap closed, and the true worst within both pairs of value and bound. */
function agree(a: GravitySearch, b: GravitySearch): void {
  expect(a.entries.map((entry) => nameOf(entry.check))).toEqual(b.entries.map((entry) => nameOf(entry.check)));
  a.entries.forEach((entry, k) => {
    const other = b.entries[k]!;
    expect(gapOf(entry)).toBeLessThanOrEqual(GAP);
    const slack = 1e-9 * entry.ceiling;
    expect(entry.found).toBeLessThanOrEqual(other.bound + slack);
    expect(other.found).toBeLessThanOrEqual(entry.bound + slack);
    expect(Math.abs(entry.bound - other.bound)).toBeLessThanOrEqual(1.01 * GAP * other.bound + slack);
  });
}

describe('a changed layout under weights', () => {
  it('span of one joint: its checks alone begin anew, every outward set serves again (seeds 1–3)', () => {
    for (let seed = 1; seed <= 3; seed++) {
      const arm = withParts(randomArm(seed, { joints: 3 }), seed);
      const before = finish(weights(arm));
      const joint = arm.joints.findIndex((one) => one.support?.arrangement !== 'ring');
      const support = arm.joints[joint]!.support as { span: number };
      const wider = withPair(arm, joint, { span: 1.1 * support.span });
      const known = new Map(before.entries.map((entry) => [nameOf(entry.check), entry]));
      const after = weights(wider, before);
      expect(anew(after)).toEqual([joint]);
      for (let k = 0; k < 3; k++) expect(after.sets.shares(k, before.sets)).toBe(true);
      for (const entry of after.entries) {
        if (entry.level >= 0) expect(known.get(nameOf(entry.check))).toBe(entry);
        expect(allChecks(wider, flattenArm(wider)).some((check) => nameOf(check) === nameOf(entry.check))).toBe(true);
      }
      // Moment, torque and thrust of the joint do not depend on its span
      const fresh = after.entries.filter((entry) => entry.level < 0).map((entry) => entry.check);
      expect(
        fresh.every((check) => check.bearing !== null || check.check === 'stress' || check.check === 'deflection'),
      ).toBe(true);
      agree(finish(after), finish(weights(wider)));
    }
  });

  it('mass of one link: joints inboard of it begin anew, those outboard stay with their sets (seeds 11–14)', () => {
    for (let seed = 11; seed <= 14; seed++) {
      const arm = randomArm(seed, { joints: 5, full: 0, coincident: 0 });
      const before = finish(weights(arm));
      const after = weights(withLinkMass(arm, 2, 1.3), before);
      expect(anew(after)).toEqual([0, 1, 2]);
      expect([0, 1, 2, 3, 4].map((k) => after.sets.shares(k, before.sets))).toEqual([false, false, false, true, true]);
      agree(finish(after), finish(weights(withLinkMass(arm, 2, 1.3))));
    }
  });

  it('mass on its own axis leaves the outward sets and still changes the loads (seed 21)', () => {
    const arm = withJoints(randomArm(21, { joints: 3, full: 0 }), (joint, k) =>
      k === 0 ? { ...joint, link: { ...joint.link, centre: [0, 0, 0] } } : joint,
    );
    const before = finish(weights(arm));
    const after = weights(withLinkMass(arm, 0, 3), before);
    expect([0, 1, 2].map((k) => after.sets.shares(k, before.sets))).toEqual([true, true, true]);
    expect(anew(after)).toEqual([0]);
    agree(finish(after), finish(weights(withLinkMass(arm, 0, 3))));
  });

  it('travel, length, gravity, payload: all that they touch begins anew (seed 31)', () => {
    const arm = randomArm(31, { joints: 4, full: 0 });
    const changes: readonly (readonly [Arm, readonly number[]])[] = [
      [
        withJoints(arm, (joint, k) =>
          k === 2 ? { ...joint, travel: { ...joint.travel, to: joint.travel.to + 0.1 } } : joint,
        ),
        [0, 1, 2, 3],
      ],
      [
        withJoints(arm, (joint, k) =>
          k === 2 ? { ...joint, placement: { ...joint.placement, position: [0.1, 0.2, 0.3] } } : joint,
        ),
        [0, 1],
      ],
      [{ ...arm, gravity: [0, 0, -9] }, [0, 1, 2, 3]],
      [withCases(arm, (load) => ({ ...load, payload: null })), [0, 1, 2, 3]],
      [arm, []],
    ];
    for (const [changed, joints] of changes) {
      const after = weights(changed, finish(weights(arm)));
      expect(anew(after)).toEqual(joints);
      agree(finish(after), finish(weights(changed)));
    }
  });
});

describe('a changed layout under other loads', () => {
  const kinds: readonly (readonly [string, Omit<RandomArmOptions, 'joints'>])[] = [
    ['a force any way', { force: 'any' }],
    ['gears and belts, a force in the base', { force: 'base', drives: true }],
    ['motion', { motion: true }],
  ];

  function search(arm: Arm, previous: WorstCase | null): WorstCase {
    const chain = flattenArm(arm);
    const checks = some(allChecks(arm, chain), 12, 5);
    return new WorstCase(chain, chain.cases[0]!, checks, previous);
  }
  function work(made: WorstCase, slices: number): readonly WorstRow[] {
    for (let k = 0; k < slices && made.open(GAP); k++) made.step(GAP);
    return made.rows();
  }

  for (const [name, options] of kinds) {
    it(`keeps what a span does not touch, and every bound holds: ${name} (seeds 41–43)`, () => {
      for (let seed = 41; seed <= 43; seed++) {
        const arm = randomArm(seed, { joints: 3, ...options });
        const first = search(arm, null);
        const before = work(first, 40);
        const support = arm.joints[1]!.support as { span: number };
        const wider = withPair(arm, 1, { span: 1.2 * support.span });
        const after = search(wider, first);
        const rows = after.rows();
        rows.forEach((row, k) => {
          const moved = row.check.joint === 1 && row.check.bearing !== null && row.check.check === 'radial';
          if (moved) expect(row.bound).toBe(Number.POSITIVE_INFINITY);
          else expect([row.bound, row.found]).toEqual([before[k]!.bound, before[k]!.found]);
        });
        expect(contradictions(wider, 0, work(after, 40), { seed, poses: 2000, climbs: 2 })).toEqual([]);
      }
    });
  }

  it('goes on to a finer gap than the one before was made for (seed 51)', () => {
    const arm = randomArm(51, { joints: 2, force: 'tool' });
    const first = search(arm, null);
    for (let k = 0; k < 200 && first.open(0.1); k++) first.step(0.1);
    const after = search(arm, first);
    for (let k = 0; k < 400 && after.open(1e-3); k++) after.step(1e-3);
    for (const row of after.rows()) expect(row.gap).toBeLessThanOrEqual(1e-3);
  });

  it('knows the loads of a joint apart in motion by the lengths inboard (seed 61)', () => {
    const moving = randomArm(61, { joints: 3, motion: true });
    const longer = withJoints(moving, (joint, k) =>
      k === 1 ? { ...joint, placement: { ...joint.placement, position: [0.5, 0, 0] } } : joint,
    );
    const at = (arm: Arm) => {
      const chain = flattenArm(arm);
      return { chain, load: chain.cases[0]! };
    };
    expect(sameJointLoad(at(moving), at(longer), 2)).toBe(false);
    const still = (arm: Arm) => at(withCases(arm, (load) => ({ ...load, motion: null })));
    expect(sameJointLoad(still(moving), still(longer), 2)).toBe(true);
    expect(sameJointLoad(still(moving), still(longer), 0)).toBe(false);
  });
});
