/**
 * Fatigue of the shafts. The load cycle of a section is the real range between poses, fibre by fibre, over poses spread through the travel
 * and over the cases together (the arm may go from any of them to any other): those of the duty where the file has one, else all. It comes
 * from samples, so it proves nothing between them, and says so. Worst section and side of each joint; Goodman or elliptic, the lower.
 */
import type { Arm, Shaft } from '../arm/arm.ts';
import { jointParts, type PairParts, placeName, type RingParts } from '../capacity/index.ts';
import type { Assessed } from '../capacity/rule.ts';
import {
  FATIGUE_RULE,
  type FatigueSafety,
  fatigueSafety,
  type JointShaft,
  loadCycles,
} from '../capacity/shaft/index.ts';
import { shaftForms } from '../mechanics/beamForms.ts';
import { radialVector } from '../mechanics/bearingPair.ts';
import { type Chain, type ChainCase, WRENCH, wrenchToFile } from '../mechanics/chain.ts';
import { pairCount } from '../mechanics/freeLoadsPose.ts';
import { poseScratch, staticLoads } from '../mechanics/newtonEuler.ts';
import { judge } from './assessVerdict.ts';
import { type CaseLoads, caseHistory, caseLoads, outerEntries } from './fatigueHistory.ts';
import type { CheckRow } from './results.ts';
import { samplePoses } from './samplePoses.ts';

export interface FatigueOptions {
  /** Most poses to spread, default 2000. */
  readonly poses?: number;
  /** Further poses [n] rad, such as those of the worst rows. */
  readonly also?: readonly (readonly number[])[];
}

const POSES = 2000;

/** One row a joint with a support: `value` is the fully reversed stress that wears as much as the cycle, against the endurance strength. */
export function fatigueRows(arm: Arm, chain: Chain, options: FatigueOptions = {}): readonly CheckRow[] {
  const poses = allPoses(chain, options);
  const inDuty = arm.duty && new Set(arm.duty.map((segment) => segment.case));
  const loads = chain.cases.filter((load) => !inDuty || inDuty.has(load.name));
  const joints = chain.jointIndex.flatMap((_, joint) => jointParts(arm, chain, joint) ?? []);
  const sections = joints.map(sectionsOf);
  collect(chain, loads, poses, sections.flat());
  return joints.map((parts, k) => jointRow(chain, parts, sections[k]!, poses, loads));
}

/** Spread poses, then those asked for, [n] a pose. */
function allPoses(chain: Chain, options: FatigueOptions): Float64Array {
  const also = (options.also ?? []).filter((pose) => pose.length === chain.n && pose.every(Number.isFinite));
  const spread = samplePoses(chain, options.poses ?? POSES);
  const poses = new Float64Array(spread.length + chain.n * also.length);
  poses.set(spread);
  also.forEach((pose, k) => {
    poses.set(pose, spread.length + chain.n * k);
  });
  return poses;
}

/** One side of a critical point of a shaft, and the history it has seen so far, thinned to what a cycle depends on. */
interface Section {
  readonly parts: PairParts | RingParts;
  readonly shaft: JointShaft;
  readonly turnsWith: Shaft['turnsWith'];
  readonly point: number;
  readonly side: 'momentBefore' | 'momentAfter';
  seen: Float64Array;
  unassessed: string | null;
}

function sectionsOf(parts: PairParts | RingParts): Section[] {
  const given = parts.support.shaft;
  if ('unassessed' in parts.shaft || !given) return [];
  const shaft = parts.shaft.value;
  return shaft.points.flatMap((_, point) =>
    (['momentBefore', 'momentAfter'] as const).map((side) => {
      const seen = new Float64Array(0);
      return { parts, shaft, turnsWith: given.turnsWith, point, side, seen, unassessed: null };
    }),
  );
}

/** Numbers held at a time for poses and their free parts. */
const HELD = 4e6;

function collect(chain: Chain, loads: readonly ChainCase[], poses: Float64Array, sections: readonly Section[]): void {
  const { n } = chain;
  const chunk = Math.max(1, Math.floor(HELD / (6 * n * pairCount(n) + 6 * n * n + 20 * n)));
  for (let from = 0; from < poses.length; from += n * chunk) {
    const some = poses.subarray(from, Math.min(poses.length, from + n * chunk));
    for (const load of loads) {
      const here = caseLoads(chain, load, some);
      for (const section of sections) see(chain, section, here, some);
    }
  }
}

function see(chain: Chain, section: Section, here: CaseLoads, poses: Float64Array): void {
  const { joint } = section.parts;
  const angles = Float64Array.from({ length: poses.length / chain.n }, (_, k) => poses[chain.n * k + joint]!);
  const history = caseHistory(section.shaft, joint, section.point, section.side, here, angles);
  if ('unassessed' in history) {
    section.unassessed ??= history.unassessed;
    return;
  }
  const all = new Float64Array(section.seen.length + history.value.length);
  all.set(section.seen);
  all.set(history.value, section.seen.length);
  section.seen = outerEntries(all, section.turnsWith);
}

interface Worst {
  readonly section: Section;
  readonly safety: FatigueSafety;
}

function worstSection(parts: PairParts | RingParts, sections: readonly Section[]): Assessed<Worst> {
  const given = parts.support.shaft;
  const reliability = parts.targets.shaftReliability.value;
  if ('unassessed' in parts.shaft) return parts.shaft;
  if (!given || reliability === null) return { unassessed: 'the support has no shaft: fill in `shaft`' };
  let worst: Worst | null = null;
  for (const section of sections) {
    if (section.unassessed !== null) return { unassessed: section.unassessed };
    // The entries are in the frame of the fibres already.
    const cycles = loadCycles(section.seen, 'housing');
    if ('unassessed' in cycles) return cycles;
    const point = section.shaft.points[section.point]!;
    const { material } = section.shaft;
    const safety = fatigueSafety(cycles.value, point.section, point.notch, given.finish, material, reliability);
    if ('unassessed' in safety) return safety;
    if (worst === null || safety.value.safety < worst.safety.safety) worst = { section, safety: safety.value };
  }
  return worst ? { value: worst } : { unassessed: 'the shaft has no section to check' };
}

function jointRow(
  chain: Chain,
  parts: PairParts | RingParts,
  sections: readonly Section[],
  poses: Float64Array,
  loads: readonly ChainCase[],
): CheckRow {
  const head = {
    joint: parts.part.name,
    jointIndex: parts.jointIndex,
    bearing: null,
    check: 'fatigue',
    unit: 'Pa',
  } as const;
  const proof = { free: null, bound: null, gap: null, certified: null } as const;
  const outcome = worstSection(parts, sections);
  if ('unassessed' in outcome) {
    const nan = [Number.NaN, Number.NaN, Number.NaN] as const;
    const missing = { value: Number.NaN, case: '', pose: [], wrench: { force: nan, moment: nan } } as const;
    const none = { allowable: null, utilisation: null, verdict: 'unassessed', source: null } as const;
    return { ...head, ...proof, ...missing, ...none, reason: outcome.unassessed };
  }
  const { section, safety } = outcome.value;
  const { Se, cycles } = safety.endurance;
  const target = parts.targets.shaftFatigueSafety;
  const allowable = target.value === null ? null : Se / target.value;
  const value = Se / safety.safety;
  const unassessed = target.value === null ? target.source : null;
  const judged = judge({ allowable, floor: 0, beyond: null, unassessed }, value, value, 'samples');
  const sampled = `range over ${poses.length / chain.n} poses of ${loads.map((load) => load.name).join(', ')}, in any order`;
  return {
    ...head,
    ...proof,
    value,
    ...peak(chain, section, poses, loads),
    allowable,
    ...judged,
    reason: judged.reason === null ? sampled : `${judged.reason}: ${sampled}`,
    source: `${FATIGUE_RULE.source}; endurance strength${cycles === null ? '' : ` at ${cycles} cycles`} over ${target.value} (${target.given ? 'arm file' : `default: ${target.source}`})`,
    where: placeName(parts, section.shaft.points[section.point]!.station),
  };
}

/** Of the poses looked at, the one that bends the section most (free parts of a case apart), as a place to look at. */
function peak(
  chain: Chain,
  { parts, shaft, point, side }: Section,
  poses: Float64Array,
  loads: readonly ChainCase[],
): Pick<CheckRow, 'case' | 'pose' | 'wrench'> {
  const { n } = chain;
  const answer = shaftForms(shaft.beam, shaft.loading, shaft.points[point]!.station, side);
  const forms = 'unassessed' in answer ? [] : answer;
  const scratch = poseScratch(n);
  const out = new Float64Array(WRENCH * n);
  const file = new Float64Array(WRENCH);
  let most = Number.NEGATIVE_INFINITY;
  let found = { case: '', pose: [] as readonly number[] };
  for (const load of loads) {
    for (let o = 0; o < poses.length; o += n) {
      const pose = poses.subarray(o, o + n);
      staticLoads(chain, load, pose, out, scratch);
      const wrench = out.subarray(WRENCH * parts.joint, WRENCH * parts.joint + WRENCH);
      const size = Math.hypot(...radialVector(forms, wrench, 0));
      if (!(size > most)) continue;
      most = size;
      found = { case: load.name, pose: Array.from(pose) };
      wrenchToFile(chain, parts.joint, wrench, 0, file);
    }
  }
  return { ...found, wrench: { force: [file[0]!, file[1]!, file[2]!], moment: [file[3]!, file[4]!, file[5]!] } };
}
