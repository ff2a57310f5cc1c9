/**
 * An arm in the base frame at one pose, straight from the `Arm`: where each link, joint and mass stands and how it moves. A second
 * route beside the kernel, on purpose slow and plain: file frames, Rodrigues' turn, sums over bodies.
 */
import type { Arm, LoadCase, Mat3, Placement, Vec3 } from '../src/arm/arm.ts';
import { times, transposed, turned, turnedInertia } from './armVariants.ts';

export const add = (a: Vec3, b: Vec3): Vec3 => [a[0] + b[0], a[1] + b[1], a[2] + b[2]];
export const less = (a: Vec3, b: Vec3): Vec3 => [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
export const scaled = (a: Vec3, k: number): Vec3 => [k * a[0], k * a[1], k * a[2]];
export const dot = (a: Vec3, b: Vec3): number => a[0] * b[0] + a[1] * b[1] + a[2] * b[2];
export const cross = (a: Vec3, b: Vec3): Vec3 => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
];
export const size = (a: Vec3): number => Math.hypot(a[0], a[1], a[2]);

export interface WorldJoint {
  /** Index into `arm.joints`. */
  readonly index: number;
  readonly origin: Vec3;
  /** Housing frame (file) to base frame. */
  readonly housing: Mat3;
  readonly axis: Vec3;
  readonly speed: number;
}

export interface WorldBody {
  /** Revolute joints inboard of it. */
  readonly joints: number;
  readonly mass: number;
  readonly centre: Vec3;
  /** Base frame, about the centre, kg·m²; zero where the file gives none. */
  readonly inertia: Mat3;
  readonly velocity: Vec3;
  readonly spin: Vec3;
}

export interface WorldArm {
  readonly joints: readonly WorldJoint[];
  /** Every link and the payload; masses and inertias times the case's factor. */
  readonly bodies: readonly WorldBody[];
  readonly tip: Vec3;
  readonly tipRotation: Mat3;
  readonly tipVelocity: Vec3;
}

/** Rotation by `angle` about a unit axis. */
export function turnAbout([x, y, z]: Vec3, angle: number): Mat3 {
  const c = Math.cos(angle);
  const s = Math.sin(angle);
  const d = 1 - c;
  // biome-ignore format: a matrix
  return [
    c + d * x * x, d * x * y - s * z, d * x * z + s * y,
    d * x * y + s * z, c + d * y * y, d * y * z - s * x,
    d * x * z - s * y, d * y * z + s * x, c + d * z * z,
  ];
}

export function worldArm(
  arm: Arm,
  load: LoadCase,
  pose: readonly number[],
  speed: readonly number[] = pose.map(() => 0),
): WorldArm {
  const joints: WorldJoint[] = [];
  const bodies: WorldBody[] = [];
  let here: Placement = { position: [0, 0, 0], rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1] };
  const velocityAt = (point: Vec3) =>
    joints.reduce<Vec3>((v, j) => add(v, cross(scaled(j.axis, j.speed), less(point, j.origin))), [0, 0, 0]);
  const spin = () => joints.reduce<Vec3>((w, j) => add(w, scaled(j.axis, j.speed)), [0, 0, 0]);
  const put = (frame: Placement, part: LoadCase['payload']) => {
    if (!part) return;
    const centre = add(frame.position, turned(frame.rotation, part.centre));
    const i = part.inertia && turnedInertia(frame.rotation, part.inertia);
    bodies.push({
      joints: joints.length,
      mass: load.factor * part.mass,
      centre,
      inertia: (i ? [i.xx, i.xy, i.xz, i.xy, i.yy, i.yz, i.xz, i.yz, i.zz] : [0, 0, 0, 0, 0, 0, 0, 0, 0]).map(
        (v) => load.factor * v,
      ) as unknown as Mat3,
      velocity: velocityAt(centre),
      spin: spin(),
    });
  };
  arm.joints.forEach((joint, index) => {
    const housing = times(here.rotation, joint.placement.rotation);
    const origin = add(here.position, turned(here.rotation, joint.placement.position));
    here = { position: origin, rotation: housing };
    if (joint.kind === 'revolute') {
      const q = pose[joints.length]!;
      const axis = turned(housing, joint.axis);
      here = { position: origin, rotation: times(housing, turnAbout(joint.axis, q)) };
      joints.push({ index, origin, housing, axis, speed: speed[joints.length]! });
    }
    put(here, joint.link);
  });
  const tip: Placement = {
    position: add(here.position, turned(here.rotation, arm.tip.position)),
    rotation: times(here.rotation, arm.tip.rotation),
  };
  put(tip, load.payload);
  return { joints, bodies, tip: tip.position, tipRotation: tip.rotation, tipVelocity: velocityAt(tip.position) };
}

/** The tip force in the base frame, N; `any`: along `direction`. */
export function worldTipForce(world: WorldArm, load: LoadCase, direction: Vec3 | null = null): Vec3 {
  const force = load.tipForce;
  if (!force) return [0, 0, 0];
  const unit =
    direction ??
    (force.direction === 'any'
      ? ([0, 0, 0] as const)
      : force.direction === 'base'
        ? force.unit
        : turned(world.tipRotation, force.unit));
  return scaled(unit, load.factor * force.magnitude);
}

/** Momentum and angular momentum about the base origin of all bodies outboard of joint i. */
export function outboardMomentum(world: WorldArm, i: number): { linear: Vec3; angular: Vec3 } {
  let linear: Vec3 = [0, 0, 0];
  let angular: Vec3 = [0, 0, 0];
  for (const body of world.bodies) {
    if (body.joints <= i) continue;
    const p = scaled(body.velocity, body.mass);
    linear = add(linear, p);
    angular = add(angular, add(cross(body.centre, p), turned(body.inertia, body.spin)));
  }
  return { linear, angular };
}

/** Kinetic energy of all moving bodies, and their potential energy in gravity, J. */
export function energy(world: WorldArm, gravity: Vec3): { kinetic: number; potential: number } {
  let kinetic = 0;
  let potential = 0;
  for (const body of world.bodies) {
    if (body.joints === 0) continue;
    kinetic +=
      (body.mass * dot(body.velocity, body.velocity)) / 2 + dot(body.spin, turned(body.inertia, body.spin)) / 2;
    potential -= body.mass * dot(gravity, body.centre);
  }
  return { kinetic, potential };
}

/** A base-frame wrench about `from`, moved to the joint's origin and turned into its housing frame (file). */
export function atJoint(joint: WorldJoint, force: Vec3, moment: Vec3, from: Vec3): { force: Vec3; moment: Vec3 } {
  const back = transposed(joint.housing);
  return {
    force: turned(back, force),
    moment: turned(back, add(moment, cross(less(from, joint.origin), force))),
  };
}
