/** Joint loads and bearing loads of an arm at one pose, case by case. */
import type { Arm, Joint } from '../arm/arm.ts';
import { rotate3 } from '../math/vector.ts';
import { radialVector } from '../mechanics/bearingPair.ts';
import { type Chain, type ChainCase, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import { type CheckForm, checkValue } from '../mechanics/form.ts';
import { freeScratch, newFreeWorst, worstOverFree } from '../mechanics/freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../mechanics/freeLoadsPose.ts';
import { bearingChecks } from '../mechanics/loadChecks.ts';
import type { BearingLoad, BearingName, PoseJoint, PoseResult, Triple } from './results.ts';

/** A joint that a pose holds outside its travel, rad. */
export interface OutsideTravel {
  readonly joint: string;
  readonly angle: number;
  readonly from: number;
  readonly to: number;
}

/** What writing an angle in degrees may cost, rad. */
const EDGE = 1e-9;

/** The joints that `pose` ([n] rad) holds outside their travel; a full turn has no outside. */
export function outsideTravel(chain: Chain, pose: readonly number[]): readonly OutsideTravel[] {
  return chain.names.flatMap((joint, i) => {
    const [angle, from, to] = [pose[i]!, chain.from[i]!, chain.to[i]!];
    const inside = chain.full[i] === 1 || (angle >= from - EDGE && angle <= to + EDGE);
    return inside ? [] : [{ joint, angle, from, to }];
  });
}

/** Words for what a case leaves free at a pose; null where it leaves nothing. */
export function freeText(load: ChainCase): string | null {
  const parts = [
    ...(load.force === 'any' ? ['the direction of the tip force'] : []),
    ...(load.speed ? ['speeds and accelerations within their limits'] : []),
  ];
  return parts.length === 0 ? null : parts.join(', ');
}

/**
 * Loads at one pose, for the named cases in the order of the arm (default: all). `pose` [n] rad, inside travel or not. Where a case
 * leaves something free (a tip force of direction `any`, motion), the joint load is the one at rest without that force, and every
 * bearing load is the worst over what is free: then the loads of a joint need not occur together. Throws a RangeError on a pose of
 * the wrong length; a name that no case has selects nothing.
 */
export function poseArm(
  arm: Arm,
  chain: Chain,
  pose: readonly number[],
  caseNames: readonly string[] | null = null,
): readonly PoseResult[] {
  if (pose.length !== chain.n) throw new RangeError(`a pose of ${pose.length} angles for ${chain.n} joints`);
  const at = newPoseLoad(chain.n);
  const scratch = poseLoadScratch(chain.n);
  const found = newFreeWorst(chain.n);
  const foundScratch = freeScratch(chain.n);
  const cases = chain.cases.filter((load) => !caseNames || caseNames.includes(load.name));
  return cases.map((load): PoseResult => {
    poseLoad(chain, load, pose, at, scratch);
    const worst = (check: CheckForm): Float64Array => {
      worstOverFree(check, load, at, found, foundScratch);
      return found.wrench.slice();
    };
    const joints = chain.jointIndex.map((k, i) => {
      const fixed = at.fixed.slice(WRENCH * i, WRENCH * (i + 1));
      return poseJoint(chain, i, arm.joints[k]!, fixed, worst);
    });
    return { case: load.name, pose: [...pose], free: freeText(load), joints };
  });
}

function poseJoint(
  chain: Chain,
  i: number,
  joint: Joint,
  fixed: Float64Array,
  worst: (check: CheckForm) => Float64Array,
): PoseJoint {
  const file = new Float64Array(WRENCH);
  wrenchToFile(chain, i, fixed, 0, file);
  const bearings: Partial<Record<BearingName, BearingLoad>> = {};
  const checks = bearingChecks(i, joint);
  for (const name of ['A', 'B', 'ring'] as const) {
    const mine = checks.filter((check) => check.bearing === name);
    if (mine.length > 0) bearings[name] = bearingLoad(chain, i, mine, worst);
  }
  return {
    joint: joint.name,
    force: [file[0]!, file[1]!, file[2]!],
    moment: [file[3]!, file[4]!, file[5]!],
    torque: fixed[5]!,
    bearings,
  };
}

function bearingLoad(
  chain: Chain,
  i: number,
  checks: readonly CheckForm[],
  worst: (check: CheckForm) => Float64Array,
): BearingLoad {
  const named = (check: string) => checks.find((c) => c.check === check);
  const radial = named('radial')!;
  const axial = named('axial')!;
  const moment = named('moment');
  const radialAt = worst(radial);
  const axialAt = worst(axial);
  const [x, y] = radialVector(radial.forms, radialAt, 0);
  const vector = new Float64Array(3);
  rotate3(vector, 0, chain.housing, 9 * i, [x, y, 0], 0);
  const size = checkValue(axial, axialAt, 0);
  return {
    radial: checkValue(radial, radialAt, 0),
    radialVector: [vector[0]!, vector[1]!, vector[2]!] satisfies Triple,
    // The check gives the size that this bearing carries; the joint load gives its direction.
    axial: size === 0 ? 0 : Math.sign(axialAt[2]!) * size,
    moment: moment ? checkValue(moment, worst(moment), 0) : null,
  };
}
