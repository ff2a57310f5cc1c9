import type { Flat } from '../math/vector.ts';
import { add, dot, mostOf, operatorNorm } from './branchBoundAlgebra.ts';
import { BoxChain, crossAt, length3, ORDERS, type TurnedVector } from './branchBoundChain.ts';
import type { InboardDirections } from './branchBoundInboard.ts';
import { Lever } from './branchBoundLever.ts';
import type { Chain, ChainCase } from './chain.ts';
import type { Form } from './form.ts';
import { TOP_LEVEL } from './outwardSets.ts';

/** Share of the largest sums that rounding may take. */
const ROUNDING = 1e-12;

/**
 * Weights of what an interval's width costs a bound, for choosing where to cut: first order where the direction is unknown, second
 * order there, slopes, mixed curvatures, curvatures that rise, remainders. Chosen by trial on random arms of six joints.
 */
export const COST = { rough: 2, bent: 4, slope: 1, mixed: 3, hollow: 1, rest: 3 } as const;
/** A lever that may shrink to less than this share of its length may point anywhere. */
const STEADY_FREE = 0.3;

/** What a box bound (`branchBoundBox.ts`) is made of: the series of its terms at the middle, and how they are put together. */
export class BoxTerms {
  readonly n: number;
  /** Finest level of the tables of gravity's directions for the next bound. */
  level = TOP_LEVEL;
  /** Intervals of a box: n joints, then θ and φ of e. */
  readonly size: number;
  readonly vectors: BoxChain;
  /** At the middle of the last box: value, slopes [size], curvatures [size²]. */
  value = 0;
  readonly slope: Flat;
  readonly bend: Flat;
  /** Bound of what the slope's linear model leaves out over the box. [size]; infinite where it is not known */
  readonly slopeRest: Flat;
  /**
   * Derivative of the third-order remainder by each half width. The remainder R is a cubic form of the half widths, so it is a third of
   * Σ ρ_k cubic_k, and of steps |δ_k| = x_k ρ_k it is at most Σ x_k³ ρ_k cubic_k / 3 (means of three numbers).
   */
  protected readonly cubic: Flat;
  /** What each interval's width costs the bound: where to cut. [size] */
  readonly cost: Flat;
  readonly middle: Flat;
  readonly half: Flat;
  /** Intervals in the quadratic model. */
  readonly active: Int32Array;
  activeCount = 0;
  /** Best direction of a free tip force at the middle, housing frame i. [3] */
  readonly free: Flat;
  protected readonly load: ChainCase;
  /** Directions of gravity in place of the inboard joints; null where those are intervals of the box. */
  protected readonly inboard: InboardDirections | null;
  /** Y = g (M α + β × h), and what a free direction pulls on. */
  readonly lever: Lever;
  protected readonly freeLever: Lever;
  /** Linear functions of y that together lie nowhere below its support. [3·6] */
  protected readonly planes: Flat;
  protected planeCount = 0;
  protected readonly corners: Flat;
  protected readonly planeSlope: Flat;
  protected readonly planeBend: Flat;
  protected readonly form: Form;
  protected readonly gravity: number;
  /** Weight of (torque - limit), for forms that hold in a torque range. */
  protected torqueWeight = 0;
  protected torqueLimit = 0;
  protected readonly forceNorm: number;
  protected readonly momentNorm: number;
  protected readonly offsetNorm: number;
  /** e and its derivatives by θ, φ, θθ, θφ, φφ; α and β of each. [3·6] */
  protected readonly e: Flat;
  readonly alpha: Flat;
  readonly beta: Flat;
  readonly seriesA: Flat;
  readonly seriesB: Flat;
  protected readonly seriesE: Flat;
  protected readonly product: Flat;
  protected readonly product2: Flat;
  protected readonly seriesV: Flat;
  protected readonly pull: Flat;
  protected readonly across: Flat;
  protected readonly turned: Flat;
  protected readonly crossed: Flat;
  /** Second- and third-order remainders, what balls add, and the size of what was summed. */
  protected rest2 = 0;
  protected rest3 = 0;
  protected added = 0;
  protected scale = 0;
  /** Slope rest of the last free direction by its own turn. */
  protected restByTurn = 0;

  constructor(chain: Chain, load: ChainCase, joint: number, f: Form, inboard: InboardDirections | null) {
    const { n } = chain;
    const flat = (size: number) => new Float64Array(size);
    this.n = n;
    this.size = n + 2;
    this.load = load;
    this.inboard = inboard;
    this.form = f;
    this.vectors = new BoxChain(chain, load, joint);
    this.gravity = Math.hypot(...chain.gravity);
    this.slope = flat(this.size);
    this.bend = flat(this.size * this.size);
    this.slopeRest = flat(this.size);
    this.cubic = flat(this.size);
    this.cost = flat(this.size);
    this.middle = flat(this.size);
    this.half = flat(this.size);
    this.active = new Int32Array(this.size);
    this.free = flat(3);
    this.e = flat(18);
    this.alpha = flat(18);
    this.beta = flat(18);
    this.seriesA = flat(ORDERS);
    this.seriesB = flat(ORDERS);
    this.seriesE = flat(ORDERS);
    this.product = flat(ORDERS);
    this.product2 = flat(ORDERS);
    this.seriesV = flat(ORDERS);
    this.pull = flat(3);
    this.across = flat(3 * this.size);
    this.turned = flat(3 * this.size);
    this.crossed = flat(9);
    this.lever = new Lever(n);
    this.freeLever = new Lever(n);
    this.planes = flat(18);
    this.corners = flat(6);
    this.planeSlope = flat(this.size);
    this.planeBend = flat(this.size * this.size);
    this.forceNorm = operatorNorm(f, 0);
    this.momentNorm = operatorNorm(f, 3);
    this.offsetNorm = Math.hypot(...f.c);
  }

  /** Cost of the wide joints outboard. */
  protected spread(weight: number, spread: Flat): void {
    for (let o = this.vectors.outermost; o < this.n; o++) this.cost[o]! += weight * spread[o]!;
  }

  protected spreadInboard(weight: number, spread: Flat): void {
    for (let j = 0; j < this.vectors.innermost; j++) this.cost[j]! += weight * spread[j]!;
  }

  /** ‖mass α + β × x‖ at the middle. */
  protected reachOf(mass: number, x: TurnedVector): number {
    const { crossed, beta, alpha } = this;
    crossAt(crossed, 0, beta, 0, x.at, 0);
    for (let k = 0; k < 3; k++) crossed[k]! += mass * alpha[k]!;
    return length3(crossed, 0);
  }

  /** Balls leave slopes unknown by this much: joints, and e. */
  protected unsettle(joints: number, directions: number): void {
    const { slopeRest, n } = this;
    for (let k = 0; k < n; k++) slopeRest[k]! += joints;
    slopeRest[n]! += directions;
    slopeRest[n + 1]! += directions;
  }

  /**
   * Adds weight (mass α + β × x)·u with x turned by the outboard joints and u either fixed (`turning` null), turned by the
   * inboard joints, or (`tool`) by the outboard ones. `turn`: width of a further free turn of u.
   */
  protected addPull(
    weight: number,
    mass: number,
    x: TurnedVector,
    u: Flat,
    turning: TurnedVector | null,
    turn: number,
    tool: boolean,
  ): void {
    const { alpha, beta, n, size, slope, bend, vectors, pull, across, turned, crossed, half } = this;
    const { innermost, outermost, joint, axis } = vectors;
    // y = weight (mass α + β × x), p = weight u × β
    const y = crossed;
    crossAt(y, 0, beta, 0, x.at, 0);
    for (let k = 0; k < 3; k++) y[k] = weight * (y[k]! + mass * alpha[k]!);
    crossAt(pull, 0, u, 0, beta, 0);
    for (let k = 0; k < 3; k++) pull[k]! *= weight;
    this.value += dot(y, 0, u, 0);
    for (let o = joint; o < outermost; o++) {
      slope[o]! += dot(x.slope, 3 * o, pull, 0);
      crossAt(across, 3 * o, pull, 0, axis, 3 * o);
      for (let k = o; k < outermost; k++) add(bend, size, o, k, dot(x.slope, 3 * k, across, 3 * o));
    }
    if (turning && !tool) {
      for (let j = innermost; j < joint; j++) {
        slope[j]! += dot(turning.slope, 3 * j, y, 0);
        crossAt(turned, 3 * j, turning.slope, 3 * j, beta, 0);
        for (let o = joint; o < outermost; o++) add(bend, size, j, o, weight * dot(x.slope, 3 * o, turned, 3 * j));
        crossAt(across, 3 * j, axis, 3 * j, y, 0);
        for (let k = innermost; k <= j; k++) add(bend, size, k, j, dot(turning.slope, 3 * k, across, 3 * j));
      }
    }
    if (turning && tool) {
      for (let o = joint; o < outermost; o++) {
        slope[o]! += dot(turning.slope, 3 * o, y, 0);
        // (β × x_k)·u_o = x_k·(u_o × β)
        crossAt(turned, 3 * o, turning.slope, 3 * o, beta, 0);
        crossAt(across, 3 * o, y, 0, axis, 3 * o);
      }
      for (let o = joint; o < outermost; o++) {
        for (let k = o; k < outermost; k++) {
          const mixed = weight * (dot(x.slope, 3 * k, turned, 3 * o) + dot(x.slope, 3 * o, turned, 3 * k));
          add(bend, size, o, k, mixed + dot(turning.slope, 3 * k, across, 3 * o));
        }
      }
    }
    for (let t = 0; t < 2; t++) {
      if (half[n + t] === 0) continue;
      const d = 3 + 3 * t;
      crossAt(crossed, 3, beta, d, x.at, 0);
      for (let k = 0; k < 3; k++) crossed[3 + k] = weight * (crossed[3 + k]! + mass * alpha[d + k]!);
      slope[n + t]! += dot(crossed, 3, u, 0);
      crossAt(crossed, 6, u, 0, beta, d);
      for (let o = joint; o < outermost; o++) add(bend, size, o, n + t, weight * dot(x.slope, 3 * o, crossed, 6));
      if (turning) {
        const from = tool ? joint : innermost;
        const to = tool ? outermost : joint;
        for (let k = from; k < to; k++) add(bend, size, k, n + t, dot(turning.slope, 3 * k, crossed, 3));
      }
      for (let s = 0; s <= t; s++) {
        if (half[n + s] === 0) continue;
        const dd = 9 + 3 * (s + t);
        crossAt(crossed, 3, beta, dd, x.at, 0);
        for (let k = 0; k < 3; k++) crossed[3 + k] = weight * (crossed[3 + k]! + mass * alpha[dd + k]!);
        add(bend, size, n + s, n + t, dot(crossed, 3, u, 0));
      }
    }
    this.addRest(weight, mass, x, turning, turn, tool, Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY);
  }

  /**
   * Remainders of the term just added, from the series of its factors; `crossMost` bounds |u × β| over the box, `crossNorm` the norm of
   * e → u × P_mᵀ e where u is fixed.
   */
  protected addRest(
    weight: number,
    mass: number,
    x: TurnedVector,
    turning: TurnedVector | null,
    turn: number,
    tool: boolean,
    crossMost: number,
    crossNorm: number,
  ): void {
    const { seriesA: A, seriesB: B, seriesV: V, product: BX, product2: BU, cubic, n, vectors } = this;
    const { innermost, outermost, joint } = vectors;
    const X = x.series;
    if (!turning) for (let k = 0, power = 1; k < ORDERS; k++, power *= turn / k) V[k] = power;
    const U = turning ? turning.series : V;
    for (let k = 0; k < ORDERS; k++) {
      let bx = mass * A[k]!;
      let bu = 0;
      for (let m = 0; m <= k; m++) {
        bx += B[m]! * X[k - m]!;
        bu += B[m]! * U[k - m]!;
      }
      BX[k] = bx;
      BU[k] = bu;
    }
    // (β × x)·u = x·(u × β)
    BU[0] = Math.min(BU[0]!, crossMost);
    const width = this.half[n]! + this.half[n + 1]!;
    if (crossNorm < this.momentNorm) {
      for (let k = 1, power = width; k < ORDERS; k++, power *= width / k) BU[k] = crossNorm * power;
    }
    const second = mass * (A[2]! * U[0]! + A[1]! * U[1]! + A[0]! * U[2]!);
    this.rest2 += weight * (second + BU[0]! * X[2]! + BU[1]! * X[1]! + BU[2]! * X[0]!);
    this.scale += weight * BX[0]!;
    for (let o = joint; o < outermost; o++) {
      const w = ORDERS * o;
      let sum = 0;
      for (let k = 1; k < ORDERS; k++) {
        sum += BU[3 - k]! * x.widening[w + k]!;
        if (tool && turning) sum += BX[3 - k]! * turning.widening[w + k]!;
      }
      cubic[o]! += weight * sum;
    }
    if (turning && !tool) {
      for (let j = innermost; j < joint; j++) {
        let sum = 0;
        for (let k = 1; k < ORDERS; k++) sum += BX[3 - k]! * turning.widening[ORDERS * j + k]!;
        cubic[j]! += weight * sum;
      }
    }
    // by the width of e: d(A_k) = norm width^(k-1)/(k-1)!
    let sum = 0;
    for (let k = 1, power = 1; k < ORDERS; power *= width / k, k++) {
      let ux = 0;
      for (let m = 0; m <= 3 - k; m++) ux += X[m]! * U[3 - k - m]!;
      sum += power * (mass * this.forceNorm * U[3 - k]! + Math.min(this.momentNorm, crossNorm) * ux);
    }
    cubic[n]! += weight * sum;
    cubic[n + 1]! += weight * sum;
    if (turning) return;
    let byTurn = 0;
    for (let k = 1, power = 1; k < ORDERS; power *= turn / k, k++) byTurn += power * BX[3 - k]!;
    this.restByTurn = weight * byTurn;
  }

  protected expand(lever: Lever, weight: number, mass: number, x: TurnedVector): void {
    lever.expand(weight, mass, x, this, this.vectors, this.active, this.activeCount, this.half);
  }

  /** Adds weight ‖mass α + β × x‖: the pull of a direction that turns to where it does most. */
  protected addFree(weight: number, mass: number, x: TurnedVector): void {
    const { free, half, active, activeCount, size, slope, bend, slopeRest, cubic, freeLever: lever } = this;
    this.expand(lever, weight, mass, x);
    const { length, aside, bent, left } = lever;
    this.value += length;
    if (!(left > STEADY_FREE * length)) {
      // It may turn anywhere: its length alone.
      this.added += lever.most + bent;
      this.scale += length;
      for (let a = 0; a < activeCount; a++) {
        const k = active[a]!;
        slopeRest[k] = Number.POSITIVE_INFINITY;
        this.cost[k]! += COST.rough * half[k]! * length3(lever.slope, 3 * k) + COST.bent * lever.share[k]!;
      }
      return;
    }
    for (let k = 0; k < 3; k++) free[k] = lever.at[k]! / length;
    const turn = Math.atan2(aside + bent, left);
    crossAt(this.crossed, 0, free, 0, this.beta, 0);
    const crossMost = length3(this.crossed, 0) + this.seriesB[0]! * turn + this.seriesB[1]!;
    this.addRest(weight, mass, x, null, turn, false, crossMost, Number.POSITIVE_INFINITY);
    // the turn itself is at most Σ x_k (own share) plus the bent part
    const share = (this.restByTurn * turn) / (aside + bent || 1);
    this.rest3 += (share * bent) / 3;
    for (let a = 0; a < activeCount; a++) {
      const j = active[a]!;
      const by = dot(lever.slope, 3 * j, free, 0);
      slope[j]! += by;
      const own = Math.sqrt(Math.max(0, dot(lever.slope, 3 * j, lever.slope, 3 * j) - by * by));
      slopeRest[j]! += (this.restByTurn * own) / length;
      cubic[j]! += share * own;
      for (let b = a; b < activeCount; b++) {
        const k = active[b]!;
        const across = dot(lever.slope, 3 * j, lever.slope, 3 * k) - by * dot(lever.slope, 3 * k, free, 0);
        add(bend, size, j, k, dot(lever.bend, 3 * (j * size + k), free, 0) + across / length);
      }
    }
  }

  /** The bound from what the terms have left: the largest over the planes of the support. */
  protected close(): number {
    const { active, activeCount, slope, bend, slopeRest, size, planeCount, planes, lever } = this;
    const blur = ROUNDING * this.scale;
    for (let a = 0; a < activeCount; a++) slopeRest[active[a]!]! += this.cubic[active[a]!]! + blur;
    let most: number;
    if (planeCount === 0) most = this.value + this.rise(slope, bend, 1);
    else {
      const { planeSlope, planeBend } = this;
      most = Number.NEGATIVE_INFINITY;
      for (let p = 0; p < planeCount; p++) {
        const u = 3 * p;
        for (let a = 0; a < activeCount; a++) {
          const j = active[a]!;
          planeSlope[j] = slope[j]! + dot(planes, u, lever.slope, 3 * j);
          for (let b = a; b < activeCount; b++) {
            const k = active[b]!;
            const value = bend[j * size + k]! + dot(planes, u, lever.bend, 3 * (j * size + k));
            planeBend[j * size + k] = value;
            planeBend[k * size + j] = value;
          }
        }
        const here = this.value + dot(planes, u, lever.at, 0) + this.rise(planeSlope, planeBend, 1 / planeCount);
        if (!(here <= most)) most = here;
      }
      if (planeCount === 1) {
        this.value += dot(planes, 0, lever.at, 0);
        slope.set(planeSlope);
        bend.set(planeBend);
      } else {
        // Where several planes meet only the support at the middle is known; without slopes the box is not shrunk.
        this.value += this.planeTop();
        for (let a = 0; a < activeCount; a++) slopeRest[active[a]!] = Number.POSITIVE_INFINITY;
      }
    }
    const bound = most + this.added + ROUNDING * (this.scale + Math.abs(most) + this.added);
    return Number.isFinite(bound) ? bound : Number.POSITIVE_INFINITY;
  }

  /** Support at the middle, from the planes that meet there. */
  protected planeTop(): number {
    return dot(this.planes, 0, this.lever.at, 0);
  }

  /** The most that the linear and quadratic model with its remainder rises from the middle; costs are added with `share`. */
  protected rise(slope: Flat, bend: Flat, share: number): number {
    const { active, activeCount, half, size, cubic, cost } = this;
    let linear = this.rest2;
    let quadratic = this.rest3;
    for (let a = 0; a < activeCount; a++) {
      const k = active[a]!;
      const rho = half[k]!;
      let mixed = 0;
      for (let b = 0; b < activeCount; b++) {
        const j = active[b]!;
        if (j !== k) mixed += Math.abs(bend[k * size + j]!) * half[j]!;
      }
      const g = Math.abs(slope[k]!) * rho;
      const own = bend[k * size + k]! * rho * rho;
      const rest = rho * cubic[k]!;
      mixed *= rho;
      linear += g;
      quadratic += mostOf(g, (own + mixed) / 2, rest / 3);
      const loss = COST.slope * g + COST.mixed * mixed + COST.hollow * Math.max(0, own) + COST.rest * rest;
      cost[k]! += share * loss;
    }
    return Math.min(linear, quadratic);
  }
}
