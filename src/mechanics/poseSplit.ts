/**
 * Where weights and a tip force want different poses outboard of a joint, the sum of their bounds is too high by what each would lose at the
 * other's pose. Splitting the travel of a joint that they disagree about, and bounding both halves, takes that away: the worst lies in one of the
 * halves, and each half's bound is of the same kind (`freeForceSearch.ts`), with the outward sets of the narrower travel. Joints beyond the one
 * split keep their tables. Best first.
 */
import type { Chain } from './chain.ts';
import type { SphereCheck } from './fanCheck.ts';
import { type GravityMass, OutwardSets } from './outwardSets.ts';

/** What is split: joints from `first` outward, with the outward sets over the whole travel. */
export interface SplitChain {
  readonly chain: Chain;
  readonly weights: OutwardSets;
  readonly tip: OutwardSets;
  readonly masses: GravityMass;
  readonly tipMass: GravityMass;
  readonly first: number;
}

/** One form: its bound over the whole travel, and its search with other outward sets of weights and tip. */
export interface SplitPart {
  readonly bound: number;
  readonly make: (weights: OutwardSets, tip: OutwardSets) => SphereCheck;
}

interface Branch {
  readonly part: SplitPart;
  readonly from: Float64Array;
  readonly to: Float64Array;
  readonly bound: number;
  readonly level: number;
  /** Joint to split and where, rad; -1: finer tables come first. */
  readonly joint: number;
  readonly at: number;
}

const FIRST_LEVEL = 2;
const LAST_LEVEL = 5;
const MOST = 6000;
const SLICE_MS = 30;
/** Loss by disagreement, as a share of the reach, below which finer tables promise more. */
const AGREED = 2e-4;

export class PoseSplit {
  private readonly whole: SplitChain;
  private readonly open: Branch[] = [];
  /** Bound of what needs no further look. */
  private closed = Number.NEGATIVE_INFINITY;
  private made = 0;
  private stuck = false;

  constructor(whole: SplitChain, parts: readonly SplitPart[]) {
    this.whole = whole;
    const { from, to } = whole.chain;
    for (const part of parts) {
      this.open.push({ part, from, to, bound: part.bound, level: FIRST_LEVEL - 1, joint: -1, at: 0 });
    }
  }

  /** Nothing more comes of it. */
  get spent(): boolean {
    return this.stuck || this.made > MOST || this.open.length === 0;
  }

  /** Goes on for a while, towards bounds of at most `wanted`; returns the bound of all parts. */
  slice(wanted: number): number {
    const end = performance.now() + SLICE_MS;
    while (!this.spent && performance.now() < end) {
      const next = this.take();
      if (next.bound <= wanted) {
        this.open.push(next);
        break;
      }
      const { part, from, to, bound, level, joint, at } = next;
      if (joint < 0) {
        if (level === LAST_LEVEL) {
          this.open.push(next);
          this.stuck = true;
          break;
        }
        this.assess(part, from, to, bound, level + 1, wanted);
        continue;
      }
      const middle = (list: Float64Array) => Float64Array.from(list, (v, k) => (k === joint ? at : v));
      this.assess(part, from, middle(to), bound, level, wanted);
      this.assess(part, middle(from), to, bound, level, wanted);
    }
    return this.open.reduce((most, { bound }) => Math.max(most, bound), this.closed);
  }

  private take(): Branch {
    let best = 0;
    for (let k = 1; k < this.open.length; k++) if (this.open[k]!.bound > this.open[best]!.bound) best = k;
    const branch = this.open[best]!;
    this.open[best] = this.open[this.open.length - 1]!;
    this.open.pop();
    return branch;
  }

  /** Bounds a part of the travel; kept where it may hold the worst. */
  private assess(part: SplitPart, from: Float64Array, to: Float64Array, most: number, level: number, wanted: number) {
    this.made++;
    const { chain, weights, tip, masses, tipMass } = this.whole;
    const full = chain.full.map((v, k) => (to[k]! - from[k]! < chain.to[k]! - chain.from[k]! ? 0 : v));
    const narrow: Chain = { ...chain, from, to, full };
    const heavy = new OutwardSets(narrow, masses, weights);
    const pushed = new OutwardSets(narrow, tipMass, tip);
    const search = part.make(heavy, pushed);
    const value = search.best(level, wanted, wanted);
    const bound = Number.isNaN(value) ? most : Math.min(value, most);
    if (bound <= wanted) {
      this.closed = Math.max(this.closed, bound);
      return;
    }
    const a = new Float64Array(chain.n);
    const b = new Float64Array(chain.n);
    search.apart(a, b, level, wanted);
    let joint = -1;
    let loss = AGREED;
    for (let k = this.whole.first; k < chain.n; k++) {
      const share = Math.min(
        heavy.reach[k]! / heavy.reach[this.whole.first]!,
        pushed.reach[k]! / pushed.reach[this.whole.first]!,
      );
      const here = (1 - Math.cos(a[k]! - b[k]!)) * share;
      if (!(here > loss)) continue;
      loss = here;
      joint = k;
    }
    const at = joint < 0 ? 0 : 0.5 * (a[joint]! + b[joint]!);
    this.open.push({ part, from, to, bound, level, joint, at });
  }
}
