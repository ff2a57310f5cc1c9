/**
 * A straight shaft as a beam on two supports, in one plane: closed form for a uniform section.
 *
 * Frame and signs (the whole beam family): stations x run along the shaft, y is perpendicular to it. Forces and
 * deflections are positive along +y, couples and slopes anticlockwise (from x towards y). Loads act ON the shaft; a
 * reaction is what a support does TO the shaft, so the load on the bearing is its opposite. Shear `V` at x is the sum of the
 * forces along +y left of x; the bending moment `M` is its integral less the couples passed (`dM/dx = V`), positive where
 * it bends the shaft hollow towards +y (`EI y'' = M`).
 *
 * The housing frame of a joint has z along the shaft. Two planes carry a spatial load: plane (z, x) with force Fx
 * and couple +My, plane (z, y) with force Fy and couple -Mx, because z × x = y but z × y = -x. See `planeLoads`.
 */

/** One point load in one plane: station m, force N, couple N·m. */
export interface BeamLoad {
  readonly station: number;
  readonly force: number;
  readonly couple: number;
}

/** One point load on the shaft in the housing frame (z along the shaft): force N and moment N·m about its own station. */
export interface ShaftLoad {
  readonly station: number;
  readonly fx: number;
  readonly fy: number;
  readonly mx: number;
  readonly my: number;
}

/** What a beam does at one station. Before and after differ where a load or a support stands. SI: m, rad, N, N·m. */
export interface BeamState {
  readonly deflection: number;
  /** Rotation of the cross-section, rad: with shear taken into account it differs from the slope of the bent line by V/GA. */
  readonly slope: number;
  readonly shearBefore: number;
  readonly shearAfter: number;
  readonly momentBefore: number;
  readonly momentAfter: number;
}

/** Why a beam has no answer. */
export interface Refused {
  readonly unassessed: string;
}

export type Plane = 'x' | 'y';

/** The part of spatial shaft loads that acts in one plane; the signs stand in the head of this file. */
export function planeLoads(loads: readonly ShaftLoad[], plane: Plane): BeamLoad[] {
  return loads.map((load) =>
    plane === 'x'
      ? { station: load.station, force: load.fx, couple: load.my }
      : { station: load.station, force: load.fy, couple: -load.mx },
  );
}

/** A uniform shaft on two supports A and B. Loads may stand anywhere: between, at, or beyond either support. */
export interface UniformBeam {
  readonly stationA: number;
  readonly stationB: number;
  /** N·m², > 0. */
  readonly EI: number;
  /** Stiffness of the supports, N/m, > 0; Infinity is rigid. */
  readonly stiffnessA: number;
  readonly stiffnessB: number;
}

/** Reactions (on the shaft, N) and the two constants of integration, ready for `uniformBeamAt`. */
export interface UniformSolution {
  readonly beam: UniformBeam;
  readonly reactionA: number;
  readonly reactionB: number;
  /** Loads and reactions together, as stations with force and couple. */
  readonly actions: readonly BeamLoad[];
  /** EI times slope and deflection at A before the particular integral: N·m², N·m³. */
  readonly slopeTerm: number;
  readonly deflectionTerm: number;
}

const finite = (...values: number[]): boolean => values.every(Number.isFinite);

/**
 * Reactions by equilibrium; slope and deflection by integrating EI y'' = M twice with Macaulay brackets
 * (Hibbeler, Mechanics of Materials, ch. 12; the common cases are those of Shigley Table A-9). Elastic supports give way by
 * R/k; the pair is statically determinate, so they do not change the reactions. Small slopes, no shear deflection.
 */
export function solveUniformBeam(beam: UniformBeam, loads: readonly BeamLoad[]): UniformSolution | Refused {
  const { stationA, stationB, EI, stiffnessA, stiffnessB } = beam;
  const span = stationB - stationA;
  if (!finite(stationA, stationB)) return { unassessed: 'a support station is not a number' };
  if (span === 0) return { unassessed: 'the span between the supports is zero' };
  if (!(finite(EI) && EI > 0)) return { unassessed: 'the bending stiffness EI must be a positive number' };
  if (!(stiffnessA > 0 && stiffnessB > 0)) return { unassessed: 'a support stiffness must be positive' };
  if (!loads.every((load) => finite(load.station, load.force, load.couple))) {
    return { unassessed: 'a load on the shaft is not a number' };
  }
  let force = 0;
  let momentAboutA = 0;
  for (const load of loads) {
    force += load.force;
    momentAboutA += load.force * (load.station - stationA) + load.couple;
  }
  const reactionB = -momentAboutA / span;
  const reactionA = -force - reactionB;
  const actions = [
    ...loads,
    { station: stationA, force: reactionA, couple: 0 },
    { station: stationB, force: reactionB, couple: 0 },
  ];
  const givesA = (-EI * reactionA) / stiffnessA;
  const givesB = (-EI * reactionB) / stiffnessB;
  const atA = givesA - particular(actions, stationA).deflection;
  const atB = givesB - particular(actions, stationB).deflection;
  return { beam, reactionA, reactionB, actions, slopeTerm: (atB - atA) / span, deflectionTerm: atA };
}

/** The Macaulay sums at x: shear, moment, and EI times slope and deflection of the particular integral. */
function particular(actions: readonly BeamLoad[], x: number) {
  let slope = 0;
  let deflection = 0;
  let shearBefore = 0;
  let shearAfter = 0;
  let momentBefore = 0;
  let momentAfter = 0;
  for (const { station, force, couple } of actions) {
    const s = x - station;
    if (s < 0) continue;
    slope += (force * s * s) / 2 - couple * s;
    deflection += (force * s * s * s) / 6 - (couple * s * s) / 2;
    shearAfter += force;
    momentAfter += force * s - couple;
    if (s > 0) {
      shearBefore += force;
      momentBefore += force * s - couple;
    }
  }
  return { slope, deflection, shearBefore, shearAfter, momentBefore, momentAfter };
}

/** Shear, moment, slope and deflection at any station x (m), also beyond the last load, where the shaft stays straight. */
export function uniformBeamAt(solution: UniformSolution, x: number): BeamState {
  const { beam, actions, slopeTerm, deflectionTerm } = solution;
  const sums = particular(actions, x);
  return {
    ...sums,
    slope: (sums.slope + slopeTerm) / beam.EI,
    deflection: (sums.deflection + slopeTerm * (x - beam.stationA) + deflectionTerm) / beam.EI,
  };
}
