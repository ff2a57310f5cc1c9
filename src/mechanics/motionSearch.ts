/**
 * The certified worst of one check in a case with motion, by best-first branch and bound over joint angles, the direction that a form is
 * read along and the speeds: a bound that nothing the arm can do within travel and limits exceeds, and an attained value with its pose
 * and rates. Boxes are bounded by `motionBox.ts`, and cut where their bound owes most.
 */
import type { Flat, Numbers } from '../math/vector.ts';
import { BoxSearch, type BoxSearchOptions, type BoxSearchState } from './boxSearch.ts';
import type { Chain, ChainCase } from './chain.ts';
import { anyTorque, type CheckForm, type Form, isRanged } from './form.ts';
import { MotionBox } from './motionBox.ts';
import { standsOff } from './motionTerms.ts';
import { Polish } from './polish.ts';
import { sameAllRound } from './roundForms.ts';

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

export class MotionSearch extends BoxSearch<MotionBox> {
  /** Climbs without the ranges of the torque, which is far quicker; null where the check has none. */
  private readonly scout: Polish | null;
  private whole = false;

  constructor(chain: Chain, load: ChainCase, check: CheckForm, options: BoxSearchOptions) {
    super(chain, load, check, options.gap);
    const scouted = check.forms.some(isRanged) && chain.n > CLIMBED_WHOLE;
    this.scout = scouted ? new Polish(chain, load, anyTorque(check)) : null;
    // read in the link's frame, what stands off the axis stands still; what is balanced about it is better left to turn
    const offAxis = standsOff(chain, load, check.joint) > OFF_AXIS;
    const box = (f: Form) => new MotionBox(chain, load, check.joint, f, offAxis && sameAllRound(f));
    this.lay(check.forms, box, options.most ?? KEPT);
    for (const seed of (options.seeds ?? []).slice(0, this.scout ? 1 : undefined)) this.offer(seed);
    this.firstPoses(RANDOM_POSES, CLIMBS, this.scout ?? this.climber);
    this.begin(check);
  }

  override step(boxes: number): BoxSearchState {
    this.climbWhole();
    return super.step(boxes);
  }

  /** Once, from the best pose that a climb without the ranges of the torque came to. */
  private climbWhole(): void {
    if (!this.scout || this.whole) return;
    this.whole = true;
    this.trial.set(this.pose);
    this.take(this.climber.climb(this.trial));
  }

  protected override offer(start: Numbers): void {
    if (!this.scout) {
      super.offer(start);
      return;
    }
    for (let k = 0; k < this.chain.n; k++) this.trial[k] = start[k]!;
    this.scout.climb(this.trial);
    this.take(this.climber.value(this.trial));
  }

  protected firstBoxes(): void {
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
    const { load, low, high } = this;
    const { n } = this.chain;
    const { speeds } = this.pieces[index]!.box;
    this.setArc(a, b, c, d);
    for (let k = 0; k < n; k++) {
      const fast = load.speed && load.speed[k]! > 0;
      low[speeds + k] = fast ? -1 : 0;
      high[speeds + k] = fast ? 1 : 0;
    }
    this.assess(index, Number.POSITIVE_INFINITY);
  }

  /**
   * Bounds the box in `low`, `high`, a part of one of bound `ceiling`, shrinks it while that helps, and keeps it where it may hold the
   * worst.
   */
  protected assess(index: number, ceiling: number): void {
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
    this.setMiddle();
    this.tryTrial();
  }

  protected torqueBound(torque: MotionBox): number {
    return torque.bound(this.low, this.high);
  }
}

/** Product of the widths of the angles that are not points. */
function widthOf(low: Flat, high: Flat, n: number): number {
  let product = 1;
  for (let k = 0; k < n + 2; k++) if (high[k]! > low[k]!) product *= high[k]! - low[k]!;
  return product;
}
