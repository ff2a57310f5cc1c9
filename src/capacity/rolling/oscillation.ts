/**
 * A joint that swings instead of turning. Stated rule: equal travel. A swing of ±θ there and back sweeps 4θ and counts as 4θ/2π
 * revolutions, whatever the direction, with the load of the pose; so
 *
 *     revolutions a second = f · 4θ/2π = f · θ / (π/2),   or, counted in swings, P_swing = P (θ/(π/2))^(1/p)
 *
 * Source: kinematics; known in the literature on oscillating bearings as the first of Harris' conversions (Menck and Stammler,
 * Wind Energy Science 9, 2024; NREL/TP-500-42362), from memory; recomputed by both routes.
 *
 * Range: elements must travel at least to their neighbour's place. With the cage turning (1-γ)/2 of a ring's turn, an element rolls
 * 2θ(1-γ)/2 along the outer race and 2θ(1+γ)/2 along the inner; the spacing is 2π/Z. Below θ = 2π/(Z(1-γ)) patches of race
 * between the elements stay unrolled, the grease is not renewed, and wear (false brinelling) rather than fatigue may govern
 * (common practice; the limit is the same literature's critical angle).
 */
import { isPositive } from './bearingKind.ts';
import type { InternalGeometry } from './internalGeometry.ts';
import type { Note } from './outcome.ts';
import type { Rule } from './rule.ts';

export const OSCILLATION_RULE: Rule = {
  name: 'swing counted as turning',
  formula: 'revolutions = angle swept / 2π; critical half swing 2π/(Z(1-γ))',
  source: 'kinematics; first conversion of Harris for oscillating bearings',
  trust: 'recomputed',
  units: 'rad, 1/s',
  range: 'half swing above the critical one',
};

/** Revolutions in a path that sweeps `swept` rad in all, both directions counted, ≥ 0. */
export function sweptRevolutions(swept: number): number {
  return swept >= 0 ? swept / (2 * Math.PI) : Number.NaN;
}

/** Revolutions a second at a steady `speed` rad/s. */
export function turningRate(speed: number): number {
  return sweptRevolutions(Math.abs(speed));
}

/** Equivalent revolutions a second of a swing of ± `halfSwing` rad at `frequency` swings (there and back) a second. */
export function swingRate(halfSwing: number, frequency: number): number {
  return halfSwing >= 0 && frequency >= 0 ? sweptRevolutions(4 * halfSwing * frequency) : Number.NaN;
}

/** Load that in one revolution a swing does the same damage, N: the other way to count. */
export function swingLoad(P: number, halfSwing: number, exponent: number): number {
  return P >= 0 && halfSwing >= 0 ? P * (halfSwing / (Math.PI / 2)) ** (1 / exponent) : Number.NaN;
}

/** Half swing, rad, below which neighbours' tracks do not meet on the outer race. `elements` a row. */
export function criticalHalfSwing(geometry: InternalGeometry): number {
  return isPositive(geometry.elements) && geometry.gamma >= 0 && geometry.gamma < 1
    ? (2 * Math.PI) / (geometry.elements * (1 - geometry.gamma))
    : Number.NaN;
}

/** The small-arc warning; none for a joint that does not move at all. */
export function swingNotes(halfSwing: number, geometry: InternalGeometry): readonly Note[] {
  return halfSwing > 0 && !(halfSwing >= criticalHalfSwing(geometry)) ? ['small-arc'] : [];
}
