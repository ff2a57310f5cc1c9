/** An arm with one thing changed, for slopes and what-ifs: the arm given is left as it is. Lengths m, masses kg, angles rad. */
import type { Arm, Joint, PairSupport } from './arm.ts';

function withJoint(arm: Arm, index: number, change: (joint: Joint) => Joint): Arm {
  return { ...arm, joints: arm.joints.map((joint, k) => (k === index ? change(joint) : joint)) };
}

/** Moves the bearings of a pair; what is left out stays. The hub stays where it is. Joints without a pair come back unchanged. */
export function withPair(
  arm: Arm,
  index: number,
  change: { readonly span?: number; readonly overhang?: number; readonly offset?: number },
): Arm {
  return withJoint(arm, index, (joint) => {
    const { support } = joint;
    if (!support || support.arrangement === 'ring') return joint;
    const moved: PairSupport = { ...support, ...change };
    const sign = support.side === '+' ? 1 : -1;
    const { hub, span, overhang, offset } = moved;
    const stations =
      support.arrangement === 'clevis'
        ? { stationA: hub + offset - span / 2, stationB: hub + offset + span / 2 }
        : { stationA: hub + sign * overhang, stationB: hub + sign * (overhang + span) };
    return { ...joint, support: { ...moved, ...stations } };
  });
}

/** The same link `factor` times as heavy: mass and inertia, its centre where it was. */
export function withLinkMass(arm: Arm, index: number, factor: number): Arm {
  return withJoint(arm, index, (joint) => {
    const { link } = joint;
    const { inertia } = link;
    const heavier = inertia && {
      xx: inertia.xx * factor,
      yy: inertia.yy * factor,
      zz: inertia.zz * factor,
      xy: inertia.xy * factor,
      xz: inertia.xz * factor,
      yz: inertia.yz * factor,
    };
    return { ...joint, link: { ...link, mass: link.mass * factor, inertia: heavier } };
  });
}
