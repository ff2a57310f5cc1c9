/** Sound arm files at random, for properties. Every optional part may be there or not; the rules between fields hold by construction. */
import fc from 'fast-check';
import type { ArmFile, BearingFile, CaseFile, JointFile, SupportFile } from '../../src/arm/armFile.ts';

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });
const vector = (size: number) => fc.tuple(number(-size, size), number(-size, size), number(-size, size));
const direction = vector(1).filter((v) => Math.hypot(...v) > 1e-3);
const name = fc.string({ unit: 'grapheme-ascii', minLength: 1, maxLength: 12 }).filter((text) => text.trim() === text);

/** Inertia of a box with the mass, so that it is one of a real body. */
const inertia = fc.tuple(number(0.1, 10), number(0.01, 1), number(0.01, 1), number(0.01, 1)).map(([m, a, b, c]) => ({
  xx: (m / 12) * (b * b + c * c),
  yy: (m / 12) * (a * a + c * c),
  zz: (m / 12) * (a * a + b * b),
  xy: 0,
}));

const shaft = fc.record(
  {
    diameter_mm: number(10, 50),
    bore_mm: number(0, 9),
    material: name,
    turns_with: fc.constantFrom('link' as const, 'housing' as const),
    sections: fc.constant([{ from_mm: 0, to_mm: 10, diameter_mm: 12, bore_mm: 2 }]),
  },
  { requiredKeys: ['diameter_mm'] },
);

const pair = {
  hub_mm: number(-50, 50),
  span_mm: number(20, 200),
  thrust: fc.constantFrom('A' as const, 'B' as const, 'both' as const),
};
const some: { requiredKeys: [] } = { requiredKeys: [] };
const bearings = fc.record({ A: fc.constantFrom('ball', 'bush'), B: fc.constant('ball') }, some);

const support: fc.Arbitrary<SupportFile> = fc.oneof(
  fc.record(
    { arrangement: fc.constant('clevis' as const), ...pair, offset_mm: number(-9, 9), bearings, shaft },
    { requiredKeys: ['arrangement', 'hub_mm', 'span_mm', 'thrust'] },
  ),
  fc.record(
    {
      arrangement: fc.constant('cantilever' as const),
      ...pair,
      overhang_mm: number(0, 50),
      side: fc.constantFrom('+' as const, '-' as const),
      bearings,
      shaft,
    },
    { requiredKeys: ['arrangement', 'hub_mm', 'span_mm', 'thrust', 'overhang_mm', 'side'] },
  ),
  fc.record(
    {
      arrangement: fc.constant('ring' as const),
      hub_mm: number(-50, 50),
      station_mm: number(-50, 50),
      bearing: fc.constant('ring'),
      shaft,
    },
    { requiredKeys: ['arrangement', 'hub_mm'] },
  ),
) as fc.Arbitrary<unknown> as fc.Arbitrary<SupportFile>;

const drive = fc.oneof(
  fc.record({
    kind: fc.constant('gear' as const),
    station_mm: number(-90, 90),
    radius_mm: number(5, 90),
    pressure_angle_deg: number(0, 45),
    mesh_deg: number(-360, 360),
  }),
  fc.record({
    kind: fc.constant('belt' as const),
    station_mm: number(-90, 90),
    radius_mm: number(5, 90),
    pull_deg: number(-360, 360),
    pretension_N: number(0, 500),
    tension_ratio: number(1, 5),
  }),
);

const link = fc.record(
  { name, mass_kg: number(0, 20), centre_mm: vector(300), inertia_kg_m2: inertia },
  { requiredKeys: ['mass_kg', 'centre_mm', 'inertia_kg_m2'] },
);

const joint: fc.Arbitrary<JointFile> = fc.oneof(
  {
    weight: 4,
    arbitrary: fc.record(
      {
        name,
        kind: fc.constant('revolute' as const),
        origin_mm: vector(500),
        turn_deg: vector(180),
        axis: direction,
        travel_deg: fc.tuple(number(-400, 0), number(0, 400)),
        link,
        support,
        drive,
      },
      { requiredKeys: ['name', 'kind', 'origin_mm', 'axis', 'travel_deg', 'link'] },
    ),
  },
  { weight: 1, arbitrary: fc.record({ name, kind: fc.constant('fixed' as const), origin_mm: vector(500), link }) },
) as fc.Arbitrary<JointFile>;

function caseOf(turning: number): fc.Arbitrary<CaseFile> {
  const rates = (most: number) => fc.array(number(0, most), { minLength: turning, maxLength: turning });
  return fc.record(
    {
      name,
      payload: fc.record({ mass_kg: number(0, 20), centre_mm: vector(100), inertia_kg_m2: inertia }),
      tip_force: fc.record({
        force_N: number(0, 500),
        direction: fc.oneof(
          fc.constant('any' as const),
          direction.map((base) => ({ base })),
          direction.map((tool) => ({ tool })),
        ),
      }),
      motion: fc.record({ speed_deg_s: rates(400), accel_deg_s2: rates(2000) }),
      factor: number(0.1, 3),
    },
    { requiredKeys: ['name'] },
  ) as fc.Arbitrary<CaseFile>;
}

const TABLE: Readonly<Record<string, BearingFile>> = {
  ball: { kind: 'deep-groove', bore_mm: 20, outer_mm: 42, width_mm: 12, C_N: 9400, C0_N: 5000 },
  bush: { kind: 'plain-bushing', bore_mm: 20, outer_mm: 26, width_mm: 20, pressure_limit_MPa: 10 },
  ring: { kind: 'four-point', bore_mm: 50, outer_mm: 80, width_mm: 16, clearance_um: [0, 10] },
};

/** A sound file of 1 to 7 joints and up to 4 cases. */
export const armFileArbitrary: fc.Arbitrary<ArmFile> = fc
  .uniqueArray(joint, { minLength: 1, maxLength: 7, selector: (entry) => entry.name })
  .filter((joints) => joints.some((entry) => entry.kind === 'revolute'))
  .chain((joints) => {
    const turning = joints.filter((entry) => entry.kind === 'revolute').length;
    return fc.record(
      {
        armload: fc.constant(1 as const),
        name,
        gravity_m_s2: vector(10),
        joints: fc.constant(joints),
        tip: fc.record({ origin_mm: vector(200), turn_deg: vector(180) }, { requiredKeys: ['origin_mm'] }),
        cases: fc.uniqueArray(caseOf(turning), { maxLength: 4, selector: (entry) => entry.name }),
        bearings: fc.constant(structuredClone(TABLE) as Record<string, BearingFile>),
        targets: fc.record({ static_safety: number(0.5, 5), life_h: number(1, 1e5), slope_mrad: number(0.1, 5) }, some),
      },
      { requiredKeys: ['armload', 'name', 'gravity_m_s2', 'joints', 'tip', 'bearings'] },
    ) as fc.Arbitrary<ArmFile>;
  });
