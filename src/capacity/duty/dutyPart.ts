/**
 * A bearing as the duty sees it: what wears it at a joint load, with which exponent, and a safe value of that from the largest radial load,
 * thrust and moment that a case can put on it, whether or not these come together.
 *
 * Rolling bearing: the dynamic equivalent load P and the exponent p of its life. P never falls with a rising radial load, thrust or moment
 * (`../rolling/dynamicEquivalent.ts`), nor do the rows of an adjusted pair, so P of the largest of each is never below P of any of them
 * together. Plain bushing: the radial load in its bore, and the thrust on its flange as a part of its own, with the exponent 1, for wear grows
 * with pressure times the distance slid.
 */
import type { Bearing, PlainBushing, RollingBearing } from '../../arm/arm.ts';
import type { Numbers } from '../../math/vector.ts';
import { axialForms } from '../../mechanics/bearingPair.ts';
import { type CheckForm, checkValue, form } from '../../mechanics/form.ts';
import { type DemandAt, type DynamicLoad, dynamicLoad } from '../checks/index.ts';
import {
  type BearingSide,
  isRingParts,
  type PairParts,
  type RingParts,
  radialNorms,
  thrustSigns,
  tiltingNorms,
} from '../checks/jointParts.ts';
import { type FlangeFace, flangeFace } from '../plain/index.ts';
import { dynamicEquivalent, shareThrust } from '../rolling/index.ts';
import type { Assessed } from '../rule.ts';

interface Common {
  /** Chain index of the joint, and its index in the arm file. */
  readonly joint: number;
  readonly jointIndex: number;
  readonly side: BearingSide;
  /** N at a joint load w[at..at+5], canonical housing frame; NaN where that is not finite. Nothing is allocated. */
  readonly at: DemandAt;
  /** Loads that `at` rises with. */
  readonly sizes: readonly CheckForm[];
  /** A load that `at` does not exceed while no size exceeds its own of `largest[at..]`, N. */
  readonly fromSizes: (largest: Numbers, at: number) => number;
  /** The load counts by this power over the angle turned. */
  readonly exponent: number;
  readonly notes: readonly string[];
}

export interface DutyRolling extends Common {
  readonly kind: 'rolling';
  readonly bearing: RollingBearing;
}

/** Where a bushing slides: in its bore under the radial load, or on its flange under the thrust. */
export type BushingFace = 'bore' | 'flange';

export interface DutyBushing extends Common {
  readonly kind: 'bushing';
  readonly bearing: PlainBushing;
  readonly face: BushingFace;
  /** Pressed area, m², and the diameter at which it slides, m. */
  readonly slides: FlangeFace;
}

export type DutyPart = DutyRolling | DutyBushing;

/** The faces of a side that the duty looks at: the flange of a bushing too, where thrust can reach it. */
export function dutyFaces(parts: PairParts | RingParts, side: BearingSide): readonly BushingFace[] {
  if (isRingParts(parts) || side === 'ring') return ['bore'];
  const outcome = parts.bearings[side];
  const flanged = 'value' in outcome && outcome.value.kind === 'plain-bushing' && outcome.value.flangeOuter !== null;
  return flanged && thrustSigns(parts.support, side).length > 0 ? ['bore', 'flange'] : ['bore'];
}

/** A side of a joint (of a bushing one face), ready for any number of loads; or why it cannot be. */
export function dutyPart(
  parts: PairParts | RingParts,
  side: BearingSide,
  face: BushingFace = 'bore',
): Assessed<DutyPart> {
  const outcome: Assessed<Bearing> = isRingParts(parts) ? parts.bearing : parts.bearings[side === 'B' ? 'B' : 'A'];
  if ('unassessed' in outcome) return outcome;
  const { joint, jointIndex } = parts;
  const size = (check: string, unit: string, forms: CheckForm['forms']): CheckForm => {
    return { check, joint, bearing: side, unit, forms };
  };
  const radial = size('radial', 'N', radialNorms(parts, side));
  if (outcome.value.kind === 'plain-bushing') {
    if (isRingParts(parts)) return { unassessed: 'a plain bushing is no ring that carries moment' };
    const slides = bushingFace(outcome.value, face);
    if ('unassessed' in slides) return slides;
    const axial = () => size('axial', 'N', axialForms(parts.support.thrust, side === 'B' ? 'B' : 'A'));
    const pressed = face === 'bore' ? radial : axial();
    return {
      value: {
        kind: 'bushing',
        joint,
        jointIndex,
        side,
        bearing: outcome.value,
        face,
        slides: slides.value,
        at: (w, at) => checkValue(pressed, w, at),
        sizes: [pressed],
        fromSizes: (largest, at) => largest[at]!,
        exponent: 1,
        notes: [],
      },
    };
  }
  const load = dynamicLoad(parts, side);
  if (load === null) return { unassessed: 'the bearing is of no known kind' };
  if ('unassessed' in load) return load;
  const { value } = load;
  const common = {
    kind: 'rolling',
    joint,
    jointIndex,
    side,
    bearing: value.bearing,
    at: value.at,
    exponent: value.form.exponent,
    notes: value.notes,
  } as const;
  if (isRingParts(parts)) {
    const sizes = [
      radial,
      size('axial', 'N', [form({ P: [[0, 0, 1, 0, 0, 0]] })]),
      size('moment', 'N·m', tiltingNorms(parts)),
    ];
    const fromSizes = (s: Numbers, at: number) => dynamicEquivalent(value.form, s[at]!, s[at + 1]!, s[at + 2]!);
    return { value: { ...common, sizes, fromSizes } };
  }
  if (parts.adjusted && 'value' in parts.adjusted) {
    return { value: { ...common, ...adjustedSizes(parts, side, value) } };
  }
  const sizes = [radial, size('axial', 'N', axialForms(parts.support.thrust, side === 'B' ? 'B' : 'A'))];
  return { value: { ...common, sizes, fromSizes: (s, at) => dynamicEquivalent(value.form, s[at]!, s[at + 1]!) } };
}

function bushingFace({ bore, width, flangeOuter }: PlainBushing, face: BushingFace): Assessed<FlangeFace> {
  if (face === 'flange') return flangeFace(bore, flangeOuter);
  if (!(bore > 0 && width > 0)) return { unassessed: 'bore and length of the bushing must be positive numbers' };
  return { value: { area: bore * width, diameter: bore } };
}

/** Both rows' radial loads and the thrust that loads this row: each raises its axial load (`shareThrust` is a maximum of rising parts). */
function adjustedSizes(parts: PairParts, side: BearingSide, load: DynamicLoad): Pick<DutyPart, 'sizes' | 'fromSizes'> {
  const adjusted = parts.adjusted;
  if (!adjusted || 'unassessed' in adjusted) throw new RangeError('the pair is not adjusted');
  const { lawA, lawB, sign } = adjusted.value;
  const isA = side !== 'B';
  const push = isA ? sign : -sign;
  const size = (check: string, bearing: 'A' | 'B', forms: CheckForm['forms']): CheckForm => {
    return { check, joint: parts.joint, bearing, unit: 'N', forms };
  };
  const sizes = [
    size('radial', 'A', radialNorms(parts, 'A')),
    size('radial', 'B', radialNorms(parts, 'B')),
    size('push', isA ? 'A' : 'B', [form({ P: [[0, 0, 0, 0, 0, 0]], l: [0, 0, push, 0, 0, 0] })]),
  ];
  const axial = new Float64Array(2);
  const fromSizes = (s: Numbers, at: number) => {
    const Ka = isA ? s[at + 2]! : -s[at + 2]!;
    shareThrust(lawA, lawB, s[at]!, s[at + 1]!, Ka, axial);
    return dynamicEquivalent(load.form, isA ? s[at]! : s[at + 1]!, isA ? axial[0]! : axial[1]!);
  };
  return { sizes, fromSizes };
}
