import * as z from 'zod/mini';
import { armFileSchema, LARGEST, pathRowsSchema, SMALLEST } from './armFile.ts';
import { unitOfKey } from './fileUnits.ts';
import { describeValue, type Issue, type IssueCode, type IssuePath } from './issue.ts';

type SchemaIssue = z.core.$ZodIssue;

/** Rows of a path that are checked at once; the schema library cannot pass on the issues of a hundred thousand. */
const CHUNK = 2000;
/** With this many issues in a path the rest of its rows is left unchecked: they tell nobody more. */
const ENOUGH = 2000;

function bySchema(schema: z.ZodMiniType, value: unknown, prefix: IssuePath, root: unknown): Issue[] {
  const result = z.safeParse(schema, value);
  return result.success ? [] : result.error.issues.flatMap((issue) => translate(issue, root, prefix));
}

/** What the schema alone finds wrong, in our own codes and words. Empty: `value` is an `ArmFile` as far as single fields tell. */
export function schemaIssues(value: unknown): Issue[] {
  const duty = valueAt(value, ['duty']);
  const long = Array.isArray(duty)
    ? duty.flatMap((segment, i) => {
        const path = valueAt(segment, ['path']);
        return Array.isArray(path) && path.length > CHUNK ? [{ i, path }] : [];
      })
    : [];
  if (long.length === 0) return bySchema(armFileSchema, value, [], value);
  const shortened = (duty as unknown[]).map((segment, i) => {
    const entry = long.find((one) => one.i === i);
    return entry ? { ...(segment as object), path: entry.path.slice(0, CHUNK) } : segment;
  });
  const issues = bySchema(armFileSchema, { ...(value as object), duty: shortened }, [], value);
  for (const { i, path } of long) {
    let found = 0;
    for (let from = CHUNK; from < path.length && found < ENOUGH; from += CHUNK) {
      const rows = bySchema(pathRowsSchema, path.slice(from, from + CHUNK), ['duty', i, 'path', from], value);
      issues.push(...rows);
      found += rows.length;
    }
  }
  return issues;
}

/** The value a path leads to; undefined where it leads nowhere. */
export function valueAt(root: unknown, path: IssuePath): unknown {
  let value = root;
  for (const step of path) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Record<string | number, unknown>)[step];
  }
  return value;
}

function unitAlong(path: IssuePath): string | null {
  for (let i = path.length - 1; i >= 0; i--) {
    const step = path[i];
    if (typeof step === 'string') {
      const unit = unitOfKey(step);
      if (unit) return unit;
    }
  }
  return null;
}

function aNumber(path: IssuePath): string {
  const unit = unitAlong(path);
  return unit ? `a number (${unit})` : 'a number';
}

const LIST_OF_KEY: Readonly<Record<string, string>> = {
  axis: 'a list of 3 numbers',
  gravity_m_s2: 'a list of 3 numbers (m/s²)',
  travel_deg: 'a list of 2 numbers (°): lowest and highest',
  clearance_um: 'a list of 2 numbers (µm): from and to',
};

function aList(path: IssuePath): string {
  const key = path.at(-1);
  if (typeof key !== 'string') return 'a list';
  if (LIST_OF_KEY[key]) return LIST_OF_KEY[key];
  const unit = unitOfKey(key);
  return unit ? `a list of numbers (${unit})` : 'a list';
}

function typeWords(expected: string, path: IssuePath): string {
  switch (expected) {
    case 'number':
      return aNumber(path);
    case 'int':
      return 'a whole number';
    case 'string':
      return 'a text in quotes';
    case 'tuple':
      return /_mm$|_deg$|^base$|^tool$/.test(String(path.at(-1))) && path.at(-1) !== 'travel_deg'
        ? `a list of 3 numbers${unitAlong(path) ? ` (${unitAlong(path)})` : ''}`
        : aList(path);
    case 'array':
      return aList(path);
    default:
      return 'an object in braces';
  }
}

function choices(values: readonly unknown[]): string {
  const shown = values.map((value) => JSON.stringify(value));
  return shown.length === 1 ? shown[0]! : `${shown.slice(0, -1).join(', ')} or ${shown.at(-1)}`;
}

function bound(issue: z.core.$ZodIssueTooSmall | z.core.$ZodIssueTooBig, path: IssuePath, found: unknown): string {
  const small = issue.code === 'too_small';
  const limit = Number(small ? issue.minimum : issue.maximum);
  switch (issue.origin) {
    case 'string':
      return small ? `at least ${limit} character` : `at most ${limit} characters`;
    case 'array':
    case 'tuple': {
      const exact = fixedLength(path);
      if (exact) return `exactly ${exact} entries`;
      return small ? `at least ${limit}` : `at most ${limit} entries`;
    }
    default: {
      const number = issue.origin === 'int' ? 'a whole number' : aNumber(path);
      if (small && limit === SMALLEST && !(typeof found === 'number' && found > 0)) return `${number} above 0`;
      if (Math.abs(limit) === LARGEST) return `${number} between -1e12 and 1e12`;
      return small ? `${number} of at least ${limit}` : `${number} of at most ${limit}`;
    }
  }
}

/** Lists of the schema whose length never varies. */
function fixedLength(path: IssuePath): number | null {
  const key = path.at(-1);
  if (key === 'travel_deg' || key === 'clearance_um') return 2;
  if (typeof key !== 'string') return null;
  return ['origin_mm', 'turn_deg', 'axis', 'centre_mm', 'gravity_m_s2', 'base', 'tool'].includes(key) ? 3 : null;
}

function translate(issue: SchemaIssue, root: unknown, prefix: IssuePath): Issue[] {
  const own = issue.path.map((step) => (typeof step === 'symbol' ? String(step) : step));
  // A chunk of a list counts from its own start: the numbers at the joint add.
  const chunk = prefix.at(-1);
  const path =
    typeof chunk === 'number' && typeof own[0] === 'number'
      ? [...prefix.slice(0, -1), chunk + own[0], ...own.slice(1)]
      : [...prefix, ...own];
  const value = valueAt(root, path);
  const found = describeValue(value);
  const one = (code: IssueCode, expected: string): Issue[] => [
    { code: value === undefined ? 'missing' : code, path, found, expected },
  ];

  if (path.length === 1 && path[0] === 'armload' && issue.code === 'invalid_value')
    return one('version', '1, the version of the file format');
  switch (issue.code) {
    case 'invalid_type':
      if (typeof value === 'number' && !Number.isFinite(value))
        return one('not-finite', `${aNumber(path)} that is finite`);
      return one('wrong-type', typeWords(issue.expected, path));
    case 'too_small':
    case 'too_big': {
      const list = Array.isArray(value);
      return [
        {
          code: list ? 'wrong-length' : typeof value === 'string' ? 'bad-text' : 'out-of-range',
          path,
          found: list ? (value.length === 1 ? '1 entry' : `${value.length} entries`) : found,
          expected: bound(issue, path, value),
        },
      ];
    }
    case 'invalid_value':
      return one(
        typeof value === 'string' || typeof value === 'number' ? 'not-a-choice' : 'wrong-type',
        choices(issue.values),
      );
    case 'invalid_format':
      return one('bad-text', issue.message);
    case 'unrecognized_keys': {
      const where =
        path.length === 0
          ? 'at the top of an arm file'
          : `in ${String(path.filter((s) => typeof s === 'string').at(-1))}`;
      const kind = kindOf(value);
      return issue.keys.map((key) => ({
        code: 'unknown-key',
        path: [...path, key],
        found: JSON.stringify(key.length > 60 ? `${key.slice(0, 60)}…` : key),
        expected: `a key that is known ${where}${kind ? ` (${kind})` : ''}`,
      }));
    }
    case 'invalid_key':
      return issue.issues.map((inner) => ({
        code: 'bad-text',
        path,
        found: JSON.stringify(String(path.at(-1)).slice(0, 60)),
        expected: inner.code === 'invalid_format' ? inner.message : 'a name of 1 to 120 characters',
      }));
    case 'invalid_union':
      return union(issue, root, path, one);
    default:
      return one('wrong-type', 'a value of another kind');
  }
}

function kindOf(value: unknown): string | null {
  for (const key of ['kind', 'arrangement']) {
    const kind = valueAt(value, [key]);
    if (typeof kind === 'string') return kind.slice(0, 40);
  }
  return null;
}

function union(
  issue: z.core.$ZodIssueInvalidUnion,
  root: unknown,
  path: IssuePath,
  one: (code: IssueCode, expected: string) => Issue[],
): Issue[] {
  const value = valueAt(root, path);
  if ('options' in issue && issue.options) {
    return one(typeof value === 'string' ? 'not-a-choice' : 'wrong-type', choices(issue.options));
  }
  if (path.at(-1) === 'rows') return one(typeof value === 'number' ? 'not-a-choice' : 'wrong-type', '1 or 2');
  // The direction of a tip force: where one form was clearly meant, its own mistakes say more than "none fits".
  const meant = ['base', 'tool'].filter((key) => valueAt(value, [key]) !== undefined);
  if (meant.length === 1) {
    const errors = issue.errors[meant[0] === 'base' ? 1 : 2];
    if (errors) return errors.flatMap((inner) => translate(inner, root, path));
  }
  return one(
    typeof value === 'string' ? 'not-a-choice' : 'wrong-type',
    '"any", {"base": [x, y, z]} or {"tool": [x, y, z]}',
  );
}
