/**
 * How far a joint whose axis gives way moves the tip at most, anywhere in the travel.
 *
 * A point at height z and distance ρ from the axis moves across the axis by at most a(z) = c + Σ w_m |z - z_m| and along it by at most b ρ
 * (`AcrossLaw`, all of it ≥ 0). So the way is at most F = √(a(z)² + (b ρ)²), which is convex in the tip's place r from the joint: a is the
 * largest of its straight pieces s z + i, ρ the largest of e·r over unit vectors e across the axis, and
 *
 *     F = max over pieces, e, ψ in [0, 90°] of  cos ψ (s z + i) + sin ψ b e·r
 *       → cos ψ i + S(sin ψ b e + cos ψ s z^),     S(d) the most of d·r over the travel (`../mechanics/outwardSets.ts`, never below it)
 *
 * In steps of e and ψ the true unit vectors lie inside the polygons that touch the circles: 1/cos of half a step each, together 0.7 %.
 */
import type { OutwardSets } from '../mechanics/outwardSets.ts';

/** Most that a point moves across the axis (m, with z the station in m along the axis) and, per m off the axis, along it. */
export interface AcrossLaw {
  readonly constant: number;
  readonly terms: readonly { readonly station: number; readonly weight: number }[];
  readonly along: number;
}

const AROUND = 32;
const TILTS = 12;
const LEVEL = 2;
const OUTWARD = (1 + 1e-9) / (Math.cos(Math.PI / AROUND) * Math.cos(Math.PI / 4 / TILTS));

/** The straight pieces of a(z), lowest slope first; a is the largest of them. */
export function straightPieces(law: AcrossLaw): readonly { readonly slope: number; readonly at0: number }[] {
  const terms = [...law.terms].sort((a, b) => a.station - b.station);
  let slope = 0;
  let at0 = law.constant;
  for (const { station, weight } of terms) {
    slope -= weight;
    at0 += weight * station;
  }
  const pieces = [{ slope, at0 }];
  for (const { station, weight } of terms) {
    slope += 2 * weight;
    at0 -= 2 * weight * station;
    pieces.push({ slope, at0 });
  }
  return pieces;
}

/**
 * Bound of the tip's displacement, m. `sets`: outward sets of a unit mass at the tip (its first moment is the tip's place). Infinity where
 * the law is not of usable numbers.
 */
export function reachBound(sets: OutwardSets, joint: number, law: AcrossLaw): number {
  const sound = [law.constant, law.along, ...law.terms.flatMap(({ station, weight }) => [Math.abs(station), weight])];
  if (!sound.every((v) => v >= 0 && Number.isFinite(v))) return Number.POSITIVE_INFINITY;
  let most = 0;
  for (const { slope, at0 } of straightPieces(law)) {
    for (let t = 0; t <= TILTS; t++) {
      const across = Math.cos((Math.PI / 2 / TILTS) * t);
      const along = Math.sin((Math.PI / 2 / TILTS) * t) * law.along;
      const directions = along === 0 ? 1 : AROUND;
      for (let k = 0; k < directions; k++) {
        const angle = (2 * Math.PI * k) / AROUND;
        const [x, y] = [along * Math.cos(angle), along * Math.sin(angle)];
        const value = across * at0 + sets.at(joint, x, y, across * slope, LEVEL);
        if (!(value <= most)) most = value;
      }
    }
  }
  return Number.isNaN(most) ? Number.POSITIVE_INFINITY : most * OUTWARD;
}

/** The law's own value for a tip at `z` along and `rho` off the axis, m. */
export function lawAt(law: AcrossLaw, z: number, rho: number): number {
  const across = law.terms.reduce((sum, { station, weight }) => sum + weight * Math.abs(z - station), law.constant);
  return Math.hypot(across, law.along * rho);
}
