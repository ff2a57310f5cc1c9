/** A table as lines of text: a rule under the titles, two blanks between columns, numbers on the right. */
import { type Column, cellText, columnTitle, type Table } from '../report/table.ts';

/** Latin, Greek and Cyrillic letters, figures and the signs that tables use: one place each. */
const NARROW = /^[\x20-\u02ff\u0370-\u04ff\u2010-\u23ff\u2500-\u257f]*$/;

/** Two places each on a terminal: East Asian letters and full-width signs (Unicode UAX #11, classes W and F), emoji. */
const WIDE =
  /[\p{Script=Han}\p{Script=Hangul}\p{Script=Hiragana}\p{Script=Katakana}\p{Emoji_Presentation}\u3000-\u303e\uff01-\uff60\uffe0-\uffe6]/u;

/** Places that a text takes on a terminal; what is one sign to the reader (a letter with its accents) counts once. */
export function placesOf(text: string): number {
  if (NARROW.test(text)) return text.length;
  let places = 0;
  for (const { segment } of new Intl.Segmenter().segment(text)) places += WIDE.test(segment) ? 2 : 1;
  return places;
}

/** Cells of one column; numbers of differing decimals are filled up with blanks so that their points stand under each other. */
function columnTexts(table: Table, column: Column, k: number): readonly string[] {
  const cells = table.rows.map((row, r) => cellText(column, row[k]!, r));
  if (typeof column.decimals !== 'object' || column.decimals === null) return cells;
  const tail = (text: string) => (text.includes('.') ? text.length - text.indexOf('.') : 0);
  const most = Math.max(...cells.map(tail));
  return cells.map((text) => text + ' '.repeat(most - tail(text)));
}

/** Title, rule and cells of one column, all of one width. */
function drawColumn(table: Table, column: Column, k: number): readonly string[] {
  const texts = [columnTitle(column), ...columnTexts(table, column, k)];
  const places = texts.map(placesOf);
  const width = Math.max(...places);
  const [title, ...cells] = texts.map((text, r) => {
    const blanks = ' '.repeat(width - places[r]!);
    return column.decimals === null ? text + blanks : blanks + text;
  });
  return [title!, '─'.repeat(width), ...cells];
}

export function drawTable(table: Table): string {
  const columns = table.columns.map((column, k) => drawColumn(table, column, k));
  const lines = Array.from({ length: table.rows.length + 2 }, (_, r) => columns.map((column) => column[r]!).join('  '));
  const notes = (table.notes ?? []).map((note, k) => `  ${k + 1}: ${note}`);
  return [...(table.title ? [table.title] : []), ...lines.map((line) => line.trimEnd()), ...notes].join('\n');
}
