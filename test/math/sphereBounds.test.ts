/**
 * The bounds that the proof of the worst pose stands on, each against the function itself, and against mutants: the property that the
 * real code satisfies must catch a shrunk interpolation, a dropped arc factor and a skipped cell.
 */
import { describe, expect, it } from 'vitest';
import { ArcMax, arcBound } from '../../src/math/arcMax.ts';
import { PolarTable } from '../../src/math/polarTable.ts';
import { type Random, seededRandom } from '../../src/math/random.ts';
import { SphereTable } from '../../src/math/sphereTable.ts';
import { UnitMax } from '../../src/math/unitMax.ts';

type Convex = (x: number, y: number, z: number) => number;

/** Support function of a random cloud of points: convex, homogeneous, with creases. */
function cloud(random: Random, points: number): Convex {
  const set = Array.from({ length: points }, () => [
    random.between(-1, 1),
    random.between(-1, 1),
    random.between(-1, 1),
  ]);
  return (x, y, z) => Math.max(...set.map((p) => p[0]! * x + p[1]! * y + p[2]! * z));
}
const ball: Convex = (x, y, z) => Math.hypot(x, y, z);

/** Largest shortfall of a table below its function (relative), over random directions; ≤ 0 when the table is an upper bound. */
function shortfall(at: Convex, f: Convex, random: Random): number {
  let worst = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < 4000; k++) {
    const [x, y, z] = random.direction();
    const size = 0.1 + 10 * random.next();
    worst = Math.max(worst, (f(size * x, size * y, size * z) - at(size * x, size * y, size * z)) / size);
  }
  return worst;
}

/** The same for a bound of arcs: how far the function rises above the bound of an interval, sampled densely. */
function arcShortfall(bound: typeof arcBound, f: Convex, most: number, random: Random): number {
  let worst = Number.NEGATIVE_INFINITY;
  for (let k = 0; k < 400; k++) {
    const z = random.between(-1, 1);
    const rho = random.between(0, 1);
    const start = random.between(0, 6);
    const width = random.between(0.01, 0.6);
    const at = (t: number) => f(rho * Math.cos(t), rho * Math.sin(t), z);
    const b = bound(at(start), at(start + width), width, f(0, 0, -z), rho * most);
    for (let j = 0; j <= 40; j++) worst = Math.max(worst, at(start + (width * j) / 40) - b);
  }
  return worst;
}

describe('sphere tables', () => {
  it('never lie below a convex function and close on it as N grows (seeds 1–20)', () => {
    for (let seed = 1; seed <= 20; seed++) {
      const random = seededRandom(seed);
      const f = seed % 4 === 0 ? ball : cloud(random, 2 + random.below(30));
      const gaps = [4, 8, 16, 32].map((n) => {
        const table = new SphereTable(n, f);
        const at: Convex = (x, y, z) => table.at(x, y, z);
        expect(shortfall(at, f, seededRandom(seed))).toBeLessThan(1e-13);
        return -shortfall(
          (x, y, z) => -at(x, y, z),
          (x, y, z) => -f(x, y, z),
          seededRandom(seed),
        );
      });
      // A crease costs at most in proportion to the cell
      expect(gaps[3]!).toBeLessThan(0.3);
      if (f === ball) {
        const over = (n: number) => {
          const table = new SphereTable(n, f);
          let most = 0;
          const r = seededRandom(7);
          for (let k = 0; k < 2000; k++) {
            const [x, y, z] = r.direction();
            most = Math.max(most, table.at(x, y, z) - 1);
          }
          return most;
        };
        // Second order: half the cell, a quarter of the error
        expect(over(16) / over(32)).toBeGreaterThan(3.4);
      }
    }
  });

  it('meet linear functions exactly and give 0 at the origin', () => {
    const table = new SphereTable(8, (x, y, z) => 3 * x - 2 * y + 0.5 * z);
    const random = seededRandom(3);
    for (let k = 0; k < 200; k++) {
      const [x, y, z] = random.direction();
      expect(table.at(x, y, z)).toBeCloseTo(3 * x - 2 * y + 0.5 * z, 13);
    }
    expect(table.at(0, 0, 0)).toBe(0);
    expect(table.at(Number.NaN, 0, 1)).toBeNaN();
  });

  it('compute nothing before it is asked for', () => {
    const table = new SphereTable(64, ball);
    expect(table.filled).toBe(0);
    table.at(0.3, 0.2, 1);
    expect(table.filled).toBe(3);
  });

  it('are caught when shrunk by a thousandth', () => {
    const f = ball;
    const table = new SphereTable(32, f);
    expect(shortfall((x, y, z) => 0.999 * table.at(x, y, z), f, seededRandom(1))).toBeGreaterThan(1e-4);
  });

  it('are caught when the lower corner stands for the cell', () => {
    const f = cloud(seededRandom(5), 12);
    const n = 16;
    // What is left of the interpolation when the far corners are skipped
    const lazy: Convex = (x, y, z) => {
      const major = Math.max(Math.abs(x), Math.abs(y), Math.abs(z));
      const snap = (v: number) => Math.floor((v / major) * (n / 2)) / (n / 2);
      return major * f(snap(x), snap(y), snap(z));
    };
    expect(shortfall(lazy, f, seededRandom(5))).toBeGreaterThan(1e-3);
  });
});

describe('polar tables', () => {
  it('never lie below a function that does not change about z', () => {
    for (const f of [
      (r: number, z: number) => Math.hypot(r, z),
      (r: number, z: number) => Math.max(r - 0.3 * z, 0.9 * z, -z),
    ]) {
      const table = new PolarTable(16, f);
      const random = seededRandom(9);
      for (let k = 0; k < 3000; k++) {
        const angle = random.between(0, Math.PI);
        const [r, z] = [3 * Math.sin(angle), 3 * Math.cos(angle)];
        expect(table.at(r, z)).toBeGreaterThan(f(r, z) - 1e-13);
        expect(table.at(r, z)).toBeLessThan(f(r, z) + 3 * 2e-2);
      }
    }
  });
});

describe('arc bounds', () => {
  it('hold between the ends of an interval (seeds 1–40)', () => {
    for (let seed = 1; seed <= 40; seed++) {
      const random = seededRandom(seed);
      const f = seed % 5 === 0 ? ball : cloud(random, 1 + random.below(20));
      expect(arcShortfall(arcBound, f, Math.sqrt(3), random)).toBeLessThan(1e-12);
    }
  });

  it('are caught when the arc factor is dropped', () => {
    const chordOnly: typeof arcBound = (v1, v2) => Math.max(v1, v2);
    expect(arcShortfall(chordOnly, ball, 1, seededRandom(2))).toBeLessThan(1e-12);
    // The ball is flat along its arcs; a point set is not.
    expect(arcShortfall(chordOnly, cloud(seededRandom(2), 3), Math.sqrt(3), seededRandom(2))).toBeGreaterThan(1e-3);
  });

  it('are caught when the price of the parallel part is dropped', () => {
    const noKappa: typeof arcBound = (v1, v2, width, _kappa, sag) =>
      arcBound(v1, v2, width, -Math.max(v1, v2) - 1, sag / 1e3);
    expect(arcShortfall(noKappa, cloud(seededRandom(4), 4), Math.sqrt(3), seededRandom(4))).toBeGreaterThan(1e-3);
  });

  it('search: a bound of the arc, near its maximum, caught when an interval is skipped', () => {
    let caught = 0;
    for (let seed = 1; seed <= 60; seed++) {
      const random = seededRandom(seed);
      const f = cloud(random, 6);
      const [from, width] = [random.between(-3, 3), random.between(0, 2 * Math.PI)];
      const z = random.between(-1, 1);
      const at = (t: number) => f(Math.cos(t), Math.sin(t), z);
      const most = Math.max(...Array.from({ length: 20001 }, (_, k) => at(from + (width * k) / 20000)));
      const arc = new ArcMax(from, from + width);
      const run = (level: number, skip: (t: number) => boolean) =>
        arc.run({ at: (t) => (skip(t) ? -10 : at(t)) }, level, f(0, 0, -z), Math.sqrt(3), Number.NEGATIVE_INFINITY);
      const bounds = [0, 2, 4, 6].map((level) => run(level, () => false));
      for (const b of bounds) expect(b).toBeGreaterThan(most - 1e-12);
      expect(bounds[3]! - most).toBeLessThan(1e-4);
      expect(at(arc.arg)).toBeGreaterThan(most - 1e-3);
      const peak = arc.arg;
      if (run(6, (t) => Math.abs(t - peak) < 0.15) < most - 1e-6) caught++;
    }
    expect(caught).toBeGreaterThan(50);
  });
});

describe('unit maximum', () => {
  it('bounds a norm with a linear part for one, two and three rows (seeds 1–30)', () => {
    for (let seed = 1; seed <= 30; seed++) {
      const random = seededRandom(seed);
      const rows = 1 + (seed % 3);
      const f = cloud(random, 8);
      const l = random.direction();
      const G = (e0: number, e1: number, e2: number, t: number) => f(e0 + t * l[0], e1 + t * l[1], e2 + t * l[2]);
      const over = new UnitMax(rows);
      const bound = (level: number) =>
        over.run({ unit: (a, b, c) => G(a, b, c, 1) }, level, G(0, 0, 0, -1), 4, Number.NEGATIVE_INFINITY);
      let most = Number.NEGATIVE_INFINITY;
      for (let k = 0; k < 20000; k++) {
        const v = random.direction();
        const e = v.map((c, j) => (j < rows ? c : 0));
        const size = Math.hypot(...e);
        most = Math.max(most, G(e[0]! / size, e[1]! / size, e[2]! / size, 1));
      }
      const [coarse, fine] = [bound(0), bound(4)];
      expect(coarse).toBeGreaterThan(most - 1e-12);
      expect(fine).toBeGreaterThan(most - 1e-12);
      expect(fine - most).toBeLessThan(0.02);
    }
  });
});
