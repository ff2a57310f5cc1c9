/**
 * The certified worst of many checks in one load case, whatever the load. Weights: spheres to any gap. Forces at rest: first the sum of
 * separate bounds (`travelBounds.ts`, and `freeForceSearch.ts` where the force points anywhere), then branch and bound over boxes of angles. Motion:
 * the same with boxes of angles and speeds (`motionSearch.ts`); with many joints a gap is left, and said. Anytime: `step` does a slice of work, `rows` tells where things stand.
 */
import { seededRandom } from '../math/random.ts';
import { BranchBound } from './branchBound.ts';
import { InboardDirections } from './branchBoundInboard.ts';
import type { Chain, ChainCase } from './chain.ts';
import type { CheckForm } from './form.ts';
import { formCeiling } from './formCeiling.ts';
import { FreeForceSearch, tipMass } from './freeForceSearch.ts';
import { type FreePart, freePart, worstAtPose } from './freeLoads.ts';
import { GravityClimb } from './gravityClimb.ts';
import { gravityLoad } from './gravityLoad.ts';
import { type CheckState, GravitySearch, gapOf, isHomogeneous, ROUNDING, raiseByRounding } from './gravitySearch.ts';
import { factorBetween, UNLIKE } from './likeChecks.ts';
import { MotionSearch } from './motionSearch.ts';
import { OutwardSets } from './outwardSets.ts';
import { polish } from './polish.ts';
import { sameCheck, sameJointLoad } from './sameLoad.ts';
import { sphereBounds } from './travelBounds.ts';

export interface WorstRow {
  readonly check: CheckForm;
  readonly found: number;
  readonly pose: Float64Array;
  readonly free: FreePart | null;
  /** Joint load at `pose`, canonical housing frame. [6] */
  readonly wrench: Float64Array;
  readonly bound: number;
  readonly gap: number;
}

/** Time that one go at a check should take, ms, and the boxes of its first go: how many a box costs depends on the load. */
const SLICE_MS = 40;
const FIRST_BOXES = 16;
/** Boxes after which splitting takes turns with them. */
const PATIENCE = 50_000;
/** Goes that every check has before any has more. */
const FIRST_GOES = 3;
/** Poses of a first look at a check, and rounds of its first bound. */
const FIRST_POSES = 12;
/** Fewer in motion, where a pose takes far longer. */
const FIRST_MOVING = 2;
const FIRST_ROUNDS = 2;

/** Allowable values of checks, in the check's unit. */
export type Limits = ReadonlyMap<CheckForm, number>;

/** What is under way for one check. */
interface Task {
  readonly state: CheckState;
  readonly spheres: FreeForceSearch | null;
  /** Task of a check that this one is a factor times: it waits for that. */
  leader: { readonly task: Task; readonly factor: number } | null;
  branch: BranchBound | MotionSearch | null;
  /** Times it has been worked on. */
  goes: number;
  /** Boxes of the next go. */
  boxes: number;
  /** Nothing more can be done for a gap down to `spentAt`. */
  spent: boolean;
  spentAt: number;
  /** Value attained that was climbed from to the last digit; NaN: none. */
  polished: number;
}

export class WorstCase {
  readonly chain: Chain;
  readonly load: ChainCase;
  private readonly gravity: GravitySearch | null;
  private readonly tasks: readonly Task[];
  private readonly states: readonly CheckState[];
  private readonly inboard = new Map<number, InboardDirections>();
  private readonly limits: Limits;
  /** First bounds of what began without one. */
  private travel: ReadonlyMap<CheckState, number> | null = null;

  /**
   * `previous`: the search of an earlier layout of the same arm, not used any more: its outward sets serve again where nothing outboard changed,
   * and checks for which all is as it was (`sameLoad.ts`) go on from where they stand. `limits`: what checks are held against, so that work
   * goes first where a verdict is not clear yet.
   */
  constructor(
    chain: Chain,
    load: ChainCase,
    checks: readonly CheckForm[],
    previous: WorstCase | null = null,
    limits: Limits = new Map(),
  ) {
    this.chain = chain;
    this.load = load;
    this.limits = limits;
    const weight = gravityLoad(chain, load);
    const onSphere = weight ? checks.filter(isHomogeneous) : [];
    this.gravity = weight
      ? new GravitySearch(chain, load, weight, onSphere, new GravityClimb(chain, load), previous?.gravity ?? null)
      : null;
    const entries = new Map(onSphere.map((check, k) => [check, this.gravity!.entries[k]!]));
    const sets = !weight && load.force === 'any' && load.speed === null ? freeSets(chain, load) : null;
    this.tasks = checks.map((check) => {
      const known = previous?.handOver(check, chain, load);
      if (known) return known;
      const state = entries.get(check) ?? blank(chain, check);
      return {
        state,
        spheres: sets ? new FreeForceSearch(chain, load, state, sets.weights, sets.tip) : null,
        leader: null,
        branch: null,
        goes: 0,
        boxes: FIRST_BOXES,
        spent: false,
        spentAt: 0,
        polished: Number.NaN,
      };
    });
    this.states = this.tasks.map((task) => task.state);
    this.tasks.forEach((task, k) => {
      if (entries.has(task.state.check) || task.goes > 0) return;
      task.leader = this.leaderOf(task, this.tasks.slice(0, k));
    });
  }

  private leaderOf({ state }: Task, earlier: readonly Task[]): Task['leader'] {
    for (const task of earlier) {
      const factor = task.leader ? null : factorBetween(state.check, task.state.check);
      if (factor !== null) return { task, factor };
    }
    return null;
  }

  /** What is known of a check's leader, taken over. */
  private follow({ state, leader }: Task): void {
    if (!leader) return;
    const { task, factor } = leader;
    state.ceiling = Math.max(state.ceiling, factor * task.state.ceiling);
    if (task.state.found !== Number.NEGATIVE_INFINITY) this.offer(state, task.state.pose);
    const bound = factor * task.state.bound + UNLIKE * state.ceiling;
    if (bound < state.bound) state.bound = bound;
    raiseByRounding(state);
  }

  /** What is under way for a check of a later layout for which all is as it was; null where something changed. */
  private handOver(check: CheckForm, chain: Chain, load: ChainCase): Task | null {
    const known = this.tasks.find((task) => sameCheck(task.state.check, check));
    if (!known || !sameJointLoad(this, { chain, load }, check.joint)) return null;
    this.follow(known);
    known.leader = null;
    known.state.check = check;
    return known;
  }

  private isIdle(task: Task, gap: number): boolean {
    return (task.spent && gap >= task.spentAt) || gapOf(task.state) <= gap;
  }

  /** Whether every check has been looked at, so that it has a value and a bound. */
  get begun(): boolean {
    return this.tasks.every((task) => !this.isNew(task));
  }

  private isNew({ state, goes }: Task): boolean {
    return goes === 0 && state.found === Number.NEGATIVE_INFINITY;
  }

  /** Whether more work can bring a check to the gap. */
  open(gap: number): boolean {
    return this.gravity?.open(gap) || this.tasks.some((task) => !this.isIdle(task, gap));
  }

  /** A slice of work: one round on the spheres, or one go at the next open check. `due` ends a round early. */
  step(gap: number, due: () => boolean = () => false): void {
    const firstRound = this.gravity?.entries.some((entry) => entry.found === Number.NEGATIVE_INFINITY);
    const fresh = firstRound ? undefined : this.tasks.find((task) => this.isNew(task));
    if (this.gravity?.open(gap) && !fresh) {
      this.gravity.round(gap, due);
      return;
    }
    let pick: Task | null = fresh ?? null;
    for (const task of this.tasks) {
      if (fresh || this.isIdle(task, gap) || (task.leader && !this.isIdle(task.leader.task, gap))) continue;
      if (!pick || this.urgency(task) < this.urgency(pick)) pick = task;
    }
    if (pick) {
      pick.goes++;
      this.advance(pick, gap);
    }
  }

  /**
   * What comes first, lowest: the first goes at each check, most of which close there; then those whose verdict is open, then loads, last those
   * whose verdict is clear; in turn within each.
   */
  private urgency(task: Task): number {
    const { state } = task;
    const limit = this.limits.get(state.check);
    const rank =
      task.goes < FIRST_GOES || !Number.isFinite(state.bound)
        ? 0
        : limit === undefined
          ? 2
          : state.found <= limit && state.bound > limit
            ? 1
            : 3;
    return rank * 1e9 + task.goes;
  }

  rows(): readonly WorstRow[] {
    for (const task of this.tasks) this.follow(task);
    return this.tasks.map((task) => this.row(task));
  }

  private advance(task: Task, gap: number): void {
    const { state } = task;
    if (task.leader) {
      this.follow(task);
      // What is left then it does for itself.
      if (this.isIdle(task.leader.task, gap)) task.leader = null;
      return;
    }
    if (task.goes === 1 && !this.gravity) {
      this.begin(task, gap);
      return;
    }
    if (!task.branch || gap < task.spentAt) {
      task.spentAt = gap;
      task.branch = this.branchFor(state, gap);
      state.ceiling = Math.max(state.ceiling, task.branch.ceiling);
      this.take(task);
      if (gapOf(state) <= gap) return;
      if (task.spheres?.open(gap)) task.spheres.round(gap);
      return;
    }
    if (task.spheres?.open(gap)) {
      task.spheres.round(gap);
      return;
    }
    if (task.goes % 2 === 0 && task.spheres?.canSplit(gap) && task.branch.boxes > PATIENCE) {
      task.spheres.split(gap);
      return;
    }
    const begin = performance.now();
    task.branch.step(task.boxes);
    const took = performance.now() - begin;
    task.boxes = Math.max(1, Math.min(4 * task.boxes, Math.round((task.boxes * SLICE_MS) / Math.max(took, 0.01))));
    this.take(task);
  }

  /** First bound, and the best of a few poses. */
  private begin({ state, spheres }: Task, gap: number): void {
    const { chain, load } = this;
    if (spheres?.open(gap)) spheres.round(gap);
    else {
      this.travel ??= this.firstBounds();
      // by lengths and masses: the bound itself may be 0 where what is attained is rounding
      for (const f of state.check.forms)
        state.ceiling = Math.max(state.ceiling, formCeiling(chain, load, state.check.joint, f));
      const travel = this.travel.get(state) ?? Number.POSITIVE_INFINITY;
      state.bound = Math.min(state.bound, travel + ROUNDING * state.ceiling);
    }
    const random = seededRandom(state.check.joint + 1);
    const { from, to } = chain;
    const few = load.speed !== null;
    for (let k = 0; k < (few ? FIRST_MOVING : FIRST_POSES); k++) {
      this.offer(
        state,
        Float64Array.from(from, (low, i) => (k === 0 ? 0.5 * (low + to[i]!) : random.between(low, to[i]!))),
      );
    }
    for (const pose of this.seeds(state).slice(0, few ? 1 : undefined)) this.offer(state, pose);
  }

  /** Bounds of every state that has none yet: those of one joint share their tables. */
  private firstBounds(): ReadonlyMap<CheckState, number> {
    const open = this.tasks
      .filter(({ spheres }) => !spheres)
      .map(({ state }) => state)
      .filter((state) => !Number.isFinite(state.bound));
    const checks = open.map((state) => state.check);
    const bounds = sphereBounds(this.chain, this.load, checks, FIRST_ROUNDS);
    return new Map(open.map((state, k) => [state, bounds[k]!]));
  }

  private offer(state: CheckState, pose: Float64Array): void {
    const { value } = worstAtPose(this.chain, this.load, pose, state.check);
    if (!(value > state.found)) return;
    state.found = value;
    state.pose.set(pose);
    raiseByRounding(state);
  }

  private branchFor(state: CheckState, gap: number): BranchBound | MotionSearch {
    const { chain, load } = this;
    const seeds = this.seeds(state);
    if (load.speed !== null) return new MotionSearch(chain, load, state.check, { gap, seeds });
    const inboard = (joint: number, inLink: boolean) => this.directions(joint, inLink);
    return new BranchBound(chain, load, state.check, { gap, seeds, inboard });
  }

  private take(task: Task): void {
    const { branch, state } = task;
    if (branch!.found > state.found || state.found === Number.NEGATIVE_INFINITY) {
      state.found = branch!.found;
      state.pose.set(branch!.pose);
    }
    state.bound = Math.min(state.bound, branch!.bound + ROUNDING * state.ceiling);
    raiseByRounding(state);
    task.spent = branch!.done;
  }

  /** Poses to climb from: what is known of this check and of the checks beside it. */
  private seeds(state: CheckState): readonly Float64Array[] {
    const near = [state, ...this.states.filter((other) => other !== state)].filter(
      (other) => Math.abs(other.check.joint - state.check.joint) <= 1 && Number.isFinite(other.found),
    );
    return near.slice(0, 4).map((other) => other.pose);
  }

  private directions(joint: number, inLink: boolean): InboardDirections {
    const key = 2 * joint + (inLink ? 1 : 0);
    const known = this.inboard.get(key) ?? new InboardDirections(this.chain, joint, inLink);
    this.inboard.set(key, known);
    return known;
  }

  private row(task: Task): WorstRow {
    const { state, branch } = task;
    if (branch && branch.found === state.found) {
      const { free, wrench } = branch.state();
      return { ...result(state), free, wrench };
    }
    if (this.gravity && state.found !== Number.NEGATIVE_INFINITY && state.found !== task.polished) {
      const fine = polish(this.chain, this.load, state.check, state.pose);
      if (fine.value >= state.found) {
        state.found = fine.value;
        state.pose.set(fine.pose);
      }
      task.polished = state.found;
      raiseByRounding(state);
    }
    const { wrench, ...worst } = worstAtPose(this.chain, this.load, state.pose, state.check);
    return { ...result(state), free: freePart(this.load, { ...worst, wrench }), wrench: Float64Array.from(wrench) };
  }
}

function result(state: CheckState) {
  return {
    check: state.check,
    found: state.found,
    pose: Float64Array.from(state.pose),
    bound: state.bound,
    gap: gapOf(state),
  };
}

function blank(chain: Chain, check: CheckForm): CheckState {
  return {
    check,
    found: Number.NEGATIVE_INFINITY,
    pose: new Float64Array(chain.n),
    bound: Number.POSITIVE_INFINITY,
    ceiling: 0,
    level: 0,
  };
}

function freeSets(chain: Chain, load: ChainCase): { weights: OutwardSets; tip: OutwardSets } {
  return { weights: new OutwardSets(chain, load), tip: new OutwardSets(chain, tipMass(chain, load)) };
}
