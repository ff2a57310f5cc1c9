/**
 * How far a ring bearing that carries moment by itself tilts: from its clearance, and from its radial stiffness. Rows at a contact angle α on
 * the pitch diameter d: at the place φ round the ring a radial shift s moves the contact by s cos α cos φ, a tilt θ by θ (d/2) sin α cos φ.
 *
 *     tilt each way θ = (c/2) cos α / ((d/2) sin α) = c/(d tan α)                    c diametral radial clearance
 *     tilt stiffness  K = k (d/2)² tan² α                                               k radial stiffness
 *
 * Own derivation. Shift and tilt share the clearance; each alone reaches its full value.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { contactAngle, isUnassessed, pitchDiameter, sentence } from '../rolling/index.ts';
import type { Assessed, Rule } from '../rule.ts';

export const RING_PLAY_RULE: Rule = {
  name: 'tilt of a ring bearing',
  formula: 'from play each way c/(d tan α); stiffness k (d/2)² tan² α',
  source: 'geometry; contacts as linear springs all round',
  trust: 'recomputed',
  units: 'rad, N·m/rad',
  range: 'contact angle above 0; stiffness: preloaded, linear, stiff seats',
};

/** Half the pitch diameter times tan α, m: what turns a radial figure into one of tilt. */
export function ringLever(bearing: RollingBearing): Assessed {
  const angle = contactAngle(bearing);
  if (isUnassessed(angle)) return { unassessed: sentence(angle.unassessed) };
  const pitch = pitchDiameter(bearing);
  if (isUnassessed(pitch)) return { unassessed: sentence(pitch.unassessed) };
  const lever = (pitch.value / 2) * Math.tan(angle.value);
  return lever > 0 ? { value: lever } : { unassessed: 'a ring without a contact angle holds no moment' };
}

/** Tilt each way, rad, of a ring with a diametral radial clearance (m ≥ 0) and its lever. */
export function ringPlayTilt(clearance: number, lever: number): Assessed {
  if (!(clearance >= 0 && lever > 0)) return { unassessed: 'clearance and lever of the ring must be usable numbers' };
  return { value: clearance / (2 * lever) };
}

/** Tilt stiffness, N·m/rad, from a radial one (N/m) and the lever. */
export function ringTiltStiffness(stiffness: number, lever: number): Assessed {
  if (!(stiffness > 0 && lever > 0)) return { unassessed: 'stiffness and lever of the ring must be positive numbers' };
  return { value: stiffness * lever * lever };
}
