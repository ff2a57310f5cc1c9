/**
 * The arm as the engine sees it: SI units, radians, plain read-only data (it travels to workers by structured clone).
 * `readArm` makes it from an arm file; outside this folder nobody sees millimetres or degrees of a file.
 *
 * Frames: joint i is placed in the frame of the link before it (`position`, then `rotation`); link i's frame is the
 * joint frame turned by q about `axis`. The joint frame before the turn is the housing frame (it belongs to link i-1).
 */

/** Three components in the frame named beside the field. */
export type Vec3 = readonly [number, number, number];
/** Rotation matrix, row by row: v_outer = M v_inner. */
export type Mat3 = readonly [number, number, number, number, number, number, number, number, number];

/** Where an inner frame stands in an outer one: p_outer = position + rotation · p_inner. Position in m. */
export interface Placement {
  readonly position: Vec3;
  readonly rotation: Mat3;
}

/** Inertia about the centre of mass, axes of the link frame, kg·m². Products are the matrix entries (Ixy = -∫xy dm). */
export interface Inertia {
  readonly xx: number;
  readonly yy: number;
  readonly zz: number;
  readonly xy: number;
  readonly xz: number;
  readonly yz: number;
}

export interface Link {
  readonly name: string;
  /** kg, ≥ 0. */
  readonly mass: number;
  /** Centre of mass in the link frame, m. */
  readonly centre: Vec3;
  /** Null where the file gives none (then no case may have `motion`). */
  readonly inertia: Inertia | null;
}

/** Interval of the joint angle, rad. `full`: 360° or more, every angle can be reached and `to - from` is 2π. */
export interface Travel {
  readonly from: number;
  readonly to: number;
  readonly full: boolean;
}

/** A step along the shaft, for stresses and stiffness. Stations along the joint axis from the joint origin, m. */
export interface ShaftSection {
  readonly from: number;
  readonly to: number;
  readonly diameter: number;
  readonly bore: number;
  /** Stress-concentration factors (≥ 1) at the section's outboard-most end `to`, and the notch radius, m (null: not given). */
  readonly bendingFactor: number;
  readonly torsionFactor: number;
  readonly notchRadius: number | null;
}

export interface Shaft {
  /** m. Outside diameter of a uniform shaft, and of any part that `sections` does not cover. */
  readonly diameter: number;
  /** m, 0 for a solid shaft. */
  readonly bore: number;
  /** Key of the material table of `capacity/`, or null. */
  readonly material: string | null;
  /** What the shaft turns with: it decides which ring sees a turning load and what cycle the shaft sees. */
  readonly turnsWith: 'link' | 'housing';
  readonly finish: 'ground' | 'machined' | 'hot-rolled' | 'forged';
  readonly sections: readonly ShaftSection[];
}

/** Two radial supports, A and B, on one shaft. Stations along the joint axis from the joint origin, m. */
export interface PairSupport {
  readonly arrangement: 'clevis' | 'cantilever';
  /** Mid-plane of the link's hub. */
  readonly hub: number;
  readonly span: number;
  /** Clevis: shift of the middle of the pair from the hub; 0 for a cantilever. */
  readonly offset: number;
  /** Cantilever: hub to near bearing A; 0 for a clevis. */
  readonly overhang: number;
  /** Cantilever: where the pair lies from the hub along the axis. */
  readonly side: '+' | '-';
  readonly stationA: number;
  readonly stationB: number;
  /** `A`, `B`: the locating bearing. `both`: A takes thrust along + axis, B along -. */
  readonly thrust: 'A' | 'B' | 'both';
  /** How an adjusted angular pair stands; null where the pair is not adjusted. */
  readonly adjusted: 'back-to-back' | 'face-to-face' | null;
  /** Names in `Arm.bearings`; one that the table lacks makes its checks unassessed. */
  readonly bearingA: string | null;
  readonly bearingB: string | null;
  readonly shaft: Shaft | null;
}

/** One ring bearing (crossed rollers, four-point contact) that carries force and moment by itself, centred at `station`. */
export interface RingSupport {
  readonly arrangement: 'ring';
  readonly hub: number;
  readonly station: number;
  readonly bearing: string | null;
  readonly shaft: Shaft | null;
}

export type Support = PairSupport | RingSupport;

/**
 * A gear or belt on the shaft. It carries the drive torque of the same pose and so adds a force at its station. Angles are in
 * the housing frame, about the joint axis, from `referenceX` of the housing (see `housingReference`), rad.
 */
export type Drive =
  | {
      readonly kind: 'gear';
      readonly station: number;
      readonly radius: number;
      readonly pressureAngle: number;
      /** Direction from the axis to the mesh point. */
      readonly mesh: number;
    }
  | {
      readonly kind: 'belt';
      readonly station: number;
      readonly radius: number;
      /** Direction of the belt's pull. */
      readonly pull: number;
      /** Sum of both strands at rest, N (pretension); ≥ 0. */
      readonly pretension: number;
      /** Sum of the strand tensions over the effective tension |torque|/radius; ≥ 1 (1: slack side fully slack). */
      readonly tensionRatio: number;
    };

export interface Joint {
  readonly name: string;
  readonly kind: 'revolute' | 'fixed';
  readonly placement: Placement;
  /** Unit vector in the joint frame. */
  readonly axis: Vec3;
  /** Of a fixed joint: 0 to 0. */
  readonly travel: Travel;
  readonly link: Link;
  readonly support: Support | null;
  readonly drive: Drive | null;
}

export interface Payload {
  readonly mass: number;
  /** In the tip frame, m. */
  readonly centre: Vec3;
  /** About the centre of mass, axes of the tip frame; null counts as a point mass. */
  readonly inertia: Inertia | null;
}

/** A force at the tip frame's origin, N. Base and tool directions are unit vectors. */
export type TipForce =
  | { readonly magnitude: number; readonly direction: 'any' }
  | { readonly magnitude: number; readonly direction: 'base' | 'tool'; readonly unit: Vec3 };

/** Limits of |speed| (rad/s) and |acceleration| (rad/s²), one a revolute joint in order. */
export interface Motion {
  readonly speed: readonly number[];
  readonly accel: readonly number[];
}

export interface LoadCase {
  readonly name: string;
  readonly payload: Payload | null;
  readonly tipForce: TipForce | null;
  readonly motion: Motion | null;
  /** Multiplies every load of the case; > 0. */
  readonly factor: number;
}

export type RollingKind =
  | 'deep-groove'
  | 'angular-contact'
  | 'self-aligning-ball'
  | 'cylindrical-roller'
  | 'needle'
  | 'tapered-roller'
  | 'crossed-roller'
  | 'four-point';

/** A rolling bearing. Null: not given in the file, so it is estimated (and says so) or what needs it is unassessed. */
export interface RollingBearing {
  readonly kind: RollingKind;
  readonly bore: number;
  readonly outer: number;
  readonly width: number;
  /** Basic dynamic and static ratings, N. */
  readonly C: number | null;
  readonly C0: number | null;
  /** Contact angle, rad. */
  readonly contactAngle: number | null;
  /** Maker's factors, where given. */
  readonly e: number | null;
  readonly Y: number | null;
  readonly Y0: number | null;
  readonly f0: number | null;
  /** Pitch diameter, m. */
  readonly pitchDiameter: number | null;
  readonly ballDiameter: number | null;
  readonly balls: number | null;
  readonly rows: 1 | 2;
  /** ISO 5753 group, or a measured radial internal clearance (diametral play, m). */
  readonly clearance: 'C2' | 'CN' | 'C3' | 'C4' | 'C5' | { readonly from: number; readonly to: number };
  /** ISO 286 fits on the seat of the shaft and in the housing, such as `k5` and `H7`; null: not given. */
  readonly shaftFit: string | null;
  readonly housingFit: string | null;
  /** Limiting misalignment, rad. */
  readonly misalignment: number | null;
  /** Radial stiffness, N/m. */
  readonly stiffness: number | null;
  /** Where the numbers come from, as the file says it. */
  readonly source: string | null;
}

export interface PlainBushing {
  readonly kind: 'plain-bushing';
  readonly bore: number;
  readonly outer: number;
  /** Length along the axis, m. */
  readonly width: number;
  /** Limits: Pa, m/s, Pa·m/s. */
  readonly pressureLimit: number | null;
  readonly speedLimit: number | null;
  readonly pvLimit: number | null;
  /** Outside diameter of the flange, m; null: none, so no thrust. */
  readonly flangeOuter: number | null;
  /** Volume worn per load and way, m³/(N·m), that is 1/Pa; and the depth that wears it out, m. */
  readonly wearFactor: number | null;
  readonly wearDepth: number | null;
  /** Diametral running clearance, m. */
  readonly clearance: number | null;
  readonly stiffness: number | null;
  readonly source: string | null;
}

export type Bearing = RollingBearing | PlainBushing;

/** One segment of the duty: a case for a share of the time, along a path or anywhere in travel. */
export interface DutySegment {
  readonly case: string;
  /** Share of the time, > 0; the shares of a duty sum to 1. */
  readonly share: number;
  readonly motion:
    | {
        readonly kind: 'anywhere' /** Swings a minute (there and back) over the whole travel, per revolute joint. */;
        readonly cyclesPerMinute: readonly number[];
      }
    | {
        readonly kind: 'path' /** s, rising. */;
        readonly time: readonly number[] /** rad, [time][revolute joint]. */;
        readonly pose: readonly (readonly number[])[];
      };
}

/** What the design must reach. Null: no demand in the file; `capacity/targets` then uses its default and says so. */
export interface Targets {
  readonly staticSafety: number | null;
  /** s. */
  readonly life: number | null;
  readonly reliability: number | null;
  readonly shaftYieldSafety: number | null;
  readonly shaftFatigueSafety: number | null;
  /** rad. */
  readonly slope: number | null;
  /** m. */
  readonly tipError: number | null;
  /** Pa. */
  readonly pressure: number | null;
  /** Pa·m/s. */
  readonly pv: number | null;
}

export interface Arm {
  readonly name: string;
  readonly note: string | null;
  /** m/s², base frame. */
  readonly gravity: Vec3;
  readonly joints: readonly Joint[];
  /** In the last link's frame. */
  readonly tip: Placement;
  /** At least one: `own weight` where the file gives none. */
  readonly cases: readonly LoadCase[];
  readonly bearings: Readonly<Record<string, Bearing>>;
  readonly duty: readonly DutySegment[] | null;
  readonly targets: Targets;
}
