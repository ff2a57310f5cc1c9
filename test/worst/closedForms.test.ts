/** The engine's default answer against what can be worked out by hand, every kind of load. */
import { describe, expect, it } from 'vitest';
import type { Arm, Joint, LoadCase, Mat3, Support, Vec3 } from '../../src/arm/arm.ts';
import type { CheckRow } from '../../src/studies/results.ts';
import { worstArm } from '../../src/studies/worstArm.ts';
import { randomArm } from '../randomArm.ts';

const G = 9.80665;
const EYE: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];
const GAP = 1e-4;

interface Link {
  readonly at: Vec3;
  readonly axis: Vec3;
  readonly mass: number;
  readonly centre: Vec3;
  /** Span of a clevis about the joint origin, m. */
  readonly span?: number;
  readonly travel?: readonly [number, number];
}

function clevis(span: number): Support {
  const common = { hub: 0, span, adjusted: null, bearingA: null, bearingB: null, shaft: null, offset: 0 } as const;
  return {
    ...common,
    arrangement: 'clevis',
    overhang: 0,
    side: '-',
    thrust: 'A',
    stationA: -span / 2,
    stationB: span / 2,
  };
}

function joint({ at, axis, mass, centre, span, travel }: Link): Joint {
  const none = { xx: 0, yy: 0, zz: 0, xy: 0, xz: 0, yz: 0 };
  return {
    ...randomArm(1, { joints: 1 }).joints[0]!,
    placement: { position: at, rotation: EYE },
    axis,
    travel: { from: travel?.[0] ?? -3, to: travel?.[1] ?? 3, full: false },
    link: { name: 'link', mass, centre, inertia: none },
    support: span === undefined ? null : clevis(span),
    drive: null,
  };
}

function arm(links: readonly Link[], cases: readonly Partial<LoadCase>[], tip: Vec3 = [0, 0, 0]): Arm {
  return {
    ...randomArm(1, { joints: 1 }),
    gravity: [0, 0, -G],
    joints: links.map((link, k) => ({ ...joint(link), name: `joint ${k + 1}` })),
    tip: { position: tip, rotation: EYE },
    cases: cases.map((change, k) => ({
      name: `case ${k + 1}`,
      payload: null,
      tipForce: null,
      motion: null,
      factor: 1,
      ...change,
    })),
  };
}

/** The row of a check, certified: the value by hand lies between found and bound, and is attained. */
function is(
  rows: readonly CheckRow[],
  jointIndex: number,
  check: string,
  byHand: number,
  bearing: string | null = null,
) {
  const row = rows.find((one) => one.jointIndex === jointIndex && one.check === check && one.bearing === bearing)!;
  expect([row.certified, row.value]).toEqual([true, expect.closeTo(byHand, 7)]);
  expect(row.bound!).toBeGreaterThanOrEqual(byHand * (1 - 1e-12));
  expect(row.bound!).toBeLessThanOrEqual(byHand * (1 + 1.01 * GAP) + 1e-9);
  return row;
}

const worst = (made: Arm) => worstArm(made, { gap: GAP, seconds: 30 }).rows;

const STRETCHED: readonly Link[] = [
  { at: [0, 0, 0], axis: [0, 1, 0], mass: 2, centre: [0.2, 0, 0], span: 0.1 },
  { at: [0.4, 0, 0], axis: [0, 1, 0], mass: 1, centre: [0.15, 0, 0], span: 0.06 },
];
/** Weight of the stretched arm times where it stands. */
const STRETCHED_MOMENT = G * (2 * 0.2 + 1 * 0.55);

const VERTICAL: readonly Link[] = [
  { at: [0, 0, 0.5], axis: [0, 0, 1], mass: 3, centre: [0.2, 0, 0], span: 0.2 },
  { at: [0.4, 0, 0], axis: [0, 0, 1], mass: 2, centre: [0.15, 0, 0] },
  { at: [0.3, 0, 0], axis: [0, 0, 1], mass: 1, centre: [0.05, 0, 0] },
  { at: [0, 0, -0.1], axis: [0, 0, 1], mass: 0.5, centre: [0, 0, -0.1] },
];
const VERTICAL_MOMENT = G * (3 * 0.2 + 2 * 0.55 + 1 * 0.75 + 0.5 * 0.7);

describe('a single joint', () => {
  const link: Link = { at: [0, 0, 0], axis: [0, 1, 0], mass: 4, centre: [0.3, 0, 0.4], span: 0.1 };

  it('level axis: torque m g r, half the weight on each bearing of a clevis', () => {
    const rows = worst(arm([link], [{}]));
    is(rows, 0, 'torque', 4 * G * 0.5);
    is(rows, 0, 'radial', 2 * G, 'A');
    is(rows, 0, 'radial', 2 * G, 'B');
    is(rows, 0, 'moment', 0);
  });

  it('the case with the largest factor governs', () => {
    const rows = worst(arm([link], [{ factor: 0.5 }, { factor: 1.75 }, { factor: 1.5 }]));
    expect(is(rows, 0, 'torque', 1.75 * 4 * G * 0.5).case).toBe('case 2');
  });

  it('travel that ends before the link is level: m g r times the cosine at its end', () => {
    // Centre straight down at 0, never higher than 0.7 rad
    const down: Link = { ...link, centre: [0, 0, -0.5], travel: [-0.4, 0.7] };
    const row = is(worst(arm([down], [{}])), 0, 'torque', 4 * G * 0.5 * Math.sin(0.7));
    expect(row.pose).toEqual([0.7]);
  });

  it('a force any way at the tip: torque m g r + F R', () => {
    const rows = worst(arm([link], [{ tipForce: { magnitude: 30, direction: 'any' } }], [0.6, 0, 0.8]));
    is(rows, 0, 'torque', 4 * G * 0.5 + 30 * 1);
  });

  it('upright axis in motion: torque m r² α, the bearings half of m r ω² and m r α beside what the weight tilts', () => {
    const upright: Link = { at: [0, 0, 0], axis: [0, 0, 1], mass: 4, centre: [0.5, 0, 0], span: 0.1 };
    const rows = worst(arm([upright], [{ motion: { speed: [2], accel: [10] } }]));
    is(rows, 0, 'torque', 4 * 0.25 * 10);
    is(rows, 0, 'moment', 4 * G * 0.5);
    // Outward m r ω² adds to the couple of the weight on the upper bearing, takes from it on the lower one; m r α lies across both
    const couple = (4 * G * 0.5) / 0.1;
    const [outward, across] = [4 * 0.5 * 4, 4 * 0.5 * 10];
    is(rows, 0, 'radial', Math.hypot(couple + outward / 2, across / 2), 'B');
    is(rows, 0, 'radial', Math.hypot(couple, across / 2), 'A');
  });
});

describe('a planar two-link', () => {
  it('weights: both torques at full stretch', () => {
    const rows = worst(arm(STRETCHED, [{}]));
    const row = is(rows, 0, 'torque', STRETCHED_MOMENT);
    expect(Math.abs(row.pose[1]!)).toBeLessThan(1e-6);
    is(rows, 1, 'torque', G * 0.15);
  });

  it('a payload and a force along gravity at the tip add their weight times the stretch', () => {
    const payload = { mass: 1.5, centre: [0, 0, 0] as Vec3, inertia: null };
    const tipForce = { magnitude: 12, direction: 'base', unit: [0, 0, -1] } as const;
    const rows = worst(arm(STRETCHED, [{ payload, tipForce }], [0.3, 0, 0]));
    is(rows, 0, 'torque', STRETCHED_MOMENT + (1.5 * G + 12) * 0.7);
    is(rows, 1, 'torque', G * 0.15 + (1.5 * G + 12) * 0.3);
  });

  it('a force level in the base: never more than by Pythagoras from the weight, attained', () => {
    const tipForce = { magnitude: 20, direction: 'base', unit: [1, 0, 0] } as const;
    const rows = worst(arm([STRETCHED[1]!], [{ tipForce }], [0.3, 0, 0]));
    is(rows, 0, 'torque', Math.hypot(G * 0.15, 20 * 0.3));
  });

  it('a force fixed in the tool, across the last link: its torque there is the same in every pose', () => {
    const tipForce = { magnitude: 20, direction: 'tool', unit: [0, 0, -1] } as const;
    const rows = worst(arm(STRETCHED, [{ tipForce }], [0.3, 0, 0]));
    is(rows, 1, 'torque', G * 0.15 + 20 * 0.3);
    is(rows, 0, 'torque', STRETCHED_MOMENT + 20 * 0.7);
  });

  it('a force any way: weight at full stretch and force times stretch', () => {
    const rows = worst(arm(STRETCHED, [{ tipForce: { magnitude: 20, direction: 'any' } }], [0.3, 0, 0]));
    is(rows, 0, 'torque', STRETCHED_MOMENT + 20 * 0.7);
    is(rows, 1, 'torque', G * 0.15 + 20 * 0.3);
  });
});

describe('vertical axes', () => {
  it('four joints: moment is weight times reach, no torque, thrust the weight, radial load moment over span', () => {
    const rows = worst(arm(VERTICAL, [{}]));
    is(rows, 0, 'moment', VERTICAL_MOMENT);
    is(rows, 0, 'torque', 0);
    is(rows, 0, 'axial', 6.5 * G, 'A');
    is(rows, 0, 'radial', VERTICAL_MOMENT / 0.2, 'A');
    is(rows, 0, 'radial', VERTICAL_MOMENT / 0.2, 'B');
  });

  it('a force any way at the tip adds force times its distance from the origin', () => {
    const rows = worst(arm(VERTICAL, [{ tipForce: { magnitude: 25, direction: 'any' } }], [0, 0, -0.2]));
    // Tip: 0.7 m out, 0.3 m below the first joint's origin
    is(rows, 0, 'moment', VERTICAL_MOMENT + 25 * Math.hypot(0.7, 0.3));
    is(rows, 0, 'torque', 25 * 0.7);
    is(rows, 0, 'axial', 6.5 * G + 25, 'A');
  });
});
