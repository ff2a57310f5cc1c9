/**
 * Branch and bound under the same adversary as the spheres: the search as it is holds, one whose box bounds are shrunk, that drops a box now
 * and then or cuts away an end of one is caught. Its own climbs are silenced, in all of them, so that no mutant is saved by what it attains.
 */
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { RandomArmOptions } from '../randomArm.ts';
import { randomArm } from '../randomArm.ts';
import { contradictions, some } from './adversary.ts';

const CLIMBS = '../../src/mechanics/polish.ts';
const BOXES = '../../src/mechanics/branchBoundBox.ts';
const SHRINKS = '../../src/mechanics/branchBoundShrink.ts';

type BoxModule = typeof import('../../src/mechanics/branchBoundBox.ts');
type ShrinkModule = typeof import('../../src/mechanics/branchBoundShrink.ts');

afterEach(() => {
  for (const path of [CLIMBS, BOXES, SHRINKS]) vi.doUnmock(path);
  vi.resetModules();
});

const LOADS: readonly Omit<RandomArmOptions, 'joints'>[] = [{ force: 'base' }, { force: 'tool' }, { force: 'any' }];
const GAP = 5e-3;
const BOXES_EACH = 4000;
const CHECKS = 3;

/** Arms contradicted, of twelve with two or three joints, by the modules as they are mocked now. */
async function contradicted(): Promise<number> {
  vi.doMock(CLIMBS, async (original) => {
    const real = await original<typeof import('../../src/mechanics/polish.ts')>();
    class Silent extends real.Polish {
      override climb(pose: Float64Array): number {
        return this.value(pose);
      }
    }
    return { ...real, Polish: Silent };
  });
  const { BranchBound } = await import('../../src/mechanics/branchBound.ts');
  const { flattenArm } = await import('../../src/mechanics/chain.ts');
  const { loadChecks } = await import('../../src/mechanics/loadChecks.ts');
  let count = 0;
  for (let seed = 321; seed <= 332; seed++) {
    const arm = randomArm(seed, { joints: 2 + (seed % 2), full: 0, ...LOADS[seed % 3]! });
    const chain = flattenArm(arm);
    const load = chain.cases[0]!;
    const claims = some(loadChecks(arm, chain), CHECKS, seed).map((check) => {
      const { found, bound, pose, free } = new BranchBound(chain, load, check, { gap: GAP }).step(BOXES_EACH);
      return { check, found, bound, pose, free };
    });
    const said = contradictions(arm, 0, claims, { seed, poses: 2000, climbs: 4 });
    if (said.some((line) => line.includes('exceeds the bound'))) count++;
  }
  return count;
}

describe('branch and bound of twelve arms of two and three joints (seeds 321–332)', () => {
  it('holds with the search as it is', async () => {
    expect(await contradicted()).toBe(0);
  });

  it('is caught with bounds of boxes shrunk by two percent', async () => {
    vi.doMock(BOXES, async (original) => {
      const real = await original<BoxModule>();
      class Shrunk extends real.BoxBound {
        override bound(...args: Parameters<InstanceType<typeof real.BoxBound>['bound']>): number {
          const value = super.bound(...args);
          return value - 0.02 * Math.abs(value);
        }
      }
      return { ...real, BoxBound: Shrunk };
    });
    expect(await contradicted()).toBeGreaterThan(6);
  });

  it('is caught with every tenth box dropped', async () => {
    let boxes = 0;
    vi.doMock(SHRINKS, async (original) => {
      const real = await original<ShrinkModule>();
      return {
        ...real,
        shrinkBox: (...args: Parameters<typeof real.shrinkBox>) => (++boxes % 10 === 0 ? -1 : real.shrinkBox(...args)),
      };
    });
    expect(await contradicted()).toBeGreaterThan(3);
  });

  it('is caught with the ends of every box cut away, where worst poses lie', async () => {
    vi.doMock(SHRINKS, async (original) => {
      const real = await original<ShrinkModule>();
      return {
        ...real,
        shrinkBox: (...[box, chain, low, high]: Parameters<typeof real.shrinkBox>) => {
          const share = real.shrinkBox(box, chain, low, high);
          for (let k = 0; k < chain.n; k++) {
            const end = 0.02 * (high[k]! - low[k]!);
            low[k]! += end;
            high[k]! -= end;
          }
          return share;
        },
      };
    });
    expect(await contradicted()).toBeGreaterThan(3);
  });
});
