import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { lineAndColumn, pathKey, scanJson } from '../../src/arm/jsonText.ts';

function parses(text: string): boolean {
  try {
    JSON.parse(text);
    return true;
  } catch {
    return false;
  }
}

describe('the scan of JSON text', () => {
  it('finds a mistake exactly where JSON.parse refuses (seed 41)', () => {
    const piece = fc.constantFrom(
      '{',
      '}',
      '[',
      ']',
      ',',
      ':',
      '"a"',
      '"b"',
      '"\\u00e9"',
      '"\\x"',
      '"\t"',
      '1',
      '-',
      '-1',
      '01',
      '1.',
      '1e5',
      '.5',
      'true',
      'nul',
      ' ',
      '\n',
      '\u00a0',
    );
    const text = fc.array(piece, { maxLength: 12 }).map((p) => p.join(''));
    fc.assert(
      fc.property(text, (t) => {
        expect(scanJson(t).mistake === null, t).toBe(parses(t));
      }),
      { seed: 41, numRuns: 20_000 },
    );
  });

  it('accepts what JSON.stringify writes, and what is broken by one letter only where JSON.parse does (seed 42)', () => {
    const property = fc.property(
      fc.jsonValue(),
      fc.nat(),
      fc.constantFrom('', ',', '"', '}', '0', '\\'),
      (value, where, letter) => {
        const text = JSON.stringify(value);
        expect(scanJson(text).mistake).toBeNull();
        const at = where % (text.length + 1);
        const broken = text.slice(0, at) + letter + text.slice(at + 1);
        expect(scanJson(broken).mistake === null, broken).toBe(parses(broken));
      },
    );
    fc.assert(property, { seed: 42, numRuns: 2000 });
  });

  it('finds keys given twice, at any depth and in any spelling', () => {
    const scan = scanJson('{"a": [{"b": 1, "c": 2, "\\u0062": 3}], "a": 1, "__proto__": 1, "__proto__": 2}');
    expect(scan.duplicates.map((entry) => entry.path)).toEqual([['a', 0, 'b'], ['a'], ['__proto__']]);
    expect(scanJson('{"a": {"b": 1}, "b": [{"a": 1}, {"a": 2}]}').duplicates).toEqual([]);
  });

  it('finds where a path stands', () => {
    const text = '{\n  "a": [10, {"b": 1}]\n}';
    const paths = [[], ['a'], ['a', 0], ['a', 1], ['a', 1, 'b'], ['a', 2]];
    const { offsets } = scanJson(text, paths);
    const starts = paths.map((path) => {
      const offset = offsets.get(pathKey(path));
      return offset === undefined ? null : text.slice(offset, offset + 3);
    });
    expect(starts).toEqual(['{\n ', '"a"', '10,', '{"b', '"b"', null]);
    expect(lineAndColumn(text, offsets.get(pathKey(['a', 1, 'b']))!)).toEqual({ line: 2, column: 14 });
  });

  it('walks a text of megabytes', () => {
    const long = JSON.stringify({ a: 'x\\"'.repeat(1e6), b: Array(3e5).fill(1) });
    expect(scanJson(long).mistake).toBeNull();
    expect(scanJson(long.slice(0, -1)).mistake).toMatchObject({
      offset: long.length - 1,
      found: 'the end of the text',
    });
  });
});
