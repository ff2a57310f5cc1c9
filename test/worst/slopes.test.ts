/** Slopes of the worst value against differences of the full computation: the whole search again with one quantity changed. */
import { describe, expect, it } from 'vitest';
import type { Arm, PairSupport, Shaft } from '../../src/arm/arm.ts';
import { withLinkMass, withPair } from '../../src/arm/changeArm.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { WorstCase, type WorstRow } from '../../src/mechanics/worstCase.ts';
import { type Slope, slopesOf } from '../../src/studies/slopes.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';
import { allChecks, nameOf, some } from './adversary.ts';
import { withJoints, withParts } from './armKinds.ts';
import { rowAt } from './rows.ts';

const GAP = 2e-3;
const SLICES = 60;

/** Worst of the checks named, searched anew. */
function worst(arm: Arm, names: readonly string[]): readonly WorstRow[] {
  const chain = flattenArm(arm);
  const checks = allChecks(arm, chain).filter((check) => names.includes(nameOf(check)));
  const search = new WorstCase(chain, chain.cases[0]!, checks);
  for (let k = 0; k < SLICES && search.open(GAP); k++) search.step(GAP);
  return search.rows();
}

/** The arm with the slope's quantity changed by `d` of its unit. */
function changed(arm: Arm, slope: Slope, d: number): Arm {
  const joint = arm.joints.findIndex((one) => one.name === slope.name);
  const link = arm.joints.findIndex((one) => one.link.name === slope.name);
  if (slope.what === 'span') return withPair(arm, joint, { span: slope.now + d });
  if (slope.what === 'overhang') return withPair(arm, joint, { overhang: slope.now + d });
  if (slope.what === 'mass') return withLinkMass(arm, link, 1 + d / slope.now);
  const end = slope.what === 'travel from' ? 'from' : 'to';
  return withJoints(arm, (one, k) =>
    k === joint ? { ...one, travel: { ...one.travel, [end]: one.travel[end] + d } } : one,
  );
}

interface Compared {
  /** Slopes where the full computation has one slope on both sides. */
  smooth: number;
  corners: number;
  kinds: Set<string>;
  off: string[];
}

const STEP = 2e-4;

function compare(arm: Arm, seed: number, names: readonly string[], count: number, into: Compared): void {
  const chain = flattenArm(arm);
  for (const before of worst(arm, names)) {
    const name = nameOf(before.check);
    const value = before.found;
    if (!(value > 0)) continue;
    const row = rowAt(arm, chain, 0, before.check, { value, pose: before.pose, free: before.free });
    for (const slope of some(slopesOf(arm, row, allChecks), count, seed)) {
      const h = STEP * (slope.now === 0 || slope.what.startsWith('travel') ? 1 : Math.abs(slope.now));
      const [up, down] = [h, -h].map((d) => worst(changed(arm, slope, d), [name])[0]!.found) as [number, number];
      const rise = (up - value) / h;
      const fall = (value - down) / h;
      // What is left of a climb, a share of 1e-8 of the value, and over h the bend of the value itself
      const unit = h / STEP;
      const slack = 1e-3 * Math.abs(slope.slope) + (1e-8 / STEP) * (value / unit);
      const bend = slack + 1e-3 * (value / unit);
      const here = `seed ${seed} ${name} ${slope.what} ${slope.name}: ${slope.slope}, rises ${rise}, fell ${fall}`;
      // The pose reported stays a pose: the worst is a maximum over it and others
      if (rise < slope.slope - bend || fall > slope.slope + bend) into.off.push(`below its line: ${here}`);
      if (slope.corner) into.off.push(`no corner here: ${here}`);
      if (Math.abs(rise - fall) > 1e-2 * (Math.abs(rise) + Math.abs(fall)) + bend) {
        into.corners++;
        continue;
      }
      into.smooth++;
      into.kinds.add(slope.what);
      if (Math.abs((rise + fall) / 2 - slope.slope) > slack) into.off.push(here);
    }
  }
}

function fresh(): Compared {
  return { smooth: 0, corners: 0, kinds: new Set(), off: [] };
}

const NAMES = (arm: Arm, seed: number, count: number) =>
  some(
    allChecks(arm, flattenArm(arm)).filter(({ check }) => check !== 'torque' && !check.startsWith('thrust')),
    count,
    seed,
  ).map(nameOf);

describe('slopes against the full computation', () => {
  it('of weights: span, overhang, mass and travel of 10 arms of 1–4 joints (seeds 1–10)', () => {
    const all = fresh();
    for (let seed = 1; seed <= 10; seed++) {
      const arm = withParts(randomArm(seed, { joints: 1 + (seed % 4), travel: 2.5, full: 0 }), seed);
      compare(arm, seed, NAMES(arm, seed, 4), 5, all);
    }
    expect(all.off).toEqual([]);
    expect(all.smooth).toBeGreaterThan(100);
    expect(all.corners).toBeLessThan(0.1 * all.smooth);
    expect([...all.kinds].sort()).toEqual(['mass', 'overhang', 'span', 'travel from', 'travel to']);
  });

  const others: readonly (readonly [string, Omit<RandomArmOptions, 'joints'>])[] = [
    ['a force any way', { force: 'any' }],
    ['a force in the base, gears and belts', { force: 'base', drives: true }],
    ['a force in the tool', { force: 'tool' }],
  ];
  for (const [name, options] of others) {
    it(`of ${name}: 4 arms of 1–3 joints (seeds 31–34)`, () => {
      const all = fresh();
      for (let seed = 31; seed <= 34; seed++) {
        const arm = randomArm(seed, { joints: 1 + (seed % 3), travel: 2, full: 0, ...options });
        compare(arm, seed, NAMES(arm, seed, 2), 4, all);
      }
      expect(all.off).toEqual([]);
      expect(all.smooth).toBeGreaterThan(12);
    });
  }

  /** A pendulum of 4 kg at 0.5 m that swings by as much to either side of hanging down: |torque| ties at the two ends of its travel. */
  function pendulum(half: number, span = 0.1, sections: Shaft['sections'] = []): Arm {
    const base = randomArm(1, { joints: 1, payload: false });
    const shaft: Shaft = {
      diameter: 0.02, bore: 0, material: 'steel-c45', turnsWith: 'link', finish: 'machined', sections,
    }; // biome-ignore format: one row of values
    const support: PairSupport = {
      arrangement: 'clevis', hub: 0, span, offset: 0, overhang: 0, side: '-', thrust: 'A',
      stationA: -span / 2, stationB: span / 2, adjusted: null, bearingA: null, bearingB: null, shaft,
    }; // biome-ignore format: one row of values
    return {
      ...base,
      gravity: [0, 0, -9.80665],
      joints: [
        {
          ...base.joints[0]!,
          placement: { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] },
          axis: [0, 1, 0],
          travel: { from: -half, to: half, full: false },
          link: { name: 'bob', mass: 4, centre: [0, 0.02, -0.5], inertia: null },
          support,
          drive: null,
        },
      ],
      cases: [{ name: 'own weight', payload: null, tipForce: null, motion: null, factor: 1 }],
    };
  }

  it('where two poses tie are those of the one reported: rising one way, held by the other pose the other way', () => {
    const arm = pendulum(1);
    const [before] = worst(arm, ['joint 1  torque']);
    expect(before!.found).toBeCloseTo(4 * 9.80665 * 0.5 * Math.sin(1), 9);
    const slopes = slopesOf(
      arm,
      rowAt(arm, flattenArm(arm), 0, before!.check, { ...before!, value: before!.found }),
      allChecks,
    );
    const travel = slopes.filter(({ what }) => what.startsWith('travel'));
    expect(travel.length).toBe(1);
    const lever = 4 * 9.80665 * 0.5 * Math.cos(1);
    expect(Math.abs(travel[0]!.slope)).toBeCloseTo(lever, 5);
    const outward = travel[0]!.what === 'travel to' ? 1e-3 : -1e-3;
    const at = (d: number) => worst(changed(arm, travel[0]!, d), ['joint 1  torque'])[0]!.found - before!.found;
    expect(at(outward) / 1e-3).toBeCloseTo(lever, 1);
    expect(at(-outward)).toBe(0);
  });

  it('tell of a bearing that stands just on a step of its shaft', () => {
    const step = {
      from: -0.05,
      to: 0.2,
      diameter: 0.03,
      bore: 0,
      bendingFactor: 1,
      torsionFactor: 1,
      notchRadius: null,
    };
    const row = (arm: Arm) => {
      const chain = flattenArm(arm);
      const check = allChecks(arm, chain).find((one) => one.check === 'deflection')!;
      const [found] = worst(arm, [nameOf(check)]);
      return rowAt(arm, chain, 0, check, { ...found!, value: found!.found });
    };
    const corners = (arm: Arm) => slopesOf(arm, row(arm), allChecks).find(({ what }) => what === 'span')!.corner;
    expect(corners(pendulum(1, 0.1, [step]))).toBe(true);
    expect(corners(pendulum(1, 0.09, [step]))).toBe(false);
    expect(corners(pendulum(1, 0.11, [step]))).toBe(false);
  });
});
