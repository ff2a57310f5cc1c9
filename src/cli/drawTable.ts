/** A table as lines of text: a rule under the titles, two blanks between columns, numbers on the right. */
import Cells from 'cli-table3';
import { type Column, cellText, columnTitle, type Table } from '../report/table.ts';

const NO_LINES = {
  top: '',
  'top-mid': '',
  'top-left': '',
  'top-right': '',
  bottom: '',
  'bottom-mid': '',
  'bottom-left': '',
  'bottom-right': '',
  left: '',
  'left-mid': '',
  mid: '',
  'mid-mid': '',
  right: '',
  'right-mid': '',
  middle: '  ',
} as const;

/** Cells of one column; numbers of differing decimals are filled up with blanks so that their points stand under each other. */
function columnTexts(table: Table, column: Column, k: number): readonly string[] {
  const cells = table.rows.map((row, r) => cellText(column, row[k]!, r));
  if (typeof column.decimals !== 'object' || column.decimals === null) return cells;
  const tail = (text: string) => (text.includes('.') ? text.length - text.indexOf('.') : 0);
  const most = Math.max(...cells.map(tail));
  return cells.map((text) => text + ' '.repeat(most - tail(text)));
}

export function drawTable(table: Table): string {
  const aligns = table.columns.map((column) => (column.decimals === null ? 'left' : 'right'));
  const drawn = new Cells({
    chars: NO_LINES,
    style: { head: [], border: [], 'padding-left': 0, 'padding-right': 0 },
    colAligns: aligns,
  });
  const titles = table.columns.map(columnTitle);
  const texts = table.columns.map((column, k) => columnTexts(table, column, k));
  const body = table.rows.map((_, r) => texts.map((column) => column[r]!));
  const rule = titles.map((title, k) => '─'.repeat(Math.max(title.length, ...body.map((row) => row[k]!.length))));
  drawn.push(titles, rule, ...body);
  const lines = drawn
    .toString()
    .split('\n')
    .map((line) => line.trimEnd());
  const notes = (table.notes ?? []).map((note, k) => `  ${k + 1}: ${note}`);
  return [...(table.title ? [table.title] : []), ...lines, ...notes].join('\n');
}
