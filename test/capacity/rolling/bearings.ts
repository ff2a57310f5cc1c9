import type { RollingBearing, RollingKind } from '../../../src/arm/arm.ts';
import { bareBearing, type Rated } from '../../../src/capacity/rolling/index.ts';

export const DEGREE = Math.PI / 180;
/** Seed of every random property of this folder. */
export const SEED = 20240411;

/** An invented bearing of 20 mm bore, 47 mm outer diameter and 14 mm width with ratings of 12 kN and 6 kN. */
export function bearing(kind: RollingKind, changes: Partial<RollingBearing> = {}): RollingBearing {
  return { ...bareBearing(kind, 0.02, 0.047, 0.014), C: 12000, C0: 6000, ...changes };
}

/** The value of an outcome that must have one. */
export function known<T>(outcome: Rated<T>): T {
  if ('unassessed' in outcome) throw new Error(`unassessed: ${outcome.unassessed}`);
  return outcome.value;
}

/** Every kind, each so that all its factors can be found. */
export const EVERY_KIND: readonly RollingBearing[] = [
  bearing('deep-groove'),
  bearing('deep-groove', { rows: 2 }),
  bearing('angular-contact', { contactAngle: 12 * DEGREE }),
  bearing('angular-contact', { contactAngle: 15 * DEGREE }),
  bearing('angular-contact', { contactAngle: 15 * DEGREE, rows: 2 }),
  bearing('angular-contact', { contactAngle: 18 * DEGREE, rows: 2 }),
  bearing('angular-contact', { contactAngle: 25 * DEGREE }),
  bearing('angular-contact', { contactAngle: 40 * DEGREE }),
  bearing('angular-contact', { contactAngle: 30 * DEGREE, rows: 2 }),
  bearing('self-aligning-ball', { contactAngle: 10 * DEGREE, rows: 2 }),
  bearing('self-aligning-ball', { contactAngle: 10 * DEGREE }),
  bearing('cylindrical-roller'),
  bearing('needle'),
  bearing('tapered-roller', { contactAngle: 14 * DEGREE }),
  bearing('tapered-roller', { contactAngle: 14 * DEGREE, rows: 2 }),
  bearing('crossed-roller'),
  bearing('four-point', { contactAngle: 35 * DEGREE }),
];
