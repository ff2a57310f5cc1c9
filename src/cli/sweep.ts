/** `armload sweep`: the worst of every check over a grid of poses. */
import { gridChoiceText } from '../report/gridText.ts';
import { secondsText } from '../report/shown.ts';
import { armCapacity, assessRows, byJoint } from '../studies/assess.ts';
import { sweepChecks } from '../studies/sweepChecks.ts';
import { chooseCases } from './chooseCases.ts';
import { EXIT, type ExitCode } from './exit.ts';
import { type GridOptions, gridChoice } from './gridChoice.ts';
import { openArm } from './openArm.ts';
import { print, printCaution, printJson, warn } from './output.ts';
import { exitOf, jointObjects } from './rowObjects.ts';
import { runSweep } from './runSweep.ts';
import { rowTables } from './shownRows.ts';
import { sweepText } from './sweepText.ts';

export interface SweepOptions extends GridOptions {
  readonly case?: readonly string[];
  readonly eachCase?: boolean;
  readonly json?: boolean;
  readonly strict?: boolean;
  readonly workers?: number;
}

export async function sweep(file: string, options: SweepOptions): Promise<ExitCode> {
  const { arm, chain } = await openArm(file, options.json === true);
  const cases = chooseCases(arm, options.case);
  const { choice, poses } = gridChoice(chain, options);
  const { checks, leftOut } = sweepChecks(arm, chain, poses, cases);
  const result = await runSweep(arm, chain, { choice, cases, checks, poses, workers: options.workers });
  const scope = result.partial ? 'part of the grid' : 'grid';
  const swept = options.eachCase ? result.eachCase : result.rows;
  const rows = byJoint([...assessRows(chain, armCapacity(arm, chain), swept, { scope }), ...leftOut]);
  if (options.json) {
    printJson(arm, {
      poses: result.poses,
      poses_done: result.done,
      partial: result.partial,
      seconds: result.seconds,
      joints: jointObjects(rows),
    });
  } else {
    print(
      `${arm.name}: worst loads over ${sweepText(result, cases?.length ?? arm.cases.length)}, ${gridChoiceText(choice)}\n`,
    );
    print(`${rowTables(rows)}\n`);
    print("Joint loads in the frame of the joint's housing; moment: tilting moment about the joint origin.");
    print('A grid finds a bad pose; it does not show that there is none worse between its samples.');
    warn(`swept in ${secondsText(result.seconds)}`);
    printCaution();
  }
  if (result.partial) return EXIT.interrupted;
  return exitOf(rows, options.strict === true);
}
