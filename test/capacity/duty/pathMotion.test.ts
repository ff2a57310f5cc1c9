import { describe, expect, it } from 'vitest';
import { angleAt, motionAt, type PathMotion, pathMotion, turnsIn } from '../../../src/capacity/duty/index.ts';
import { seededRandom } from '../../../src/math/random.ts';

interface State {
  readonly q: number;
  readonly v: number;
  readonly a: number;
}

function stateAt(path: PathMotion, k: number, share: number): State {
  const [q, v, a] = [new Float64Array(path.n), new Float64Array(path.n), new Float64Array(path.n)];
  motionAt(path, k, share, q, v, a);
  return { q: q[0]!, v: v[0]!, a: a[0]! };
}

/** A path of one joint through a function at the times. */
function through(times: readonly number[], of: (t: number) => number, full = 0): PathMotion {
  return pathMotion(
    times,
    times.map((t) => [of(t)]),
    [full],
  );
}

/** Largest error of angle, speed and acceleration at the poses and within the pieces, against a known motion. */
function errors(path: PathMotion, of: (t: number) => State, from = 0, to = path.rows - 1): State {
  const most = { q: 0, v: 0, a: 0 };
  for (let k = from; k < to; k++) {
    for (const share of [0, 0.25, 0.5, 0.75, 1]) {
      const found = stateAt(path, k, share);
      const true_ = of(path.time[k]! + share * (path.time[k + 1]! - path.time[k]!));
      most.q = Math.max(most.q, Math.abs(found.q - true_.q));
      most.v = Math.max(most.v, Math.abs(found.v - true_.v));
      most.a = Math.max(most.a, Math.abs(found.a - true_.a));
    }
  }
  return most;
}

const evenly = (count: number, to: number) => Array.from({ length: count + 1 }, (_, k) => (to * k) / count);

describe('the motion along a path', () => {
  // Two tones, period 2 s.
  const w = Math.PI;
  const tones = (t: number): State => ({
    q: 0.7 * Math.sin(w * t + 0.3) + 0.2 * Math.cos(2 * w * t),
    v: 0.7 * w * Math.cos(w * t + 0.3) - 0.4 * w * Math.sin(2 * w * t),
    a: -0.7 * w * w * Math.sin(w * t + 0.3) - 0.8 * w * w * Math.cos(2 * w * t),
  });

  it('comes to a known periodic motion: angle to fourth, speed to third, acceleration to second order', () => {
    const coarse = errors(
      through(evenly(32, 2), (t) => tones(t).q),
      tones,
    );
    const fine = errors(
      through(evenly(64, 2), (t) => tones(t).q),
      tones,
    );
    expect(coarse.q).toBeLessThan(2e-5);
    expect(coarse.v).toBeLessThan(2e-3);
    expect(coarse.a).toBeLessThan(0.2);
    expect(coarse.q / fine.q).toBeGreaterThan(14);
    expect(coarse.v / fine.v).toBeGreaterThan(7);
    expect(coarse.a / fine.a).toBeGreaterThan(3.7);
  });

  it('comes to it at uneven times too (seed 1)', () => {
    const random = seededRandom(1);
    const times = evenly(200, 2).map((t, k) => (k === 0 || k === 200 ? t : t + random.between(-0.003, 0.003)));
    const path = through(times, (t) => tones(t).q);
    expect(path.closed).toBe(true);
    const most = errors(path, tones);
    expect(most.v).toBeLessThan(2e-5);
    expect(most.a).toBeLessThan(2e-2);
  });

  it('takes an open cut of the same motion well away from and up to its ends', () => {
    const path = through(evenly(60, 1.3), (t) => tones(t).q);
    expect(path.closed).toBe(false);
    const most = errors(path, tones);
    expect(most.v).toBeLessThan(1e-3);
    expect(most.a).toBeLessThan(0.15);
    expect(errors(path, tones, 10, 50).a).toBeLessThan(0.015);
  });

  it('is exact for a cubic through four or more poses, a parabola through three, a line through two', () => {
    const cubic = (t: number): State => ({
      q: 0.2 - 0.5 * t + 0.3 * t * t - 0.1 * t ** 3,
      v: -0.5 + 0.6 * t - 0.3 * t * t,
      a: 0.6 - 0.6 * t,
    });
    for (const times of [
      [0, 0.4, 1.5, 1.8],
      [0, 0.7, 0.9, 2.2, 3, 3.1],
    ]) {
      const most = errors(
        through(times, (t) => cubic(t).q),
        cubic,
      );
      expect(Math.max(most.q, most.v, most.a)).toBeLessThan(1e-12);
    }
    const parabola = (t: number): State => ({ q: 1 + 2 * t - 3 * t * t, v: 2 - 6 * t, a: -6 });
    expect(
      errors(
        through([0, 0.3, 1], (t) => parabola(t).q),
        parabola,
      ).a,
    ).toBeLessThan(1e-12);
    const line = stateAt(
      through([1, 3], (t) => 2 * t),
      0,
      0.4,
    );
    expect(line.q).toBeCloseTo(3.6, 12);
    expect([line.v, line.a]).toEqual([2, 0]);
  });

  it('goes through the poses, its speed and acceleration without a step, round the end of a closed path too (seed 2)', () => {
    const random = seededRandom(2);
    for (const closed of [true, false]) {
      for (const rows of [3, 4, 5, 9]) {
        const times = Array.from({ length: rows }, (_, k) => k + random.between(0, 0.8));
        const angles = times.map(() => random.between(-1, 1));
        if (closed) angles[rows - 1] = angles[0]!;
        const path = pathMotion(
          times,
          angles.map((q) => [q]),
          [0],
        );
        expect(path.closed).toBe(closed);
        for (let k = 0; k + 1 < rows; k++) {
          expect(stateAt(path, k, 0).q).toBeCloseTo(angles[k]!, 12);
          const last = k + 2 === rows;
          if (last && !closed) continue;
          const end = stateAt(path, k, 1);
          const next = stateAt(path, last ? 0 : k + 1, 0);
          expect(end.v).toBeCloseTo(next.v, 10);
          expect(end.a).toBeCloseTo(next.a, 10);
        }
      }
    }
  });

  it('gives the derivatives of its own angle', () => {
    const path = through([0, 0.5, 1.7, 2, 3.4], (t) => Math.sin(3 * t) + t);
    const h = 1e-4;
    for (let k = 0; k < 4; k++) {
      const span = path.time[k + 1]! - path.time[k]!;
      const at = (share: number) => angleAt(path, k, share, 0);
      const mid = stateAt(path, k, 0.37);
      expect((at(0.37 + h) - at(0.37 - h)) / (2 * h * span)).toBeCloseTo(mid.v, 6);
      expect((at(0.37 + h) - 2 * at(0.37) + at(0.37 - h)) / (h * span) ** 2).toBeCloseTo(mid.a, 4);
    }
  });

  it('closes over whole turns of a joint that turns right round, at a steady speed', () => {
    const path = through([0, 0.3, 0.5, 1], (t) => 2 * Math.PI * t, 1);
    expect(path.closed).toBe(true);
    for (let k = 0; k < 3; k++) {
      expect(stateAt(path, k, 0.6).v).toBeCloseTo(2 * Math.PI, 12);
      expect(stateAt(path, k, 0.6).a).toBeCloseTo(0, 10);
    }
    expect(through([0, 0.3, 0.5, 1], (t) => 2 * Math.PI * t).closed).toBe(false);
  });

  it('knows where a joint turns back: the zeros of its speed within each piece (seed 3)', () => {
    const random = seededRandom(3);
    const out = new Float64Array(2);
    let seen = 0;
    for (let trial = 0; trial < 60; trial++) {
      const times = Array.from({ length: 7 }, (_, k) => k + random.between(0, 0.5));
      const path = pathMotion(
        times,
        times.map(() => [random.between(-1, 1)]),
        [0],
      );
      for (let k = 0; k < 6; k++) {
        const count = turnsIn(path, k, 0, out);
        let signs = 0;
        let before = Math.sign(stateAt(path, k, 0).v);
        for (let s = 1; s <= 2000; s++) {
          const now = Math.sign(stateAt(path, k, s / 2000).v);
          if (now !== before) signs++;
          before = now;
        }
        expect(count).toBe(signs);
        for (let c = 0; c < count; c++) expect(Math.abs(stateAt(path, k, out[c]!).v)).toBeLessThan(1e-9);
        seen += count;
      }
    }
    expect(seen).toBeGreaterThan(60);
  });

  it('refuses times that do not rise and poses of the wrong length', () => {
    expect(() => pathMotion([0, 0], [[0], [1]], [0])).toThrow(RangeError);
    expect(() => pathMotion([0, Number.NaN], [[0], [1]], [0])).toThrow(RangeError);
    expect(() => pathMotion([0], [[0]], [0])).toThrow(RangeError);
    expect(() => pathMotion([0, 1], [[0, 1], [1]], [0, 0])).toThrow(RangeError);
  });
});
