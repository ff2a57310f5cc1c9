/**
 * Records of a CSV text (RFC 4180): fields parted by a comma, semicolon or tab (whichever the first record uses outside quotes), a field
 * in double quotes may hold separators, line breaks and, doubled, quotes. Lines end with LF, CRLF or CR; a byte order mark is skipped;
 * records without any text are left out.
 */
export interface CsvField {
  readonly text: string;
  /** Where the field begins in the text, counted from 1, in UTF-16 code units. */
  readonly line: number;
  readonly column: number;
}

export interface CsvFault {
  readonly fault: 'unclosed-quote' | 'text-after-quote' | 'quote-in-field';
  readonly line: number;
  readonly column: number;
}

export interface CsvRecords {
  readonly records: readonly (readonly CsvField[])[];
  readonly faults: readonly CsvFault[];
}

function separatorOf(text: string): string {
  const counts = { ',': 0, ';': 0, '\t': 0 };
  let quoted = false;
  for (const c of text) {
    if (c === '"') quoted = !quoted;
    else if (!quoted && (c === '\n' || c === '\r')) break;
    else if (!quoted && c in counts) counts[c as keyof typeof counts]++;
  }
  if (counts[';'] > counts[','] && counts[';'] >= counts['\t']) return ';';
  return counts['\t'] > counts[','] ? '\t' : ',';
}

/** Reads every record; faults name what breaks the form, and the fields around them are read as well as can be. */
export function csvRecords(source: string): CsvRecords {
  const text = source.startsWith('\uFEFF') ? source.slice(1) : source;
  const separator = separatorOf(text);
  const records: CsvField[][] = [];
  const faults: CsvFault[] = [];
  let record: CsvField[] = [];
  let line = 1;
  let lineStart = 0;
  let at = 0;

  const endRecord = () => {
    if (record.some((field) => field.text.trim() !== '')) records.push(record);
    record = [];
  };
  // Steps over the line break at `at`; true if there was one.
  const lineBreak = (): boolean => {
    if (text[at] !== '\n' && text[at] !== '\r') return false;
    at += text[at] === '\r' && text[at + 1] === '\n' ? 2 : 1;
    line++;
    lineStart = at;
    return true;
  };

  while (at < text.length) {
    const place = { line, column: at - lineStart + 1 };
    let value = '';
    if (text[at] === '"') {
      at++;
      for (;;) {
        if (at >= text.length) {
          faults.push({ fault: 'unclosed-quote', ...place });
          break;
        }
        if (text[at] === '"') {
          if (text[at + 1] !== '"') {
            at++;
            break;
          }
          value += '"';
          at += 2;
          continue;
        }
        const from = at;
        if (!lineBreak()) at++;
        value += text.slice(from, at);
      }
      const from = at;
      while (at < text.length && text[at] !== separator && text[at] !== '\n' && text[at] !== '\r') at++;
      if (text.slice(from, at).trim() !== '') {
        faults.push({ fault: 'text-after-quote', line, column: from - lineStart + 1 });
      }
    } else {
      const from = at;
      while (at < text.length && text[at] !== separator && text[at] !== '\n' && text[at] !== '\r') {
        if (text[at] === '"') faults.push({ fault: 'quote-in-field', line, column: at - lineStart + 1 });
        at++;
      }
      value = text.slice(from, at);
    }
    record.push({ text: value, ...place });
    if (text[at] === separator) {
      at++;
      // A separator at the very end opens one more, empty field.
      if (at === text.length) record.push({ text: '', line, column: at - lineStart + 1 });
    } else if (lineBreak()) {
      endRecord();
    }
  }
  endRecord();
  return { records, faults };
}
