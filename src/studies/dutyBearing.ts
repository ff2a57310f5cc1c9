/** From the segments of a duty to the life of each rolling bearing, the PV of each bushing, and the life of all bearings together. */
import {
  bearingLife,
  type DutyBushing,
  type DutyPart,
  type PathSwings,
  smallSwingShare,
} from '../capacity/duty/index.ts';
import { criticalHalfSwing, internalGeometry, isUnassessed, sentence, systemLife } from '../capacity/rolling/index.ts';
import type { DutyBearing, PartSegment, SegmentResult, SystemLife } from './dutyResult.ts';

/** One segment worked out; swings of each joint along a path, null anywhere in travel. */
export interface Run {
  readonly segment: SegmentResult;
  readonly parts: readonly PartSegment[];
  readonly swings: readonly (PathSwings | null)[];
}

/** Of a bearing of which nothing is known. */
export const NOTHING = {
  kind: null,
  segments: [],
  life: null,
  attainedLife: null,
  bushing: null,
  unassessed: null,
  notes: [],
  warnings: [],
} as const;

export type BearingBody = Omit<DutyBearing, 'joint' | 'jointIndex' | 'side' | 'face'>;

export function bearingDuty(
  part: DutyPart,
  segments: readonly PartSegment[],
  runs: readonly Run[],
  shares: readonly number[],
  reliability: number,
): BearingBody {
  if (part.kind === 'bushing') return bushingDuty(part, segments, runs, shares);
  const turning = segments.map((one, s) => shares[s]! * one.turning);
  const loads = (pick: 'load' | 'attained') => segments.map((one) => (one.turning > 0 ? one[pick] : 0));
  const life = bearingLife(part.bearing, loads('load'), turning, reliability);
  const attained = bearingLife(part.bearing, loads('attained'), turning, reliability);
  const common = { ...NOTHING, kind: 'rolling', segments } as const;
  if ('unassessed' in life) return { ...common, unassessed: life.unassessed, notes: part.notes };
  return {
    ...common,
    life: life.value,
    attainedLife: 'value' in attained ? attained.value : null,
    notes: [...new Set([...part.notes, ...life.value.notes])],
    // About the loads found: a wide bound is not what the bearing sees.
    warnings: [...('value' in attained ? attained.value.warnings : []), ...smallArcs(part, runs)],
  };
}

/** Less than this share of the turning in small arcs is not worth a word: bigger swings renew the grease. */
const SMALL_SHARE = 0.05;

/** The warning of small arcs, with how much of the turning they are. */
function smallArcs(part: DutyPart, runs: readonly Run[]): readonly string[] {
  if (part.kind !== 'rolling') return [];
  const geometry = internalGeometry(part.bearing);
  if (isUnassessed(geometry)) return [];
  const critical = criticalHalfSwing(geometry.value);
  let swept = 0;
  let small = 0;
  runs.forEach(({ segment, swings }) => {
    const joint = segment.joints[part.joint]!;
    const mine = swings[part.joint];
    const weight = segment.share * joint.swept;
    const share = mine ? smallSwingShare(mine, critical) : joint.halfSwings.some((half) => !(half >= critical)) ? 1 : 0;
    swept += weight;
    small += weight * share;
  });
  if (!(small >= SMALL_SHARE * swept && small > 0)) return [];
  return [`${sentence('small-arc')} (${Math.round((100 * small) / swept)} % of what it turns)`];
}

function bushingDuty(
  part: DutyBushing,
  segments: readonly PartSegment[],
  runs: readonly Run[],
  shares: readonly number[],
): BearingBody {
  const { area, diameter } = part.slides;
  const common = { ...NOTHING, kind: 'bushing', segments, notes: part.notes } as const;
  const each = segments.map((one, s) => {
    const joint = runs[s]!.segment.joints[part.joint]!;
    const speed = (joint.swept * diameter) / 2;
    const pv = (load: number) => (speed === 0 ? 0 : (load / area) * speed);
    return {
      pv: pv(one.load),
      attained: pv(one.attained),
      speed,
      peakSpeed: (joint.peakSpeed * diameter) / 2,
    };
  });
  if (each.some(({ pv }) => Number.isNaN(pv))) {
    return { ...common, unassessed: 'a load on the bushing is not a usable number' };
  }
  let worst = 0;
  each.forEach((one, s) => {
    if (one.pv > each[worst]!.pv) worst = s;
  });
  const sum = (of: (s: number) => number) => shares.reduce((total, share, s) => total + share * of(s), 0);
  return {
    ...common,
    bushing: {
      pv: each[worst]!.pv,
      attainedPv: Math.max(...each.map((one) => one.attained)),
      segment: worst,
      peakSpeed: Math.max(...each.map((one) => one.peakSpeed)),
      slid: sum((s) => each[s]!.speed),
      wearRate: sum((s) => each[s]!.pv),
      attainedWearRate: sum((s) => each[s]!.attained),
    },
  };
}

export function dutySystem(bearings: readonly DutyBearing[]): SystemLife {
  const none = { basic: Number.NaN, life: Number.NaN, attained: Number.NaN, bearings: 0 };
  const rolling = bearings.filter((one) => one.kind !== 'bushing');
  const still = sentence('no-turning');
  const open = rolling.filter((one) => one.life === null && one.unassessed !== still);
  if (open.length > 0) {
    const names = open.map((one) => `${one.joint} ${one.side}`).join(', ');
    return { ...none, unassessed: `the life of ${names} is not known` };
  }
  const lives = rolling.flatMap((one) => (one.life ? [one.life] : []));
  if (lives.length === 0) return { ...none, unassessed: 'the duty turns no rolling bearing' };
  const slopes = lives.map((one) => one.slope);
  const basic = systemLife(
    lives.map((one) => one.basic),
    slopes,
  );
  const attained = systemLife(
    rolling.flatMap((one) => (one.life ? [one.attainedLife?.basic ?? Number.NaN] : [])),
    slopes,
  );
  const { a1 } = lives[0]!;
  return { basic, life: a1 * basic, attained: a1 * attained, bearings: lives.length, unassessed: null };
}
