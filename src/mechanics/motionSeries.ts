/**
 * Quantities of an arm over a box of angles, as polynomials of second degree with a proved remainder:
 *
 *     value(δ) = Σ c_t δ^t + r,    |δ_b| ≤ half_b,    ‖r‖ ≤ rest        (Euclidean norm of the parts)
 *
 * A series has `width` parts: 1 a number, 3 a vector, 9 a matrix of the sort Σ m r wᵀ (row-major, both indices turn with the frame).
 * Variable b brings the terms δ_b, then δ_a δ_b for a ≤ b, so that a series in which only the first `live` variables occur is a prefix.
 *
 * Turning by δ about z is, exactly, I + δ Z - ½ δ² (xy part) + a part of at most |δ|³/6 times the xy part; on a matrix the parts that turn
 * twice as fast count up to eight times. What a product would bring of third degree goes to the remainder. Where an angle is too wide for
 * that, its turn is not expanded: an arc of half width ρ lies in the ball round cos ρ of its middle, of radius sin ρ. Own derivation;
 * held against random angles.
 */
import type { Flat, Numbers } from '../math/vector.ts';

/** Terms of a series in which the first `live` variables occur. */
export function termCount(live: number): number {
  return 1 + live + (live * (live + 1)) / 2;
}

/** Place of the term δ_b. */
export function linearTerm(b: number): number {
  return termCount(b);
}

/** Place of the term δ_a δ_b, a ≤ b. */
export function squareTerm(a: number, b: number): number {
  return termCount(b) + 1 + a;
}

export class Series {
  readonly width: number;
  /** Term t at width·t. */
  readonly c: Flat;
  live = 0;
  rest = 0;

  constructor(width: number, variables: number) {
    this.width = width;
    this.c = new Float64Array(width * termCount(variables));
  }

  clear(): void {
    const count = this.width * termCount(this.live);
    for (let t = 0; t < count; t++) this.c[t] = 0;
    this.live = 0;
    this.rest = 0;
  }

  copy(from: Series): void {
    const old = this.width * termCount(this.live);
    const count = this.width * termCount(from.live);
    // a loop: a view for every copy costs more
    for (let t = 0; t < count; t++) this.c[t] = from.c[t]!;
    for (let t = count; t < old; t++) this.c[t] = 0;
    this.live = from.live;
    this.rest = from.rest;
  }

  /** Makes room for the first `live` variables. Terms behind the present ones are zero. */
  grow(live: number): void {
    if (live > this.live) this.live = live;
  }

  /** this *= factor. */
  scale(factor: number): void {
    const count = this.width * termCount(this.live);
    for (let t = 0; t < count; t++) this.c[t]! *= factor;
    this.rest *= Math.abs(factor);
  }

  /** this += scale · from, of the same width. */
  add(from: Series, scale: number): void {
    this.grow(from.live);
    const count = this.width * termCount(from.live);
    for (let t = 0; t < count; t++) this.c[t]! += scale * from.c[t]!;
    this.rest += Math.abs(scale) * from.rest;
  }
}

/** The variables of a box: half widths, and the most of each product of them. */
export class SeriesBox {
  readonly half: Flat;
  /** By term: most of |δ^t|. */
  readonly reach: Flat;
  /** Degree of each term. */
  readonly degree: Uint8Array;
  count = 0;

  constructor(variables: number) {
    this.half = new Float64Array(variables);
    this.reach = new Float64Array(termCount(variables));
    this.degree = new Uint8Array(termCount(variables));
    this.reach[0] = 1;
    for (let b = 0; b < variables; b++) {
      this.degree[linearTerm(b)] = 1;
      for (let a = 0; a <= b; a++) this.degree[squareTerm(a, b)] = 2;
    }
  }

  start(): void {
    this.count = 0;
  }

  /** Takes a variable in; returns its number. */
  take(half: number): number {
    const b = this.count++;
    this.half[b] = half;
    this.reach[linearTerm(b)] = half;
    for (let a = 0; a <= b; a++) this.reach[squareTerm(a, b)] = half * this.half[a]!;
    return b;
  }

  /** Turns a vector about z by side·δ_b. Returns what the remainder grows by. */
  swing(v: Series, b: number, side: 1 | -1): number {
    const { c } = v;
    const { reach, degree } = this;
    const h = this.half[b]!;
    const count = termCount(v.live);
    let linear = 0;
    let square = 0;
    for (let t = 1; t < count; t++) {
      const size = reach[t]! * Math.sqrt(c[3 * t]! * c[3 * t]! + c[3 * t + 1]! * c[3 * t + 1]!);
      if (degree[t] === 1) linear += size;
      else square += size;
    }
    const x0 = c[0]!;
    const y0 = c[1]!;
    const more = h * square + 0.5 * h * h * linear + (h * h * h * Math.sqrt(x0 * x0 + y0 * y0)) / 6;
    const live = Math.max(v.live, b + 1);
    v.grow(live);
    for (let a = 0; a < live; a++) {
      const from = 3 * linearTerm(a);
      const to = 3 * (a <= b ? squareTerm(a, b) : squareTerm(b, a));
      const x = c[from]!;
      const y = c[from + 1]!;
      c[to]! -= side * y;
      c[to + 1]! += side * x;
    }
    const own = 3 * squareTerm(b, b);
    c[own]! -= 0.5 * x0;
    c[own + 1]! -= 0.5 * y0;
    const to = 3 * linearTerm(b);
    c[to]! -= side * y0;
    c[to + 1]! += side * x0;
    v.rest += more;
    return more;
  }

  /** Turns a vector about z by any angle within ±ρ, without a variable. Returns what the remainder grows by. */
  blur(v: Series, rho: number): number {
    const { c } = v;
    const keep = rho < Math.PI / 2 ? Math.cos(rho) : 0;
    const ball = rho < Math.PI / 2 ? Math.sin(rho) : 1;
    const count = termCount(v.live);
    let size = 0;
    for (let t = 0; t < count; t++) {
      const x = c[3 * t]!;
      const y = c[3 * t + 1]!;
      size += this.reach[t]! * Math.sqrt(x * x + y * y);
      c[3 * t] = keep * x;
      c[3 * t + 1] = keep * y;
    }
    v.rest += ball * size;
    return ball * size;
  }

  /** Turns both indices of a matrix about z by δ_b. Returns what the remainder grows by. */
  swingMatrix(m: Series, b: number): number {
    const { c } = m;
    const { reach, degree } = this;
    const h = this.half[b]!;
    const count = termCount(m.live);
    let linear = 0;
    let square = 0;
    for (let t = 1; t < count; t++) {
      if (degree[t] === 1) linear += reach[t]! * turningSize(c, 9 * t, 1, 16);
      else square += reach[t]! * turningSize(c, 9 * t, 1, 4);
    }
    const more = h * square + 0.5 * h * h * linear + (h * h * h * turningSize(c, 0, 1, 64)) / 6;
    const live = Math.max(m.live, b + 1);
    m.grow(live);
    for (let a = 0; a < live; a++) {
      addTurned(c, 9 * (a <= b ? squareTerm(a, b) : squareTerm(b, a)), 9 * linearTerm(a), 1);
    }
    // half of the second derivative, by its parts: -½ of what turns once, -2 of what turns twice
    const own = 9 * squareTerm(b, b);
    const difference = (c[0]! - c[4]!) / 2;
    const shear = (c[1]! + c[3]!) / 2;
    c[own]! -= 2 * difference;
    c[own + 4]! += 2 * difference;
    c[own + 1]! -= 2 * shear;
    c[own + 3]! -= 2 * shear;
    for (const k of ONCE) c[own + k]! -= 0.5 * c[k]!;
    addTurned(c, 9 * linearTerm(b), 0, 1);
    m.rest += more;
    return more;
  }

  /** Turns both indices of a matrix about z by any angle within ±ρ. Returns what the remainder grows by. */
  blurMatrix(m: Series, rho: number): number {
    const { c } = m;
    const wide = rho >= Math.PI / 2;
    const twice = 2 * rho >= Math.PI / 2;
    const keep1 = wide ? 0 : Math.cos(rho);
    const ball1 = wide ? 1 : Math.sin(rho);
    const keep2 = twice ? 0 : Math.cos(2 * rho);
    const ball2 = twice ? 1 : Math.sin(2 * rho);
    const count = termCount(m.live);
    let size = 0;
    for (let t = 0; t < count; t++) {
      const o = 9 * t;
      size += this.reach[t]! * turningSize(c, o, ball1 * ball1, ball2 * ball2);
      const mean = (c[o]! + c[o + 4]!) / 2;
      const difference = (keep2 * (c[o]! - c[o + 4]!)) / 2;
      const turn = (c[o + 1]! - c[o + 3]!) / 2;
      const shear = (keep2 * (c[o + 1]! + c[o + 3]!)) / 2;
      c[o] = mean + difference;
      c[o + 4] = mean - difference;
      c[o + 1] = shear + turn;
      c[o + 3] = shear - turn;
      for (const k of ONCE) c[o + k]! *= keep1;
    }
    m.rest += size;
    return size;
  }

  /** Most of the parts' norm over the box. */
  most(s: Series): number {
    const { c, width } = s;
    const count = termCount(s.live);
    let sum = s.rest;
    for (let t = 0; t < count; t++) {
      let square = 0;
      for (let k = width * t; k < width * t + width; k++) square += c[k]! * c[k]!;
      sum += this.reach[t]! * Math.sqrt(square);
    }
    return sum;
  }

  /** Most that a number comes to stand off its value at the middle, the remainder included. */
  spread(s: Series): number {
    let sum = s.rest;
    for (let t = 1; t < termCount(s.live); t++) sum += this.reach[t]! * Math.abs(s.c[t]!);
    return sum;
  }

  /** out[place] += scale · a[p] · b[q], each the given part of its series. */
  addProduct(out: Series, place: number, a: Series, p: number, b: Series, q: number, scale: number): void {
    const live = Math.max(a.live, b.live);
    out.grow(live);
    const { degree } = this;
    const { c: ac, width: aw } = a;
    const { c: bc, width: bw } = b;
    const { c: oc, width: ow } = out;
    const a0 = ac[p]!;
    const b0 = bc[q]!;
    oc[place]! += scale * a0 * b0;
    let a1 = 0;
    let a2 = 0;
    let b1 = 0;
    let b2 = 0;
    for (let t = 1; t < termCount(a.live); t++) {
      const v = ac[aw * t + p]!;
      if (v === 0) continue;
      oc[ow * t + place]! += scale * v * b0;
      if (degree[t] === 1) a1 += this.reach[t]! * Math.abs(v);
      else a2 += this.reach[t]! * Math.abs(v);
    }
    for (let t = 1; t < termCount(b.live); t++) {
      const v = bc[bw * t + q]!;
      if (v === 0) continue;
      oc[ow * t + place]! += scale * v * a0;
      if (degree[t] === 1) b1 += this.reach[t]! * Math.abs(v);
      else b2 += this.reach[t]! * Math.abs(v);
    }
    if (a1 > 0 && b1 > 0) {
      for (let k = 0; k < a.live; k++) {
        const v = scale * ac[aw * linearTerm(k) + p]!;
        if (v === 0) continue;
        for (let m = 0; m < b.live; m++) {
          const to = k <= m ? squareTerm(k, m) : squareTerm(m, k);
          oc[ow * to + place]! += v * bc[bw * linearTerm(m) + q]!;
        }
      }
    }
    const most = (Math.abs(a0) + a1 + a2) * b.rest + (Math.abs(b0) + b1 + b2) * a.rest + a.rest * b.rest;
    out.rest += Math.abs(scale) * (a1 * b2 + a2 * b1 + a2 * b2 + most);
  }
}

/** Entries of a matrix with one index along z: they turn as vectors do. */
const ONCE = [2, 5, 6, 7] as const;

/** Norm of the parts of a matrix that turn about z: once (weighed by `once`), and twice as fast (by `twice`). */
function turningSize(c: Numbers, o: number, once: number, twice: number): number {
  const difference = c[o]! - c[o + 4]!;
  const shear = c[o + 1]! + c[o + 3]!;
  const sides = c[o + 2]! ** 2 + c[o + 5]! ** 2 + c[o + 6]! ** 2 + c[o + 7]! ** 2;
  return Math.sqrt(once * sides + 0.5 * twice * (difference * difference + shear * shear));
}

/** Adds the derivative of a matrix by a turn about z, Z K - K Z. */
function addTurned(c: Flat, to: number, from: number, scale: number): void {
  const xx = c[from]!;
  const xy = c[from + 1]!;
  const xz = c[from + 2]!;
  const yx = c[from + 3]!;
  const yy = c[from + 4]!;
  const yz = c[from + 5]!;
  const zx = c[from + 6]!;
  const zy = c[from + 7]!;
  c[to]! -= scale * (yx + xy);
  c[to + 1]! += scale * (xx - yy);
  c[to + 2]! -= scale * yz;
  c[to + 3]! += scale * (xx - yy);
  c[to + 4]! += scale * (xy + yx);
  c[to + 5]! += scale * xz;
  c[to + 6]! -= scale * zy;
  c[to + 7]! += scale * zx;
}

/** Turns every term of a vector by a constant matrix: out = M v, or Mᵀ v. `out` may be `v`. */
export function turnSeries(out: Series, v: Series, m: Numbers, mo: number, back: boolean): void {
  const count = termCount(v.live);
  const row = back ? 1 : 3;
  const column = back ? 3 : 1;
  const a = m[mo]!;
  const b = m[mo + column]!;
  const c = m[mo + 2 * column]!;
  const d = m[mo + row]!;
  const e = m[mo + row + column]!;
  const f = m[mo + row + 2 * column]!;
  const g = m[mo + 2 * row]!;
  const h = m[mo + 2 * row + column]!;
  const i = m[mo + 2 * row + 2 * column]!;
  const from = v.c;
  const to = out.c;
  for (let t = 0; t < 3 * count; t += 3) {
    const x = from[t]!;
    const y = from[t + 1]!;
    const z = from[t + 2]!;
    to[t] = a * x + b * y + c * z;
    to[t + 1] = d * x + e * y + f * z;
    to[t + 2] = g * x + h * y + i * z;
  }
  if (out.live > v.live) to.fill(0, 3 * count, 3 * termCount(out.live));
  out.live = v.live;
  out.rest = v.rest;
}

/** Turns both indices of every term of a matrix: K becomes M K Mᵀ. */
export function turnMatrixSeries(k: Series, m: Numbers, mo: number): void {
  const count = 9 * termCount(k.live);
  const { c } = k;
  const a = m[mo]!;
  const b = m[mo + 1]!;
  const d = m[mo + 2]!;
  const e = m[mo + 3]!;
  const f = m[mo + 4]!;
  const g = m[mo + 5]!;
  const h = m[mo + 6]!;
  const i = m[mo + 7]!;
  const j = m[mo + 8]!;
  for (let t = 0; t < count; t += 9) {
    // rows: N = K Mᵀ, then M N, column by column
    for (let r = t; r < t + 9; r += 3) {
      const x = c[r]!;
      const y = c[r + 1]!;
      const z = c[r + 2]!;
      c[r] = a * x + b * y + d * z;
      c[r + 1] = e * x + f * y + g * z;
      c[r + 2] = h * x + i * y + j * z;
    }
    for (let q = t; q < t + 3; q++) {
      const x = c[q]!;
      const y = c[q + 3]!;
      const z = c[q + 6]!;
      c[q] = a * x + b * y + d * z;
      c[q + 3] = e * x + f * y + g * z;
      c[q + 6] = h * x + i * y + j * z;
    }
  }
}
