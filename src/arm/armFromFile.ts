import { toSI } from '../units/unit.ts';
import type {
  Arm,
  Bearing,
  Drive,
  DutySegment,
  Inertia,
  Joint,
  Link,
  LoadCase,
  Placement,
  RollingBearing,
  Shaft,
  Support,
  Targets,
  TipForce,
  Travel,
  Vec3,
} from './arm.ts';
import type {
  ArmFile,
  BearingFile,
  CaseFile,
  DriveFile,
  InertiaFile,
  JointFile,
  PairFile,
  RollingFile,
  SegmentFile,
  ShaftFile,
  SupportFile,
} from './armFile.ts';
import { rotationFromTurn, unitVector } from './rotation.ts';

/** Name of the one case of an arm whose file gives none. */
export const OWN_WEIGHT = 'own weight';

const mm = (value: number) => toSI(value, 'mm');
const deg = (value: number) => toSI(value, 'deg');
const orNull = (value: number | undefined, unit: string) => (value === undefined ? null : toSI(value, unit));
const vectorMm = (v: Vec3): Vec3 => [mm(v[0]), mm(v[1]), mm(v[2])];

function placement(origin: Vec3, turn: Vec3 | undefined): Placement {
  return { position: vectorMm(origin), rotation: rotationFromTurn(turn ?? [0, 0, 0]) };
}

function inertia(file: InertiaFile | undefined): Inertia | null {
  if (!file) return null;
  return { xx: file.xx, yy: file.yy, zz: file.zz, xy: file.xy ?? 0, xz: file.xz ?? 0, yz: file.yz ?? 0 };
}

function link(file: JointFile): Link {
  return {
    name: file.link.name ?? file.name,
    mass: file.link.mass_kg,
    centre: vectorMm(file.link.centre_mm ?? [0, 0, 0]),
    inertia: inertia(file.link.inertia_kg_m2),
  };
}

function travel([from, to]: readonly [number, number]): Travel {
  if (to - from >= 360) return { from: deg(from), to: deg(from) + 2 * Math.PI, full: true };
  return { from: deg(from), to: deg(to), full: false };
}

function shaft(file: ShaftFile | undefined): Shaft | null {
  if (!file) return null;
  const bore = mm(file.bore_mm ?? 0);
  return {
    diameter: mm(file.diameter_mm),
    bore,
    material: file.material ?? null,
    turnsWith: file.turns_with ?? 'link',
    finish: file.finish ?? 'machined',
    sections: (file.sections ?? []).map((section) => ({
      from: mm(section.from_mm),
      to: mm(section.to_mm),
      diameter: mm(section.diameter_mm),
      bore: section.bore_mm === undefined ? bore : mm(section.bore_mm),
      bendingFactor: section.bending_factor ?? 1,
      torsionFactor: section.torsion_factor ?? 1,
      notchRadius: orNull(section.notch_radius_mm, 'mm'),
    })),
  };
}

/**
 * Stations of bearings A and B along the joint axis from the joint origin, mm, as the contract has them: a clevis holds the hub between them, a
 * cantilever has A near the hub and B far from it, both on `side`.
 */
function pairStations(file: PairFile): {
  readonly A: number;
  readonly B: number;
} {
  if (file.arrangement === 'clevis') {
    const middle = file.hub_mm + (file.offset_mm ?? 0);
    return { A: middle - file.span_mm / 2, B: middle + file.span_mm / 2 };
  }
  const way = file.side === '+' ? 1 : -1;
  return { A: file.hub_mm + way * file.overhang_mm, B: file.hub_mm + way * (file.overhang_mm + file.span_mm) };
}

function support(file: SupportFile | undefined): Support | null {
  if (!file) return null;
  if (file.arrangement === 'ring') {
    return {
      arrangement: 'ring',
      hub: mm(file.hub_mm),
      station: mm(file.station_mm ?? file.hub_mm),
      bearing: file.bearing ?? null,
      shaft: shaft(file.shaft),
    };
  }
  const stations = pairStations(file);
  const clevis = file.arrangement === 'clevis';
  return {
    arrangement: file.arrangement,
    hub: mm(file.hub_mm),
    span: mm(file.span_mm),
    offset: clevis ? mm(file.offset_mm ?? 0) : 0,
    overhang: clevis ? 0 : mm(file.overhang_mm),
    side: clevis ? '-' : file.side,
    stationA: mm(stations.A),
    stationB: mm(stations.B),
    thrust: file.thrust,
    adjusted: file.adjusted ?? null,
    bearingA: file.bearings?.A ?? null,
    bearingB: file.bearings?.B ?? null,
    shaft: shaft(file.shaft),
  };
}

function drive(file: DriveFile | undefined): Drive | null {
  if (!file) return null;
  const common = { station: mm(file.station_mm), radius: mm(file.radius_mm) };
  if (file.kind === 'gear') {
    return { kind: 'gear', ...common, pressureAngle: deg(file.pressure_angle_deg), mesh: deg(file.mesh_deg) };
  }
  return {
    kind: 'belt',
    ...common,
    pull: deg(file.pull_deg),
    pretension: file.pretension_N,
    tensionRatio: file.tension_ratio ?? 1,
  };
}

function joint(file: JointFile): Joint {
  const common = { name: file.name, placement: placement(file.origin_mm, file.turn_deg), link: link(file) };
  if (file.kind === 'fixed') {
    return {
      ...common,
      kind: 'fixed',
      axis: [0, 0, 1],
      travel: { from: 0, to: 0, full: false },
      support: null,
      drive: null,
    };
  }
  return {
    ...common,
    kind: 'revolute',
    axis: unitVector(file.axis)!,
    travel: travel(file.travel_deg),
    support: support(file.support),
    drive: drive(file.drive),
  };
}

function tipForce(file: NonNullable<CaseFile['tip_force']>): TipForce {
  const magnitude = file.force_N;
  if (file.direction === 'any') return { magnitude, direction: 'any' };
  if ('base' in file.direction) return { magnitude, direction: 'base', unit: unitVector(file.direction.base)! };
  return { magnitude, direction: 'tool', unit: unitVector(file.direction.tool)! };
}

function loadCase(file: CaseFile): LoadCase {
  return {
    name: file.name,
    payload: file.payload
      ? {
          mass: file.payload.mass_kg,
          centre: vectorMm(file.payload.centre_mm),
          inertia: inertia(file.payload.inertia_kg_m2),
        }
      : null,
    tipForce: file.tip_force ? tipForce(file.tip_force) : null,
    motion: file.motion ? { speed: file.motion.speed_deg_s.map(deg), accel: file.motion.accel_deg_s2.map(deg) } : null,
    factor: file.factor ?? 1,
  };
}

function rollingClearance(file: RollingFile): RollingBearing['clearance'] {
  if (file.clearance_um) return { from: toSI(file.clearance_um[0], 'µm'), to: toSI(file.clearance_um[1], 'µm') };
  return file.clearance ?? 'CN';
}

function bearing(file: BearingFile): Bearing {
  const common = {
    bore: mm(file.bore_mm),
    outer: mm(file.outer_mm),
    width: mm(file.width_mm),
    stiffness: orNull(file.stiffness_N_um, 'N/µm'),
    source: file.source ?? null,
  };
  if (file.kind === 'plain-bushing') {
    return {
      kind: 'plain-bushing',
      ...common,
      pressureLimit: orNull(file.pressure_limit_MPa, 'MPa'),
      speedLimit: file.speed_limit_m_s ?? null,
      pvLimit: orNull(file.pv_limit_MPa_m_s, 'MPa·m/s'),
      flangeOuter: orNull(file.flange_outer_mm, 'mm'),
      wearFactor: orNull(file.wear_factor_mm3_N_m, 'mm³/N/m'),
      wearDepth: orNull(file.wear_depth_mm, 'mm'),
      clearance: orNull(file.clearance_um, 'µm'),
    };
  }
  return {
    kind: file.kind,
    ...common,
    C: file.C_N ?? null,
    C0: file.C0_N ?? null,
    contactAngle: orNull(file.contact_angle_deg, 'deg'),
    e: file.e ?? null,
    Y: file.Y ?? null,
    Y0: file.Y0 ?? null,
    f0: file.f0 ?? null,
    pitchDiameter: orNull(file.pitch_diameter_mm, 'mm'),
    ballDiameter: orNull(file.ball_diameter_mm, 'mm'),
    balls: file.balls ?? null,
    rows: file.rows ?? (file.kind === 'self-aligning-ball' ? 2 : 1),
    clearance: rollingClearance(file),
    shaftFit: file.shaft_fit ?? null,
    housingFit: file.housing_fit ?? null,
    misalignment: orNull(file.misalignment_deg, 'deg'),
  };
}

function segment(file: SegmentFile): DutySegment {
  const common = { case: file.case, share: file.share };
  if (file.path) {
    const pose = file.path.map((row) => row.pose_deg.map(deg));
    return { ...common, motion: { kind: 'path', time: file.path.map((row) => row.time_s), pose } };
  }
  return { ...common, motion: { kind: 'anywhere', cyclesPerMinute: [...(file.anywhere?.cycles_per_min ?? [])] } };
}

function targets(file: ArmFile['targets']): Targets {
  return {
    staticSafety: file?.static_safety ?? null,
    life: orNull(file?.life_h, 'h'),
    reliability: file?.reliability ?? null,
    shaftYieldSafety: file?.shaft_yield_safety ?? null,
    shaftFatigueSafety: file?.shaft_fatigue_safety ?? null,
    slope: orNull(file?.slope_mrad, 'mrad'),
    tipError: orNull(file?.tip_error_mm, 'mm'),
    pressure: orNull(file?.pressure_MPa, 'MPa'),
    pv: orNull(file?.pv_MPa_m_s, 'MPa·m/s'),
  };
}

/** The SI arm of a file that `readArm` found sound. On a file with issues the result means nothing. */
export function armFromFile(file: ArmFile): Arm {
  const cases = file.cases ?? [];
  return {
    name: file.name,
    note: file.note ?? null,
    gravity: [...file.gravity_m_s2],
    joints: file.joints.map(joint),
    tip: placement(file.tip.origin_mm, file.tip.turn_deg),
    cases: (cases.length > 0 ? cases : [{ name: OWN_WEIGHT }]).map(loadCase),
    bearings: Object.fromEntries(Object.entries(file.bearings ?? {}).map(([name, entry]) => [name, bearing(entry)])),
    duty: file.duty ? file.duty.map(segment) : null,
    targets: targets(file.targets),
  };
}
