/**
 * What causes the value of a row at its pose: shares of each link, the payload, the tip force and the drive, which sum to the value of the
 * row's form. (Where a check's demand lies below its form, `capacity/checks/check.ts`, the sum is that of the form.)
 */
import type { Arm, Drive } from '../arm/arm.ts';
import { type Chain, flattenArm } from '../mechanics/chain.ts';
import type { CheckForm, Form } from '../mechanics/form.ts';
import {
  lineAlong,
  type Share,
  type ShareState,
  sharesAt,
  stateLoad,
  winningLine,
  withoutDrive,
} from '../mechanics/shares.ts';
import type { CheckRow } from './results.ts';
import { type ChecksOf, checkOfRow } from './slopes.ts';

export interface ArmShare extends Share {
  /** Of the value. */
  readonly unit: string;
}

/** Parts of the drive's force at which the check is looked at again: the nearer to the whole, the surer its forms stay the same ones. */
const PARTS = [0.5, 0.9, 0.99, 0.999] as const;

/** Shares of one row, the largest first; empty where the row has no value or its check no form. */
export function sharesOf(arm: Arm, row: CheckRow, checksOf: ChecksOf): readonly ArmShare[] {
  const chain = flattenArm(arm);
  const caseIndex = arm.cases.findIndex((load) => load.name === row.case);
  const check = checkOfRow(chain, row, checksOf(arm, chain));
  if (caseIndex < 0 || !check || row.pose.length !== chain.n) return [];
  const state: ShareState = {
    chain,
    load: arm.cases[caseIndex]!,
    caseIndex,
    joint: check.joint,
    pose: row.pose,
    rates: row.free ?? { tipForce: null, speed: null, accel: null },
  };
  const line = winningLine(check, stateLoad(state), 0);
  if (!line) return [];
  const plain = arm.joints[row.jointIndex]!.drive ? undriven(arm, row, checksOf, line.form) : null;
  const shares = sharesAt(state, line, plain ? lineAlong(plain, line.e) : line);
  return shares.map((share) => ({ ...share, unit: check.unit })).sort((a, b) => Math.abs(b.value) - Math.abs(a.value));
}

/**
 * The form of the row's check without the drive's force; null where the drive makes no difference to it. Where no weaker drive keeps the form
 * (others outdo it), the whole of the torque's column goes to the drive, which holds the torque.
 */
function undriven(arm: Arm, row: CheckRow, checksOf: ChecksOf, form: Form): Form | null {
  for (const part of PARTS) {
    const weaker = withDriveForce(arm, row.jointIndex, part);
    const chain: Chain = flattenArm(weaker);
    const check: CheckForm | null = checkOfRow(chain, row, checksOf(weaker, chain));
    const found = check && withoutDrive(form, check, part);
    if (found) return sameForm(found, form) ? null : found;
  }
  const still = (v: number, k: number) => (k % 6 === 5 ? 0 : v);
  return { ...form, P: form.P.map(still), l: form.l.map(still), c: form.c.map(() => 0), o: 0 };
}

function sameForm(a: Form, b: Form): boolean {
  const size = b.P.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
  const alike = (x: Float64Array, y: Float64Array) => x.every((v, k) => Math.abs(v - y[k]!) <= 1e-12 * size);
  return alike(a.P, b.P) && alike(a.l, b.l) && a.c.every((v, k) => v === b.c[k]) && a.o === b.o;
}

/** The drive at a part of its force, at the same torques: a belt's knee stays where it is. */
function withDriveForce(arm: Arm, index: number, part: number): Arm {
  const weaker = (drive: Drive): Drive =>
    drive.kind === 'gear'
      ? { ...drive, radius: drive.radius / part }
      : { ...drive, radius: drive.radius / part, pretension: drive.pretension * part };
  return {
    ...arm,
    joints: arm.joints.map((joint, k) =>
      k === index && joint.drive ? { ...joint, drive: weaker(joint.drive) } : joint,
    ),
  };
}
