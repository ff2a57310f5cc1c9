/** Variants of an arm for properties: fixed joints set in, products of inertia, the whole arm turned, lengths and masses scaled. */
import type { Arm, Inertia, Joint, Mat3, Placement, Vec3 } from '../src/arm/arm.ts';
import { type Random, seededRandom } from '../src/math/random.ts';
import { randomRotation } from './randomArm.ts';

export function times(a: Mat3, b: Mat3): Mat3 {
  const out = [0, 1, 2].flatMap((r) =>
    [0, 1, 2].map((c) => a[3 * r]! * b[c]! + a[3 * r + 1]! * b[3 + c]! + a[3 * r + 2]! * b[6 + c]!),
  );
  return out as unknown as Mat3;
}

export function transposed(m: Mat3): Mat3 {
  return [m[0], m[3], m[6], m[1], m[4], m[7], m[2], m[5], m[8]];
}

export function turned(m: Mat3, v: Vec3): Vec3 {
  return [
    m[0] * v[0] + m[1] * v[1] + m[2] * v[2],
    m[3] * v[0] + m[4] * v[1] + m[5] * v[2],
    m[6] * v[0] + m[7] * v[1] + m[8] * v[2],
  ];
}

export function turnedInertia(m: Mat3, inertia: Inertia): Inertia {
  const { xx, yy, zz, xy, xz, yz } = inertia;
  const t = times(times(m, [xx, xy, xz, xy, yy, yz, xz, yz, zz]), transposed(m));
  return { xx: t[0], yy: t[4], zz: t[8], xy: t[1], xz: t[2], yz: t[5] };
}

/** Every inertia turned about its centre, so that products of inertia are there. */
export function withFullInertia(arm: Arm, seed: number): Arm {
  const random = seededRandom(seed * 31 + 7);
  const turnedNow = (inertia: Inertia | null) => inertia && turnedInertia(randomRotation(random), inertia);
  return {
    ...arm,
    joints: arm.joints.map((joint) => ({ ...joint, link: { ...joint.link, inertia: turnedNow(joint.link.inertia) } })),
    cases: arm.cases.map((load) => ({
      ...load,
      payload: load.payload && { ...load.payload, inertia: turnedNow(load.payload.inertia) },
    })),
  };
}

/** A fixed joint with a link of its own, placed at random. */
function fixedJoint(random: Random, name: string, like: Joint): Joint {
  return {
    ...like,
    name,
    kind: 'fixed',
    placement: {
      position: random.direction().map((v) => 0.2 * v) as unknown as Vec3,
      rotation: randomRotation(random),
    },
    travel: { from: 0, to: 0, full: false },
    link: { ...like.link, name: `${name} link`, mass: like.link.mass * random.next() },
    support: null,
    drive: null,
  };
}

/** Fixed joints on the ground, between joints and at the tip, by chance; at least one at the tip. */
export function withFixedJoints(arm: Arm, seed: number): Arm {
  const random = seededRandom(seed * 131 + 5);
  const joints = arm.joints.flatMap((joint, k) =>
    random.next() < 0.5 ? [fixedJoint(random, `bracket ${k}`, joint), joint] : [joint],
  );
  return { ...arm, joints: [...joints, fixedJoint(random, 'tip bracket', arm.joints[0]!)] };
}

/** The whole arm and its gravity turned in the base frame; base-fixed tip forces turn along. */
export function turnedArm(arm: Arm, by: Mat3): Arm {
  const [first, ...rest] = arm.joints;
  const place = (p: Placement): Placement => ({ position: turned(by, p.position), rotation: times(by, p.rotation) });
  return {
    ...arm,
    gravity: turned(by, arm.gravity),
    joints: [{ ...first!, placement: place(first!.placement) }, ...rest],
    cases: arm.cases.map((load) =>
      load.tipForce?.direction === 'base'
        ? { ...load, tipForce: { ...load.tipForce, unit: turned(by, load.tipForce.unit) } }
        : load,
    ),
  };
}
