import { describe, expect, it } from 'vitest';
import { seededRandom } from '../../src/math/random.ts';
import { BoxQueue } from '../../src/mechanics/branchBoundQueue.ts';

const SIZE = 3;

describe('a queue of boxes', () => {
  it('gives the largest bound first, each box with its own intervals, cut and piece: 3000 turns (seeds 1–5)', () => {
    for (let seed = 1; seed <= 5; seed++) {
      const random = seededRandom(seed);
      const queue = new BoxQueue(SIZE, 1e6);
      const beside: { bound: number; low: number[]; high: number[]; cut: number; piece: number }[] = [];
      const low = new Float64Array(SIZE);
      const high = new Float64Array(SIZE);
      for (let turn = 0; turn < 3000; turn++) {
        // More in than out, so that it grows past its first room; few bounds, so that some tie
        if (random.next() < 0.7 || beside.length === 0) {
          const box = {
            bound: random.below(50),
            low: Array.from(low, () => random.next()),
            high: Array.from(high, () => 1 + random.next()),
            cut: random.below(SIZE),
            piece: random.below(7),
          };
          queue.push(box.bound, Float64Array.from(box.low), Float64Array.from(box.high), box.cut, box.piece);
          beside.push(box);
        } else {
          const top = Math.max(...beside.map(({ bound }) => bound));
          expect(queue.top).toBe(top);
          const piece = queue.pop(low, high);
          const at = beside.findIndex((box) => box.bound === top && box.low[0] === low[0]);
          expect(beside[at]).toEqual({ bound: top, low: [...low], high: [...high], cut: queue.cutAt, piece });
          beside.splice(at, 1);
        }
        expect(queue.length).toBe(beside.length);
      }
      expect(beside.length).toBeGreaterThan(512);
    }
  });

  it('keeps what was pushed apart from the arrays it came in', () => {
    const queue = new BoxQueue(1, 10);
    const [low, high] = [Float64Array.of(1), Float64Array.of(2)];
    queue.push(5, low, high, 0, 0);
    low[0] = 9;
    queue.pop(low, high);
    expect([low[0], high[0]]).toEqual([1, 2]);
  });

  it('is full when a cut would leave a box out, and has no top when empty', () => {
    const queue = new BoxQueue(1, 3);
    expect([queue.top, queue.full]).toEqual([Number.NEGATIVE_INFINITY, false]);
    const box = Float64Array.of(0);
    queue.push(1, box, box, 0, 0);
    expect(queue.full).toBe(false);
    queue.push(2, box, box, 0, 0);
    expect(queue.full).toBe(true);
    queue.pop(box, box);
    expect([queue.top, queue.full]).toEqual([1, false]);
  });
});
