/** Arms of one joint for tests of capacity checks, read from files in the contract's style. Invented for a glasshouse workshop. */
import type { Arm } from '../../../src/arm/arm.ts';
import type { ArmFile, BearingFile } from '../../../src/arm/armFile.ts';
import { readArmValue } from '../../../src/arm/readArm.ts';
import { type CapacityCheck, capacityChecks, demandAt } from '../../../src/capacity/index.ts';
import { type Chain, flattenArm } from '../../../src/mechanics/chain.ts';
import { checkValue } from '../../../src/mechanics/form.ts';

/** A joint that turns, as a file has it. */
export type RevoluteFile = Extract<ArmFile['joints'][number], { kind: 'revolute' }>;

export function armOf(file: ArmFile): Arm {
  const reading = readArmValue(file);
  if (!reading.ok) throw new Error(JSON.stringify(reading.issues, null, 1));
  return reading.arm;
}

export const GROOVE = {
  kind: 'deep-groove',
  bore_mm: 20,
  outer_mm: 42,
  width_mm: 12,
  C_N: 9000,
  C0_N: 2400,
} as const satisfies BearingFile;

export const CLEVIS = {
  arrangement: 'clevis',
  hub_mm: 0,
  span_mm: 80,
  thrust: 'A',
  bearings: { A: 'left', B: 'right' },
  shaft: { diameter_mm: 20, material: 'steel-c45', turns_with: 'link' },
} as const satisfies RevoluteFile['support'];

export interface OneJoint {
  readonly support?: RevoluteFile['support'];
  readonly drive?: RevoluteFile['drive'];
  readonly axis?: [number, number, number];
  readonly travel?: [number, number];
  readonly link?: RevoluteFile['link'];
  readonly cases?: ArmFile['cases'];
  readonly bearings?: ArmFile['bearings'];
  readonly targets?: ArmFile['targets'];
  readonly duty?: ArmFile['duty'];
}

/** One joint at the origin, axis z unless told, a link of 10 kg on it, gravity 10 m/s² down. */
export function oneJoint(parts: OneJoint): Arm {
  const { support, drive } = parts;
  return armOf({
    armload: 1,
    name: 'Workshop swing',
    gravity_m_s2: [0, 0, -10],
    joints: [
      {
        name: 'hinge',
        kind: 'revolute',
        origin_mm: [0, 0, 0],
        axis: parts.axis ?? [0, 0, 1],
        travel_deg: parts.travel ?? [-90, 90],
        link: parts.link ?? { name: 'swing', mass_kg: 10, centre_mm: [100, 0, 0] },
        ...(support ? { support } : {}),
        ...(drive ? { drive } : {}),
      },
    ],
    tip: { origin_mm: [0, 0, 0] },
    ...(parts.cases ? { cases: parts.cases } : {}),
    bearings: parts.bearings ?? { left: GROOVE, right: GROOVE },
    ...(parts.targets ? { targets: parts.targets } : {}),
    ...(parts.duty ? { duty: parts.duty } : {}),
  });
}

export interface Listed {
  readonly arm: Arm;
  readonly chain: Chain;
  readonly checks: readonly CapacityCheck[];
  /** The check of a bearing (or of the shaft, null). */
  of(check: string, bearing?: CapacityCheck['bearing']): CapacityCheck;
  has(check: string, bearing?: CapacityCheck['bearing']): boolean;
}

export function listed(arm: Arm): Listed {
  const chain = flattenArm(arm);
  const checks = capacityChecks(arm, chain);
  const find = (check: string, bearing: CapacityCheck['bearing']) =>
    checks.find((one) => one.check === check && one.bearing === bearing);
  return {
    arm,
    chain,
    checks,
    of(check, bearing = null) {
      const found = find(check, bearing);
      if (!found) throw new Error(`no check ${check} of ${bearing}`);
      return found;
    },
    has: (check, bearing = null) => find(check, bearing) !== undefined,
  };
}

/** Demand and safe convex form of a check at a joint load [6] in the canonical housing frame. */
export function at(check: CapacityCheck, wrench: readonly number[]): { demand: number; form: number } {
  return { demand: demandAt(check, wrench, 0), form: check.form ? checkValue(check.form, wrench, 0) : Number.NaN };
}
