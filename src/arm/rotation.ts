import type { Mat3, Vec3 } from './arm.ts';

/** Cosine and sine of an angle in degrees; multiples of 90° give exactly 0 and ±1, so that a quarter turn does not tilt an axis by 6e-17. */
export function cosSinDegrees(degrees: number): readonly [number, number] {
  const turn = degrees % 360;
  switch (turn < 0 ? turn + 360 : turn) {
    case 0:
    case 360:
      return [1, 0];
    case 90:
      return [0, 1];
    case 180:
      return [-1, 0];
    case 270:
      return [0, -1];
    default: {
      const angle = (turn * Math.PI) / 180;
      return [Math.cos(angle), Math.sin(angle)];
    }
  }
}

/**
 * The rotation Rz(yaw) Ry(pitch) Rx(roll) of [roll, pitch, yaw] in degrees about fixed axes, as in the open robot-description format URDF:
 * v_outer = M v_inner.
 */
export function rotationFromTurn(turn: Vec3): Mat3 {
  const [cr, sr] = cosSinDegrees(turn[0]);
  const [cp, sp] = cosSinDegrees(turn[1]);
  const [cy, sy] = cosSinDegrees(turn[2]);
  const entries = [
    cy * cp,
    cy * sp * sr - sy * cr,
    cy * sp * cr + sy * sr,
    sy * cp,
    sy * sp * sr + cy * cr,
    sy * sp * cr - cy * sr,
    -sp,
    cp * sr,
    cp * cr,
  ];
  // `+ 0` turns -0 into 0.
  return entries.map((entry) => entry + 0) as unknown as Mat3;
}

/** The unit vector along `v`, or null where `v` is too short to have a direction. */
export function unitVector(v: Vec3): Vec3 | null {
  const length = Math.hypot(v[0], v[1], v[2]);
  return length < 1e-9 ? null : [v[0] / length + 0, v[1] / length + 0, v[2] / length + 0];
}
