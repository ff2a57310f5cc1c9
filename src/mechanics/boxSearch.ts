/**
 * Best-first branch and bound over boxes for the worst of one check in one case: what every kind of box has in common. A box has intervals
 * of the joint angles, then of θ and φ of the direction e that a form is read along, then what its kind adds. The box of the largest bound is cut
 * in two until that bound is close enough to what is attained.
 */
import { seededRandom } from '../math/random.ts';
import type { Flat, Numbers } from '../math/vector.ts';
import { BoxQueue } from './branchBoundQueue.ts';
import type { Chain, ChainCase } from './chain.ts';
import { type CheckForm, type Form, form, isRanged } from './form.ts';
import { type FreePart, freePart, newFreeWorst } from './freeLoads.ts';
import { nothingBound } from './motionNothing.ts';
import { Polish } from './polish.ts';

export interface BoxSearchOptions {
  /** Relative gap asked for: (bound - found)/bound. */
  readonly gap: number;
  /** Poses to start from, [n] rad each. */
  readonly seeds?: readonly Numbers[];
  /** Most boxes kept; beyond it the search stops with the bound it has. */
  readonly most?: number;
}

export interface BoxSearchState {
  readonly found: number;
  readonly bound: number;
  readonly pose: Float64Array;
  readonly free: FreePart | null;
  /** Joint load at `pose`, canonical housing frame. [6] */
  readonly wrench: Float64Array;
  readonly done: boolean;
}

/** A bound of one form over a box. */
interface FormBox {
  /** Number of intervals of a box. */
  readonly size: number;
  /** Most that lengths and masses allow, whatever the travel. */
  ceiling(): number;
}

interface Piece<Box> {
  readonly form: Form;
  readonly box: Box;
  /** Bounds of the torque and of minus the torque, for forms that hold in a range of it. */
  readonly torque: Box | null;
}

const TORQUE = form({ P: [[0, 0, 0, 0, 0, 1]] });
/** What lies below this share of the ceiling counts as nothing. */
const NOTHING = 1e-9;
/** A check that stays below this share of the ceiling at evenly spread poses is looked at as nothing. */
const SMALL = 1e-13;

/** A kind of search sets out from poses (`offer`, `firstPoses`), then gives its boxes (`lay`), then starts (`begin`). */
export abstract class BoxSearch<Box extends FormBox> {
  found = Number.NEGATIVE_INFINITY;
  readonly pose: Float64Array;
  readonly worst;
  /** Boxes bounded so far. */
  boxes = 0;
  protected readonly chain: Chain;
  protected readonly load: ChainCase;
  protected readonly gap: number;
  protected readonly climber: Polish;
  protected readonly trial: Flat;
  protected pieces: readonly Piece<Box>[] = [];
  protected queue = new BoxQueue(0, 0);
  protected low: Flat = new Float64Array(0);
  protected high: Flat = new Float64Array(0);
  /** Bound of boxes closed because the gap asked for allows them. */
  protected closed = Number.NEGATIVE_INFINITY;
  private most = 0;
  private keptLow: Flat = new Float64Array(0);
  private keptHigh: Flat = new Float64Array(0);

  constructor(chain: Chain, load: ChainCase, check: CheckForm, gap: number) {
    const { n } = chain;
    this.chain = chain;
    this.load = load;
    this.gap = gap;
    this.pose = new Float64Array(n);
    this.worst = newFreeWorst(n);
    this.climber = new Polish(chain, load, check);
    this.trial = new Float64Array(n);
  }

  /** Assesses a first box of each piece for every arc of e. */
  protected abstract firstBoxes(): void;

  /** Bounds the box in `low`, `high`, a part of one of bound `ceiling`, and keeps it where it may hold the worst. */
  protected abstract assess(index: number, ceiling: number): void;

  /** Bound of a torque over the box in `low`, `high`. */
  protected abstract torqueBound(torque: Box): number;

  /** Most that lengths and masses allow. */
  get ceiling(): number {
    return this.most;
  }

  get bound(): number {
    const bound = Math.max(this.found, this.closed, this.queue.top);
    return Number.isNaN(this.found) ? Number.POSITIVE_INFINITY : bound;
  }

  get done(): boolean {
    return this.queue.full || !(this.queue.top > this.enough());
  }

  state(): BoxSearchState {
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
  step(boxes: number): BoxSearchState {
    const until = this.boxes + boxes;
    while (this.boxes < until && !this.done) this.cut();
    return this.state();
  }

  /** One piece for each form; `most`: boxes kept. */
  protected lay(forms: readonly Form[], box: (f: Form) => Box, most: number): void {
    this.pieces = forms.map((f) => ({ form: f, box: box(f), torque: isRanged(f) ? box(TORQUE) : null }));
    this.most = Math.max(...this.pieces.map((piece) => piece.box.ceiling()));
    const { size } = this.pieces[0]!.box;
    this.queue = new BoxQueue(size, most);
    this.low = new Float64Array(size);
    this.high = new Float64Array(size);
    this.keptLow = new Float64Array(size);
    this.keptHigh = new Float64Array(size);
  }

  /** First boxes; none for a check that is nothing everywhere, such as tilting of a linkage in a plane, on which they would narrow without end. */
  protected begin(check: CheckForm): void {
    const { chain, load, ceiling } = this;
    const nothing = this.found <= NOTHING * ceiling ? nothingBound(chain, load, check, SMALL * ceiling) : Number.NaN;
    if (nothing <= NOTHING * ceiling) this.closed = nothing;
    else this.firstBoxes();
  }

  /** Values up to this are close enough to `found`. */
  protected enough(): number {
    const { found } = this;
    return Math.max(found > 0 ? found / (1 - 0.999 * this.gap) : found, Math.max(found, 0) + NOTHING * this.ceiling);
  }

  /** Climbs from a pose. */
  protected offer(start: Numbers): void {
    for (let k = 0; k < this.chain.n; k++) this.trial[k] = start[k]!;
    this.take(this.climber.climb(this.trial));
  }

  /** Keeps the pose in `trial` with what the climber took there where its value is the highest yet. */
  protected take(value: number): void {
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

  /** Climbs from the best of `count` random poses by the values of `look`. */
  protected firstPoses(count: number, climbs: number, look: Polish): void {
    const random = seededRandom(1);
    const { from, to } = this.chain;
    const poses = Array.from({ length: count }, () => {
      const pose = Float64Array.from(from, (low, k) => random.between(low, to[k]!));
      return { pose, value: look.value(pose) };
    });
    poses.sort((a, b) => b.value - a.value);
    for (const { pose } of poses.slice(0, climbs)) this.offer(pose);
  }

  /** Sets the angles to their travel and e to an arc: θ from a to b, φ from c to d. */
  protected setArc(a: number, b: number, c: number, d: number): void {
    const { chain, low, high } = this;
    const { n } = chain;
    low.set(chain.from);
    high.set(chain.to);
    low[n] = a;
    high[n] = b;
    low[n + 1] = c;
    high[n + 1] = d;
  }

  /** Middle of the box as a pose in `trial`. */
  protected setMiddle(): void {
    for (let k = 0; k < this.chain.n; k++) this.trial[k] = (this.low[k]! + this.high[k]!) / 2;
  }

  /** Climbs from `trial` where it is better than what is known. */
  protected tryTrial(): void {
    if (this.climber.value(this.trial) > this.found) this.offer(Float64Array.from(this.trial));
  }

  /** Whether the form's torque range meets what the torque can be over the box. */
  protected torqueCanBe({ form: f, torque }: Piece<Box>): boolean {
    const { low, high } = this;
    const { n } = this.chain;
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
      if (this.torqueBound(torque!) < limit) can = false;
    }
    low[n] = a;
    high[n] = b;
    low[n + 1] = c;
    high[n + 1] = d;
    return can;
  }

  /** Cuts the box of the largest bound in two. */
  private cut(): void {
    const { queue, low, high, keptLow, keptHigh } = this;
    const ceiling = queue.top;
    const index = queue.pop(low, high);
    const k = queue.cutAt;
    const middle = (low[k]! + high[k]!) / 2;
    // the other intervals are needed twice, and shrinking writes to them
    keptLow.set(low);
    keptHigh.set(high);
    high[k] = middle;
    this.assess(index, ceiling);
    low.set(keptLow);
    high.set(keptHigh);
    low[k] = middle;
    this.assess(index, ceiling);
  }
}
