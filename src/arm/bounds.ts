import { MAX_BEARINGS, MAX_JOINTS, MAX_PATH_ROWS } from './armFile.ts';
import { describeValue, type Issue, type IssuePath } from './issue.ts';

/** The deepest field of the schema lies 6 down; what goes deeper than this is not an arm file and is not walked. */
const MAX_DEPTH = 12;
const MAX_TEXT = 20_000;
/** More values than 8 MiB of text can hold: only a value made in memory with shared parts gets here. */
const MAX_VALUES = 5_000_000;

/** Names that every object has from birth: as a key or a bearing's name they would find what the file never said. */
export function isBuiltInName(key: string): boolean {
  return key in Object.prototype;
}

function longest(path: IssuePath): number {
  if (path.length === 3 && path[0] === 'duty' && path[2] === 'path') return MAX_PATH_ROWS;
  return MAX_JOINTS;
}

/**
 * What must be known before a schema may look at a value: nothing too deep, too long or with a forbidden key. Every issue's path leads to a part
 * that must be left out of further reading.
 */
export function boundIssues(root: unknown): Issue[] {
  const issues: Issue[] = [];
  const stack: { value: unknown; path: (string | number)[] }[] = [{ value: root, path: [] }];
  let values = 0;
  while (stack.length > 0) {
    const { value, path } = stack.pop()!;
    if (++values > MAX_VALUES) {
      return [{ code: 'too-long', path: [], found: `more than ${MAX_VALUES} values`, expected: 'fewer' }];
    }
    if (typeof value === 'string' && value.length > MAX_TEXT) {
      issues.push({ code: 'too-long', path, found: `${value.length} characters`, expected: `at most ${MAX_TEXT}` });
    } else if (Array.isArray(value)) {
      if (path.length >= MAX_DEPTH) issues.push(tooDeep(value, path));
      else if (value.length > longest(path)) {
        issues.push({
          code: 'wrong-length',
          path,
          found: `${value.length} entries`,
          expected: `at most ${longest(path)}`,
        });
      } else for (let i = value.length - 1; i >= 0; i--) stack.push({ value: value[i], path: [...path, i] });
    } else if (typeof value === 'object' && value !== null) {
      const keys = Object.keys(value);
      if (path.length >= MAX_DEPTH) issues.push(tooDeep(value, path));
      else if (keys.length > MAX_BEARINGS) {
        issues.push({ code: 'wrong-length', path, found: `${keys.length} keys`, expected: `at most ${MAX_BEARINGS}` });
      } else {
        for (const key of keys.reverse()) {
          if (isBuiltInName(key)) {
            const what = 'another name: every object of the language has this one already';
            issues.push({ code: 'unknown-key', path: [...path, key], found: JSON.stringify(key), expected: what });
          } else stack.push({ value: (value as Record<string, unknown>)[key], path: [...path, key] });
        }
      }
    }
  }
  return issues;
}

function tooDeep(value: unknown, path: IssuePath): Issue {
  return {
    code: 'too-deep',
    path,
    found: `${describeValue(value)} ${path.length} levels down`,
    expected: `at most ${MAX_DEPTH} levels`,
  };
}

interface Branch {
  readonly next: Map<string | number, Branch>;
  cut: boolean;
}

/**
 * A copy of `value` where the parts the paths lead to are undefined; keys and lengths of lists stay, so that what is wrong is not taken for
 * missing. What no path touches is shared with the original.
 */
export function without(value: unknown, paths: readonly IssuePath[]): unknown {
  const root: Branch = { next: new Map(), cut: false };
  for (const path of paths) {
    let branch = root;
    for (const step of path) {
      let next = branch.next.get(step);
      if (!next) {
        next = { next: new Map(), cut: false };
        branch.next.set(step, next);
      }
      branch = next;
    }
    branch.cut = true;
  }
  return cut(value, root);
}

function cut(value: unknown, branch: Branch): unknown {
  if (branch.cut) return undefined;
  if (branch.next.size === 0 || typeof value !== 'object' || value === null) return value;
  if (Array.isArray(value)) {
    return value.map((entry, i) => {
      const next = branch.next.get(i);
      return next ? cut(entry, next) : entry;
    });
  }
  const copy: Record<string, unknown> = {};
  for (const [key, entry] of Object.entries(value)) {
    const next = branch.next.get(key);
    // Defined, not assigned: a key named `__proto__` must not change what the copy is.
    const part = next ? cut(entry, next) : entry;
    Object.defineProperty(copy, key, { value: part, enumerable: true, writable: true, configurable: true });
  }
  return copy;
}
