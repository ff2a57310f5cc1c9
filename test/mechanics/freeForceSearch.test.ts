import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { type Chain, type ChainCase, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, type Form, form } from '../../src/mechanics/form.ts';
import { FreeForceSearch, tipMass } from '../../src/mechanics/freeForceSearch.ts';
import { freeScratch, newFreeWorst, worstOverFree } from '../../src/mechanics/freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../../src/mechanics/freeLoadsPose.ts';
import { GravityCheck } from '../../src/mechanics/gravityCheck.ts';
import type { CheckState } from '../../src/mechanics/gravitySearch.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { OutwardSets } from '../../src/mechanics/outwardSets.ts';
import { polish } from '../../src/mechanics/polish.ts';
import { sameAllRound } from '../../src/mechanics/roundForms.ts';
import { TipPush } from '../../src/mechanics/tipPush.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';

/** Forms like those of stress: bending and torsion at once, and torsion taken as a linear part; the last are not the same all round. */
function stressForms(): readonly (readonly Form[])[] {
  const bend = [
    [2, 0, 0, 0, 9, 0],
    [0, 2, 0, -9, 0, 0],
  ];
  return [
    [form({ P: [...bend, [0, 0, 0, 0, 0, 6]] })],
    [form({ P: bend, l: [0, 0, 0, 0, 0, 4] }), form({ P: [...bend, [0, 0, 3, 0, 0, 2]], l: [0, 0, -3, 0, 0, 0] })],
    [form({ P: [bend[0]!, [0, 1, 0, -5, 0, 0], [0, 0, 0, 0, 0, 6]], l: [0.5, 0, 0, 0, 0, 0] })],
    [form({ P: bend, c: [20, -30], o: 15 }), form({ P: [...bend, [0, 0, 0, 0, 0, 6]], c: [5, 40, -60], o: -10 })],
  ];
}

function checksOf(arm: Arm, chain: Chain, seed: number): readonly CheckForm[] {
  const stress = stressForms().map(
    (forms, k): CheckForm => ({ check: `stress ${k}`, joint: (seed + k) % chain.n, bearing: null, unit: 'Pa', forms }),
  );
  const loads = loadChecks(arm, chain).filter((_, k) => (k + seed) % 5 === 0);
  return [...loads, ...stress];
}

function stateOf(chain: Chain, check: CheckForm): CheckState {
  const pose = new Float64Array(chain.n);
  return { check, found: Number.NEGATIVE_INFINITY, pose, bound: Number.POSITIVE_INFINITY, ceiling: 0, level: 0 };
}

/** Values of a check at random poses, every third angle at an end of its travel, and where it climbs to from two of them. */
function* sampled(chain: Chain, load: ChainCase, check: CheckForm, seed: number, poses: number): Generator<number> {
  const random = seededRandom(seed);
  const at = newPoseLoad(chain.n);
  const [out, scratch, free] = [newFreeWorst(chain.n), poseLoadScratch(chain.n), freeScratch(chain.n)];
  for (let k = 0; k < poses; k++) {
    const pose = Float64Array.from(chain.from, (low, i) => {
      const pick = random.below(6);
      return pick === 0 ? low : pick === 1 ? chain.to[i]! : random.between(low, chain.to[i]!);
    });
    poseLoad(chain, load, pose, at, scratch);
    yield worstOverFree(check, load, at, out, free);
    if (k < 2) yield polish(chain, load, check, pose).value;
  }
}

const KINDS: readonly [string, Omit<RandomArmOptions, 'joints' | 'force'>][] = [
  ['generic', {}],
  ['drives', { drives: true }],
  ['full turns', { full: 1 }],
  ['parallel axes at one place', { parallel: 0.8, coincident: 0.6 }],
  ['one-degree travel', { full: 0, travel: Math.PI / 180 }],
];

describe('weights and a tip force that may point anywhere, each by its own outward set', () => {
  KINDS.forEach(([name, options], kind) => {
    const first = 1 + 20 * kind;
    it(`bounds every random and polished pose: ${name}, 1–6 joints (seeds ${first}–${first + 11})`, () => {
      const over: string[] = [];
      let compared = 0;
      for (let seed = first; seed < first + 12; seed++) {
        const made = randomArm(seed, { joints: 1 + (seed % 6), force: 'any', ...options });
        const arm: Arm = seed % 7 === 0 ? { ...made, gravity: [0, 0, 0] } : made;
        const chain = flattenArm(arm);
        const load = chain.cases[0]!;
        const sets = [new OutwardSets(chain, load), new OutwardSets(chain, tipMass(chain, load))] as const;
        for (const check of checksOf(arm, chain, seed)) {
          const state = stateOf(chain, check);
          const search = new FreeForceSearch(chain, load, state, ...sets);
          for (let round = 0; round < 2 && search.open(0.005); round++) search.round(0.005);
          for (const value of sampled(chain, load, check, seed, 60)) {
            compared++;
            if (!(value <= state.bound + 1e-9 * state.ceiling)) over.push(`seed ${seed} ${check.check}: ${value}`);
          }
        }
      }
      expect(over).toEqual([]);
      expect(compared).toBeGreaterThan(3000);
    });
  });

  it('is near the worst at the outermost joint, where weights and force reach alike: tilting moment (seeds 1–8)', () => {
    for (let seed = 1; seed <= 8; seed++) {
      const arm = randomArm(seed, { joints: 1 + (seed % 4), force: 'any' });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const sets = [new OutwardSets(chain, load), new OutwardSets(chain, tipMass(chain, load))] as const;
      const check = loadChecks(arm, chain).find((c) => c.joint === chain.n - 1 && c.check === 'moment')!;
      const state = stateOf(chain, check);
      for (const value of sampled(chain, load, check, seed, 40)) state.found = Math.max(state.found, value);
      const search = new FreeForceSearch(chain, load, state, ...sets);
      while (search.open(0.01)) search.round(0.01);
      expect(state.bound).toBeGreaterThanOrEqual(state.found);
      expect(state.bound).toBeLessThanOrEqual(1.1 * state.found);
    }
  });

  it('never falls below the exact worst of one joint, from any frame (seeds 1–20)', () => {
    // One joint that turns right round under gravity across it: weight and force at one pose, where both ways of looking must agree
    for (let seed = 1; seed <= 20; seed++) {
      const arm = randomArm(seed, { joints: 1, force: 'any', full: 1 });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const sets = [new OutwardSets(chain, load), new OutwardSets(chain, tipMass(chain, load))] as const;
      const g = Math.hypot(...chain.gravity);
      const down = chain.gravity.map((v) => v / g);
      for (const check of loadChecks(arm, chain).filter((c) => c.check === 'radial' || c.check === 'moment')) {
        const [f] = check.forms;
        const bound = (inLink: boolean) =>
          new GravityCheck(sets[0], 0, f!, g, down, inLink, new TipPush(sets[1], 0, f!, inLink)).bound(5, 0);
        let most = 0;
        for (const value of sampled(chain, load, check, seed, 200)) most = Math.max(most, value);
        expect(sameAllRound(f!)).toBe(true);
        expect(bound(true)).toBeGreaterThanOrEqual(most * (1 - 1e-12));
        expect(bound(false)).toBeGreaterThanOrEqual(bound(true) * (1 - 1e-3));
        // seen from the link nothing but the direction of gravity is left to the joint
        expect(bound(true)).toBeLessThanOrEqual(most * (1 + 2e-3));
      }
    }
  });

  it('is broken by mutants: a push too small, a push left out, a form that is not the same all round seen from the link', () => {
    const broken = { small: 0, none: 0, round: 0 };
    for (let seed = 1; seed <= 12; seed++) {
      const arm = randomArm(seed, { joints: 2, force: 'any' });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const [weights, tip] = [new OutwardSets(chain, load), new OutwardSets(chain, tipMass(chain, load))];
      const g = Math.hypot(...chain.gravity);
      const down = chain.gravity.map((v) => v / g);
      const most = (f: Form) => {
        const check: CheckForm = { check: 'one', joint: 1, bearing: null, unit: 'N', forms: [f] };
        return Math.max(...sampled(chain, load, check, seed, 60));
      };
      const round = form({
        P: [
          [1, 0, 0, 0, 5, 0],
          [0, 1, 0, -5, 0, 0],
        ],
      });
      class Small extends TipPush {
        override at(e0: number, e1: number, el: number, level: number): number {
          return 0.97 * super.at(e0, e1, el, level);
        }
      }
      const worst = most(round);
      const bound = (push: TipPush | null) => new GravityCheck(weights, 1, round, g, down, true, push).bound(5, 0);
      expect(bound(new TipPush(tip, 1, round, true))).toBeGreaterThanOrEqual(worst * (1 - 1e-12));
      if (bound(new Small(tip, 1, round, true)) < worst) broken.small++;
      if (bound(null) < worst) broken.none++;
      const aside = form({
        P: [
          [1, 0, 0, 0, 0, 0],
          [0, 0, 0, 0, 0, 0],
        ],
        l: [0, 3, 0, 0, 0, 0],
      });
      const seen = new GravityCheck(weights, 1, aside, g, down, true, new TipPush(tip, 1, aside, true)).bound(5, 0);
      if (seen < most(aside) * (1 - 1e-9)) broken.round++;
    }
    expect(broken.none).toBe(12);
    expect(broken.small).toBeGreaterThan(3);
    expect(broken.round).toBeGreaterThan(3);
  });

  it('splits travel where weights and force want different poses: bounds hold, and come down (3–5 joints, seeds 1–9)', () => {
    let lowered = 0;
    let stood = 0;
    for (let seed = 1; seed <= 9; seed++) {
      const arm = randomArm(seed, {
        joints: 3 + (seed % 3),
        force: 'any',
        drives: seed % 4 === 0,
        full: seed % 2 ? 0.5 : 0,
      });
      const chain = flattenArm(arm);
      const load = chain.cases[0]!;
      const sets = [new OutwardSets(chain, load), new OutwardSets(chain, tipMass(chain, load))] as const;
      for (const check of checksOf(arm, chain, seed).filter((_, k) => (k + seed) % 2 === 0)) {
        const state = stateOf(chain, check);
        const values = [...sampled(chain, load, check, seed, 120)];
        state.found = Math.max(0, ...values);
        const search = new FreeForceSearch(chain, load, state, ...sets);
        while (search.open(1e-4)) search.round(1e-4);
        const before = state.bound;
        for (let k = 0; k < 4 && search.canSplit(1e-4); k++) search.split(1e-4);
        if (state.bound < before * (1 - 1e-3)) lowered++;
        else stood++;
        expect(state.bound).toBeGreaterThanOrEqual(state.found - 1e-9 * state.ceiling);
      }
    }
    expect(stood).toBeGreaterThan(0);
    expect(lowered).toBeGreaterThan(3);
  });

  it('would be caught leaving out one half of a split (two joints, seeds 1–10)', () => {
    let low = 0;
    for (let seed = 1; seed <= 10; seed++) {
      const whole = flattenArm(randomArm(seed, { joints: 2, force: 'any', full: 0 }));
      const load = whole.cases[0]!;
      const middle = 0.5 * (whole.from[1]! + whole.to[1]!);
      const halves = [
        { ...whole, to: whole.to.with(1, middle) },
        { ...whole, from: whole.from.with(1, middle) },
      ];
      const f = form({ P: [[1, 0, 0, 0, 5, 0], [0, 1, 0, -5, 0, 0]] }); // biome-ignore format: rows
      const check: CheckForm = { check: 'one', joint: 0, bearing: null, unit: 'N', forms: [f] };
      const worst = Math.max(...sampled(whole, load, check, seed, 200));
      const bounds = halves.map((half) => {
        const state = stateOf(half, check);
        state.found = 0.5 * worst;
        const sets = [new OutwardSets(half, load), new OutwardSets(half, tipMass(half, load))] as const;
        const search = new FreeForceSearch(half, load, state, ...sets);
        while (search.open(1e-3)) search.round(1e-3);
        return state.bound;
      });
      expect(Math.max(...bounds)).toBeGreaterThanOrEqual(worst * (1 - 1e-12));
      if (Math.min(...bounds) < worst) low++;
    }
    expect(low).toBeGreaterThan(2);
  });

  it('refuses a push along e of three components', () => {
    const arm = randomArm(1, { joints: 2, force: 'any' });
    const chain = flattenArm(arm);
    const tip = new OutwardSets(chain, tipMass(chain, chain.cases[0]!));
    expect(() => new TipPush(tip, 0, stressForms()[0]![0]!, true)).toThrow(/two components/);
  });
});
