/**
 * A bound of one form of a check over a box, for a case in motion: angles q, the direction e that the form is read along and parts x of
 * the speeds, in this order, each within its interval (e as in `branchBoundBox.ts`, by θ and φ).
 *
 * Along e the form is a linear function of the load: weight, tip force, Σ y_j A_j and Σ x_j x_k C_jk as series of second degree
 * (`motionChain.ts`), whose most over the box and the rates follows term by term (`motionRates.ts`). A tip force free to point anywhere adds P ‖w‖ with w the virtual velocity of
 * the tip, at most P (w·w + s²)/(2 s) for any s > 0, equal where ‖w‖ = s. Angles wider than `NARROW` are not expanded.
 */
import type { Flat } from '../math/vector.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import type { Form } from './form.ts';
import { formCeiling } from './formCeiling.ts';
import { MotionChain } from './motionChain.ts';
import { MotionRates } from './motionRates.ts';
import { linearTerm, Series, SeriesBox, squareTerm, termCount } from './motionSeries.ts';

/** Half width of an angle up to which it is expanded, rad. */
const NARROW = 0.4;
/** What rounding may add, relative to the most that lengths and masses allow. */
const ROUNDING = 1e-12;

export class MotionBox {
  /** Number of intervals of a box. */
  readonly size: number;
  /** Place of the first part of a speed. */
  readonly speeds: number;
  readonly rates: MotionRates;
  /** What the bound may owe to the width of each interval. [size] */
  readonly cost: Flat;
  private readonly n: number;
  private readonly load: ChainCase;
  private readonly form: Form;
  private readonly box: SeriesBox;
  private readonly parts: MotionChain;
  private readonly angles;
  private readonly e: Series;
  private readonly alpha: Series;
  private readonly beta: Series;
  private readonly base: Series;
  /** Interval of each variable. */
  private readonly place: Int32Array;
  private readonly most: number;

  /** `inLink`: e is taken in the frame of the joint's link, for forms that are the same all round its axis. */
  constructor(chain: Chain, load: ChainCase, joint: number, f: Form, inLink: boolean) {
    const { n } = chain;
    this.n = n;
    this.load = load;
    this.form = f;
    this.speeds = n + 2;
    this.size = 2 * n + 2;
    const variables = n + 2;
    this.box = new SeriesBox(variables);
    this.parts = new MotionChain(chain, load, joint, variables, inLink);
    this.rates = new MotionRates(n, variables);
    this.cost = new Float64Array(this.size);
    this.angles = { middle: new Float64Array(n), half: new Float64Array(n), variable: new Int32Array(n) };
    this.e = new Series(3, variables);
    this.alpha = new Series(3, variables);
    this.beta = new Series(3, variables);
    this.base = new Series(1, variables);
    this.place = new Int32Array(variables);
    this.most = formCeiling(chain, load, joint, f);
  }

  /** Most that lengths and masses allow, whatever the travel. */
  ceiling(): number {
    return this.most;
  }

  /** Bound over the box, not below `enough`, under which nothing need be told apart; leaves `value` and `cost`. */
  bound(low: Flat, high: Flat, enough = Number.NEGATIVE_INFINITY): number {
    const { n, box, parts, base, form, cost, angles, rates } = this;
    cost.fill(0);
    this.take(low, high);
    this.setTwist(low, high);
    parts.fill(box, angles, this.alpha, this.beta);
    base.clear();
    base.add(parts.still, 1);
    base.c[0]! += form.o;
    this.addOffset();
    const extra = this.load.force === 'any' ? this.addFree() : 0;
    base.rest += extra + ROUNDING * this.most;
    const moving = this.load.speed !== null;
    const bound = rates.bound(box, parts, base, moving, low, high, this.speeds, enough);
    for (let k = 0; k < n; k++) cost[k] = parts.blame[k]!;
    if (moving) for (let j = 0; j < n; j++) cost[this.speeds + j] = rates.slackX[j]!;
    for (const k of [n, n + 1]) if (high[k]! > low[k]!) cost[k] = this.e.rest * this.most;
    this.blame();
    return Number.isFinite(bound) ? bound : Number.POSITIVE_INFINITY;
  }

  /** Value at the middle with rates and direction as in the worst choice: attained, but for what a speed that is not at an end loses. */
  get value(): number {
    return this.rates.sum.c[0]!;
  }

  /** Chooses the variables: e first, then the angles from the tip inward, as they come into the series. */
  private take(low: Flat, high: Flat): void {
    const { n, box, place, angles } = this;
    box.start();
    for (const k of [n, n + 1]) {
      if (high[k]! > low[k]!) place[box.take((high[k]! - low[k]!) / 2)] = k;
    }
    for (let k = n - 1; k >= 0; k--) {
      const half = (high[k]! - low[k]!) / 2;
      angles.middle[k] = (low[k]! + high[k]!) / 2;
      angles.half[k] = half;
      angles.variable[k] = -1;
      if (!(half > 0 && half <= NARROW)) continue;
      const variable = box.take(half);
      place[variable] = k;
      angles.variable[k] = variable;
    }
  }

  /** e over the box, and the twist that it makes of the form. */
  private setTwist(low: Flat, high: Flat): void {
    const { n, box, e, form } = this;
    e.clear();
    const theta = (low[n]! + high[n]!) / 2;
    const phi = (low[n + 1]! + high[n + 1]!) / 2;
    const [cp, sp] = [Math.cos(phi), Math.sin(phi)];
    const [ct, st] = [Math.cos(theta), Math.sin(theta)];
    e.c.set([cp * ct, cp * st, sp]);
    if (high[n + 1]! > low[n + 1]!) {
      const b = high[n]! > low[n]! ? 1 : 0;
      const h = box.half[b]!;
      e.grow(b + 1);
      e.c.set([-sp * ct, -sp * st, cp], 3 * linearTerm(b));
      e.c.set([-0.5 * cp * ct, -0.5 * cp * st, -0.5 * sp], 3 * squareTerm(b, b));
      e.rest = (h * h * h) / 6;
    }
    if (high[n]! > low[n]!) box.swing(e, 0, 1);
    project(form, e, 0, this.alpha);
    project(form, e, 3, this.beta);
  }

  /** e · c of the form. */
  private addOffset(): void {
    const { base, e, form } = this;
    if (!form.c.some((v) => v !== 0)) return;
    base.grow(e.live);
    for (let t = 0; t < termCount(e.live); t++) {
      for (let r = 0; r < form.rows; r++) base.c[t]! += form.c[r]! * e.c[3 * t + r]!;
    }
    base.rest += Math.hypot(...form.c) * e.rest;
  }

  /** Tip force free to point anywhere; returns what is not in the sum. */
  private addFree(): number {
    const { box, parts, base, load } = this;
    const { tip } = parts;
    const size = Math.hypot(tip.c[0]!, tip.c[1]!, tip.c[2]!);
    const most = box.most(tip);
    if (!(size > 0.3 * most)) {
      base.c[0]! += load.magnitude * size;
      return load.magnitude * (most - size);
    }
    base.c[0]! += (load.magnitude * size) / 2;
    for (let k = 0; k < 3; k++) box.addProduct(base, 0, tip, k, tip, k, load.magnitude / (2 * size));
    return 0;
  }

  /** What each term of the worst choice of rates owes to the width of its variables. */
  private blame(): void {
    const { box, rates, place, cost } = this;
    const { sum } = rates;
    const { c } = sum;
    for (let b = 0; b < sum.live; b++) {
      const h = box.half[b]!;
      const g = Math.abs(c[linearTerm(b)]!);
      const bend = c[squareTerm(b, b)]!;
      cost[place[b]!]! += bend < 0 && g < -2 * bend * h ? (g * g) / (-4 * bend) : g * h + bend * h * h;
      for (let a = 0; a < b; a++) {
        const t = squareTerm(a, b);
        const cross = Math.abs(c[t]!) * box.reach[t]!;
        cost[place[b]!]! += cross / 2;
        cost[place[a]!]! += cross / 2;
      }
    }
  }

  /** Shrinks the intervals of the last box to where its bound can come up to what is close enough. False where nothing is left. */
  shrink(low: Flat, high: Flat): boolean {
    const { box, place, rates } = this;
    for (let b = 0; b < box.count; b++) {
      const k = place[b]!;
      const h = box.half[b]!;
      const [from, to] = [rates.from[b]!, rates.to[b]!];
      if (!(from <= to)) return false;
      const middle = (low[k]! + high[k]!) / 2;
      const slack = 1e-9 * h;
      if (from > -h) low[k] = Math.max(low[k]!, middle + from - slack);
      if (to < h) high[k] = Math.min(high[k]!, middle + to + slack);
    }
    return true;
  }
}

/** α (from = 0) or β (from = 3) of a form along e: rows of P weighed by e, and the linear part. */
function project(form: Form, e: Series, from: number, out: Series): void {
  out.copy(e);
  const { P, l, rows } = form;
  const count = termCount(e.live);
  let norm = 0;
  for (let r = 0; r < rows; r++) for (let k = 0; k < 3; k++) norm += P[WRENCH * r + from + k]! ** 2;
  for (let t = 0; t < count; t++) {
    for (let k = 0; k < 3; k++) {
      let part = 0;
      for (let r = 0; r < rows; r++) part += P[WRENCH * r + from + k]! * e.c[3 * t + r]!;
      out.c[3 * t + k] = part;
    }
  }
  for (let k = 0; k < 3; k++) out.c[k]! += l[from + k]!;
  out.rest = Math.sqrt(norm) * e.rest;
}
