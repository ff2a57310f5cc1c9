import { describe, expect, it } from 'vitest';
import type { Arm } from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { BoxBound } from '../../src/mechanics/branchBoundBox.ts';
import { InboardDirections } from '../../src/mechanics/branchBoundInboard.ts';
import { shrinkBox } from '../../src/mechanics/branchBoundShrink.ts';
import { type Chain, flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, type Form, form } from '../../src/mechanics/form.ts';
import { newReducedForm, reduceForm, support } from '../../src/mechanics/freeLoadsForm.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../../src/mechanics/freeLoadsPose.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { randomArm } from '../randomArm.ts';

const FORCES = ['none', 'any', 'base', 'tool'] as const;

/** Load checks, and forms of two and three rows with linear parts and offsets. */
function allChecks(arm: Arm, chain: Chain): CheckForm[] {
  const P = [
    [0.3, 0, 0.1, 0, 2, 0.4],
    [0, 0.3, 0, -2, 0, -0.3],
    [0, 0, 0, 0, 0, 1.7],
  ];
  const make = (joint: number, forms: readonly Form[]): CheckForm => ({
    check: 'odd',
    joint,
    bearing: null,
    unit: 'N',
    forms,
  });
  return [
    ...loadChecks(arm, chain),
    ...[0, chain.n - 1].map((joint) => make(joint, [form({ P: P.slice(0, 2), l: [0.1, 0, 0.5, 0, 0, 0.2] })])),
    ...[0, chain.n - 1].map((joint) => make(joint, [form({ P, c: [1, -2, 0.5], o: 3, l: [0.1, 0, 0.5, 0, 0, 0.2] })])),
  ];
}

interface Trial {
  readonly box: BoxBound;
  readonly low: Float64Array;
  readonly high: Float64Array;
  /** Value of the form along e at intervals x: the most over a free tip force, inboard joints as they stand. */
  readonly value: (x: Float64Array) => number;
  readonly chain: Chain;
  readonly joint: number;
}

/** A box for every form of one check in `take` of a random arm, its half widths drawn below `width`, rad. */
function trials(seed: number, width: number, take: number, kind: typeof BoxBound = BoxBound): Trial[] {
  const force = FORCES[seed % 4]!;
  const arm = randomArm(seed, { joints: 1 + (seed % 7), force, drives: seed % 3 === 0 });
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const { n } = chain;
  const random = seededRandom(seed + 77);
  const at = newPoseLoad(n);
  const scratch = poseLoadScratch(n);
  const reduced = newReducedForm(n);
  const e = new Float64Array(3);
  const out: Trial[] = [];
  for (const check of allChecks(arm, chain)) {
    if (random.below(take) > 0) continue;
    const inboard = force === 'base' ? null : new InboardDirections(chain, check.joint, false);
    for (const f of check.forms) {
      const low = new Float64Array(n + 2);
      const high = new Float64Array(n + 2);
      for (let k = 0; k < n + 2; k++) {
        let middle = random.between(-3, 3);
        let half = random.below(6) === 0 ? 0 : width * random.next();
        if (k === n && f.rows === 1) [middle, half] = [random.below(2) ? Math.PI : 0, 0];
        if (k === n + 1) [middle, half] = f.rows < 3 ? [0, 0] : [middle / 2, Math.min(half, 0.5)];
        if (force !== 'base' && k < check.joint) {
          low[k] = chain.from[k]!;
          high[k] = chain.to[k]!;
          continue;
        }
        low[k] = middle - half;
        high[k] = middle + half;
      }
      const value = (x: Float64Array) => {
        poseLoad(chain, load, x, at, scratch);
        reduceForm(reduced, f, check.joint, load, at, 0, 0);
        e[0] = Math.cos(x[n + 1]!) * Math.cos(x[n]!);
        e[1] = Math.cos(x[n + 1]!) * Math.sin(x[n]!);
        e[2] = Math.sin(x[n + 1]!);
        return support(reduced, e);
      };
      const box = new kind(chain, load, check.joint, f, inboard);
      box.level = 1;
      out.push({ box, low, high, value, chain, joint: check.joint });
    }
  }
  return out;
}

/** Samples that exceed the bounds of the boxes of seeds 1–48. */
function violations(kind: typeof BoxBound, width: number): readonly string[] {
  const broken: string[] = [];
  for (let seed = 1; seed <= 48; seed++) {
    const random = seededRandom(seed);
    for (const { box, low, high, value, joint } of trials(seed, width, 4, kind)) {
      const bound = box.bound(low, high, 0);
      const x = new Float64Array(low.length);
      for (let trial = 0; trial < 40; trial++) {
        for (let k = 0; k < x.length; k++) {
          const share = trial === 0 ? 0.5 : random.next() < 0.6 ? random.below(2) : random.next();
          x[k] = low[k]! + share * (high[k]! - low[k]!);
        }
        const v = value(x);
        if (!(v <= bound + 1e-11 * Math.abs(v))) broken.push(`seed ${seed} joint ${joint}: ${v} > ${bound}`);
      }
    }
  }
  return broken;
}

describe('bound of a box', () => {
  for (const width of [0.02, 0.1, 0.3, 0.8, 3.1]) {
    it(`holds for every sampled pose and direction, half widths below ${width} rad (seeds 1–48)`, () => {
      expect(violations(BoxBound, width)).toEqual([]);
    });
  }

  it('shrinks to the value as the box does: value, slopes and curvatures are those of the plain engine (seeds 1–60)', () => {
    let compared = 0;
    for (let seed = 1; seed <= 60; seed++) {
      for (const { box, low, high, value, joint } of trials(seed, 0.001, 6)) {
        // with inboard joints left out the plain engine has no such value, but at the innermost joint
        if (joint > 0 && seed % 4 !== 2) continue;
        const middle = low.map((v, k) => (v + high[k]!) / 2);
        const bound = box.bound(low, high, 0);
        const scale = box.ceiling();
        expect(Math.abs(box.value - value(middle))).toBeLessThanOrEqual(1e-10 * scale);
        const h = 1e-4;
        const list = Array.from(box.active.subarray(0, box.activeCount));
        let rise = 0;
        for (const k of list) {
          const moved = (d: number, j = k, s = 0) => {
            const x = middle.slice();
            x[k]! += d;
            x[j]! += s;
            return value(x);
          };
          const slope = (moved(h) - moved(-h)) / (2 * h);
          expect(Math.abs(slope - box.slope[k]!)).toBeLessThanOrEqual(1e-5 * scale);
          for (const j of list) {
            const mixed =
              j === k
                ? (moved(h) - 2 * moved(0) + moved(-h)) / (h * h)
                : (moved(h, j, h) - moved(h, j, -h) - moved(-h, j, h) + moved(-h, j, -h)) / (4 * h * h);
            expect(Math.abs(mixed - box.bend[k * box.size + j]!)).toBeLessThanOrEqual(1e-3 * scale);
            compared++;
          }
          rise += Math.abs(box.slope[k]!) * box.half[k]!;
        }
        // second order in the half widths of at most 0.001
        expect(bound - box.value - rise).toBeLessThanOrEqual(1e-4 * scale);
      }
    }
    expect(compared).toBeGreaterThan(500);
  });

  it('needs its remainder, its mixed curvatures and the balls of wide joints: without one of them it breaks (seeds 1–48)', () => {
    class NoRemainder extends BoxBound {
      protected override addRest(): void {}
    }
    class NoMixed extends BoxBound {
      protected override close(): number {
        for (let k = 0; k < this.size; k++) for (let j = 0; j < k; j++) this.bend[k * this.size + j] = 0;
        for (let k = 0; k < this.size; k++) for (let j = k + 1; j < this.size; j++) this.bend[k * this.size + j] = 0;
        return super.close();
      }
    }
    class NoBalls extends BoxBound {
      protected override close(): number {
        this.added = 0;
        return super.close();
      }
    }
    expect(violations(NoRemainder, 0.3).length).toBeGreaterThan(0);
    expect(violations(NoMixed, 0.1).length).toBeGreaterThan(0);
    expect(violations(NoBalls, 3.1).length).toBeGreaterThan(0);
  });

  it('is infinite where a load is not finite', () => {
    const { box, low, high } = trials(1, 0.1, 1)[0]!;
    high[0] = Number.NaN;
    expect(box.bound(low, high, 0)).toBe(Number.POSITIVE_INFINITY);
    high[0] = Number.POSITIVE_INFINITY;
    expect(box.bound(low, high, 0)).toBe(Number.POSITIVE_INFINITY);
  });
});

describe('shrinking a box', () => {
  it('loses no local worst: every grid maximum of the box stays or is a stop that stays (seeds 1–60)', () => {
    let shrunk = 0;
    for (let seed = 1; seed <= 60; seed++) {
      for (const { box, low, high, value, chain, joint } of trials(seed, 0.4, 5)) {
        // two intervals at most, sampled densely; inboard joints must be intervals or none
        if (joint > 0 && seed % 4 !== 2) continue;
        const { n } = chain;
        for (let k = 0; k < n; k++) {
          // stops are the travel's: the box must lie within
          if (chain.full[k]) continue;
          low[k] = Math.max(chain.from[k]!, Math.min(chain.to[k]!, low[k]!));
          high[k] = Math.max(low[k]!, Math.min(chain.to[k]!, high[k]!));
        }
        const open = Array.from(low.keys()).filter((k) => high[k]! > low[k]!);
        for (const k of open.slice(2)) {
          low[k] = (low[k]! + high[k]!) / 2;
          high[k] = low[k]!;
        }
        box.bound(low, high, 0);
        const [newLow, newHigh] = [low.slice(), high.slice()];
        const share = shrinkBox(box, chain, newLow, newHigh);
        if (share < 1) shrunk++;
        // the worst over a grid of the whole box, when it is stationary or at a stop in each open interval, must survive
        const [a, b] = [open[0], open[1]];
        if (a === undefined) continue;
        const steps = 24;
        const grid = (k: number | undefined, m: number) =>
          k === undefined ? 0 : low[k]! + ((high[k]! - low[k]!) * m) / steps;
        let best = Number.NEGATIVE_INFINITY;
        let where: [number, number] = [0, 0];
        const x = low.slice();
        for (let i = 0; i <= steps; i++) {
          for (let j = 0; j <= (b === undefined ? 0 : steps); j++) {
            x[a] = grid(a, i);
            if (b !== undefined) x[b] = grid(b, j);
            const v = value(x);
            if (v > best) [best, where] = [v, [i, j]];
          }
        }
        const stop = (k: number | undefined, m: number) =>
          k === undefined ||
          (m > 0 && m < steps) ||
          (k < n && chain.full[k] === 0 && (m === 0 ? low[k] === chain.from[k] : high[k] === chain.to[k]));
        if (!stop(a, where[0]) || !stop(b, where[1])) continue;
        expect(share, `seed ${seed}`).toBeGreaterThanOrEqual(0);
        for (const [k, m] of [
          [a, where[0]],
          [b, where[1]],
        ] as const) {
          if (k === undefined) continue;
          const slack = (high[k]! - low[k]!) / steps;
          expect(newLow[k]!).toBeLessThanOrEqual(grid(k, m) + slack);
          expect(newHigh[k]!).toBeGreaterThanOrEqual(grid(k, m) - slack);
        }
      }
    }
    expect(shrunk).toBeGreaterThan(50);
  });
});
