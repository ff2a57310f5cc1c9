/**
 * A convex, positively homogeneous function on directions that does not change when the direction turns about z: a lazy table over
 * the half-plane (ρ, z), ρ ≥ 0. As in SphereTable a look-up never lies below the function; one dimension less lets the nodes stand closer.
 */
export class PolarTable {
  private readonly cells: number;
  private readonly fill: (rho: number, z: number) => number;
  /** Nodes along ρ from 0 to 1 at z = 1, then z from 1 to -1 at ρ = 1, then ρ from 1 to 0 at z = -1. NaN until asked for. */
  private readonly nodes: Float64Array;
  filled = 0;

  /** `cells` per unit length of the half square. */
  constructor(cells: number, fill: (rho: number, z: number) => number) {
    this.cells = cells;
    this.fill = fill;
    this.nodes = new Float64Array(4 * cells + 1).fill(Number.NaN);
  }

  /** Upper bound at a direction of any length, ρ ≥ 0. */
  at(rho: number, z: number): number {
    const n = this.cells;
    let major: number;
    let place: number;
    if (z >= rho) {
      major = z;
      place = (rho / z) * n;
    } else if (-z >= rho) {
      major = -z;
      place = (4 + rho / z) * n;
    } else {
      major = rho;
      place = (2 - z / rho) * n;
    }
    if (!(major > 0)) return major === 0 ? 0 : Number.NaN;
    let j = place | 0;
    if (j > 4 * n - 1) j = 4 * n - 1;
    const low = this.node(j);
    return major * (low + (place - j) * (this.node(j + 1) - low));
  }

  private node(j: number): number {
    const value = this.nodes[j]!;
    return Number.isNaN(value) ? this.compute(j) : value;
  }

  private compute(j: number): number {
    const n = this.cells;
    const value = j <= n ? this.fill(j / n, 1) : j <= 3 * n ? this.fill(1, 2 - j / n) : this.fill(4 - j / n, -1);
    this.nodes[j] = value;
    this.filled++;
    return value;
  }
}
