import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { checkValue } from '../../src/mechanics/form.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { dynamicLoads, poseScratch, staticLoads } from '../../src/mechanics/newtonEuler.ts';
import { Polish, polish } from '../../src/mechanics/polish.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';

const KINDS: readonly [string, Omit<RandomArmOptions, 'joints'>][] = [
  ['weights', {}],
  ['drives', { drives: true }],
  ['tip force any', { force: 'any' }],
  ['tip force in the base', { force: 'base' }],
  ['tip force in the tool and drives', { force: 'tool', drives: true }],
  ['one-degree travel', { force: 'any', full: 0, travel: Math.PI / 180 }],
  ['motion', { motion: true }],
];

function setUp(seed: number, joints: number, options: Omit<RandomArmOptions, 'joints'>) {
  const arm = randomArm(seed, { joints, ...options });
  const chain = flattenArm(arm);
  const random = seededRandom(seed + 5);
  const checks = loadChecks(arm, chain).filter((_, k) => (k + seed) % 5 === 0);
  const start = () => Array.from(chain.from, (low, i) => random.between(low, chain.to[i]!));
  return { arm, chain, load: chain.cases[0]!, random, checks, start };
}

describe('climbing to a local worst pose', () => {
  KINDS.forEach(([name, options], index) => {
    const first = 1 + 20 * index;
    it(`attains its value within the travel and never falls below its start: ${name} (seeds ${first}–${first + 5})`, () => {
      for (let seed = first; seed < first + 6; seed++) {
        const joints = options.motion ? 1 + (seed % 3) : 1 + (seed % 6);
        const { chain, load, checks, start } = setUp(seed, joints, options);
        for (const check of options.motion ? checks.slice(0, 3) : checks) {
          const pose = start();
          const begin = new Polish(chain, load, check).value(pose);
          const best = polish(chain, load, check, pose);
          expect(best.value).toBeGreaterThanOrEqual(begin);
          best.pose.forEach((q, i) => {
            expect(q).toBeGreaterThanOrEqual(chain.from[i]!);
            expect(q).toBeLessThanOrEqual(chain.to[i]!);
          });
          const loads = new Float64Array(6 * chain.n);
          const tip = best.free?.tipForce ?? null;
          if (best.free?.speed && best.free.accel) {
            const rates = { speed: best.free.speed, accel: best.free.accel };
            dynamicLoads(chain, load, best.pose, rates, loads, poseScratch(chain.n), tip);
          } else staticLoads(chain, load, best.pose, loads, poseScratch(chain.n), tip);
          const value = checkValue(check, loads, 6 * check.joint);
          expect(Math.abs(value - best.value)).toBeLessThanOrEqual(1e-9 * Math.abs(value));
          for (let k = 0; k < 6; k++) {
            const plain = loads[6 * check.joint + k]!;
            expect(Math.abs(best.wrench[k]! - plain)).toBeLessThanOrEqual(1e-9 * (1 + Math.abs(plain)));
          }
          expect(polish(chain, load, check, pose)).toEqual(best);
        }
      }
    });
  });

  it('leaves nothing to gain nearby: random steps of 1e-6 to 0.1 rad, nearly always (seeds 1–30)', () => {
    let climbs = 0;
    let left = 0;
    for (let seed = 1; seed <= 30; seed++) {
      const { chain, load, checks, start, random } = setUp(seed, 1 + (seed % 6), {
        force: (['none', 'any', 'base', 'tool'] as const)[seed % 4]!,
      });
      for (const check of checks) {
        const climber = new Polish(chain, load, check);
        const pose = Float64Array.from(start());
        const value = climber.climb(pose);
        let best = value;
        for (let trial = 0; trial < 60; trial++) {
          const size = 10 ** -random.between(1, 6);
          const near = pose.map((q, i) =>
            Math.min(chain.to[i]!, Math.max(chain.from[i]!, q + size * random.between(-1, 1))),
          );
          best = Math.max(best, climber.value(near));
        }
        climbs++;
        if (best > value + 1e-11 * Math.abs(value)) left++;
      }
    }
    expect(climbs).toBeGreaterThan(100);
    // a saddle, or a maximum so flat that Newton stops short
    expect(left / climbs).toBeLessThan(0.03);
  });

  it('brings a start outside the travel inside first, full turns by whole turns (seed 3)', () => {
    const { chain, load, checks } = setUp(3, 4, { full: 0.5 });
    const best = polish(chain, load, checks[0]!, [40, -40, 7, 3.5]);
    best.pose.forEach((q, i) => {
      expect(q).toBeGreaterThanOrEqual(chain.from[i]!);
      expect(q).toBeLessThanOrEqual(chain.to[i]!);
    });
  });

  it('says NaN where the load is not finite', () => {
    const { chain, load, checks } = setUp(4, 3, { force: 'any' });
    const broken = { ...load, mass: Float64Array.of(Number.NaN, Number.NaN, Number.NaN) };
    for (const check of checks.filter((c) => c.check === 'moment' || c.check === 'radial')) {
      expect(polish(chain, { ...broken, first: load.first.map(() => Number.NaN) }, check, [0, 0, 0]).value).toBeNaN();
    }
  });
});
