/** Capacity: what bearings, shafts, bushings and fits can take, and what they must. The parts have indexes of their own. */
export * from './checks/index.ts';
export { findMaterial, MATERIALS, type Material } from './materials.ts';
export type { Assessed, Rule, Trust } from './rule.ts';
export { staticSafetyTarget, type Target, type TargetList, targetsOf } from './targets.ts';
