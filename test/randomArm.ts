/** Random arms for properties: invented, seeded, with every kind of load and support. */
import type { Arm, Drive, Joint, LoadCase, Mat3, Support, TipForce, Vec3 } from '../src/arm/arm.ts';
import { type Random, seededRandom } from '../src/math/random.ts';

export interface RandomArmOptions {
  readonly joints: number;
  readonly force?: 'none' | 'any' | 'base' | 'tool';
  readonly motion?: boolean;
  readonly drives?: boolean;
  readonly payload?: boolean;
  /** Length scale, m (default 0.4), and mass scale, kg (default 3). */
  readonly size?: number;
  readonly mass?: number;
  /** Chance of a full turn, of a zero offset, of an axis along the one before. */
  readonly full?: number;
  readonly coincident?: number;
  readonly parallel?: number;
  /** Largest travel, rad (default 2π); small values make near-rigid arms. */
  readonly travel?: number;
}

export function randomRotation(random: Random): Mat3 {
  // Shoemake's uniform quaternion
  const [u, v, w] = [random.next(), random.between(0, 2 * Math.PI), random.between(0, 2 * Math.PI)];
  const a = Math.sqrt(1 - u);
  const b = Math.sqrt(u);
  const [x, y, z, s] = [a * Math.sin(v), a * Math.cos(v), b * Math.sin(w), b * Math.cos(w)];
  return [
    1 - 2 * (y * y + z * z), 2 * (x * y - s * z), 2 * (x * z + s * y),
    2 * (x * y + s * z), 1 - 2 * (x * x + z * z), 2 * (y * z - s * x),
    2 * (x * z - s * y), 2 * (y * z + s * x), 1 - 2 * (x * x + y * y),
  ]; // biome-ignore format: a matrix
}

const EYE: Mat3 = [1, 0, 0, 0, 1, 0, 0, 0, 1];
const scaled = (v: readonly number[], k: number): Vec3 => [v[0]! * k, v[1]! * k, v[2]! * k];

function randomSupport(random: Random, size: number): Support {
  const span = size * random.between(0.05, 0.4);
  const hub = size * random.between(-0.1, 0.1);
  const common = { hub, span, adjusted: null, bearingA: null, bearingB: null, shaft: null } as const;
  const thrust = (['A', 'B', 'both'] as const)[random.below(3)]!;
  if (random.next() < 0.5) {
    const offset = span * random.between(-0.4, 0.4);
    return {
      ...common, arrangement: 'clevis', offset, overhang: 0, side: '-', thrust,
      stationA: hub - span / 2 + offset, stationB: hub + span / 2 + offset,
    }; // biome-ignore format: one row of values
  }
  const overhang = size * random.between(0, 0.2);
  const side = random.next() < 0.5 ? '-' : '+';
  const sign = side === '-' ? -1 : 1;
  return {
    ...common, arrangement: 'cantilever', offset: 0, overhang, side, thrust,
    stationA: hub + sign * overhang, stationB: hub + sign * (overhang + span),
  }; // biome-ignore format: one row of values
}

function randomDrive(random: Random, size: number): Drive {
  const station = size * random.between(-0.3, 0.3);
  const radius = size * random.between(0.05, 0.2);
  if (random.next() < 0.5) {
    return { kind: 'gear', station, radius, pressureAngle: Math.PI / 9, mesh: random.between(-3, 3) };
  }
  const pretension = random.between(0, 100);
  return { kind: 'belt', station, radius, pull: random.between(-3, 3), pretension, tensionRatio: random.between(1, 2) };
}

function randomInertia(random: Random, mass: number, size: number) {
  const side = [random.next(), random.next(), random.next()].map((v) => mass * (size * v) ** 2);
  const [a, b, c] = side as [number, number, number];
  return { xx: b + c, yy: a + c, zz: a + b, xy: 0, xz: 0, yz: 0 };
}

/** An arm of `joints` revolute joints with one case, from one seed. */
export function randomArm(seed: number, options: RandomArmOptions): Arm {
  const random = seededRandom(seed * 7919 + options.joints);
  const size = options.size ?? 0.4;
  const mass = options.mass ?? 3;
  const chance = (p: number | undefined, fallback: number) => random.next() < (p ?? fallback);
  let axis: Vec3 = random.direction();
  const joints: Joint[] = [];
  for (let i = 0; i < options.joints; i++) {
    const parallel = chance(options.parallel, 0.15);
    if (!parallel) axis = random.direction();
    const coincident = chance(options.coincident, 0.1);
    const full = chance(options.full, 0.15);
    const middle = random.between(-Math.PI, Math.PI);
    const half = random.between(0, (options.travel ?? 2 * Math.PI) / 2) * 0.999;
    const linkMass = mass * random.next();
    joints.push({
      name: `joint ${i + 1}`,
      kind: 'revolute',
      placement: {
        position: coincident ? [0, 0, 0] : scaled(random.direction(), size * random.next()),
        rotation: parallel ? EYE : randomRotation(random),
      },
      axis,
      travel: full
        ? { from: -Math.PI, to: Math.PI, full: true }
        : { from: middle - half, to: middle + half, full: false },
      link: {
        name: `link ${i + 1}`,
        mass: linkMass,
        centre: scaled(random.direction(), size * random.next()),
        inertia: randomInertia(random, linkMass, size),
      },
      support: randomSupport(random, size),
      drive: options.drives && random.next() < 0.6 ? randomDrive(random, size) : null,
    });
  }
  const magnitude = 9.81 * mass * random.next() + 1e-3 * mass;
  const kind = options.force ?? 'none';
  const tipForce: TipForce | null =
    kind === 'none'
      ? null
      : kind === 'any'
        ? { magnitude, direction: 'any' }
        : { magnitude, direction: kind, unit: random.direction() };
  const load: LoadCase = {
    name: 'load',
    payload:
      options.payload === false
        ? null
        : {
            mass: mass * random.next(),
            centre: scaled(random.direction(), 0.3 * size),
            inertia: randomInertia(random, mass, 0.3 * size),
          },
    tipForce,
    motion: options.motion
      ? { speed: joints.map(() => random.between(0, 2)), accel: joints.map(() => random.between(0, 10)) }
      : null,
    factor: random.next() < 0.3 ? random.between(1, 2) : 1,
  };
  return {
    name: `random arm ${seed}`,
    note: 'Invented.',
    gravity: scaled(random.direction(), 9.80665),
    joints,
    tip: { position: scaled(random.direction(), 0.3 * size), rotation: randomRotation(random) },
    cases: [load],
    bearings: {},
    duty: null,
    targets: {
      staticSafety: null,
      life: null,
      reliability: null,
      shaftYieldSafety: null,
      shaftFatigueSafety: null,
      slope: null,
      tipError: null,
      pressure: null,
      pv: null,
    },
  };
}
