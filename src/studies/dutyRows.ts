/**
 * The duty as rows beside those of the other checks:
 *
 *   - `life` of each rolling bearing, s of duty time at the reliability asked for. More is better: `value` is the life by the loads that
 *     were found, `bound` (where a segment may be anywhere in travel) a life that is reached for certain. Utilisation is the life asked for over
 *     the life that is certain: the share of the bearing that the time asked for wears. The reason holds the warnings, and what
 *     was taken of the segments in which the bearing turns. Beyond the formula, or by a path that leaves the travel, nothing passes.
 *   - Of each bushing `pv`, `speed` and `wear life`, of its flange too (`dutyBushingRows.ts`).
 *   - `system life` of the arm (`jointIndex` -1): the life that all rolling bearings reach together. Nothing in the file asks for one, so
 *     it is only reported, and unassessed where a life that counts is beyond the formula or a path leaves the travel.
 *
 * `pose` and `wrench` are those of the hardest load met in the segment that wears most.
 */
import type { Arm } from '../arm/arm.ts';
import { sentence } from '../capacity/rolling/index.ts';
import { targetsOf } from '../capacity/targets.ts';
import type { Chain } from '../mechanics/chain.ts';
import { dutyGaps } from './assessDuty.ts';
import { bushingRows } from './dutyBushingRows.ts';
import type { DutyBearing, DutyResult } from './dutyResult.ts';
import { CERTIFIED, hardest, headOf, judged, placeOf, share, turningSegments, withNotes } from './dutyRowParts.ts';
import type { CheckRow } from './results.ts';
import { type Head, missingRow, WHOLE_ARM } from './rowsWithoutPose.ts';

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

function systemHead(arm: Arm): Head {
  return { joint: arm.name, jointIndex: WHOLE_ARM, bearing: null, check: 'system life', unit: 's' };
}

function lifeRow(arm: Arm, chain: Chain, duty: DutyResult, one: DutyBearing): CheckRow {
  const head = headOf(one, 'life', 's');
  if (one.life === null) return missingRow(head, one.unassessed ?? 'the life could not be computed');
  const target = targetsOf(arm).life;
  const anywhere = duty.segments.some((segment) => segment.kind === 'anywhere');
  const certain = one.life.life;
  const found = anywhere ? (one.attainedLife?.life ?? Number.NaN) : certain;
  const gap = lifeGap(found, certain);
  const asked = target.value;
  const kind = target.given ? 'arm file' : `default: ${target.source}`;
  const told = judged(share(asked, found), share(asked, certain));
  // The bound may lie beyond the formula where no load found does; its life then proves nothing.
  const beyond = one.life.beyondFormula || one.attainedLife?.beyondFormula === true;
  const unsaid =
    beyond && !one.warnings.includes(BEYOND) ? [`by the load that is certain not to be exceeded: ${BEYOND}`] : [];
  const verdict = beyond && told.verdict === 'pass' ? { ...told, verdict: 'unassessed' as const } : told;
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
    ...withNotes(verdict, turningSegments(duty, [one]), [...unsaid, ...one.warnings]),
    source: `life asked for: ${kind}; ${reliability}${estimated ? `; ${ESTIMATED}` : ''}`,
  };
}

const BEYOND = sentence('load-beyond-life-formula');
const ESTIMATED = sentence('C-estimated');

/** Share of the life found that is not certain. */
function lifeGap(found: number, certain: number): number {
  if (found === Number.POSITIVE_INFINITY) return certain === found ? 0 : 1;
  return found === 0 ? 0 : (found - certain) / found;
}

function systemRow(arm: Arm, duty: DutyResult): CheckRow {
  const head = systemHead(arm);
  const { system } = duty;
  if (system.unassessed !== null || Number.isNaN(system.life)) {
    return missingRow(head, system.unassessed ?? 'the life could not be computed');
  }
  const anywhere = duty.segments.some((segment) => segment.kind === 'anywhere');
  const counted = duty.bearings.filter((one) => one.life !== null);
  const segments = turningSegments(duty, counted);
  const stretched = counted.filter((one) => one.life?.beyondFormula || one.attainedLife?.beyondFormula);
  const names = stretched.map((one) => `${one.joint} ${one.side}`).join(', ');
  const doubtful = stretched.length > 0 || segments.some((segment) => segment.leavesTravel);
  return {
    ...missingRow(head, ''),
    value: anywhere ? system.attained : system.life,
    bound: anywhere ? system.life : null,
    gap: anywhere ? lifeGap(system.attained, system.life) : null,
    // No search looks for the worst of all bearings together.
    certified: anywhere ? false : null,
    ...withNotes(
      { verdict: doubtful ? ('unassessed' as const) : null, reason: null },
      segments,
      stretched.length > 0 ? [`of ${names}: ${BEYOND}`] : [],
    ),
    source: `all ${system.bearings} rolling bearings together, reliability ${duty.reliability}; reported only: the file asks for the life of each bearing`,
  };
}
