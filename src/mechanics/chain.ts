/**
 * The flattened arm: what every kernel reads. Constant once built; plain typed arrays, so it travels to workers.
 *
 * Canonical frames. Each joint frame is turned so that its z axis IS the joint axis and its x axis the drive reference
 * (see `housingReference`); so a joint only ever turns about z. Fixed joints are merged into the link before them. `housing`
 * turns a canonical housing-frame vector into the frame of the file. The base frame is the file's.
 */
import type { Arm, Inertia, LoadCase, Placement, Vec3 } from '../arm/arm.ts';
import { cross3, dot3, IDENTITY33, multiply33, multiplyBack33, rotate3 } from '../math/vector.ts';

/** Inertia entries about the link origin, in this order. */
export const INERTIA = { xx: 0, yy: 1, zz: 2, xy: 3, xz: 4, yz: 5, stride: 6 } as const;
/** A wrench: force x y z (N), then moment x y z (N·m). */
export const WRENCH = 6;

export type TipForceKind = 'none' | 'any' | 'base' | 'tool';

/** One load case on the chain, every entry already multiplied by the case's factor. */
export interface ChainCase {
  readonly name: string;
  readonly factor: number;
  /** kg of each link with its merged links and, on the last, the payload. [n] */
  readonly mass: Float64Array;
  /** Mass times centre, canonical link frame, kg·m. [3n] */
  readonly first: Float64Array;
  /** Inertia about the link origin, canonical link frame, kg·m². [6n] */
  readonly inertia: Float64Array;
  readonly force: TipForceKind;
  /** N. */
  readonly magnitude: number;
  /** Unit vector: base frame for `base`, canonical frame of the last link for `tool`. */
  readonly forceUnit: Vec3;
  /** Limits |q̇| rad/s and |q̈| rad/s². [n]; null where the case has no motion. */
  readonly speed: Float64Array | null;
  readonly accel: Float64Array | null;
}

export interface Chain {
  /** Revolute joints, 1 ≤ n. */
  readonly n: number;
  /** Index into `arm.joints` of each. [n] */
  readonly jointIndex: readonly number[];
  readonly names: readonly string[];
  /** Origin of joint i in the canonical frame of link i-1 (base for 0), m. [3n] */
  readonly origin: Float64Array;
  /** Canonical housing frame of joint i to canonical frame of link i-1. [9n] */
  readonly rotation: Float64Array;
  /** Canonical housing frame of joint i to the file's housing frame. [9n] */
  readonly housing: Float64Array;
  /** Travel, rad. [n] */
  readonly from: Float64Array;
  readonly to: Float64Array;
  /** 1 where every angle can be reached. [n] */
  readonly full: Uint8Array;
  /** Tip frame in the canonical frame of the last link: origin m [3], rotation [9]. */
  readonly tipOrigin: Float64Array;
  readonly tipRotation: Float64Array;
  /** m/s², base frame. */
  readonly gravity: Vec3;
  readonly cases: readonly ChainCase[];
  /** For each link (and payload) what stands in it, for shares: name and its mass data in the canonical frame of link `link`. */
  readonly bodies: readonly ChainBody[];
}

export interface ChainBody {
  readonly name: string;
  /** Index of the chain link that carries it. */
  readonly link: number;
  readonly mass: number;
  /** Mass times centre, kg·m. [3] */
  readonly first: Float64Array;
  readonly inertia: Float64Array;
}

/**
 * Unit vector perpendicular to `axis` from which mesh and belt angles count (right-handed about the axis): the joint frame's
 * x axis projected, or its y axis where the joint axis lies within about 26° of x.
 */
export function housingReference(axis: Vec3): Vec3 {
  const pick: Vec3 = Math.abs(axis[0]) < 0.9 ? [1, 0, 0] : [0, 1, 0];
  const along = dot3(pick, 0, axis, 0);
  const x = pick[0] - along * axis[0];
  const y = pick[1] - along * axis[1];
  const z = pick[2] - along * axis[2];
  const length = Math.hypot(x, y, z);
  return [x / length, y / length, z / length];
}

/** Columns reference, axis × reference, axis: canonical to file frame. */
function canonicalFrame(axis: Vec3): Float64Array {
  const [rx, ry, rz] = housingReference(axis);
  const [ax, ay, az] = axis;
  return Float64Array.from([
    rx, ay * rz - az * ry, ax,
    ry, az * rx - ax * rz, ay,
    rz, ax * ry - ay * rx, az,
  ]); // biome-ignore format: a matrix
}

/** A frame standing in another, mutable. */
interface Frame {
  position: Float64Array;
  rotation: Float64Array;
}

function identityFrame(): Frame {
  return { position: new Float64Array(3), rotation: Float64Array.from(IDENTITY33) };
}

function compose(outer: Frame, inner: Placement | Frame): Frame {
  const out = identityFrame();
  rotate3(out.position, 0, outer.rotation, 0, inner.position, 0);
  for (let k = 0; k < 3; k++) out.position[k]! += outer.position[k]!;
  multiply33(out.rotation, 0, outer.rotation, 0, inner.rotation, 0);
  return out;
}

/** Mass data of a body given in its own frame, moved to the canonical link frame that `frame` stands in. */
function bodyIn(
  frame: Frame,
  name: string,
  link: number,
  mass: number,
  centre: Vec3,
  inertia: Inertia | null,
): ChainBody {
  const c = new Float64Array(3);
  rotate3(c, 0, frame.rotation, 0, centre, 0);
  for (let k = 0; k < 3; k++) c[k]! += frame.position[k]!;
  const about = new Float64Array(6);
  if (inertia) {
    const own = [
      inertia.xx,
      inertia.xy,
      inertia.xz,
      inertia.xy,
      inertia.yy,
      inertia.yz,
      inertia.xz,
      inertia.yz,
      inertia.zz,
    ];
    const half = new Float64Array(9);
    const turned = new Float64Array(9);
    multiply33(half, 0, frame.rotation, 0, own, 0);
    const back = Float64Array.from({ length: 9 }, (_, k) => frame.rotation[3 * (k % 3) + Math.floor(k / 3)]!);
    multiply33(turned, 0, half, 0, back, 0);
    about[INERTIA.xx] = turned[0]!;
    about[INERTIA.yy] = turned[4]!;
    about[INERTIA.zz] = turned[8]!;
    about[INERTIA.xy] = turned[1]!;
    about[INERTIA.xz] = turned[2]!;
    about[INERTIA.yz] = turned[5]!;
  }
  const [x, y, z] = [c[0]!, c[1]!, c[2]!];
  about[INERTIA.xx]! += mass * (y * y + z * z);
  about[INERTIA.yy]! += mass * (x * x + z * z);
  about[INERTIA.zz]! += mass * (x * x + y * y);
  about[INERTIA.xy]! -= mass * x * y;
  about[INERTIA.xz]! -= mass * x * z;
  about[INERTIA.yz]! -= mass * y * z;
  return { name, link, mass, first: Float64Array.of(mass * x, mass * y, mass * z), inertia: about };
}

function chainCase(load: LoadCase, n: number, bodies: readonly ChainBody[], tip: Frame): ChainCase {
  const mass = new Float64Array(n);
  const first = new Float64Array(3 * n);
  const inertia = new Float64Array(6 * n);
  const add = (body: ChainBody) => {
    mass[body.link]! += load.factor * body.mass;
    for (let k = 0; k < 3; k++) first[3 * body.link + k]! += load.factor * body.first[k]!;
    for (let k = 0; k < 6; k++) inertia[6 * body.link + k]! += load.factor * body.inertia[k]!;
  };
  for (const body of bodies) add(body);
  if (load.payload) add(payloadBody(load, n, tip)!);
  const force = load.tipForce;
  const forceUnit = new Float64Array(3);
  if (force && force.direction === 'tool') rotate3(forceUnit, 0, tip.rotation, 0, force.unit, 0);
  if (force && force.direction === 'base') forceUnit.set(force.unit);
  return {
    name: load.name,
    factor: load.factor,
    mass,
    first,
    inertia,
    force: force && force.magnitude > 0 ? force.direction : 'none',
    magnitude: force ? load.factor * force.magnitude : 0,
    forceUnit: [forceUnit[0]!, forceUnit[1]!, forceUnit[2]!],
    speed: load.motion ? Float64Array.from(load.motion.speed) : null,
    accel: load.motion ? Float64Array.from(load.motion.accel) : null,
  };
}

function payloadBody(load: LoadCase, n: number, tip: Frame): ChainBody | null {
  if (!load.payload) return null;
  return bodyIn(tip, 'payload', n - 1, load.payload.mass, load.payload.centre, load.payload.inertia);
}

/** The payload of a case as a body on the last link, not multiplied by the factor; null where the case has none. */
export function casePayload(chain: Chain, load: LoadCase): ChainBody | null {
  return payloadBody(load, chain.n, { position: chain.tipOrigin, rotation: chain.tipRotation });
}

/**
 * Flattens an arm of at least one revolute joint. Links before the first revolute joint stand on the ground and load nothing.
 * Inertias that the file leaves out count as point masses; `readArm` refuses them where a case has motion.
 */
export function flattenArm(arm: Arm): Chain {
  const jointIndex = arm.joints.flatMap((joint, k) => (joint.kind === 'revolute' ? [k] : []));
  const n = jointIndex.length;
  if (n === 0) throw new RangeError('an arm needs at least one revolute joint');
  const origin = new Float64Array(3 * n);
  const rotation = new Float64Array(9 * n);
  const housing = new Float64Array(9 * n);
  const bodies: ChainBody[] = [];
  // The frame of the file's present link, standing in the canonical frame of the chain's present link.
  let here = identityFrame();
  let i = -1;
  for (const joint of arm.joints) {
    const placed = compose(here, joint.placement);
    if (joint.kind === 'revolute') {
      i++;
      const canon = canonicalFrame(joint.axis);
      origin.set(placed.position, 3 * i);
      multiply33(rotation, 9 * i, placed.rotation, 0, canon, 0);
      housing.set(canon, 9 * i);
      here = identityFrame();
      multiplyBack33(here.rotation, 0, canon, 0, IDENTITY33, 0);
    } else {
      here = placed;
    }
    if (i >= 0) bodies.push(bodyIn(here, joint.link.name, i, joint.link.mass, joint.link.centre, joint.link.inertia));
  }
  const tip = compose(here, arm.tip);
  const revolute = jointIndex.map((k) => arm.joints[k]!);
  return {
    n,
    jointIndex,
    names: revolute.map((joint) => joint.name),
    origin,
    rotation,
    housing,
    from: Float64Array.from(revolute, (joint) => joint.travel.from),
    to: Float64Array.from(revolute, (joint) => joint.travel.to),
    full: Uint8Array.from(revolute, (joint) => (joint.travel.full ? 1 : 0)),
    tipOrigin: tip.position,
    tipRotation: tip.rotation,
    gravity: arm.gravity,
    cases: arm.cases.map((load) => chainCase(load, n, bodies, tip)),
    bodies,
  };
}

/** A wrench from the canonical housing frame of joint i to the file's housing frame. */
export function wrenchToFile(chain: Chain, i: number, wrench: Float64Array, at: number, out: Float64Array): void {
  rotate3(out, 0, chain.housing, 9 * i, wrench, at);
  rotate3(out, 3, chain.housing, 9 * i, wrench, at + 3);
}

/** What the kernels take for granted; tests call it. Throws on the first assumption that does not hold. */
export function assertChain(chain: Chain): void {
  for (let i = 0; i < chain.n; i++) {
    for (const frames of [chain.rotation, chain.housing]) {
      if (!isRotation(frames, 9 * i)) throw new Error(`joint ${i}: not a rotation`);
    }
    if (!(chain.from[i]! <= chain.to[i]!)) throw new Error(`joint ${i}: travel runs backwards`);
  }
  if (!isRotation(chain.tipRotation, 0)) throw new Error('tip: not a rotation');
}

/** Columns of unit length, perpendicular, right-handed. */
function isRotation(m: Float64Array, at: number): boolean {
  const square = new Float64Array(9);
  multiplyBack33(square, 0, m.subarray(at, at + 9), 0, m, at);
  const rows = [0, 3, 6].map((r) => m.subarray(at + r, at + r + 3));
  const across = new Float64Array(3);
  cross3(across, 0, rows[1]!, 0, rows[2]!, 0);
  return square.every((value, k) => Math.abs(value - IDENTITY33[k]!) < 1e-12) && dot3(rows[0]!, 0, across, 0) > 0;
}
