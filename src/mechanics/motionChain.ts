/**
 * What one linear function of a joint load is made of, over a box of angles, for an arm in motion.
 *
 * A linear function α·f + β·m of the load on joint i is the work that all forces outboard would do if everything outboard of the joint
 * moved as one body with the twist (α, β): a point at p with w = α + β × (p - o_i). With F = Σ m w and K = Σ m r wᵀ (r from the origin of the
 * joint looked at, its frame),
 *
 *     weight              g · F                                          at the base
 *     q̈_j                 A_j  = -z · Σ m r × w = K_yx - K_xy
 *     q̇_k²                C_kk = K_xx + K_yy
 *     q̇_j q̇_k, j < k      C_jk = 2 z_j · c_k,    c_k = -(K - tr K) z_k = (-K_xz, -K_yz, K_xx + K_yy)
 *
 * each over what stands outboard of both joints. The rates follow from an acceleration z_j × (z_k × r) of a point (`freeLoadsPose.ts`):
 * -w·(z_j × (z_k × r)) = -z_j · (r (w·z_k) - z_k (r·w)). Outboard of joint i, K follows from mass, first moment h and second moment S outboard of
 * the joint looked at, which depend on the angles from there outward, and the twist there, which depends on those between:
 * F = M w + β × h, K = h wᵀ + Σ m r (β × r)ᵀ. Inboard of it F and K are carried on. Own derivation; held against the recursion.
 */
import { type Flat, multiply33, rotateBack3 } from '../math/vector.ts';
import type { Chain, ChainCase } from './chain.ts';
import { pairCount, pairIndex } from './freeLoadsPose.ts';
import { Series, type SeriesBox, turnMatrixSeries, turnSeries } from './motionSeries.ts';
import {
  addAlong,
  addCross,
  addEntry,
  addOuter,
  addOuterBack,
  addPart,
  addProductCross,
  addToPart,
  secondMoments,
  setRateVector,
} from './motionTerms.ts';

/** How an angle is taken in a box: its variable, or -1 with the half width that is not expanded. */
export interface BoxAngles {
  readonly middle: Flat;
  readonly variable: Int32Array;
  readonly half: Flat;
}

export class MotionChain {
  /** What standing still gives: weight and a tip force of known direction. */
  readonly still: Series;
  /** Virtual velocity of the tip origin in the housing frame, for a tip force free to point anywhere. */
  readonly tip: Series;
  /** By joint and pair of joints, times the limits of the case. */
  readonly accel: readonly Series[];
  readonly rate: readonly Series[];
  /** How much the remainder of the sum may owe to the width of each angle. [n] */
  readonly blame: Flat;
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly joint: number;
  private readonly inLink: boolean;
  private readonly second: Flat;
  private readonly outMass: Flat;
  private readonly turn: Flat;
  private readonly middleTurn: Flat;
  /** Gravity in the frame of the first joint at its middle. */
  private readonly down: Flat;
  /** The twist in the housing frame of each joint from `joint` on. */
  private readonly w: readonly Series[];
  private readonly beta: readonly Series[];
  /** First and second moment outboard, about the origin of the joint reached. */
  private readonly h: Series;
  private readonly S: Series;
  private readonly reach: Series;
  private readonly F: Series;
  private readonly K: Series;
  private readonly c: readonly Series[];
  /** Weights of remainders, for `blame` alone. */
  private readonly forceWeight: number;
  private readonly momentWeight: number;
  private betaSize = 0;
  private twistSize = 0;

  /**
   * `variables`: most of them in a box. `inLink`: the twist is given in the link's frame, for forms that are the same all round the axis; then the
   * joint's own angle turns no more than what comes from inboard.
   */
  constructor(chain: Chain, load: ChainCase, joint: number, variables: number, inLink: boolean) {
    const { n } = chain;
    this.inLink = inLink;
    const list = (count: number, width: number) => Array.from({ length: count }, () => new Series(width, variables));
    this.chain = chain;
    this.load = load;
    this.joint = joint;
    this.still = new Series(1, variables);
    this.tip = new Series(3, variables);
    this.accel = list(n, 1);
    this.rate = list(pairCount(n), 1);
    this.blame = new Float64Array(n);
    this.second = secondMoments(load, n);
    this.outMass = new Float64Array(n);
    this.turn = new Float64Array(9 * n);
    this.middleTurn = new Float64Array(9);
    this.down = new Float64Array(3);
    this.w = list(n, 3);
    this.beta = list(n, 3);
    this.h = new Series(3, variables);
    this.S = new Series(9, variables);
    this.reach = new Series(3, variables);
    this.F = new Series(3, variables);
    this.K = new Series(9, variables);
    this.c = list(n, 3);
    let accels = 0;
    let speeds = 0;
    let far = 0;
    for (let k = n - 1; k >= 0; k--) {
      this.outMass[k] = load.mass[k]! + (k + 1 < n ? this.outMass[k + 1]! : 0);
      accels += load.accel?.[k] ?? 0;
      speeds += load.speed?.[k] ?? 0;
      far += Math.hypot(chain.origin[3 * k]!, chain.origin[3 * k + 1]!, chain.origin[3 * k + 2]!);
    }
    this.momentWeight = accels + speeds * speeds;
    this.forceWeight = Math.hypot(...chain.gravity) + this.momentWeight * far;
  }

  /** Fills everything for the twist (alpha, beta), series in the housing frame of the joint, or in its link's. */
  fill(box: SeriesBox, angles: BoxAngles, alpha: Series, beta: Series): void {
    const { chain, joint, load, still, turn, middleTurn, w, beta: b } = this;
    this.blame.fill(0);
    still.clear();
    for (let k = 0; k < chain.n; k++) {
      const c = Math.cos(angles.middle[k]!);
      const s = Math.sin(angles.middle[k]!);
      middleTurn.set([c, -s, 0, s, c, 0, 0, 0, 1]);
      multiply33(turn, 9 * k, chain.rotation, 9 * k, middleTurn, 0);
      if (k !== joint) continue;
      if (this.inLink) {
        w[k]!.copy(alpha);
        b[k]!.copy(beta);
        continue;
      }
      turnSeries(w[k]!, alpha, middleTurn, 0, true);
      turnSeries(b[k]!, beta, middleTurn, 0, true);
    }
    this.betaSize = Math.hypot(beta.c[0]!, beta.c[1]!, beta.c[2]!);
    this.twistSize = this.betaSize + Math.hypot(alpha.c[0]!, alpha.c[1]!, alpha.c[2]!);
    for (let k = joint; k < chain.n; k++) this.passOutward(box, angles, k);
    this.gather(box, angles);
    this.carry(box, angles);
    if (load.force === 'base') addAlong(still, this.tip, load.forceUnit, load.magnitude);
  }

  /** Whether the twist and what stands outboard of joint k are both given in its link's frame, so that its angle turns neither. */
  private standsStill(k: number): boolean {
    return this.inLink && k === this.joint;
  }

  /** Turns a vector by how far joint k stands off its middle. Returns what the remainder grows by. */
  private swing(box: SeriesBox, angles: BoxAngles, k: number, v: Series, side: 1 | -1): number {
    const variable = angles.variable[k]!;
    if (variable >= 0) return box.swing(v, variable, side);
    return angles.half[k]! > 0 ? box.blur(v, angles.half[k]!) : 0;
  }

  private swingMatrix(box: SeriesBox, angles: BoxAngles, k: number, m: Series): number {
    const variable = angles.variable[k]!;
    if (variable >= 0) return box.swingMatrix(m, variable);
    return angles.half[k]! > 0 ? box.blurMatrix(m, angles.half[k]!) : 0;
  }

  /** Takes the twist past the angle of joint k to the next joint, and past the last to a tip force fixed in the tool. */
  private passOutward(box: SeriesBox, angles: BoxAngles, k: number): void {
    const { chain, load, tip, reach, turn, blame } = this;
    const last = k === chain.n - 1;
    if (last && load.force !== 'tool') return;
    const [w, b] = last ? [tip, reach] : [this.w[k + 1]!, this.beta[k + 1]!];
    w.copy(this.w[k]!);
    b.copy(this.beta[k]!);
    if (!this.standsStill(k)) {
      blame[k]! += this.forceWeight * this.outMass[k]! * this.swing(box, angles, k, w, -1);
      blame[k]! += this.momentWeight * this.swing(box, angles, k, b, -1);
    }
    if (last) {
      addCross(tip, b, chain.tipOrigin, 0);
      addAlong(this.still, tip, load.forceUnit, load.magnitude);
      return;
    }
    addCross(w, b, chain.origin, 3 * k + 3);
    turnSeries(w, w, turn, 9 * k + 9, true);
    turnSeries(b, b, turn, 9 * k + 9, true);
  }

  /** From the tip inward to `joint`: the moments outboard, and with the twist there what the joints on the way give. */
  private gather(box: SeriesBox, angles: BoxAngles): void {
    const { chain, load, joint, h, S, reach, blame, turn } = this;
    const { origin } = chain;
    const pointing = load.force === 'any' || load.force === 'base';
    h.clear();
    S.clear();
    reach.clear();
    for (let k = 0; k < 3; k++) reach.c[k] = chain.tipOrigin[k]!;
    for (let m = chain.n - 1; m >= joint; m--) {
      for (let k = 0; k < 3; k++) h.c[k]! += load.first[3 * m + k]!;
      for (let k = 0; k < 9; k++) S.c[k]! += this.second[9 * m + k]!;
      this.passRates(box, angles, m);
      if (!this.standsStill(m)) {
        blame[m]! += this.twistSize * this.forceWeight * this.swing(box, angles, m, h, 1);
        blame[m]! += this.betaSize * this.momentWeight * this.swingMatrix(box, angles, m, S);
        if (pointing) blame[m]! += this.betaSize * load.magnitude * this.swing(box, angles, m, reach, 1);
      }
      this.outboardParts(box, angles, m);
      if (m === joint) break;
      turnSeries(h, h, turn, 9 * m, false);
      turnMatrixSeries(S, turn, 9 * m);
      addOuter(S, origin, 3 * m, h);
      addOuterBack(S, h, origin, 3 * m);
      const M = this.outMass[m]!;
      for (let r = 0; r < 3; r++) {
        const p = origin[3 * m + r]!;
        for (let c = 0; c < 3; c++) S.c[3 * r + c]! += M * p * origin[3 * m + c]!;
        h.c[r]! += M * p;
      }
      turnSeries(reach, reach, turn, 9 * m, false);
      for (let k = 0; k < 3; k++) reach.c[k]! += origin[3 * m + k]!;
    }
    this.standAtJoint(box, pointing);
  }

  /** What joint m ≥ `joint` gives: entries of K = h wᵀ + Σ m r (β × r)ᵀ, of products of what outboard angles turn and what those between do. */
  private outboardParts(box: SeriesBox, angles: BoxAngles, m: number): void {
    const { chain, load, h, S, accel, rate, c, turn, blame } = this;
    const [w, b, A, C, way] = [this.w[m]!, this.beta[m]!, accel[m]!, rate[pairIndex(chain.n, m, m)]!, c[m]!];
    A.clear();
    C.clear();
    way.clear();
    const limit = load.accel?.[m] ?? 0;
    if (limit > 0) {
      box.addProduct(A, 0, h, 1, w, 0, limit);
      box.addProduct(A, 0, h, 0, w, 1, -limit);
      box.addProduct(A, 0, S, 0, b, 2, -limit);
      box.addProduct(A, 0, S, 4, b, 2, -limit);
      box.addProduct(A, 0, S, 2, b, 0, limit);
      box.addProduct(A, 0, S, 5, b, 1, limit);
    }
    const speed = load.speed?.[m] ?? 0;
    if (!(speed > 0)) return;
    box.addProduct(C, 0, h, 0, w, 0, 1);
    box.addProduct(C, 0, h, 1, w, 1, 1);
    box.addProduct(C, 0, S, 2, b, 1, 1);
    box.addProduct(C, 0, S, 5, b, 0, -1);
    if (m > 0) addToPart(way, 2, C);
    C.scale(speed * speed);
    if (m === 0) return;
    box.addProduct(way, 0, h, 0, w, 2, -1);
    box.addProduct(way, 0, S, 1, b, 0, -1);
    box.addProduct(way, 0, S, 0, b, 1, 1);
    box.addProduct(way, 1, h, 1, w, 2, -1);
    box.addProduct(way, 1, S, 4, b, 0, -1);
    box.addProduct(way, 1, S, 1, b, 1, 1);
    if (this.standsStill(m)) blame[m]! += this.momentWeight * this.swing(box, angles, m, way, 1);
    turnSeries(way, way, turn, 9 * m, false);
  }

  /** F, K and the virtual velocity of the tip at `joint`. */
  private standAtJoint(box: SeriesBox, pointing: boolean): void {
    const { joint, h, S, reach, F, K, tip } = this;
    const [w, b] = [this.w[joint]!, this.beta[joint]!];
    F.clear();
    F.add(w, this.outMass[joint]!);
    addProductCross(box, F, b, h);
    K.clear();
    if (joint > 0 && this.momentWeight > 0) {
      for (let r = 0; r < 3; r++) {
        for (let c = 0; c < 3; c++) {
          const [p, q] = [(c + 1) % 3, (c + 2) % 3];
          box.addProduct(K, 3 * r + c, h, r, w, c, 1);
          box.addProduct(K, 3 * r + c, S, 3 * r + q, b, p, 1);
          box.addProduct(K, 3 * r + c, S, 3 * r + p, b, q, -1);
        }
      }
    }
    if (!pointing) return;
    tip.copy(w);
    addProductCross(box, tip, b, reach);
  }

  /** Carries F, K and a tip force fixed in the base from `joint` to the base. */
  private carry(box: SeriesBox, angles: BoxAngles): void {
    const { chain, load, joint, F, K, c, turn, tip, blame, still, down } = this;
    rotateBack3(down, 0, turn, 0, chain.gravity, 0);
    const moving = this.momentWeight > 0;
    for (let m = joint; m >= 0; m--) {
      if (m < joint) {
        if (moving) addOuter(K, chain.origin, 3 * m + 3, F);
        this.ownParts(m);
        this.passRates(box, angles, m);
      }
      const turned = m < joint || this.inLink;
      if (turned) {
        // what gravity does along the first axis does not change with its angle
        if (m === 0) addAlong(still, F, [0, 0, down[2]!], 1);
        blame[m]! += (m === 0 ? Math.hypot(down[0]!, down[1]!) : this.forceWeight) * this.swing(box, angles, m, F, 1);
        if (moving && m > 0) blame[m]! += this.momentWeight * this.swingMatrix(box, angles, m, K);
        if (load.force === 'base') blame[m]! += load.magnitude * this.swing(box, angles, m, tip, 1);
      }
      if (m < joint) {
        c[m]!.clear();
        if (m > 0 && load.speed && load.speed[m]! > 0) {
          setRateVector(c[m]!, K);
          turnSeries(c[m]!, c[m]!, turn, 9 * m, false);
        }
      }
      if (m === 0) addAlong(still, F, turned ? [down[0]!, down[1]!, 0] : down, 1);
      turnSeries(F, F, turn, 9 * m, false);
      if (moving && m > 0) turnMatrixSeries(K, turn, 9 * m);
      if (load.force === 'base') turnSeries(tip, tip, turn, 9 * m, false);
    }
  }

  /** The rates of joint m together with each joint outboard of it, whose vectors then go on inward. */
  private passRates(box: SeriesBox, angles: BoxAngles, m: number): void {
    const { chain, load, rate, c, turn, blame } = this;
    const { speed } = load;
    for (let k = m + 1; k < chain.n; k++) {
      const pair = rate[pairIndex(chain.n, m, k)]!;
      pair.clear();
      if (!speed || speed[k] === 0) continue;
      if (speed[m]! > 0) addPart(pair, c[k]!, 2, 2 * speed[m]! * speed[k]!);
      if (m === 0) continue;
      blame[m]! += this.momentWeight * this.swing(box, angles, m, c[k]!, 1);
      turnSeries(c[k]!, c[k]!, turn, 9 * m, false);
    }
  }

  /** What the acceleration and the square of the speed of a joint inboard of `joint` give: its own angle does not change them. */
  private ownParts(m: number): void {
    const { chain, load, K, accel, rate } = this;
    const own = rate[pairIndex(chain.n, m, m)]!;
    accel[m]!.clear();
    own.clear();
    if (load.accel && load.accel[m]! > 0) {
      addEntry(accel[m]!, K, 3, load.accel[m]!);
      addEntry(accel[m]!, K, 1, -load.accel[m]!);
    }
    if (load.speed && load.speed[m]! > 0) {
      addEntry(own, K, 0, load.speed[m]! ** 2);
      addEntry(own, K, 4, load.speed[m]! ** 2);
    }
  }
}
