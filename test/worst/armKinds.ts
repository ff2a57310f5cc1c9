/** Kinds of random arms that a certified worst must hold for, near-degenerate ones among them. */
import type {
  Arm,
  Joint,
  LoadCase,
  Mat3,
  RollingBearing,
  RollingKind,
  Shaft,
  TipForce,
  Vec3,
} from '../../src/arm/arm.ts';
import { seededRandom } from '../../src/math/random.ts';
import { times, turned } from '../armVariants.ts';
import { type RandomArmOptions, randomArm } from '../randomArm.ts';

export interface ArmKind {
  readonly name: string;
  readonly make: (seed: number, joints: number) => Arm;
}

const EYE: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];

function kind(name: string, options: Omit<RandomArmOptions, 'joints'>, change: (arm: Arm, seed: number) => Arm) {
  return { name, make: (seed: number, joints: number) => change(randomArm(seed, { joints, ...options }), seed) };
}
const same = (arm: Arm) => arm;

/** With all the checks of bearings and shafts, which are many: three joints at most. */
function short(name: string, options: Omit<RandomArmOptions, 'joints'>): ArmKind {
  return {
    name: `${name}, three joints at most`,
    make: (seed, joints) => withParts(randomArm(seed, { joints: 1 + (joints % 3), ...options }), seed),
  };
}

export function withJoints(arm: Arm, change: (joint: Joint, k: number) => Joint): Arm {
  return { ...arm, joints: arm.joints.map(change) };
}

export function withCases(arm: Arm, change: (load: LoadCase, k: number) => LoadCase): Arm {
  return { ...arm, cases: arm.cases.map(change) };
}

/** The same travel for every joint, its middle where it was. */
export function withTravel(arm: Arm, width: number): Arm {
  return withJoints(arm, (joint) => {
    const middle = 0.5 * (joint.travel.from + joint.travel.to);
    return { ...joint, travel: { from: middle - width / 2, to: middle + width / 2, full: false } };
  });
}

/** Gravity along the first axis. */
function alongFirst(arm: Arm): Arm {
  const { axis, placement } = arm.joints[0]!;
  const [x, y, z] = turned(placement.rotation, axis);
  return { ...arm, gravity: [-9.80665 * x, -9.80665 * y, -9.80665 * z] };
}

/** Turn by an angle about a unit axis (Rodrigues). */
function turnAbout([x, y, z]: Vec3, angle: number): Mat3 {
  const c = Math.cos(angle);
  const s = Math.sin(angle);
  const v = 1 - c;
  return [
    c + v * x * x, v * x * y - s * z, v * x * z + s * y,
    v * x * y + s * z, c + v * y * y, v * y * z - s * x,
    v * x * z - s * y, v * y * z + s * x, c + v * z * z,
  ]; // biome-ignore format: a matrix
}

/** Axes alternately as they are and tilted from the one before by `tilt` about a direction across it; `flip`: against it. */
function nearlyParallel(arm: Arm, tilt: number, flip: boolean): Arm {
  const axis = arm.joints[0]!.axis;
  const across: Vec3 = Math.abs(axis[0]) < 0.9 ? [0, -axis[2], axis[1]] : [-axis[2], 0, axis[0]];
  const size = Math.hypot(...across);
  const by = turnAbout([across[0] / size, across[1] / size, across[2] / size], tilt);
  const half = turnAbout([across[0] / size, across[1] / size, across[2] / size], Math.PI);
  return withJoints(arm, (joint, k) => {
    if (k === 0 || k % 3 === 2) return joint;
    const back: Vec3 = [-axis[0], -axis[1], -axis[2]];
    const rotation = tilt === 0 ? EYE : by;
    if (!flip) return { ...joint, axis, placement: { ...joint.placement, rotation } };
    // Exactly against it by the axis, or nearly so by half a turn of the frame
    if (k % 2 === 1 && tilt === 0) return { ...joint, axis: back, placement: { ...joint.placement, rotation } };
    return { ...joint, axis, placement: { ...joint.placement, rotation: times(half, rotation) } };
  });
}

/** Tip force along gravity: down (+1) or up (-1), some larger than the weight. */
export function withForceAlong(arm: Arm, seed: number): Arm {
  const way = seed % 2 === 0 ? 1 : -1;
  const g = Math.hypot(...arm.gravity);
  const unit = arm.gravity.map((v) => (way * v) / g) as unknown as Vec3;
  const tipForce: TipForce = { magnitude: seed % 3 === 0 ? 400 : 25, direction: 'base', unit };
  return withCases(arm, (load) => ({ ...load, tipForce }));
}

/** Every other joint on a ring bearing, which takes force and moment alike. */
function onRings(arm: Arm): Arm {
  return withJoints(arm, (joint, k) => {
    const { support } = joint;
    if (k % 2 === 1 || !support || support.arrangement === 'ring') return joint;
    const { hub, stationA: station, shaft } = support;
    return { ...joint, support: { arrangement: 'ring', hub, station, bearing: null, shaft } };
  });
}

function massless(arm: Arm, from: number): Arm {
  return withJoints(
    withCases(arm, (load) => ({ ...load, payload: null })),
    (joint, k) => (k < from ? joint : { ...joint, link: { ...joint.link, mass: 0 } }),
  );
}

/** Small turns, so that middles, ends and the closed form of the last joint meet rounding. */
const TINY = [0, 1e-3, 1e-6, 1e-7, 3e-8, 1e-8, 1e-10, 1e-12, 1e-14];
const TILTS = [1e-6, 1e-7, 1e-8, 1e-9, 1e-10, 1e-11, 1e-12, 1e-13, 1e-14];

/** Loads that are weights (and forces along them): the sphere's ground. */
export const WEIGHT_KINDS: readonly ArmKind[] = [
  kind('generic', {}, same),
  kind('turning right round', { full: 1 }, same),
  kind('travel beyond a turn', { full: 0.3 }, (arm) => withTravelFactor(arm)),
  kind('parallel axes', { parallel: 0.8 }, same),
  kind('coincident origins', { coincident: 0.7, parallel: 0.3 }, same),
  kind('one degree of travel', { travel: Math.PI / 180, full: 0 }, same),
  kind('tiny or no travel', { full: 0 }, (arm, seed) => withTravel(arm, TINY[seed % TINY.length]!)),
  kind('travel of all or nothing', { full: 0 }, (arm, seed) =>
    withJoints(arm, (joint, k) => {
      const still = (k + seed) % 2 === 0;
      return { ...joint, travel: still ? { from: 0.4, to: 0.4, full: false } : joint.travel };
    }),
  ),
  kind('massless tip', {}, (arm, seed) => massless(arm, arm.joints.length - 1 - (seed % 2))),
  kind('massless throughout but the payload', {}, (arm) =>
    withJoints(arm, (joint) => ({ ...joint, link: { ...joint.link, mass: 0 } })),
  ),
  kind('no gravity', {}, (arm) => ({ ...arm, gravity: [0, 0, 0] })),
  kind('no gravity but a base force', { force: 'base' }, (arm) => ({ ...arm, gravity: [0, 0, 0] })),
  kind('gravity along the first axis', {}, alongFirst),
  kind('axes nearly parallel', {}, (arm, seed) => nearlyParallel(arm, TILTS[seed % TILTS.length]!, false)),
  kind('axes antiparallel', {}, (arm) => nearlyParallel(arm, 0, true)),
  kind('axes nearly antiparallel', {}, (arm, seed) => nearlyParallel(arm, TILTS[seed % TILTS.length]!, true)),
  kind('force along gravity', {}, withForceAlong),
  kind('gears and belts', { drives: true }, withoutPretension),
  short('bearings and shafts', {}),
  kind('centres on the axes', {}, (arm) =>
    withJoints(arm, (joint) => ({ ...joint, link: { ...joint.link, centre: alongAxis(joint) } })),
  ),
];

function alongAxis(joint: Joint): Vec3 {
  const [x, y, z] = joint.axis;
  return [0.1 * x, 0.1 * y, 0.1 * z];
}

function withTravelFactor(arm: Arm): Arm {
  return withJoints(arm, (joint, k) => ({
    ...joint,
    travel: k % 2 === 0 ? { from: -Math.PI, to: Math.PI, full: true } : joint.travel,
  }));
}

/** Pretension is a constant part, which the sphere leaves to branch and bound. */
function withoutPretension(arm: Arm): Arm {
  return withJoints(arm, (joint) =>
    joint.drive?.kind === 'belt' ? { ...joint, drive: { ...joint.drive, pretension: 0 } } : joint,
  );
}

/** Loads that need branch and bound. */
export const OTHER_KINDS: readonly ArmKind[] = [
  kind('force any way', { force: 'any' }, same),
  kind('force fixed in the base', { force: 'base' }, same),
  kind('force fixed in the tool', { force: 'tool' }, same),
  kind('motion', { motion: true }, same),
  kind('motion and a force any way', { motion: true, force: 'any' }, same),
  kind('gears and belts', { drives: true }, same),
  kind('gears, belts and a force any way', { drives: true, force: 'any' }, same),
  {
    // The ranges of torque of a drive make each climb in motion a search of its own
    name: 'gears, belts and motion, six joints at most',
    make: (seed, joints) =>
      randomArm(seed, { joints: 1 + ((joints - 1) % 6), drives: true, motion: true, force: 'tool' }),
  },
  kind('force any way, turning right round', { force: 'any', full: 1 }, same),
  kind('force any way, parallel axes', { force: 'any', parallel: 0.8, coincident: 0.4 }, same),
  kind('force any way, one degree of travel', { force: 'any', travel: Math.PI / 180, full: 0 }, same),
  kind('force any way, no gravity', { force: 'any' }, (arm) => ({ ...arm, gravity: [0, 0, 0] })),
  kind('force in the base, tiny or no travel', { force: 'base', full: 0 }, (arm, seed) =>
    withTravel(arm, TINY[seed % TINY.length]!),
  ),
  kind('force in the tool, axes nearly parallel', { force: 'tool' }, (arm, seed) =>
    nearlyParallel(arm, TILTS[seed % TILTS.length]!, seed % 2 === 0),
  ),
  kind('motion, gravity along the first axis', { motion: true }, alongFirst),
  short('force any way, bearings, shafts and gears', { force: 'any', drives: true }),
  kind('force any way, massless', { force: 'any' }, (arm) => massless(arm, 0)),
  kind('motion, one degree of travel', { motion: true, travel: Math.PI / 180, full: 0 }, same),
  kind('motion, parallel axes, coincident origins', { motion: true, parallel: 0.8, coincident: 0.5 }, same),
  kind('force in the base, rings', { force: 'base', drives: true }, onRings),
  kind('force any way, rings and motion', { force: 'any', motion: true }, onRings),
];

/** Several cases on one arm: weights, a force any way, a force along gravity, each with its own factor. */
export function severalCases(seed: number, joints: number): Arm {
  const arm = randomArm(seed, { joints, drives: seed % 2 === 0 });
  const random = seededRandom(seed + 900);
  const load = arm.cases[0]!;
  const down = withForceAlong(arm, seed).cases[0]!;
  return {
    ...arm,
    cases: [
      { ...load, name: 'carry', factor: random.between(0.5, 2) },
      { ...load, name: 'any', payload: null, tipForce: { magnitude: 30, direction: 'any' }, factor: 1.2 },
      { ...down, name: 'press', factor: random.between(0.5, 2) },
    ],
  };
}

const NO_RATING = { C: null, C0: null, e: null, Y: null, Y0: null, f0: null, source: null } as const;
const NO_SIZE = { pitchDiameter: null, ballDiameter: null, balls: null, shaftFit: null, housingFit: null } as const;

function bearing(kind: RollingKind, bore: number, more: Partial<RollingBearing>): RollingBearing {
  return {
    ...NO_RATING,
    ...NO_SIZE,
    kind,
    bore,
    outer: 2 * bore,
    width: 0.6 * bore,
    contactAngle: null,
    rows: 1,
    clearance: 'CN',
    misalignment: 1e-3,
    stiffness: null,
    C: 9000,
    C0: 5000,
    ...more,
  };
}

const BEARINGS = {
  groove: bearing('deep-groove', 0.02, {}),
  rollers: bearing('cylindrical-roller', 0.02, {}),
  angular: bearing('angular-contact', 0.02, { contactAngle: (40 * Math.PI) / 180 }),
  crossed: bearing('crossed-roller', 0.08, { pitchDiameter: 0.12, contactAngle: Math.PI / 4 }),
} as const;

/** Bearings and stepped shafts on every joint, invented: deep groove with rollers, adjusted angular contact, rings. */
export function withParts(arm: Arm, seed: number): Arm {
  const random = seededRandom(seed + 333);
  return {
    ...withJoints(arm, (joint, k) => {
      const { support } = joint;
      if (support?.arrangement !== 'clevis' && support?.arrangement !== 'cantilever') return joint;
      const diameter = random.between(0.015, 0.03);
      // Steps stand clear of bearings and hub, so that a small change of span moves nothing across one
      const step = (part: number) => support.stationA + part * (support.stationB - support.stationA);
      const [start, end] = [step(-0.1), step(0.37)];
      const shaft: Shaft = {
        diameter,
        bore: random.next() < 0.5 ? 0 : 0.4 * diameter,
        material: 'steel-c45',
        turnsWith: random.next() < 0.7 ? 'link' : 'housing',
        finish: 'machined',
        sections: [
          {
            from: Math.min(start, end),
            to: Math.max(start, end),
            diameter: 0.9 * diameter,
            bore: 0,
            bendingFactor: 1.6,
            torsionFactor: 1.3,
            notchRadius: 1e-3,
          },
        ],
      };
      if ((k + seed) % 4 === 3) {
        return {
          ...joint,
          support: { arrangement: 'ring', hub: support.hub, station: support.stationA, bearing: 'crossed', shaft },
        };
      }
      const pair = { ...support, shaft, bearingA: 'groove', bearingB: 'rollers', thrust: 'A' } as const;
      if ((k + seed) % 4 !== 2) return { ...joint, support: pair };
      return {
        ...joint,
        support: { ...pair, bearingA: 'angular', bearingB: 'angular', thrust: 'both', adjusted: 'back-to-back' },
      };
    }),
    bearings: BEARINGS,
  };
}
