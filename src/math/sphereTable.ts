/**
 * A convex function on directions, tabulated lazily on a cube-sphere so that a look-up never lies below it.
 *
 * The function must be convex and positively homogeneous of degree one: f(a x) = a f(x) for a ≥ 0. Each face of the cube
 * max(|x|,|y|,|z|) = 1 is split into N×N squares of two triangles; inside the cone over a triangle f is at most the linear
 * function through its three corner values (convexity), and linear functions are met exactly. Corner values are computed
 * when first asked for; if the filler returns upper bounds, look-ups are upper bounds too.
 */

const PAGE_BITS = 8;
const PAGE = 1 << PAGE_BITS;

export class SphereTable {
  readonly n: number;
  private readonly fill: (x: number, y: number, z: number) => number;
  private readonly half: number;
  private readonly stride: number;
  /** Corner values, NaN where not yet asked for; six faces of (N+1)² row by row, cut into pages made on demand. */
  private readonly pages: (Float64Array | undefined)[];
  /** Corners computed so far. */
  filled = 0;

  constructor(n: number, fill: (x: number, y: number, z: number) => number) {
    this.n = n;
    this.fill = fill;
    this.half = n / 2;
    this.stride = n + 1;
    this.pages = new Array((6 * this.stride * this.stride + PAGE - 1) >> PAGE_BITS).fill(undefined);
  }

  /** Upper bound of f at (x, y, z), any length; 0 at the origin. */
  at(x: number, y: number, z: number): number {
    const ax = Math.abs(x);
    const ay = Math.abs(y);
    const az = Math.abs(z);
    let face: number;
    let major: number;
    let s: number;
    let t: number;
    if (ax >= ay && ax >= az) {
      face = x > 0 ? 0 : 1;
      major = ax;
      s = y;
      t = z;
    } else if (ay >= az) {
      face = y > 0 ? 2 : 3;
      major = ay;
      s = x;
      t = z;
    } else {
      face = z > 0 ? 4 : 5;
      major = az;
      s = x;
      t = y;
    }
    if (!(major > 0)) return major === 0 ? 0 : Number.NaN;
    const fs = (s / major + 1) * this.half;
    const ft = (t / major + 1) * this.half;
    const last = this.n - 1;
    let j = fs | 0;
    let k = ft | 0;
    if (j > last) j = last;
    if (k > last) k = last;
    const ds = fs - j;
    const dt = ft - k;
    const low = this.corner(face, j, k);
    const high = this.corner(face, j + 1, k + 1);
    if (ds >= dt) {
      const side = this.corner(face, j + 1, k);
      return major * (low + ds * (side - low) + dt * (high - side));
    }
    const side = this.corner(face, j, k + 1);
    return major * (low + dt * (side - low) + ds * (high - side));
  }

  private corner(face: number, j: number, k: number): number {
    const index = (face * this.stride + j) * this.stride + k;
    const page = this.pages[index >> PAGE_BITS];
    if (page !== undefined) {
      const value = page[index & (PAGE - 1)]!;
      if (!Number.isNaN(value)) return value;
    }
    return this.compute(index, face, j, k);
  }

  private compute(index: number, face: number, j: number, k: number): number {
    const s = j / this.half - 1;
    const t = k / this.half - 1;
    const sign = face & 1 ? -1 : 1;
    const axis = face >> 1;
    const value = axis === 0 ? this.fill(sign, s, t) : axis === 1 ? this.fill(s, sign, t) : this.fill(s, t, sign);
    let page = this.pages[index >> PAGE_BITS];
    if (page === undefined) {
      page = new Float64Array(PAGE).fill(Number.NaN);
      this.pages[index >> PAGE_BITS] = page;
    }
    page[index & (PAGE - 1)] = value;
    this.filled++;
    return value;
  }
}
