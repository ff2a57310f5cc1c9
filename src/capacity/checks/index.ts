/** What bearings, shafts and bushings can take: one list of checks. */
export {
  type CapacityCheck,
  type CheckName,
  capacityForms,
  type DemandAt,
  demandAt,
  missingCheck,
  placeAt,
} from './check.ts';
export { type DynamicLoad, dynamicLoad } from './dynamicLoad.ts';
export { type BearingSide, isRingParts, jointParts, type PairParts, type RingParts } from './jointParts.ts';
export { capacityChecks, jointCapacity } from './list.ts';
export { SUM_MARGIN } from './normSums.ts';
export { placeName } from './shaftPlaces.ts';
