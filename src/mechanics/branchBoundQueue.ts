/** A queue of boxes, largest bound first, in flat arrays: a binary heap of slots, each with its intervals, cut and piece. */
import type { Flat } from '../math/vector.ts';

export class BoxQueue {
  /** Interval of the box last popped where it is to be cut. */
  cutAt = 0;
  private readonly size: number;
  private readonly most: number;
  private count = 0;
  private room = 256;
  /** By place in the heap. */
  private heap = new Int32Array(this.room);
  /** By slot. */
  private bounds: Flat = new Float64Array(this.room);
  private cuts = new Int32Array(this.room);
  private pieces = new Int32Array(this.room);
  private low: Flat;
  private high: Flat;

  /** Boxes of `size` intervals; `most` boxes. */
  constructor(size: number, most: number) {
    this.size = size;
    this.most = most;
    this.low = new Float64Array(this.room * size);
    this.high = new Float64Array(this.room * size);
    for (let k = 0; k < this.room; k++) this.heap[k] = k;
  }

  get length(): number {
    return this.count;
  }

  /** Largest bound; -Infinity where the queue is empty. */
  get top(): number {
    return this.count > 0 ? this.bounds[this.heap[0]!]! : Number.NEGATIVE_INFINITY;
  }

  /** No box more can be cut without leaving one out. */
  get full(): boolean {
    return this.count + 2 > this.most;
  }

  push(bound: number, low: Flat, high: Flat, cut: number, piece: number): void {
    if (this.count === this.room) this.grow();
    const slot = this.heap[this.count]!;
    this.bounds[slot] = bound;
    this.cuts[slot] = cut;
    this.pieces[slot] = piece;
    this.low.set(low, slot * this.size);
    this.high.set(high, slot * this.size);
    let place = this.count++;
    const { heap, bounds } = this;
    while (place > 0) {
      const parent = (place - 1) >> 1;
      if (!(bounds[slot]! > bounds[heap[parent]!]!)) break;
      heap[place] = heap[parent]!;
      place = parent;
    }
    heap[place] = slot;
  }

  /** Takes the box of the largest bound; its intervals go to `low`, `high`. Returns its piece. */
  pop(low: Flat, high: Flat): number {
    const { heap, bounds, size } = this;
    const slot = heap[0]!;
    low.set(this.low.subarray(slot * size, slot * size + size));
    high.set(this.high.subarray(slot * size, slot * size + size));
    this.cutAt = this.cuts[slot]!;
    const last = heap[--this.count]!;
    let place = 0;
    for (;;) {
      let child = 2 * place + 1;
      if (child >= this.count) break;
      if (child + 1 < this.count && bounds[heap[child + 1]!]! > bounds[heap[child]!]!) child++;
      if (!(bounds[heap[child]!]! > bounds[last]!)) break;
      heap[place] = heap[child]!;
      place = child;
    }
    heap[place] = last;
    // slots not in use stand behind the heap
    heap[this.count] = slot;
    return this.pieces[slot]!;
  }

  private grow(): void {
    const room = 2 * this.room;
    const heap = new Int32Array(room);
    heap.set(this.heap);
    for (let k = this.room; k < room; k++) heap[k] = k;
    this.heap = heap;
    this.bounds = widened(this.bounds, room);
    this.low = widened(this.low, room * this.size);
    this.high = widened(this.high, room * this.size);
    const cuts = new Int32Array(room);
    cuts.set(this.cuts);
    this.cuts = cuts;
    const pieces = new Int32Array(room);
    pieces.set(this.pieces);
    this.pieces = pieces;
    this.room = room;
  }
}

function widened(list: Flat, size: number): Flat {
  const out = new Float64Array(size);
  out.set(list);
  return out;
}
