import type { ArmFile, CaseFile, JointFile, SegmentFile } from './armFile.ts';
import { OWN_WEIGHT } from './armFromFile.ts';
import { checkInertia } from './inertiaRule.ts';
import type { Issue, IssuePath } from './issue.ts';
import { type Findings, type Known, knownVector, newFindings } from './known.ts';
import { unitVector } from './rotation.ts';
import { checkSupports } from './supportRules.ts';

type KnownFile = Known<ArmFile>;

/** How far the shares of a duty may sum from 1: thirds written with six digits pass. */
const SHARE_ROUNDING = 1e-5;
/** How far outside its travel a joint of a duty path may stand, degrees: rounding only. */
const TRAVEL_ROUNDING = 1e-9;

function checkNames(entries: readonly (Known<{ name: string }> | undefined)[], list: string, findings: Findings): void {
  const first = new Map<string, number>();
  for (const [i, entry] of entries.entries()) {
    const name = entry?.name;
    if (name === undefined) continue;
    const before = first.get(name);
    if (before === undefined) first.set(name, i);
    else {
      const expected = `a name used once; ${list}[${before}] has it already`;
      findings.problem('duplicate-name', [list, i, 'name'], JSON.stringify(name), expected);
    }
  }
}

function checkDirection(
  v: Known<readonly [number, number, number]> | undefined,
  path: IssuePath,
  findings: Findings,
): void {
  const vector = knownVector(v);
  if (vector && !unitVector(vector))
    findings.problem('zero-vector', path, `[${vector.join(', ')}]`, 'a direction, not all zero');
}

function checkJoint(joint: Known<JointFile>, i: number, findings: Findings): void {
  const path = ['joints', i];
  const link = joint.link;
  if (link && link.mass_kg !== undefined && link.mass_kg > 0 && !('centre_mm' in link)) {
    findings.problem(
      'missing',
      [...path, 'link', 'centre_mm'],
      'nothing',
      'a list of 3 numbers (mm), because the link has mass',
    );
  }
  checkInertia(link?.inertia_kg_m2, [...path, 'link', 'inertia_kg_m2'], findings);
  if (joint.kind !== 'revolute') return;
  checkDirection(joint.axis, [...path, 'axis'], findings);
  const [from, to] = joint.travel_deg ?? [];
  if (from !== undefined && to !== undefined && from > to) {
    findings.problem('wrong-order', [...path, 'travel_deg'], `${from} to ${to}`, 'the lowest angle first');
  }
}

/** Indices of the revolute joints, or null where the kind of one is not known. */
function revoluteJoints(file: KnownFile): number[] | null {
  if (!file.joints || file.joints.some((joint) => joint?.kind === undefined)) return null;
  return file.joints.flatMap((joint, i) => (joint?.kind === 'revolute' ? [i] : []));
}

function checkCount(
  list: readonly unknown[] | undefined,
  turning: readonly number[] | null,
  path: IssuePath,
  findings: Findings,
): void {
  if (!list || !turning || list.length === turning.length) return;
  const found = list.length === 1 ? '1 entry' : `${list.length} entries`;
  findings.problem('wrong-length', path, found, `${turning.length}, one for every revolute joint`);
}

function checkCase(entry: Known<CaseFile>, i: number, turning: readonly number[] | null, findings: Findings): void {
  const path = ['cases', i];
  const direction = entry.tip_force?.direction;
  if (typeof direction === 'object') {
    if ('base' in direction) checkDirection(direction.base, [...path, 'tip_force', 'direction', 'base'], findings);
    else if ('tool' in direction) checkDirection(direction.tool, [...path, 'tip_force', 'direction', 'tool'], findings);
  }
  checkInertia(entry.payload?.inertia_kg_m2, [...path, 'payload', 'inertia_kg_m2'], findings);
  if (!entry.motion) return;
  checkCount(entry.motion.speed_deg_s, turning, [...path, 'motion', 'speed_deg_s'], findings);
  checkCount(entry.motion.accel_deg_s2, turning, [...path, 'motion', 'accel_deg_s2'], findings);
  const mass = entry.payload?.mass_kg;
  if (mass !== undefined && mass > 0 && !('inertia_kg_m2' in entry.payload!)) {
    const expected = 'the inertia of the payload, because the case has motion; it counts as a point mass';
    findings.warn('point-mass', [...path, 'payload', 'inertia_kg_m2'], 'nothing', expected);
  }
}

/** Every link that a revolute joint moves needs its inertia where a case has motion. */
function checkMovingInertia(file: KnownFile, findings: Findings): void {
  const moving = file.cases?.find((entry) => entry && 'motion' in entry);
  if (!moving) return;
  const first = file.joints?.findIndex((joint) => joint?.kind === 'revolute') ?? -1;
  if (first < 0) return;
  for (const [i, joint] of file.joints!.entries()) {
    const link = joint?.link;
    if (i < first || !link || 'inertia_kg_m2' in link || link.mass_kg === undefined || link.mass_kg === 0) continue;
    const expected = `the inertia of the link, because case ${JSON.stringify(moving.name ?? '')} has motion`;
    findings.problem('missing', ['joints', i, 'link', 'inertia_kg_m2'], 'nothing', expected);
  }
}

function checkPath(
  segment: Known<SegmentFile>,
  at: IssuePath,
  file: KnownFile,
  turning: readonly number[] | null,
  findings: Findings,
): void {
  const outside = new Set<number>();
  let lengthSaid = false;
  let orderSaid = false;
  let before = Number.NEGATIVE_INFINITY;
  for (const [k, row] of (segment.path ?? []).entries()) {
    if (!row) continue;
    const path = [...at, 'path', k];
    if (row.time_s !== undefined) {
      if (row.time_s <= before && !orderSaid) {
        orderSaid = true;
        findings.problem(
          'wrong-order',
          [...path, 'time_s'],
          String(row.time_s),
          `later than the row before it, ${before}`,
        );
      }
      before = row.time_s;
    }
    if (!turning || !row.pose_deg) continue;
    if (row.pose_deg.length !== turning.length) {
      // Said once a path: a file of many rows usually has the same mistake in all.
      if (!lengthSaid) checkCount(row.pose_deg, turning, [...path, 'pose_deg'], findings);
      lengthSaid = true;
      continue;
    }
    for (const [j, angle] of row.pose_deg.entries()) {
      const joint = file.joints?.[turning[j]!];
      if (outside.has(j) || angle === undefined || joint?.kind !== 'revolute') continue;
      const [from, to] = joint.travel_deg ?? [];
      if (from === undefined || to === undefined || to - from >= 360) continue;
      if (angle >= from - TRAVEL_ROUNDING && angle <= to + TRAVEL_ROUNDING) continue;
      outside.add(j);
      const whose = joint.name === undefined ? 'of the joint' : `of ${JSON.stringify(joint.name)}`;
      findings.problem(
        'outside-travel',
        [...path, 'pose_deg', j],
        String(angle),
        `within the travel ${whose}, ${from} to ${to}`,
      );
    }
  }
}

function checkDuty(file: KnownFile, turning: readonly number[] | null, findings: Findings): void {
  if (!file.duty) return;
  // A list of cases with a mistake in one name cannot tell that a name is missing.
  const cases = file.cases;
  const listed = cases && cases.length > 0 ? cases.map((entry) => entry?.name) : [OWN_WEIGHT];
  const allKnown = 'cases' in file === (cases !== undefined) && listed.every((name) => name !== undefined);
  let sum = 0;
  for (const [i, segment] of file.duty.entries()) {
    const path = ['duty', i];
    sum += segment?.share ?? Number.NaN;
    if (!segment) continue;
    if (segment.case !== undefined && allKnown && !listed.includes(segment.case)) {
      const names = listed.slice(0, 8).map((name) => JSON.stringify(name));
      findings.problem(
        'unknown-name',
        [...path, 'case'],
        JSON.stringify(segment.case),
        `the name of a case: ${names.join(', ')}`,
      );
    }
    const hasPath = 'path' in segment;
    if (hasPath === 'anywhere' in segment) {
      findings.problem(
        'conflict',
        path,
        hasPath ? 'both path and anywhere' : 'neither path nor anywhere',
        'one of the two',
      );
    }
    checkCount(segment.anywhere?.cycles_per_min, turning, [...path, 'anywhere', 'cycles_per_min'], findings);
    checkPath(segment, path, file, turning, findings);
  }
  if (Math.abs(sum - 1) > SHARE_ROUNDING) {
    findings.problem('wrong-sum', ['duty'], `shares that sum to ${Number(sum.toPrecision(7))}`, 'shares that sum to 1');
  }
}

/**
 * The rules between fields, judged on what is known of the file. `issues` make it invalid; `warnings` do not, but each names something that will
 * be missed or is doubtful: a bearing that the table lacks, a payload taken as a point mass, a seat that does not fit, bearings that overlap.
 */
export function checkRules(file: KnownFile): { readonly issues: Issue[]; readonly warnings: Issue[] } {
  const findings = newFindings();
  const joints = file.joints ?? [];
  const turning = revoluteJoints(file);
  checkNames(joints, 'joints', findings);
  for (const [i, joint] of joints.entries()) if (joint) checkJoint(joint, i, findings);
  if (turning && joints.length > 0 && turning.length === 0) {
    findings.problem('nothing-turns', ['joints'], 'only fixed joints', 'at least one revolute joint');
  }
  checkSupports(file, findings);
  checkNames(file.cases ?? [], 'cases', findings);
  for (const [i, entry] of (file.cases ?? []).entries()) if (entry) checkCase(entry, i, turning, findings);
  checkMovingInertia(file, findings);
  checkDuty(file, turning, findings);
  return { issues: findings.issues, warnings: findings.warnings };
}
