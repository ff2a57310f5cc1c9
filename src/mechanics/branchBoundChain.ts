/**
 * What a box of joint angles does to the vectors that make up a joint load, seen from housing frame i: the inboard joints turn
 * directions fixed in the base (gravity, a base-fixed tip force), joint i and those outboard of it turn the first moment h, the tip
 * r and directions fixed in the tool.
 *
 * Every derivative is exact: joint j inboard turns a direction by -z_j, joint o outboard turns what stands outboard of it by z_o about
 * its origin, so ∂²h/∂q_j∂q_o = z_j × (z_o × h_o) for j ≤ o, and so on. A k-th derivative is thus no longer than |z_o × h_o| of
 * its outermost joint (innermost, for directions from the base), and the sum over all joints of a box gives the `series`
 *
 *     X_k = Σ over k-fold derivatives of |…| ρ…ρ / k! = Σ_o η_o (S_o^k - S_{o-1}^k)/k!,    S_o = ρ_i + … + ρ_o,    η_o ≥ |z_o × h_o|
 *
 * Joints with wide intervals are not expanded: from the first of them outward the chain is held in a ball (centre and radius of
 * the arcs), likewise inward from the innermost one that is expanded.
 */
import type { Flat } from '../math/vector.ts';
import type { Chain, ChainCase } from './chain.ts';

/** Half width, rad, from which a joint is held in a ball. */
const WIDE = 0.9;
/** Orders of a series: 0 to 3. */
export const ORDERS = 4;

/** A vector that some joints of the box turn. */
export interface TurnedVector {
  /** At the middle of the box (centre of the ball), housing frame i. [3] */
  readonly at: Flat;
  /** First derivatives by joint. [3n] */
  readonly slope: Flat;
  /** Radius of the ball that the wide joints leave. */
  ball: number;
  /** Bounds of the k-th variation over k!; entry 0 bounds the length. [4] */
  readonly series: Flat;
  /** Derivative of series[k] by the half width of each joint. [4n] */
  readonly widening: Flat;
}

function turnedVector(n: number): TurnedVector {
  const flat = (size: number) => new Float64Array(size);
  return { at: flat(3), slope: flat(3 * n), ball: 0, series: flat(ORDERS), widening: flat(ORDERS * n) };
}

export class BoxChain {
  readonly n: number;
  readonly joint: number;
  /** Joints innermost .. joint-1 and joint .. outermost-1 are expanded. */
  innermost = 0;
  outermost = 0;
  /** Axes of the expanded joints. [3n] */
  readonly axis: Flat;
  /** Gravity's unit direction and a base-fixed tip force; first moment, tip, and a tool-fixed tip force. */
  readonly down: TurnedVector;
  readonly baseForce: TurnedVector;
  readonly moment: TurnedVector;
  readonly tip: TurnedVector;
  readonly toolForce: TurnedVector;
  /** Mass outboard of the joint, kg. */
  readonly mass: number;
  /** Loss by each wide joint of its vectors, for choosing where to cut: perpendicular part × sin ρ. [n] each */
  readonly spreadDown: Flat;
  readonly spreadBase: Flat;
  readonly spreadMoment: Flat;
  readonly spreadTip: Flat;
  readonly spreadTool: Flat;
  private readonly chain: Chain;
  private readonly hasBase: boolean;
  private readonly hasTool: boolean;
  private readonly gravity: Flat;
  private readonly base: Flat;
  private readonly tool: Flat;
  /** First moment of link o with all outboard of it put at the next origin, and the next origin itself (or the tip). [3n] */
  private readonly lever: Flat;
  private readonly step: Flat;
  private readonly reachMoment: Flat;
  private readonly reachTip: Flat;
  private readonly frame: Flat;
  private readonly tmp: Flat;
  private readonly ownMoment: Flat;
  private readonly ownTip: Flat;
  private readonly eta: Flat;
  private readonly sum: Flat;

  constructor(chain: Chain, load: ChainCase, joint: number) {
    const { n } = chain;
    const flat = (size: number) => new Float64Array(size);
    this.n = n;
    this.joint = joint;
    this.chain = chain;
    this.axis = flat(3 * n);
    this.down = turnedVector(n);
    this.baseForce = turnedVector(n);
    this.moment = turnedVector(n);
    this.tip = turnedVector(n);
    this.toolForce = turnedVector(n);
    this.spreadDown = flat(n);
    this.spreadBase = flat(n);
    this.spreadMoment = flat(n);
    this.spreadTip = flat(n);
    this.spreadTool = flat(n);
    const g = Math.hypot(...chain.gravity);
    this.gravity = Float64Array.from(chain.gravity, (v) => (g > 0 ? v / g : 0));
    this.hasBase = load.force === 'base';
    this.hasTool = load.force === 'tool';
    this.base = Float64Array.from(this.hasBase ? load.forceUnit : [0, 0, 0]);
    this.tool = Float64Array.from(this.hasTool ? load.forceUnit : [0, 0, 0]);
    this.lever = flat(3 * n);
    this.step = flat(3 * n);
    this.reachMoment = flat(n + 1);
    this.reachTip = flat(n + 1);
    this.frame = flat(9);
    this.tmp = flat(9);
    this.ownMoment = flat(3 * (n + 1));
    this.ownTip = flat(3 * (n + 1));
    this.eta = flat(n);
    this.sum = flat(n);
    let outboard = 0;
    for (let o = n - 1; o >= 0; o--) {
      for (let k = 0; k < 3; k++) {
        const next = o + 1 < n ? chain.origin[3 * o + 3 + k]! : chain.tipOrigin[k]!;
        this.step[3 * o + k] = next;
        this.lever[3 * o + k] = load.first[3 * o + k]! + (o + 1 < n ? outboard * next : 0);
      }
      this.reachMoment[o] = this.reachMoment[o + 1]! + length3(this.lever, 3 * o);
      this.reachTip[o] = this.reachTip[o + 1]! + length3(this.step, 3 * o);
      outboard += load.mass[o]!;
      if (o === joint) break;
    }
    this.mass = outboard;
  }

  /** Longest first moment (kg·m) and tip distance (m) that the lengths allow. */
  get longestMoment(): number {
    return this.reachMoment[this.joint]!;
  }
  get longestTip(): number {
    return this.reachTip[this.joint]!;
  }

  /** Sets everything for the box of middles and half widths (rad, [≥ n] each); `inboard`: the inboard joints too. */
  set(middle: Flat, half: Flat, inboard: boolean): void {
    if (inboard) this.setInboard(middle, half);
    this.setOutboard(middle, half);
  }

  private setInboard(middle: Flat, half: Flat): void {
    const { chain, joint, axis, frame, tmp, down, baseForce } = this;
    let wide = joint - 1;
    while (wide >= 0 && half[wide]! <= WIDE) wide--;
    const first = wide + 1;
    this.innermost = first;
    // frame: link j to housing i, from i-1 inward
    for (let r = 0; r < 3; r++) for (let c = 0; c < 3; c++) frame[3 * r + c] = chain.rotation[9 * joint + 3 * c + r]!;
    for (let j = joint - 1; j >= first; j--) {
      for (let r = 0; r < 3; r++) axis[3 * j + r] = frame[3 * r + 2]!;
      const c = Math.cos(middle[j]!);
      const s = Math.sin(middle[j]!);
      const R = chain.rotation;
      for (let r = 0; r < 9; r += 3) {
        const x = c * frame[r]! - s * frame[r + 1]!;
        const y = s * frame[r]! + c * frame[r + 1]!;
        const z = frame[r + 2]!;
        for (let k = 0; k < 3; k++) {
          const a = 9 * j + 3 * k;
          tmp[r + k] = x * R[a]! + y * R[a + 1]! + z * R[a + 2]!;
        }
      }
      frame.set(tmp);
    }
    this.turnFromBase(down, this.gravity, this.spreadDown, first, middle, half);
    if (this.hasBase) this.turnFromBase(baseForce, this.base, this.spreadBase, first, middle, half);
  }

  /** A unit direction of the base, in a ball up to joint first-1, expanded from there. */
  private turnFromBase(out: TurnedVector, from: Flat, spread: Flat, first: number, middle: Flat, half: Flat): void {
    const { chain, joint, frame, axis, sum, eta } = this;
    let [x, y, z] = [from[0]!, from[1]!, from[2]!];
    let ball = 0;
    for (let j = 0; j < first; j++) {
      const R = chain.rotation;
      const a = 9 * j;
      const hx = R[a]! * x + R[a + 3]! * y + R[a + 6]! * z;
      const hy = R[a + 1]! * x + R[a + 4]! * y + R[a + 7]! * z;
      const hz = R[a + 2]! * x + R[a + 5]! * y + R[a + 8]! * z;
      const rho = Math.min(half[j]!, Math.PI / 2);
      const across = Math.sqrt(hx * hx + hy * hy) * Math.sin(rho);
      ball += across;
      spread[j] = across;
      const shrink = half[j]! < Math.PI / 2 ? Math.cos(rho) : 0;
      const c = shrink * Math.cos(middle[j]!);
      const s = shrink * Math.sin(middle[j]!);
      x = c * hx + s * hy;
      y = c * hy - s * hx;
      z = hz;
    }
    if (ball >= 1) {
      [x, y, z, ball] = [0, 0, 0, 1];
    }
    out.ball = ball;
    for (let r = 0; r < 3; r++) out.at[r] = frame[3 * r]! * x + frame[3 * r + 1]! * y + frame[3 * r + 2]! * z;
    const size = length3(out.at, 0);
    let varied = 0;
    for (let j = first; j < joint; j++) {
      crossAt(out.slope, 3 * j, out.at, 0, axis, 3 * j);
      eta[j] = Math.min(size, length3(out.slope, 3 * j) + varied);
      varied += half[j]! * eta[j]!;
    }
    // sums run from the joint inward
    const { series, widening } = out;
    series[0] = size;
    series[1] = varied;
    series[2] = 0;
    series[3] = 0;
    let S = 0;
    for (let j = joint - 1; j >= first; j--) {
      const before = S;
      S += half[j]!;
      sum[j] = S;
      series[2]! += (eta[j]! * (S * S - before * before)) / 2;
      series[3]! += (eta[j]! * (S * S * S - before * before * before)) / 6;
    }
    let beyond1 = 0;
    let beyond2 = 0;
    for (let j = first; j < joint; j++) {
      const here = sum[j]!;
      const before = here - half[j]!;
      widening[ORDERS * j + 1] = eta[j]!;
      widening[ORDERS * j + 2] = eta[j]! * here + beyond1;
      widening[ORDERS * j + 3] = (eta[j]! * here * here) / 2 + beyond2;
      beyond1 += eta[j]! * half[j]!;
      beyond2 += (eta[j]! * (here * here - before * before)) / 2;
    }
  }

  private setOutboard(middle: Flat, half: Flat): void {
    const { chain, n, joint, axis, frame, tmp, moment, tip, toolForce, ownMoment, ownTip } = this;
    let last = joint;
    while (last < n && half[last]! <= WIDE) last++;
    this.outermost = last;
    this.holdTail(last, middle, half);
    // frame: housing o to housing i
    frame.fill(0);
    frame[0] = 1;
    frame[4] = 1;
    frame[8] = 1;
    for (let o = joint; o < last; o++) {
      for (let r = 0; r < 3; r++) axis[3 * o + r] = frame[3 * r + 2]!;
      const c = Math.cos(middle[o]!);
      const s = Math.sin(middle[o]!);
      for (let r = 0; r < 3; r++) {
        const x = c * frame[3 * r]! + s * frame[3 * r + 1]!;
        const y = c * frame[3 * r + 1]! - s * frame[3 * r]!;
        const z = frame[3 * r + 2]!;
        tmp[3 * r] = x;
        tmp[3 * r + 1] = y;
        tmp[3 * r + 2] = z;
        const a = 3 * o;
        ownMoment[a + r] = x * this.lever[a]! + y * this.lever[a + 1]! + z * this.lever[a + 2]!;
        ownTip[a + r] = x * this.step[a]! + y * this.step[a + 1]! + z * this.step[a + 2]!;
      }
      if (o + 1 === n) {
        frame.set(tmp);
        break;
      }
      const R = chain.rotation;
      const a = 9 * (o + 1);
      for (let r = 0; r < 9; r += 3) {
        const x = tmp[r]!;
        const y = tmp[r + 1]!;
        const z = tmp[r + 2]!;
        frame[r] = x * R[a]! + y * R[a + 3]! + z * R[a + 6]!;
        frame[r + 1] = x * R[a + 1]! + y * R[a + 4]! + z * R[a + 7]!;
        frame[r + 2] = x * R[a + 2]! + y * R[a + 5]! + z * R[a + 8]!;
      }
    }
    this.placeTail(moment);
    this.placeTail(tip);
    this.sumOutward(moment, ownMoment, this.reachMoment, half);
    this.sumOutward(tip, ownTip, this.reachTip, half);
    if (!this.hasTool) return;
    if (last === n) {
      for (let k = 0; k < 3; k++) toolForce.at[k] = this.tool[k]!;
      toolForce.ball = 0;
    }
    this.placeTail(toolForce);
    ownMoment.fill(0);
    this.sumOutward(toolForce, ownMoment, null, half);
  }

  /** Ball of the chain outboard of joint `last`-1 in housing frame `last`, left in `at` and `ball`. */
  private holdTail(last: number, middle: Flat, half: Flat): void {
    const { n, moment, tip, toolForce } = this;
    for (const vector of [moment, tip]) {
      vector.at.fill(0);
      vector.ball = 0;
    }
    if (last === n) return;
    toolForce.at.set(this.tool);
    toolForce.ball = 0;
    for (let o = n - 1; o >= last; o--) {
      this.holdLink(moment, this.lever, this.spreadMoment, o, middle, half);
      this.holdLink(tip, this.step, this.spreadTip, o, middle, half);
      if (this.hasTool) this.holdLink(toolForce, null, this.spreadTool, o, middle, half);
    }
    if (toolForce.ball >= 1) {
      toolForce.at.fill(0);
      toolForce.ball = 1;
    }
  }

  private holdLink(out: TurnedVector, own: Flat | null, spread: Flat, o: number, middle: Flat, half: Flat): void {
    const { at } = out;
    let [x, y, z] = [at[0]!, at[1]!, at[2]!];
    if (o + 1 < this.n) {
      const R = this.chain.rotation;
      const a = 9 * (o + 1);
      [x, y, z] = [
        R[a]! * x + R[a + 1]! * y + R[a + 2]! * z,
        R[a + 3]! * x + R[a + 4]! * y + R[a + 5]! * z,
        R[a + 6]! * x + R[a + 7]! * y + R[a + 8]! * z,
      ];
    }
    if (own) {
      x += own[3 * o]!;
      y += own[3 * o + 1]!;
      z += own[3 * o + 2]!;
    }
    const rho = Math.min(half[o]!, Math.PI / 2);
    const across = Math.sqrt(x * x + y * y) * Math.sin(rho);
    out.ball += across;
    spread[o] = across;
    const shrink = half[o]! < Math.PI / 2 ? Math.cos(rho) : 0;
    const c = shrink * Math.cos(middle[o]!);
    const s = shrink * Math.sin(middle[o]!);
    at[0] = c * x - s * y;
    at[1] = s * x + c * y;
    at[2] = z;
  }

  /** Brings the tail's centre from its own frame to housing frame i. */
  private placeTail(out: TurnedVector): void {
    const { frame } = this;
    const { at } = out;
    const [x, y, z] = [at[0]!, at[1]!, at[2]!];
    for (let r = 0; r < 3; r++) at[r] = frame[3 * r]! * x + frame[3 * r + 1]! * y + frame[3 * r + 2]! * z;
  }

  /** Adds the expanded links to the tail and fills slopes, series and widenings. */
  private sumOutward(out: TurnedVector, own: Flat, reach: Flat | null, half: Flat): void {
    const { joint, outermost, axis, eta, sum } = this;
    const { at, slope, series, widening } = out;
    let varied = 0;
    for (let o = outermost - 1; o >= joint; o--) {
      for (let k = 0; k < 3; k++) at[k]! += own[3 * o + k]!;
      crossAt(slope, 3 * o, axis, 3 * o, at, 0);
      eta[o] = Math.min(length3(slope, 3 * o) + varied, reach ? reach[o]! : 1);
      varied += half[o]! * eta[o]!;
    }
    series[0] = reach ? Math.min(length3(at, 0) + varied, reach[joint]!) : length3(at, 0);
    series[1] = varied;
    series[2] = 0;
    series[3] = 0;
    let S = 0;
    for (let o = joint; o < outermost; o++) {
      const before = S;
      S += half[o]!;
      sum[o] = S;
      series[2]! += (eta[o]! * (S * S - before * before)) / 2;
      series[3]! += (eta[o]! * (S * S * S - before * before * before)) / 6;
    }
    let beyond1 = 0;
    let beyond2 = 0;
    for (let o = outermost - 1; o >= joint; o--) {
      const here = sum[o]!;
      const before = here - half[o]!;
      widening[ORDERS * o + 1] = eta[o]!;
      widening[ORDERS * o + 2] = eta[o]! * here + beyond1;
      widening[ORDERS * o + 3] = (eta[o]! * here * here) / 2 + beyond2;
      beyond1 += eta[o]! * half[o]!;
      beyond2 += (eta[o]! * (here * here - before * before)) / 2;
    }
  }
}

export function length3(a: Flat, at: number): number {
  const x = a[at]!;
  const y = a[at + 1]!;
  const z = a[at + 2]!;
  return Math.sqrt(x * x + y * y + z * z);
}

/** out = a × b; `out` may not overlap. */
export function crossAt(out: Flat, oo: number, a: Flat, ao: number, b: Flat, bo: number): void {
  const ax = a[ao]!;
  const ay = a[ao + 1]!;
  const az = a[ao + 2]!;
  const bx = b[bo]!;
  const by = b[bo + 1]!;
  const bz = b[bo + 2]!;
  out[oo] = ay * bz - az * by;
  out[oo + 1] = az * bx - ax * bz;
  out[oo + 2] = ax * by - ay * bx;
}
