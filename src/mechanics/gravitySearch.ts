/**
 * The certified worst of many checks in one gravity case: for each an attained value with its pose, and a bound that nothing in the travel
 * exceeds. Rounds of rising refinement touch only checks whose gap is still open, so a first answer is there at once.
 */

import { seededRandom } from '../math/random.ts';
import type { Chain, ChainCase } from './chain.ts';
import { FanCheck, type SphereCheck } from './fanCheck.ts';
import type { CheckForm, Form } from './form.ts';
import { GravityCheck } from './gravityCheck.ts';
import type { GravityLoad } from './gravityLoad.ts';
import { COARSE_CELLS, OutwardSets } from './outwardSets.ts';
import { sameCheck, sameJointLoad } from './sameLoad.ts';

/** The true kernel, as the search needs it. Poses [n] rad. */
export interface Climber {
  value(check: CheckForm, pose: Float64Array): number;
  /** Value of every entry's check at one pose, by its place in the list. */
  valuesAt(
    entries: readonly { readonly check: CheckForm }[],
    pose: Float64Array,
    take: (at: number, value: number) => void,
  ): void;
  /** Improves `pose` in place within the travel and returns the check's value there. */
  climb(check: CheckForm, pose: Float64Array): number;
}

/** 4096 cells an edge: for the few paths along a crease, where a level only halves the gap. */
const LAST_LEVEL = 9;
/** Level of the tables that a pose is first read from. */
const COARSE_PATH = 2;
const SAMPLES = 300;
const SAMPLE_SEED = 20261;

export interface CheckState {
  /** The same check of a later layout takes its place where the state is kept. */
  check: CheckForm;
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
export const ROUNDING = 1e-12;
/** A better pose must be better by this share; else the one met first stays. Ties are thus broken by the order of the search. */
const BETTER = 1e-12;
/** Below this share of its ceiling a check counts as nothing: its gap is closed. */
export const NOTHING = 1e-9;

/** (bound - found)/bound; 0 where the check is nothing but rounding, 1 where either is not known. */
export function gapOf(state: { found: number; bound: number; ceiling: number }): number {
  if (!Number.isFinite(state.bound) || !Number.isFinite(state.found)) return 1;
  if (state.bound - Math.max(state.found, 0) <= NOTHING * state.ceiling) return 0;
  return (state.bound - state.found) / state.bound;
}

/** A value attained above its bound raises the bound, where rounding did it; anything more is a broken proof, which must never pass. */
export function raiseByRounding(state: CheckState): void {
  if (!(state.found > state.bound)) return;
  if (state.found - state.bound > NOTHING * state.ceiling) {
    throw new Error(`bound below an attained value: ${state.check.check} of joint ${state.check.joint + 1}`);
  }
  state.bound = state.found;
}

interface Entry extends CheckState {
  /** One for each form that differs, with the best bound so far. */
  readonly searches: readonly { readonly search: SphereCheck; bound: number }[];
  /** Value of forms that are constant. */
  readonly floor: number;
}

export class GravitySearch {
  readonly sets: OutwardSets;
  readonly entries: readonly Entry[];
  readonly chain: Chain;
  readonly load: ChainCase;
  private readonly gravity: GravityLoad;
  private readonly climber: Climber;

  /**
   * `checks` must satisfy `isHomogeneous`. `previous`: the search of an earlier layout, not used any more. Its outward sets serve again, and
   * checks for which nothing has changed (`sameLoad.ts`) go on from where they stand.
   */
  constructor(
    chain: Chain,
    load: ChainCase,
    gravity: GravityLoad,
    checks: readonly CheckForm[],
    climber: Climber,
    previous: GravitySearch | null = null,
  ) {
    this.chain = chain;
    this.load = load;
    this.gravity = gravity;
    this.climber = climber;
    this.sets = new OutwardSets(chain, gravity, previous?.sets ?? null);
    const kept = new Map<string, SphereCheck>();
    this.entries = checks.map((check) => previous?.handOver(check, chain, load) ?? this.entry(check, kept));
  }

  /** The entry of a check of a later layout for which all is as it was; null where something changed. */
  private handOver(check: CheckForm, chain: Chain, load: ChainCase): Entry | null {
    const known = this.entries.find((entry) => sameCheck(entry.check, check));
    if (!known || !sameJointLoad(this, { chain, load }, check.joint)) return null;
    known.check = check;
    return known;
  }

  /** A first look at the kernel: the best of a fixed set of random poses, every third angle at an end of its travel, starts each check. */
  private sample(entries: readonly Entry[]): void {
    const { n, from, to } = this.chain;
    const random = seededRandom(SAMPLE_SEED);
    const pose = new Float64Array(n);
    const best = new Float64Array(entries.length).fill(Number.NEGATIVE_INFINITY);
    for (let k = 0; k < SAMPLES; k++) {
      for (let i = 0; i < n; i++) {
        const pick = random.next();
        pose[i] = pick < 1 / 6 ? from[i]! : pick < 1 / 3 ? to[i]! : random.between(from[i]!, to[i]!);
      }
      this.climber.valuesAt(entries, pose, (at, value) => {
        if (!(value > best[at]!)) return;
        best[at] = value;
        entries[at]!.pose.set(pose);
      });
    }
    for (const entry of entries) this.offer(entry, Float64Array.from(entry.pose));
  }

  private entry(check: CheckForm, kept: Map<string, SphereCheck>): Entry {
    const searches = new Map<string, SphereCheck>();
    let floor = Number.NEGATIVE_INFINITY;
    for (const f of check.forms.flatMap(linearParts)) {
      if (f.rows === 0 && f.l.every((v) => v === 0)) {
        floor = Math.max(floor, 0);
        continue;
      }
      // Checks of one joint share forms (thrust by size and each way): one search serves them all.
      const key = `${check.joint} ${f.P.join()} ${f.l.join()}`;
      const Kind = f.rows === 3 ? FanCheck : GravityCheck;
      const search = kept.get(key) ?? new Kind(this.sets, check.joint, f, this.gravity.g, this.gravity.down);
      kept.set(key, search);
      searches.set(key, search);
    }
    const list = [...searches.values()];
    const ceiling = Math.max(0, ...list.map((s) => s.ceiling));
    const finite = Number.isFinite(ceiling) && this.load.mass.every(Number.isFinite);
    return {
      check,
      searches: list.map((search) => ({ search, bound: Number.POSITIVE_INFINITY })),
      floor,
      found: Number.NEGATIVE_INFINITY,
      pose: new Float64Array(this.chain.n),
      bound: Number.POSITIVE_INFINITY,
      ceiling,
      level: finite ? -1 : LAST_LEVEL,
    };
  }

  /** Whether another round can still help some check. */
  open(gap: number): boolean {
    return this.entries.some((entry) => entry.level < LAST_LEVEL && gapOf(entry) > gap);
  }

  /** One level more for every check whose gap is open; `due` is asked between checks and ends the round early. */
  round(gap: number, due: () => boolean = () => false): void {
    const fresh = this.entries.filter((entry) => entry.found === Number.NEGATIVE_INFINITY);
    if (fresh.length > 0) this.sample(fresh);
    const open = this.entries.filter((entry) => entry.level < LAST_LEVEL && gapOf(entry) > gap);
    const level = Math.min(...open.map((entry) => entry.level)) + 1;
    for (const entry of this.entries) {
      if (due()) return;
      if (entry.level < level && gapOf(entry) > gap) this.refine(entry, level, gap);
    }
  }

  private refine(entry: Entry, level: number, gap: number): void {
    const wanted = entry.found > 0 ? entry.found / (1 - 0.95 * gap) : 0;
    let bound = entry.floor;
    for (const one of entry.searches) {
      // A form that stays below what is attained, or allowed by the gap, needs no finer look.
      if (one.bound > wanted) {
        const { search } = one;
        const enough = Math.max(entry.found * (1 + 1e-6), wanted * (1 - overshoot(level, search.stepCount)));
        const b = search.best(level, wanted, enough);
        if (!(b >= one.bound)) one.bound = b;
        // The path through coarse tables is found at once; where that leaves a gap, the one through the tables of this level may lead higher.
        for (const by of level > COARSE_PATH ? [COARSE_PATH, level] : [level]) {
          const pose = new Float64Array(this.chain.n);
          search.follow(pose, by, entry.found);
          this.offer(entry, pose);
        }
      }
      if (!(one.bound <= bound)) bound = one.bound;
    }
    entry.bound = Math.min(entry.bound, bound + ROUNDING * entry.ceiling);
    if (level <= 1) this.offerNeighbour(entry);
    entry.level = level;
    raiseByRounding(entry);
  }

  /** A neighbour's pose is often a better start than one's own (A and B of one pair, the joint beside). */
  private offerNeighbour(entry: Entry): void {
    let best: Entry | null = null;
    let most = entry.found;
    for (const other of this.entries) {
      if (other === entry || other.level < 0 || Math.abs(other.check.joint - entry.check.joint) > 1) continue;
      const value = this.climber.value(entry.check, other.pose);
      if (value > most) {
        most = value;
        best = other;
      }
    }
    if (best) this.offer(entry, Float64Array.from(best.pose));
  }

  private offer(entry: Entry, pose: Float64Array): void {
    const value = this.climber.climb(entry.check, pose);
    if (value > entry.found + BETTER * Math.abs(entry.found) || entry.found === Number.NEGATIVE_INFINITY) {
      entry.found = value;
      entry.pose.set(pose);
    }
  }
}

/** Most that a unit function of value 1 is overshot by the tables and arcs of a level on the way back to the base. */
export function overshoot(level: number, steps: number): number {
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
