/** The engine's one door: what a person asks of an arm. */

export type { TravelBounds } from '../mechanics/travelBounds.ts';
export type { ArmCapacity, JoinOptions, PoseAssessment } from './assess.ts';
export { armCapacity, assessPose, assessRows, checkOf, rowsWithVerdict } from './assess.ts';
export type { FatigueOptions } from './assessFatigue.ts';
export { fatigueRows } from './assessFatigue.ts';
export type { Governing } from './assessGoverning.ts';
export { governing, overall } from './assessGoverning.ts';
export type { Scope } from './assessVerdict.ts';
export type { CompareRatio, CompareResult, LayoutResult, SpanRow } from './compareArm.ts';
export { compareArm } from './compareArm.ts';
export type { Arrangement, CompareOptions, ComparePlan, CompareRefusal, Layout } from './comparePlan.ts';
export { planCompare, SPAN_STEPS } from './comparePlan.ts';
export type { DutyOptions } from './duty.ts';
export { dutyStudy } from './duty.ts';
export type * from './dutyResult.ts';
export { dutyRows } from './dutyRows.ts';
export { lastingRows } from './lastingRows.ts';
export type { JointPlayResult, PlayOptions, PlayResult, TipResult } from './play.ts';
export { playStudy, tipErrorAt } from './play.ts';
export type { CasePose, SideMotion } from './playMotion.ts';
export { playRows } from './playRows.ts';
export type { JointShare, TipAtPose } from './playTip.ts';
export type { OutsideTravel } from './poseArm.ts';
export { freeText, outsideTravel, poseArm } from './poseArm.ts';
export type * from './results.ts';
export { isMissing } from './results.ts';
export { WHOLE_ARM } from './rowsWithoutPose.ts';
