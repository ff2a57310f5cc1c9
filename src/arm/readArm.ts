import type { Arm } from './arm.ts';
import { type ArmFile, MAX_TEXT_BYTES } from './armFile.ts';
import { armFromFile } from './armFromFile.ts';
import { boundIssues, without } from './bounds.ts';
import type { Issue, IssuePath } from './issue.ts';
import { lineAndColumn, pathKey, scanJson } from './jsonText.ts';
import type { Known } from './known.ts';
import { checkRules } from './rules.ts';
import { schemaIssues } from './schemaIssues.ts';

/** A sound file gives the SI arm, the file as it stands, and warnings; an unsound one all its issues (and the same warnings). */
export type ArmReading =
  | { readonly ok: true; readonly arm: Arm; readonly file: ArmFile; readonly warnings: readonly Issue[] }
  | { readonly ok: false; readonly issues: readonly Issue[]; readonly warnings: readonly Issue[] };

/** More issues than anybody reads; the rest is counted. */
const MAX_ISSUES = 1000;

function samePath(a: IssuePath, b: IssuePath): boolean {
  return a.length === b.length && a.every((step, i) => step === b[i]);
}

function atMost(issues: readonly Issue[]): readonly Issue[] {
  if (issues.length <= MAX_ISSUES) return issues;
  const rest: Issue = {
    code: 'too-long',
    path: [],
    found: `${issues.length - MAX_ISSUES} more problems`,
    expected: 'fewer to list',
  };
  return [...issues.slice(0, MAX_ISSUES), rest];
}

/**
 * Reads an arm file that is already a plain value (from `JSON.parse` or an editor's state). Never throws on plain data; every problem that can be
 * judged is reported at once, and nothing is repaired.
 */
export function readArmValue(value: unknown): ArmReading {
  const bounds = boundIssues(value);
  const within = without(
    value,
    bounds.map((issue) => issue.path),
  );
  // A part left out for its size has its issue already: that it is missing now says nothing new.
  const fields = schemaIssues(within).filter((issue) => !bounds.some((bound) => samePath(bound.path, issue.path)));
  const known = without(
    within,
    fields.map((issue) => issue.path),
  );
  const isObject = typeof known === 'object' && known !== null && !Array.isArray(known);
  const rules = isObject ? checkRules(known as Known<ArmFile>) : { issues: [], warnings: [] };
  const issues = [...bounds, ...fields, ...rules.issues];
  if (issues.length > 0) return { ok: false, issues: atMost(issues), warnings: rules.warnings };
  const file = value as ArmFile;
  return { ok: true, arm: armFromFile(file), file, warnings: rules.warnings };
}

function failed(...issues: Issue[]): ArmReading {
  return { ok: false, issues, warnings: [] };
}

/** The nearest part of a path that stands in the text: a missing key is shown at the object that lacks it. */
function placed(text: string, issues: readonly Issue[]): readonly Issue[] {
  if (issues.length === 0) return issues;
  const { offsets } = scanJson(
    text,
    issues.map((issue) => issue.path),
  );
  const found = issues.map((issue, order) => {
    let n = issue.path.length;
    while (n > 0 && !offsets.has(pathKey(issue.path.slice(0, n)))) n--;
    return { issue, order, offset: offsets.get(pathKey(issue.path.slice(0, n))) ?? 0 };
  });
  found.sort((a, b) => a.offset - b.offset || a.order - b.order);
  return found.map(({ issue, offset }) => ({ ...issue, at: lineAndColumn(text, offset) }));
}

/** Reads the text of an arm file. Never throws; issues stand in the order of the text, each with its line and column. */
export function readArm(text: string): ArmReading {
  if (text.length > MAX_TEXT_BYTES || new TextEncoder().encode(text).length > MAX_TEXT_BYTES) {
    return failed({ code: 'too-long', path: [], found: 'more than 8 MiB of text', expected: 'at most 8 MiB' });
  }
  // A byte order mark is no part of the document (RFC 8259, 8.1, lets a reader ignore it).
  const body = text.startsWith('\ufeff') ? text.slice(1) : text;
  const scan = scanJson(body);
  if (scan.mistake) {
    const { offset, found, expected } = scan.mistake;
    return failed({ code: 'json-syntax', path: [], found, expected, at: lineAndColumn(body, offset) });
  }
  const duplicates = scan.duplicates.map(({ path, offset }): Issue => {
    const found = `${JSON.stringify(path.at(-1))} a second time`;
    return { code: 'duplicate-key', path, found, expected: 'each key once', at: lineAndColumn(body, offset) };
  });
  const reading = readArmValue(JSON.parse(body));
  const warnings = placed(body, reading.warnings);
  if (!reading.ok) return { ok: false, issues: [...duplicates, ...placed(body, reading.issues)], warnings };
  if (duplicates.length > 0) return { ok: false, issues: duplicates, warnings };
  return { ...reading, warnings };
}
