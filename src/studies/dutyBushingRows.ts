/**
 * The duty of a plain bushing as rows, in its bore and, where it has a flange that takes thrust, on that (`flange …`):
 *
 *   - `pv`, the mean of pressure times sliding speed in the hardest segment, and `speed`, its fastest sliding, where the file gives a limit.
 *   - `wear life`, s of duty time until the wear is as deep as the file allows, held against the life asked for.
 */
import type { Arm, PlainBushing } from '../arm/arm.ts';
import { wearLife } from '../capacity/plain/index.ts';
import { targetsOf } from '../capacity/targets.ts';
import type { Chain } from '../mechanics/chain.ts';
import type { BushingDuty, DutyBearing, DutyResult } from './dutyResult.ts';
import { CERTIFIED, headOf, judged, placeOf, share, turningSegments, withNotes } from './dutyRowParts.ts';
import type { CheckRow } from './results.ts';
import { missingRow } from './rowsWithoutPose.ts';

export function bushingRows(arm: Arm, chain: Chain, duty: DutyResult, one: DutyBearing): readonly CheckRow[] {
  const named = (check: string) => (one.face === 'flange' ? `flange ${check}` : check);
  const pv = headOf(one, named('pv'), 'Pa·m/s');
  if (one.bushing === null) return [missingRow(pv, one.unassessed ?? 'the PV could not be computed')];
  const bearing = arm.bearings[nameOf(arm, one)]!;
  if (bearing.kind !== 'plain-bushing') return [missingRow(pv, 'the bearing is no plain bushing')];
  const { bushing } = one;
  const anywhere = duty.segments.some((segment) => segment.kind === 'anywhere');
  const place = placeOf(arm, chain, one, bushing.segment);
  const limit = pvLimit(arm, bearing);
  const found = anywhere ? bushing.attainedPv : bushing.pv;
  const gap = bushing.pv > 0 ? (bushing.pv - found) / bushing.pv : 0;
  const row: CheckRow = {
    ...pv,
    ...place,
    value: found,
    bound: anywhere ? bushing.pv : null,
    gap: anywhere ? gap : null,
    certified: anywhere ? gap <= CERTIFIED : null,
    allowable: limit?.value ?? null,
    ...(limit
      ? judged(found / limit.value, bushing.pv / limit.value)
      : { utilisation: null, verdict: 'unassessed' as const, reason: 'fill in `pv_limit_MPa_m_s` of the bushing' }),
    source: `${limit?.source ?? 'no limit'}; mean of pressure times speed in the hardest segment`,
  };
  const wear = wearRow(arm, bearing, bushing, anywhere, headOf(one, named('wear life'), 's'), place);
  const segments = turningSegments(duty, [one]);
  const noted = (rows: readonly CheckRow[]) =>
    rows.map((each) => (Number.isNaN(each.value) ? each : withNotes(each, segments)));
  if (bearing.speedLimit === null) return noted([row, wear]);
  const speed = bushing.peakSpeed / bearing.speedLimit;
  return noted([
    row,
    {
      ...headOf(one, named('speed'), 'm/s'),
      ...place,
      value: bushing.peakSpeed,
      bound: null,
      gap: null,
      certified: null,
      allowable: bearing.speedLimit,
      ...judged(speed, speed),
      source: bearing.source ?? 'limit of the bushing in the arm file',
    },
    wear,
  ]);
}

function pvLimit(arm: Arm, bearing: PlainBushing): { readonly value: number; readonly source: string } | null {
  const limits = [
    { value: bearing.pvLimit, source: bearing.source ?? 'limit of the bushing in the arm file' },
    { value: targetsOf(arm).pv.value, source: 'target of the arm file' },
  ].filter((limit): limit is { value: number; source: string } => limit.value !== null);
  return limits.length > 0 ? limits.reduce((a, b) => (b.value < a.value ? b : a)) : null;
}

/** Wear is shallow at first and the same all round: the depth is that of the mean pressure, all segments of the duty together. */
function wearRow(
  arm: Arm,
  { wearDepth, wearFactor, source }: PlainBushing,
  bushing: BushingDuty,
  anywhere: boolean,
  head: ReturnType<typeof headOf>,
  place: ReturnType<typeof placeOf>,
): CheckRow {
  const certain = wearLife(wearDepth, wearFactor, bushing.wearRate);
  if ('unassessed' in certain) return missingRow(head, certain.unassessed);
  const attained = wearLife(wearDepth, wearFactor, bushing.attainedWearRate);
  const found = anywhere ? ('value' in attained ? attained.value : Number.NaN) : certain.value;
  const target = targetsOf(arm).life;
  const gap = found === certain.value ? 0 : found < Number.POSITIVE_INFINITY ? (found - certain.value) / found : 1;
  return {
    ...head,
    ...place,
    value: found,
    bound: anywhere ? certain.value : null,
    gap: anywhere ? gap : null,
    certified: anywhere ? gap <= CERTIFIED : null,
    allowable: target.value,
    ...judged(share(target.value, found), share(target.value, certain.value)),
    source: `life asked for: ${target.given ? 'arm file' : `default: ${target.source}`}; wear factor and depth: ${source ?? 'arm file'}`,
  };
}
function nameOf(arm: Arm, one: DutyBearing): string {
  const support = arm.joints[one.jointIndex]!.support;
  if (!support) return '';
  if (support.arrangement === 'ring') return support.bearing ?? '';
  return (one.side === 'A' ? support.bearingA : support.bearingB) ?? '';
}
