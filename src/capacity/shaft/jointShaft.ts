/**
 * The shaft of one joint, from arm data to check forms: where it lies, what holds and loads it, which sections are checked; its
 * stress, slope and deflection as convex forms of the joint load, and the load history of a section for fatigue.
 */
import type { Joint, Support } from '../../arm/arm.ts';
import { type ShaftLoading, shaftForms, vonMisesForms } from '../../mechanics/beamForms.ts';
import { type BeamSupport, prepareBeam, type SteppedBeam } from '../../mechanics/beamStepped.ts';
import { radialVector } from '../../mechanics/bearingPair.ts';
import { WRENCH } from '../../mechanics/chain.ts';
import { type Form, form } from '../../mechanics/form.ts';
import { findMaterial, type Material } from '../materials.ts';
import type { Assessed } from '../rule.ts';
import { criticalPoints, type ShaftPoint, shaftParts, thrustShare, torqueShare } from './layout.ts';
import { HISTORY_STRIDE } from './loadCycle.ts';
import { fatigueFactors } from './notch.ts';
import { transverseShear } from './stress.ts';

export interface JointShaft {
  readonly beam: SteppedBeam;
  readonly loading: ShaftLoading;
  readonly material: Material;
  readonly points: readonly ShaftPoint[];
  /** Per point: whether the section carries the joint's torque and thrust, 1 or 0. */
  readonly torque: readonly (0 | 1)[];
  readonly thrust: readonly (0 | 1)[];
}

/**
 * Supports of the shaft at the bearings. `stiffness`, N/m a bearing (a ring has one); Infinity where not known: slopes are then those of
 * the shaft alone. A ring bearing clamps the axis as well.
 */
export function shaftSupports(support: Support, stiffness: readonly number[]): BeamSupport[] {
  const k = (i: number) => stiffness[i] ?? Number.NaN;
  if (support.arrangement === 'ring') {
    return [{ station: support.station, stiffness: k(0), tiltStiffness: Number.POSITIVE_INFINITY }];
  }
  return [support.stationA, support.stationB].map((station, i) => ({ station, stiffness: k(i), tiltStiffness: 0 }));
}

/**
 * The shaft of a joint on the given supports. It reaches over hub, drive, supports and its own sections; unassessed without
 * shaft, support or known material, or where the beam is refused.
 */
export function jointShaft(joint: Joint, supports: readonly BeamSupport[]): Assessed<JointShaft> {
  const { support, drive } = joint;
  if (!support) return { unassessed: 'the joint has no support: fill in `support`' };
  const { shaft, hub } = support;
  if (!shaft) return { unassessed: 'the support has no shaft: fill in `shaft`' };
  const material = findMaterial(shaft.material);
  if ('unassessed' in material) return material;
  const loaded = [hub, ...supports.map((s) => s.station), ...(drive ? [drive.station] : [])];
  const all = [...loaded, ...shaft.sections.flatMap((section) => [section.from, section.to])];
  const from = Math.min(...all);
  const to = Math.max(...all);
  if (!(to > from)) return { unassessed: 'the shaft has no length: hub, bearings and drive stand at one place' };
  const beam = prepareBeam(shaftParts(shaft, material.value, from, to), supports, loaded);
  if ('unassessed' in beam) return beam;
  const points = criticalPoints(shaft, from, to, loaded);
  return {
    value: {
      beam,
      loading: { hub, drive },
      material: material.value,
      points,
      torque: points.map(({ station }) => torqueShare(shaft, hub, drive, station)),
      thrust: points.map(({ station }) => thrustShare(support, station)),
    },
  };
}

/** Forms without those that say the same as an earlier one: the two sides of a point differ only where a load enters. */
function distinct(forms: readonly Form[]): readonly Form[] {
  const numbers = (f: Form) => [...f.P, ...f.c, ...f.l];
  const alike = (a: Form, b: Form) => {
    if (a.torqueFrom !== b.torqueFrom || a.torqueTo !== b.torqueTo) return false;
    const other = numbers(b);
    const size = other.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    return numbers(a).every((value, i) => Math.abs(value - other[i]!) <= SAME * size);
  };
  return forms.filter((f, i) => !forms.slice(0, i).some((earlier) => alike(earlier, f)));
}

/** Difference below which two coefficients are one, as a share of the largest of the form; far below what a load is known to. */
const SAME = 1e-12;

/** Forms of the bending moment at a point, N·m, on both sides of it. */
export function momentForms(shaft: JointShaft, point: number): Assessed<readonly Form[]> {
  const { station } = shaft.points[point]!;
  const before = shaftForms(shaft.beam, shaft.loading, station, 'momentBefore');
  if ('unassessed' in before) return before;
  const after = shaftForms(shaft.beam, shaft.loading, station, 'momentAfter');
  return 'unassessed' in after ? after : { value: distinct([...before, ...after]) };
}

/**
 * Forms of the von Mises stress at a point, Pa: an upper bound that equals `sectionStress` (with the fatigue factors of the notch, as the
 * yield rule has them) without thrust, and exceeds it by less than the thrust stress with it.
 */
export function stressForms(shaft: JointShaft, point: number): Assessed<readonly Form[]> {
  const { station, section, notch } = shaft.points[point]!;
  const moment = momentForms(shaft, point);
  if ('unassessed' in moment) return moment;
  const Kf = fatigueFactors(shaft.material, notch.factors, notch.radius);
  const { W, Wp, area } = section;
  if (!Number.isFinite(Kf.bending + Kf.torsion + W)) {
    return { unassessed: 'a diameter or a stress-concentration factor of the shaft is not a usable number' };
  }
  const raised = { W: W / Kf.bending, Wp: Wp / Kf.torsion, area };
  const surface = vonMisesForms(moment.value, raised, shaft.torque[point]!, shaft.thrust[point]!);
  const neutral: Form[] = [];
  for (const side of ['shearBefore', 'shearAfter'] as const) {
    const shear = shaftForms(shaft.beam, shaft.loading, station, side);
    if ('unassessed' in shear) return shear;
    const across = Math.sqrt(3) * transverseShear(1, section);
    const twist = (Math.sqrt(3) * shaft.torque[point]!) / Wp;
    const push = shaft.thrust[point]! / area;
    for (const f of shear) {
      const row = (r: number) => Array.from(f.P.subarray(WRENCH * r, WRENCH * r + WRENCH), (value) => across * value);
      for (const sign of twist === 0 ? [1] : [1, -1]) {
        neutral.push(
          form({
            P: [row(0), row(1), [0, 0, push, 0, 0, 0]],
            c: [across * f.c[0]!, across * f.c[1]!, 0],
            l: [0, 0, 0, 0, 0, sign * twist],
            torque: [f.torqueFrom, f.torqueTo],
          }),
        );
      }
    }
  }
  return { value: [...surface, ...distinct(neutral)] };
}

/** Forms of the slope at a station (rad), such as that of a bearing, or of the deflection there (m), such as that of the hub. */
export function slopeForms(shaft: JointShaft, station: number): Assessed<readonly Form[]> {
  const forms = shaftForms(shaft.beam, shaft.loading, station, 'slope');
  return 'unassessed' in forms ? forms : { value: forms };
}

export function deflectionForms(shaft: JointShaft, station: number): Assessed<readonly Form[]> {
  const forms = shaftForms(shaft.beam, shaft.loading, station, 'deflection');
  return 'unassessed' in forms ? forms : { value: forms };
}

/**
 * History of a section for `loadCycles`, one side of a point. `wrenches`: joint loads [6 a pose]; `angles`: the joint's q, rad, one a pose.
 * The forms' rows are the bending in planes x and y; the moment vector on the section is (-My-plane, Mx-plane).
 */
export function sectionHistory(
  shaft: JointShaft,
  point: number,
  side: 'momentBefore' | 'momentAfter',
  wrenches: ArrayLike<number>,
  angles: ArrayLike<number>,
): Assessed<Float64Array> {
  const forms = shaftForms(shaft.beam, shaft.loading, shaft.points[point]!.station, side);
  if ('unassessed' in forms) return forms;
  const value = new Float64Array(HISTORY_STRIDE * angles.length);
  for (let p = 0; p < angles.length; p++) {
    const [x, y] = radialVector(forms, wrenches, WRENCH * p);
    value[HISTORY_STRIDE * p] = -y;
    value[HISTORY_STRIDE * p + 1] = x;
    value[HISTORY_STRIDE * p + 2] = shaft.torque[point]! * wrenches[WRENCH * p + 5]!;
    value[HISTORY_STRIDE * p + 3] = angles[p]!;
  }
  return { value };
}
