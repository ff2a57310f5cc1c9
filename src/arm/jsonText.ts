/**
 * A scan of JSON text (RFC 8259) beside `JSON.parse`, for what that does not tell: the line and column of a mistake in every browser, a key given
 * twice (which `JSON.parse` lets overwrite the first), and where in the text a path stands. It does not recurse, so no nesting can break it.
 */
import type { IssuePath } from './issue.ts';

export interface TextMistake {
  readonly offset: number;
  readonly found: string;
  readonly expected: string;
}

export interface JsonScan {
  readonly mistake: TextMistake | null;
  /** Paths whose last key stands twice in its object, in order, at most 100. */
  readonly duplicates: readonly { readonly path: IssuePath; readonly offset: number }[];
  /** Offsets by `pathKey`: of the key in an object, of the value in a list. */
  readonly offsets: ReadonlyMap<string, number>;
}

/** A path as one string, to look up `offsets`. */
export function pathKey(path: IssuePath): string {
  return JSON.stringify(path);
}

/** Line and column from 1; a column counts UTF-16 units. */
export function lineAndColumn(text: string, offset: number): { readonly line: number; readonly column: number } {
  let line = 1;
  let start = 0;
  for (let i = 0; i < offset; i++) {
    if (text.charCodeAt(i) === 10) {
      line++;
      start = i + 1;
    }
  }
  return { line, column: offset - start + 1 };
}

const SPACE = /[ \t\n\r]*/y;
const SCALAR = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?|true|false|null/y;

interface Level {
  /** Keys seen so far; null for a list. */
  readonly keys: Set<string> | null;
  step: string | number;
  /** What is wanted below this object or list; null: nothing. */
  readonly wanted: Wanted | null;
}

/** The wanted paths as a tree, so that a value costs one look-up. */
interface Wanted {
  readonly next: Map<string | number, Wanted>;
  /** Key of the path in `offsets`. */
  readonly key: string;
}

function wantedTree(paths: readonly IssuePath[]): Wanted | null {
  if (paths.length === 0) return null;
  const root: Wanted = { next: new Map(), key: pathKey([]) };
  for (const path of paths) {
    let node = root;
    for (const [i, step] of path.entries()) {
      let next = node.next.get(step);
      if (!next) {
        next = { next: new Map(), key: pathKey(path.slice(0, i + 1)) };
        node.next.set(step, next);
      }
      node = next;
    }
  }
  return root;
}

const ESCAPE = /\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4})/y;

/** End of the string that opens at `offset`, or -1. A loop, for a pattern could run out of stack on a text of megabytes. */
function stringEnd(text: string, offset: number): number {
  for (let i = offset + 1; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code === 34) return i + 1;
    if (code < 32) return -1;
    if (code === 92) {
      const end = at(ESCAPE, text, i);
      if (end < 0) return -1;
      i = end - 1;
    }
  }
  return -1;
}

function at(pattern: RegExp, text: string, offset: number): number {
  pattern.lastIndex = offset;
  return pattern.test(text) ? pattern.lastIndex : -1;
}

function show(text: string, offset: number): string {
  if (offset >= text.length) return 'the end of the text';
  const part = /^[\w.+-]{1,30}|^./su.exec(text.slice(offset, offset + 30));
  return JSON.stringify(part ? part[0] : text[offset]);
}

/** Scans the text once, up to the first mistake. The offsets of `paths`, and of all that leads to them, are noted. */
export function scanJson(text: string, paths: readonly IssuePath[] = []): JsonScan {
  const duplicates: { path: IssuePath; offset: number }[] = [];
  const offsets = new Map<string, number>();
  const levels: Level[] = [];
  let offset = 0;

  const mistake = (expected: string, where = offset): JsonScan => ({
    mistake: { offset: where, found: show(text, where), expected },
    duplicates,
    offsets,
  });
  const path = (): (string | number)[] => levels.map((level) => level.step);
  const root = wantedTree(paths);
  /** What is wanted of the value that begins now. */
  let here: Wanted | null = null;
  const note = (where: number) => {
    const level = levels.at(-1);
    here = level ? (level.wanted?.next.get(level.step) ?? null) : root;
    if (here && !offsets.has(here.key)) offsets.set(here.key, where);
  };
  const skip = () => {
    offset = at(SPACE, text, offset);
  };

  let awaits: 'value' | 'key' | 'separator' = 'value';
  // After `[` or `{` the closing bracket may follow at once.
  let justOpened = false;
  note(0);
  for (;;) {
    skip();
    const char = text[offset];
    const level = levels.at(-1);
    if (awaits === 'separator') {
      if (!level)
        return offset < text.length
          ? mistake('nothing after the end of the document')
          : { mistake: null, duplicates, offsets };
      const close = level.keys ? '}' : ']';
      if (char === ',') {
        offset++;
        awaits = level.keys ? 'key' : 'value';
        if (!level.keys) level.step = (level.step as number) + 1;
        justOpened = false;
      } else if (char === close) {
        offset++;
        levels.pop();
      } else return mistake(`"," or "${close}"`);
    } else if (awaits === 'key') {
      if (char === '}' && justOpened) {
        offset++;
        levels.pop();
        awaits = 'separator';
        continue;
      }
      const end = char === '"' ? stringEnd(text, offset) : -1;
      if (end < 0) return mistake(char === '"' ? 'a key that ends with a quote on its line' : 'a key in double quotes');
      const key = JSON.parse(text.slice(offset, end)) as string;
      const keys = level!.keys!;
      level!.step = key;
      if (keys.has(key)) {
        if (duplicates.length < 100) duplicates.push({ path: path(), offset });
      } else keys.add(key);
      note(offset);
      offset = end;
      skip();
      if (text[offset] !== ':') return mistake('":" after the key');
      offset++;
      awaits = 'value';
      justOpened = false;
    } else {
      if (level && !level.keys) {
        if (char === ']' && justOpened) {
          offset++;
          levels.pop();
          awaits = 'separator';
          continue;
        }
        note(offset);
      }
      if (char === '{' || char === '[') {
        offset++;
        levels.push(char === '{' ? { keys: new Set(), step: '', wanted: here } : { keys: null, step: 0, wanted: here });
        awaits = char === '{' ? 'key' : 'value';
        justOpened = true;
        continue;
      }
      const end = char === '"' ? stringEnd(text, offset) : at(SCALAR, text, offset);
      if (end < 0) return mistake(char === '"' ? 'a text that ends with a quote on its line' : 'a value');
      offset = end;
      awaits = 'separator';
    }
  }
}
