/**
 * A path as CSV: a header with `time_s` and, for every revolute joint, `NAME_deg` (NAME as in the arm file; columns in any order), then one
 * pose a record, times rising. Numbers have a decimal point; nothing is repaired. The rows come in the arm file's own form, to stand
 * there as a segment's `path`, and as the SI motion of a segment.
 */

import type { DutySegment } from '../../arm/arm.ts';
import { MAX_PATH_ROWS, MAX_TEXT_BYTES, type SegmentFile } from '../../arm/armFile.ts';
import { toSI } from '../../units/unit.ts';
import { type CsvFault, type CsvField, csvRecords } from '../rolling/csvRecords.ts';
import type { CsvIssue } from '../rolling/index.ts';

export type PathRow = NonNullable<SegmentFile['path']>[number];

export type PathCsvReading =
  | {
      readonly ok: true;
      readonly rows: readonly PathRow[];
      readonly motion: Extract<DutySegment['motion'], { kind: 'path' }>;
    }
  | { readonly ok: false; readonly issues: readonly CsvIssue[] };

const MAX_ISSUES = 1000;
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const TIME = 'time_s';

const FAULTS: Readonly<Record<CsvFault['fault'], readonly [found: string, expected: string]>> = {
  'unclosed-quote': ['a quote that never closes', 'a closing quote before the end of the text'],
  'text-after-quote': ['text after a closing quote', 'a separator or the end of the line'],
  'quote-in-field': ['a quote inside an unquoted field', 'the whole field in quotes, quotes in it doubled'],
};

function shown(text: string): string {
  return JSON.stringify(text.length > 60 ? `${text.slice(0, 60)}…` : text);
}

/** Reads a path for joints of the given names (revolute joints, ground to tip). Never throws; issues come in the order of the text. */
export function readPathCsv(text: string, jointNames: readonly string[]): PathCsvReading {
  const issues: CsvIssue[] = [];
  const report = (
    code: CsvIssue['code'],
    place: Pick<CsvField, 'line' | 'column'>,
    found: string,
    expected: string,
  ) => {
    issues.push({ code, line: place.line, column: place.column, found, expected });
  };
  const start = { line: 1, column: 1 };
  const wanted = [TIME, ...jointNames.map((name) => `${name}_deg`)];
  const header = () => `a header with ${wanted.map(shown).join(', ')}`;

  if (text.length > MAX_TEXT_BYTES) {
    report('too-long', start, 'more than 8 MiB of text', 'at most 8 MiB');
    return { ok: false, issues };
  }
  const { records, faults } = csvRecords(text);
  for (const fault of faults) report('csv-quote', fault, ...FAULTS[fault.fault]);
  const first = records[0];
  if (!first) {
    report('csv-header', start, 'no text', header());
    return { ok: false, issues };
  }
  const keys = first.map((field) => field.text.trim());
  keys.forEach((key, i) => {
    if (keys.indexOf(key) < i) report('duplicate-key', first[i]!, `${shown(key)} a second time`, 'each column once');
    else if (!wanted.includes(key)) report('unknown-key', first[i]!, shown(key), header());
  });
  for (const key of wanted) if (!keys.includes(key)) report('csv-header', first[0]!, `no ${shown(key)}`, header());
  const poses = records.length - 1;
  if (poses > MAX_PATH_ROWS) {
    report('too-long', records[MAX_PATH_ROWS + 1]![0]!, `${poses} poses`, `at most ${MAX_PATH_ROWS}`);
  } else if (poses < 2) {
    report('wrong-length', records[poses]![0]!, poses === 1 ? 'one pose' : 'no pose', 'two poses or more');
  }
  // A broken header or broken quotes leave every record in doubt: what follows would be noise.
  if (issues.length > 0) return { ok: false, issues };

  const columns = wanted.map((key) => keys.indexOf(key));
  const rows: PathRow[] = [];
  let before = Number.NEGATIVE_INFINITY;
  for (const record of records.slice(1)) {
    if (issues.length >= MAX_ISSUES) break;
    const extra = record[keys.length];
    if (extra) report('csv-fields', extra, `${record.length} fields`, `${keys.length}, as the header has`);
    const values = columns.map((column, i) => {
      const field = record[column];
      const entry = field?.text.trim() ?? '';
      if (!field || entry === '') {
        report('missing', field ?? record[record.length - 1]!, `no ${wanted[i]}`, 'a number in every column');
        return Number.NaN;
      }
      const value = NUMBER.test(entry) ? Number(entry) : Number.NaN;
      if (Number.isNaN(value)) report('wrong-type', field, shown(entry), 'a number with a decimal point');
      else if (!Number.isFinite(value)) report('not-finite', field, shown(entry), 'a finite number');
      return value;
    });
    const time = values[0]!;
    if (time <= before) {
      report('wrong-order', record[columns[0]!]!, `${time} after ${before}`, 'times that rise from pose to pose');
    }
    if (!Number.isNaN(time)) before = time;
    rows.push({ time_s: time, pose_deg: values.slice(1) });
  }
  if (issues.length > 0) return { ok: false, issues };
  const motion = {
    kind: 'path',
    time: rows.map((row) => row.time_s),
    pose: rows.map((row) => row.pose_deg.map((angle) => toSI(angle, 'deg'))),
  } as const;
  return { ok: true, rows, motion };
}
