/** What the sheet asks of the engine at one pose; quick enough to be done while something is dragged. */
import type { Arm } from '../../arm/arm.ts';
import { jointShaft, shaftSupports } from '../../capacity/shaft/index.ts';
import { rotateBack3 } from '../../math/vector.ts';
import { shaftLoads } from '../../mechanics/beamForms.ts';
import { type BeamLines, shaftLines } from '../../mechanics/beamLines.ts';
import { solveShaft } from '../../mechanics/beamStepped.ts';
import { momentForms } from '../../mechanics/bearingPair.ts';
import type { Chain } from '../../mechanics/chain.ts';
import { checkValue } from '../../mechanics/form.ts';
import { type ArmCapacity, armCapacity, assessPose } from '../../studies/assess.ts';
import { armGives } from '../../studies/play.ts';
import type { JointGive } from '../../studies/playJoint.ts';
import { poseArm } from '../../studies/poseArm.ts';
import type { CheckRow, PoseJoint, PoseResult, Wrench } from '../../studies/results.ts';
import { type TipPose, tipAtPose } from '../../studies/tipAtPose.ts';

/** Loads of one case at a pose; undefined where no case has the name. */
export function poseLoads(arm: Arm, chain: Chain, pose: readonly number[], name: string): PoseResult | undefined {
  return poseArm(arm, chain, pose, [name])[0];
}

const capacities = new WeakMap<Arm, ArmCapacity>();

/** What the arm's parts can take, prepared once for it. */
export function capacityOf(arm: Arm, chain: Chain): ArmCapacity {
  let capacity = capacities.get(arm);
  if (!capacity) {
    capacity = armCapacity(arm, chain);
    capacities.set(arm, capacity);
  }
  return capacity;
}

/** Every capacity check at one pose under one case. */
export function assessedRows(arm: Arm, chain: Chain, pose: readonly number[], name: string): readonly CheckRow[] {
  return assessPose(arm, chain, capacityOf(arm, chain), pose, [name])[0]?.rows ?? [];
}

const gives = new WeakMap<Arm, readonly JointGive[]>();

/** Tip error at one pose under one case, with what makes it; undefined where no case has the name. */
export function tipAt(arm: Arm, chain: Chain, pose: readonly number[], name: string): TipPose | undefined {
  let known = gives.get(arm);
  if (!known) {
    known = armGives(arm, chain);
    gives.set(arm, known);
  }
  return tipAtPose(arm, chain, pose, [name], known)[0];
}

const MOMENT = { check: 'moment', joint: 0, bearing: null, unit: 'N·m', forms: momentForms() };

/** Size of the tilting moment of a joint load about the joint origin, N·m. */
export function tiltingMoment(chain: Chain, i: number, load: PoseJoint): number {
  return checkValue(MOMENT, canonical(chain, i, load), 0);
}

/** Stretches between two stations of a shaft that stand for its bent shape on paper. */
const DIVISIONS = 12;

/** Bending moment and deflection along the shaft of joint `i` under the joint load of `row`; null where no shaft can be bent. */
export function shaftLinesAt(arm: Arm, chain: Chain, i: number, row: CheckRow): BeamLines | null {
  const joint = arm.joints[chain.jointIndex[i]!]!;
  const { support } = joint;
  if (!support) return null;
  const keys = support.arrangement === 'ring' ? [support.bearing] : [support.bearingA, support.bearingB];
  const stiffness = keys.map((key) => (key === null ? null : arm.bearings[key]?.stiffness) ?? Number.POSITIVE_INFINITY);
  const shaft = jointShaft(joint, shaftSupports(support, stiffness));
  if ('unassessed' in shaft) return null;
  const solution = solveShaft(shaft.value.beam, shaftLoads(shaft.value.loading, canonical(chain, i, row.wrench), 0));
  return 'unassessed' in solution ? null : shaftLines(solution, DIVISIONS).resultant;
}

/** A joint load of the file's housing frame in the canonical one. */
function canonical(chain: Chain, i: number, load: Wrench): Float64Array {
  const wrench = new Float64Array(6);
  rotateBack3(wrench, 0, chain.housing, 9 * i, load.force, 0);
  rotateBack3(wrench, 3, chain.housing, 9 * i, load.moment, 0);
  return wrench;
}
