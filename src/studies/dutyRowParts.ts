/** What the rows of a duty are put together from: heads, places, verdicts of times and shares. */
import type { Arm } from '../arm/arm.ts';
import { type Chain, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import { REASONS } from './assessVerdict.ts';
import type { DutyBearing, DutyResult, SegmentResult } from './dutyResult.ts';
import type { CheckRow, Verdict, Wrench } from './results.ts';
import type { Head } from './rowsWithoutPose.ts';

export function headOf(one: DutyBearing, check: string, unit: string): Head {
  return { joint: one.joint, jointIndex: one.jointIndex, bearing: one.side, check, unit };
}

/** Case, pose and joint load of a segment, as a row has them. */
export function placeOf(
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
export function hardest(arm: Arm, one: DutyBearing, exponent: number): number {
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

/** Gap of a life below which it counts as certified: a cube of one per cent of load. */
export const CERTIFIED = 0.03;

/** Asked over reached: what of the bearing the demanded time wears; 0 where nothing wears. */
export function share(asked: number | null, life: number): number | null {
  if (asked === null) return null;
  return life === Number.POSITIVE_INFINITY ? 0 : asked / life;
}

/** `found`: utilisation that is attained; `certain`: one that nothing exceeds. */
export function judged(
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

/** Segments in which one of `bearings` turns. */
export function turningSegments(duty: DutyResult, bearings: readonly DutyBearing[]): readonly SegmentResult[] {
  return duty.segments.filter(
    (segment, s) => segment.share > 0 && bearings.some((one) => (one.segments[s]?.turning ?? 0) > 0),
  );
}

/** Each note once; one that is not of all `segments` names the cases that it is of. */
export function segmentNotes(segments: readonly SegmentResult[]): readonly string[] {
  const all = new Set(segments.flatMap((segment) => segment.notes));
  return [...all].map((note) => {
    const mine = segments.filter((segment) => segment.notes.includes(note));
    if (mine.length === segments.length) return note;
    return `${note} (${[...new Set(mine.map((segment) => segment.case))].join(', ')})`;
  });
}

/** A verdict with the words of the segments that it rests on: what is not the motion that was asked about does not pass. */
export function withNotes<T extends Pick<CheckRow, 'verdict' | 'reason'>>(
  row: T,
  segments: readonly SegmentResult[],
  more: readonly string[] = [],
): T {
  const words = [...(row.reason === null ? [] : [row.reason]), ...more, ...segmentNotes(segments)];
  const doubtful = row.verdict === 'pass' && segments.some((segment) => segment.leavesTravel);
  return {
    ...row,
    verdict: doubtful ? 'unassessed' : row.verdict,
    reason: words.length > 0 ? words.join('; ') : null,
  };
}

const OPEN =
  'enough by the loads found, not by those that are certain not to be exceeded anywhere in travel: describe the segment by a path, or allow a closer bound';
