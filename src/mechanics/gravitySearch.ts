/**
 * The certified worst of many checks in one gravity case: for each an attained value with its pose, and a bound that nothing in the travel
 * exceeds. Rounds of rising refinement touch only checks whose gap is still open, so a first answer is there at once.
 */
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm, Form } from './form.ts';
import { GravityCheck } from './gravityCheck.ts';
import type { GravityLoad } from './gravityLoad.ts';
import { COARSE_CELLS, OutwardSets, TOP_LEVEL } from './outwardSets.ts';

/** Local search on the true kernel: improves `pose` [n] in place within the travel and returns the check's value there. */
export type Climb = (check: CheckForm, pose: Float64Array) => number;

export interface CheckState {
  readonly check: CheckForm;
  /** Attained at `pose`; -Infinity before the first round. */
  found: number;
  readonly pose: Float64Array;
  /** Nothing within the travel exceeds this. */
  bound: number;
  /** A size that lengths and masses alone allow; what stays far below it counts as nothing. */
  ceiling: number;
  level: number;
}

/** Rounding of a dozen steps on values of the ceiling's size, with room to spare: what a bound is raised by. */
const ROUNDING = 1e-12;
/** A better pose must be better by this share; else the one met first stays. Ties are thus broken by the order of the search. */
const BETTER = 1e-12;
/** Below this share of its ceiling a check counts as nothing: its gap is closed. */
export const NOTHING = 1e-9;

/** (bound - found)/bound; 0 where the check is nothing but rounding. */
export function gapOf(state: { found: number; bound: number; ceiling: number }): number {
  if (state.bound - Math.max(state.found, 0) <= NOTHING * state.ceiling) return 0;
  return (state.bound - state.found) / state.bound;
}

interface Entry extends CheckState {
  readonly searches: readonly GravityCheck[];
  /** Value of forms that are constant. */
  readonly floor: number;
}

export class GravitySearch {
  readonly sets: OutwardSets;
  readonly entries: readonly Entry[];
  private readonly chain: Chain;
  private readonly gravity: GravityLoad;
  private readonly climb: Climb;

  /** `checks` must satisfy `isHomogeneous`. `previous`: the search of an earlier layout, whose outward sets are used again. */
  constructor(
    chain: Chain,
    load: ChainCase,
    gravity: GravityLoad,
    checks: readonly CheckForm[],
    climb: Climb,
    previous: GravitySearch | null = null,
  ) {
    this.chain = chain;
    this.gravity = gravity;
    this.climb = climb;
    this.sets = new OutwardSets(chain, gravity, previous?.sets ?? null);
    const kept = new Map<string, GravityCheck>();
    this.entries = checks.map((check) => this.entry(check, kept, load));
  }

  private entry(check: CheckForm, kept: Map<string, GravityCheck>, load: ChainCase): Entry {
    const searches = new Map<string, GravityCheck>();
    let floor = Number.NEGATIVE_INFINITY;
    for (const f of check.forms.flatMap(linearParts)) {
      if (f.rows === 0 && f.l.every((v) => v === 0)) {
        floor = Math.max(floor, 0);
        continue;
      }
      // Checks of one joint share forms (thrust by size and each way): one search serves them all.
      const key = `${check.joint} ${f.P.join()} ${f.l.join()}`;
      const search = kept.get(key) ?? new GravityCheck(this.sets, check.joint, f, this.gravity.g, this.gravity.down);
      kept.set(key, search);
      searches.set(key, search);
    }
    const list = [...searches.values()];
    const ceiling = Math.max(0, ...list.map((s) => s.ceiling));
    const finite = Number.isFinite(ceiling) && load.mass.every(Number.isFinite);
    return {
      check,
      searches: list,
      floor,
      found: Number.NEGATIVE_INFINITY,
      pose: new Float64Array(this.chain.n),
      bound: Number.POSITIVE_INFINITY,
      ceiling,
      level: finite ? -1 : TOP_LEVEL,
    };
  }

  /** Whether another round can still help some check. */
  open(gap: number): boolean {
    return this.entries.some((entry) => entry.level < TOP_LEVEL && gapOf(entry) > gap);
  }

  /** One level more for every check whose gap is open; `due` is asked between checks and ends the round early. */
  round(gap: number, due: () => boolean = () => false): void {
    const level =
      Math.min(...this.entries.filter((e) => e.level < TOP_LEVEL && gapOf(e) > gap).map((e) => e.level)) + 1;
    for (const entry of this.entries) {
      if (due()) return;
      if (entry.level < level && gapOf(entry) > gap) this.refine(entry, level, gap);
    }
  }

  private refine(entry: Entry, level: number, gap: number): void {
    const wanted = entry.found > 0 ? entry.found / (1 - 0.95 * gap) : 0;
    let bound = entry.floor;
    for (const search of entry.searches) {
      const enough = Math.max(entry.found * (1 + 1e-6), wanted * (1 - overshoot(level, search.stepCount)));
      let b = search.cap(level, enough);
      if (b > wanted) b = Math.min(b, search.bound(level, enough));
      if (!(b <= bound)) bound = b;
    }
    entry.bound = Math.min(entry.bound, bound + ROUNDING * entry.ceiling);
    for (const search of entry.searches) {
      const pose = new Float64Array(this.chain.n);
      search.follow(pose, Math.min(level, 2), entry.found);
      this.offer(entry, pose);
    }
    // A neighbour's pose is often better than one's own start (A and B of one pair, the joint beside).
    if (level <= 1) {
      for (const other of this.entries) {
        if (other !== entry && other.level >= 0 && Math.abs(other.check.joint - entry.check.joint) <= 1) {
          this.offer(entry, Float64Array.from(other.pose));
        }
      }
    }
    entry.level = level;
    if (entry.found > entry.bound) {
      // Only rounding can do this; anything more is a broken proof, which must never pass for a result.
      if (entry.found - entry.bound > NOTHING * entry.ceiling) {
        throw new Error(`bound below an attained value: ${entry.check.check} of joint ${entry.check.joint + 1}`);
      }
      entry.bound = entry.found;
    }
  }

  private offer(entry: Entry, pose: Float64Array): void {
    const value = this.climb(entry.check, pose);
    if (value > entry.found + BETTER * Math.abs(entry.found) || entry.found === Number.NEGATIVE_INFINITY) {
      entry.found = value;
      entry.pose.set(pose);
    }
  }
}

/** Most that a unit function of value 1 is overshot by the tables and arcs of a level on the way back to the base. */
function overshoot(level: number, steps: number): number {
  const cell = 2 / (COARSE_CELLS << level);
  return ((1.6 * cell * cell) / 8) * Math.max(1, steps);
}

/** Forms whose worst the sphere finds: no constant part. Torque ranges are dropped, which keeps bounds bounds. */
export function isHomogeneous(check: CheckForm): boolean {
  return check.forms.every((f) => f.o === 0 && f.c.every((v) => v === 0));
}

/** A form of one row is the larger of two linear forms; rows of zeros add nothing. */
function linearParts(f: Form): readonly Form[] {
  if (f.rows !== 1) return [f];
  const linear = (sign: number): Form => ({
    ...f,
    rows: 0,
    P: new Float64Array(0),
    c: new Float64Array(0),
    l: f.l.map((v, k) => v + sign * f.P[k]!),
  });
  return f.P.every((v) => v === 0) ? [linear(1)] : [linear(1), linear(-1)];
}
