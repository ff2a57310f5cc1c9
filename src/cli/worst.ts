/** `armload worst`: the certified worst pose of every check. */
import { secondsText } from '../report/shown.ts';
import { armCapacity, assessRows, byJoint } from '../studies/assess.ts';
import { DEFAULT_GAP, DEFAULT_SECONDS, type WorstResult } from '../studies/worstArm.ts';
import { runWorst } from '../studies/worstRun.ts';
import { chooseCases, onlyCases } from './chooseCases.ts';
import { EXIT, type ExitCode } from './exit.ts';
import { onInterrupt } from './interrupt.ts';
import { openArm } from './openArm.ts';
import { openPool } from './openPool.ts';
import { print, printCaution, printJson, warn } from './output.ts';
import { progressBar } from './progressBar.ts';
import { armObjects, exitOf, jointObjects } from './rowObjects.ts';
import { lastingRowsFor } from './runLasting.ts';
import { rowTables } from './shownRows.ts';
import { withPatience } from './withPatience.ts';

export interface WorstOptions {
  /** CSV table of the user's own bearings. */
  readonly bearings?: string;
  readonly gap?: number;
  readonly seconds?: number;
  readonly case?: readonly string[];
  readonly eachCase?: boolean;
  readonly json?: boolean;
  readonly strict?: boolean;
  readonly workers?: number;
}

const NOTHING_YET: WorstResult = { rows: [], eachCase: [], seconds: 0, certified: false, partial: true };

export async function worst(file: string, options: WorstOptions): Promise<ExitCode> {
  const opened = await openArm(file, options.json === true, options.bearings);
  const { arm, chain } = onlyCases(opened, chooseCases(opened.arm, options.case));
  const gap = options.gap ?? DEFAULT_GAP;
  const seconds = options.seconds ?? DEFAULT_SECONDS;
  const interrupt = onInterrupt();
  const bar = progressBar();
  const pool = openPool(options.workers);
  const begin = performance.now();
  let best = NOTHING_YET;
  const search = runWorst(arm, {
    pool,
    gap,
    seconds,
    signal: interrupt.signal,
    someRows: true,
    onBetter: (better) => {
      best = better;
      const closed = better.rows.filter((row) => row.certified).length;
      const share = Math.min(1, (performance.now() - begin) / (1000 * seconds));
      bar.show(share, better.rows.length === 0 ? 'first look' : `${closed} of ${better.rows.length} checks certified`);
    },
  });
  const ended = await withPatience(search, interrupt.signal).finally(() => {
    bar.clear();
    interrupt.release();
    pool.close();
  });
  const result = ended ?? best;
  const lasting = interrupt.signal.aborted
    ? null
    : await lastingRowsFor({ arm, case: options.case, eachCase: options.eachCase, workers: options.workers });
  const stopped = lasting === null;
  const capacity = armCapacity(arm, chain);
  const worstRows = assessRows(chain, capacity, options.eachCase ? result.eachCase : result.rows, { gap });
  const rows = byJoint([...worstRows, ...(lasting ?? [])]);
  if (options.json) {
    printJson(arm, {
      gap_asked: gap,
      certified: result.certified,
      partial: result.partial || stopped,
      seconds: result.seconds,
      joints: jointObjects(rows),
      whole_arm: armObjects(rows),
    });
  } else {
    print(`${arm.name}: worst loads within travel, ${caseText(arm.cases.length)}, to a gap of ${gap * 100} %\n`);
    print(`${rowTables(rows)}\n`);
    print('found: attained at the pose shown. bound: nothing within travel exceeds it. gap: (bound - found)/bound.');
    if (stopped) warn('stopped: PARTIAL, the best so far');
    else if (!result.certified) {
      const open = result.rows.filter((row) => !row.certified).length;
      warn(
        `${open} of ${result.rows.length} gaps are not closed to ${gap * 100} %; give more --seconds or a larger --gap`,
      );
    }
    warn(`searched in ${secondsText(result.seconds)}`);
    printCaution();
  }
  if (result.rows.length === 0) warn('stopped before anything was found');
  return stopped ? EXIT.interrupted : exitOf(rows, options.strict === true);
}

function caseText(cases: number): string {
  return cases === 1 ? '1 case' : `${cases} cases`;
}
