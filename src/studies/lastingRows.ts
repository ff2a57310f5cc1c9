/**
 * What a search for the worst pose does not cover, as rows beside it: life and wear over the duty, fatigue of the shafts, play and tip error. They
 * ask for a mean or a range of loads, not for an extreme.
 */
import type { Arm } from '../arm/arm.ts';
import type { Chain } from '../mechanics/chain.ts';
import { fatigueRows } from './assessFatigue.ts';
import { dutyStudy } from './duty.ts';
import { dutyRows } from './dutyRows.ts';
import { playStudy } from './play.ts';
import { playRows } from './playRows.ts';
import type { CheckRow } from './results.ts';

/** Rows of the duty, of the shafts' fatigue and of play, in that order; what cannot be assessed says what to fill in. */
export function lastingRows(arm: Arm, chain: Chain): readonly CheckRow[] {
  return [
    ...dutyRows(arm, chain, dutyStudy(arm, chain)),
    ...fatigueRows(arm, chain),
    ...playRows(arm, playStudy(arm, chain)),
  ];
}
