/**
 * The arm file's schema. Everything else follows from it: the `ArmFile` type, the messages, the JSON Schema for editors and the field reference.
 * Keys carry their unit; unknown keys are errors; every number is finite. What one field cannot tell alone is in `rules.ts`.
 */
import * as z from 'zod/mini';

export const MAX_TEXT_BYTES = 8 * 1024 * 1024;
export const MAX_JOINTS = 64;
const MAX_CASES = 64;
export const MAX_BEARINGS = 256;
const MAX_SECTIONS = 64;
export const MAX_PATH_ROWS = 200_000;
/** No number of an arm file may be larger, so that products of a few of them stay finite. */
export const LARGEST = 1e12;
/** What must be above 0 must be above this, so that quotients stay finite. */
export const SMALLEST = 1e-9;

/** What is said of a field; annotation only, the reader applies the defaults. */
interface About {
  readonly description: string;
  /** The value that stands for the field when it is left out. */
  readonly default?: unknown;
  /** The same in words, where it is no fixed value. */
  readonly otherwise?: string;
}

/** Descriptions of the fields, for the JSON Schema and the field reference. */
export const fieldAbout = z.registry<About>();

function is<S extends z.core.$ZodType>(schema: S, description: string): S {
  // One schema in two places would carry the words of the last.
  if (fieldAbout.has(schema)) throw new Error(`a second description for one schema: ${description}`);
  fieldAbout.add(schema, { description });
  return schema;
}

function may<S extends z.core.$ZodType>(
  schema: S,
  description: string,
  left: { readonly default?: unknown; readonly otherwise?: string } = {},
): z.ZodMiniOptional<S> {
  const optional = z.optional(schema);
  fieldAbout.add(optional, { description, ...left });
  return optional;
}

const anyNumber = () => z.number().check(z.gte(-LARGEST), z.lte(LARGEST));
const aboveZero = () => z.number().check(z.gte(SMALLEST), z.lte(LARGEST));
const notNegative = () => z.number().check(z.gte(0), z.lte(LARGEST));
const between = (from: number, to: number) => z.number().check(z.gte(from), z.lte(to));
const vector = () => z.tuple([anyNumber(), anyNumber(), anyNumber()]);
// One line of text without blanks at its ends. No control characters, which would garble a table or a terminal; written without Unicode classes,
// for editors that read the pattern in the JSON Schema know none.
// biome-ignore lint/suspicious/noControlCharactersInRegex: they are what is kept out
const ONE_LINE = /^(?:[^\s\x00-\x1f\x7f-\x9f](?:[^\x00-\x1f\x7f-\x9f]*[^\s\x00-\x1f\x7f-\x9f])?)?$/;
const name = () =>
  z
    .string()
    .check(
      z.minLength(1),
      z.maxLength(120),
      z.regex(ONE_LINE, { error: 'one line of text without blanks at its ends' }),
    );
const text = () => z.string().check(z.maxLength(20_000));

const inertia = () =>
  z.strictObject({
    xx: is(notNegative(), 'Moment of inertia about the x axis through the centre of mass'),
    yy: is(notNegative(), 'About the y axis'),
    zz: is(notNegative(), 'About the z axis'),
    xy: may(anyNumber(), 'Matrix entry xy, that is minus the integral of x y dm', { default: 0 }),
    xz: may(anyNumber(), 'Matrix entry xz', { default: 0 }),
    yz: may(anyNumber(), 'Matrix entry yz', { default: 0 }),
  });

const linkSchema = is(
  z.strictObject({
    name: may(name(), 'Name of the link', { otherwise: 'the name of its joint' }),
    mass_kg: is(notNegative(), 'Mass of the link; 0 for one whose weight is neglected'),
    centre_mm: may(vector(), 'Centre of mass in the link frame; needed where the mass is not 0'),
    inertia_kg_m2: may(
      inertia(),
      'Inertia about the centre of mass, axes of the link frame; needed where a case has motion',
    ),
  }),
  'The link that this joint carries; on a fixed joint, the part fixed on',
);

const sectionSchema = z.strictObject({
  from_mm: is(anyNumber(), 'Where the section begins, along the joint axis from the joint origin'),
  to_mm: is(anyNumber(), 'Where it ends'),
  diameter_mm: is(aboveZero(), 'Outside diameter'),
  bore_mm: may(notNegative(), 'Bore of a hollow section', { otherwise: 'the bore of the shaft' }),
  bending_factor: may(
    between(1, 10),
    'Stress-concentration factor in bending at the end `to_mm` (shoulder or groove)',
    { default: 1 },
  ),
  torsion_factor: may(between(1, 10), 'Stress-concentration factor in torsion at the end `to_mm`', { default: 1 }),
  notch_radius_mm: may(aboveZero(), 'Fillet or groove radius at the end `to_mm`, for the notch sensitivity'),
});

const shaftSchema = z.strictObject({
  diameter_mm: is(aboveZero(), 'Outside diameter, also of every part that no section covers'),
  bore_mm: may(notNegative(), 'Bore of a hollow shaft', { default: 0 }),
  material: may(name(), 'Key of a material in the table of materials'),
  turns_with: may(
    z.enum(['link', 'housing']),
    'What the shaft turns with: it decides which ring sees a turning load and what cycle the shaft sees',
    { default: 'link' },
  ),
  finish: may(z.enum(['ground', 'machined', 'hot-rolled', 'forged']), 'Surface finish, for the fatigue strength', {
    default: 'machined',
  }),
  sections: may(
    z.array(sectionSchema).check(z.maxLength(MAX_SECTIONS)),
    'Steps of a stepped shaft, in order, not overlapping',
  ),
});

const pairParts = () => ({
  hub_mm: is(anyNumber(), "Mid-plane of the link's hub, along the joint axis from the joint origin"),
  span_mm: is(aboveZero(), 'Distance between the bearing centres A and B'),
  thrust: is(
    z.enum(['A', 'B', 'both']),
    'Bearing that locates the shaft along its axis; `both`: A takes thrust along the axis, B against it',
  ),
  adjusted: may(
    z.enum(['back-to-back', 'face-to-face']),
    'How an adjusted pair of angular-contact or tapered bearings stands; needs `thrust` to be `both`',
  ),
  bearings: may(
    z.strictObject({
      A: may(name(), 'Name of bearing A in the table `bearings`'),
      B: may(name(), 'Name of bearing B'),
    }),
    'The two bearings',
  ),
  shaft: may(shaftSchema, 'The shaft both bearings sit on'),
});

const clevisSchema = z.strictObject({
  arrangement: is(z.literal('clevis'), 'The hub lies between the bearings'),
  ...pairParts(),
  offset_mm: may(anyNumber(), 'Shift of the middle of the pair from the hub', { default: 0 }),
});

const cantileverSchema = z.strictObject({
  arrangement: is(z.literal('cantilever'), 'Both bearings lie on one side of the hub'),
  ...pairParts(),
  overhang_mm: is(notNegative(), 'From the hub to the near bearing A'),
  side: is(z.enum(['+', '-']), 'Where the pair lies from the hub, along the axis or against it'),
});

const ringSchema = z.strictObject({
  arrangement: is(z.literal('ring'), 'One ring bearing that carries force and moment by itself'),
  hub_mm: is(anyNumber(), "Mid-plane of the link's hub, along the joint axis from the joint origin"),
  station_mm: may(anyNumber(), 'Centre of the ring bearing, along the joint axis', { otherwise: '`hub_mm`' }),
  bearing: may(name(), 'Name of the ring bearing in the table `bearings`'),
  shaft: may(shaftSchema, 'The shaft or hollow tube the ring sits on'),
});

const supportSchema = z.discriminatedUnion('arrangement', [clevisSchema, cantileverSchema, ringSchema]);

const driveSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: is(z.literal('gear'), 'A gear on the shaft'),
    station_mm: is(anyNumber(), 'Mid-plane of the gear, along the joint axis from the joint origin'),
    radius_mm: is(aboveZero(), 'Pitch radius'),
    pressure_angle_deg: is(between(0, 45), 'Working pressure angle'),
    mesh_deg: is(
      anyNumber(),
      'Direction from the axis to the mesh point: angle about the joint axis, in the housing frame, from the x axis of the joint frame made square to the axis (from the y axis where the joint axis lies within 26° of x, |axis·x| ≥ 0.9)',
    ),
  }),
  z.strictObject({
    kind: is(z.literal('belt'), 'A belt or chain on the shaft'),
    station_mm: is(anyNumber(), 'Mid-plane of the pulley, along the joint axis from the joint origin'),
    radius_mm: is(aboveZero(), 'Pitch radius'),
    pull_deg: is(anyNumber(), "Direction of the belt's pull, measured as `mesh_deg`"),
    pretension_N: is(notNegative(), 'Sum of the tensions of both strands at rest'),
    tension_ratio: may(
      between(1, 20),
      'Sum of both strand tensions over the effective tension; 1 where the slack strand is fully slack',
      { default: 1 },
    ),
  }),
]);

const revoluteSchema = z.strictObject({
  name: is(name(), 'Name of the joint, used once in the file'),
  kind: is(z.literal('revolute'), 'A joint that turns'),
  origin_mm: is(vector(), "Joint origin in the previous link's frame"),
  turn_deg: may(vector(), 'Roll, pitch and yaw of the joint frame about fixed axes: Rz(yaw) Ry(pitch) Rx(roll)', {
    default: [0, 0, 0],
  }),
  axis: is(vector(), 'Joint axis in the joint frame; its length does not matter'),
  travel_deg: is(
    z.tuple([anyNumber(), anyNumber()]),
    'Lowest and highest joint angle; 360° or more between them is a full turn',
  ),
  link: linkSchema,
  support: may(supportSchema, 'Bearings and shaft; without it the joint reports its joint load alone'),
  drive: may(driveSchema, 'Gear or belt that loads the shaft with the drive torque'),
});

const fixedSchema = z.strictObject({
  name: is(name(), 'Name of the joint, used once in the file'),
  kind: is(z.literal('fixed'), 'Rigidly merged into the link before it'),
  origin_mm: is(vector(), "Joint origin in the previous link's frame"),
  turn_deg: may(vector(), 'Roll, pitch and yaw of the joint frame about fixed axes: Rz(yaw) Ry(pitch) Rx(roll)', {
    default: [0, 0, 0],
  }),
  link: linkSchema,
});

const jointSchema = z.discriminatedUnion('kind', [revoluteSchema, fixedSchema]);

const caseSchema = z.strictObject({
  name: is(name(), 'Name of the case, used once in the file'),
  payload: may(
    z.strictObject({
      mass_kg: is(notNegative(), 'Mass of the payload'),
      centre_mm: is(vector(), 'Centre of mass in the tip frame'),
      inertia_kg_m2: may(
        inertia(),
        'Inertia about the centre of mass, axes of the tip frame; a point mass where left out',
      ),
    }),
    'What the arm carries in this case',
  ),
  tip_force: may(
    z.strictObject({
      force_N: is(notNegative(), 'Size of the force'),
      direction: is(
        z.union([
          z.literal('any'),
          z.strictObject({ base: is(vector(), 'Direction in the base frame') }),
          z.strictObject({ tool: is(vector(), 'Direction in the tip frame') }),
        ]),
        '`any`: the worst direction at each pose; else fixed in the base frame or in the tip frame',
      ),
    }),
    "Force on the arm at the tip frame's origin",
  ),
  motion: may(
    z.strictObject({
      speed_deg_s: is(
        z.array(notNegative()).check(z.maxLength(MAX_JOINTS)),
        'Highest speed, one number a revolute joint; the joint may have any speed within ± it',
      ),
      accel_deg_s2: is(
        z.array(notNegative()).check(z.maxLength(MAX_JOINTS)),
        'Highest acceleration, one number a revolute joint, within ± it',
      ),
    }),
    'Speeds and accelerations of this case; at rest where left out',
  ),
  factor: may(aboveZero(), 'Multiplies every load of the case', { default: 1 }),
});

const zone = (pattern: RegExp, example: string) =>
  z.string().check(z.regex(pattern, { error: `an ISO 286 zone such as ${example}` }));

const rolling = () => ({
  bore_mm: is(aboveZero(), 'Bore'),
  outer_mm: is(aboveZero(), 'Outside diameter'),
  width_mm: is(aboveZero(), 'Width'),
  C_N: may(aboveZero(), 'Basic dynamic load rating; estimated, and labelled so, where left out'),
  C0_N: may(aboveZero(), 'Basic static load rating; estimated, and labelled so, where left out'),
  contact_angle_deg: may(between(0, 89), 'Nominal contact angle'),
  e: may(between(0, 10), "Maker's limit of Fa/Fr"),
  Y: may(between(0, 20), "Maker's dynamic axial factor for Fa/Fr above e"),
  Y0: may(between(0, 20), "Maker's static axial factor"),
  f0: may(between(1, 30), "Maker's geometry factor f0 of a ball bearing"),
  pitch_diameter_mm: may(aboveZero(), 'Pitch diameter of the rolling elements', {
    otherwise: 'mean of bore and outside diameter',
  }),
  ball_diameter_mm: may(aboveZero(), 'Diameter of a ball or roller'),
  balls: may(z.int().check(z.gte(3), z.lte(1000)), 'Number of balls or rollers in one row'),
  rows: may(z.union([z.literal(1), z.literal(2)], { error: '1 or 2' }), 'Rows of rolling elements', {
    otherwise: '1, or 2 for a self-aligning ball bearing',
  }),
  clearance: may(z.enum(['C2', 'CN', 'C3', 'C4', 'C5']), 'Group of radial internal clearance, ISO 5753-1', {
    default: 'CN',
  }),
  clearance_um: may(
    z.tuple([notNegative(), notNegative()]),
    'Measured radial internal clearance (diametral play), from and to; instead of `clearance`',
  ),
  shaft_fit: may(zone(/^[a-z]{1,2}(?:[1-9]|1[0-8])$/, 'k5'), 'ISO 286 zone of the shaft seat'),
  housing_fit: may(zone(/^[A-Z]{1,2}(?:[1-9]|1[0-8])$/, 'H7'), 'ISO 286 zone of the housing seat'),
  misalignment_deg: may(between(SMALLEST, 10), 'Largest misalignment the bearing allows'),
  stiffness_N_um: may(aboveZero(), 'Radial stiffness'),
  source: may(text(), 'Where the numbers come from'),
});

const rollingSchema = z.strictObject({
  kind: is(
    z.enum([
      'deep-groove',
      'angular-contact',
      'self-aligning-ball',
      'cylindrical-roller',
      'needle',
      'tapered-roller',
      'crossed-roller',
      'four-point',
    ]),
    'Kind of rolling bearing',
  ),
  ...rolling(),
});

const bushingSchema = z.strictObject({
  kind: is(z.literal('plain-bushing'), 'A plain bushing'),
  bore_mm: is(aboveZero(), 'Bore'),
  outer_mm: is(aboveZero(), 'Outside diameter'),
  width_mm: is(aboveZero(), 'Length along the axis'),
  pressure_limit_MPa: may(aboveZero(), 'Largest projected pressure'),
  speed_limit_m_s: may(aboveZero(), 'Largest sliding speed'),
  pv_limit_MPa_m_s: may(aboveZero(), 'Largest product of projected pressure and sliding speed'),
  flange_outer_mm: may(
    aboveZero(),
    'Outside diameter of the flange, or of a thrust washer, at every end that thrust presses on; without it the bushing takes no thrust',
  ),
  wear_factor_mm3_N_m: may(
    aboveZero(),
    'Wear factor: volume worn per newton and metre slid, with the shaft it runs on',
  ),
  wear_depth_mm: may(aboveZero(), 'Depth of wear at which the bushing is worn out'),
  clearance_um: may(notNegative(), 'Diametral running clearance'),
  stiffness_N_um: may(aboveZero(), 'Radial stiffness'),
  source: may(text(), 'Where the numbers come from'),
});

const bearingSchema = z.discriminatedUnion('kind', [rollingSchema, bushingSchema]);

const pathRowSchema = z.strictObject({
  time_s: is(anyNumber(), 'Time of the pose; the times of a path rise'),
  pose_deg: is(z.array(anyNumber()).check(z.maxLength(MAX_JOINTS)), 'Joint angles, one number a revolute joint'),
});

/** Rows of a path, any number of them. */
export const pathRowsSchema = z.array(pathRowSchema);

const segmentSchema = z.strictObject({
  case: is(name(), 'Name of the case that loads the arm in this segment'),
  share: is(between(SMALLEST, 1), 'Share of the time; the shares of a duty sum to 1'),
  path: may(
    z.array(pathRowSchema).check(z.minLength(2), z.maxLength(MAX_PATH_ROWS)),
    'The way through the poses; either this or `anywhere`',
  ),
  anywhere: may(
    z.strictObject({
      cycles_per_min: is(
        z.array(notNegative()).check(z.maxLength(MAX_JOINTS)),
        'Swings a minute (there and back) over the whole travel, one number a revolute joint',
      ),
    }),
    'Anywhere in travel; either this or `path`',
  ),
});

const targetsSchema = z.strictObject({
  static_safety: may(aboveZero(), 'Least static safety of every bearing'),
  life_h: may(aboveZero(), 'Least rating life of every rolling bearing, and least wear life of every bushing'),
  reliability: may(between(0.9, 0.9995), 'Reliability of the rating life, 0.9 to 0.9995 (ISO 281)'),
  shaft_yield_safety: may(aboveZero(), 'Least safety of every shaft against yield'),
  shaft_fatigue_safety: may(aboveZero(), 'Least safety of every shaft against fatigue'),
  slope_mrad: may(aboveZero(), 'Largest slope of the shaft at a bearing'),
  tip_error_mm: may(aboveZero(), 'Largest error at the tip from play and elastic tilt'),
  pressure_MPa: may(aboveZero(), 'Largest projected pressure of a plain bushing'),
  pv_MPa_m_s: may(aboveZero(), 'Largest pressure times sliding speed of a plain bushing'),
});

export const armFileSchema = z.strictObject({
  $schema: may(text(), 'Where an editor finds the JSON Schema; not read otherwise'),
  armload: is(z.literal(1), 'Version of the file format'),
  name: is(name(), 'Name of the arm'),
  note: may(text(), 'Free text'),
  gravity_m_s2: is(vector(), 'Acceleration of gravity in the base frame; all 0 for none'),
  joints: is(
    z.array(jointSchema).check(z.minLength(1), z.maxLength(MAX_JOINTS)),
    'The joints from the ground to the tip, each with its link; at least one revolute',
  ),
  tip: is(
    z.strictObject({
      origin_mm: is(vector(), "Origin of the tip frame in the last link's frame"),
      turn_deg: may(vector(), 'Roll, pitch and yaw of the tip frame about fixed axes: Rz(yaw) Ry(pitch) Rx(roll)', {
        default: [0, 0, 0],
      }),
    }),
    'Where payload and tip force act',
  ),
  cases: may(z.array(caseSchema).check(z.maxLength(MAX_CASES)), 'Load cases', { otherwise: 'one case, `own weight`' }),
  bearings: may(z.record(name(), bearingSchema), 'Table of bearings by name'),
  duty: may(
    z.array(segmentSchema).check(z.minLength(1), z.maxLength(MAX_CASES)),
    'How the time is spent, for the rating life',
  ),
  targets: may(targetsSchema, 'What the design must reach; each left out has a stated default'),
});

/** An arm file as it stands: millimetres, degrees, nothing filled in. The page edits this; `armFromFile` makes the SI `Arm`. */
export type ArmFile = z.infer<typeof armFileSchema>;
export type JointFile = ArmFile['joints'][number];
export type SupportFile = z.infer<typeof supportSchema>;
export type PairFile = Exclude<SupportFile, { arrangement: 'ring' }>;
export type ShaftFile = z.infer<typeof shaftSchema>;
export type DriveFile = z.infer<typeof driveSchema>;
export type CaseFile = z.infer<typeof caseSchema>;
export type BearingFile = z.infer<typeof bearingSchema>;
export type RollingFile = z.infer<typeof rollingSchema>;
export type BushingFile = z.infer<typeof bushingSchema>;
export type SegmentFile = z.infer<typeof segmentSchema>;
export type InertiaFile = z.infer<ReturnType<typeof inertia>>;
