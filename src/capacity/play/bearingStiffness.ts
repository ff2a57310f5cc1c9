/**
 * Radial stiffness of a bearing: as given, else estimated from its rolling elements by contact mechanics.
 *
 * A radial load F on Z elements without clearance presses the hardest with Q = F/(Z cos α J), J = 1/2π ∫ cos^(n+1) over half a turn
 * (balls n = 3/2: 0.2288; rollers n = 10/9: 0.2448). The approach of the rings is that of its two contacts over cos α.
 *
 *     ball in groove:  δ = F1 (4.5/(E2 R))^(1/3) (Q/(π k E′))^(2/3), E′ = E/(1 - ν²), 1/R = 1/Rx + 1/Ry,
 *                      k = 1.0339 (Ry/Rx)^0.636, E2 = 1.0003 + 0.5968 Rx/Ry, F1 = 1.5277 + 0.6023 ln(Ry/Rx)
 *     roller:          δ = 3.84e-5 Q^0.9 / l^0.8 a contact (N, mm)
 */
import type { Bearing } from '../../arm/arm.ts';
import {
  elementOf,
  type InternalGeometry,
  internalGeometry,
  isRing,
  isUnassessed,
  sentence,
} from '../rolling/index.ts';
import type { Assessed, Rule } from '../rule.ts';

export const BEARING_STIFFNESS_RULE: Rule = {
  name: 'radial stiffness of a bearing',
  formula:
    'k = F/δ(F), secant at the load: balls by Hertz (Brewe and Hamrock’s fits), rollers δ = 3.84e-5 Q^0.9/l^0.8 (N, mm)',
  source: 'Brewe and Hamrock 1977; Palmgren; both from memory, the ball form recomputed by elliptic integrals',
  trust: 'recomputed',
  units: 'N/m',
  range:
    'steel, stiff seats, no clearance and no preload; geometry often estimated: an estimate, replace by the maker’s figure',
};

export interface BearingStiffness {
  /** N/m. */
  readonly stiffness: number;
  readonly estimated: boolean;
}

/** J: the element pressed the hardest carries F/(Z J). */
export const BALL_SHARE = 0.2288;
export const ROLLER_SHARE = 0.2448;
const MODULUS = 207e9 / (1 - 0.3 ** 2);
/** Groove radius over ball diameter, inside and outside (as the static rating has them). */
const GROOVE = { inner: 0.52, outer: 0.53 };
const SELF_ALIGNING_INNER = 0.53;

/**
 * Approach (m) of a ball and a race under Q (N): `across` and `along` are the sums of curvatures (1/m) in the planes across and along
 * the rolling direction, along ≥ across > 0.
 */
export function ballApproach(Q: number, along: number, across: number): number {
  const ratio = along / across;
  const k = 1.0339 * ratio ** 0.636;
  const second = 1.0003 + 0.5968 / ratio;
  const first = 1.5277 + 0.6023 * Math.log(ratio);
  return first * Math.cbrt((4.5 * (along + across)) / second) * (Q / (Math.PI * k * MODULUS)) ** (2 / 3);
}

/** Approach (m) of a roller and a race under Q (N) over an effective length (m); Palmgren. */
export function rollerApproach(Q: number, length: number): number {
  return (3.84e-5 * Q ** 0.9) / (length * 1e3) ** 0.8 / 1e3;
}

function bothContacts(bearing: Bearing, geometry: InternalGeometry, Q: number): number {
  if (geometry.rollerLength > 0) return 2 * rollerApproach(Q, geometry.rollerLength);
  const { elementDiameter: Dw, gamma } = geometry;
  const aligning = bearing.kind === 'self-aligning-ball';
  const race = (side: 'inner' | 'outer') => {
    const along = 2 / Dw / (side === 'inner' ? 1 - gamma : 1 + gamma);
    // The outer race of a self-aligning bearing is a sphere: as curved across as along.
    if (aligning && side === 'outer') return ballApproach(Q, along, along);
    const groove = aligning ? SELF_ALIGNING_INNER : GROOVE[side];
    return ballApproach(Q, along, (2 - 1 / groove) / Dw);
  };
  return race('inner') + race('outer');
}

/**
 * Secant stiffness at a radial load (N, > 0): the estimate grows with the load (balls with its cube root), so a bearing loaded less than
 * `load` gives way a little more than `load`-proportional. A bushing, a ring, and odd geometry are not estimated.
 */
export function radialStiffness(bearing: Bearing, load: number): Assessed<BearingStiffness> {
  if (bearing.stiffness !== null) {
    const stiffness = bearing.stiffness;
    if (stiffness > 0) return { value: { stiffness, estimated: false } };
    return { unassessed: 'the stiffness of a bearing must be a positive number' };
  }
  if (bearing.kind === 'plain-bushing' || isRing(bearing.kind)) {
    return { unassessed: 'fill in the radial `stiffness`: it is not estimated for this kind of bearing' };
  }
  if (!(load > 0 && Number.isFinite(load))) return { unassessed: 'a stiffness is estimated at a load above zero' };
  const geometry = internalGeometry(bearing);
  if (isUnassessed(geometry)) return { unassessed: sentence(geometry.unassessed) };
  const { elements, rows, contactAngle } = geometry.value;
  const share = elementOf(bearing.kind) === 'ball' ? BALL_SHARE : ROLLER_SHARE;
  const cosine = Math.cos(contactAngle);
  const Q = load / (elements * rows * cosine * share);
  const stiffness = (load * cosine) / bothContacts(bearing, geometry.value, Q);
  if (!(stiffness > 0)) return { unassessed: 'the rolling elements of the bearing give no usable stiffness' };
  return { value: { stiffness, estimated: true } };
}
