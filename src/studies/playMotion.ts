/**
 * Where the load on a bearing comes to lie on the other side of its play: over poses spread through the travel, all cases together (the arm
 * goes from any of them to any other), and along the paths of the duty, one pose after another. The loads are those at rest. Over the
 * travel a tip force that may point anywhere points each way of a set of directions; along the paths it is left out, and motion always.
 */
import type { Arm, Vec3 } from '../arm/arm.ts';
import { radialNorms } from '../capacity/checks/jointParts.ts';
import { motionAt, pathMotion } from '../capacity/duty/index.ts';
import type { BearingSide, PairParts } from '../capacity/index.ts';
import { LOAD_STRIDE, lostMotion, reversals } from '../capacity/play/index.ts';
import { radialVector } from '../mechanics/bearingPair.ts';
import { type Chain, type ChainCase, WRENCH } from '../mechanics/chain.ts';
import { hasFree } from '../mechanics/freeLoads.ts';
import { poseScratch, staticLoads } from '../mechanics/newtonEuler.ts';
import { CUBE } from './cubeDirections.ts';
import type { JointGive } from './playJoint.ts';

/** A pose of a case. */
export interface CasePose {
  readonly case: string;
  readonly pose: readonly number[];
}

export interface SideMotion {
  readonly side: BearingSide;
  /** Largest angle between the loads of two poses, rad; null where nothing loads the bearing, or its play is not known. */
  readonly turn: number | null;
  /** The journal's way between them, m. */
  readonly shift: number | null;
  readonly reverses: boolean;
  /** Whether a case has something free, not all of which is looked at: without a reversal found the load may still change side. */
  readonly free: boolean;
  readonly from: CasePose | null;
  readonly to: CasePose | null;
  /** Along the paths of the duty: where the load jumps to the other side, s after the path began. */
  readonly onPath: readonly { readonly segment: number; readonly time: number }[];
  readonly unassessed: string | null;
}

/** A load below this share of the bearing's largest seats nothing. */
const SEATS = 0.01;
/** Of so many poses one is looked at in each direction of a free tip force. */
const THINNED = 5;
/** Looks between two poses of a path. */
const BETWEEN = 8;
const LONG_PATH = 5000;

/** Both bearings of a joint. `poses` [n] a pose, rad. */
export function sideMotions(
  arm: Arm,
  chain: Chain,
  parts: PairParts,
  give: JointGive,
  poses: Float64Array,
): readonly SideMotion[] {
  return give.sides.map(({ side, clearance }): SideMotion => {
    const free = chain.cases.some(hasFree);
    const none = { side, turn: null, shift: null, reverses: false, free, from: null, to: null, onPath: [] };
    if ('unassessed' in clearance) return { ...none, unassessed: clearance.unassessed };
    const forms = radialNorms(parts, side);
    const { loads, origin } = travelHistory(chain, parts.joint, forms, poses);
    const least = SEATS * largest(loads);
    const motion = lostMotion(loads, clearance.value.play.to, least);
    const onPath = pathReversals(arm, chain, parts.joint, forms, least);
    if ('unassessed' in motion) return { ...none, onPath, unassessed: motion.unassessed };
    const place = (index: number): CasePose => {
      const { load, pose } = origin(index);
      return { case: load.name, pose: [...poses.subarray(chain.n * pose, chain.n * (pose + 1))] };
    };
    const { turn, shift, reverses, fromPose, toPose } = motion.value;
    return { side, turn, shift, reverses, free, from: place(fromPose), to: place(toPose), onPath, unassessed: null };
  });
}

function largest(loads: Float64Array): number {
  let most = 0;
  for (let k = 0; k < loads.length; k += LOAD_STRIDE) most = Math.max(most, Math.hypot(loads[k]!, loads[k + 1]!));
  return most;
}

type Forms = Parameters<typeof radialVector>[0];

interface TravelHistory {
  readonly loads: Float64Array;
  /** Case, and number of the pose, of an entry of `loads`. */
  readonly origin: (index: number) => { readonly load: ChainCase; readonly pose: number };
}

/** Case after case, direction of a free tip force after direction, pose after pose. */
function travelHistory(chain: Chain, joint: number, forms: Forms, poses: Float64Array): TravelHistory {
  const { n } = chain;
  const count = poses.length / n;
  const w = new Float64Array(WRENCH * n);
  const scratch = poseScratch(n);
  // With many directions fewer poses each.
  const ways = chain.cases.flatMap((load) =>
    (load.force === 'any' ? [null, ...CUBE] : [null]).map((tipForce: Vec3 | null) => ({
      load,
      tipForce,
      step: tipForce ? THINNED : 1,
    })),
  );
  const entries = ways.flatMap(({ load, step }) =>
    Array.from({ length: Math.ceil(count / step) }, (_, k) => ({ load, pose: k * step })),
  );
  const loads = new Float64Array(LOAD_STRIDE * entries.length);
  let at = 0;
  for (const { load, tipForce, step } of ways) {
    for (let k = 0; k < count; k += step) {
      staticLoads(chain, load, poses.subarray(n * k, n * k + n), w, scratch, tipForce);
      const [x, y] = radialVector(forms, w, WRENCH * joint);
      loads[at++] = x;
      loads[at++] = y;
    }
  }
  return { loads, origin: (index) => entries[index]! };
}

function pathReversals(
  arm: Arm,
  chain: Chain,
  joint: number,
  forms: Forms,
  least: number,
): readonly { segment: number; time: number }[] {
  const { n } = chain;
  const w = new Float64Array(WRENCH * n);
  const [q, v, a] = [new Float64Array(n), new Float64Array(n), new Float64Array(n)];
  const scratch = poseScratch(n);
  return (arm.duty ?? []).flatMap(({ case: name, motion }, segment) => {
    const load = chain.cases.find((one) => one.name === name);
    if (motion.kind !== 'path' || !load) return [];
    const path = pathMotion(motion.time, motion.pose, chain.full);
    const between = path.rows > LONG_PATH ? 1 : BETWEEN;
    const count = (path.rows - 1) * between + 1;
    const loads = new Float64Array(LOAD_STRIDE * count);
    const times = new Float64Array(count);
    for (let k = 0; k < count; k++) {
      const piece = Math.min(path.rows - 2, Math.floor(k / between));
      const share = (k - piece * between) / between;
      motionAt(path, piece, share, q, v, a);
      staticLoads(chain, load, q, w, scratch);
      const [x, y] = radialVector(forms, w, WRENCH * joint);
      loads[LOAD_STRIDE * k] = x;
      loads[LOAD_STRIDE * k + 1] = y;
      times[k] = path.time[piece]! + share * (path.time[piece + 1]! - path.time[piece]!) - path.time[0]!;
    }
    const found = reversals(loads, least);
    return 'value' in found ? found.value.map((k) => ({ segment, time: times[k]! })) : [];
  });
}
