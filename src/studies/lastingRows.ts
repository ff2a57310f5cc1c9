/**
 * What a search for the worst pose does not cover, as rows beside it: life and wear over the duty, fatigue of the shafts, play and tip error. They
 * ask for a mean or a range of loads, not for an extreme. In three parts, each a piece of work of its own.
 */
import type { Arm } from '../arm/arm.ts';
import { isRingParts, jointParts } from '../capacity/index.ts';
import type { Chain } from '../mechanics/chain.ts';
import { fatigueRows } from './assessFatigue.ts';
import { dutyStudy } from './duty.ts';
import { dutyRows } from './dutyRows.ts';
import { playStudy } from './play.ts';
import { playRows } from './playRows.ts';
import type { CheckRow } from './results.ts';
import { missingRow, WHOLE_ARM } from './rowsWithoutPose.ts';

export type LastingPart = 'duty' | 'fatigue' | 'play';

/** The parts in the order of their rows. */
export const LASTING_PARTS: readonly LastingPart[] = ['duty', 'fatigue', 'play'];

/** Rows of one part; what cannot be assessed says what to fill in. */
export function lastingPart(arm: Arm, chain: Chain, part: LastingPart): readonly CheckRow[] {
  switch (part) {
    case 'duty':
      return dutyRows(arm, chain, dutyStudy(arm, chain));
    case 'fatigue':
      return fatigueRows(arm, chain);
    case 'play':
      return playRows(arm, playStudy(arm, chain));
  }
}

/** Rows of all parts. */
export function lastingRows(arm: Arm, chain: Chain): readonly CheckRow[] {
  return LASTING_PARTS.flatMap((part) => lastingPart(arm, chain, part));
}

const CHECKS: ReadonlySet<string> = new Set([
  'life',
  'pv',
  'speed',
  'wear life',
  'system life',
  'fatigue',
  'play tilt',
  'lost motion',
  'tip error',
]);

/** Whether a row is one of these and not of a search over poses. */
export function isLasting(row: Pick<CheckRow, 'check'>): boolean {
  return CHECKS.has(row.check.replace(/^flange /, ''));
}

/**
 * Rows that stand for a part while it is worked out, unassessed for `reason`: every check of it that is held against a limit. Without a
 * duty its rows are known at once.
 */
export function lastingPending(arm: Arm, chain: Chain, part: LastingPart, reason: string): readonly CheckRow[] {
  if (part === 'duty' && arm.duty === null) return dutyRows(arm, chain, null);
  const whole = { joint: arm.name, jointIndex: WHOLE_ARM, bearing: null };
  if (part === 'play') return [missingRow({ ...whole, check: 'tip error', unit: 'm' }, reason)];
  return chain.jointIndex.flatMap((jointIndex, joint): readonly CheckRow[] => {
    const parts = jointParts(arm, chain, joint);
    if (!parts) return [];
    const head = { joint: parts.part.name, jointIndex };
    if (part === 'fatigue') return [missingRow({ ...head, bearing: null, check: 'fatigue', unit: 'Pa' }, reason)];
    const sides = isRingParts(parts)
      ? [{ bearing: 'ring' as const, of: parts.bearing }]
      : (['A', 'B'] as const).map((bearing) => ({ bearing, of: parts.bearings[bearing] }));
    return sides.map(({ bearing, of }) => {
      const plain = 'value' in of && of.value.kind === 'plain-bushing';
      const check = plain ? { check: 'pv', unit: 'Pa·m/s' } : { check: 'life', unit: 's' };
      return missingRow({ ...head, bearing, ...check }, reason);
    });
  });
}
