/** A table as lines of text: a rule under the titles, two blanks between columns, numbers on the right. */
import Cells from 'cli-table3';
import { cellText, columnTitle, type Table } from '../report/table.ts';

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

export function drawTable(table: Table): string {
  const aligns = table.columns.map((column) => (column.decimals === null ? 'left' : 'right'));
  const drawn = new Cells({
    chars: NO_LINES,
    style: { head: [], border: [], 'padding-left': 0, 'padding-right': 0 },
    colAligns: aligns,
  });
  const titles = table.columns.map(columnTitle);
  const body = table.rows.map((row) => row.map((cell, k) => cellText(table.columns[k]!, cell)));
  const rule = titles.map((title, k) => '─'.repeat(Math.max(title.length, ...body.map((row) => row[k]!.length))));
  drawn.push(titles, rule, ...body);
  const lines = drawn
    .toString()
    .split('\n')
    .map((line) => line.trimEnd());
  return `${[...(table.title ? [table.title] : []), ...lines].join('\n')}\n`;
}
