/** The engine's one door: what a person asks of an arm. */

export type { CompareRatio, CompareResult, LayoutResult, SpanRow } from './compareArm.ts';
export { compareArm } from './compareArm.ts';
export type { Arrangement, CompareOptions, ComparePlan, CompareRefusal, Layout } from './comparePlan.ts';
export { planCompare, SPAN_STEPS } from './comparePlan.ts';
export type { OutsideTravel } from './poseArm.ts';
export { freeText, outsideTravel, poseArm } from './poseArm.ts';
export type * from './results.ts';
