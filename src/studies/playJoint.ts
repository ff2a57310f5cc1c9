/**
 * How one joint gives way: by play in its bearings, and by the springing of bearings and shaft. At a joint load it gives the shift and lean of the
 * axis; over the travel a law of how far a point can be moved at most (`playReach.ts`).
 *
 * A shaft on two bearings is statically determinate, so the springing is that of a stiff shaft on bearings that give, plus that of the bent
 * shaft on stiff ones. A bearing's approach δ(F) is that of `bearingStiffness.ts`: linear for a given stiffness, F^(2/3) for balls and F^0.9
 * for rollers where it is estimated. Play is taken at its largest (all tolerances together). The thrust play of the locating bearing moves
 * the axis along itself; it is not in here.
 */
import type { Bearing } from '../arm/arm.ts';
import { radialNorms, tiltingNorms } from '../capacity/checks/jointParts.ts';
import { type BearingSide, isRingParts, type PairParts, type RingParts } from '../capacity/index.ts';
import {
  type AxisShift,
  axisThrough,
  type PlayPair,
  playTilt,
  radialStiffness,
  ringLever,
  ringPlayTilt,
  ringTiltStiffness,
  seatedAxis,
  type WorkingClearance,
  workingClearance,
} from '../capacity/play/index.ts';
import { elementOf } from '../capacity/rolling/index.ts';
import type { Assessed } from '../capacity/rule.ts';
import { deflectionForms, jointShaft, shaftSupports, slopeForms } from '../capacity/shaft/index.ts';
import type { Numbers } from '../math/vector.ts';
import { radialVector } from '../mechanics/bearingPair.ts';
import type { CheckForm, Form } from '../mechanics/form.ts';
import type { AcrossLaw } from './playReach.ts';

/** Play of one side, diametral, m. */
export interface SidePlay {
  readonly side: BearingSide;
  readonly clearance: Assessed<WorkingClearance>;
}

export interface JointPlay {
  readonly sides: readonly SidePlay[];
  /** Tilt each way at the largest play, rad. */
  readonly tilt: number;
  /** Where the axis stands at a joint load; null where a journal without load lies anywhere within its play. */
  readonly at: (w: Numbers, at: number) => AxisShift | null;
  /** Whatever way the journals lie. */
  readonly law: AcrossLaw;
}

export interface JointSpring {
  readonly at: (w: Numbers, at: number) => AxisShift;
  /** Loads that the law rises with. */
  readonly sizes: readonly CheckForm[];
  /** The law at the largest of each size. */
  readonly law: (largest: readonly number[]) => AcrossLaw;
  readonly notes: readonly string[];
}

export interface JointGive {
  readonly joint: number;
  readonly jointIndex: number;
  readonly sides: readonly SidePlay[];
  readonly play: Assessed<JointPlay>;
  readonly spring: Assessed<JointSpring>;
}

/** Load at which an estimated stiffness is read; the power law carries it to any other. */
const READ_AT = 1000;

interface Approach {
  /** m under a radial load in N. */
  readonly of: (load: number) => number;
  readonly estimated: boolean;
}

function approachOf(bearing: Bearing): Assessed<Approach> {
  const read = radialStiffness(bearing, READ_AT);
  if ('unassessed' in read) return read;
  const { stiffness, estimated } = read.value;
  const unit = READ_AT / stiffness;
  const power = !estimated || bearing.kind === 'plain-bushing' ? 1 : elementOf(bearing.kind) === 'ball' ? 2 / 3 : 0.9;
  const of = (load: number) => unit * (load / READ_AT) ** power;
  return { value: { of, estimated } };
}

export function jointGive(parts: PairParts | RingParts): JointGive {
  const { joint, jointIndex } = parts;
  const sides = isRingParts(parts) ? ringSides(parts) : pairSides(parts);
  return {
    joint,
    jointIndex,
    sides,
    play: isRingParts(parts) ? ringPlay(parts, sides) : pairPlay(parts, sides),
    spring: isRingParts(parts) ? ringSpring(parts) : pairSpring(parts),
  };
}

function pairSides(parts: PairParts): readonly SidePlay[] {
  return (['A', 'B'] as const).map((side): SidePlay => {
    const bearing = parts.bearings[side];
    const clearance = 'value' in bearing ? workingClearance(bearing.value, parts.adjusted !== null) : bearing;
    return { side, clearance };
  });
}

function ringSides({ bearing }: RingParts): readonly SidePlay[] {
  return [{ side: 'ring', clearance: 'value' in bearing ? workingClearance(bearing.value, false) : bearing }];
}

function pairPlay(parts: PairParts, sides: readonly SidePlay[]): Assessed<JointPlay> {
  const [A, B] = sides.map((one) => one.clearance);
  if (!A || !B) return { unassessed: 'the pair has no bearings' };
  if ('unassessed' in A) return { unassessed: `A: ${A.unassessed}` };
  if ('unassessed' in B) return { unassessed: `B: ${B.unassessed}` };
  const { stationA, stationB } = parts.points;
  const pair: PlayPair = { stationA, stationB, playA: A.value.play.to, playB: B.value.play.to };
  const tilt = playTilt(pair);
  if ('unassessed' in tilt) return tilt;
  const [normsA, normsB] = [radialNorms(parts, 'A'), radialNorms(parts, 'B')];
  const span = Math.abs(stationB - stationA);
  return {
    value: {
      sides,
      tilt: tilt.value,
      at: (w, at) => {
        const seated = seatedAxis(pair, radialVector(normsA, w, at), radialVector(normsB, w, at));
        return 'value' in seated ? seated.value : null;
      },
      // (|1-λ| cA + |λ| cB)/2 with 1-λ = (zB - z)/D
      law: {
        constant: 0,
        terms: [
          { station: stationB, weight: pair.playA / (2 * span) },
          { station: stationA, weight: pair.playB / (2 * span) },
        ],
        along: tilt.value,
      },
    },
  };
}

function ringPlay(parts: RingParts, sides: readonly SidePlay[]): Assessed<JointPlay> {
  const clearance = sides[0]!.clearance;
  if ('unassessed' in clearance) return clearance;
  if ('unassessed' in parts.bearing) return parts.bearing;
  const bearing = parts.bearing.value;
  if (bearing.kind === 'plain-bushing') return { unassessed: 'a plain bushing is no ring that carries moment' };
  const lever = ringLever(bearing);
  if ('unassessed' in lever) return lever;
  const play = clearance.value.play.to;
  const tilt = ringPlayTilt(play, lever.value);
  if ('unassessed' in tilt) return tilt;
  const { station } = parts.support;
  const moment = tiltingNorms(parts);
  return {
    value: {
      sides,
      tilt: tilt.value,
      // Under a moment the ring leans until it stops; what the moment leaves of the clearance is not looked for.
      at: (w, at) => {
        const [mx, my] = radialVector(moment, w, at);
        const size = Math.hypot(mx, my);
        if (play > 0 && !(size > 0)) return null;
        const lean = size > 0 ? tilt.value / size : 0;
        return { station, shift: [0, 0], lean: [lean * my, -lean * mx] };
      },
      law: { constant: play / 2, terms: [{ station, weight: tilt.value }], along: tilt.value },
    },
  };
}

function sized(parts: PairParts | RingParts, check: string, unit: string, forms: readonly Form[]): CheckForm {
  return { check, joint: parts.joint, bearing: null, unit, forms };
}

function pairSpring(parts: PairParts): Assessed<JointSpring> {
  const give: Approach[] = [];
  for (const side of ['A', 'B'] as const) {
    const bearing = parts.bearings[side];
    if ('unassessed' in bearing) return { unassessed: `${side}: ${bearing.unassessed}` };
    const approach = approachOf(bearing.value);
    if ('unassessed' in approach) return { unassessed: `${side}: ${approach.unassessed}` };
    give.push(approach.value);
  }
  const [A, B] = give as [Approach, Approach];
  const { stationA, stationB } = parts.points;
  const span = Math.abs(stationB - stationA);
  if (!(span > 0)) return { unassessed: 'the span between the bearings is zero' };
  const bent = bentShaft(parts);
  if ('unassessed' in bent) return bent;
  const { hub } = parts.support;
  const { deflection, slope } = bent.value;
  const [normsA, normsB] = [radialNorms(parts, 'A'), radialNorms(parts, 'B')];
  const pushed = (approach: Approach, [x, y]: readonly [number, number]): [number, number] => {
    const size = Math.hypot(x, y);
    const share = size === 0 ? 0 : approach.of(size) / size;
    return [share * x, share * y];
  };
  return {
    value: {
      at: (w, at) => {
        const rigid = axisThrough(
          stationA,
          pushed(A, radialVector(normsA, w, at)),
          stationB,
          pushed(B, radialVector(normsB, w, at)),
        );
        const [dx, dy] = radialVector(deflection, w, at);
        const [sx, sy] = radialVector(slope, w, at);
        const way = hub - stationA;
        return {
          station: hub,
          shift: [rigid.shift[0] + rigid.lean[0] * way + dx, rigid.shift[1] + rigid.lean[1] * way + dy],
          lean: [rigid.lean[0] + sx, rigid.lean[1] + sy],
        };
      },
      sizes: [
        sized(parts, 'radial A', 'N', normsA),
        sized(parts, 'radial B', 'N', normsB),
        sized(parts, 'deflection', 'm', deflection),
        sized(parts, 'slope', 'rad', slope),
      ],
      law: ([FA, FB, d, s]) => {
        const [a, b] = [A.of(FA!), B.of(FB!)];
        return {
          constant: d!,
          terms: [
            { station: stationB, weight: a / span },
            { station: stationA, weight: b / span },
            { station: hub, weight: s! },
          ],
          along: (a + b) / span + s!,
        };
      },
      notes: A.estimated || B.estimated ? ['stiffness of the bearings estimated, replace by the maker’s figure'] : [],
    },
  };
}

/** Forms of deflection and slope at the hub, the bearings stiff. */
function bentShaft(
  parts: PairParts,
): Assessed<{ readonly deflection: readonly Form[]; readonly slope: readonly Form[] }> {
  const { stationA, stationB } = parts.points;
  const stiff = [Number.POSITIVE_INFINITY, Number.POSITIVE_INFINITY];
  const shaft = jointShaft(parts.part, shaftSupports({ ...parts.support, stationA, stationB }, stiff));
  if ('unassessed' in shaft) return shaft;
  const deflection = deflectionForms(shaft.value, parts.support.hub);
  if ('unassessed' in deflection) return deflection;
  const slope = slopeForms(shaft.value, parts.support.hub);
  if ('unassessed' in slope) return slope;
  return { value: { deflection: deflection.value, slope: slope.value } };
}

/** A ring on stiff seats: what its shaft bends is not in it. */
function ringSpring(parts: RingParts): Assessed<JointSpring> {
  if ('unassessed' in parts.bearing) return parts.bearing;
  const bearing = parts.bearing.value;
  if (bearing.kind === 'plain-bushing') return { unassessed: 'a plain bushing is no ring that carries moment' };
  const radial = radialStiffness(bearing, READ_AT);
  if ('unassessed' in radial) return radial;
  const lever = ringLever(bearing);
  if ('unassessed' in lever) return lever;
  const tilting = ringTiltStiffness(radial.value.stiffness, lever.value);
  if ('unassessed' in tilting) return tilting;
  const k = radial.value.stiffness;
  const K = tilting.value;
  const { station } = parts.support;
  const [force, moment] = [radialNorms(parts, 'ring'), tiltingNorms(parts)];
  return {
    value: {
      at: (w, at) => {
        const [fx, fy] = radialVector(force, w, at);
        const [mx, my] = radialVector(moment, w, at);
        return { station, shift: [fx / k, fy / k], lean: [my / K, -mx / K] };
      },
      sizes: [sized(parts, 'radial', 'N', force), sized(parts, 'moment', 'N·m', moment)],
      law: ([F, M]) => ({ constant: F! / k, terms: [{ station, weight: M! / K }], along: M! / K }),
      notes: ['tilt stiffness of the ring worked out from its radial one; its shaft and seats taken as stiff'],
    },
  };
}
