/**
 * A stepped shaft on any number of supports, each rigid, elastic, or resisting tilt. Signs as in `beam.ts`.
 *
 * Method of initial parameters (Krylov; Pestel & Leckie, Matrix Methods in Elastomechanics, 1963, from memory): on a part
 * of constant EI the bent line is an exact cubic, so a state (deflection, section rotation, moment, shear) marches
 * from node to node without error of discretisation. Unknown are the two of them at the left end and the reactions; the
 * equations are equilibrium and, at every support, `deflection + reaction · compliance = 0`. Written with the compliance 1/k, a rigid
 * support is an ordinary value (0), and short parts do no harm, unlike in a stiffness matrix. Shear deflection
 * (Timoshenko) is one further term, `v' = θ - V/GA`. Small slopes, linear supports.
 */
import type { BeamLoad, BeamState, Refused, ShaftLoad } from './beam.ts';
import { planeLoads } from './beam.ts';
import { factorise, substitute } from './beamFactors.ts';

/** A length of constant section. Stations m; EI N·m² (> 0); GA the shear stiffness κGA, N (> 0; Infinity: no shear deflection). */
export interface BeamPart {
  readonly from: number;
  readonly to: number;
  readonly EI: number;
  readonly GA: number;
}

/** Stiffness N/m against deflection (> 0; Infinity: rigid), tiltStiffness N·m/rad (0: free to tilt; Infinity: clamped). */
export interface BeamSupport {
  readonly station: number;
  readonly stiffness: number;
  readonly tiltStiffness: number;
}

/** A prepared beam: its supports are solved once, then any number of load sets. */
export interface SteppedBeam {
  /** Ends of all parts, supports and the stations asked for, rising, m. */
  readonly nodes: Float64Array;
  /** Per element (between nodes i and i+1). */
  readonly EI: Float64Array;
  readonly GA: Float64Array;
  readonly supports: readonly BeamSupport[];
  readonly supportNodes: readonly number[];
  /** Unknowns: deflection and rotation at the left end, then per support its force and, where it resists tilt, its couple. */
  readonly reactions: readonly { readonly node: number; readonly couple: boolean; readonly compliance: number }[];
  /** Factors (LU, row by row) and row order of the equations of the unknowns. */
  readonly factors: Float64Array;
  readonly order: Int32Array;
}

/** Reactions on the shaft (N, N·m) in the order of the supports, and the state at every node. */
export interface BeamSolution {
  readonly beam: SteppedBeam;
  readonly reactions: readonly { readonly force: number; readonly couple: number }[];
  /** Per node: deflection m, section rotation rad, and shear N and moment N·m just before and just after it. */
  readonly deflection: Float64Array;
  readonly slope: Float64Array;
  readonly shearBefore: Float64Array;
  readonly shearAfter: Float64Array;
  readonly momentBefore: Float64Array;
  readonly momentAfter: Float64Array;
}

/** Nodes nearer than this share of the beam's length are one node. */
const SAME_NODE = 1e-12;
const positive = (value: number): boolean => value > 0;

function findNode(nodes: Float64Array, station: number): number {
  const tolerance = SAME_NODE * (nodes[nodes.length - 1]! - nodes[0]!);
  for (let i = 0; i < nodes.length; i++) if (Math.abs(nodes[i]! - station) <= tolerance) return i;
  return -1;
}

/**
 * Checks the shaft and factors its supports. `parts` must join end to end; `stations` are where loads will stand (or answers
 * are wanted as nodes). Refuses gaps, wrong numbers, coincident supports and a shaft that is not held.
 */
export function prepareBeam(
  parts: readonly BeamPart[],
  supports: readonly BeamSupport[],
  stations: readonly number[],
): SteppedBeam | Refused {
  const sorted = [...parts].sort((a, b) => a.from - b.from);
  const first = sorted[0];
  const last = sorted[sorted.length - 1];
  if (!first || !last) return { unassessed: 'the shaft has no length' };
  for (const part of sorted) {
    if (!(Number.isFinite(part.from) && Number.isFinite(part.to) && part.to > part.from)) {
      return { unassessed: 'a part of the shaft has no length' };
    }
    if (!(positive(part.EI) && Number.isFinite(part.EI) && positive(part.GA))) {
      return { unassessed: 'the stiffness of a part of the shaft is not a positive number' };
    }
  }
  const length = last.to - first.from;
  const tolerance = SAME_NODE * length;
  for (let i = 1; i < sorted.length; i++) {
    if (Math.abs(sorted[i]!.from - sorted[i - 1]!.to) > tolerance) {
      return { unassessed: 'the parts of the shaft do not join end to end' };
    }
  }
  for (const support of supports) {
    if (!(positive(support.stiffness) && support.tiltStiffness >= 0)) {
      return { unassessed: 'a support stiffness must be positive' };
    }
  }
  const wanted = [...supports.map((support) => support.station), ...stations];
  if (!wanted.every((station) => station >= first.from - tolerance && station <= last.to + tolerance)) {
    return { unassessed: 'a support or a load stands off the shaft' };
  }
  const all = [...sorted.flatMap((part) => [part.from, part.to]), ...wanted].sort((a, b) => a - b);
  const nodes = Float64Array.from(all.filter((station, i) => i === 0 || station - all[i - 1]! > tolerance));
  const EI = new Float64Array(nodes.length - 1);
  const GA = new Float64Array(nodes.length - 1);
  for (let i = 0; i < EI.length; i++) {
    const middle = (nodes[i]! + nodes[i + 1]!) / 2;
    const part = sorted.find((candidate) => middle < candidate.to) ?? last;
    EI[i] = part.EI;
    GA[i] = part.GA;
  }
  const supportNodes = supports.map((support) => findNode(nodes, support.station));
  if (new Set(supportNodes).size < supportNodes.length) return { unassessed: 'two supports stand at the same station' };
  const reactions = supports.flatMap((support, i) => {
    const force = { node: supportNodes[i]!, couple: false, compliance: 1 / support.stiffness };
    if (support.tiltStiffness === 0) return [force];
    return [force, { node: supportNodes[i]!, couple: true, compliance: 1 / support.tiltStiffness }];
  });
  const unsolved = { nodes, EI, GA, supports, supportNodes, reactions };
  const size = reactions.length + 2;
  const factors = equations(unsolved);
  const order = new Int32Array(size);
  if (!factorise(factors, order, size)) return { unassessed: 'the supports do not hold the shaft' };
  return { ...unsolved, factors, order };
}

type Unsolved = Omit<SteppedBeam, 'factors' | 'order'>;

/** Scales that make the equations pure numbers: the length of the shaft and its greatest EI. */
function scales(beam: Unsolved): { length: number; EI: number } {
  return { length: beam.nodes[beam.nodes.length - 1]! - beam.nodes[0]!, EI: Math.max(...beam.EI) };
}

/**
 * Rows: equilibrium of forces, of moments about the right end, then one row a reaction (deflection or rotation
 * at its node plus compliance times reaction). Columns: left deflection, left rotation, reactions. Scaled: lengths by the shaft's length L, forces
 * by EI/L², couples by EI/L.
 */
function equations(beam: Unsolved): Float64Array {
  const { length, EI } = scales(beam);
  const { nodes, reactions } = beam;
  const size = reactions.length + 2;
  const matrix = new Float64Array(size * size);
  const right = nodes[nodes.length - 1]!;
  const forces = new Float64Array(nodes.length);
  const couples = new Float64Array(nodes.length);
  const state = scratchState(nodes.length);
  reactions.forEach((row, r) => {
    matrix[(r + 2) * size] = row.couple ? 0 : 1;
    matrix[(r + 2) * size + 1] = row.couple ? 1 : (nodes[row.node]! - nodes[0]!) / length;
  });
  reactions.forEach((column, c) => {
    (column.couple ? couples : forces)[column.node] = column.couple ? EI / length : EI / length ** 2;
    march(beam, forces, couples, 0, 0, state);
    matrix[c + 2] = column.couple ? 0 : 1;
    matrix[size + c + 2] = column.couple ? -1 : (right - nodes[column.node]!) / length;
    reactions.forEach((row, r) => {
      matrix[(r + 2) * size + c + 2] = row.couple ? state.slope[row.node]! : state.deflection[row.node]! / length;
    });
    matrix[(c + 2) * size + c + 2]! += column.compliance * (column.couple ? EI / length : EI / length ** 3);
    forces[column.node] = 0;
    couples[column.node] = 0;
  });
  return matrix;
}

type NodeStates = Pick<
  BeamSolution,
  'deflection' | 'slope' | 'shearBefore' | 'shearAfter' | 'momentBefore' | 'momentAfter'
>;

function scratchState(count: number): NodeStates {
  const of = () => new Float64Array(count);
  return {
    deflection: of(),
    slope: of(),
    shearBefore: of(),
    shearAfter: of(),
    momentBefore: of(),
    momentAfter: of(),
  };
}

/** Carries deflection, rotation, moment and shear from the left end to the right, past the forces and couples at the nodes. */
function march(
  beam: Unsolved,
  forces: Float64Array,
  couples: Float64Array,
  deflectionLeft: number,
  slopeLeft: number,
  out: NodeStates,
): void {
  let v = deflectionLeft;
  let theta = slopeLeft;
  let shear = 0;
  let moment = 0;
  const count = beam.nodes.length;
  for (let i = 0; i < count; i++) {
    out.deflection[i] = v;
    out.slope[i] = theta;
    out.shearBefore[i] = shear;
    out.momentBefore[i] = moment;
    shear += forces[i]!;
    moment -= couples[i]!;
    out.shearAfter[i] = shear;
    out.momentAfter[i] = moment;
    if (i === count - 1) break;
    const h = beam.nodes[i + 1]! - beam.nodes[i]!;
    v += theta * h + ((moment / 2 + (shear * h) / 6) * h * h) / beam.EI[i]! - (shear * h) / beam.GA[i]!;
    theta += ((moment + (shear * h) / 2) * h) / beam.EI[i]!;
    moment += shear * h;
  }
}

/** One plane: reactions and node states under the loads. Load stations must be nodes (named to `prepareBeam`). */
export function solveBeam(beam: SteppedBeam, loads: readonly BeamLoad[]): BeamSolution | Refused {
  const { nodes, reactions } = beam;
  const forces = new Float64Array(nodes.length);
  const couples = new Float64Array(nodes.length);
  for (const load of loads) {
    if (!Number.isFinite(load.force + load.couple)) return { unassessed: 'a load on the shaft is not a number' };
    const node = findNode(nodes, load.station);
    if (node < 0) return { unassessed: 'a load stands where the beam has no node' };
    forces[node]! += load.force;
    couples[node]! += load.couple;
  }
  const { length, EI } = scales(beam);
  const state = scratchState(nodes.length);
  march(beam, forces, couples, 0, 0, state);
  const right = new Float64Array(reactions.length + 2);
  const end = nodes.length - 1;
  right[0] = (-state.shearAfter[end]! * length ** 2) / EI;
  right[1] = (-state.momentAfter[end]! * length) / EI;
  reactions.forEach((row, r) => {
    right[r + 2] = row.couple ? -state.slope[row.node]! : -state.deflection[row.node]! / length;
  });
  const x = substitute(beam.factors, beam.order, right);
  const result = beam.supports.map(() => ({ force: 0, couple: 0 }));
  reactions.forEach((reaction, r) => {
    const value = x[r + 2]! * (reaction.couple ? EI / length : EI / length ** 2);
    (reaction.couple ? couples : forces)[reaction.node]! += value;
    const at = result[beam.supportNodes.indexOf(reaction.node)]!;
    if (reaction.couple) at.couple = value;
    else at.force = value;
  });
  march(beam, forces, couples, x[0]! * length, x[1]!, state);
  return { beam, reactions: result, ...state };
}

/** The state at any station of the shaft, m; NaN off the shaft. At a node the sides are told apart, elsewhere they agree. */
export function beamStateAt(solution: BeamSolution, station: number): BeamState {
  const { beam } = solution;
  const node = findNode(beam.nodes, station);
  if (node >= 0) {
    return {
      deflection: solution.deflection[node]!,
      slope: solution.slope[node]!,
      shearBefore: solution.shearBefore[node]!,
      shearAfter: solution.shearAfter[node]!,
      momentBefore: solution.momentBefore[node]!,
      momentAfter: solution.momentAfter[node]!,
    };
  }
  let i = -1;
  while (i + 1 < beam.nodes.length && beam.nodes[i + 1]! < station) i++;
  const inside = i >= 0 && i < beam.EI.length;
  const s = inside ? station - beam.nodes[i]! : Number.NaN;
  const at = Math.max(0, i);
  const M = solution.momentAfter[at]!;
  const V = solution.shearAfter[at]!;
  const EI = beam.EI[at] ?? Number.NaN;
  const GA = beam.GA[at] ?? Number.NaN;
  const theta = solution.slope[at]!;
  const moment = M + V * s;
  const shear = inside ? V : Number.NaN;
  return {
    deflection: solution.deflection[at]! + theta * s + ((M / 2 + (V * s) / 6) * s * s) / EI - (V * s) / GA,
    slope: theta + ((M + (V * s) / 2) * s) / EI,
    shearBefore: shear,
    shearAfter: shear,
    momentBefore: moment,
    momentAfter: moment,
  };
}

/** Both planes of a spatial load; supports alike in both. */
export interface ShaftSolution {
  readonly x: BeamSolution;
  readonly y: BeamSolution;
}

export function solveShaft(beam: SteppedBeam, loads: readonly ShaftLoad[]): ShaftSolution | Refused {
  const x = solveBeam(beam, planeLoads(loads, 'x'));
  if ('unassessed' in x) return x;
  const y = solveBeam(beam, planeLoads(loads, 'y'));
  return 'unassessed' in y ? y : { x, y };
}

/** The state at one station under a unit force (1 N) and a unit couple (1 N·m) at another. */
export interface Influence {
  readonly perForce: BeamState;
  readonly perCouple: BeamState;
}

/**
 * Influence of loads at node `from` on station `at`. Everything a beam does is linear in its loads, so a check of it is
 * a norm of linear forms of the joint load and needs no beam solved per pose (`beamForms.ts`).
 */
export function beamInfluence(beam: SteppedBeam, from: number, at: number): Influence | Refused {
  const byForce = solveBeam(beam, [{ station: from, force: 1, couple: 0 }]);
  if ('unassessed' in byForce) return byForce;
  const byCouple = solveBeam(beam, [{ station: from, force: 0, couple: 1 }]);
  if ('unassessed' in byCouple) return byCouple;
  return { perForce: beamStateAt(byForce, at), perCouple: beamStateAt(byCouple, at) };
}
