/**
 * The turns of a box of the grid, from ground to tip. A joint with few samples is one stage; one with many is several, coarse turns
 * before fine ones about the same axis, so that a bound can close many samples at once. Where the samples do not divide evenly the
 * last coarse turn starts earlier and some poses come up twice, which changes nothing.
 */
import { type Grid, sampleAngle } from './gridSweepGrid.ts';

export interface Stage {
  readonly joint: number;
  /** Whether the joint's housing frame is before this turn; whether its link frame is after it. */
  readonly first: boolean;
  readonly last: boolean;
  /** Of each turn: cos and sin, and what it adds to the index of the pose. */
  readonly cos: Float64Array;
  readonly sin: Float64Array;
  readonly offset: Float64Array;
  /** The turn in the middle, and half the arc from the first turn to the last, rad. */
  readonly middle: number;
  readonly half: number;
}

/** More samples than this are split; about this many turns a stage then. */
const MOST_TURNS = 16;
const WANTED_TURNS = 9;

function stage(
  grid: Grid,
  joint: number,
  starts: readonly number[],
  base: number,
  first: boolean,
  last: boolean,
): Stage {
  const step = grid.step[joint]!;
  const angles = starts.map((k) => base + k * step);
  const end = angles[angles.length - 1]!;
  return {
    joint,
    first,
    last,
    cos: Float64Array.from(angles, Math.cos),
    sin: Float64Array.from(angles, Math.sin),
    offset: Float64Array.from(starts, (k) => k * grid.stride[joint]!),
    middle: (angles[0]! + end) / 2,
    half: (end - angles[0]!) / 2,
  };
}

/** Stages of the samples low[j] to high[j] of every joint; offsets count from the box's first pose. */
export function stagesOf(grid: Grid, low: ArrayLike<number>, high: ArrayLike<number>): readonly Stage[] {
  const stages: Stage[] = [];
  for (let j = 0; j < grid.n; j++) {
    const count = high[j]! - low[j]! + 1;
    const parts = count <= MOST_TURNS ? 1 : Math.ceil(Math.log(count) / Math.log(WANTED_TURNS) - 0.3);
    const turns = Math.ceil(count ** (1 / parts));
    let size = Math.round(turns ** (parts - 1));
    // the coarsest groups may overlap
    const groups = parts === 1 ? count : Math.ceil(count / size);
    const starts = Array.from({ length: groups }, (_, g) => (parts === 1 ? g : Math.min(g * size, count - size)));
    stages.push(stage(grid, j, starts, sampleAngle(grid, j, low[j]!), true, parts === 1));
    for (let part = 1; part < parts; part++) {
      size = Math.round(size / turns);
      const fine = Array.from({ length: turns }, (_, k) => k * size);
      stages.push(stage(grid, j, fine, 0, false, part === parts - 1));
    }
  }
  return stages;
}
