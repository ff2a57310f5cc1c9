/**
 * Two radial supports A and B on one shaft, and what a gear or belt adds: joint load in, bearing loads out, as vectors and as
 * check forms. Loads are those ON the bearings, canonical housing frame. Statics of a beam on two supports:
 *
 *     A = ( zB f_r + z × m_r ) / (zB - zA)        B = ( -zA f_r - z × m_r ) / (zB - zA)
 *
 * with z stations along the axis from the joint origin; a radial force d at station s adds (zB-s)/(zB-zA) d to A, the rest to B.
 */
import type { Drive, PairSupport } from '../arm/arm.ts';
import type { Numbers } from '../math/vector.ts';
import { WRENCH } from './chain.ts';
import { type CheckForm, type Form, form, formHolds } from './form.ts';

/** Radial force of a drive as a function of the torque w[5]: (k · torque + c) in x and y, valid from `from` to `to` N·m. */
export interface DriveBranch {
  readonly from: number;
  readonly to: number;
  readonly k: readonly [number, number];
  readonly c: readonly [number, number];
}

const ALWAYS: readonly DriveBranch[] = [
  { from: Number.NEGATIVE_INFINITY, to: Number.POSITIVE_INFINITY, k: [0, 0], c: [0, 0] },
];

/**
 * Force of the drive ON the shaft. The mesh or belt holds the joint load's torque T about the axis. Gear: tangential T/radius
 * against T, separating |T|/radius·tan(pressure angle) away from the mesh (involute spur gear, no friction). Belt: the pull of
 * both strands, the larger of the pretension and tensionRatio·|T|/radius, along `pull`. The pretension is a setting of the
 * joint, not a load of the case: the case's factor multiplies T and leaves it as it is.
 */
export function driveBranches(drive: Drive | null): readonly DriveBranch[] {
  if (!drive) return ALWAYS;
  if (drive.kind === 'gear') {
    const ex = Math.cos(drive.mesh);
    const ey = Math.sin(drive.mesh);
    const separating = Math.tan(drive.pressureAngle);
    const side = (sign: -1 | 1): readonly [number, number] => [
      (ey - sign * separating * ex) / drive.radius,
      (-ex - sign * separating * ey) / drive.radius,
    ];
    return [
      { from: Number.NEGATIVE_INFINITY, to: 0, k: side(-1), c: [0, 0] },
      { from: 0, to: Number.POSITIVE_INFINITY, k: side(1), c: [0, 0] },
    ];
  }
  const ux = Math.cos(drive.pull);
  const uy = Math.sin(drive.pull);
  const slope = drive.tensionRatio / drive.radius;
  const knee = drive.pretension / slope;
  const rising = { k: [slope * ux, slope * uy] as const, c: [0, 0] as const };
  const falling = { k: [-slope * ux, -slope * uy] as const, c: [0, 0] as const };
  const branches: DriveBranch[] = [
    { from: Number.NEGATIVE_INFINITY, to: -knee, ...falling },
    { from: knee, to: Number.POSITIVE_INFINITY, ...rising },
  ];
  if (knee > 0) branches.push({ from: -knee, to: knee, k: [0, 0], c: [drive.pretension * ux, drive.pretension * uy] });
  return branches;
}

/** What the forms of a pair need; stations in m. */
export interface PairGeometry {
  readonly stationA: number;
  readonly stationB: number;
  readonly drive: Drive | null;
}

/** Rows (x, y) of the linear map from the joint load to the radial load on A or B, with a drive force branch folded in. */
function radialForm(pair: PairGeometry, which: 'A' | 'B', branch: DriveBranch): Form {
  const { stationA, stationB, drive } = pair;
  const span = stationB - stationA;
  const force = which === 'A' ? stationB / span : -stationA / span;
  const couple = which === 'A' ? 1 / span : -1 / span;
  const share = drive ? (which === 'A' ? stationB - drive.station : drive.station - stationA) / span : 0;
  return form({
    P: [
      [force, 0, 0, 0, -couple, share * branch.k[0]],
      [0, force, 0, couple, 0, share * branch.k[1]],
    ],
    c: [share * branch.c[0], share * branch.c[1]],
    torque: [branch.from, branch.to],
  });
}

/** Forms of the radial load on one bearing, one for each branch of the drive. */
export function radialForms(pair: PairGeometry, which: 'A' | 'B'): readonly Form[] {
  return driveBranches(pair.drive).map((branch) => radialForm(pair, which, branch));
}

const ROW = {
  thrust: [0, 0, 1, 0, 0, 0],
  torque: [0, 0, 0, 0, 0, 1],
  none: [0, 0, 0, 0, 0, 0],
} as const;
/** Value 0 at any load: beside a linear form it makes "never less than nothing". */
const NOTHING = form({ P: [ROW.none] });

function oneWay(row: readonly number[], sign: 1 | -1): readonly Form[] {
  return [form({ P: [ROW.none], l: row.map((v) => sign * v) }), NOTHING];
}

/** Axial load (magnitude) on one bearing of a pair: nothing on a floating bearing; `both`: A takes +axis, B -axis. */
export function axialForms(thrust: PairSupport['thrust'], which: 'A' | 'B'): readonly Form[] {
  if (thrust === 'both') return oneWay(ROW.thrust, which === 'A' ? 1 : -1);
  return thrust === which ? [form({ P: [ROW.thrust] })] : [NOTHING];
}

/** Tilting moment about the point of the axis at `station`, N·m. */
export function momentForms(station = 0): readonly Form[] {
  return [
    form({
      P: [
        [0, station, 0, 1, 0, 0],
        [-station, 0, 0, 0, 1, 0],
      ],
    }),
  ];
}

/** Checks that need no support: tilting moment about the joint origin, torque and thrust by size and each way. */
export function jointChecks(joint: number): readonly CheckForm[] {
  const make = (check: string, unit: string, forms: readonly Form[]): CheckForm => ({
    check,
    joint,
    bearing: null,
    unit,
    forms,
  });
  return [
    make('moment', 'N·m', momentForms()),
    make('torque', 'N·m', [form({ P: [ROW.torque] })]),
    make('torque+', 'N·m', oneWay(ROW.torque, 1)),
    make('torque-', 'N·m', oneWay(ROW.torque, -1)),
    make('thrust+', 'N', oneWay(ROW.thrust, 1)),
    make('thrust-', 'N', oneWay(ROW.thrust, -1)),
  ];
}

/** Radial and axial checks of both bearings of a pair. */
export function pairChecks(joint: number, pair: PairGeometry, thrust: PairSupport['thrust']): readonly CheckForm[] {
  return (['A', 'B'] as const).flatMap((bearing) => [
    { check: 'radial', joint, bearing, unit: 'N', forms: radialForms(pair, bearing) },
    { check: 'axial', joint, bearing, unit: 'N', forms: axialForms(thrust, bearing) },
  ]);
}

/** Radial, axial and tilting-moment checks of one ring bearing at `station`; a drive force acts at its own station. */
export function ringChecks(joint: number, station: number, drive: Drive | null): readonly CheckForm[] {
  const branches = driveBranches(drive);
  const lever = drive ? drive.station - station : 0;
  const radial = branches.map((b) =>
    form({
      P: [
        [1, 0, 0, 0, 0, b.k[0]],
        [0, 1, 0, 0, 0, b.k[1]],
      ],
      c: b.c,
      torque: [b.from, b.to],
    }),
  );
  // z × d = (-dy, dx) at the drive's lever from the ring
  const moment = branches.map((b) =>
    form({
      P: [
        [0, station, 0, 1, 0, -lever * b.k[1]],
        [-station, 0, 0, 0, 1, lever * b.k[0]],
      ],
      c: [-lever * b.c[1], lever * b.c[0]],
      torque: [b.from, b.to],
    }),
  );
  const axial = [form({ P: [ROW.thrust] })];
  const make = (check: string, u: string, forms: readonly Form[]): CheckForm => ({
    check,
    joint,
    bearing: 'ring',
    unit: u,
    forms,
  });
  return [make('radial', 'N', radial), make('axial', 'N', axial), make('moment', 'N·m', moment)];
}

/** Signed axial load on A and B, N: positive along the joint axis. */
export function axialLoads(thrust: PairSupport['thrust'], fz: number): readonly [number, number] {
  if (thrust === 'A') return [fz, 0];
  if (thrust === 'B') return [0, fz];
  return fz >= 0 ? [fz, 0] : [0, fz];
}

/** Radial load vector of a form (its P w + c) at the wrench w[at..], for forms of two rows. */
export function radialVector(forms: readonly Form[], w: Numbers, at: number): readonly [number, number] {
  for (const f of forms) {
    if (!formHolds(f, w, at)) continue;
    let x = f.c[0]!;
    let y = f.c[1]!;
    for (let k = 0; k < WRENCH; k++) {
      x += f.P[k]! * w[at + k]!;
      y += f.P[WRENCH + k]! * w[at + k]!;
    }
    return [x, y];
  }
  return [Number.NaN, Number.NaN];
}
