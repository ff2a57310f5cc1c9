/** Rolling bearings: ratings, equivalent loads, safety, life, and a table to start from. SI units and radians throughout. */

export {
  ADJUSTED_PAIR_RULE,
  type Adjustment,
  constantThrust,
  type InducedThrust,
  inducedThrust,
  largestThrust,
  type PressureCentres,
  pressureCentres,
  type SharedThrust,
  sharedThrust,
  shareThrust,
  thrustOnA,
} from './adjustedPair.ts';
export { type BearingCsvReading, type CsvIssue, csvIssueText, readBearingCsv } from './bearingCsv.ts';
export {
  carriesThrust,
  type Element,
  ESTIMATED_SOURCE,
  elementOf,
  isEstimated,
  isRing,
  lifeExponent,
  needsPartner,
} from './bearingKind.ts';
export { bareBearing, bearingTable, bearingTableText } from './bearingTable.ts';
export { CONTACT_ANGLE_RULE, contactAngle, pitchDiameter, pressureCentreOffset } from './contactAngle.ts';
export { DUTY_LOAD_RULE, equivalentLoad } from './dutyLoad.ts';
export {
  DYNAMIC_EQUIVALENT_RULE,
  type DynamicForm,
  dynamicEquivalent,
  dynamicForm,
  type FactorsInForce,
  factorsInForce,
} from './dynamicEquivalent.ts';
export { DYNAMIC_FACTOR_RULE } from './dynamicRatingFactor.ts';
export { type InternalGeometry, internalGeometry } from './internalGeometry.ts';
export { LIFE_RULE, lifeNotes, lifeRevolutions, lifeSeconds, ratingNeeded } from './life.ts';
export { MINIMUM_LOAD_RULE, minimumLoad, minimumLoadNotes } from './minimumLoad.ts';
export { MISALIGNMENT, MISALIGNMENT_RULE, type MisalignmentRange, misalignmentLimit } from './misalignment.ts';
export {
  criticalHalfSwing,
  OSCILLATION_RULE,
  sweptRevolutions,
  swingLoad,
  swingNotes,
  swingRate,
  turningRate,
} from './oscillation.ts';
export { isUnassessed, type Note, type Rated, type Reason, sentence, type Unassessed, type Valued } from './outcome.ts';
export {
  dynamicRating,
  estimateRatings,
  RATING_ESTIMATE_RULE,
  type RatingEstimate,
  staticFactor,
  staticRating,
} from './ratingEstimate.ts';
export {
  ISO_LIFE,
  type LifeDistribution,
  lifeRatio,
  RELIABILITY_RULE,
  reliabilityAt,
  reliabilityFactor,
  survival,
} from './reliability.ts';
export type { Rule, Trust } from './rule.ts';
export {
  isThrust,
  STATIC_EQUIVALENT_RULE,
  type StaticForm,
  staticEquivalent,
  staticForm,
  staticSafety,
  usualStaticSafety,
} from './staticEquivalent.ts';
export { STATIC_FACTOR_RULE } from './staticRatingFactor.ts';
export { SYSTEM_LIFE_RULE, systemLife, weibullSlope } from './systemLife.ts';
