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
import { crossedNorm } from './branchBoundAlgebra.ts';
import { crossAt, length3, ORDERS, type TurnedVector } from './branchBoundChain.ts';
import type { InboardDirections } from './branchBoundInboard.ts';
import { BoxTerms, COST } from './branchBoundTerms.ts';
import { WRENCH } from './chain.ts';

/** Corner of a hexagon over its inner radius, with room for rounding; its six directions. */
const CORNER = (2 / Math.sqrt(3)) * (1 + 1e-9);
const COS6 = Array.from({ length: 6 }, (_, k) => Math.cos((k * Math.PI) / 3));
const SIN6 = Array.from({ length: 6 }, (_, k) => Math.sin((k * Math.PI) / 3));

/** A lever that may shrink to less than this share of what it can go across may point anywhere. */
const STEADY_SUPPORT = 0.35;

export class BoxBound extends BoxTerms {
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
    const { vectors, lever, active, activeCount, half, crossed } = this;
    const { moment, mass } = vectors;
    const B = this.seriesB[0]!;
    this.expand(lever, g, mass, moment);
    const held = g * moment.ball * B;
    this.scale += g * (mass * this.seriesA[0]! + B * moment.series[0]!);
    if (moment.ball > 0) this.spread(g * B, vectors.spreadMoment);
    if (inboard.count > 0 && !(lever.left - held > STEADY_SUPPORT * (lever.aside + lever.bent + held))) {
      // y may point anywhere: its support is at most the sum of the supports of its parts
      this.value += inboard.most(lever.at, 0, 0);
      this.added += lever.bent + held;
      for (let a = 0; a < activeCount; a++) {
        const k = active[a]!;
        for (let c = 0; c < 3; c++) crossed[c] = -lever.slope[3 * k + c]!;
        const rise = half[k]! * Math.max(inboard.most(lever.slope, 3 * k, 0), inboard.most(crossed, 0, 0));
        this.added += rise;
        this.slopeRest[k] = Number.POSITIVE_INFINITY;
        this.cost[k]! += COST.rough * rise + COST.bent * lever.share[k]!;
      }
      return;
    }
    this.added += held;
    this.unsettle(held, g * moment.ball * this.momentNorm);
    this.setPlanes(inboard, (lever.aside + lever.bent + held) / (lever.left - held));
    // series of y, the direction being held
    const width = half[this.n]! + half[this.n + 1]!;
    let crossMost = 0;
    let crossNorm = 0;
    // planes of a support may be steeper than a direction
    let steep = 1;
    for (let p = 0; p < this.planeCount; p++) {
      const norm = crossedNorm(this.form, this.planes, 3 * p, crossed);
      crossNorm = Math.max(crossNorm, norm);
      steep = Math.max(steep, length3(this.planes, 3 * p));
      crossAt(crossed, 0, this.planes, 3 * p, this.beta, 0);
      crossMost = Math.max(crossMost, length3(crossed, 0) + norm * width);
    }
    this.addRest(g * steep, mass, moment, null, 0, false, crossMost / steep, crossNorm / steep);
  }

  /** How much of the last bound may be the overshoot of the tables of gravity's directions. */
  overshoot(pose: Flat): number {
    const { inboard, lever, level } = this;
    if (!inboard || this.gravity === 0) return 0;
    return inboard.most(lever.at, 0, level) - inboard.follow(lever.at, pose, Math.min(level, 1));
  }

  private setPlanes(inboard: InboardDirections, spread: number): void {
    const { planes, corners } = this;
    const { at, length } = this.lever;
    if (inboard.count === 0) {
      planes.set(inboard.fixed);
      this.planeCount = 1;
      return;
    }
    // an orthonormal pair across y, and the support at y and at six corners whose hexagon holds the cone
    const yx = at[0]! / length;
    const yy = at[1]! / length;
    const yz = at[2]! / length;
    const flat = Math.abs(yz) < 0.7;
    const size = flat ? Math.sqrt(yx * yx + yy * yy) : Math.sqrt(yy * yy + yz * yz);
    const px = flat ? yy / size : 0;
    const py = flat ? -yx / size : yz / size;
    const pz = flat ? 0 : -yy / size;
    const qx = yy * pz - yz * py;
    const qy = yz * px - yx * pz;
    const qz = yx * py - yy * px;
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
      if (toolForce.ball > 0) {
        this.addFree(P * toolForce.ball, 1, tip);
        this.spread(P * this.reachOf(1, tip), vectors.spreadTool);
      }
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
}
