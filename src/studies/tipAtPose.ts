/**
 * The error at the tip at one pose as a check of the whole arm, case by case: play and springing of every joint under the loads there.
 *
 *   - `value` is attained: with a tip force free to point anywhere the worst of 26 directions, with motion that of the arm at rest.
 *   - What nothing at the pose exceeds: where the case leaves nothing free, the value itself; else the ways of all joints added as if they
 *     pointed one way, each at the largest its play allows and its springing under loose bounds of its loads (`playReach.ts`).
 *
 * It passes by the second figure alone, and is over by the first.
 */
import type { Arm, Vec3 } from '../arm/arm.ts';
import { targetsOf } from '../capacity/targets.ts';
import type { Chain, ChainCase } from '../mechanics/chain.ts';
import { type FreeScratch, freeScratch, hasFree, looseBoundOverFree } from '../mechanics/freeLoads.ts';
import { newPoseLoad, poseLoad, poseLoadScratch } from '../mechanics/freeLoadsPose.ts';
import { poseScratch, tipReach } from '../mechanics/newtonEuler.ts';
import { looseForms } from './assessFree.ts';
import { judge } from './assessVerdict.ts';
import { CUBE } from './cubeDirections.ts';
import { armGives } from './play.ts';
import type { JointGive, JointSpring } from './playJoint.ts';
import { lawAt } from './playReach.ts';
import { type TipAtPose, TipErrors } from './playTip.ts';
import type { CheckRow } from './results.ts';
import { missingRow, reported, WHOLE_ARM } from './rowsWithoutPose.ts';

export interface TipPose {
  readonly case: string;
  readonly row: CheckRow;
  /** What the value is made of; null where it is not known. `shares` stand in the order of `joints`. */
  readonly made: {
    /** m, of all joints together. */
    readonly play: number;
    readonly spring: number;
    readonly joints: readonly string[];
    /** m, along the whole; they sum to the value. */
    readonly shares: readonly number[];
  } | null;
}

/** Tip error at one pose ([n] rad) for the named cases in the order of the arm (default: all). `gives`: of this arm, `armGives`. */
export function tipAtPose(
  arm: Arm,
  chain: Chain,
  pose: readonly number[],
  caseNames: readonly string[] | null = null,
  gives: readonly JointGive[] = armGives(arm, chain),
): readonly TipPose[] {
  if (pose.length !== chain.n) throw new RangeError(`a pose of ${pose.length} angles for ${chain.n} joints`);
  const head = { joint: arm.name, jointIndex: WHOLE_ARM, bearing: null, check: 'tip error', unit: 'm' };
  const open = openJoints(chain, gives);
  const target = targetsOf(arm).tipError;
  return chain.cases
    .filter((load) => !caseNames || caseNames.includes(load.name))
    .map((load): TipPose => {
      if (open.length > 0) return { case: load.name, row: missingRow(head, open.join('; ')), made: null };
      const { at, tipForce } = worstAt(chain, load, gives, pose);
      const upper = hasFree(load) ? Math.max(at.total, mostAt(chain, load, gives, pose)) : at.total;
      const unassessed = target.value === null ? target.source : null;
      const limit = { allowable: target.value, floor: 0, beyond: null, unassessed };
      const row: CheckRow = {
        ...reported({ ...head, value: at.total }),
        case: load.name,
        pose: [...pose],
        free: tipForce ? { tipForce, speed: null, accel: null } : null,
        allowable: target.value,
        ...judge(limit, at.total, upper, 'pose'),
        source: ['play and springing of the bearings and shafts', ...notesOf(load, gives)].join('; '),
      };
      const joints = at.joints.map(({ joint }) => chain.names[joint]!);
      return { case: load.name, row, made: { play: at.play, spring: at.spring, joints, shares: at.shares } };
    });
}

/** What is not known of which joint. */
function openJoints(chain: Chain, gives: readonly JointGive[]): readonly string[] {
  return chain.names.flatMap((name, joint) => {
    const give = gives.find((one) => one.joint === joint);
    if (!give) return [`${name}: the joint has no bearings in the file: fill in \`support\``];
    return [
      ...('unassessed' in give.play ? [`${name}: play: ${give.play.unassessed}`] : []),
      ...('unassessed' in give.spring ? [`${name}: stiffness: ${give.spring.unassessed}`] : []),
    ];
  });
}

function notesOf(load: ChainCase, gives: readonly JointGive[]): readonly string[] {
  const notes = gives.flatMap(({ spring }) => ('value' in spring ? spring.value.notes : []));
  return [...new Set(notes), ...(load.speed ? ['worked out at rest, held against a bound in motion'] : [])];
}

function worstAt(
  chain: Chain,
  load: ChainCase,
  gives: readonly JointGive[],
  pose: readonly number[],
): { readonly at: TipAtPose; readonly tipForce: Vec3 | null } {
  const errors = new TipErrors(chain, load, gives);
  if (load.force !== 'any') return { at: errors.at(pose), tipForce: null };
  let worst = { at: errors.at(pose, CUBE[0]!), tipForce: CUBE[0]! };
  for (const tipForce of CUBE) {
    const at = errors.at(pose, tipForce);
    // What is not a number stays, so that it is seen.
    if (at.total > worst.at.total || Number.isNaN(at.total)) worst = { at, tipForce };
  }
  return worst;
}

/** Sum over joints of the most that each can move the tip at the pose, m. */
function mostAt(chain: Chain, load: ChainCase, gives: readonly JointGive[], pose: readonly number[]): number {
  const at = newPoseLoad(chain.n);
  poseLoad(chain, load, pose, at, poseLoadScratch(chain.n));
  const reach = new Float64Array(3 * chain.n);
  tipReach(chain, pose, reach, poseScratch(chain.n));
  const scratch = freeScratch(chain.n);
  return gives.reduce((sum, { joint, play, spring }) => {
    if ('unassessed' in play || 'unassessed' in spring) return Number.NaN;
    const rho = Math.hypot(reach[3 * joint]!, reach[3 * joint + 1]!);
    const z = reach[3 * joint + 2]!;
    const sprung = spring.value.law(sizesAt(spring.value, load, at, scratch));
    return sum + lawAt(play.value.law, z, rho) + lawAt(sprung, z, rho);
  }, 0);
}

function sizesAt(
  spring: JointSpring,
  load: ChainCase,
  at: ReturnType<typeof newPoseLoad>,
  scratch: FreeScratch,
): readonly number[] {
  return spring.sizes.map((form) =>
    Math.max(...looseForms({ form }).map((one) => looseBoundOverFree(one, load, at, scratch))),
  );
}
