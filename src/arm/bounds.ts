import { MAX_BEARINGS, MAX_JOINTS, MAX_PATH_ROWS } from './armFile.ts';
import { describeValue, type Issue, type IssuePath } from './issue.ts';

/** The deepest field of the schema lies 6 down; what goes deeper than this is not an arm file and is not walked. */
const MAX_DEPTH = 12;
const MAX_TEXT = 20_000;
/** More values than 8 MiB of text can hold: only a value made in memory with shared parts gets here. */
const MAX_VALUES = 5_000_000;

/** Names that every object has from birth: as a key or a bearing's name they would find what the file never said. */
function isBuiltInName(key: string): boolean {
  return key in Object.prototype;
}

/** A value and the way to it; paths are spelled out only for what is wrong. */
interface Place {
  readonly value: unknown;
  readonly parent: Place | null;
  readonly step: string | number;
  readonly depth: number;
}

function pathOf(place: Place): (string | number)[] {
  const path: (string | number)[] = [];
  for (let at = place; at.parent; at = at.parent) path.push(at.step);
  return path.reverse();
}

function longest(place: Place): number {
  if (place.depth !== 3 || place.step !== 'path') return MAX_JOINTS;
  return pathOf(place)[0] === 'duty' ? MAX_PATH_ROWS : MAX_JOINTS;
}

/**
 * What must be known before a schema may look at a value: nothing too deep, too long or with a forbidden key. Every issue's path leads to a part
 * that must be left out of further reading.
 */
export function boundIssues(root: unknown): Issue[] {
  const issues: Issue[] = [];
  const stack: Place[] = [{ value: root, parent: null, step: '', depth: 0 }];
  let values = 0;
  while (stack.length > 0) {
    const place = stack.pop()!;
    const { value } = place;
    if (++values > MAX_VALUES) {
      return [{ code: 'too-long', path: [], found: `more than ${MAX_VALUES} values`, expected: 'fewer' }];
    }
    const report = (code: Issue['code'], found: string, expected: string, key?: string) => {
      const path = pathOf(place);
      issues.push({ code, path: key === undefined ? path : [...path, key], found, expected });
    };
    const inner = (key: string | number, part: unknown) => {
      // Numbers and the like need no look of their own.
      if (typeof part === 'string' || typeof part === 'object') {
        stack.push({ value: part, parent: place, step: key, depth: place.depth + 1 });
      }
    };
    if (typeof value === 'string') {
      if (value.length > MAX_TEXT) report('too-long', `${value.length} characters`, `at most ${MAX_TEXT}`);
    } else if (typeof value === 'object' && value !== null) {
      const list = Array.isArray(value);
      const keys = list ? [] : Object.keys(value);
      const length = list ? value.length : keys.length;
      const most = list ? longest(place) : MAX_BEARINGS;
      if (place.depth >= MAX_DEPTH) {
        report('too-deep', `${describeValue(value)} ${place.depth} levels down`, `at most ${MAX_DEPTH} levels`);
      } else if (length > most) {
        report('wrong-length', `${length} ${list ? 'entries' : 'keys'}`, `at most ${most}`);
      } else if (list) {
        for (let i = length - 1; i >= 0; i--) inner(i, value[i]);
      } else {
        for (const key of keys.reverse()) {
          if (!isBuiltInName(key)) inner(key, (value as Record<string, unknown>)[key]);
          else
            report(
              'unknown-key',
              JSON.stringify(key),
              'another name: every object of the language has this one already',
              key,
            );
        }
      }
    }
  }
  return issues;
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
