/** The reported worst poses in a general-purpose rigid-body engine: its joint loads give the reported values. */
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { readArm } from '../../src/arm/readArm.ts';
import { rotateBack3 } from '../../src/math/vector.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, checkValue } from '../../src/mechanics/form.ts';
import { WorstCase } from '../../src/mechanics/worstCase.ts';
import type { CheckRow } from '../../src/studies/results.ts';
import { checkOfRow } from '../../src/studies/slopes.ts';
import { outsideArm } from '../outside/rigidBody.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';
import { allChecks, some } from './adversary.ts';
import { severalCases, withParts } from './armKinds.ts';
import { rowAt } from './rows.ts';

const GAP = 5e-2;

/** Largest difference of a row's value from the engine's, as a share of the value or, where that is nothing, of the load. */
async function compare(arm: Arm, rows: readonly CheckRow[]): Promise<number> {
  const chain = flattenArm(arm);
  const checks = allChecks(arm, chain);
  let most = 0;
  for (const [k, load] of arm.cases.entries()) {
    const outside = await outsideArm(arm, load);
    const theirs = new Float64Array(6 * chain.n);
    for (const row of rows.filter((one) => one.case === load.name)) {
      const check = checkOfRow(chain, row, checks)!;
      const tip = row.free?.tipForce ?? null;
      if (chain.cases[k]!.speed) outside.motion(row.pose, row.free!.speed!, row.free!.accel!, theirs, tip);
      else outside.statics(row.pose, theirs, tip);
      const canonical = intoCanonical(chain, check.joint, theirs);
      const size = Math.max(Math.abs(row.value), 1e-3 * pull(check, canonical));
      const away = Math.abs(checkValue(check, canonical, 0) - row.value);
      most = Math.max(most, away === 0 ? 0 : away / size);
    }
    outside.close();
  }
  return most;
}

function intoCanonical(chain: Chain, joint: number, wrenches: Float64Array): Float64Array {
  const out = new Float64Array(6);
  rotateBack3(out, 0, chain.housing, 9 * joint, wrenches, 6 * joint);
  rotateBack3(out, 3, chain.housing, 9 * joint, wrenches, 6 * joint + 3);
  return out;
}

/** What the largest entries of the check's forms make of the largest of the load: the size of rounding where a value is nothing. */
function pull(check: CheckForm, w: Float64Array): number {
  const entries = check.forms.flatMap((form) => [...form.P, ...form.l]);
  const largest = (values: Iterable<number>) => Math.max(0, ...[...values].map(Math.abs));
  return largest(entries) * largest(w);
}

const CHECKS = 8;
const SLICES = 12;

/** Rows of every case, of some checks, searched shortly: a pose is reported however far the search has come. */
function rowsOf(arm: Arm, seed: number): readonly CheckRow[] {
  const chain = flattenArm(arm);
  return chain.cases.flatMap((load, k) => {
    const search = new WorstCase(chain, load, some(allChecks(arm, chain), load.speed ? CHECKS / 2 : CHECKS, seed + k));
    for (let slice = 0; slice < SLICES && search.open(GAP); slice++) search.step(GAP);
    return search.rows().map((row) => rowAt(arm, chain, k, row.check, { ...row, value: row.found }));
  });
}

describe('worst poses in the outside engine', () => {
  const kinds: readonly (readonly [string, Omit<RandomArmOptions, 'joints'>])[] = [
    ['weights', {}],
    ['gears and belts', { drives: true }],
    ['a force any way', { force: 'any' }],
    ['a force in the base', { force: 'base' }],
    ['a force in the tool', { force: 'tool' }],
    ['motion', { motion: true }],
    ['motion and a force any way', { motion: true, force: 'any' }],
  ];
  kinds.forEach(([name, options], k) => {
    const first = 200 + 10 * k;
    it(`${name}: random arms of 1–6 joints with bearings and shafts (seeds ${first}–${first + 2})`, async () => {
      let most = 0;
      for (let seed = first; seed < first + 3; seed++) {
        const arm = withParts(randomArm(seed, { joints: 1 + (seed % 6), ...options }), seed);
        const rows = rowsOf(arm, seed);
        expect(rows.length).toBeGreaterThan(0);
        most = Math.max(most, await compare(arm, rows));
      }
      expect(most).toBeLessThan(1e-9);
    });
  });

  it('several cases with factors (seeds 280–283)', async () => {
    for (let seed = 280; seed <= 283; seed++) {
      const arm = severalCases(seed, 1 + (seed % 4));
      expect(await compare(arm, rowsOf(arm, seed))).toBeLessThan(1e-9);
    }
  });

  it('every model of the project', async () => {
    const names = readdirSync('models').filter((name) => name.endsWith('.arm.json'));
    expect(names.length).toBeGreaterThan(0);
    for (const name of names) {
      const reading = readArm(readFileSync(`models/${name}`, 'utf8'));
      if (!reading.ok) throw new Error(`${name} is not sound`);
      expect(await compare(reading.arm, rowsOf(reading.arm, 1))).toBeLessThan(1e-9);
    }
  });
});
