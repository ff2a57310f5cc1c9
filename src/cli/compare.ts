/** `armload compare`: one joint on a clevis and on a cantilever. */
import { compareTable, layoutTable, spanTable } from '../report/compareTables.ts';
import { gridChoiceText } from '../report/gridText.ts';
import { secondsText } from '../report/shown.ts';
import { type CompareResult, compareArm, type LayoutResult } from '../studies/compareArm.ts';
import { planCompare } from '../studies/comparePlan.ts';
import { fromSI, toSI } from '../units/unit.ts';
import { chooseCases } from './chooseCases.ts';
import { drawTable } from './drawTable.ts';
import { EXIT, type ExitCode, UsageError } from './exit.ts';
import { type GridOptions, gridChoice } from './gridChoice.ts';
import { openArm } from './openArm.ts';
import { print, printCaution, printJson, warn } from './output.ts';
import { exitOf, rowObject } from './rowObjects.ts';
import { runSweep } from './runSweep.ts';
import { sweepText } from './sweep.ts';

export interface CompareOptions extends GridOptions {
  readonly joint: string;
  readonly case?: readonly string[];
  /** mm. */
  readonly clevisSpan?: number;
  readonly cantileverSpan?: number;
  readonly overhang?: number;
  readonly side?: '+' | '-';
  readonly json?: boolean;
  readonly workers?: number;
}

const METHOD =
  'The load on the joint does not depend on how it is carried: one pass over the poses, every layout and span held against every joint load of it.';

export async function compare(file: string, options: CompareOptions): Promise<ExitCode> {
  const { arm, chain } = await openArm(file, options.json === true);
  const cases = chooseCases(arm, options.case);
  const metres = (mm: number | undefined) => (mm === undefined ? undefined : toSI(mm, 'mm'));
  const plan = planCompare(arm, chain, options.joint, {
    clevisSpan: metres(options.clevisSpan),
    cantileverSpan: metres(options.cantileverSpan),
    overhang: metres(options.overhang),
    side: options.side,
  });
  if ('refused' in plan) throw new UsageError(plan.refused);
  const { choice, poses } = gridChoice(chain, options);
  const swept = await runSweep(arm, chain, { choice, cases, checks: plan.checks, poses, workers: options.workers });
  const result = compareArm(plan, swept.rows);
  if (options.json) {
    printJson(arm, {
      poses: swept.poses,
      poses_done: swept.done,
      partial: swept.partial,
      seconds: swept.seconds,
      method: METHOD,
      ...resultObject(result),
    });
  } else {
    const over = sweepText(swept, cases?.length ?? arm.cases.length);
    print(`${arm.name}, joint "${result.joint}": clevis and cantilever over ${over}, ${gridChoiceText(choice)}\n`);
    print(`${drawTable(layoutTable(result))}\n\nTaken: ${result.assumptions.join('; ')}.\n`);
    print(`${drawTable(compareTable(result))}\n\nratio: cantilever over clevis\n`);
    print(`${drawTable(spanTable(result))}\n\n${METHOD}`);
    print('A grid finds a bad pose; it does not show that there is none worse between its samples.');
    warn(`swept in ${secondsText(swept.seconds)}`);
    printCaution();
  }
  if (swept.partial) return EXIT.interrupted;
  return exitOf(swept.rows, false);
}

function millimetres(metres: number): number {
  return Number(fromSI(metres, 'mm').toPrecision(15));
}

function layoutObject(layout: LayoutResult, asFile: boolean): Readonly<Record<string, unknown>> {
  return {
    as_in_file: asFile,
    span_mm: millimetres(layout.span),
    ...(layout.arrangement === 'clevis'
      ? { offset_mm: millimetres(layout.offset) }
      : { overhang_mm: millimetres(layout.overhang), side: layout.side }),
    A_mm: millimetres(layout.stationA),
    B_mm: millimetres(layout.stationB),
    checks: layout.rows.map(rowObject),
    worst_radial: rowObject(layout.worst),
  };
}

function resultObject(result: CompareResult): Readonly<Record<string, unknown>> {
  const radial = (rows: CompareResult['spans'][number]['clevis']) => ({ A: rowObject(rows[0]), B: rowObject(rows[1]) });
  return {
    joint: result.joint,
    hub_mm: millimetres(result.hub),
    taken: result.assumptions,
    clevis: layoutObject(result.clevis, result.asFile === 'clevis'),
    cantilever: layoutObject(result.cantilever, result.asFile === 'cantilever'),
    ratios: result.ratios,
    spans: result.spans.map((row) => ({
      span_mm: millimetres(row.span),
      clevis: radial(row.clevis),
      cantilever: radial(row.cantilever),
    })),
  };
}
