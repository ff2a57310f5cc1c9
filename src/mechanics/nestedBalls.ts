/**
 * Balls that hold what the turns of a box can make of the inboard vectors u_p and of the outboard blocks Y (see `nestedCase`): centre
 * and radius at each stage, in the frame before its turn (u) and after it (Y).
 *
 * A ball turned about the joint axis by angles m - δ … m + δ stays in the ball about its centre turned by m, its part across the axis
 * shortened to cos δ, its radius longer by sin δ times that part (from 90° on: 0 and 1). Radii add up; nothing leaves its ball.
 */
import { rotate3, rotateBack3 } from '../math/vector.ts';
import type { Chain } from './chain.ts';
import type { NestedCase } from './nestedCase.ts';
import type { Stage } from './nestedStages.ts';

/** A spread below this share of a vector is rounding: its joint makes no difference to the vector. */
const STILL = 2 ** -50;

/** Arrays by stage; at stage s: centres at 3 pairs s and width s, radii at pairs s and blocks s. */
export interface NestedBalls {
  /** What the base makes of u up to stage s, before its turn. One stage more than there are: after the last. */
  readonly inCentre: Float64Array;
  readonly inRadius: Float64Array;
  /** What stage s and those outboard make of Y, in the housing frame of the stage's joint (turns of earlier stages not made). */
  readonly outCentre: Float64Array;
  readonly outRadius: Float64Array;
  /** Turns of a stage that differ to u outboard of it, and to Y inboard of it; 1: the first stands for all. */
  readonly inTurns: Int32Array;
  readonly outTurns: Int32Array;
}

export function nestedBalls(chain: Chain, load: NestedCase, stages: readonly Stage[]): NestedBalls {
  const count = stages.length;
  const { pairs, blocks, width } = load;
  const balls: NestedBalls = {
    inCentre: new Float64Array(3 * pairs * (count + 1)),
    inRadius: new Float64Array(pairs * (count + 1)),
    outCentre: new Float64Array(width * count),
    outRadius: new Float64Array(blocks * count),
    inTurns: new Int32Array(count),
    outTurns: new Int32Array(count),
  };
  inward(chain, load, stages, balls);
  for (let s = count - 1; s >= 0; s--) outward(chain, load, stages, balls, s);
  return balls;
}

/** Turns the centre at `at` about z by `sign` times the stage's turns, adds to its radius; true where anything moves. */
function turn(
  stage: Stage,
  sign: 1 | -1,
  centre: Float64Array,
  at: number,
  radius: Float64Array,
  rAt: number,
): boolean {
  const c = Math.cos(stage.middle);
  const s = sign * Math.sin(stage.middle);
  const wide = stage.half >= Math.PI / 2;
  const keep = wide ? 0 : Math.cos(stage.half);
  const x = centre[at]!;
  const y = centre[at + 1]!;
  const across = Math.hypot(x, y);
  const adds = (wide ? 1 : Math.sin(stage.half)) * across;
  const still = STILL * Math.hypot(across, centre[at + 2]!);
  const moves = adds > still || radius[rAt]! > still;
  centre[at] = keep * (c * x - s * y);
  centre[at + 1] = keep * (s * x + c * y);
  radius[rAt]! += adds;
  return moves;
}

function inward(chain: Chain, load: NestedCase, stages: readonly Stage[], balls: NestedBalls): void {
  const { pairs } = load;
  const { inCentre, inRadius, inTurns } = balls;
  const here = new Float64Array(3 * pairs);
  const radius = new Float64Array(pairs);
  for (let p = 0; p < pairs; p++) rotateBack3(here, 3 * p, chain.rotation, 0, load.base, 3 * p);
  stages.forEach((stage, s) => {
    inCentre.set(here, 3 * pairs * s);
    inRadius.set(radius, pairs * s);
    let moves = false;
    for (let p = 0; p < pairs; p++) {
      if (turn(stage, -1, here, 3 * p, radius, p)) moves = true;
      const outboard = 9 * (stage.joint + 1);
      if (stage.last && stage.joint < chain.n - 1) rotateBack3(here, 3 * p, chain.rotation, outboard, here, 3 * p);
    }
    // in motion a turn counts even where gravity does not feel it, but for the first joint's, which turns the whole arm about gravity
    if (load.motion && stage.joint > 0) moves = true;
    inTurns[s] = moves ? stage.cos.length : 1;
  });
  inCentre.set(here, 3 * pairs * stages.length);
  inRadius.set(radius, pairs * stages.length);
}

function outward(chain: Chain, load: NestedCase, stages: readonly Stage[], balls: NestedBalls, s: number): void {
  const { blocks, width, own, lever } = load;
  const { outCentre, outRadius, outTurns } = balls;
  const stage = stages[s]!;
  const j = stage.joint;
  const end = s === stages.length - 1;
  const at = width * s;
  const r = blocks * s;
  for (let b = 0; b < blocks; b++) {
    const k = at + 3 * b;
    if (end) outCentre.fill(0, k, k + 3);
    else if (stage.last) rotate3(outCentre, k, chain.rotation, 9 * (j + 1), outCentre, k + width);
    else outCentre.copyWithin(k, k + width, k + width + 3);
    outRadius[r + b] = end ? 0 : outRadius[r + blocks + b]!;
  }
  if (stage.last) {
    for (let k = 0; k < width; k++) outCentre[at + k]! += own[width * j + k]!;
    if (load.tool && !end) {
      // the moment of the tool force goes with its force across the lever
      const f = at + 3 * (blocks - 2);
      const [px, py, pz] = [lever[3 * j]!, lever[3 * j + 1]!, lever[3 * j + 2]!];
      const [x, y, z] = [outCentre[f]!, outCentre[f + 1]!, outCentre[f + 2]!];
      outCentre[f + 3]! += py * z - pz * y;
      outCentre[f + 4]! += pz * x - px * z;
      outCentre[f + 5]! += px * y - py * x;
      outRadius[r + blocks - 1]! += Math.hypot(px, py, pz) * outRadius[r + blocks - 2]!;
    }
  }
  // in motion inertias turn as well
  let moves = load.motion !== null;
  for (let b = 0; b < blocks; b++) if (turn(stage, 1, outCentre, at + 3 * b, outRadius, r + b)) moves = true;
  outTurns[s] = moves ? stage.cos.length : 1;
}
