/** An adjusted angular contact or tapered pair of a joint: where it holds the shaft, and how its rows share the thrust. */
import type { Bearing, Drive, PairSupport, RollingBearing } from '../../arm/arm.ts';
import type { Numbers } from '../../math/vector.ts';
import { type PairGeometry, radialForms } from '../../mechanics/bearingPair.ts';
import { checkValue } from '../../mechanics/form.ts';
import {
  type InducedThrust,
  inducedThrust,
  isUnassessed,
  type Note,
  pressureCentreOffset,
  pressureCentres,
  sentence,
  shareThrust,
  thrustOnA,
  type Unassessed,
} from '../rolling/index.ts';
import type { Assessed } from '../rule.ts';

export interface AdjustedPair {
  readonly A: RollingBearing;
  readonly B: RollingBearing;
  /** At the pressure centres. */
  readonly points: PairGeometry;
  readonly lawA: InducedThrust;
  readonly lawB: InducedThrust;
  /** 1 where thrust along + axis loads row A, -1 where it loads row B. */
  readonly sign: 1 | -1;
  readonly notes: readonly Note[];
}

function rollingOf(bearing: Assessed<Bearing>): Assessed<RollingBearing> {
  if ('unassessed' in bearing) return bearing;
  const { value } = bearing;
  return value.kind === 'plain-bushing' ? { unassessed: sentence('no-thrust-partner') } : { value };
}

function refused(outcome: Unassessed): { readonly unassessed: string } {
  return { unassessed: sentence(outcome.unassessed) };
}

/** `loadOn`: whether the joint load enters by the shaft or by the housings of the bearings. */
export function adjustedPair(
  support: PairSupport,
  bearings: Readonly<Record<'A' | 'B', Assessed<Bearing>>>,
  drive: Drive | null,
  loadOn: 'shaft' | 'housing',
): Assessed<AdjustedPair> {
  const adjustment = support.adjusted;
  if (adjustment === null) return { unassessed: 'the pair is not adjusted: fill in `adjusted`' };
  const A = rollingOf(bearings.A);
  if ('unassessed' in A) return A;
  const B = rollingOf(bearings.B);
  if ('unassessed' in B) return B;
  const lawA = inducedThrust(A.value);
  if (isUnassessed(lawA)) return refused(lawA);
  const lawB = inducedThrust(B.value);
  if (isUnassessed(lawB)) return refused(lawB);
  const offsetA = pressureCentreOffset(A.value);
  if (isUnassessed(offsetA)) return refused(offsetA);
  const offsetB = pressureCentreOffset(B.value);
  if (isUnassessed(offsetB)) return refused(offsetB);
  const { stationA, stationB } = support;
  const centres = pressureCentres(adjustment, stationA, stationB, offsetA.value, offsetB.value);
  if (isUnassessed(centres)) return refused(centres);
  return {
    value: {
      A: A.value,
      B: B.value,
      points: { stationA: centres.value.stationA, stationB: centres.value.stationB, drive },
      lawA: lawA.value,
      lawB: lawB.value,
      sign: thrustOnA(adjustment, stationA, stationB, 1, loadOn) > 0 ? 1 : -1,
      notes: [...new Set([...lawA.notes, ...lawB.notes, ...offsetA.notes, ...offsetB.notes])],
    },
  };
}

/** Radial load at the pressure centre and axial load of one row at a joint load, to `out` [2], N. Nothing is allocated. */
export type RowLoad = (w: Numbers, at: number, out: Float64Array) => void;

/** Prepared for many poses. */
export function rowLoad(pair: AdjustedPair, side: 'A' | 'B'): RowLoad {
  const radial = (which: 'A' | 'B') => ({
    check: 'radial',
    joint: 0,
    bearing: which,
    unit: 'N',
    forms: radialForms(pair.points, which),
  });
  const [radialA, radialB] = [radial('A'), radial('B')];
  const axial = new Float64Array(2);
  return (w, at, out) => {
    const FrA = checkValue(radialA, w, at);
    const FrB = checkValue(radialB, w, at);
    shareThrust(pair.lawA, pair.lawB, FrA, FrB, pair.sign * w[at + 2]!, axial);
    out[0] = side === 'A' ? FrA : FrB;
    out[1] = side === 'A' ? axial[0]! : axial[1]!;
  };
}
