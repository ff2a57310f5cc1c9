/**
 * Two single row angular contact or tapered bearings adjusted against each other, with a span between them.
 *
 * **Supports.** Each row carries its radial load at its pressure centre, (dpw/2) tan α off the middle of its width: outwards back to
 * back, inwards face to face. The radial loads follow from statics at these two points alone; they do not depend on the thrust.
 *
 * **Induced thrust.** A radial load Fr on an inclined contact pushes its partner with S = c Fr, half the rollers or balls loaded:
 * c = e (angular contact balls; below 20° at the row's own axial load), c = 1/(2Y) (tapered).
 *
 * **Balance.** Ka > 0: external axial force that loads row A. Neither row can carry less than it induces, and the axial forces must
 * balance, which gives
 *
 *     FaA = max(SA, SB + Ka)        FaB = max(SB, SA - Ka)
 *
 * for either direction of Ka: the four cases of the usual tables in one. A row whose radial load is nil and whose partner is pushed
 * harder than it pushes is unloaded (Fa = 0). Adjusted without preload; a preload would only raise the lesser loads.
 *
 * Source: common published rule for adjusted pairs, from memory; the tapered form agrees with a published example (Shigley 8th
 * ed., problem 11-12, whose own c is 0.47/K). Convex in the joint load wherever c is a constant.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { needsPartner } from './bearingKind.ts';
import { dynamicForm } from './dynamicEquivalent.ts';
import { lookUp } from './dynamicFactors.ts';
import { isUnassessed, type Note, type Rated, rated, unassessed } from './outcome.ts';
import type { Rule } from './rule.ts';

export const ADJUSTED_PAIR_RULE: Rule = {
  name: 'adjusted pair',
  formula: 'supports at (dpw/2) tan α; S = e Fr or Fr/(2Y); FaA = max(SA, SB + Ka), FaB = max(SB, SA - Ka)',
  source: 'common published rule for adjusted angular contact and tapered pairs',
  trust: 'from memory',
  units: 'm, N',
  range: 'adjusted without preload, rigid shaft and housing',
};

export type Adjustment = 'back-to-back' | 'face-to-face';

export interface PressureCentres {
  /** Along the joint axis from the joint origin, m. */
  readonly stationA: number;
  readonly stationB: number;
  /** Between the pressure centres, m, > 0. */
  readonly span: number;
}

/** Where the pair supports the shaft. Stations of the middles of both widths, and offsets ≥ 0 (`pressureCentreOffset`), m. */
export function pressureCentres(
  adjustment: Adjustment,
  stationA: number,
  stationB: number,
  offsetA: number,
  offsetB: number,
): Rated<PressureCentres> {
  const apart = stationB - stationA;
  if (apart === 0) return unassessed('zero-span');
  const outward = adjustment === 'back-to-back' ? Math.sign(apart) : -Math.sign(apart);
  const a = stationA - outward * offsetA;
  const b = stationB + outward * offsetB;
  const span = (b - a) * Math.sign(apart);
  if (Number.isNaN(span)) return unassessed('bad-dimensions');
  return span > 0 ? rated({ stationA: a, stationB: b, span }) : unassessed('pressure-centres-meet');
}

/**
 * The part Ka of an axial force that loads row A (negative: row B). `axial` N along + axis, acting `on` the shaft (inner rings) or the
 * housing (outer rings). Back to back, a shaft pushed from A towards B loads A; face to face it loads B.
 */
export function thrustOnA(
  adjustment: Adjustment,
  stationA: number,
  stationB: number,
  axial: number,
  on: 'shaft' | 'housing',
): number {
  const towardsB = axial * Math.sign(stationB - stationA) * (on === 'shaft' ? 1 : -1);
  return adjustment === 'back-to-back' ? towardsB : -towardsB;
}

/** c of S = c Fr, over `scale` · Fa (one entry where it does not depend on the load). */
export interface InducedThrust {
  readonly scale: number;
  readonly argument: Float64Array;
  readonly c: Float64Array;
}

/** How much thrust a row induces per radial load. */
export function inducedThrust(bearing: RollingBearing): Rated<InducedThrust> {
  if (!needsPartner(bearing)) return unassessed('no-thrust-partner');
  const outcome = dynamicForm(bearing);
  if (isUnassessed(outcome)) return outcome;
  const form = outcome.value;
  const c = bearing.kind === 'tapered-roller' ? form.Y2.map((Y) => 1 / (2 * Y)) : form.e;
  return rated({ scale: form.scale, argument: form.argument, c }, ...outcome.notes);
}

/** A constant c, for a maker's own rule. */
export function constantThrust(c: number): InducedThrust {
  return { scale: 0, argument: Float64Array.of(0), c: Float64Array.of(c) };
}

/** Largest c a row can have: with it the pair's axial loads are a safe convex bound. */
export function largestThrust(law: InducedThrust): number {
  return law.c.reduce((most, c) => Math.max(most, c), 0);
}

/** Rounds of the fixed point; it closes in by a factor of 3 or better a round (c rises less than in proportion to the load). */
const ROUNDS = 60;

/**
 * Axial loads of both rows, written to out[0] (A) and out[1] (B), N, ≥ 0. `FrA`, `FrB` ≥ 0 at the pressure centres, N; `Ka` as
 * `thrustOnA` gives it, N. NaN in both where a number is not usable. Load-dependent c is iterated from its least value upwards: the
 * map is rising and c grows less than in proportion to the load, so the fixed point is one and the iteration climbs to it.
 */
export function shareThrust(
  A: InducedThrust,
  B: InducedThrust,
  FrA: number,
  FrB: number,
  Ka: number,
  out: Float64Array,
): void {
  if (!(FrA >= 0 && FrB >= 0) || Number.isNaN(Ka)) {
    out[0] = out[1] = Number.NaN;
    return;
  }
  let a = 0;
  let b = 0;
  const fixed = A.scale === 0 && B.scale === 0;
  for (let round = 0; round < ROUNDS; round++) {
    const SA = FrA * lookUp(A.argument, A.c, A.scale * a);
    const SB = FrB * lookUp(B.argument, B.c, B.scale * b);
    const nextA = Math.max(SA, SB + Ka);
    const nextB = Math.max(SB, SA - Ka);
    const still = nextA - a <= 1e-14 * nextA && nextB - b <= 1e-14 * nextB;
    a = nextA;
    b = nextB;
    if (fixed || still) break;
  }
  out[0] = a;
  out[1] = b;
}

export interface SharedThrust {
  readonly FaA: number;
  readonly FaB: number;
  /** Induced thrusts at these loads. */
  readonly SA: number;
  readonly SB: number;
  /** The row that only carries what it induces itself, and so sets the other's load; null where they balance exactly. */
  readonly governedBy: 'A' | 'B' | null;
  readonly unloaded: 'A' | 'B' | null;
  readonly notes: readonly Note[];
}

/** `shareThrust` with its reasons, for showing. */
export function sharedThrust(A: InducedThrust, B: InducedThrust, FrA: number, FrB: number, Ka: number): SharedThrust {
  const out = new Float64Array(2);
  shareThrust(A, B, FrA, FrB, Ka, out);
  const FaA = out[0]!;
  const FaB = out[1]!;
  const SA = FrA * lookUp(A.argument, A.c, A.scale * FaA);
  const SB = FrB * lookUp(B.argument, B.c, B.scale * FaB);
  const unloaded = FrA === 0 && FaA === 0 ? 'A' : FrB === 0 && FaB === 0 ? 'B' : null;
  return {
    FaA,
    FaB,
    SA,
    SB,
    governedBy: SB + Ka > SA ? 'B' : SB + Ka < SA ? 'A' : null,
    unloaded,
    notes: unloaded ? ['row-unloaded'] : [],
  };
}
