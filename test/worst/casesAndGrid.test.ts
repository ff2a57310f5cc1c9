/** Several cases on one arm, whole and over cases; and `found` beside the maximum of a grid, pose by pose. */
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { checkValue } from '../../src/mechanics/form.ts';
import { worstAtPose } from '../../src/mechanics/freeLoads.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import { worstArm } from '../../src/studies/worstArm.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';
import { allChecks, type Claim, contradictions, nameOf, Plain, some } from './adversary.ts';
import { severalCases } from './armKinds.ts';

describe('several cases with factors', () => {
  it('hold case by case and over all: 8 arms of 1–6 joints, three cases each (seeds 401–408)', () => {
    const said: string[] = [];
    for (let seed = 401; seed <= 408; seed++) {
      const arm = severalCases(seed, 1 + (seed % 6));
      const chain = flattenArm(arm);
      const checks = loadChecks(arm, chain);
      const result = worstArm(arm, { gap: 2e-2, seconds: 0.3 });
      arm.cases.forEach((load, k) => {
        const rows = result.eachCase.filter((row) => row.case === load.name);
        const claims = rows.map((row, c): Claim => {
          return {
            check: checks[c]!,
            found: row.value,
            pose: Float64Array.from(row.pose),
            free: row.free,
            bound: row.bound!,
          };
        });
        const some = contradictions(arm, k, claims, { seed, poses: 10_000, climbs: 1 });
        said.push(...some.map((line) => `seed ${seed} ${load.name}: ${line}`));
      });
      result.rows.forEach((row, c) => {
        const each = arm.cases.map((_, k) => result.eachCase[k * checks.length + c]!);
        const name = `seed ${seed} ${nameOf(checks[c]!)}`;
        if (row.value !== Math.max(...each.map((one) => one.value))) said.push(`${name}: not the largest value`);
        if (row.bound !== Math.max(...each.map((one) => one.bound!))) said.push(`${name}: not the largest bound`);
        if (!each.some((one) => one.case === row.case && one.value === row.value))
          said.push(`${name}: not of its case`);
      });
    }
    expect(said).toEqual([]);
  });
});

/** Samples of each joint for so many joints: some thousand poses. */
const SAMPLES = [0, 721, 61, 17, 9, 6, 5];

/** Every pose of a grid that has both ends of each travel. */
function* gridPoses(chain: Chain): Generator<Float64Array> {
  const samples = SAMPLES[chain.n]!;
  const count = Array.from(chain.from, (from, i) => (chain.to[i]! > from ? samples : 1));
  const pose = Float64Array.from(chain.from);
  const at = count.map(() => 0);
  for (;;) {
    yield pose;
    let i = 0;
    while (i < chain.n && at[i] === count[i]! - 1) at[i++] = 0;
    if (i === chain.n) return;
    at[i]!++;
    for (let j = 0; j <= i; j++) {
      const part = count[j] === 1 ? 0 : at[j]! / (count[j]! - 1);
      pose[j] = chain.from[j]! + part * (chain.to[j]! - chain.from[j]!);
    }
  }
}

function below(arm: Arm, seed: number, free: boolean): string[] {
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const checks = some(allChecks(arm, chain), free ? 3 : load.force === 'none' ? 100 : 6, seed);
  const search = new WorstCase(chain, load, checks);
  for (let k = 0; k < 60 && search.open(1e-3); k++) search.step(1e-3);
  const rows = search.rows();
  const most = checks.map(() => Number.NEGATIVE_INFINITY);
  const plain = new Plain(chain, load);
  let poses = 0;
  for (const pose of gridPoses(chain)) {
    // What is free at a pose costs a search of its own
    if (free && poses++ % 7 !== 0) continue;
    if (!free) plain.at(pose, null);
    checks.forEach((check, c) => {
      const value = free ? worstAtPose(chain, load, pose, check).value : checkValue(check, plain.out, 6 * check.joint);
      if (value > most[c]!) most[c] = value;
    });
  }
  return rows.flatMap((row, c) =>
    row.found >= most[c]! - 1e-12 * Math.abs(most[c]!) - 1e-12
      ? []
      : [`seed ${seed} ${nameOf(row.check)}: found ${row.found}, the grid ${most[c]}, bound ${row.bound}`],
  );
}

describe('found is never below the maximum of a grid', () => {
  const kinds: readonly (readonly [string, Omit<RandomArmOptions, 'joints'>])[] = [
    ['weights', {}],
    ['gears and belts', { drives: true }],
    ['a force in the base', { force: 'base' }],
    ['a force in the tool', { force: 'tool' }],
    ['a force any way', { force: 'any' }],
    ['motion', { motion: true }],
  ];
  kinds.forEach(([name, options], k) => {
    const first = 500 + 10 * k;
    it(`${name}: 1–6 joints, some thousand poses (seeds ${first + 1}–${first + 4})`, () => {
      const said: string[] = [];
      for (let seed = first + 1; seed <= first + 4; seed++) {
        const free = options.force === 'any' || options.motion === true;
        const joints = 1 + (seed % (free ? 4 : 6));
        said.push(...below(randomArm(seed, { joints, ...options }), seed, free));
      }
      expect(said).toEqual([]);
    });
  });
});
