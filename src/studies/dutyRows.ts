/**
 * The duty as rows beside those of the other checks:
 *
 *   - `life` of each rolling bearing, s of duty time at the reliability asked for. More is better: `value` is the life by the loads that
 *     were found, `bound` (where a segment may be anywhere in travel) a life that is reached for certain. Utilisation is the life asked for over
 *     the life that is certain: the share of the bearing that the time asked for wears. A pass keeps its warnings as its reason.
 *   - `pv` of each bushing, the mean of pressure times sliding speed in the hardest segment, and `speed`, its fastest sliding, where the file
 *     gives a limit.
 *   - `system life` of the arm (`jointIndex` -1): the life that all rolling bearings reach together. Nothing in the file asks for one, so
 *     it is only reported.
 *
 * `pose` and `wrench` are those of the hardest load met in the segment that wears most.
 */
import type { Arm } from '../arm/arm.ts';
import { sentence } from '../capacity/rolling/index.ts';
import { targetsOf } from '../capacity/targets.ts';
import { type Chain, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import { dutyGaps } from './assessDuty.ts';
import { REASONS } from './assessVerdict.ts';
import type { DutyBearing, DutyResult } from './dutyResult.ts';
import type { CheckRow, Verdict, Wrench } from './results.ts';

/** `jointIndex` of rows that speak for the arm as a whole. */
export const WHOLE_ARM = -1;

const NOWHERE: Wrench = { force: [Number.NaN, Number.NaN, Number.NaN], moment: [Number.NaN, Number.NaN, Number.NaN] };
const NO_DUTY = 'no duty in the file: fill in `duty`';

/** Rows of a duty that was worked out (`null`: the arm has none; every row then says so). */
export function dutyRows(arm: Arm, chain: Chain, duty: DutyResult | null): readonly CheckRow[] {
  if (duty === null) {
    const gaps = dutyGaps(arm, chain).map((gap) => {
      const head = { joint: arm.joints[gap.jointIndex]!.name, jointIndex: gap.jointIndex, bearing: gap.bearing };
      return missingRow({ ...head, check: gap.check, unit: gap.unit }, gap.unassessed ?? NO_DUTY);
    });
    return [...gaps, missingRow(systemHead(arm), NO_DUTY)];
  }
  const rows = duty.bearings.flatMap((one) => {
    if (one.kind === 'bushing') return bushingRows(arm, chain, duty, one);
    return [lifeRow(arm, chain, duty, one)];
  });
  return [...rows, systemRow(arm, duty)];
}

type Head = Pick<CheckRow, 'joint' | 'jointIndex' | 'bearing' | 'check' | 'unit'>;

/** A row without a value, unassessed for `reason`. */
export function missingRow(head: Head, reason: string): CheckRow {
  return {
    ...head,
    value: Number.NaN,
    case: '',
    pose: [],
    free: null,
    wrench: NOWHERE,
    bound: null,
    gap: null,
    certified: null,
    allowable: null,
    utilisation: null,
    verdict: 'unassessed',
    reason,
    source: null,
  };
}

function headOf(one: DutyBearing, check: string, unit: string): Head {
  return { joint: one.joint, jointIndex: one.jointIndex, bearing: one.side, check, unit };
}

function systemHead(arm: Arm): Head {
  return { joint: arm.name, jointIndex: WHOLE_ARM, bearing: null, check: 'system life', unit: 's' };
}

/** Case, pose and joint load of a segment, as a row has them. */
function placeOf(
  arm: Arm,
  chain: Chain,
  one: DutyBearing,
  s: number,
): Pick<CheckRow, 'case' | 'pose' | 'free' | 'wrench'> {
  const segment = one.segments[s]!;
  const joint = chain.jointIndex.indexOf(one.jointIndex);
  const out = new Float64Array(WRENCH);
  wrenchToFile(chain, joint, Float64Array.from(segment.wrench), 0, out);
  const wrench: Wrench = { force: [out[0]!, out[1]!, out[2]!], moment: [out[3]!, out[4]!, out[5]!] };
  return { case: arm.duty![s]!.case, pose: segment.pose, free: null, wrench };
}

/** The segment that wears a bearing most: revolutions times the power of the load; that of the hardest load where none wears. */
function hardest(arm: Arm, one: DutyBearing, exponent: number): number {
  let most = -1;
  let best = 0;
  one.segments.forEach((segment, s) => {
    const wear = segment.turning > 0 ? arm.duty![s]!.share * segment.turning * segment.load ** exponent : 0;
    if (!(wear > most)) return;
    most = wear;
    best = s;
  });
  return best;
}

function lifeRow(arm: Arm, chain: Chain, duty: DutyResult, one: DutyBearing): CheckRow {
  const head = headOf(one, 'life', 's');
  if (one.life === null) return missingRow(head, one.unassessed ?? 'the life could not be computed');
  const target = targetsOf(arm).life;
  const anywhere = duty.segments.some((segment) => segment.kind === 'anywhere');
  const certain = one.life.life;
  const found = anywhere ? (one.attainedLife?.life ?? Number.NaN) : certain;
  const gap =
    found === Number.POSITIVE_INFINITY ? (certain === found ? 0 : 1) : found > 0 ? (found - certain) / found : 0;
  const asked = target.value;
  const kind = target.given ? 'arm file' : `default: ${target.source}`;
  const verdict = judged(share(asked, found), share(asked, certain));
  const estimated = one.notes.includes(ESTIMATED);
  const reliability = `reliability ${duty.reliability}, a1 ${Number(one.life.a1.toPrecision(3))}`;
  return {
    ...head,
    ...placeOf(arm, chain, one, hardest(arm, one, 3)),
    value: found,
    bound: anywhere ? certain : null,
    gap: anywhere ? gap : null,
    certified: anywhere ? gap <= CERTIFIED : null,
    allowable: asked,
    ...verdict,
    reason: verdict.reason ?? (one.warnings.length > 0 ? one.warnings.join('; ') : null),
    source: `life asked for: ${kind}; ${reliability}${estimated ? `; ${ESTIMATED}` : ''}`,
  };
}

const ESTIMATED = sentence('C-estimated');

/** Gap of a life below which it counts as certified: a cube of one per cent of load. */
const CERTIFIED = 0.03;

/** Asked over reached: what of the bearing the demanded time wears; 0 where nothing wears. */
function share(asked: number | null, life: number): number | null {
  if (asked === null) return null;
  return life === Number.POSITIVE_INFINITY ? 0 : asked / life;
}

/** `found`: utilisation that is attained; `certain`: one that nothing exceeds. */
function judged(
  found: number | null,
  certain: number | null,
): { readonly utilisation: number | null; readonly verdict: Verdict | null; readonly reason: string | null } {
  if (found === null || certain === null)
    return { utilisation: null, verdict: 'unassessed', reason: REASONS['no limit'] };
  if (Number.isNaN(found) || Number.isNaN(certain)) {
    return { utilisation: null, verdict: 'unassessed', reason: REASONS['not a number'] };
  }
  if (found > 1) return { utilisation: Math.max(found, certain), verdict: 'over', reason: null };
  if (certain <= 1) return { utilisation: certain, verdict: 'pass', reason: null };
  return { utilisation: certain, verdict: 'unassessed', reason: OPEN };
}

const OPEN =
  'enough by the loads found, not by those that are certain not to be exceeded anywhere in travel: describe the segment by a path, or allow a closer bound';

function bushingRows(arm: Arm, chain: Chain, duty: DutyResult, one: DutyBearing): readonly CheckRow[] {
  const pv = headOf(one, 'pv', 'Pa·m/s');
  if (one.bushing === null) return [missingRow(pv, one.unassessed ?? 'the PV could not be computed')];
  const bearing = arm.bearings[nameOf(arm, one)]!;
  if (bearing.kind !== 'plain-bushing') return [missingRow(pv, 'the bearing is no plain bushing')];
  const { bushing } = one;
  const anywhere = duty.segments.some((segment) => segment.kind === 'anywhere');
  const target = targetsOf(arm).pv;
  const limits = [
    { value: bearing.pvLimit, source: bearing.source ?? 'limit of the bushing in the arm file' },
    { value: target.value, source: 'target of the arm file' },
  ].filter((limit): limit is { value: number; source: string } => limit.value !== null);
  const least = limits.length > 0 ? limits.reduce((a, b) => (b.value < a.value ? b : a)) : null;
  const place = placeOf(arm, chain, one, bushing.segment);
  const found = anywhere ? bushing.attainedPv : bushing.pv;
  const gap = bushing.pv > 0 ? (bushing.pv - found) / bushing.pv : 0;
  const wear = 'wear depth is wear factor times pressure times distance: ask the maker for the factor';
  const row: CheckRow = {
    ...pv,
    ...place,
    value: found,
    bound: anywhere ? bushing.pv : null,
    gap: anywhere ? gap : null,
    certified: anywhere ? gap <= CERTIFIED : null,
    allowable: least?.value ?? null,
    ...(least
      ? judged(found / least.value, bushing.pv / least.value)
      : { utilisation: null, verdict: 'unassessed' as const, reason: 'fill in `pv_limit_MPa_m_s` of the bushing' }),
    source: `${least?.source ?? 'no limit'}; mean of pressure times speed in the hardest segment; ${wear}`,
  };
  if (bearing.speedLimit === null) return [row];
  const speed = bushing.peakSpeed / bearing.speedLimit;
  return [
    row,
    {
      ...headOf(one, 'speed', 'm/s'),
      ...place,
      value: bushing.peakSpeed,
      bound: null,
      gap: null,
      certified: null,
      allowable: bearing.speedLimit,
      ...judged(speed, speed),
      source: bearing.source ?? 'limit of the bushing in the arm file',
    },
  ];
}

function nameOf(arm: Arm, one: DutyBearing): string {
  const support = arm.joints[one.jointIndex]!.support;
  if (!support) return '';
  if (support.arrangement === 'ring') return support.bearing ?? '';
  return (one.side === 'A' ? support.bearingA : support.bearingB) ?? '';
}

function systemRow(arm: Arm, duty: DutyResult): CheckRow {
  const head = systemHead(arm);
  const { system } = duty;
  if (system.unassessed !== null || Number.isNaN(system.life)) {
    return missingRow(head, system.unassessed ?? 'the life could not be computed');
  }
  const anywhere = duty.segments.some((segment) => segment.kind === 'anywhere');
  return {
    ...missingRow(head, ''),
    value: anywhere ? system.attained : system.life,
    bound: anywhere ? system.life : null,
    gap: null,
    verdict: null,
    reason: null,
    source: `all ${system.bearings} rolling bearings together, reliability ${duty.reliability}; reported only: the file asks for the life of each bearing`,
  };
}
