/**
 * What the adversary is worth: the same property that the real search passes must catch a search whose tables are shrunk, whose arcs lack
 * their factor, or that skips the cell of the governing path. Mutants take the place of a module of `math/`; the rest of the search is the real one.
 */
import { afterEach, describe, expect, it, vi } from 'vitest';
import type { Climber } from '../../src/mechanics/gravitySearch.ts';
import { randomArm } from '../randomArm.ts';
import { contradictions } from './adversary.ts';

const TABLES = '../../src/math/sphereTable.ts';
const POLAR = '../../src/math/polarTable.ts';
const ARCS = '../../src/math/arcMax.ts';

afterEach(() => {
  for (const path of [TABLES, POLAR, ARCS]) vi.doUnmock(path);
  vi.resetModules();
});

/** Says nothing of what is attained: then no mutant trips over its own bound, and all is left to the adversary. */
const SILENT: Climber = {
  value: () => 0,
  valuesAt: (entries, _pose, take) => entries.forEach((_, at) => void take(at, 0)),
  climb: () => 0,
};

const LEVELS = 3;

/** The property of `weights.test.ts` on twelve arms of 2–5 joints, by the modules as they are mocked now: arms contradicted. */
async function contradicted(): Promise<number> {
  const { GravitySearch, isHomogeneous } = await import('../../src/mechanics/gravitySearch.ts');
  const { gravityLoad } = await import('../../src/mechanics/gravityLoad.ts');
  const { flattenArm } = await import('../../src/mechanics/chain.ts');
  const { loadChecks } = await import('../../src/mechanics/loadChecks.ts');
  let count = 0;
  for (let seed = 301; seed <= 312; seed++) {
    const arm = randomArm(seed, { joints: 2 + (seed % 4), full: seed % 3 === 0 ? 1 : 0 });
    const chain = flattenArm(arm);
    const load = chain.cases[0]!;
    const checks = loadChecks(arm, chain).filter(isHomogeneous);
    const search = new GravitySearch(chain, load, gravityLoad(chain, load)!, checks, SILENT);
    for (let level = 0; level < LEVELS; level++) search.round(1e-4);
    const claims = search.entries.map(({ check, found, pose, bound }) => ({ check, found, pose, bound, free: null }));
    const said = contradictions(arm, 0, claims, { seed, poses: 1000, climbs: 2 });
    if (said.some((line) => line.includes('exceeds the bound'))) count++;
  }
  return count;
}

describe('twelve arms of 2–5 joints (seeds 301–312)', () => {
  it('hold with the search as it is', async () => {
    expect(await contradicted()).toBe(0);
  });

  it('catch tables shrunk by half a percent', async () => {
    vi.doMock(TABLES, async (original) => {
      const { SphereTable } = await original<typeof import('../../src/math/sphereTable.ts')>();
      class Shrunk extends SphereTable {
        override at(x: number, y: number, z: number): number {
          const value = super.at(x, y, z);
          return value - 0.005 * Math.abs(value);
        }
      }
      return { SphereTable: Shrunk };
    });
    vi.doMock(POLAR, async (original) => {
      const { PolarTable } = await original<typeof import('../../src/math/polarTable.ts')>();
      class Shrunk extends PolarTable {
        override at(rho: number, z: number): number {
          const value = super.at(rho, z);
          return value - 0.005 * Math.abs(value);
        }
      }
      return { PolarTable: Shrunk };
    });
    expect(await contradicted()).toBeGreaterThan(6);
  });

  it('catch tables that take the lower corner for the cell', async () => {
    vi.doMock(TABLES, async (original) => {
      const { SphereTable } = await original<typeof import('../../src/math/sphereTable.ts')>();
      class Cornered extends SphereTable {
        override at(x: number, y: number, z: number): number {
          const major = Math.max(Math.abs(x), Math.abs(y), Math.abs(z));
          if (!(major > 0)) return super.at(x, y, z);
          const snap = (v: number) => (Math.floor(((v / major + 1) * this.n) / 2) * 2) / this.n - 1;
          return major * super.at(snap(x), snap(y), snap(z));
        }
      }
      return { SphereTable: Cornered };
    });
    expect(await contradicted()).toBeGreaterThan(6);
  });

  it('catch arcs without their factor: the larger of two samples', async () => {
    vi.doMock(ARCS, async (original) => {
      const real = await original<typeof import('../../src/math/arcMax.ts')>();
      class Flat extends real.ArcMax {
        override run(
          ...[f, level, kappa, , enough, limit]: Parameters<InstanceType<typeof real.ArcMax>['run']>
        ): number {
          // Nothing is added to the chord, which then lies at the larger end
          return super.run(f, level, kappa, 0, enough, limit);
        }
      }
      return { ...real, ArcMax: Flat };
    });
    expect(await contradicted()).toBeGreaterThan(6);
  });

  it('catch a skipped cell: the one that holds the governing path', async () => {
    vi.doMock(ARCS, async (original) => {
      const real = await original<typeof import('../../src/math/arcMax.ts')>();
      class Skipping extends real.ArcMax {
        override run(...[f, ...rest]: Parameters<InstanceType<typeof real.ArcMax>['run']>): number {
          super.run(f, ...rest);
          const peak = this.arg;
          const hole = (t: number) => Math.abs(t - peak) < 0.14;
          const away = super.run({ at: (t, level) => (hole(t) ? -1e30 : f.at(t, level)) }, ...rest);
          this.arg = peak;
          return away > -1e29 ? away : f.at(peak, 0);
        }
      }
      return { ...real, ArcMax: Skipping };
    });
    expect(await contradicted()).toBeGreaterThan(6);
  });

  it('catch a roof that is half a percent too low', async () => {
    vi.doMock(ARCS, async (original) => {
      const real = await original<typeof import('../../src/math/arcMax.ts')>();
      class Low extends real.ArcMax {
        override run(
          ...[f, level, kappa, sag, enough, limit]: Parameters<InstanceType<typeof real.ArcMax>['run']>
        ): number {
          return super.run(f, level, kappa, sag, enough, limit === undefined ? limit : 0.995 * limit);
        }
      }
      return { ...real, ArcMax: Low };
    });
    expect(await contradicted()).toBeGreaterThan(0);
  });
});
