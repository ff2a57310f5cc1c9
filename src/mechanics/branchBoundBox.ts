/**
 * Bound of one form of one check over a box of joint angles and of directions e, to second order with a third-order remainder.
 *
 * The form is max over e of e·(P w + c) + l·w + o; e = (cos φ cos θ, cos φ sin θ, sin φ), so a box has n + 2 intervals (those of θ and
 * φ have no width where the form has fewer rows). With α = P_fᵀ e + l_f, β = P_mᵀ e + l_m, M, h, r, u as in `branchBoundChain.ts`,
 *
 *     e·(P w + c) + l·w = g (M α + β × h)·u  +  P (α + β × r)·v  +  e·c
 *
 * with v the tip force's direction. Every factor is turned by its own angles, so the third-order Taylor remainder along any line from the
 * middle is at most the third-order part of the product of the factors' series. A free direction v = N/‖N‖ is an angle too, eliminated from
 * the quadratic model; so is the direction of an error vector of known length.
 *
 *     value ≤ φ + max over the box of ( g·δ + ½ δᵀ K δ ) + remainder,    and also    value ≤ φ + Σ |g_k| ρ_k + second-order remainder
 *
 * K_jk δ_j δ_k ≤ ½ |K_jk| (δ_j² ρ_k/ρ_j + δ_k² ρ_j/ρ_k) leaves one-dimensional parabolas.
 */
import type { Flat } from '../math/vector.ts';
import { BoxChain, crossAt, length3, ORDERS, type TurnedVector } from './branchBoundChain.ts';
import type { InboardDirections } from './branchBoundInboard.ts';
import { type Chain, type ChainCase, WRENCH } from './chain.ts';
import type { Form } from './form.ts';
import { TOP_LEVEL } from './outwardSets.ts';

/** Share of the largest sums that rounding may take. */
const ROUNDING = 1e-12;
/** Corner of a hexagon over its inner radius, with room for rounding; its six directions. */
const CORNER = (2 / Math.sqrt(3)) * (1 + 1e-9);
const COS6 = Array.from({ length: 6 }, (_, k) => Math.cos((k * Math.PI) / 3));
const SIN6 = Array.from({ length: 6 }, (_, k) => Math.sin((k * Math.PI) / 3));

export class BoxBound {
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
  private readonly cubic: Flat;
  /** What each interval's width costs the bound: where to cut. [size] */
  readonly cost: Flat;
  readonly middle: Flat;
  readonly half: Flat;
  /** Intervals in the quadratic model. */
  readonly active: Int32Array;
  activeCount = 0;
  /** Best direction of a free tip force at the middle, housing frame i. [3] */
  readonly free: Flat;
  private readonly load: ChainCase;
  /** Directions of gravity in place of the inboard joints; null where those are intervals of the box. */
  private readonly inboard: InboardDirections | null;
  /** y = g (M α + β × h): at the middle [3], slopes [3·size], curvatures [3·size²]. */
  readonly lever: Flat;
  private readonly leverSlope: Flat;
  private readonly leverBend: Flat;
  /** Linear functions of y that together lie nowhere below its support. [3·6] */
  private readonly planes: Flat;
  private planeCount = 0;
  private readonly corners: Flat;
  private readonly planeSlope: Flat;
  private readonly planeBend: Flat;
  private readonly form: Form;
  private readonly gravity: number;
  /** Weight of (torque - limit), for forms that hold in a torque range. */
  private torqueWeight = 0;
  private torqueLimit = 0;
  private readonly forceNorm: number;
  private readonly momentNorm: number;
  private readonly offsetNorm: number;
  /** e and its derivatives by θ, φ, θθ, θφ, φφ; α and β of each. [3·6] */
  private readonly e: Flat;
  private readonly alpha: Flat;
  private readonly beta: Flat;
  private readonly seriesA: Flat;
  private readonly seriesB: Flat;
  private readonly seriesE: Flat;
  private readonly product: Flat;
  private readonly product2: Flat;
  private readonly seriesV: Flat;
  private readonly pull: Flat;
  private readonly across: Flat;
  private readonly turned: Flat;
  private readonly asideOf: Flat;
  private readonly crossed: Flat;
  /** Second- and third-order remainders, what balls add, and the size of what was summed. */
  private rest2 = 0;
  private rest3 = 0;
  private added = 0;
  private scale = 0;
  /** Slope rest of the last free direction by its own turn. */
  private restByTurn = 0;

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
    this.asideOf = flat(3 * this.size);
    this.crossed = flat(9);
    this.lever = flat(3);
    this.leverSlope = flat(3 * this.size);
    this.leverBend = flat(3 * this.size * this.size);
    this.planes = flat(18);
    this.corners = flat(6);
    this.planeSlope = flat(this.size);
    this.planeBend = flat(this.size * this.size);
    this.forceNorm = operatorNorm(f, 0);
    this.momentNorm = operatorNorm(f, 3);
    this.offsetNorm = Math.hypot(...f.c);
  }

  /** The most that lengths, masses and forces allow for the form, whatever the pose. */
  ceiling(): number {
    const { vectors, load, form: f, gravity } = this;
    const force = this.forceNorm + Math.hypot(f.l[0]!, f.l[1]!, f.l[2]!);
    const moment = this.momentNorm + Math.hypot(f.l[3]!, f.l[4]!, f.l[5]!);
    const weight = gravity * (force * vectors.mass + moment * vectors.longestMoment);
    const tip = load.force === 'none' ? 0 : load.magnitude * (force + moment * vectors.longestTip);
    return weight + tip + this.offsetNorm + Math.abs(f.o);
  }

  /** Adds weight × (torque - limit) to the form: a bound where the torque's side of the limit has the sign of the weight. */
  weighTorque(weight: number, limit: number): void {
    this.torqueWeight = weight;
    this.torqueLimit = limit;
  }

  /** Bound over the box of intervals low[at..], high[at..] ([size], joints, θ, φ). Infinity where anything is not finite. */
  bound(low: Flat, high: Flat, at: number): number {
    const { size, middle, half } = this;
    for (let k = 0; k < size; k++) {
      const a = low[at + k]!;
      const b = high[at + k]!;
      middle[k] = (a + b) / 2;
      half[k] = b > a ? ((b - a) / 2) * (1 + 1e-15) + 1e-16 : 0;
    }
    this.vectors.set(middle, half, this.inboard === null);
    this.setDirections();
    this.listActive();
    this.slope.fill(0);
    this.bend.fill(0);
    this.slopeRest.fill(0);
    this.cubic.fill(0);
    this.cost.fill(0);
    this.rest2 = 0;
    this.rest3 = 0;
    this.added = 0;
    this.planeCount = 0;
    this.addOffset();
    this.addGravity();
    this.addTipForce();
    return this.close();
  }

  /** e, its derivatives, and α and β of each; series of e, α, β. */
  private setDirections(): void {
    const { e, n, middle, half, form: f, alpha, beta, seriesA, seriesB, seriesE } = this;
    const ct = Math.cos(middle[n]!);
    const st = Math.sin(middle[n]!);
    const cp = Math.cos(middle[n + 1]!);
    const sp = Math.sin(middle[n + 1]!);
    const set = (at: number, x: number, y: number, z: number) => {
      e[at] = x;
      e[at + 1] = y;
      e[at + 2] = z;
    };
    set(0, cp * ct, cp * st, sp);
    set(3, -cp * st, cp * ct, 0);
    set(6, -sp * ct, -sp * st, cp);
    set(9, -cp * ct, -cp * st, 0);
    set(12, sp * st, -sp * ct, 0);
    set(15, -cp * ct, -cp * st, -sp);
    for (let d = 0; d < 18; d += 3) {
      for (let k = 0; k < 3; k++) {
        let a = d === 0 ? f.l[k]! : 0;
        let b = d === 0 ? f.l[3 + k]! : 0;
        for (let r = 0; r < f.rows; r++) {
          a += e[d + r]! * f.P[WRENCH * r + k]!;
          b += e[d + r]! * f.P[WRENCH * r + 3 + k]!;
        }
        alpha[d + k] = a;
        beta[d + k] = b;
      }
    }
    beta[2]! += this.torqueWeight;
    const width = half[n]! + half[n + 1]!;
    for (let k = 1, power = 1; k < ORDERS; k++) {
      power *= width / k;
      seriesA[k] = this.forceNorm * power;
      seriesB[k] = this.momentNorm * power;
      seriesE[k] = this.offsetNorm * power;
    }
    seriesA[0] = length3(alpha, 0) + seriesA[1]!;
    seriesB[0] = length3(beta, 0) + seriesB[1]!;
  }

  private listActive(): void {
    const { active, half, n, vectors } = this;
    let count = 0;
    const first = this.inboard ? vectors.joint : vectors.innermost;
    for (let k = first; k < vectors.outermost; k++) if (half[k]! > 0) active[count++] = k;
    if (half[n]! > 0) active[count++] = n;
    if (half[n + 1]! > 0) active[count++] = n + 1;
    this.activeCount = count;
  }

  /** e·c and the constant. */
  private addOffset(): void {
    const { e, n, size, form: f, seriesE, bend, slope, cubic } = this;
    const along = (d: number) => {
      let sum = 0;
      for (let r = 0; r < f.rows; r++) sum += e[d + r]! * f.c[r]!;
      return sum;
    };
    const constant = f.o - (this.torqueWeight === 0 ? 0 : this.torqueWeight * this.torqueLimit);
    this.value = along(0) + constant;
    this.scale = this.offsetNorm + Math.abs(f.o) + Math.abs(this.torqueWeight * this.torqueLimit || 0);
    if (this.offsetNorm === 0) return;
    slope[n] = along(3);
    slope[n + 1] = along(6);
    bend[n * size + n] = along(9);
    bend[n * size + n + 1] = along(12);
    bend[(n + 1) * size + n] = along(12);
    bend[(n + 1) * size + n + 1] = along(15);
    this.rest2 += seriesE[2]!;
    const width = this.half[n]! + this.half[n + 1]!;
    for (const t of [n, n + 1]) cubic[t]! += (this.offsetNorm * width * width) / 2;
  }

  private addGravity(): void {
    const g = this.gravity;
    if (g === 0) return;
    if (this.inboard) {
      this.addSupport(g, this.inboard);
      return;
    }
    const { down, moment, mass } = this.vectors;
    this.addPull(g, mass, moment, down.at, down, 0, false);
    if (down.ball > 0) {
      this.addFree(g * down.ball, mass, moment);
      this.spreadInboard(g * this.reachOf(mass, moment), this.vectors.spreadDown);
    }
    if (moment.ball > 0) {
      // an error of the moment, on u × β
      const most = this.across0(down);
      const loss = g * (moment.ball * (most + down.ball * this.seriesB[0]!));
      this.added += loss;
      this.spread(g * this.seriesB[0]!, this.vectors.spreadMoment);
      this.unsettle(g * moment.ball * this.seriesB[0]!, g * moment.ball * this.momentNorm);
    }
  }

  /**
   * Adds the most of y·u over the directions u that the inboard joints allow, y = g (M α + β × h). Over the box y stays within a cone;
   * the support of u is convex, so over each of six triangles that cover the cone it lies below the plane through its corners.
   */
  private addSupport(g: number, inboard: InboardDirections): void {
    const { vectors, lever, leverSlope, active, activeCount, alpha, beta, n, half, crossed } = this;
    const { moment, mass, axis } = vectors;
    const { seriesA: A, seriesB: B } = this;
    const X = moment.series;
    crossAt(lever, 0, beta, 0, moment.at, 0);
    for (let k = 0; k < 3; k++) lever[k] = g * (lever[k]! + mass * alpha[k]!);
    for (let a = 0; a < activeCount; a++) {
      const k = active[a]!;
      if (k < n) {
        crossAt(leverSlope, 3 * k, beta, 0, moment.slope, 3 * k);
        for (let c = 0; c < 3; c++) leverSlope[3 * k + c]! *= g;
        for (let b = 0; b <= a; b++) {
          const j = active[b]!;
          crossAt(crossed, 0, axis, 3 * j, moment.slope, 3 * k);
          this.leverEntry(j, k, g, 0, 0, crossed);
        }
      } else {
        const d = 3 + 3 * (k - n);
        crossAt(leverSlope, 3 * k, beta, d, moment.at, 0);
        for (let c = 0; c < 3; c++) leverSlope[3 * k + c] = g * (leverSlope[3 * k + c]! + mass * alpha[d + c]!);
        for (let b = 0; b <= a; b++) {
          const j = active[b]!;
          if (j < n) {
            for (let c = 0; c < 3; c++) crossed[c] = moment.slope[3 * j + c]!;
            this.leverEntry(j, k, g, d, 0, crossed);
          } else {
            for (let c = 0; c < 3; c++) crossed[c] = moment.at[c]!;
            this.leverEntry(j, k, g, 9 + 3 * (j - n + k - n), mass, crossed);
          }
        }
      }
    }
    // how far y can be from the middle, along itself and across
    const length = length3(lever, 0);
    let along = 0;
    let aside = 0;
    let most = 0;
    for (let a = 0; a < activeCount; a++) {
      const k = active[a]!;
      const rho = half[k]!;
      const square = dot(leverSlope, 3 * k, leverSlope, 3 * k);
      const by = length > 0 ? dot(leverSlope, 3 * k, lever, 0) / length : 0;
      most += Math.sqrt(square) * rho;
      along += Math.abs(by) * rho;
      aside += Math.sqrt(Math.max(0, square - by * by)) * rho;
    }
    const bent = g * (mass * A[2]! + B[0]! * X[2]! + B[1]! * X[1]! + B[2]! * X[0]!) + g * moment.ball * B[0]!;
    this.scale += g * (mass * A[0]! + B[0]! * X[0]!);
    if (moment.ball > 0) this.spread(g * B[0]!, vectors.spreadMoment);
    const left = length - along - bent;
    if (inboard.count > 0 && !(left > 0.35 * (aside + bent))) {
      const here = inboard.most(lever, 0, 0);
      this.value += here;
      this.added += Math.min(most + bent, length + most + bent - here);
      for (let a = 0; a < activeCount; a++) {
        const k = active[a]!;
        this.slopeRest[k] = Number.POSITIVE_INFINITY;
        this.cost[k]! += half[k]! * length3(leverSlope, 3 * k) + (k < n ? 0 : 0.3 * length * half[k]!);
      }
      return;
    }
    this.added += g * moment.ball * B[0]!;
    this.unsettle(g * moment.ball * B[0]!, g * moment.ball * this.momentNorm);
    this.setPlanes(inboard, length, (aside + bent) / left);
    // series of y, the direction being held
    this.addRest(g, mass, moment, null, 0, false);
  }

  /** Curvature of y by intervals j ≤ k: g (mass α_d + β_d × x). */
  private leverEntry(j: number, k: number, g: number, d: number, mass: number, x: Flat): void {
    const { leverBend, alpha, beta, size } = this;
    const at = 3 * (j * size + k);
    crossAt(leverBend, at, beta, d, x, 0);
    for (let c = 0; c < 3; c++) leverBend[at + c] = g * (leverBend[at + c]! + mass * alpha[d + c]!);
  }

  /** How much of the last bound may be the overshoot of the tables of gravity's directions. */
  overshoot(pose: Flat): number {
    const { inboard, lever, level } = this;
    if (!inboard || this.gravity === 0) return 0;
    return inboard.most(lever, 0, level) - inboard.follow(lever, pose, Math.min(level, 1));
  }

  private setPlanes(inboard: InboardDirections, length: number, spread: number): void {
    const { planes, lever, corners } = this;
    if (inboard.count === 0) {
      planes.set(inboard.fixed);
      this.planeCount = 1;
      return;
    }
    // an orthonormal pair across y, and the support at y and at six corners whose hexagon holds the cone
    const [yx, yy, yz] = [lever[0]! / length, lever[1]! / length, lever[2]! / length];
    const flat = Math.abs(yz) < 0.7;
    const size = flat ? Math.sqrt(yx * yx + yy * yy) : Math.sqrt(yy * yy + yz * yz);
    const [px, py, pz] = flat ? [yy / size, -yx / size, 0] : [0, yz / size, -yy / size];
    const [qx, qy, qz] = [yy * pz - yz * py, yz * px - yx * pz, yx * py - yy * px];
    const radius = spread * CORNER + 1e-9;
    const level = Math.min(this.level, Math.max(0, Math.ceil(Math.log2(0.5 / radius))));
    const point = this.crossed;
    point[0] = yx;
    point[1] = yy;
    point[2] = yz;
    const middle = inboard.most(point, 0, level);
    for (let k = 0; k < 6; k++) {
      const c = radius * COS6[k]!;
      const s = radius * SIN6[k]!;
      point[0] = yx + c * px + s * qx;
      point[1] = yy + c * py + s * qy;
      point[2] = yz + c * pz + s * qz;
      corners[k] = (inboard.most(point, 0, level) - middle) / radius;
    }
    for (let k = 0; k < 6; k++) {
      const a = corners[k]!;
      const b = corners[(k + 1) % 6]!;
      const first = (a - b / 2) / 0.75;
      const second = (b - a / 2) / 0.75;
      const c = first * COS6[k]! + second * COS6[(k + 1) % 6]!;
      const s = first * SIN6[k]! + second * SIN6[(k + 1) % 6]!;
      planes[3 * k] = middle * yx + c * px + s * qx;
      planes[3 * k + 1] = middle * yy + c * py + s * qy;
      planes[3 * k + 2] = middle * yz + c * pz + s * qz;
    }
    this.planeCount = 6;
  }

  private addTipForce(): void {
    const { load, vectors } = this;
    const P = load.magnitude;
    if (load.force === 'none') return;
    const { tip, baseForce, toolForce } = vectors;
    const B = this.seriesB[0]!;
    if (load.force === 'any') {
      this.addFree(P, 1, tip);
      if (tip.ball > 0) this.added += P * tip.ball * B;
    } else if (load.force === 'base') {
      this.addPull(P, 1, tip, baseForce.at, baseForce, 0, false);
      if (baseForce.ball > 0) {
        this.addFree(P * baseForce.ball, 1, tip);
        this.spreadInboard(P * this.reachOf(1, tip), vectors.spreadBase);
      }
      if (tip.ball > 0) this.added += P * tip.ball * (this.across0(baseForce) + baseForce.ball * B);
    } else {
      this.addPull(P, 1, tip, toolForce.at, toolForce, 0, true);
      if (toolForce.ball > 0) this.addFree(P * toolForce.ball, 1, tip);
      if (tip.ball > 0) this.added += P * tip.ball * B;
    }
    if (tip.ball === 0) return;
    this.spread(P * B, vectors.spreadTip);
    this.unsettle(P * tip.ball * B, P * tip.ball * this.momentNorm);
  }

  /** Bound of |u × β| over the box. */
  private across0(u: TurnedVector): number {
    const { crossed, beta, seriesB } = this;
    crossAt(crossed, 0, u.at, 0, beta, 0);
    return Math.min(u.series[0]! * seriesB[0]!, length3(crossed, 0) + u.series[1]! * seriesB[0]! + seriesB[1]!);
  }

  /** Cost of the wide joints outboard. */
  private spread(weight: number, spread: Flat): void {
    for (let o = this.vectors.outermost; o < this.n; o++) this.cost[o]! += weight * spread[o]!;
  }

  private spreadInboard(weight: number, spread: Flat): void {
    for (let j = 0; j < this.vectors.innermost; j++) this.cost[j]! += weight * spread[j]!;
  }

  /** ‖mass α + β × x‖ at the middle. */
  private reachOf(mass: number, x: TurnedVector): number {
    const { crossed, beta, alpha } = this;
    crossAt(crossed, 0, beta, 0, x.at, 0);
    for (let k = 0; k < 3; k++) crossed[k]! += mass * alpha[k]!;
    return length3(crossed, 0);
  }

  /** Balls leave slopes unknown by this much: joints, and e. */
  private unsettle(joints: number, directions: number): void {
    const { slopeRest, n } = this;
    for (let k = 0; k < n; k++) slopeRest[k]! += joints;
    slopeRest[n]! += directions;
    slopeRest[n + 1]! += directions;
  }

  /**
   * Adds weight (mass α + β × x)·u with x turned by the outboard joints and u either fixed (`turning` null), turned by the
   * inboard joints, or (`tool`) by the outboard ones. `turn`: width of a further free turn of u.
   */
  private addPull(
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
    this.addRest(weight, mass, x, turning, turn, tool);
  }

  /** Remainders of the term just added, from the series of its factors. */
  private addRest(
    weight: number,
    mass: number,
    x: TurnedVector,
    turning: TurnedVector | null,
    turn: number,
    tool: boolean,
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
    this.rest2 += weight * (BX[2]! * U[0]! + BX[1]! * U[1]! + BX[0]! * U[2]!);
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
    const width = this.half[n]! + this.half[n + 1]!;
    let sum = 0;
    for (let k = 1, power = 1; k < ORDERS; power *= width / k, k++) {
      let ux = 0;
      for (let m = 0; m <= 3 - k; m++) ux += X[m]! * U[3 - k - m]!;
      sum += power * (mass * this.forceNorm * U[3 - k]! + this.momentNorm * ux);
    }
    cubic[n]! += weight * sum;
    cubic[n + 1]! += weight * sum;
    if (turning) return;
    let byTurn = 0;
    for (let k = 1, power = 1; k < ORDERS; power *= turn / k, k++) byTurn += power * BX[3 - k]!;
    this.restByTurn = weight * byTurn;
  }

  /** Adds weight ‖mass α + β × x‖: the pull of a direction that turns to where it does most. */
  private addFree(weight: number, mass: number, x: TurnedVector): void {
    const { alpha, beta, n, free, half, vectors, asideOf, active, activeCount, size, bend, slopeRest, cubic } = this;
    const { joint } = vectors;
    crossAt(free, 0, beta, 0, x.at, 0);
    for (let k = 0; k < 3; k++) free[k]! += mass * alpha[k]!;
    const length = length3(free, 0);
    // Slopes of N: how far it can turn over the box
    let along = 0;
    let aside = 0;
    let most = 0;
    for (let a = 0; a < activeCount; a++) {
      const k = active[a]!;
      const at = 3 * k;
      if (k < joint) {
        asideOf.fill(0, at, at + 3);
        continue;
      }
      if (k < n) crossAt(asideOf, at, beta, 0, x.slope, at);
      else {
        const d = 3 + 3 * (k - n);
        crossAt(asideOf, at, beta, d, x.at, 0);
        for (let c = 0; c < 3; c++) asideOf[at + c]! += mass * alpha[d + c]!;
      }
      most += length3(asideOf, at) * half[k]!;
      if (!(length > 0)) continue;
      const by = dot(asideOf, at, free, 0) / length;
      along += Math.abs(by) * half[k]!;
      for (let c = 0; c < 3; c++) asideOf[at + c]! -= (by * free[c]!) / length;
      aside += length3(asideOf, at) * half[k]!;
    }
    const { seriesA: A, seriesB: B } = this;
    const X = x.series;
    const bent = mass * A[2]! + B[0]! * X[2]! + B[1]! * X[1]! + B[2]! * X[0]!;
    const left = length - along - bent;
    if (!(left > 0.3 * length)) {
      // It may turn anywhere: its length alone.
      this.value += weight * length;
      this.added += weight * (most + bent);
      this.scale += weight * length;
      for (let a = 0; a < activeCount; a++) {
        const k = active[a]!;
        slopeRest[k] = Number.POSITIVE_INFINITY;
        if (k >= joint) this.cost[k]! += weight * half[k]! * (k < n ? B[0]! * x.widening[ORDERS * k + 1]! : length);
      }
      return;
    }
    for (let k = 0; k < 3; k++) free[k]! /= length;
    const turn = Math.atan2(aside + bent, left);
    this.addPull(weight, mass, x, free, null, turn, false);
    for (let a = 0; a < activeCount; a++) {
      const j = active[a]!;
      for (let b = a; b < activeCount; b++) {
        const k = active[b]!;
        add(bend, size, j, k, (weight / length) * dot(asideOf, 3 * j, asideOf, 3 * k));
      }
      const own = length3(asideOf, 3 * j);
      slopeRest[j]! += (this.restByTurn * own) / length;
      // the turn itself is at most Σ x_k (own share) plus the bent part
      cubic[j]! += (this.restByTurn * turn * own) / (aside + bent);
    }
    this.rest3 += (this.restByTurn * turn * (aside > 0 ? bent / (aside + bent) : 1)) / 3;
  }

  /** The bound from what the terms have left: the largest over the planes of the support. */
  private close(): number {
    const { active, activeCount, slope, bend, slopeRest, size, planeCount, planes, lever, leverSlope, leverBend } =
      this;
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
          planeSlope[j] = slope[j]! + dot(planes, u, leverSlope, 3 * j);
          for (let b = a; b < activeCount; b++) {
            const k = active[b]!;
            const value = bend[j * size + k]! + dot(planes, u, leverBend, 3 * (j * size + k));
            planeBend[j * size + k] = value;
            planeBend[k * size + j] = value;
          }
        }
        const here = this.value + dot(planes, u, lever, 0) + this.rise(planeSlope, planeBend, 1 / planeCount);
        if (!(here <= most)) most = here;
      }
      if (planeCount === 1) {
        this.value += dot(planes, 0, lever, 0);
        slope.set(planeSlope);
        bend.set(planeBend);
      } else {
        // TODO centre
        this.value += this.planeTop();
        for (let a = 0; a < activeCount; a++) slopeRest[active[a]!] = Number.POSITIVE_INFINITY;
      }
    }
    const bound = most + this.added + ROUNDING * (this.scale + Math.abs(most) + this.added);
    return Number.isFinite(bound) ? bound : Number.POSITIVE_INFINITY;
  }

  /** Support at the middle, from the planes that meet there. */
  private planeTop(): number {
    return dot(this.planes, 0, this.lever, 0);
  }

  /** The most that the linear and quadratic model with its remainder rises from the middle; costs are added with `share`. */
  private rise(slope: Flat, bend: Flat, share: number): number {
    const { active, activeCount, half, size, slopeRest, cubic, cost } = this;
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
      const g = Math.abs(slope[k]!);
      const c = bend[k * size + k]! + mixed / rho;
      linear += g * rho;
      quadratic += mostOf(g * rho, (c * rho * rho) / 2, (rho * cubic[k]!) / 3);
      const unknown = Number.isFinite(slopeRest[k]!) ? slopeRest[k]! : 0;
      const loss = g * rho + (mixed * rho) / 2 + Math.max(0, bend[k * size + k]!) * rho * rho + (unknown * rho) / 2;
      cost[k]! += share * loss;
    }
    return Math.min(linear, quadratic);
  }
}

/** Maximum of a x + b x² + c x³ over 0 ≤ x ≤ 1, with a, c ≥ 0. */
function mostOf(a: number, b: number, c: number): number {
  const end = a + b + c;
  if (b >= 0) return end;
  const root = b * b - 3 * a * c;
  if (!(root > 0)) return end;
  const x = a / (-b + Math.sqrt(root));
  return x < 1 ? Math.max(end, x * (a + x * (b + x * c))) : end;
}

function dot(a: Flat, ao: number, b: Flat, bo: number): number {
  return a[ao]! * b[bo]! + a[ao + 1]! * b[bo + 1]! + a[ao + 2]! * b[bo + 2]!;
}

/** Adds to the entry (j, k) of a symmetric matrix. */
function add(matrix: Flat, size: number, j: number, k: number, value: number): void {
  matrix[j * size + k]! += value;
  if (j !== k) matrix[k * size + j]! += value;
}

/** Bound of the norm of three columns of P from `column` on: the root of the largest row sum of P Pᵀ. */
function operatorNorm(f: Form, column: number): number {
  let most = 0;
  for (let r = 0; r < f.rows; r++) {
    let sum = 0;
    for (let s = 0; s < f.rows; s++) {
      let product = 0;
      for (let k = column; k < column + 3; k++) product += f.P[WRENCH * r + k]! * f.P[WRENCH * s + k]!;
      sum += Math.abs(product);
    }
    most = Math.max(most, sum);
  }
  return Math.sqrt(most);
}
