/** Loads at the pose on stage, worked out once for each pose, arm and case. */
import type { PoseJoint, PoseResult } from '../../studies/results.ts';
import { type ArmOnSheet, useArm } from './documentStore.ts';
import { poseLoads } from './engine.ts';
import { usePose } from './poseStore.ts';
import { useView } from './viewStore.ts';

let last: { sheet: ArmOnSheet; pose: readonly number[]; case: string; result: PoseResult | null } | null = null;

/** Null where the pose does not belong to the arm (a moment between two arms). */
export function loadsAt(sheet: ArmOnSheet, pose: readonly number[], name: string): PoseResult | null {
  if (last && last.sheet === sheet && last.pose === pose && last.case === name) return last.result;
  const result = pose.length === sheet.chain.n ? (poseLoads(sheet.arm, sheet.chain, pose, name) ?? null) : null;
  last = { sheet, pose, case: name, result };
  return result;
}

export function usePoseLoads(): PoseResult | null {
  const sheet = useArm();
  const pose = usePose();
  const name = useView((state) => state.case);
  return sheet ? loadsAt(sheet, pose, name) : null;
}

export function jointLoads(result: PoseResult | null, name: string): PoseJoint | undefined {
  return result?.joints.find((joint) => joint.joint === name);
}
