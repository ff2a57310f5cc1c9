/**
 * The user's own table of bearings as CSV: a header with `name` and the keys of the arm file's bearings, then one bearing a record of as many
 * fields. An empty field is a key left out. Numbers have a decimal point. `clearance_um` of a rolling bearing is `from..to`, of a plain bushing one
 * number. What the fields may hold is judged by the arm file's own reader; nothing is repaired.
 */
import type { Bearing } from '../../arm/arm.ts';
import { type ArmFile, type BearingFile, MAX_TEXT_BYTES } from '../../arm/armFile.ts';
import type { IssueCode } from '../../arm/issue.ts';
import { readArmValue } from '../../arm/readArm.ts';
import { type CsvFault, type CsvField, csvRecords } from './csvRecords.ts';

/** A problem with the table; line and column are those of the field, counted from 1. */
export interface CsvIssue {
  readonly code: IssueCode | 'csv-quote' | 'csv-fields' | 'csv-header';
  readonly line: number;
  readonly column: number;
  readonly found: string;
  readonly expected: string;
}

export interface BearingCsvReading {
  /** The sound bearings by name; those with issues are left out. */
  readonly bearings: Readonly<Record<string, Bearing>>;
  /** The same in the form of the arm file's `bearings`, to be put into one. */
  readonly files: Readonly<Record<string, BearingFile>>;
  readonly issues: readonly CsvIssue[];
}

type KeysOf<T> = T extends unknown ? keyof T : never;
type BearingKey = KeysOf<BearingFile>;

const FIELDS: Readonly<Record<BearingKey, 'number' | 'text' | 'clearance'>> = {
  kind: 'text',
  bore_mm: 'number',
  outer_mm: 'number',
  width_mm: 'number',
  C_N: 'number',
  C0_N: 'number',
  contact_angle_deg: 'number',
  e: 'number',
  Y: 'number',
  Y0: 'number',
  f0: 'number',
  pitch_diameter_mm: 'number',
  ball_diameter_mm: 'number',
  balls: 'number',
  rows: 'number',
  clearance: 'text',
  clearance_um: 'clearance',
  shaft_fit: 'text',
  housing_fit: 'text',
  misalignment_deg: 'number',
  stiffness_N_um: 'number',
  pressure_limit_MPa: 'number',
  speed_limit_m_s: 'number',
  pv_limit_MPa_m_s: 'number',
  flange_outer_mm: 'number',
  wear_factor_mm3_N_m: 'number',
  wear_depth_mm: 'number',
  source: 'text',
};
const NEEDED = ['name', 'kind', 'bore_mm', 'outer_mm', 'width_mm'] as const;

const MAX_ROWS = 10_000;
const MAX_ISSUES = 1000;
const NUMBER = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

const FAULTS: Readonly<Record<CsvFault['fault'], readonly [found: string, expected: string]>> = {
  'unclosed-quote': ['a quote that never closes', 'a closing quote before the end of the text'],
  'text-after-quote': ['text after a closing quote', 'a separator or the end of the line'],
  'quote-in-field': ['a quote inside an unquoted field', 'the whole field in quotes, quotes in it doubled'],
};

function shown(text: string): string {
  return JSON.stringify(text.length > 60 ? `${text.slice(0, 60)}…` : text);
}

/** A sound arm around one bearing, so that the arm file's own reader can judge it. */
function armAround(name: string, bearing: Readonly<Record<string, unknown>>): unknown {
  const frame: ArmFile = {
    armload: 1,
    name: 'bearing table',
    gravity_m_s2: [0, 0, 0],
    joints: [
      {
        name: 'joint',
        kind: 'revolute',
        origin_mm: [0, 0, 0],
        axis: [0, 0, 1],
        travel_deg: [0, 1],
        link: { name: 'link', mass_kg: 1, centre_mm: [0, 0, 0] },
      },
    ],
    tip: { origin_mm: [0, 0, 0] },
  };
  return { ...frame, bearings: Object.fromEntries([[name, bearing]]) };
}

/** The value of a field, or null where its text is none of that kind. */
function fieldValue(key: BearingKey, text: string, kind: string): unknown {
  const form = FIELDS[key];
  if (form === 'text') return text;
  if (form === 'clearance' && kind !== 'plain-bushing') {
    const parts = text.split('..').map((part) => part.trim());
    return parts.length === 2 && parts.every((part) => NUMBER.test(part)) ? parts.map(Number) : null;
  }
  return NUMBER.test(text) ? Number(text) : null;
}

/** Reads a table. Never throws; every problem that can be judged is reported, in the order of the text. */
export function readBearingCsv(text: string): BearingCsvReading {
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
  const refused = (): BearingCsvReading => ({ bearings: {}, files: {}, issues });

  if (text.length > MAX_TEXT_BYTES) {
    report('too-long', start, 'more than 8 MiB of text', 'at most 8 MiB');
    return refused();
  }
  const { records, faults } = csvRecords(text);
  for (const fault of faults) report('csv-quote', fault, ...FAULTS[fault.fault]);
  const header = records[0];
  if (!header) {
    report('csv-header', start, 'no text', `a header with at least ${NEEDED.join(', ')}`);
    return refused();
  }
  const keys = header.map((field) => field.text.trim());
  keys.forEach((key, i) => {
    const field = header[i]!;
    if (keys.indexOf(key) < i) report('duplicate-key', field, `${shown(key)} a second time`, 'each key once');
    else if (key !== 'name' && !Object.hasOwn(FIELDS, key)) {
      report('unknown-key', field, shown(key), 'name or a key of the arm file’s bearings');
    }
  });
  for (const key of NEEDED) {
    if (!keys.includes(key))
      report('csv-header', header[0]!, `no ${key}`, `a header with at least ${NEEDED.join(', ')}`);
  }
  if (records.length - 1 > MAX_ROWS) {
    report('too-long', records[MAX_ROWS + 1]![0]!, `${records.length - 1} bearings`, `at most ${MAX_ROWS}`);
  }
  // A broken header or broken quotes leave every record in doubt: what follows would be noise.
  if (issues.length > 0) return refused();

  const column = (key: string) => keys.indexOf(key);
  const bearings = new Map<string, Bearing>();
  const files = new Map<string, BearingFile>();
  const names = new Set<string>();
  for (const record of records.slice(1, MAX_ROWS + 1)) {
    if (issues.length >= MAX_ISSUES) break;
    const before = issues.length;
    const first = record[0]!;
    const extra = record[keys.length];
    if (extra) report('csv-fields', extra, `${record.length} fields`, `at most ${keys.length}, as the header has`);
    // Cut short, not left empty: what is lost would be filled with estimates.
    else if (record.length < keys.length) {
      report('csv-fields', record.at(-1)!, `${record.length} fields`, `${keys.length}, as the header has`);
    }
    const name = record[column('name')]?.text.trim() ?? '';
    const nameField = record[column('name')] ?? first;
    if (name === '') report('missing', nameField, 'no name', 'a name');
    else if (names.has(name)) report('duplicate-name', nameField, `${shown(name)} a second time`, 'each name once');
    names.add(name);

    const kind = record[column('kind')]?.text.trim() ?? '';
    const bearing: Record<string, unknown> = {};
    for (const [i, key] of keys.entries()) {
      const field = record[i];
      const entry = field?.text.trim() ?? '';
      if (key === 'name' || entry === '' || !field) continue;
      const value = fieldValue(key as BearingKey, entry, kind);
      if (value === null) {
        const clearance = FIELDS[key as BearingKey] === 'clearance' && kind !== 'plain-bushing';
        report(
          'wrong-type',
          field,
          shown(entry),
          clearance ? 'two numbers as from..to' : 'a number with a decimal point',
        );
      } else bearing[key] = value;
    }
    // What is already reported as no number would be reported again as missing.
    if (issues.length > before) continue;
    const reading = readArmValue(armAround(name, bearing));
    if (reading.ok) {
      bearings.set(name, reading.arm.bearings[name]!);
      files.set(name, reading.file.bearings![name]!);
    } else {
      for (const issue of reading.issues) {
        const key = issue.path[2];
        const at = typeof key === 'string' ? column(key) : column('name');
        report(issue.code, record[at] ?? first, issue.found, issue.expected);
      }
    }
  }
  return { bearings: Object.fromEntries(bearings), files: Object.fromEntries(files), issues };
}

/** The sentence for an issue of a table. */
export function csvIssueText(issue: CsvIssue): string {
  return `line ${issue.line}, column ${issue.column}: found ${issue.found}, expected ${issue.expected}.`;
}
