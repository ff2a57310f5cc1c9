/** Small invented arms whose loads are worked out by hand, in the form of the arm file. */
import type { Arm } from '../../src/arm/arm.ts';
import type { ArmFile, BearingFile, CaseFile, JointFile, RollingFile, SegmentFile } from '../../src/arm/armFile.ts';
import { issueText } from '../../src/arm/issue.ts';
import { readArmValue } from '../../src/arm/readArm.ts';

export const G = 9.80665;

export function armOf(file: ArmFile): Arm {
  const reading = readArmValue(file);
  if (!reading.ok) throw new Error(reading.issues.map(issueText).join('\n'));
  return reading.arm;
}

export const BALL: RollingFile = {
  kind: 'deep-groove',
  bore_mm: 20,
  outer_mm: 42,
  width_mm: 12,
  C_N: 10000,
  C0_N: 6000,
};

export interface Spit {
  readonly bearing?: BearingFile;
  readonly travel?: [number, number];
  readonly cases?: CaseFile[];
  readonly duty?: SegmentFile[];
  readonly mass?: number;
  readonly joint?: Partial<Extract<JointFile, { kind: 'revolute' }>>;
}

/**
 * One joint about the level x axis, the mass of its link on the axis at the hub, midway between two bearings: each carries half the weight
 * at every angle, and no thrust.
 */
export function spit(options: Spit = {}): ArmFile {
  return {
    armload: 1,
    name: 'spit',
    gravity_m_s2: [0, 0, -G],
    joints: [
      {
        name: 'spit',
        kind: 'revolute',
        origin_mm: [0, 0, 0],
        axis: [1, 0, 0],
        travel_deg: options.travel ?? [-180, 180],
        link: { name: 'roast', mass_kg: options.mass ?? 2000 / G, centre_mm: [0, 0, 0] },
        support: {
          arrangement: 'clevis',
          hub_mm: 0,
          span_mm: 100,
          thrust: 'A',
          bearings: { A: 'one', B: 'one' },
        },
        ...options.joint,
      },
    ],
    tip: { origin_mm: [0, 0, 0] },
    bearings: { one: options.bearing ?? BALL },
    ...(options.cases ? { cases: options.cases } : {}),
    ...(options.duty ? { duty: options.duty } : {}),
  };
}

/** A closed path of a sine ±`half` degrees, one period in `period` s. */
export function sinePath(half: number, period: number, steps = 48): NonNullable<SegmentFile['path']> {
  return Array.from({ length: steps + 1 }, (_, k) => ({
    time_s: (period * k) / steps,
    pose_deg: [k === steps ? 0 : half * Math.sin((2 * Math.PI * k) / steps)],
  }));
}

/** One whole turn on at a steady speed. */
export function turnPath(period: number, steps = 4): NonNullable<SegmentFile['path']> {
  return Array.from({ length: steps + 1 }, (_, k) => ({
    time_s: (period * k) / steps,
    pose_deg: [-180 + (360 * k) / steps],
  }));
}
