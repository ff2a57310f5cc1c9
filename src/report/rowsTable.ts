/** Check rows of a sweep, a worst-pose search or an assessment as one table; only the columns that the rows fill. */
import { type CheckRow, isMissing } from '../studies/results.ts';
import type { UnitSystem } from '../units/format.ts';
import { poseText, shownUnit } from './shown.ts';
import { type Cell, type Column, decimalsFor, type Table } from './table.ts';

export interface RowsTableOptions {
  readonly title?: string;
  readonly system?: UnitSystem;
  /** Each joint's name on its first row only (default); false writes it on every row, as a spreadsheet wants it. */
  readonly group?: boolean;
  /** The rows are of one case and pose that stand above the table: leaves out their columns, and what every pass of a pose says. */
  readonly onePose?: boolean;
  /** Reasons as numbered notes under the table instead of in full on every row. */
  readonly footnotes?: boolean;
}

function words(title: string): Column {
  return { title, unit: null, decimals: null };
}

/** Decimals row by row: those that each unit's largest value needs. */
function valueDecimals(rows: readonly CheckRow[], system: UnitSystem): readonly number[] {
  const byUnit = new Map<string, number[]>();
  for (const row of rows) {
    const values = byUnit.get(row.unit) ?? [];
    byUnit.set(row.unit, values);
    const shown = shownUnit(row.unit, system);
    for (const value of [row.value, row.bound, row.allowable]) if (value !== null) values.push(shown.of(value));
  }
  const decimals = new Map([...byUnit].map(([unit, values]) => [unit, decimalsFor(values)]));
  return rows.map((row) => decimals.get(row.unit)!);
}

/** What a row is held against, in words: never silent about what failed or was not assessed. */
function verdictText(row: CheckRow): string | null {
  return Number.isNaN(row.value) && !isMissing(row) ? 'failed' : row.verdict;
}

export function rowsTable(rows: readonly CheckRow[], options: RowsTableOptions = {}): Table {
  const system = options.system ?? 'metric';
  const group = options.group ?? true;
  const bounded = rows.some((row) => row.bound !== null);
  const judged = rows.some((row) => verdictText(row) !== null);
  const onePose = options.onePose ?? false;
  const reason = (row: CheckRow) => (onePose && row.verdict === 'pass' ? '' : (row.reason ?? ''));
  const explained = judged && rows.some((row) => reason(row) !== '');
  const notes = [...new Set(rows.map(reason).filter((text) => text !== ''))];
  const why = (row: CheckRow) => {
    const text = reason(row);
    return options.footnotes && text !== '' ? `${notes.indexOf(text) + 1}` : text;
  };
  const decimals = valueDecimals(rows, system);
  const columns: Column[] = [
    words('joint'),
    words('bearing'),
    words('check'),
    { title: bounded ? 'found' : onePose ? 'here' : 'worst', unit: null, decimals },
    ...(bounded ? [{ title: 'bound', unit: null, decimals }] : []),
    words('unit'),
    ...(bounded ? [{ title: 'gap', unit: '%', decimals: 3 }, words('certified')] : []),
    ...(judged
      ? [
          { title: 'allowable', unit: null, decimals },
          { title: 'utilisation', unit: null, decimals: 3 },
          words('verdict'),
        ]
      : []),
    ...(onePose ? [] : [words('case'), { title: 'pose', unit: '°', decimals: null }]),
    ...(explained ? [words(options.footnotes ? 'note' : 'why')] : []),
  ];
  let last = -1;
  const body = rows.map((row): Cell[] => {
    const shown = shownUnit(row.unit, system);
    const value = (v: number | null) => (v === null ? null : shown.of(v));
    const name = group && row.jointIndex === last ? '' : row.joint;
    last = row.jointIndex;
    return [
      name,
      row.bearing,
      row.where ? `${row.check} (${row.where})` : row.check,
      isMissing(row) ? null : value(row.value),
      ...(bounded ? [value(row.bound)] : []),
      shown.unit,
      ...(bounded
        ? [
            row.gap === null || row.bound === Number.POSITIVE_INFINITY ? null : row.gap * 100,
            row.certified === null ? null : row.certified ? 'yes' : 'no',
          ]
        : []),
      ...(judged ? [value(row.allowable), row.utilisation, verdictText(row)] : []),
      ...(onePose ? [] : isMissing(row) ? [null, null] : [row.case, poseText(row.pose)]),
      ...(explained ? [why(row)] : []),
    ];
  });
  return {
    title: options.title ?? null,
    columns,
    rows: body,
    ...(options.footnotes && notes.length > 0 ? { notes } : {}),
  };
}
