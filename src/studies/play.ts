/**
 * Play and stiffness of an arm over its travel: how far each joint's axis tilts in its bearings, where a reaction changes side, and what the
 * tip does. Two figures for the tip, never mixed up:
 *
 *   - `found`: attained at a pose, by play and springing of the loads there (with a tip force free to point anywhere, the worst of 26 directions).
 *   - `bound`: nothing within the travel exceeds it. The bounds of the joints are added as if all pointed one way; each joint's is the largest way
 *     its play and its springing under the largest loads of any case can move the tip anywhere within reach (`playReach.ts`).
 */
import type { Arm, Vec3 } from '../arm/arm.ts';
import { isRingParts, jointParts } from '../capacity/index.ts';
import { type Chain, type ChainCase, flattenArm } from '../mechanics/chain.ts';
import { pointSets, sphereBounds, type TravelBounds } from '../mechanics/travelBounds.ts';
import { CUBE } from './cubeDirections.ts';
import { type JointGive, jointGive, type SidePlay } from './playJoint.ts';
import { type SideMotion, sideMotions } from './playMotion.ts';
import { reachBound } from './playReach.ts';
import { type TipAtPose, TipErrors } from './playTip.ts';
import { samplePoses } from './samplePoses.ts';

export interface PlayOptions {
  /** Of loads over the travel; default `sphereBounds`. */
  readonly bounds?: TravelBounds;
  /** Most poses to look at, default 1000. */
  readonly poses?: number;
}

export interface JointPlayResult {
  readonly joint: string;
  readonly jointIndex: number;
  readonly sides: readonly SidePlay[];
  /** rad each way at the largest play; null where it is not known. */
  readonly tilt: number | null;
  /** Most that the joint's play, and its springing, can move the tip, m; null where not known. */
  readonly playBound: number | null;
  readonly springBound: number | null;
  /** Share of `found`, m. */
  readonly share: number;
  /** Where the loads on its bearings change side. */
  readonly motion: readonly SideMotion[];
  /** What is missing. */
  readonly unassessed: readonly string[];
  readonly notes: readonly string[];
}

export interface TipResult {
  /** m; null where play or springing of some joint is not known. */
  readonly found: number | null;
  readonly bound: number | null;
  readonly case: string;
  readonly pose: readonly number[];
  /** Direction of a free tip force there. */
  readonly tipForce: Vec3 | null;
  /** At that pose: of all joints' play and springing each, m. */
  readonly play: number;
  readonly spring: number;
}

export interface PlayResult {
  readonly joints: readonly JointPlayResult[];
  readonly tip: TipResult;
}

const POSES = 1000;
/** Best starts that are climbed from. */
const CLIMBS = 4;

/** The gives of all revolute joints that have a support. */
export function armGives(arm: Arm, chain: Chain): readonly JointGive[] {
  return chain.jointIndex.flatMap((_, joint) => {
    const parts = jointParts(arm, chain, joint);
    return parts ? [jointGive(parts)] : [];
  });
}

/** Tip error at one pose ([n] rad) of a case, at rest. */
export function tipErrorAt(
  arm: Arm,
  chain: Chain,
  pose: readonly number[],
  load: ChainCase,
  tipForce: Vec3 | null = null,
): TipAtPose {
  return new TipErrors(chain, load, armGives(arm, chain)).at(pose, tipForce);
}

export function playStudy(arm: Arm, chain: Chain = flattenArm(arm), options: PlayOptions = {}): PlayResult {
  const gives = armGives(arm, chain);
  const poses = samplePoses(chain, options.poses ?? POSES);
  const found = worstTip(chain, gives, poses);
  const bounds = tipBounds(chain, gives, options.bounds ?? sphereBounds);
  const joints = chain.jointIndex.map((jointIndex, joint): JointPlayResult => {
    const k = gives.findIndex((give) => give.joint === joint);
    const head = { joint: arm.joints[jointIndex]!.name, jointIndex };
    if (k < 0) return { ...head, ...NO_SUPPORT };
    const give = gives[k]!;
    const parts = jointParts(arm, chain, joint)!;
    const play = 'value' in give.play ? give.play.value : null;
    return {
      ...head,
      sides: give.sides,
      tilt: play ? play.tilt : null,
      playBound: bounds[k]!.play,
      springBound: bounds[k]!.spring,
      share: found.at ? found.at.shares[k]! : 0,
      motion: isRingParts(parts) ? [] : sideMotions(arm, chain, parts, give, poses),
      unassessed: [
        ...('unassessed' in give.play ? [`play: ${give.play.unassessed}`] : []),
        ...('unassessed' in give.spring ? [`stiffness: ${give.spring.unassessed}`] : []),
      ],
      notes: [...clearanceNotes(give), ...('value' in give.spring ? give.spring.value.notes : [])],
    };
  });
  const known = joints.every((one) => one.unassessed.length === 0);
  const total = bounds.reduce((sum, one) => sum + (one.play ?? Number.NaN) + (one.spring ?? Number.NaN), 0);
  return {
    joints,
    tip: {
      found: known && found.at ? found.at.total : null,
      bound: known ? total : null,
      case: found.load?.name ?? '',
      pose: found.pose,
      tipForce: found.tipForce,
      play: found.at?.play ?? 0,
      spring: found.at?.spring ?? 0,
    },
  };
}

const NO_SUPPORT = {
  sides: [],
  tilt: null,
  playBound: null,
  springBound: null,
  share: 0,
  motion: [],
  unassessed: ['the joint has no bearings in the file: fill in `support`'],
  notes: [],
} as const;

function clearanceNotes(give: JointGive): readonly string[] {
  return give.sides.flatMap(({ side, clearance }) => {
    if ('unassessed' in clearance || clearance.value.fitsNotGiven.length === 0) return [];
    return [
      `${side}: fit of ${clearance.value.fitsNotGiven.join(' and ')} not given: taken as neither tight nor loose`,
    ];
  });
}

interface TipBound {
  readonly play: number | null;
  readonly spring: number | null;
}

function tipBounds(chain: Chain, gives: readonly JointGive[], bounds: TravelBounds): readonly TipBound[] {
  const sets = pointSets(chain, chain.n - 1, chain.tipOrigin);
  const springs = gives.map((give) => ('value' in give.spring ? give.spring.value : null));
  const checks = springs.flatMap((spring) => spring?.sizes ?? []);
  const cases = checks.length === 0 ? [] : chain.cases.map((load) => bounds(chain, load, checks));
  const most = checks.map((_, c) => Math.max(0, ...cases.map((one) => one[c]!)));
  let at = 0;
  return gives.map((give, k): TipBound => {
    const play = 'value' in give.play ? reachBound(sets, give.joint, give.play.value.law) : null;
    const spring = springs[k];
    if (!spring) return { play, spring: null };
    const sizes = most.slice(at, at + spring.sizes.length);
    at += spring.sizes.length;
    return { play, spring: reachBound(sets, give.joint, spring.law(sizes)) };
  });
}

interface WorstTip {
  readonly at: TipAtPose | null;
  readonly load: ChainCase | null;
  readonly pose: readonly number[];
  readonly tipForce: Vec3 | null;
}

/** The largest tip error that is found: best of the poses in every case, then climbed joint by joint. */
function worstTip(chain: Chain, gives: readonly JointGive[], poses: Float64Array): WorstTip {
  const { n } = chain;
  let worst: WorstTip = { at: null, load: null, pose: [], tipForce: null };
  for (const load of chain.cases) {
    const errors = new TipErrors(chain, load, gives);
    const ways: readonly (Vec3 | null)[] = load.force === 'any' ? CUBE : [null];
    for (const tipForce of ways) {
      const values: { value: number; k: number }[] = [];
      // With many directions fewer poses each.
      const step = n * (ways.length > 1 ? 5 : 1);
      for (let k = 0; k + n <= poses.length; k += step) {
        values.push({ value: errors.at(poses.subarray(k, k + n), tipForce).total, k });
      }
      values.sort((a, b) => b.value - a.value || a.k - b.k);
      for (const { k } of values.slice(0, ways.length > 1 ? 1 : CLIMBS)) {
        const pose = poses.slice(k, k + n);
        const at = climbed(chain, errors, pose, tipForce);
        if (worst.at !== null && !(at.total > worst.at.total)) continue;
        worst = { at, load, pose: [...pose], tipForce };
      }
    }
  }
  return worst;
}

const FIRST_STEP = 0.2;
const LAST_STEP = 1e-3;

/** Compass search: a step either way of one joint at a time, halved where none helps. `pose` is moved. */
function climbed(chain: Chain, errors: TipErrors, pose: Float64Array, tipForce: Vec3 | null): TipAtPose {
  let best = errors.at(pose, tipForce);
  for (let step = FIRST_STEP; step >= LAST_STEP; ) {
    let better = false;
    for (let j = 0; j < chain.n; j++) {
      for (const way of [step, -step]) {
        const old = pose[j]!;
        const moved = old + way;
        pose[j] = chain.full[j] === 1 ? moved : Math.min(chain.to[j]!, Math.max(chain.from[j]!, moved));
        const next = errors.at(pose, tipForce);
        if (next.total > best.total * (1 + 1e-12)) {
          best = next;
          better = true;
          break;
        }
        pose[j] = old;
      }
    }
    if (!better) step /= 2;
  }
  return best;
}
