/**
 * Static equivalent load of a rolling bearing against C0 over the static safety asked for.
 *
 *     P0 = max(R, X0 R + Y0 |Fa|)          R = Fr, of a ring R = Fr + 2M/dpw
 *
 * Bearing of a pair: Fa is the thrust where the bearing locates (one way only where the pair takes it by direction), else nothing; P0 is
 * then a maximum of forms, exact. Ring: a sum of two norms; the norm of the moment is exact, that of the radial load by directions
 * (`normSums.ts`). Adjusted pair: R at the pressure centres and FaA = max(SA, SB + Ka), S = c Fr (`../rolling/adjustedPair.ts`); with the
 * largest c of each row P0 = max((X0 + Y0 cA) FrA, X0 FrA + Y0 (cB FrB + Ka), FrA), again a sum of norms. The demand at a pose is always
 * P0 itself.
 */
import type { RollingBearing } from '../../arm/arm.ts';
import { type CheckForm, checkValue, type Form } from '../../mechanics/form.ts';
import {
  isUnassessed,
  largestThrust,
  type Note,
  needsPartner,
  STATIC_EQUIVALENT_RULE,
  type StaticForm,
  sentence,
  staticEquivalent,
  staticForm,
  staticRating,
} from '../rolling/index.ts';
import { staticSafetyTarget } from '../targets.ts';
import { type AdjustedPair, rowLoad } from './adjustedParts.ts';
import { type CapacityCheck, type CheckName, type DemandAt, formCheck, missingCheck } from './check.ts';
import {
  isRingParts,
  named,
  type PairParts,
  type RingParts,
  radialNorms,
  type SupportedJoint,
  thrustLine,
  thrustSigns,
  tiltingNorms,
} from './jointParts.ts';
import { SUM_MARGIN, scaledForms, sumForms } from './normSums.ts';

const NAME = { check: 'static', label: 'static equivalent load', unit: 'N', rule: STATIC_EQUIVALENT_RULE } as const;

export const NO_PARTNER =
  'a single row angular contact or tapered bearing carries thrust one way and needs a partner set against it: fill in `adjusted`';

/** Checks of the rolling bearings of a joint; bushings have none. */
export function staticChecks(parts: PairParts | RingParts): readonly CapacityCheck[] {
  if (isRingParts(parts)) return ringStatic(parts);
  return (['A', 'B'] as const).flatMap((side) => pairStatic(parts, side));
}

interface Demand {
  readonly forms: readonly Form[];
  readonly atPose: DemandAt | null;
  readonly notes: readonly string[];
}

/** With the allowable: C0 over the static safety asked for. */
function rated(
  parts: SupportedJoint,
  name: CheckName,
  bearing: RollingBearing,
  outcome: { readonly value: StaticForm; readonly notes: readonly Note[] },
  demand: Demand,
): CapacityCheck {
  const target = staticSafetyTarget(parts.targets, bearing);
  const C0 = staticRating(bearing);
  const words = (notes: readonly Note[]) => [...new Set(notes)].map(sentence);
  if (isUnassessed(C0) || target.value === null) {
    const why = isUnassessed(C0) ? sentence(C0.unassessed) : target.source;
    return formCheck(name, demand.forms, {
      atPose: demand.atPose,
      unassessed: why,
      notes: [...demand.notes, ...words(outcome.notes)],
    });
  }
  const safety = `static safety ${target.value} (${target.given ? 'arm file' : `default: ${target.source}`})`;
  const rating = C0.notes.includes('C0-estimated')
    ? sentence('C0-estimated')
    : (bearing.source ?? 'C0 of the arm file');
  return formCheck(name, demand.forms, {
    atPose: demand.atPose,
    allowable: C0.value / target.value,
    source: `C0 over ${safety}; ${rating}`,
    notes: [...demand.notes, ...words([...outcome.notes, ...C0.notes])],
  });
}

function pairStatic(parts: PairParts, side: 'A' | 'B'): readonly CapacityCheck[] {
  const name = named(parts, side, NAME);
  const outcome = parts.bearings[side];
  if ('unassessed' in outcome) return [missingCheck(name, outcome.unassessed)];
  const bearing = outcome.value;
  if (bearing.kind === 'plain-bushing') return [];
  const factors = staticForm(bearing);
  if (isUnassessed(factors)) return [missingCheck(name, sentence(factors.unassessed))];
  if (parts.adjusted) {
    if ('unassessed' in parts.adjusted) return [missingCheck(name, parts.adjusted.unassessed)];
    return [rated(parts, name, bearing, factors, adjustedDemand(parts, parts.adjusted.value, side, factors.value))];
  }
  if (needsPartner(bearing)) return [missingCheck(name, NO_PARTNER)];
  const radial = radialNorms(parts, side);
  const { X0, Y0, radialOnly } = factors.value;
  const signs = radialOnly ? [] : thrustSigns(parts.support, side);
  const forms = [...radial, ...signs.flatMap((sign) => scaledForms(radial, X0, thrustLine(sign * Y0)))];
  return [rated(parts, name, bearing, factors, { forms, atPose: null, notes: [] })];
}

/** Rows loaded through each other; the largest induced thrust of each row makes a safe convex form. */
function adjustedDemand(parts: PairParts, pair: AdjustedPair, side: 'A' | 'B', factors: StaticForm): Demand {
  const own = radialNorms(parts, side);
  const other = radialNorms(parts, side === 'A' ? 'B' : 'A');
  const [ownLaw, otherLaw] = side === 'A' ? [pair.lawA, pair.lawB] : [pair.lawB, pair.lawA];
  const { X0, Y0 } = factors;
  const push = (side === 'A' ? pair.sign : -pair.sign) * Y0;
  const forms = [
    ...scaledForms(own, Math.max(1, X0 + Y0 * largestThrust(ownLaw))),
    ...sumForms(own, X0, other, Y0 * largestThrust(otherLaw), thrustLine(push)),
  ];
  const load = rowLoad(pair, side);
  const out = new Float64Array(2);
  return {
    forms,
    atPose: (w, at) => {
      load(w, at, out);
      return staticEquivalent(factors, out[0]!, out[1]!);
    },
    notes: [
      `radial load at the pressure centres, with the thrust that the rows induce in each other; the bound takes the largest induced thrust and up to ${(100 * SUM_MARGIN).toFixed(1)} % more of the other row's`,
      ...thrustWay(parts, pair),
      ...pair.notes.map(sentence),
    ],
  };
}

/** What is worth saying about the way the thrust goes. */
export function thrustWay(parts: PairParts, pair: AdjustedPair): readonly string[] {
  const way =
    pair.sign > 0
      ? []
      : [
          'thrust along + axis loads B, by the way this pair stands; the axial load of a bearing alone is told by its side',
        ];
  const entry = parts.loadOnAssumed ? ['no shaft is given: taken to turn with the link'] : [];
  return [...way, ...entry];
}

function ringStatic(parts: RingParts): readonly CapacityCheck[] {
  const name = named(parts, 'ring', NAME);
  if ('unassessed' in parts.bearing) return [missingCheck(name, parts.bearing.unassessed)];
  const bearing = parts.bearing.value;
  if (bearing.kind === 'plain-bushing') return [missingCheck(name, 'a plain bushing is no ring that carries moment')];
  const factors = staticForm(bearing);
  if (isUnassessed(factors)) return [missingCheck(name, sentence(factors.unassessed))];
  const { X0, Y0, momentArm } = factors.value;
  if (momentArm === null) return [missingCheck(name, 'this kind of bearing carries no moment by itself')];
  const radial = radialNorms(parts, 'ring');
  const moment = tiltingNorms(parts);
  const R = (scale: number, l?: readonly number[]) => sumForms(moment, scale * momentArm, radial, scale, l);
  // With X0 ≥ 1 the combined line is never below R alone.
  const forms = [...(X0 < 1 ? R(1) : []), ...[1, -1].flatMap((sign) => R(X0, thrustLine(sign * Y0)))];
  const sizes = [radial, moment].map((norms): CheckForm => {
    return { check: 'size', joint: parts.joint, bearing: 'ring', unit: 'N', forms: norms };
  });
  const atPose: DemandAt = (w, at) =>
    staticEquivalent(factors.value, checkValue(sizes[0]!, w, at), w[at + 2]!, checkValue(sizes[1]!, w, at));
  const note = `the bound takes up to ${(100 * SUM_MARGIN).toFixed(1)} % more of the radial load, so that it stays one`;
  return [rated(parts, name, bearing, factors, { forms, atPose, notes: [note] })];
}
