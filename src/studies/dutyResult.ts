/** What the duty study hands on: plain data, SI and radians. */
import type { BearingLife, BushingFace } from '../capacity/duty/index.ts';

/** One bearing in one segment. */
export interface PartSegment {
  /** Revolutions a second while the segment lasts; swings count by the angle they sweep. */
  readonly turning: number;
  /** Equivalent load of the segment that is safe, and one that is attained (the same along a path), N. NaN: nothing turns, or no load. */
  readonly load: number;
  readonly attained: number;
  /** Hardest load met, N, and where. */
  readonly peak: number;
  readonly pose: readonly number[];
  /** Joint load there, canonical housing frame; without what the case leaves free. [6] */
  readonly wrench: readonly number[];
}

/** One joint in one segment. */
export interface JointSegment {
  /** rad/s swept on the mean. */
  readonly swept: number;
  readonly peakSpeed: number;
  readonly reversalsPerSecond: number;
  /** Half the size of each stroke, rad. */
  readonly halfSwings: readonly number[];
}

export interface SegmentResult {
  readonly case: string;
  readonly share: number;
  readonly kind: 'path' | 'anywhere';
  /** s of one pass; null anywhere. */
  readonly duration: number | null;
  readonly samples: number;
  readonly joints: readonly JointSegment[];
  /** Whether the smooth motion between the poses leaves the travel. */
  readonly leavesTravel: boolean;
  readonly notes: readonly string[];
}

/** A bearing over the whole duty. */
export interface DutyBearing {
  readonly joint: string;
  readonly jointIndex: number;
  readonly side: 'A' | 'B' | 'ring';
  /** Of a bushing: where it slides; `bore` for all else. */
  readonly face: BushingFace;
  readonly kind: 'rolling' | 'bushing' | null;
  /** In the order of the duty; empty where the bearing is not known. */
  readonly segments: readonly PartSegment[];
  /** Rolling bearings: with the safe loads, and with those attained. */
  readonly life: BearingLife | null;
  readonly attainedLife: BearingLife | null;
  readonly bushing: BushingDuty | null;
  /** Why there is no life (or no PV) and what to fill in. */
  readonly unassessed: string | null;
  /** What was assumed. */
  readonly notes: readonly string[];
  /** What a life says little about: small arcs, loads beyond the formula or too small to roll. */
  readonly warnings: readonly string[];
}

/** A plain bushing over the duty: of all segments the worst, since each may last until the bushing is warm. */
export interface BushingDuty {
  /** Mean of pressure times sliding speed, Pa·m/s: safe, and attained. */
  readonly pv: number;
  readonly attainedPv: number;
  /** Segment of `pv`. */
  readonly segment: number;
  /** m/s. */
  readonly peakSpeed: number;
  /** Over the whole duty: m slid a second, and the mean of pressure times speed, Pa·m/s, that wears it: safe, and attained. */
  readonly slid: number;
  readonly wearRate: number;
  readonly attainedWearRate: number;
}

export interface DutyResult {
  readonly segments: readonly SegmentResult[];
  readonly bearings: readonly DutyBearing[];
  readonly system: SystemLife;
  readonly reliability: number;
}

/** Life that all rolling bearings of the arm reach together, s of duty time. */
export interface SystemLife {
  /** With 90 % reliability, and at the reliability asked for (times a1: the same distribution); NaN where a life is not known. */
  readonly basic: number;
  readonly life: number;
  readonly attained: number;
  /** Bearings counted. */
  readonly bearings: number;
  readonly unassessed: string | null;
}
