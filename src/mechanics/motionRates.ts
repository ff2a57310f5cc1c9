/**
 * Accelerations and speeds over a box: the most of
 *
 *     T(δ) = base + Σ y_j A_j + Σ_{j≤k} x_j x_k C_jk,    y_j within ±1, x_j within its interval [a, b]
 *
 * where base, A and C are series in the angles. For every δ, T is linear in each y, and in each x but for its square. A square is below its chord,
 * (a + b) x - a b, where C_jj ≥ 0, and below the tangent at the middle m of the interval, (a + b) x - m², for the part that is C_jj ≤ 0: with either
 * T is linear in x_j too, so the ends of the intervals hold the most. Where the sign of C_jj is open one is taken, and the other's lead on it, m² - ab
 * times the most of what C_jj is beyond that sign, comes on top. So the most is that of the series of all choices of ends; choices whose sign is
 * settled over the box, or that cannot come up to what is close enough, are left out. Own derivation.
 */
import type { Flat } from '../math/vector.ts';
import { pairIndex } from './freeLoadsPose.ts';
import type { MotionChain } from './motionChain.ts';
import { linearTerm, Series, type SeriesBox, squareTerm, termCount } from './motionSeries.ts';

/** Signs of accelerations tried both ways at most, and choices of ends of speeds and such signs together. */
const SIGNS = 5;
const CHOICES = 128;
/** A speed is not tried whose products together are below this share of what is close enough, or of the remainders. */
const SLIGHT = 2e-3;
const SLIGHT_BESIDE = 0.05;

/** The most of a series over its box, term by term, and where it may come up to something. */
export class MotionRates {
  /** The choice that gives the most: parts of the limits. [n] */
  readonly y: Flat;
  readonly x: Flat;
  /** Series of that choice, its most, and what is added to it whatever the angles. */
  readonly sum: Series;
  most = 0;
  added = 0;
  /** What the bound may owe to the width of the interval of each speed. [n] */
  readonly slackX: Flat;
  /** Steps from the middle of each variable between which what is close enough can be reached; from > to: nowhere. */
  readonly from: Flat;
  readonly to: Flat;
  private readonly n: number;
  private readonly spread: Flat;
  private readonly open: Int32Array;
  private readonly slight: Uint8Array;
  private openCount = 0;
  private readonly trialX: Flat;
  private readonly trialY: Flat;
  private readonly moving: Series;
  private readonly layers: readonly Series[];
  private readonly own: Flat;
  private parts: MotionChain | null = null;
  private box: SeriesBox | null = null;
  private enough = 0;
  private low: Flat | null = null;
  private high: Flat | null = null;
  private at = 0;
  private first = -1;

  constructor(n: number, variables: number) {
    const flat = (size: number) => new Float64Array(size);
    this.n = n;
    this.y = flat(n);
    this.x = flat(n);
    this.sum = new Series(1, variables);
    this.slackX = flat(n);
    this.from = flat(variables);
    this.to = flat(variables);
    this.spread = flat(n);
    this.open = new Int32Array(n);
    this.slight = new Uint8Array(n);
    this.trialX = flat(n);
    this.trialY = flat(n);
    this.moving = new Series(1, variables);
    this.layers = Array.from({ length: SIGNS + 1 }, () => new Series(1, variables));
    this.own = flat(variables);
  }

  /**
   * Bound of `base` with the rates, the remainders included. What lies below `enough` need not be told apart. `low`, `high`: the box, with the
   * intervals of x from `at`. Without rates (`moving` false) that of `base` alone.
   */
  bound(
    box: SeriesBox,
    parts: MotionChain,
    base: Series,
    moving: boolean,
    low: Flat,
    high: Flat,
    at: number,
    enough: number,
  ): number {
    this.parts = parts;
    this.box = box;
    this.low = low;
    this.high = high;
    this.at = at;
    this.most = Number.NEGATIVE_INFINITY;
    this.added = base.rest;
    this.enough = enough;
    this.slackX.fill(0);
    this.from.fill(Number.POSITIVE_INFINITY);
    this.to.fill(Number.NEGATIVE_INFINITY);
    this.openCount = 0;
    if (!moving) {
      this.layers[0]!.copy(base);
      this.leaf(this.layers[0]!);
    } else {
      this.takeAccelerations(base);
      this.takeSpeeds();
    }
    // choices left out may come up to `enough`
    return Math.max(this.most, enough - this.added) + this.added;
  }

  /** Settled signs go to `moving`; of the others the largest are tried both ways, the rest comes on top. */
  private takeAccelerations(base: Series): void {
    const { n, parts, box, moving, open, spread, trialY } = this;
    moving.copy(base);
    moving.rest = 0;
    for (let j = 0; j < n; j++) {
      const A = parts!.accel[j]!;
      this.added += A.rest;
      spread[j] = 0;
      const middle = A.c[0]!;
      trialY[j] = middle < 0 ? -1 : 1;
      const wide = box!.spread(A);
      if (wide <= Math.abs(middle)) addTerms(moving, A, trialY[j]!);
      else {
        spread[j] = wide;
        let place = this.openCount++;
        while (place > 0 && spread[open[place - 1]!]! < wide) {
          open[place] = open[place - 1]!;
          place--;
        }
        open[place] = j;
      }
    }
    while (this.openCount > SIGNS) {
      const j = open[--this.openCount]!;
      // its most, whatever the sign
      this.added += spread[j]! + Math.abs(parts!.accel[j]!.c[0]!);
    }
  }

  private takeSpeeds(): void {
    const { n, parts, box, low, high, at, slackX, slight } = this;
    let choices = 2 ** this.openCount;
    let rests = this.added;
    for (const C of parts!.rate) rests += C.rest;
    const least = Math.max(SLIGHT * Math.max(0, this.enough), SLIGHT_BESIDE * rests);
    let even = true;
    for (let j = 0; j < n; j++) {
      const C = parts!.rate[pairIndex(n, j, j)]!;
      const [a, b] = [low![at + j]!, high![at + j]!];
      const bulge = ((b - a) / 2) ** 2;
      const wide = box!.spread(C) + C.rest;
      // the lead of chord or tangent, whichever is not in the sum
      const left = C.c[0]! >= 0 ? Math.max(0, wide - C.c[0]!) : Math.max(0, wide + C.c[0]!);
      this.added += bulge * left;
      slackX[j] = bulge * Math.max(0, -C.c[0]! + wide);
      let size = 0;
      for (let k = 0; k < n; k++) {
        if (k >= j) this.added += parts!.rate[pairIndex(n, j, k)]!.rest;
        if (k !== j) size += sizeOf(box!, parts!.rate[k < j ? pairIndex(n, k, j) : pairIndex(n, j, k)]!);
      }
      slight[j] = size <= least ? 1 : 0;
      if (a !== -b) even = false;
      if (a < b && slight[j] === 0) choices *= 2;
    }
    // turned round, all speeds give the same: of the first one end will do
    this.first = even ? slight.indexOf(0) : -1;
    if (this.first >= 0) choices /= 2;
    const loose = choices > CHOICES;
    for (let j = 0; j < n; j++) {
      if (loose) slight[j] = 1;
      // its square is taken at the end that is best at the middle
      const [a, b] = [low![at + j]!, high![at + j]!];
      const C = parts!.rate[pairIndex(n, j, j)]!;
      if (slight[j] === 1) this.added += Math.abs(a + b) * (b - a) * Math.max(0, box!.spread(C) - Math.abs(C.c[0]!));
    }
    if (!loose) {
      this.looseProducts((j, k) => slight[j] === 1 || slight[k] === 1);
      this.chooseSpeed(0);
      return;
    }
    // too many to be tried: every product and every open sign by itself
    this.looseProducts(() => true);
    while (this.openCount > 0) {
      const j = this.open[--this.openCount]!;
      this.added += this.spread[j]! + Math.abs(parts!.accel[j]!.c[0]!);
    }
    this.trialX.fill(0);
    this.withSpeeds();
  }

  /** Counts products of two speeds at their most, whatever the angles. */
  private looseProducts(take: (j: number, k: number) => boolean): void {
    const { n, parts, box, low, high, at } = this;
    const most = (j: number) => Math.max(Math.abs(low![at + j]!), Math.abs(high![at + j]!));
    for (let j = 0; j < n; j++) {
      for (let k = j + 1; k < n; k++) {
        if (take(j, k)) this.added += most(j) * most(k) * sizeOf(box!, parts!.rate[pairIndex(n, j, k)]!);
      }
    }
  }

  /** Tries both ends of the speed of joint j and of those after it; of one that is slight its square alone counts. */
  private chooseSpeed(j: number): void {
    const { n, low, high, at, trialX, slight } = this;
    if (j === n) {
      this.withSpeeds();
      return;
    }
    const [a, b] = [low![at + j]!, high![at + j]!];
    trialX[j] = slight[j] === 1 ? 0 : b;
    this.chooseSpeed(j + 1);
    if (a === b || slight[j] === 1 || j === this.first) return;
    trialX[j] = a;
    this.chooseSpeed(j + 1);
  }

  private withSpeeds(): void {
    const { n, parts, low, high, at, moving, layers, trialX, open, spread, slight } = this;
    const sum = layers[0]!;
    sum.copy(moving);
    for (let j = 0; j < n; j++) {
      const x = trialX[j]!;
      const [a, b] = [low![at + j]!, high![at + j]!];
      const own = parts!.rate[pairIndex(n, j, j)]!;
      // without the cross products the end that the square likes best
      const end = slight[j] === 0 ? x : a + b > 0 === own.c[0]! > 0 ? b : a;
      const square = own.c[0]! >= 0 ? (a + b) * end - a * b : (a + b) * end - ((a + b) / 2) ** 2;
      if (square !== 0) addTerms(sum, own, square);
      if (x === 0) continue;
      for (let k = j + 1; k < n; k++) {
        if (trialX[k]! !== 0) addTerms(sum, parts!.rate[pairIndex(n, j, k)]!, x * trialX[k]!);
      }
    }
    let left = this.added;
    for (let u = 0; u < this.openCount; u++) left += spread[open[u]!]! + Math.abs(parts!.accel[open[u]!]!.c[0]!);
    if (this.mostOf(sum) + left <= this.enough) return;
    this.chooseSign(0);
  }

  /** Tries both signs of the open acceleration u and of those after it. */
  private chooseSign(u: number): void {
    const { layers, parts, open, trialY } = this;
    const sum = layers[u]!;
    if (u === this.openCount) {
      this.leaf(sum);
      return;
    }
    const j = open[u]!;
    const A = parts!.accel[j]!;
    const first = A.c[0]! < 0 ? -1 : 1;
    for (const sign of [first, -first]) {
      const next = layers[u + 1]!;
      next.copy(sum);
      addTerms(next, A, sign);
      trialY[j] = sign;
      this.chooseSign(u + 1);
    }
  }

  /** One choice of all rates: its most, and where it can come up to `enough`. */
  private leaf(sum: Series): void {
    const value = this.mostOf(sum);
    if (value > this.most) {
      this.most = value;
      this.sum.copy(sum);
      this.x.set(this.trialX);
      this.y.set(this.trialY);
    }
    if (value + this.added <= this.enough) return;
    this.reach(sum, value + this.added - this.enough);
  }

  /** Most of a series over the box, without its remainder. */
  private mostOf(sum: Series): number {
    const { own } = this;
    const { half, reach } = this.box!;
    const { c } = sum;
    let total = c[0]!;
    let t = 1;
    for (let b = 0; b < sum.live; b++) {
      const h = half[b]!;
      const g = Math.abs(c[t]!);
      t++;
      for (let a = 0; a < b; a++) {
        total += Math.abs(c[t]!) * reach[t]!;
        t++;
      }
      const bend = c[t]!;
      t++;
      const most = bend < 0 && g < -2 * bend * h ? (g * g) / (-4 * bend) : g * h + bend * h * h;
      own[b] = most;
      total += most;
    }
    return total;
  }

  /** Widens `from`, `to` to where the series can reach what is `over` below its most; every other variable may do its most. */
  private reach(sum: Series, over: number): void {
    const { own, from, to } = this;
    const { half, count } = this.box!;
    for (let b = 0; b < count; b++) {
      const h = half[b]!;
      if (b >= sum.live) {
        from[b] = -h;
        to[b] = h;
        continue;
      }
      const g = sum.c[linearTerm(b)]!;
      const bend = sum.c[squareTerm(b, b)]!;
      const need = own[b]! - over;
      let start = -h;
      let end = h;
      if (bend < 0) {
        const wide = Math.sqrt(Math.max(0, g * g + 4 * bend * need));
        start = Math.max(start, (g - wide) / (-2 * bend));
        end = Math.min(end, (g + wide) / (-2 * bend));
      } else {
        const below = -g * h + bend * h * h < need;
        const above = g * h + bend * h * h < need;
        if (below !== above) {
          // the farther root on the side that falls short
          const root = Math.sqrt(Math.max(0, g * g + 4 * bend * need));
          if (below) start = Math.max(start, bend > 0 ? (-g + root) / (2 * bend) : need / g);
          else end = Math.min(end, bend > 0 ? (-g - root) / (2 * bend) : need / g);
        }
      }
      from[b] = Math.min(from[b]!, start);
      to[b] = Math.max(to[b]!, end);
    }
  }
}

/** Most of |s| over the box, without the remainder. */
function sizeOf(box: SeriesBox, s: Series): number {
  return Math.abs(s.c[0]!) + box.spread(s) - s.rest;
}

/** sum += scale · from, the remainder aside. */
function addTerms(sum: Series, from: Series, scale: number): void {
  sum.grow(from.live);
  const count = termCount(from.live);
  for (let t = 0; t < count; t++) sum.c[t]! += scale * from.c[t]!;
}
