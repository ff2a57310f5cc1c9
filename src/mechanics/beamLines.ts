/** Lines of a loaded shaft for drawing, and its largest bending moment. Signs as in `beam.ts`. */
import type { BeamState } from './beam.ts';
import type { ShaftSolution } from './beamStepped.ts';
import { beamStateAt } from './beamStepped.ts';

/** Columns of equal length; every break stands twice, before and after its jump. SI: m, N, N·m, rad, m. */
export interface BeamLines {
  readonly station: readonly number[];
  readonly shear: readonly number[];
  readonly moment: readonly number[];
  readonly slope: readonly number[];
  readonly deflection: readonly number[];
}

/**
 * Samples one plane. `breaks` (rising) are the stations of loads, supports and steps; each stretch between two is divided in
 * `divisions` equal steps. Shear and moment are exact straight lines between breaks, whatever the divisions.
 */
export function beamLines(breaks: readonly number[], at: (station: number) => BeamState, divisions: number): BeamLines {
  const station: number[] = [];
  const shear: number[] = [];
  const moment: number[] = [];
  const slope: number[] = [];
  const deflection: number[] = [];
  const add = (where: number, state: BeamState, after: boolean) => {
    station.push(where);
    shear.push(after ? state.shearAfter : state.shearBefore);
    moment.push(after ? state.momentAfter : state.momentBefore);
    slope.push(state.slope);
    deflection.push(state.deflection);
  };
  breaks.forEach((start, i) => {
    const state = at(start);
    add(start, state, false);
    add(start, state, true);
    const end = breaks[i + 1];
    if (end === undefined) return;
    for (let k = 1; k < divisions; k++) {
      const between = start + ((end - start) * k) / divisions;
      add(between, at(between), true);
    }
  });
  return { station, shear, moment, slope, deflection };
}

/** Both planes, and the lengths of their vectors (never negative), all at the same stations. */
export interface ShaftLines {
  readonly x: BeamLines;
  readonly y: BeamLines;
  readonly resultant: BeamLines;
}

export function shaftLines(solution: ShaftSolution, divisions: number): ShaftLines {
  const breaks = [...solution.x.beam.nodes];
  const x = beamLines(breaks, (station) => beamStateAt(solution.x, station), divisions);
  const y = beamLines(breaks, (station) => beamStateAt(solution.y, station), divisions);
  const lengths = (a: readonly number[], b: readonly number[]) => a.map((value, i) => Math.hypot(value, b[i]!));
  return {
    x,
    y,
    resultant: {
      station: x.station,
      shear: lengths(x.shear, y.shear),
      moment: lengths(x.moment, y.moment),
      slope: lengths(x.slope, y.slope),
      deflection: lengths(x.deflection, y.deflection),
    },
  };
}

/**
 * The largest bending moment of both planes together, N·m, and its station. Between nodes both moments are straight lines, so
 * the squared length is convex there and the largest stands at a node, on one of its sides. NaN where any node is.
 */
export function peakMoment(solution: ShaftSolution): { readonly station: number; readonly moment: number } {
  const { x, y } = solution;
  let station = Number.NaN;
  let moment = Number.NEGATIVE_INFINITY;
  x.beam.nodes.forEach((node, i) => {
    const before = Math.hypot(x.momentBefore[i]!, y.momentBefore[i]!);
    const after = Math.hypot(x.momentAfter[i]!, y.momentAfter[i]!);
    const here = Math.max(before, after);
    if (here > moment || Number.isNaN(here)) {
      station = node;
      moment = Number.isNaN(moment) ? moment : here;
    }
  });
  return { station, moment };
}
