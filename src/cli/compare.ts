/** `armload compare`: one joint on a clevis and on a cantilever. */
import { compareTable, layoutTable, spanTable } from '../report/compareTables.ts';
import { secondsText } from '../report/shown.ts';
import { type CompareResult, compareArm, type LayoutResult } from '../studies/compareArm.ts';
import { planCompare } from '../studies/comparePlan.ts';
import { fromSI, toSI } from '../units/unit.ts';
import { chooseCases, onlyCases } from './chooseCases.ts';
import { drawTable } from './drawTable.ts';
import { EXIT, type ExitCode, UsageError } from './exit.ts';
import { openArm } from './openArm.ts';
import { print, printCaution, printJson, warn } from './output.ts';
import { exitOf, rowObject } from './rowObjects.ts';
import { type ComparisonOptions, runComparison } from './runComparison.ts';

export interface CompareOptions extends ComparisonOptions {
  /** CSV table of the user's own bearings. */
  readonly bearings?: string;
  readonly joint: string;
  readonly case?: readonly string[];
  /** mm. */
  readonly clevisSpan?: number;
  readonly cantileverSpan?: number;
  readonly overhang?: number;
  readonly side?: '+' | '-';
  readonly json?: boolean;
}

export async function compare(file: string, options: CompareOptions): Promise<ExitCode> {
  const opened = await openArm(file, options.json === true, options.bearings);
  const { arm, chain } = onlyCases(opened, chooseCases(opened.arm, options.case));
  const metres = (mm: number | undefined) => (mm === undefined ? undefined : toSI(mm, 'mm'));
  const plan = planCompare(arm, chain, options.joint, {
    clevisSpan: metres(options.clevisSpan),
    cantileverSpan: metres(options.cantileverSpan),
    overhang: metres(options.overhang),
    side: options.side,
  });
  if ('refused' in plan) throw new UsageError(plan.refused);
  const looked = await runComparison(arm, chain, plan, options);
  if (looked.rows.length === 0) {
    warn('stopped before there was anything to compare');
    if (options.json) printJson(arm, { joint: plan.joint, partial: true });
    return EXIT.interrupted;
  }
  const result = compareArm(plan, looked.rows);
  if (options.json) {
    printJson(arm, {
      ...looked.facts,
      partial: looked.partial,
      seconds: looked.seconds,
      method: looked.method,
      ...resultObject(result),
    });
  } else {
    print(`${arm.name}, joint "${result.joint}": clevis and cantilever over ${looked.over}\n`);
    print(`${drawTable(layoutTable(result))}\n\nTaken: ${result.assumptions.join('; ')}.\n`);
    print(`${drawTable(compareTable(result))}\n\nratio: cantilever over clevis\n`);
    print(`${drawTable(spanTable(result))}\n\n${looked.method}`);
    if (looked.partial) warn('stopped: PARTIAL, the best so far');
    warn(`searched in ${secondsText(looked.seconds)}`);
    printCaution();
  }
  return looked.partial ? EXIT.interrupted : exitOf(looked.rows, false);
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
