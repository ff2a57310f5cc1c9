/**
 * Static equivalent load and static safety.
 *
 *     R  = Fr + 2 M / dpw                 (M: tilting moment, only of a bearing that carries it by itself)
 *     P0 = max( R, X0 R + Y0 |Fa| )       s0 = C0 / P0
 *
 * Both are norms of linear functions of the joint load, so P0 is convex in it. X0, Y0 by kind (ISO 76:2006 table 2, from memory;
 * two rows are twice one row throughout):
 *
 *     deep groove 0.6, 0.5 · angular contact, one row 0.5 and by angle; two rows 1 and twice that · self-aligning and rollers with
 *     α ≠ 0: 0.5, 0.22 cot α (one row), 1, 0.44 cot α (two) · cylindrical and needle rollers: P0 = Fr, no thrust.
 * Ring bearings are two rows: crossed rollers at 45° give P0 = Fr + 2M/dpw + 0.44 Fa.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { carriesThrust, elementOf, isPositive, isRing } from './bearingKind.ts';
import { contactAngle, pitchDiameter } from './contactAngle.ts';
import { isUnassessed, type Note, type Rated, rated, unassessed } from './outcome.ts';
import type { Rule } from './rule.ts';

export const STATIC_EQUIVALENT_RULE: Rule = {
  name: 'static equivalent load',
  formula: 'P0 = max(R, X0 R + Y0 |Fa|), R = Fr + 2M/dpw for a ring; s0 = C0/P0',
  source: 'ISO 76:2006',
  trust: 'from memory',
  units: 'N',
  range: 'contact angle up to 45°',
};

/** P0 = max(R, X0 R + Y0 |Fa|) with R = Fr + momentArm · M. */
export interface StaticForm {
  readonly X0: number;
  readonly Y0: number;
  /** The bearing carries no thrust: any axial load is over (X0 = 1, Y0 = 0 stand for the radial load alone). */
  readonly radialOnly: boolean;
  /** 2/dpw, 1/m, of a ring; null where the bearing carries no moment by itself. */
  readonly momentArm: number | null;
}

const DEGREE = Math.PI / 180;
/** One row of angular contact balls, α in degrees and Y0; X0 = 0.5 (ISO 76:2006 table 2, from memory). */
export const ANGULAR_CONTACT_STATIC: readonly (readonly [alpha: number, Y0: number])[] = [
  [10, 0.5],
  [15, 0.46],
  [20, 0.42],
  [25, 0.38],
  [30, 0.33],
  [35, 0.29],
  [40, 0.26],
  [45, 0.22],
];

/** Axial load that is rounding, not thrust: a bearing that carries none is not failed for 1e-6 N or 1e-9 of its radial load. */
export function isThrust(Fr: number, Fa: number): boolean {
  return !(Math.abs(Fa) <= 1e-6 + 1e-9 * Math.abs(Fr));
}

/** X0, Y0 and the moment arm of a bearing, by kind, rows, contact angle; the maker's Y0 is used where given. */
export function staticForm(bearing: RollingBearing): Rated<StaticForm> {
  if (bearing.Y0 !== null && !isPositive(bearing.Y0)) return unassessed('bad-factor');
  if (!carriesThrust(bearing.kind)) return rated({ X0: 1, Y0: 0, radialOnly: true, momentArm: null });
  const notes: Note[] = [];
  let momentArm: number | null = null;
  if (isRing(bearing.kind)) {
    const pitch = pitchDiameter(bearing);
    if (isUnassessed(pitch)) return pitch;
    notes.push(...pitch.notes);
    momentArm = 2 / pitch.value;
  }
  if (bearing.kind === 'deep-groove') {
    return rated({ X0: 0.6, Y0: bearing.Y0 ?? 0.5, radialOnly: false, momentArm }, ...notes);
  }
  const two = bearing.rows === 2 || momentArm !== null;
  const X0 = two ? 1 : 0.5;
  if (bearing.Y0 !== null) return rated({ X0, Y0: bearing.Y0, radialOnly: false, momentArm }, ...notes);
  const angle = contactAngle(bearing);
  if (isUnassessed(angle)) return angle;
  notes.push(...angle.notes);
  const cotangentRule = elementOf(bearing.kind) === 'roller' || bearing.kind === 'self-aligning-ball';
  const one = cotangentRule ? 0.22 / Math.tan(angle.value) : angularContactY0(angle.value);
  return rated({ X0, Y0: two ? 2 * one : one, radialOnly: false, momentArm }, ...notes);
}

/** Linear between the rows of the table; the caller has checked the angle's range. */
function angularContactY0(alpha: number): number {
  const degrees = Math.min(45, Math.max(10, alpha / DEGREE));
  const i = Math.min(ANGULAR_CONTACT_STATIC.length - 2, Math.floor((degrees - 10) / 5));
  const [from, low] = ANGULAR_CONTACT_STATIC[i]!;
  const [to, high] = ANGULAR_CONTACT_STATIC[i + 1]!;
  return low + ((high - low) * (degrees - from)) / (to - from);
}

/**
 * P0, N. `Fr` ≥ 0 N; `Fa` N, either sign; `M` N·m, the tilting moment on a ring. Infinity where a bearing without thrust capacity gets
 * an axial load. NaN where a number is not usable, or a moment is put on a bearing that carries none.
 */
export function staticEquivalent(form: StaticForm, Fr: number, Fa: number, M = 0): number {
  if (!(Fr >= 0)) return Number.NaN;
  const R = M === 0 ? Fr : Fr + Math.abs(M) * (form.momentArm ?? Number.NaN);
  if (form.radialOnly) return Number.isNaN(Fa) ? Fa : isThrust(Fr, Fa) ? Number.POSITIVE_INFINITY : R;
  return Math.max(R, form.X0 * R + form.Y0 * Math.abs(Fa));
}

/** s0 = C0/P0: Infinity unloaded, 0 at an infinite load, NaN where C0 is not positive or P0 is not a load. */
export function staticSafety(C0: number, P0: number): number {
  return isPositive(C0) && P0 >= 0 ? C0 / P0 : Number.NaN;
}

/** Usual least static safety for normal, smooth service: 1 for balls, 1.5 for rollers (guide values of ISO 76:2006, from memory). */
export function usualStaticSafety(bearing: Pick<RollingBearing, 'kind'>): number {
  return elementOf(bearing.kind) === 'ball' ? 1 : 1.5;
}
