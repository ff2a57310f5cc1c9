/** `armload pose`: joint loads and bearing loads at one pose. */
import { bearingLoadTable, jointLoadTable } from '../report/poseTable.ts';
import { rowsTable } from '../report/rowsTable.ts';
import { degrees, poseText } from '../report/shown.ts';
import { fixedText } from '../report/table.ts';
import { armCapacity, assessPose } from '../studies/assess.ts';
import { outsideTravel, poseArm } from '../studies/poseArm.ts';
import type { CheckRow, PoseJoint, PoseResult } from '../studies/results.ts';
import { type TipPose, tipAtPose } from '../studies/tipAtPose.ts';
import { toSI } from '../units/unit.ts';
import { chooseCases } from './chooseCases.ts';
import { drawTable } from './drawTable.ts';
import { EXIT, type ExitCode, UsageError } from './exit.ts';
import { openArm } from './openArm.ts';
import { print, printCaution, printJson, warn, warnAll } from './output.ts';
import { armObjects, exitOf, rowObject } from './rowObjects.ts';
import { isJudged } from './shownRows.ts';

export interface PoseOptions {
  /** CSV table of the user's own bearings. */
  readonly bearings?: string;
  /** Degrees. */
  readonly at: readonly number[];
  readonly case?: readonly string[];
  readonly json?: boolean;
  readonly strict?: boolean;
}

export async function pose(file: string, options: PoseOptions): Promise<ExitCode> {
  const { arm, chain } = await openArm(file, options.json === true, options.bearings);
  if (options.at.length !== chain.n) {
    const angles = `${options.at.length} ${options.at.length === 1 ? 'angle' : 'angles'}`;
    throw new UsageError(`--at has ${angles}, but the arm turns in ${chain.n}: ${chain.names.join(', ')}`);
  }
  const cases = chooseCases(arm, options.case);
  const radians = options.at.map((angle) => toSI(angle, '°'));
  const warnings = outsideTravel(chain, radians).map(
    ({ joint, angle, from, to }) =>
      `joint "${joint}" at ${degrees(angle)}° is outside its travel of ${degrees(from)}° to ${degrees(to)}°`,
  );
  warnAll(warnings);
  const results = poseArm(arm, chain, radians, cases);
  const tips = tipAtPose(arm, chain, radians, cases);
  const assessed = assessPose(arm, chain, armCapacity(arm, chain), radians, cases).map(({ rows }, k) => [
    ...rows,
    tips[k]!.row,
  ]);
  if (options.json) {
    printJson(arm, { results: results.map((result, k) => resultObject(result, assessed[k]!, tips[k]!)), warnings });
  } else {
    print(`${arm.name}: loads at the pose ${poseText(radians)} °\n`);
    results.forEach((result, k) => {
      print(`${resultText(result, assessed[k]!, tips[k]!)}\n`);
    });
    print("Loads ON the joint and its bearings, in the frame of the joint's housing; moments about the joint origin.");
    printCaution();
  }
  const code = exitOf(assessed.flat(), options.strict === true);
  if (results.every((result) => result.joints.every(computed))) return code;
  warn('some loads could not be computed');
  return EXIT.over;
}

function computed(joint: PoseJoint): boolean {
  const bearings = Object.values(joint.bearings);
  const numbers = [...joint.force, ...joint.moment, ...bearings.flatMap((b) => [b.radial, b.axial, b.moment ?? 0])];
  return numbers.every(Number.isFinite);
}

/** Where the tip error comes from, in a sentence. */
function tipText({ made }: TipPose): string[] {
  if (!made) return [];
  const mm = (metres: number) => fixedText(metres * 1000, 3);
  const joints = made.joints.map((name, k) => `${name} ${mm(made.shares[k]!)}`).join(', ');
  return [`Tip error in mm, by joint: ${joints}; of play ${mm(made.play)}, of springing ${mm(made.spring)}.`];
}

function resultText(result: PoseResult, checks: readonly CheckRow[], tip: TipPose): string {
  const judged = checks.filter(isJudged);
  const bearings = bearingLoadTable(result);
  const free = result.free
    ? `\nFree: ${result.free}. Joint loads are without it; each bearing load is its own worst over it.`
    : '';
  return [
    `Case "${result.case}"${free}`,
    drawTable(jointLoadTable(result)),
    bearings.rows.length > 0 ? drawTable(bearings) : 'No joint has a support, so there are no bearing loads.',
    ...(judged.length > 0 ? [drawTable(rowsTable(judged, { title: 'Checks', onePose: true, footnotes: true }))] : []),
    ...tipText(tip),
  ].join('\n\n');
}

/** The contract's shape: degrees, newtons, vectors in the housing frame. */
function resultObject(
  result: PoseResult,
  checks: readonly CheckRow[],
  { made }: TipPose,
): Readonly<Record<string, unknown>> {
  return {
    case: result.case,
    pose_deg: result.pose.map(degrees),
    free: result.free,
    joints: result.joints.map((joint) => ({
      joint: joint.joint,
      force_N: joint.force,
      moment_Nm: joint.moment,
      torque_Nm: joint.torque,
      bearings: Object.fromEntries(
        Object.entries(joint.bearings).map(([name, load]) => [
          name,
          {
            radial_N: load.radial,
            radial_vector_N: load.radialVector,
            axial_N: load.axial,
            ...(load.moment === null ? {} : { moment_Nm: load.moment }),
          },
        ]),
      ),
      checks: checks.filter((row) => row.jointIndex >= 0 && row.joint === joint.joint).map(rowObject),
    })),
    whole_arm: armObjects(checks),
    tip_error: made && {
      play_m: made.play,
      spring_m: made.spring,
      shares: made.joints.map((joint, k) => ({ joint, share_m: made.shares[k]! })),
    },
  };
}
