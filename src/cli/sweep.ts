/** `armload sweep`: the worst of every check over a grid of poses; beside it what no single pose tells. */
import { gridChoiceText } from '../report/gridText.ts';
import { secondsText } from '../report/shown.ts';
import { armCapacity, assessRows, byJoint } from '../studies/assess.ts';
import { sweepChecks } from '../studies/sweepChecks.ts';
import { chooseCases } from './chooseCases.ts';
import { EXIT, type ExitCode } from './exit.ts';
import { type GridOptions, gridChoice } from './gridChoice.ts';
import { openArm } from './openArm.ts';
import { print, printCaution, printJson, warn } from './output.ts';
import { armObjects, exitOf, jointObjects } from './rowObjects.ts';
import { lastingRowsFor } from './runLasting.ts';
import { runSweep } from './runSweep.ts';
import { rowTables } from './shownRows.ts';
import { sweepText } from './sweepText.ts';

export interface SweepOptions extends GridOptions {
  /** CSV table of the user's own bearings. */
  readonly bearings?: string;
  readonly case?: readonly string[];
  readonly eachCase?: boolean;
  readonly json?: boolean;
  readonly strict?: boolean;
  readonly workers?: number;
}

export async function sweep(file: string, options: SweepOptions): Promise<ExitCode> {
  const { arm, chain } = await openArm(file, options.json === true, options.bearings);
  const cases = chooseCases(arm, options.case);
  const { choice, poses } = gridChoice(chain, options);
  const { checks, leftOut } = sweepChecks(arm, chain, poses, cases);
  const result = await runSweep(arm, chain, { choice, cases, checks, poses, workers: options.workers });
  const scope = result.partial ? 'part of the grid' : 'grid';
  const swept = options.eachCase ? result.eachCase : result.rows;
  const lasting = result.partial
    ? null
    : await lastingRowsFor({ arm, case: options.case, eachCase: options.eachCase, workers: options.workers });
  const stopped = lasting === null;
  const searched = [...assessRows(chain, armCapacity(arm, chain), swept, { scope }), ...leftOut];
  const rows = byJoint([...searched, ...(lasting ?? [])]);
  if (options.json) {
    printJson(arm, {
      poses: result.poses,
      poses_done: result.done,
      partial: stopped,
      seconds: result.seconds,
      joints: jointObjects(rows),
      whole_arm: armObjects(rows),
    });
  } else {
    print(
      `${arm.name}: worst loads over ${sweepText(result, cases?.length ?? arm.cases.length)}, ${gridChoiceText(choice)}\n`,
    );
    print(`${rowTables(rows)}\n`);
    print("Joint loads in the frame of the joint's housing; moment: tilting moment about the joint origin.");
    print('A grid finds a bad pose; it does not show that there is none worse between its samples.');
    if (stopped && !result.partial) warn('stopped: PARTIAL, without life, fatigue and play');
    warn(`swept in ${secondsText(result.seconds)}`);
    printCaution();
  }
  if (stopped) return EXIT.interrupted;
  return exitOf(rows, options.strict === true);
}
