/**
 * The certified worst of one check in a case with motion, by best-first branch and bound over joint angles, the direction that a form is
 * read along and the speeds: a bound that nothing the arm can do within travel and limits exceeds, and an attained value with its pose
 * and rates. Boxes are bounded by `motionBox.ts`, and cut where their bound owes most.
 */
import { seededRandom } from '../math/random.ts';
import type { Flat, Numbers } from '../math/vector.ts';
import type { BranchBoundState } from './branchBound.ts';
import { BoxQueue } from './branchBoundQueue.ts';
import type { Chain, ChainCase } from './chain.ts';
import { anyTorque, type CheckForm, type Form, form } from './form.ts';
import { freePart, newFreeWorst } from './freeLoads.ts';
import { MotionBox } from './motionBox.ts';
import { nothingBound } from './motionNothing.ts';
import { standsOff } from './motionTerms.ts';
import { Polish } from './polish.ts';
import { sameAllRound } from './roundForms.ts';

export interface MotionSearchOptions {
  /** Relative gap asked for: (bound - found)/bound. */
  readonly gap: number;
  /** Poses to start from, [n] rad each. */
  readonly seeds?: readonly Numbers[];
  /** Most boxes kept; beyond it the search stops with the bound it has. */
  readonly most?: number;
}

interface Piece {
  readonly form: Form;
  readonly box: MotionBox;
  /** Bounds of the torque and of minus the torque, for forms that hold in a range of it. */
  readonly torque: MotionBox | null;
}

const TORQUE = form({ P: [[0, 0, 0, 0, 0, 1]] });
/** What lies below this share of the ceiling counts as nothing. */
const NOTHING = 1e-9;
/** What a pose may give for that to be shown by poses. */
const SMALL = 1e-13;
const KEPT = 1 << 16;
const RANDOM_POSES = 24;
const CLIMBS = 2;
const OFF_AXIS = 0.5;
/** Joints up to which a check with ranges of the torque is climbed as it is. */
const CLIMBED_WHOLE = 5;
/** First arcs of e: round the circle, and from pole to pole. */
const AROUND = 16;
const UPRIGHT = 6;
const SHRINKS = 4;

export class MotionSearch {
  found = Number.NEGATIVE_INFINITY;
  readonly pose: Float64Array;
  readonly worst;
  /** Boxes bounded so far. */
  boxes = 0;
  readonly ceiling: number;
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly gap: number;
  private readonly pieces: readonly Piece[];
  private readonly climber: Polish;
  /** Climbs without the ranges of the torque, which is far quicker; null where the check has none. */
  private readonly scout: Polish | null;
  private whole = false;
  private readonly queue: BoxQueue;
  private readonly low: Flat;
  private readonly high: Flat;
  private readonly keptLow: Flat;
  private readonly keptHigh: Flat;
  private readonly trial: Flat;
  /** Bound of boxes closed because the gap asked for allows them. */
  private closed = Number.NEGATIVE_INFINITY;

  constructor(chain: Chain, load: ChainCase, check: CheckForm, options: MotionSearchOptions) {
    const { n } = chain;
    this.chain = chain;
    this.load = load;
    this.gap = options.gap;
    this.pose = new Float64Array(n);
    this.worst = newFreeWorst(n);
    this.climber = new Polish(chain, load, check);
    const ranged = check.forms.some(
      (f) => f.torqueFrom > Number.NEGATIVE_INFINITY || f.torqueTo < Number.POSITIVE_INFINITY,
    );
    this.scout = ranged && n > CLIMBED_WHOLE ? new Polish(chain, load, anyTorque(check)) : null;
    // read in the link's frame, what stands off the axis stands still; what is balanced about it is better left to turn
    const offAxis = standsOff(chain, load, check.joint) > OFF_AXIS;
    const box = (f: Form) => new MotionBox(chain, load, check.joint, f, offAxis && sameAllRound(f));
    this.pieces = check.forms.map((f) => ({
      form: f,
      box: box(f),
      torque: f.torqueFrom > Number.NEGATIVE_INFINITY || f.torqueTo < Number.POSITIVE_INFINITY ? box(TORQUE) : null,
    }));
    this.ceiling = Math.max(...this.pieces.map((piece) => piece.box.ceiling()));
    const { size } = this.pieces[0]!.box;
    this.queue = new BoxQueue(size, options.most ?? KEPT);
    this.low = new Float64Array(size);
    this.high = new Float64Array(size);
    this.keptLow = new Float64Array(size);
    this.keptHigh = new Float64Array(size);
    this.trial = new Float64Array(n);
    for (const seed of (options.seeds ?? []).slice(0, this.scout ? 1 : undefined)) this.offer(seed);
    this.firstPoses();
    const nothing =
      this.found <= NOTHING * this.ceiling ? nothingBound(chain, load, check, SMALL * this.ceiling) : Number.NaN;
    if (nothing <= NOTHING * this.ceiling) this.closed = nothing;
    else this.firstBoxes();
  }

  get bound(): number {
    const bound = Math.max(this.found, this.closed, this.queue.top);
    return Number.isNaN(this.found) ? Number.POSITIVE_INFINITY : bound;
  }

  get done(): boolean {
    return this.queue.full || !(this.queue.top > this.enough());
  }

  state(): BranchBoundState {
    return {
      found: this.found,
      bound: this.bound,
      pose: Float64Array.from(this.pose),
      free: freePart(this.load, this.worst),
      wrench: Float64Array.from(this.worst.wrench),
      done: this.done,
    };
  }

  /** Works on until `boxes` more boxes are bounded or the gap is closed. */
  step(boxes: number): void {
    this.climbWhole();
    const until = this.boxes + boxes;
    while (this.boxes < until && !this.done) this.cut();
  }

  /** Once, from the best pose that a climb without the ranges of the torque came to. */
  private climbWhole(): void {
    if (!this.scout || this.whole) return;
    this.whole = true;
    this.trial.set(this.pose);
    this.take(this.climber.climb(this.trial));
  }

  /** Values up to this are close enough to `found`. */
  private enough(): number {
    const { found } = this;
    return Math.max(found > 0 ? found / (1 - 0.999 * this.gap) : found, Math.max(found, 0) + NOTHING * this.ceiling);
  }

  private offer(start: Numbers): void {
    for (let k = 0; k < this.chain.n; k++) this.trial[k] = start[k]!;
    let value = Number.NaN;
    if (this.scout) {
      this.scout.climb(this.trial);
      value = this.climber.value(this.trial);
    } else value = this.climber.climb(this.trial);
    this.take(value);
  }

  /** Keeps the pose in `trial` with its motion where its value is the highest yet. */
  private take(value: number): void {
    // what is not a number stays: it has no bound
    if (value <= this.found) return;
    this.found = value;
    this.pose.set(this.trial);
    const { worst } = this.climber;
    this.worst.value = value;
    this.worst.tipForce.set(worst.tipForce);
    this.worst.speed.set(worst.speed);
    this.worst.accel.set(worst.accel);
    this.worst.wrench.set(worst.wrench);
  }

  private firstPoses(): void {
    const random = seededRandom(1);
    const { from, to } = this.chain;
    const poses = Array.from({ length: RANDOM_POSES }, () => {
      const pose = Float64Array.from(from, (low, k) => random.between(low, to[k]!));
      return { pose, value: (this.scout ?? this.climber).value(pose) };
    });
    poses.sort((a, b) => b.value - a.value);
    for (const { pose } of poses.slice(0, CLIMBS)) this.offer(pose);
  }

  private firstBoxes(): void {
    const { pieces } = this;
    pieces.forEach((piece, index) => {
      const { rows, P, c } = piece.form;
      if (rows === 1) {
        this.firstBox(index, 0, 0, 0, 0);
        if (P.some((v) => v !== 0) || c[0] !== 0) this.firstBox(index, Math.PI, Math.PI, 0, 0);
        return;
      }
      for (let k = 0; k < AROUND; k++) {
        const from = (2 * Math.PI * k) / AROUND - Math.PI;
        const to = (2 * Math.PI * (k + 1)) / AROUND - Math.PI;
        if (rows === 2) this.firstBox(index, from, to, 0, 0);
        else {
          for (let p = 0; p < UPRIGHT; p++) {
            this.firstBox(index, from, to, (p / UPRIGHT - 0.5) * Math.PI, ((p + 1) / UPRIGHT - 0.5) * Math.PI);
          }
        }
      }
    });
  }

  private firstBox(index: number, a: number, b: number, c: number, d: number): void {
    const { chain, load, low, high } = this;
    const { n } = chain;
    const { speeds } = this.pieces[index]!.box;
    low.set(chain.from);
    high.set(chain.to);
    low[n] = a;
    high[n] = b;
    low[n + 1] = c;
    high[n + 1] = d;
    for (let k = 0; k < n; k++) {
      const fast = load.speed && load.speed[k]! > 0;
      low[speeds + k] = fast ? -1 : 0;
      high[speeds + k] = fast ? 1 : 0;
    }
    this.assess(index, Number.POSITIVE_INFINITY);
  }

  /** Cuts the box of the largest bound in two. */
  private cut(): void {
    const { queue, low, high, keptLow, keptHigh } = this;
    const ceiling = queue.top;
    const index = queue.pop(low, high);
    const k = queue.cutAt;
    const middle = (low[k]! + high[k]!) / 2;
    keptLow.set(low);
    keptHigh.set(high);
    high[k] = middle;
    this.assess(index, ceiling);
    low.set(keptLow);
    high.set(keptHigh);
    low[k] = middle;
    this.assess(index, ceiling);
  }

  /**
   * Bounds the box in `low`, `high`, a part of one of bound `ceiling`, shrinks it while that helps, and keeps it where it may hold the
   * worst.
   */
  private assess(index: number, ceiling: number): void {
    const { low, high, queue, chain } = this;
    const piece = this.pieces[index]!;
    const { box } = piece;
    let bound = ceiling;
    for (let turn = 0; turn < SHRINKS; turn++) {
      this.boxes++;
      bound = Math.min(bound, box.bound(low, high, this.enough()));
      if (bound <= this.found) return;
      if (piece.torque && !this.torqueCanBe(piece)) return;
      if (box.value > this.found) this.tryMiddle();
      if (bound <= this.enough()) {
        if (bound > this.closed) this.closed = bound;
        return;
      }
      const before = widthOf(low, high, chain.n);
      if (!box.shrink(low, high)) {
        // nothing in it comes up to what is close enough
        this.closed = Math.max(this.closed, Math.min(bound, this.enough()));
        return;
      }
      if (widthOf(low, high, chain.n) > 0.8 * before) break;
    }
    const at = this.cutPlace(box);
    if (at < 0) {
      this.closed = Math.max(this.closed, bound);
      return;
    }
    queue.push(bound, low, high, at, index);
  }

  /** The interval to cut; -1 where no cut can help. */
  private cutPlace(box: MotionBox): number {
    const { low, high } = this;
    let at = -1;
    let most = 0;
    for (let k = 0; k < box.size; k++) {
      if (!(high[k]! - low[k]! > 1e-9 && box.cost[k]! > most)) continue;
      most = box.cost[k]!;
      at = k;
    }
    return at;
  }

  private tryMiddle(): void {
    const { trial, low, high, chain } = this;
    for (let k = 0; k < chain.n; k++) trial[k] = (low[k]! + high[k]!) / 2;
    if (this.climber.value(trial) > this.found) this.offer(Float64Array.from(trial));
  }

  /** Whether the form's torque range meets what the torque can be over the box. */
  private torqueCanBe(piece: Piece): boolean {
    const { low, high } = this;
    const { n } = this.chain;
    const { form: f, torque } = piece;
    const [a, b, c, d] = [low[n]!, high[n]!, low[n + 1]!, high[n + 1]!];
    low[n + 1] = 0;
    high[n + 1] = 0;
    let can = true;
    for (const [angle, limit] of [
      [0, f.torqueFrom],
      [Math.PI, -f.torqueTo],
    ] as const) {
      if (!Number.isFinite(limit)) continue;
      low[n] = angle;
      high[n] = angle;
      if (torque!.bound(low, high) < limit) can = false;
    }
    low[n] = a;
    high[n] = b;
    low[n + 1] = c;
    high[n + 1] = d;
    return can;
  }
}

/** Product of the widths of the angles that are not points. */
function widthOf(low: Flat, high: Flat, n: number): number {
  let product = 1;
  for (let k = 0; k < n + 2; k++) if (high[k]! > low[k]!) product *= high[k]! - low[k]!;
  return product;
}
