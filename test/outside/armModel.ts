/** The arm as the outside engine's model text: one body a joint (fixed joints stay bodies of their own), the payload one more. */
import type { Arm, Inertia, LoadCase, Mat3, Placement, Vec3 } from '../../src/arm/arm.ts';
import { times, transposed } from '../armVariants.ts';

/** The engine wants some mass and inertia on every moving body; far below rounding of any load here. */
const LEAST_MASS = 1e-14;
/** kg·m² a kg, where the file gives no inertia (it plays no part at rest). */
const ANY_INERTIA = 1e-6;

/** Every mass and inertia multiplied by the case's factor; sites at each revolute joint's origin, then at the tip. */
export function armModel(arm: Arm, load: LoadCase): string {
  let revolute = 0;
  let open = '';
  let shut = '';
  let sensors = '';
  for (const joint of arm.joints) {
    const { link } = joint;
    open += `<body ${frame(joint.placement)}>${inertial(link.mass, link.centre, link.inertia, load.factor)}`;
    if (joint.kind === 'revolute') {
      open += `<joint type="hinge" pos="0 0 0" axis="${joint.axis.join(' ')}"/><site name="s${revolute}" pos="0 0 0"/>`;
      sensors += `<force site="s${revolute}"/><torque site="s${revolute}"/>`;
      revolute++;
    }
    shut = `</body>${shut}`;
  }
  open += `<site name="tip" ${frame(arm.tip)}/>`;
  if (load.payload) {
    const { mass, centre, inertia } = load.payload;
    open += `<body ${frame(arm.tip)}>${inertial(mass, centre, inertia, load.factor)}</body>`;
  }
  return (
    `<mujoco><compiler angle="radian"/><option gravity="${arm.gravity.join(' ')}"/>` +
    `<worldbody>${open}${shut}</worldbody><sensor>${sensors}</sensor></mujoco>`
  );
}

function frame(placement: Placement): string {
  return `pos="${placement.position.join(' ')}" quat="${quaternion(placement.rotation).join(' ')}"`;
}

function inertial(mass: number, centre: Vec3, inertia: Inertia | null, factor: number): string {
  const m = Math.max(factor * mass, LEAST_MASS);
  const { axes, values } = principal(inertia);
  const diagonal = values.map((v) => (inertia ? factor * v : ANY_INERTIA * m));
  const quat = quaternion(axes).join(' ');
  return `<inertial pos="${centre.join(' ')}" quat="${quat}" mass="${m}" diaginertia="${diagonal.join(' ')}"/>`;
}

/**
 * Principal axes (columns, right-handed) and values by Jacobi's turns, to full precision: the engine's own stop at a few parts
 * in a million, which would hide the agreement of the loads.
 */
function principal(inertia: Inertia | null): { axes: Mat3; values: Vec3 } {
  const { xx, yy, zz, xy, xz, yz } = inertia ?? { xx: 1, yy: 1, zz: 1, xy: 0, xz: 0, yz: 0 };
  let m: Mat3 = [xx, xy, xz, xy, yy, yz, xz, yz, zz];
  let axes: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];
  for (let k = 0; k < 30; k++) {
    const [p, q] = [[0, 1], [0, 2], [1, 2]][k % 3] as [number, number]; // biome-ignore format: pairs
    if (m[3 * p + q] === 0) continue;
    const angle = 0.5 * Math.atan2(2 * m[3 * p + q]!, m[4 * q]! - m[4 * p]!);
    const turn = [1, 0, 0, 0, 1, 0, 0, 0, 1];
    turn[4 * p] = turn[4 * q] = Math.cos(angle);
    turn[3 * p + q] = Math.sin(angle);
    turn[3 * q + p] = -Math.sin(angle);
    const by = turn as unknown as Mat3;
    m = times(times(transposed(by), m), by);
    axes = times(axes, by);
  }
  return { axes, values: [m[0], m[4], m[8]] };
}

/** Unit quaternion (w x y z) of a rotation matrix, by its largest component (Shepperd 1978, from memory; tested through loads). */
function quaternion(m: Mat3): number[] {
  const [a, b, c, d, e, f, g, h, i] = m;
  const trace = a + e + i;
  const squares = [1 + trace, 1 + 2 * a - trace, 1 + 2 * e - trace, 1 + 2 * i - trace];
  const largest = squares.indexOf(Math.max(...squares));
  const rows = [
    [squares[0]!, h - f, c - g, d - b],
    [h - f, squares[1]!, b + d, c + g],
    [c - g, b + d, squares[2]!, f + h],
    [d - b, c + g, f + h, squares[3]!],
  ];
  const q = rows[largest]!;
  const length = Math.hypot(...q);
  return q.map((v) => v / length);
}
