import { describe, expect, it } from 'vitest';
import { type Random, seededRandom } from '../../src/math/random.ts';
import { flattenArm } from '../../src/mechanics/chain.ts';
import { type CheckForm, type Form, form } from '../../src/mechanics/form.ts';
import { newReducedForm, PART, type ReducedForm, reduceForm } from '../../src/mechanics/freeLoadsForm.ts';
import { newPoseLoad, pairIndex, poseLoad, poseLoadScratch } from '../../src/mechanics/freeLoadsPose.ts';
import { loadChecks } from '../../src/mechanics/loadChecks.ts';
import { MotionBox } from '../../src/mechanics/motionBox.ts';
import { sameAllRound } from '../../src/mechanics/roundForms.ts';
import { randomArm } from '../randomArm.ts';

const FORCES = ['none', 'any', 'base', 'tool'] as const;

function oddCheck(joint: number, forms: readonly Form[]): CheckForm {
  return { check: 'odd', joint, bearing: null, unit: 'N', forms };
}

/** Forms of one, two and three rows, with linear parts and offsets. */
function oddForms(): readonly Form[] {
  const P = [
    [0.3, 0, 0.1, 0, 2, 0.4],
    [0, 0.3, 0, -2, 0, -0.3],
    [0, 0, 0, 0, 0, 1.7],
  ];
  const l = [0.1, 0, 0.5, 0, 0, 0.2];
  return [form({ P: P.slice(2) }), form({ P: P.slice(0, 2), l }), form({ P, c: [1, -2, 0.5], o: 3, l })];
}

/** Value of a reduced form along e with tip force at its best and rates as given, in parts of their limits. */
function valueAlong(p: ReducedForm, e: ArrayLike<number>, y: ArrayLike<number>, x: ArrayLike<number>): number {
  const along = (parts: ArrayLike<number>, at: number) =>
    parts[at]! * e[0]! + parts[at + 1]! * e[1]! + parts[at + 2]! * e[2]! + parts[at + 3]!;
  let sum = along(p.fixed, 0);
  if (p.hasTip) {
    const c = (k: number) => p.tip[k]! * e[0]! + p.tip[3 + k]! * e[1]! + p.tip[6 + k]! * e[2]! + p.tip[9 + k]!;
    sum += Math.hypot(c(0), c(1), c(2));
  }
  for (let j = 0; j < p.n; j++) {
    sum += y[j]! * along(p.accel, PART * j);
    for (let k = j; k < p.n; k++) sum += x[j]! * x[k]! * along(p.rate, PART * pairIndex(p.n, j, k));
  }
  return sum;
}

interface Trial {
  readonly title: string;
  readonly box: MotionBox;
  readonly low: Float64Array;
  readonly high: Float64Array;
  /** At the intervals' values x and parts y of the accelerations. */
  readonly value: (x: Float64Array, y: Float64Array) => number;
  readonly n: number;
}

/** Boxes of a random arm, one for every odd form and every third load check, half widths drawn below `width` rad. */
function trials(seed: number, width: number): Trial[] {
  const arm = randomArm(seed, {
    joints: 1 + (seed % 7),
    force: FORCES[seed % 4]!,
    motion: true,
    drives: seed % 3 === 0,
  });
  const chain = flattenArm(arm);
  const load = chain.cases[0]!;
  const { n } = chain;
  const random = seededRandom(seed + 41);
  const at = newPoseLoad(n);
  const scratch = poseLoadScratch(n);
  const reduced = newReducedForm(n);
  const checks = [...loadChecks(arm, chain).filter((_, k) => k % 3 === 0), oddCheck(random.below(n), oddForms())];
  return checks.flatMap((check) =>
    check.forms.map((f) => {
      // every other form that allows it is read in the link's frame
      const inLink = sameAllRound(f) && (seed + check.joint) % 2 === 0;
      const box = new MotionBox(chain, load, check.joint, f, inLink);
      const low = new Float64Array(box.size);
      const high = new Float64Array(box.size);
      for (let k = 0; k < n + 2; k++) {
        let middle = random.between(-3, 3);
        let half = random.below(6) === 0 ? 0 : width * random.next();
        if (k === n && f.rows === 1) [middle, half] = [random.below(2) ? Math.PI : 0, 0];
        if (k >= n) half = Math.min(half, 0.4);
        if (k === n + 1) [middle, half] = f.rows < 3 ? [0, 0] : [middle / 2, half];
        low[k] = middle - half;
        high[k] = middle + half;
      }
      for (let k = n + 2; k < box.size; k++) {
        const [a, b] = [random.below(5) / 2 - 1, random.below(5) / 2 - 1];
        low[k] = Math.min(a, b);
        high[k] = Math.max(a, b);
      }
      const value = (x: Float64Array, y: Float64Array) => {
        poseLoad(chain, load, x, at, scratch);
        reduceForm(reduced, f, check.joint, load, at, 0, 0);
        const [theta, phi] = [x[n]! + (inLink && f.rows > 1 ? x[check.joint]! : 0), x[n + 1]!];
        const e = [Math.cos(phi) * Math.cos(theta), Math.cos(phi) * Math.sin(theta), Math.sin(phi)];
        return valueAlong(reduced, e, y, x.subarray(n + 2));
      };
      return { title: `${check.check} of joint ${check.joint}`, box, low, high, value, n };
    }),
  );
}

function middleOf({ low, high }: Trial): Float64Array {
  return low.map((a, k) => (a + high[k]!) / 2);
}

/** A corner of the intervals or a point within, and signs of the accelerations. */
function pointOf({ n, low, high }: Trial, random: Random): { x: Float64Array; y: Float64Array } {
  const corner = random.below(2) === 0;
  const x = low.map((from, k) => {
    if (corner) return random.below(2) ? from : high[k]!;
    return random.between(from, high[k]!);
  });
  return { x, y: Float64Array.from({ length: n }, () => 1 - 2 * random.below(2)) };
}

/** The box about its middle with angles ± `half`, direction and speeds held. */
function closeTo(trial: Trial, half: number): Trial {
  const middle = middleOf(trial);
  const edge = (sign: number) => middle.map((v, k) => (k < trial.n ? v + sign * half : v));
  return { ...trial, low: edge(-1), high: edge(1) };
}

describe('the bound of a box in motion', () => {
  it.each(Array.from({ length: 21 }, (_, k) => k + 1))('is not exceeded within the box: arm of seed %i', (seed) => {
    for (const width of [3, 0.9, 0.3, 0.03]) {
      const random = seededRandom(seed + 1000);
      for (const trial of trials(seed, width)) {
        const bound = trial.box.bound(trial.low, trial.high);
        let most = Number.NEGATIVE_INFINITY;
        for (let k = 0; k < 60; k++) {
          const { x, y } = pointOf(trial, random);
          most = Math.max(most, trial.value(x, y));
        }
        expect(bound, `${trial.title}, width ${width}`).toBeGreaterThanOrEqual(most);
      }
    }
  });

  it.each([2, 3, 4, 8, 10])('leaves in the box all that comes up to enough: arm of seed %i', (seed) => {
    const random = seededRandom(seed + 2000);
    let shrunk = 0;
    for (const width of [0.9, 0.3, 0.05]) {
      for (const trial of trials(seed, width)) {
        const points = Array.from({ length: 100 }, () => {
          const { x, y } = pointOf(trial, random);
          return { x, value: trial.value(x, y) };
        }).sort((a, b) => b.value - a.value);
        const enough = points[10]!.value;
        const bound = trial.box.bound(trial.low, trial.high, enough);
        expect(bound, trial.title).toBeGreaterThanOrEqual(points[0]!.value);
        const low = trial.low.slice();
        const high = trial.high.slice();
        const left = trial.box.shrink(low, high);
        for (const { x, value } of points) {
          if (!(value > enough)) continue;
          expect(left, trial.title).toBe(true);
          for (let k = 0; k < x.length; k++) {
            expect(x[k]!, trial.title).toBeGreaterThanOrEqual(low[k]! - 1e-12);
            expect(x[k]!, trial.title).toBeLessThanOrEqual(high[k]! + 1e-12);
          }
        }
        if (low.some((v, k) => v > trial.low[k]!) || high.some((v, k) => v < trial.high[k]!)) shrunk++;
      }
    }
    expect(shrunk).toBeGreaterThan(0);
  });

  it.each([3, 4, 5, 6, 8, 11])('closes to second order as the box shrinks: arm of seed %i', (seed) => {
    for (const trial of trials(seed, 0.4)) {
      const over = [0.01, 0.005].map((half) => {
        const small = closeTo(trial, half);
        const bound = trial.box.bound(small.low, small.high);
        // the rates that the bound took, so that what is left is the angles' own
        return Math.abs(bound - slopeMost(small, Float64Array.from(trial.box.rates.y)));
      });
      const scale = trial.box.ceiling();
      expect(over[1]!, trial.title).toBeLessThanOrEqual(over[0]! / 2.5 + 1e-9 * scale);
    }
  });

  it.each(Array.from({ length: 20 }, (_, k) => k + 1))(
    'meets the value where the box is a point: arm of seed %i',
    (seed) => {
      for (const trial of trials(seed, 0.5)) {
        const point = closeTo(trial, 0);
        const bound = point.box.bound(point.low, point.high);
        const most = Array.from({ length: 2 ** point.n }, (_, bits) =>
          point.value(
            point.low,
            Float64Array.from({ length: point.n }, (_, j) => ((bits >> j) & 1 ? 1 : -1)),
          ),
        ).reduce((a, b) => Math.max(a, b));
        expect(Math.abs(bound - most), trial.title).toBeLessThanOrEqual(1e-11 * trial.box.ceiling());
      }
    },
  );
});

/** Value at the middle and what the slopes there allow over the box, by central differences. */
function slopeMost(trial: Trial, y: Float64Array): number {
  const { low, high, n } = trial;
  const middle = middleOf(trial);
  let sum = trial.value(middle, y);
  for (let k = 0; k < n; k++) {
    const step = 1e-5;
    const up = middle.slice();
    const down = middle.slice();
    up[k]! += step;
    down[k]! -= step;
    sum += (Math.abs(trial.value(up, y) - trial.value(down, y)) / (2 * step)) * ((high[k]! - low[k]!) / 2);
  }
  return sum;
}
