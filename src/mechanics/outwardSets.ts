/**
 * The sets of first moments that an arm's outboard chains can take, as support functions on the sphere.
 *
 * h_k is the first moment (kg·m) of everything outboard of joint k about its origin, canonical housing frame k; it depends on q_k … q_n alone.
 * Its support function S_k(d) = max over travel of d·h_k obeys, from the tip inward,
 *
 *     L_k(x) = x·b_k + S_{k+1}(Rᵀ x),   b_k = first_k + M_{k+1} p_{k+1}      (link frame k)
 *     S_k(d) = max over q in travel_k of L_k( Rz(q)ᵀ d )
 *
 * S is convex and positively homogeneous, so SphereTable look-ups and ArcMax bounds never lie below it: every value here is an
 * upper bound, tighter with a higher level, exact for the last joint. Nothing is computed before it is asked for.
 */
import { ArcMax } from '../math/arcMax.ts';
import { PolarTable } from '../math/polarTable.ts';
import { SphereTable } from '../math/sphereTable.ts';
import type { Chain } from './chain.ts';

/** Cells along a cube edge at level 0; every level doubles them. */
export const COARSE_CELLS = 8;
export const TOP_LEVEL = 7;
/** Nodes of a polar table for each cell of a sphere table of the same level. */
export const POLAR_RATIO = 4;

/** Mass data that gravity (and a tip force along gravity) acts on; entries as in ChainCase. */
export interface GravityMass {
  /** Canonical link frames, kg and kg·m; the equivalent of a tip force along gravity may be negative. [n], [3n] */
  readonly mass: Float64Array;
  readonly first: Float64Array;
}

export class OutwardSets {
  readonly chain: Chain;
  /** Outboard mass from link k on, kg. [n+1] */
  readonly outboard: Float64Array;
  /** b_k. [3n] */
  readonly lever: Float64Array;
  /** Largest |h_k| that the lengths allow, kg·m. [n+1] */
  readonly reach: Float64Array;
  private readonly levels: LevelledLink[];

  /** `previous`: sets of an earlier layout; those of joints with nothing changed outboard are taken over as they stand. */
  constructor(chain: Chain, masses: GravityMass, previous: OutwardSets | null = null) {
    const { n } = chain;
    this.chain = chain;
    this.outboard = new Float64Array(n + 1);
    this.lever = new Float64Array(3 * n);
    this.reach = new Float64Array(n + 1);
    this.levels = new Array(n);
    for (let k = n - 1; k >= 0; k--) {
      this.outboard[k] = this.outboard[k + 1]! + masses.mass[k]!;
      for (let j = 0; j < 3; j++) {
        const shift = k + 1 < n ? this.outboard[k + 1]! * chain.origin[3 * (k + 1) + j]! : 0;
        this.lever[3 * k + j] = masses.first[3 * k + j]! + shift;
      }
      const own = Math.hypot(this.lever[3 * k]!, this.lever[3 * k + 1]!, this.lever[3 * k + 2]!);
      this.reach[k] = this.reach[k + 1]! + own;
      const made = new LevelledLink(this, k, k + 1 < n ? this.levels[k + 1]! : null);
      // Counted from the tip, so that a joint added at the ground keeps what stands outboard
      const before = previous?.levels[k + (previous?.chain.n ?? 0) - n];
      this.levels[k] = before && made.sameAs(before) ? before : made;
    }
  }

  /** Whether S_k here is S_k of the other: the same data outboard, and so the same tables. */
  shares(k: number, other: OutwardSets): boolean {
    return this.levels[k] === other.levels[k];
  }

  /** Upper bound of S_k(d) at the given level; exact for the last joint. */
  at(k: number, x: number, y: number, z: number, level: number): number {
    return this.levels[k]!.support(x, y, z, level);
  }

  /** Upper bound of L_k(x) at the given level: what joint k carries, seen from its link. */
  beyond(k: number, x: number, y: number, z: number, level: number): number {
    return this.levels[k]!.link(x, y, z, level);
  }

  /** Corner values computed so far, all joints and levels. */
  get filled(): number {
    return this.levels.reduce((sum, link) => sum + link.filled, 0);
  }

  /** Angle of joint k that gives the best value met for S_k(d), with tables of `level`. */
  argument(k: number, x: number, y: number, z: number, level: number): number {
    return this.levels[k]!.argument(x, y, z, level);
  }
}

/** S_k and L_k of one joint. */
class LevelledLink {
  private readonly next: LevelledLink | null;
  private readonly bx: number;
  private readonly by: number;
  private readonly bz: number;
  private readonly r: Float64Array;
  private readonly tables: SphereTable[] = [];
  private readonly polar: PolarTable[] = [];
  private readonly full: boolean;
  private readonly arc: ArcMax;
  private readonly from: number;
  private readonly to: number;
  private readonly cosMiddle: number;
  private readonly sinMiddle: number;
  private readonly cosHalf: number;
  /** By the sine itself: from the cosine a travel of 1e-8 rad would come out as none. */
  private readonly sinHalf: number;
  private readonly reach: number;
  /** Of the arc at work. */
  private dx = 0;
  private dy = 0;
  private dz = 0;
  /** L_k(0,0,±1) at level 0 and a bound of L_k on the unit circle across the axis; NaN until asked for. */
  private up = Number.NaN;
  private down = Number.NaN;

  constructor(sets: OutwardSets, k: number, next: LevelledLink | null) {
    const { chain } = sets;
    this.next = next;
    this.bx = sets.lever[3 * k]!;
    this.by = sets.lever[3 * k + 1]!;
    this.bz = sets.lever[3 * k + 2]!;
    this.r = next ? chain.rotation.slice(9 * (k + 1), 9 * (k + 2)) : new Float64Array(9);
    this.reach = sets.reach[k]!;
    this.full = chain.full[k] === 1;
    this.from = chain.from[k]!;
    this.to = chain.to[k]!;
    this.arc = new ArcMax(this.from, this.to);
    const middle = 0.5 * (this.from + this.to);
    this.cosMiddle = Math.cos(middle);
    this.sinMiddle = Math.sin(middle);
    const half = 0.5 * (this.to - this.from);
    this.cosHalf = half >= Math.PI ? -2 : Math.cos(half);
    this.sinHalf = Math.sin(half);
  }

  sameAs(other: LevelledLink): boolean {
    return (
      this.next === other.next &&
      this.bx === other.bx &&
      this.by === other.by &&
      this.bz === other.bz &&
      this.from === other.from &&
      this.to === other.to &&
      this.full === other.full &&
      this.r.every((v, k) => v === other.r[k])
    );
  }

  get filled(): number {
    return [...this.tables, ...this.polar].reduce((sum, table) => sum + (table?.filled ?? 0), 0);
  }

  support(x: number, y: number, z: number, level: number): number {
    if (this.next === null) return this.last(x, y, z);
    if (this.full) return this.polarTable(level).at(Math.sqrt(x * x + y * y), z);
    return this.table(level).at(x, y, z);
  }

  argument(x: number, y: number, z: number, level: number): number {
    if (this.next !== null) {
      this.search(x, y, z, level);
      return this.arc.arg;
    }
    const p = this.bx * x + this.by * y;
    const r = this.bx * y - this.by * x;
    const peak = Math.atan2(r, p);
    const turned = peak + 2 * Math.PI * Math.ceil((this.from - peak) / (2 * Math.PI) - 1e-12);
    if (turned <= this.to) return Math.max(turned, this.from);
    const value = (q: number) => p * Math.cos(q) + r * Math.sin(q);
    return value(this.from) >= value(this.to) ? this.from : this.to;
  }

  /** The last joint in closed form: max over the travel of p cos q + r sin q. */
  private last(x: number, y: number, z: number): number {
    const p = this.bx * x + this.by * y;
    const r = this.bx * y - this.by * x;
    const size = Math.sqrt(p * p + r * r);
    const along = p * this.cosMiddle + r * this.sinMiddle;
    const base = this.bz * z;
    if (along >= size * this.cosHalf) return base + size;
    const across = Math.abs(r * this.cosMiddle - p * this.sinMiddle);
    // The nearer end of the travel, half its width from the middle
    return base + along * this.cosHalf + across * this.sinHalf;
  }

  private table(level: number): SphereTable {
    let table = this.tables[level];
    if (table === undefined) {
      table = new SphereTable(COARSE_CELLS << level, (x, y, z) => this.search(x, y, z, level));
      this.tables[level] = table;
    }
    return table;
  }

  /** A joint that turns right round makes S_k the same all about its axis. */
  private polarTable(level: number): PolarTable {
    let table = this.polar[level];
    if (table === undefined) {
      table = new PolarTable((POLAR_RATIO * COARSE_CELLS) << level, (rho, z) => this.search(rho, 0, z, level));
      this.polar[level] = table;
    }
    return table;
  }

  private search(x: number, y: number, z: number, level: number): number {
    if (Number.isNaN(this.up)) {
      this.up = this.link(0, 0, 1, 0);
      this.down = this.link(0, 0, -1, 0);
    }
    this.dx = x;
    this.dy = y;
    this.dz = z;
    const kappa = z > 0 ? z * this.down : -z * this.up;
    const sag = Math.sqrt(x * x + y * y) * this.reach;
    return this.arc.run(this, level, kappa, sag, Number.NEGATIVE_INFINITY);
  }

  /** L_k at d turned back by q. */
  at(q: number, level: number): number {
    const c = Math.cos(q);
    const s = Math.sin(q);
    return this.link(c * this.dx + s * this.dy, c * this.dy - s * this.dx, this.dz, level);
  }

  link(x: number, y: number, z: number, level: number): number {
    const own = this.bx * x + this.by * y + this.bz * z;
    if (this.next === null) return own;
    const r = this.r;
    return (
      own +
      this.next.support(
        r[0]! * x + r[3]! * y + r[6]! * z,
        r[1]! * x + r[4]! * y + r[7]! * z,
        r[2]! * x + r[5]! * y + r[8]! * z,
        level,
      )
    );
  }
}
