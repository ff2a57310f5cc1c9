/**
 * Dynamic equivalent load.
 *
 *     R = Fr + 2 M / dpw                          (M: tilting moment, only of a ring bearing)
 *     P = X1 R + Y1 |Fa|  where |Fa|/R ≤ e,  P = X2 R + Y2 |Fa|  above
 *
 * Both lines meet at e up to the rounding of the tables (1 %); the larger is taken, so that P is continuous, never falls with a
 * rising load, and is convex where the factors do not depend on the load. Where they do (radial contact and contact angles below
 * 20°) Y falls with i f0 |Fa|/C0 while Y |Fa| still rises.
 *
 * Factors: ISO 281:2007. Radial contact verified, angular contact recomputed or from memory (see `dynamicFactors.ts`); rollers with
 * α ≠ 0: e = 1.5 tan α, X = 0.4, Y = 0.4 cot α, two rows 1, 0.45 cot α and 0.67, 0.67 cot α; self-aligning balls: 0.4, 0.4 cot α,
 * two rows 1, 0.42 cot α and 0.65, 0.65 cot α (from memory). Crossed rollers are two rows at 45°; a four-point bearing is taken
 * as two rows of angular contact at its angle (common practice). Cylindrical and needle rollers: P = Fr, no thrust.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { carriesThrust, isPositive, isRing, lifeExponent } from './bearingKind.ts';
import { contactAngle, pitchDiameter } from './contactAngle.ts';
import {
  ANGULAR_CONTACT_10,
  ANGULAR_CONTACT_15,
  ANGULAR_CONTACT_BY_ANGLE,
  type AngleRow,
  DEEP_GROOVE,
  lookUp,
} from './dynamicFactors.ts';
import { isUnassessed, type Note, type Rated, rated, unassessed } from './outcome.ts';
import { staticFactor, staticRating } from './ratingEstimate.ts';
import type { Rule } from './rule.ts';
import { isThrust } from './staticEquivalent.ts';

export const DYNAMIC_EQUIVALENT_RULE: Rule = {
  name: 'dynamic equivalent load',
  formula: 'P = max(X1 R + Y1 |Fa|, X2 R + Y2 |Fa|), R = Fr + 2M/dpw for a ring',
  source: 'ISO 281:2007 table 3 and its table for radial roller bearings',
  trust: 'from memory',
  units: 'N',
  range: 'contact angle up to 45°; i f0 Fa/C0 0.17 to 7, end rows held beyond',
};

/** Factors of one bearing, ready for many loads. The tables have one row where nothing depends on the load. */
export interface DynamicForm {
  /** p of the life formula. */
  readonly exponent: number;
  /** The bearing carries no thrust: any axial load is over. */
  readonly radialOnly: boolean;
  /** 2/dpw, 1/m, of a ring; null where the bearing carries no moment by itself. */
  readonly momentArm: number | null;
  readonly X1: number;
  readonly X2: number;
  /** Argument of the tables per newton of axial load, i f0/C0, 1/N·N/mm²; 0 where nothing depends on the load. */
  readonly scale: number;
  /** Rising; all of one length. */
  readonly argument: Float64Array;
  readonly e: Float64Array;
  readonly Y1: Float64Array;
  readonly Y2: Float64Array;
}

const DEGREE = Math.PI / 180;

interface Factors {
  X1: number;
  X2: number;
  argument: readonly number[];
  e: readonly number[];
  Y1: readonly number[];
  Y2: readonly number[];
}

function constant(X2: number, Y1: number, Y2: number, e: number): Factors {
  return { X1: 1, X2, argument: [0], e: [e], Y1: [Y1], Y2: [Y2] };
}

/** Rollers with α ≠ 0 and self-aligning balls. */
function cotangentFactors(ball: boolean, two: boolean, cot: number): Factors {
  const e = 1.5 / cot;
  if (!two) return constant(0.4, 0, 0.4 * cot, e);
  return ball ? constant(0.65, 0.42 * cot, 0.65 * cot, e) : constant(0.67, 0.45 * cot, 0.67 * cot, e);
}

/** Angular contact balls at α rad in [10°, 45°]: linear in the angle between the standard's rows. */
function angularFactors(alpha: number, two: boolean): Factors {
  const degrees = Math.min(45, Math.max(10, alpha / DEGREE));
  if (degrees >= 20) {
    const column = (pick: (row: AngleRow) => number) =>
      lookUp(
        ANGULAR_CONTACT_BY_ANGLE.map((row) => row.alpha),
        ANGULAR_CONTACT_BY_ANGLE.map(pick),
        degrees,
      );
    const e = column((row) => row.e);
    if (!two) {
      return constant(
        column((row) => row.X),
        0,
        column((row) => row.Y),
        e,
      );
    }
    return constant(
      column((row) => row.X2rows),
      column((row) => row.Y1rows),
      column((row) => row.Y2rows),
      e,
    );
  }
  // Below 20° the factors follow the load; both neighbours are read at the arguments of the 15° table and mixed by angle.
  const at = ANGULAR_CONTACT_15.argument;
  const t = degrees <= 15 ? (degrees - 10) / 5 : (degrees - 15) / 5;
  const mix = (low: number, high: number) => low + (high - low) * t;
  const twenty = ANGULAR_CONTACT_BY_ANGLE[0]!;
  const blend = (key: 'e' | 'Y' | 'Y1rows' | 'Y2rows') =>
    at.map((x, i) =>
      degrees <= 15
        ? mix(lookUp(ANGULAR_CONTACT_10.argument, ANGULAR_CONTACT_10[key], x), ANGULAR_CONTACT_15[key][i]!)
        : mix(ANGULAR_CONTACT_15[key][i]!, twenty[key]),
    );
  const x = (key: 'X' | 'X2rows') =>
    degrees <= 15 ? mix(ANGULAR_CONTACT_10[key], ANGULAR_CONTACT_15[key]) : mix(ANGULAR_CONTACT_15[key], twenty[key]);
  const e = blend('e');
  return two
    ? { X1: 1, X2: x('X2rows'), argument: at, e, Y1: blend('Y1rows'), Y2: blend('Y2rows') }
    : { X1: 1, X2: x('X'), argument: at, e, Y1: at.map(() => 0), Y2: blend('Y') };
}

/**
 * The maker's e and Y in place of the standard's. Y is the factor above e; Y below it keeps the standard's ratio. One of the two
 * follows from the other because both lines meet at e: X1 + Y1 e = X2 + Y2 e.
 */
function withMakers(standard: Factors, e: number | null, Y: number | null, notes: Note[]): Factors {
  const ratio = standard.Y1[0]! / standard.Y2[0]!;
  const jump = standard.X1 - standard.X2;
  if (Y !== null) {
    const own = jump / (Y * (1 - ratio));
    if (e === null) notes.push('e-from-Y');
    else if (Math.abs(e / own - 1) > 0.05) notes.push('e-and-Y-disagree');
    return constant(standard.X2, ratio * Y, Y, e ?? own);
  }
  notes.push('Y-from-e');
  const fromE = jump / (e! * (1 - ratio));
  return constant(standard.X2, ratio * fromE, fromE, e!);
}

/** Factors of a bearing by kind, rows and contact angle, or the maker's e and Y where given. */
export function dynamicForm(bearing: RollingBearing): Rated<DynamicForm> {
  const { kind, e, Y } = bearing;
  for (const given of [e, Y]) if (given !== null && !isPositive(given)) return unassessed('bad-factor');
  const notes: Note[] = [];
  let momentArm: number | null = null;
  if (isRing(kind)) {
    const pitch = pitchDiameter(bearing);
    if (isUnassessed(pitch)) return pitch;
    notes.push(...pitch.notes);
    momentArm = 2 / pitch.value;
  }
  const two = bearing.rows === 2 || momentArm !== null;
  const own = e !== null || Y !== null;
  const radialOnly = !carriesThrust(kind);

  let factors: Factors;
  if (radialOnly) {
    factors = constant(1, 0, 0, Number.POSITIVE_INFINITY);
  } else if (kind === 'deep-groove') {
    const none = DEEP_GROOVE.argument.map(() => 0);
    const { argument, X, Y: Y2 } = DEEP_GROOVE;
    factors = { X1: 1, X2: X, argument, e: DEEP_GROOVE.e, Y1: none, Y2 };
  } else if (kind === 'angular-contact' || kind === 'four-point') {
    const angle = contactAngle(bearing);
    if (isUnassessed(angle)) return angle;
    notes.push(...angle.notes);
    factors = angularFactors(angle.value, two);
  } else if (own) {
    factors = cotangentFactors(kind === 'self-aligning-ball', two, 1);
  } else {
    const angle = contactAngle(bearing);
    if (isUnassessed(angle)) return angle;
    notes.push(...angle.notes);
    factors = cotangentFactors(kind === 'self-aligning-ball', two, 1 / Math.tan(angle.value));
  }
  if (own && !radialOnly) factors = withMakers(factors, e, Y, notes);

  let scale = 0;
  if (factors.argument.length > 1) {
    const C0 = staticRating(bearing);
    if (isUnassessed(C0)) return C0;
    const f0 = staticFactor(bearing);
    if (isUnassessed(f0)) return f0;
    for (const note of [...C0.notes, ...f0.notes]) if (!notes.includes(note)) notes.push(note);
    // Two rows of radial contact: C0r of the whole bearing makes f0 Fa/C0r equal Fa/(i Z Dw²), the verified source's argument.
    scale = ((kind === 'deep-groove' || !two ? 1 : 2) * f0.value) / C0.value;
  }
  return rated(
    {
      exponent: lifeExponent(kind),
      radialOnly,
      momentArm,
      X1: factors.X1,
      X2: factors.X2,
      scale,
      argument: Float64Array.from(factors.argument),
      e: Float64Array.from(factors.e),
      Y1: Float64Array.from(factors.Y1),
      Y2: Float64Array.from(factors.Y2),
    },
    ...notes,
  );
}

/**
 * P, N. `Fr` ≥ 0 N; `Fa` N, either sign; `M` N·m, the tilting moment on a ring. Infinity where a bearing without thrust capacity gets an
 * axial load; NaN where a number is not usable, or a moment is put on a bearing that carries none. Nothing is allocated.
 */
export function dynamicEquivalent(form: DynamicForm, Fr: number, Fa: number, M = 0): number {
  if (!(Fr >= 0)) return Number.NaN;
  const R = M === 0 ? Fr : Fr + Math.abs(M) * (form.momentArm ?? Number.NaN);
  if (form.radialOnly) return Number.isNaN(Fa) ? Fa : isThrust(Fr, Fa) ? Number.POSITIVE_INFINITY : R;
  const A = Math.abs(Fa);
  const x = form.scale * A;
  const last = form.argument.length - 1;
  let Y1 = form.Y1[0]!;
  let Y2 = form.Y2[0]!;
  if (x >= form.argument[last]!) {
    Y1 = form.Y1[last]!;
    Y2 = form.Y2[last]!;
  } else if (x > form.argument[0]!) {
    let i = 0;
    while (form.argument[i + 1]! < x) i++;
    const t = (x - form.argument[i]!) / (form.argument[i + 1]! - form.argument[i]!);
    Y1 = form.Y1[i]! + (form.Y1[i + 1]! - form.Y1[i]!) * t;
    Y2 = form.Y2[i]! + (form.Y2[i + 1]! - form.Y2[i]!) * t;
  }
  return Math.max(form.X1 * R + Y1 * A, form.X2 * R + Y2 * A);
}

export interface FactorsInForce {
  readonly X: number;
  readonly Y: number;
  readonly e: number;
  /** Whether Fa/R exceeds e as the equivalent load sees it: the line with X2, Y2 governs. */
  readonly beyondE: boolean;
  readonly notes: readonly Note[];
}

/** The factors behind `dynamicEquivalent` at one load, for showing. Same arguments; all NaN where the load is not usable. */
export function factorsInForce(form: DynamicForm, Fr: number, Fa: number, M = 0): FactorsInForce {
  const R = M === 0 ? Fr : Fr + Math.abs(M) * (form.momentArm ?? Number.NaN);
  const A = Math.abs(Fa);
  if (!(R >= 0) || Number.isNaN(A)) {
    return { X: Number.NaN, Y: Number.NaN, e: Number.NaN, beyondE: false, notes: [] };
  }
  const x = form.scale * A;
  const Y1 = lookUp(form.argument, form.Y1, x);
  const Y2 = lookUp(form.argument, form.Y2, x);
  const beyondE = form.X2 * R + Y2 * A > form.X1 * R + Y1 * A;
  const notes: Note[] = [];
  if (form.argument.length > 1 && A > 0) {
    if (x < form.argument[0]!) notes.push('axial-below-table');
    if (x > form.argument[form.argument.length - 1]!) notes.push('axial-beyond-table');
  }
  return {
    X: beyondE ? form.X2 : form.X1,
    Y: beyondE ? Y2 : Y1,
    e: lookUp(form.argument, form.e, x),
    beyondE,
    notes,
  };
}
