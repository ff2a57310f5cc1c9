/** What can be wrong with an arm file. Codes are stable: tests, the page and the command line tell mistakes apart by them. */
export type IssueCode =
  // The text
  | 'too-long'
  | 'json-syntax'
  | 'duplicate-key'
  | 'too-deep'
  // One field
  | 'missing'
  | 'unknown-key'
  | 'wrong-type'
  | 'not-finite'
  | 'out-of-range'
  | 'wrong-length'
  | 'not-a-choice'
  | 'bad-text'
  | 'version'
  // Several fields together
  | 'duplicate-name'
  | 'unknown-name'
  | 'wrong-kind'
  | 'wrong-order'
  | 'geometry'
  | 'zero-vector'
  | 'inertia'
  | 'conflict'
  | 'outside-travel'
  | 'wrong-sum'
  | 'nothing-turns'
  | 'point-mass'
  | 'seat';

export type IssuePath = readonly (string | number)[];

/** A problem with the user's data: where it is, what was found there and what was expected. */
export interface Issue {
  readonly code: IssueCode;
  /** Keys and indices from the top of the file; empty: the file as a whole. */
  readonly path: IssuePath;
  readonly found: string;
  readonly expected: string;
  /** Where the path begins in the text, counted from 1, when the issue came from a text. */
  readonly at?: { readonly line: number; readonly column: number };
}

/** `joints[0].support.span_mm`; keys that are no plain words are quoted; the whole file is `file`. */
export function pathText(path: IssuePath): string {
  let text = '';
  for (const step of path) {
    if (typeof step === 'number') text += `[${step}]`;
    else if (/^[A-Za-z_$][\w$]*$/.test(step)) text += text === '' ? step : `.${step}`;
    else text += `[${JSON.stringify(step.length > 60 ? `${step.slice(0, 60)}…` : step)}]`;
  }
  return text === '' ? 'file' : text;
}

/** The one place that makes a sentence of an issue. Form, command line and report share it. */
export function issueText(issue: Issue): string {
  const where = issue.at ? `line ${issue.at.line}, column ${issue.at.column}: ` : '';
  return `${where}${pathText(issue.path)}: found ${issue.found}, expected ${issue.expected}.`;
}

/** A short description of a value for `found`: never longer than a line, never walks into what it shows. */
export function describeValue(value: unknown): string {
  if (value === undefined) return 'nothing';
  if (value === null) return 'null';
  if (typeof value === 'string') return JSON.stringify(value.length > 60 ? `${value.slice(0, 60)}…` : value);
  if (typeof value === 'number' || typeof value === 'boolean' || typeof value === 'bigint') return String(value);
  if (Array.isArray(value)) return value.length === 1 ? 'a list of 1 entry' : `a list of ${value.length} entries`;
  return typeof value === 'object' ? 'an object' : `a ${typeof value}`;
}
