/**
 * The directions that gravity can take in housing frame i (or in link frame i, joint i turning too), as a support function
 * N(y) = max over those joints of y·u.
 *
 * u reaches the frame by turning back through the joints inboard of it, which is the chain of an outward set run the other way: `OutwardSets`
 * of a chain whose only first moment is the unit vector u at its end. Look-ups never lie below N (see `outwardSets.ts`).
 */
import { type Flat, IDENTITY33, rotateBack3 } from '../math/vector.ts';
import type { Chain } from './chain.ts';
import { OutwardSets, TOP_LEVEL } from './outwardSets.ts';

/** What of a unit vector across an axis counts as none; bounds are raised by ten times as much. */
const ALONG = 1e-13;

export class InboardDirections {
  /** Joints that turn u; the ones within them, whose axes lie along it, are left out. */
  readonly count: number;
  private readonly first: number;
  /** Gravity's unit direction in the housing of the innermost joint that turns it: in the frame itself where none does. [3] */
  readonly fixed: Flat;
  private readonly sets: OutwardSets | null;
  private readonly rotation: Flat;
  private readonly x = new Float64Array(3);

  /** `inLink`: as seen from link `joint`; else from its housing. */
  constructor(chain: Chain, joint: number, inLink: boolean) {
    const end = inLink ? joint + 1 : joint;
    const g = Math.hypot(...chain.gravity);
    const u = Float64Array.from(chain.gravity, (v) => (g > 0 ? v / g : 0));
    // through the housings of joints that leave it as it is
    let first = 0;
    for (; ; first++) {
      rotateBack3(u, 0, chain.rotation, 9 * first, u, 0);
      if (first === end || Math.hypot(u[0]!, u[1]!) > ALONG) break;
      if (inLink && first === joint) {
        first = end;
        break;
      }
    }
    this.first = first;
    this.count = end - first;
    // from the frame to the link (or housing) of the outermost joint that turns
    this.rotation = inLink ? Float64Array.from(IDENTITY33) : chain.rotation.slice(9 * joint, 9 * joint + 9);
    this.fixed = u;
    this.sets = this.count === 0 ? null : new OutwardSets(reversed(chain, first, end), endDirection(this.count, u));
  }

  /** Upper bound of N(y), y at y[at..] in the frame, tables of `level`; never more than |y|. */
  most(y: Flat, at: number, level: number): number {
    const [a, b, c] = [y[at]!, y[at + 1]!, y[at + 2]!];
    const { sets, fixed, rotation: R } = this;
    if (!sets) return a * fixed[0]! + b * fixed[1]! + c * fixed[2]!;
    const bound = sets.at(
      0,
      R[0]! * a + R[1]! * b + R[2]! * c,
      R[3]! * a + R[4]! * b + R[5]! * c,
      R[6]! * a + R[7]! * b + R[8]! * c,
      Math.min(level, TOP_LEVEL),
    );
    return Math.min(bound, Math.sqrt(a * a + b * b + c * c) * (1 + 4e-16));
  }

  /** Value of y·u for joint angles of the travel that about make it largest; they go to `pose`. Never more than N(y). */
  follow(y: Flat, pose: Flat, level: number): number {
    const { sets, rotation: R, count, x, fixed } = this;
    if (!sets) return y[0]! * fixed[0]! + y[1]! * fixed[1]! + y[2]! * fixed[2]!;
    for (let r = 0; r < 3; r++) x[r] = R[3 * r]! * y[0]! + R[3 * r + 1]! * y[1]! + R[3 * r + 2]! * y[2]!;
    for (let k = 0; k < count; k++) {
      const angle = sets.argument(k, x[0]!, x[1]!, x[2]!, level);
      pose[this.first + count - 1 - k] = -angle;
      const c = Math.cos(angle);
      const s = Math.sin(angle);
      const [a, b, d] = [c * x[0]! + s * x[1]!, c * x[1]! - s * x[0]!, x[2]!];
      x[0] = a;
      x[1] = b;
      if (k + 1 === count) break;
      const T = sets.chain.rotation;
      const o = 9 * (k + 1);
      for (let r = 0; r < 3; r++) x[r] = T[o + r]! * a + T[o + 3 + r]! * b + T[o + 6 + r]! * d;
    }
    return x[0]! * fixed[0]! + x[1]! * fixed[1]! + x[2]! * fixed[2]!;
  }
}

/** Joints first … end-1, innermost last, turning the other way. */
function reversed(chain: Chain, first: number, end: number): Chain {
  const count = end - first;
  const order = Array.from({ length: count }, (_, k) => end - 1 - k);
  const rotation = new Float64Array(9 * count);
  order.forEach((j, k) => {
    if (k === 0) return;
    // joint k of the reversed chain stands where joint j+1 of the chain stands, seen the other way
    for (let r = 0; r < 3; r++) {
      for (let c = 0; c < 3; c++) rotation[9 * k + 3 * r + c] = chain.rotation[9 * (j + 1) + 3 * c + r]!;
    }
  });
  rotation[0] = 1;
  rotation[4] = 1;
  rotation[8] = 1;
  return {
    ...chain,
    n: count,
    names: order.map((j) => chain.names[j]!),
    jointIndex: order,
    origin: new Float64Array(3 * count),
    rotation,
    housing: new Float64Array(9 * count),
    from: Float64Array.from(order, (j) => -chain.to[j]!),
    to: Float64Array.from(order, (j) => -chain.from[j]!),
    full: Uint8Array.from(order, (j) => chain.full[j]!),
    cases: [],
    bodies: [],
  };
}

/** No mass, and the unit vector as the first moment at the end. */
function endDirection(count: number, direction: Flat) {
  const first = new Float64Array(3 * count);
  first.set(direction, 3 * (count - 1));
  return { mass: new Float64Array(count), first };
}
