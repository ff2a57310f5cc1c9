/**
 * The error at the tip from play and from springing, at one pose: each joint's axis stands off its place (`playJoint.ts`), moves the tip, and
 * the ways add as vectors in the base frame. Play is counted from the centred axis, springing from the unloaded one; links, housings and
 * drives count as stiff.
 */
import type { Vec3 } from '../arm/arm.ts';
import { type AxisShift, pointShift } from '../capacity/play/index.ts';
import { rotate3 } from '../math/vector.ts';
import { type Chain, type ChainCase, WRENCH } from '../mechanics/chain.ts';
import { newPoseLoad, type PoseLoad, poseLoad, poseLoadScratch } from '../mechanics/freeLoadsPose.ts';
import { poseScratch, staticLoads, tipReach } from '../mechanics/newtonEuler.ts';
import type { JointGive } from './playJoint.ts';
import { lawAt } from './playReach.ts';

/** What one joint does to the tip at a pose; m, base frame. */
export interface JointShare {
  readonly joint: number;
  /** Null: play or springing of this joint is not known. */
  readonly play: Vec3 | null;
  readonly spring: Vec3 | null;
  /** m; a journal without load lies anywhere in its play and may move the tip this far any way (then `play` is 0). */
  readonly undecided: number;
}

export interface TipAtPose {
  readonly joints: readonly JointShare[];
  /** m: length of the sum of all that is known, and of play and springing each. */
  readonly total: number;
  readonly play: number;
  readonly spring: number;
  /** Of each entry of `joints`, m, summing to `total`: its way along the whole. */
  readonly shares: readonly number[];
}

/** Works out tip errors at many poses of one case: makes its scratch once. */
export class TipErrors {
  private readonly chain: Chain;
  private readonly load: ChainCase;
  private readonly gives: readonly JointGive[];
  private readonly w: Float64Array;
  private readonly reach: Float64Array;
  private readonly scratch;
  private readonly frames: PoseLoad;
  private readonly frameScratch;
  /** A copy of the case whose frames `poseLoad` fills. */
  private readonly framed: ChainCase;
  private readonly turned = new Float64Array(3);

  constructor(chain: Chain, load: ChainCase, gives: readonly JointGive[]) {
    this.chain = chain;
    this.load = load;
    this.gives = gives;
    this.w = new Float64Array(WRENCH * chain.n);
    this.reach = new Float64Array(3 * chain.n);
    this.scratch = poseScratch(chain.n);
    this.frames = newPoseLoad(chain.n);
    this.frameScratch = poseLoadScratch(chain.n);
    this.framed = { ...load, force: 'any', speed: null, accel: null };
  }

  /** At rest; `tipForce` gives a tip force of direction `any` its direction (unit vector, base frame), else it is left out. */
  at(pose: ArrayLike<number>, tipForce: Vec3 | null = null): TipAtPose {
    const { chain, load, w, reach, frames } = this;
    staticLoads(chain, load, pose, w, this.scratch, load.force === 'any' ? tipForce : null);
    tipReach(chain, pose, reach, this.scratch);
    poseLoad(chain, this.framed, pose, frames, this.frameScratch);
    const joints = this.gives.map((give): JointShare => {
      const { joint, play, spring } = give;
      const at = WRENCH * joint;
      const point: Vec3 = [reach[3 * joint]!, reach[3 * joint + 1]!, reach[3 * joint + 2]!];
      const base = { joint, play: null, spring: null, undecided: 0 };
      const sprung = 'value' in spring ? this.inBase(joint, spring.value.at(w, at), point) : null;
      if ('unassessed' in play) return { ...base, spring: sprung };
      const seated = play.value.at(w, at);
      if (seated) return { ...base, play: this.inBase(joint, seated, point), spring: sprung };
      const undecided = lawAt(play.value.law, point[2], Math.hypot(point[0], point[1]));
      return { ...base, play: [0, 0, 0], spring: sprung, undecided };
    });
    return summed(joints);
  }

  private inBase(joint: number, axis: AxisShift, point: Vec3): Vec3 {
    rotate3(this.turned, 0, this.frames.frame, 9 * joint, pointShift(axis, point), 0);
    return [this.turned[0]!, this.turned[1]!, this.turned[2]!];
  }
}

function add(a: Vec3, b: Vec3 | null): Vec3 {
  return b ? [a[0] + b[0], a[1] + b[1], a[2] + b[2]] : a;
}

function summed(joints: readonly JointShare[]): TipAtPose {
  const zero: Vec3 = [0, 0, 0];
  const each = joints.map((one) => add(add(zero, one.play), one.spring));
  const undecided = joints.reduce((sum, one) => sum + one.undecided, 0);
  const sum = each.reduce(add, zero);
  const size = Math.hypot(...sum);
  const length = (pick: 'play' | 'spring') => Math.hypot(...joints.reduce((v, one) => add(v, one[pick]), zero));
  const along = (d: Vec3) => (size === 0 ? 0 : (d[0] * sum[0] + d[1] * sum[1] + d[2] * sum[2]) / size);
  return {
    joints,
    total: size + undecided,
    play: length('play') + undecided,
    spring: length('spring'),
    // What is undecided may lie along the rest.
    shares: joints.map((one, k) => along(each[k]!) + one.undecided),
  };
}
