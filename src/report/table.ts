/**
 * A table as plain data: the command line, the page and the printed report draw the same one. Numbers stay numbers until they are
 * drawn (`cellText`) or written at full precision (`csvText`).
 */

export interface Column {
  readonly title: string;
  /** Of every number in the column; null where there is none or it stands in a column of its own. */
  readonly unit: string | null;
  /** Decimals of the numbers of this column as text, for all rows or row by row; null in a column of words. */
  readonly decimals: number | readonly number[] | null;
}

/** Words, a number in the unit of its column, or nothing. */
export type Cell = string | number | null;

export interface Table {
  readonly title: string | null;
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Cell[])[];
  /** Sentences under the table, to which cells refer by number from 1. */
  readonly notes?: readonly string[];
}

export const NOTHING = '–';

/** A number with fixed decimals, no negative zero; what is not finite is named, so that it cannot be read as a value. */
export function fixedText(value: number, decimals: number): string {
  if (Number.isNaN(value)) return 'failed';
  if (!Number.isFinite(value)) return value > 0 ? 'infinite' : '-infinite';
  const text = value.toFixed(decimals);
  return Number(text) === 0 ? (0).toFixed(decimals) : text;
}

/** Decimals that show the largest of some numbers with `digits` significant digits, 0 to 6; 1 where all would read 0. */
export function decimalsFor(values: Iterable<number>, digits = 4): number {
  let largest = 0;
  for (const value of values) if (Number.isFinite(value)) largest = Math.max(largest, Math.abs(value));
  if (largest < 5e-7) return 1;
  return Math.min(6, Math.max(0, digits - 1 - Math.floor(Math.log10(largest))));
}

/** A cell as text; `row` counts from 0. */
export function cellText(column: Column, cell: Cell, row: number): string {
  if (cell === null) return NOTHING;
  if (typeof cell === 'string') return cell;
  const { decimals } = column;
  return fixedText(cell, (typeof decimals === 'object' ? decimals?.[row] : decimals) ?? 3);
}

export function columnTitle(column: Column): string {
  return column.unit ? `${column.title} ${column.unit}` : column.title;
}

// A spreadsheet takes a text that begins so for a formula; an apostrophe before it keeps it a text. Numbers and poses are none.
const FORMULA = /^[=+\-@\t\r]/;
const FIGURES = /^[-+\d.,eE ]+$/;

function csvCell(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'number') return Number.isFinite(cell) ? String(cell) : fixedText(cell, 0);
  const text = FORMULA.test(cell) && !FIGURES.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** Comma-separated text (RFC 4180: CRLF, quotes doubled) with one line of titles; numbers at full precision. */
export function csvText(table: Table): string {
  const lines = [table.columns.map(columnTitle), ...table.rows];
  return lines.map((line) => `${line.map(csvCell).join(',')}\r\n`).join('');
}
