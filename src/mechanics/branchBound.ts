/**
 * The certified worst of one check in one case by best-first branch and bound over boxes of joint angles, for every kind of load that
 * leaves nothing moving: a bound that nothing within the travel exceeds, and an attained value with its pose. Boxes are bounded by
 * `branchBoundBox.ts`; those that cannot hold the worst (the check rises right through them) are dropped or shrunk by `branchBoundShrink.ts`.
 */

import { seededRandom } from '../math/random.ts';
import type { Flat, Numbers } from '../math/vector.ts';
import { BoxBound } from './branchBoundBox.ts';
import { formsAt } from './branchBoundForms.ts';
import { InboardDirections } from './branchBoundInboard.ts';
import { BoxQueue } from './branchBoundQueue.ts';
import { shrinkBox } from './branchBoundShrink.ts';
import type { Chain, ChainCase } from './chain.ts';
import { type CheckForm, type Form, form } from './form.ts';
import { type FreePart, freePart, newFreeWorst } from './freeLoads.ts';
import { nothingBound } from './motionNothing.ts';
import { COARSE_CELLS, TOP_LEVEL } from './outwardSets.ts';
import { Polish } from './polish.ts';
import { allRound, FAR, sameAllRound } from './roundForms.ts';

export interface BranchBoundOptions {
  /** Relative gap asked for: (bound - found)/bound. */
  readonly gap: number;
  /** Poses to start from, [n] rad each. */
  readonly seeds?: readonly Numbers[];
  /** Directions of gravity at a joint (in its link's frame or its housing's), to share between checks. */
  readonly inboard?: (joint: number, inLink: boolean) => InboardDirections;
  /** Most boxes kept; beyond it the search stops with the bound it has. */
  readonly most?: number;
}

export interface BranchBoundState {
  readonly found: number;
  readonly bound: number;
  readonly pose: Float64Array;
  readonly free: FreePart | null;
  /** Joint load at `pose`, canonical housing frame. [6] */
  readonly wrench: Float64Array;
  readonly done: boolean;
}

interface Piece {
  readonly form: Form;
  readonly box: BoxBound;
  /** Bounds of the torque and of minus the torque, for forms that hold in a range of it. */
  readonly torque: BoxBound | null;
}

const TORQUE = form({ P: [[0, 0, 0, 0, 0, 1]] });
/** What lies below this share of the ceiling counts as nothing. */
const NOTHING = 1e-9;
/** A check that stays below this share of the ceiling at evenly spread poses is looked at as nothing. */
const SMALL = 1e-13;
const FEW = 1 << 21;
/** Share of the gap that forms all round may lie above what is attained. */
const NEAR = 0.6;
const RANDOM_POSES = 64;
const CLIMBS = 3;

export class BranchBound {
  found = Number.NEGATIVE_INFINITY;
  readonly pose: Float64Array;
  readonly worst;
  /** Boxes bounded so far. */
  boxes = 0;
  readonly ceiling: number;
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly gap: number;
  private readonly joint: number;
  private readonly inLink: boolean;
  private readonly finest: number;
  private readonly inboard: InboardDirections | null;
  private readonly pieces: readonly Piece[];
  private readonly climber: Polish;
  private readonly queue: BoxQueue;
  private readonly low: Flat;
  private readonly high: Flat;
  private readonly keptLow: Flat;
  private readonly keptHigh: Flat;
  private readonly trial: Flat;
  /** Bound of boxes closed because the gap asked for allows them. */
  private closed = Number.NEGATIVE_INFINITY;

  constructor(chain: Chain, load: ChainCase, check: CheckForm, options: BranchBoundOptions) {
    const { n } = chain;
    this.chain = chain;
    this.load = load;
    this.gap = options.gap;
    this.joint = check.joint;
    this.pose = new Float64Array(n);
    this.worst = newFreeWorst(n);
    this.climber = new Polish(chain, load, check);
    this.trial = new Float64Array(n);
    for (const seed of options.seeds ?? []) this.offer(seed);
    this.firstPoses();
    const forms = this.formsFor(check);
    // A form that is the same all round the axis may be read in the link's frame, where joint i turns gravity alone
    this.inLink = load.force !== 'base' && forms.every(sameAllRound);
    const makeDirections = (joint: number, inLink: boolean) => new InboardDirections(chain, joint, inLink);
    this.inboard = load.force === 'base' ? null : (options.inboard ?? makeDirections)(check.joint, this.inLink);
    this.pieces = forms.map((f) => ({
      form: f,
      box: new BoxBound(chain, load, check.joint, f, this.inboard),
      torque:
        f.torqueFrom > Number.NEGATIVE_INFINITY || f.torqueTo < Number.POSITIVE_INFINITY
          ? new BoxBound(chain, load, check.joint, TORQUE, this.inboard)
          : null,
    }));
    // Cells so fine that what all inboard steps overshoot is a tenth of the gap asked for.
    const cell = Math.sqrt((0.8 * options.gap) / Math.max(1, this.inboard?.count ?? 1));
    const fine = Math.max(0, Math.min(TOP_LEVEL, Math.ceil(Math.log2(2 / (COARSE_CELLS * cell)))));
    // one joint's arc is in closed form
    this.finest = (this.inboard?.count ?? 0) < 2 ? 0 : fine;
    this.ceiling = Math.max(...this.pieces.map((piece) => piece.box.ceiling()));
    this.queue = new BoxQueue(n + 2, options.most ?? FEW);
    this.low = new Float64Array(n + 2);
    this.high = new Float64Array(n + 2);
    this.keptLow = new Float64Array(n + 2);
    this.keptHigh = new Float64Array(n + 2);
    // Boxes would narrow on a check that is nothing everywhere, such as tilting of a linkage in a plane, without end
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
  step(boxes: number): BranchBoundState {
    const until = this.boxes + boxes;
    while (this.boxes < until && !this.done) this.cut();
    return this.state();
  }

  /** Values up to this are close enough to `found`. */
  private enough(): number {
    const { found } = this;
    return Math.max(found > 0 ? found / (1 - 0.999 * this.gap) : found, Math.max(found, 0) + NOTHING * this.ceiling);
  }

  private offer(start: Numbers): void {
    this.trial.set(Array.from({ length: this.chain.n }, (_, k) => start[k]!));
    const value = this.climber.climb(this.trial);
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

  /** The check's forms, or forms of the same value all round that bound them where those come near enough: they need no angle of the joint. */
  private formsFor(check: CheckForm): readonly Form[] {
    const { chain, load } = this;
    const forms = formsAt(chain, load, check.joint, check.forms);
    const far = chain.to[check.joint]! - chain.from[check.joint]! >= FAR;
    if (load.force === 'base' || !far || forms.every(sameAllRound)) return forms;
    const round = allRound(forms);
    if (!round) return forms;
    const most = new Polish(chain, load, { ...check, forms: round }).climb(Float64Array.from(this.pose));
    return most <= this.found * (1 + NEAR * this.gap) ? round : forms;
  }

  private firstPoses(): void {
    const random = seededRandom(1);
    const { from, to } = this.chain;
    const poses = Array.from({ length: RANDOM_POSES }, () => {
      const pose = Float64Array.from(from, (low, k) => random.between(low, to[k]!));
      return { pose, value: this.climber.value(pose) };
    });
    poses.sort((a, b) => b.value - a.value);
    for (const { pose } of poses.slice(0, CLIMBS)) this.offer(pose);
  }

  private firstBoxes(): void {
    const { chain, low, high, pieces, joint } = this;
    const { n } = chain;
    pieces.forEach((piece, index) => {
      const { rows, P } = piece.form;
      const directions: [number, number, number, number][] = [];
      if (rows === 1) {
        directions.push([0, 0, 0, 0]);
        if (P.some((v) => v !== 0) || piece.form.c[0] !== 0) directions.push([Math.PI, Math.PI, 0, 0]);
      } else {
        const tilt = rows === 3 ? Math.PI / 2 : 0;
        for (let k = 0; k < 4; k++) directions.push([(k / 2 - 1) * Math.PI, ((k + 1) / 2 - 1) * Math.PI, -tilt, tilt]);
      }
      for (const [a, b, c, d] of directions) {
        low.set(chain.from);
        high.set(chain.to);
        if (this.inLink) {
          low[joint] = 0;
          high[joint] = 0;
        }
        low[n] = a;
        high[n] = b;
        low[n + 1] = c;
        high[n + 1] = d;
        this.assess(index, Number.POSITIVE_INFINITY);
      }
    });
  }

  /** Cuts the box of the largest bound in two. */
  private cut(): void {
    const { queue, low, high } = this;
    const ceiling = queue.top;
    const index = queue.pop(low, high);
    const k = queue.cutAt;
    const middle = (low[k]! + high[k]!) / 2;
    // the other intervals are needed twice, and shrinking writes to them
    const { keptLow, keptHigh } = this;
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
    const { low, high, chain, queue } = this;
    const piece = this.pieces[index]!;
    const { box } = piece;
    let bound = ceiling;
    for (let turn = 0; turn < 8; turn++) {
      this.boxes++;
      box.level = 0;
      bound = Math.min(bound, box.bound(low, high, 0));
      while (bound > this.enough() && box.level < this.finest) {
        // finer tables where they can close the box
        if (bound - 1.5 * box.overshoot(this.trial) > this.enough()) break;
        box.level++;
        this.boxes++;
        bound = Math.min(bound, box.bound(low, high, 0));
      }
      if (bound <= this.found) return;
      if (piece.torque && !this.torqueCanBe(piece)) return;
      if (box.value > this.found) this.tryMiddle(box);
      if (bound <= this.enough()) {
        if (bound > this.closed) this.closed = bound;
        return;
      }
      const share = shrinkBox(box, chain, low, high);
      if (share < 0) return;
      if (share > 0.8) break;
    }
    let at = -1;
    let most = 0;
    for (let k = 0; k < box.size; k++) {
      if (!(high[k]! > low[k]!)) continue;
      if (!(box.cost[k]! > most)) continue;
      most = box.cost[k]!;
      at = k;
    }
    if (at < 0 || high[at]! - low[at]! < 1e-9) {
      // no cut can help: the finest tables, and that is what can be said
      box.level = this.finest;
      this.boxes++;
      this.closed = Math.max(this.closed, Math.min(bound, box.bound(low, high, 0)));
      return;
    }
    queue.push(bound, low, high, at, index);
  }

  private tryMiddle(box: BoxBound): void {
    const { trial } = this;
    for (let k = 0; k < this.chain.n; k++) trial[k] = (this.low[k]! + this.high[k]!) / 2;
    this.inboard?.follow(box.lever.at, trial, 1);
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
      torque!.level = 1;
      if (torque!.bound(low, high, 0) < limit) can = false;
    }
    low[n] = a;
    high[n] = b;
    low[n + 1] = c;
    high[n + 1] = d;
    return can;
  }
}
