/** Check rows as tables for people: the loads, then what is held against a limit, then what asks for more than one pose. */
import { rowsTable } from '../report/rowsTable.ts';
import { isLasting } from '../studies/lastingRows.ts';
import type { CheckRow } from '../studies/results.ts';
import { drawTable } from './drawTable.ts';

/** What is held against a limit, should be, or failed. */
export function isJudged(row: CheckRow): boolean {
  return row.verdict !== null || Number.isNaN(row.value);
}

/** Thrust and torque each way stand in the JSON; a table shows them once, by size. */
function oneWay(row: CheckRow): boolean {
  return /^(torque|thrust)[+-]$/.test(row.check);
}

export function rowTables(all: readonly CheckRow[]): string {
  const rows = all.filter((row) => !isLasting(row) && !oneWay(row));
  const loads = rows.filter((row) => !isJudged(row));
  const judged = rows.filter(isJudged);
  const lasting = all.filter(isLasting);
  const tables = [
    ...(loads.length > 0 ? [rowsTable(loads, { title: 'Loads', footnotes: true })] : []),
    ...(judged.length > 0 ? [rowsTable(judged, { title: 'Checks', footnotes: true })] : []),
    ...(lasting.length > 0 ? [rowsTable(lasting, { title: 'Life, fatigue and play', footnotes: true })] : []),
  ];
  return tables.map(drawTable).join('\n\n');
}
