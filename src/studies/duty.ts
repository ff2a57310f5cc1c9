/**
 * The duty of an arm: how its time is spent, and the life of every bearing that follows. Each segment is a case for a share of the time, along
 * a path (`dutyPath.ts`) or anywhere in travel (`dutyTravel.ts`). A path is passed again and again for its share of the time; what an
 * open path needs to come back to its start is not in it and not counted.
 */
import type { Arm, DutySegment } from '../arm/arm.ts';
import { type DutyPart, dutyFaces, dutyPart, type PathMotion, pathMotion, pathSwings } from '../capacity/duty/index.ts';
import { isRingParts, jointParts } from '../capacity/index.ts';
import { targetsOf } from '../capacity/targets.ts';
import { type Chain, type ChainCase, flattenArm, WRENCH } from '../mechanics/chain.ts';
import { sphereBounds, type TravelBounds } from '../mechanics/travelBounds.ts';
import { bearingDuty, dutySystem, NOTHING, type Run } from './dutyBearing.ts';
import { pathWear } from './dutyPath.ts';
import type { DutyBearing, DutyResult, JointSegment, PartSegment, SegmentResult } from './dutyResult.ts';
import { travelLoads } from './dutyTravel.ts';

const TURN = 2 * Math.PI;

export interface DutyOptions {
  /** Default: `sphereBounds`. */
  readonly bounds?: TravelBounds;
}

/** The duty worked out; null where the arm has none. */
export function dutyStudy(arm: Arm, chain: Chain = flattenArm(arm), options: DutyOptions = {}): DutyResult | null {
  if (arm.duty === null) return null;
  const sides = chain.jointIndex.flatMap((jointIndex, joint) => {
    const parts = jointParts(arm, chain, joint);
    if (!parts) return [];
    const names = isRingParts(parts) ? (['ring'] as const) : (['A', 'B'] as const);
    return names.flatMap((side) =>
      dutyFaces(parts, side).map((face) => ({ jointIndex, joint, side, face, part: dutyPart(parts, side, face) })),
    );
  });
  const known = sides.flatMap(({ part }) => ('value' in part ? [part.value] : []));
  const bounds = options.bounds ?? sphereBounds;
  const runs = arm.duty.map((segment) => runSegment(arm, chain, segment, known, bounds));
  const reliability = targetsOf(arm).reliability.value ?? 0.9;
  let index = 0;
  const bearings = sides.map(({ jointIndex, side, face, part }): DutyBearing => {
    const head = { joint: arm.joints[jointIndex]!.name, jointIndex, side, face };
    if ('unassessed' in part) return { ...head, ...NOTHING, unassessed: part.unassessed };
    const b = index++;
    const mine = runs.map((run) => run.parts[b]!);
    const shares = arm.duty!.map((segment) => segment.share);
    return { ...head, ...bearingDuty(part.value, mine, runs, shares, reliability) };
  });
  return { segments: runs.map((run) => run.segment), bearings, system: dutySystem(bearings), reliability };
}

function runSegment(
  arm: Arm,
  chain: Chain,
  segment: DutySegment,
  parts: readonly DutyPart[],
  bounds: TravelBounds,
): Run {
  const load = chain.cases.find((one) => one.name === segment.case);
  if (!load) throw new RangeError(`the duty names a case “${segment.case}” that the arm does not have`);
  const { motion } = segment;
  if (motion.kind === 'anywhere') return anywhere(chain, segment, load, motion.cyclesPerMinute, parts, bounds);
  return alongPath(arm, chain, segment, load, pathMotion(motion.time, motion.pose, chain.full), parts);
}

function alongPath(
  arm: Arm,
  chain: Chain,
  segment: DutySegment,
  load: ChainCase,
  path: PathMotion,
  parts: readonly DutyPart[],
): Run {
  const { n } = chain;
  const wear = pathWear(chain, load, path, parts);
  const swings = chain.names.map((_, j) => pathSwings(path, j));
  const joints = swings.map(
    (one, j): JointSegment => ({
      swept: wear.swept[j]! / path.duration,
      peakSpeed: wear.peakSpeed[j]!,
      reversalsPerSecond: one.reversals / path.duration,
      halfSwings: [...one.halfSwings],
    }),
  );
  const found = parts.map(
    (part, b): PartSegment => ({
      turning: wear.swept[part.joint]! / path.duration / TURN,
      load: wear.load[b]!,
      attained: wear.load[b]!,
      peak: wear.peak[b]!,
      pose: [...wear.peakPose.subarray(n * b, n * b + n)],
      wrench: [...wear.peakWrench.subarray(WRENCH * b, WRENCH * b + WRENCH)],
    }),
  );
  const notes = [
    ...(path.closed ? [] : ['the path does not end where it began: the way back is not counted']),
    ...pointMasses(arm, load.name),
    ...outsideNotes(chain, wear.outside),
    ...limitNotes(chain, load, wear.peakSpeed, wear.peakAccel),
    ...(load.force === 'any'
      ? ['the tip force points, at each pose and for each bearing, where it loads it most']
      : []),
    ...(load.speed ? ['at each pose the worst of the motion that the case allows and of the path’s own counts'] : []),
  ];
  const result: SegmentResult = {
    case: segment.case,
    share: segment.share,
    kind: 'path',
    duration: path.duration,
    samples: wear.samples,
    joints,
    leavesTravel: wear.outside.some((beyond) => beyond > 0),
    notes,
  };
  return { segment: result, parts: found, swings };
}

/** Bodies whose own inertia the file leaves out. */
function pointMasses(arm: Arm, caseName: string): readonly string[] {
  const first = arm.joints.findIndex((joint) => joint.kind === 'revolute');
  const links = arm.joints.slice(first).filter(({ link }) => link.mass > 0 && link.inertia === null);
  const payload = arm.cases.find((load) => load.name === caseName)?.payload;
  const names = [
    ...links.map(({ link }) => `“${link.name}”`),
    ...(payload && payload.mass > 0 && payload.inertia === null ? ['the payload'] : []),
  ];
  if (names.length === 0) return [];
  return [`accelerated as point masses, for want of \`inertia_kg_m2\`: ${names.join(', ')}`];
}

function outsideNotes(chain: Chain, outside: Float64Array): readonly string[] {
  const names = chain.names.filter((_, j) => outside[j]! > 0);
  if (names.length === 0) return [];
  return [`between its poses the smooth motion leaves the travel of ${names.join(', ')}: give more poses there`];
}

function limitNotes(chain: Chain, load: ChainCase, speed: Float64Array, accel: Float64Array): readonly string[] {
  if (!load.speed || !load.accel) return [];
  const over = (limit: Float64Array, peak: Float64Array, j: number) => peak[j]! > limit[j]! * (1 + 1e-9);
  const names = chain.names.filter((_, j) => over(load.speed!, speed, j) || over(load.accel!, accel, j));
  return names.length === 0 ? [] : [`the path is faster than the motion of its case in ${names.join(', ')}`];
}

function anywhere(
  chain: Chain,
  segment: DutySegment,
  load: ChainCase,
  cycles: readonly number[],
  parts: readonly DutyPart[],
  bounds: TravelBounds,
): Run {
  const loads = travelLoads(chain, load, parts, bounds);
  const joints = chain.names.map((_, j): JointSegment => {
    const travel = chain.to[j]! - chain.from[j]!;
    const perSecond = cycles[j]! / 60;
    return {
      swept: 2 * travel * perSecond,
      // of a sine: π/2 times the mean
      peakSpeed: Math.PI * travel * perSecond,
      reversalsPerSecond: 2 * perSecond,
      halfSwings: travel > 0 && perSecond > 0 ? [travel / 2] : [],
    };
  });
  const found = parts.map((part, b): PartSegment => {
    const { bound, found: attained, pose, wrench } = loads[b]!;
    return {
      turning: joints[part.joint]!.swept / TURN,
      load: bound,
      attained,
      peak: attained,
      pose,
      wrench: [...wrench],
    };
  });
  const notes = [
    'anywhere in travel: every joint swings over its whole travel, and every bearing carries all the time the most the case can put on it',
    ...(load.speed ? [] : ['at rest: the case has no `motion`, so the swings accelerate nothing']),
  ];
  const result: SegmentResult = {
    case: segment.case,
    share: segment.share,
    kind: 'anywhere',
    duration: null,
    samples: 0,
    joints,
    leavesTravel: false,
    notes,
  };
  return { segment: result, parts: found, swings: chain.names.map(() => null) };
}
