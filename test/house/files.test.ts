/** What lies where, how long files are, and what may not stand in them. */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { isCode, type Node, projectFiles, walk } from './sourceTree.ts';

const files = projectFiles();
const code = files.filter(isCode);
const source = code.filter((path) => path.startsWith('src/'));
const ENGINE = /^src\/(units|math|arm|mechanics|capacity|studies|worker)\//;

/** Top level: these and dotfiles, nothing else. */
const TOP = [
  'DEVELOPERS.md',
  'LICENSE',
  'README.md',
  'index.html',
  'models',
  'package-lock.json',
  'package.json',
  'src',
  'test',
  'tsconfig.json',
  'vite.config.ts',
];
/** The guides are checked by their own tests once written. */
const MAY_BE_MISSING = ['DEVELOPERS.md', 'README.md'];

/** About 300 lines is the habit; beyond this a file is two ideas. */
const MOST_LINES = 420;

function lineOf(path: string, node: Node): string {
  return `${path}:${readFileSync(path, 'utf8').slice(0, node.start).split('\n').length}`;
}

/** `path:line` of every node that breaks a rule. */
function nodesThat(paths: readonly string[], breaks: (node: Node) => boolean): string[] {
  const found: string[] = [];
  for (const path of paths) {
    walk(path, (node) => {
      if (breaks(node)) found.push(lineOf(path, node));
    });
  }
  return found;
}

function linesThat(paths: readonly string[], pattern: RegExp): string[] {
  return paths.flatMap((path) =>
    readFileSync(path, 'utf8')
      .split('\n')
      .flatMap((line, k) => (pattern.test(line) ? [`${path}:${k + 1} ${line.trim()}`] : [])),
  );
}

/** Name of what a call like `it.only(…)` or `Math.random()` calls: object and member. */
function called(node: Node): string {
  if (node.type !== 'MemberExpression') return '';
  const name = (part: unknown) => ((part ?? {}) as { name?: string }).name ?? '';
  return `${name(node.object)}.${name(node.property)}`;
}

describe('the house', () => {
  it('has a top level of exactly what it should', () => {
    const top = [...new Set(files.map((path) => path.split('/')[0]!))].filter((name) => !name.startsWith('.'));
    expect(top.filter((name) => !TOP.includes(name))).toEqual([]);
    expect(TOP.filter((name) => !top.includes(name) && !MAY_BE_MISSING.includes(name))).toEqual([]);
  });

  it(`has no source file of more than ${MOST_LINES} lines`, () => {
    const lengths = source.map((path) => ({ path, lines: readFileSync(path, 'utf8').split('\n').length - 1 }));
    expect(lengths.filter(({ lines }) => lines > MOST_LINES)).toEqual([]);
  });

  it('leaves no note of work undone and no path out of the project', () => {
    const marks = ['TO', 'FIX', 'X', 'HA'].map((start, k) => start + ['DO', 'ME', 'XX', 'CK'][k]);
    expect(linesThat(code, new RegExp(`\\b(${marks.join('|')})\\b`))).toEqual([]);
    const away = new RegExp(`${['\\.\\.', 'shared'].join('/')}\\b|${['', 'work', ''].join('/')}`);
    const written = files.filter(
      (path) => /\.(tsx?|m?js|json|md|html|css)$/.test(path) && path !== 'package-lock.json',
    );
    expect(linesThat(written, away)).toEqual([]);
  });

  it('names files by what they hold', () => {
    expect(code.filter((path) => /(^|\/)(utils?|helpers?|manager|misc|common|stuff)\b/i.test(path))).toEqual([]);
  });

  it('needs no build to strip types: no enum, namespace or parameter property', () => {
    const stripped = ['TSEnumDeclaration', 'TSModuleDeclaration', 'TSParameterProperty', 'TSExportAssignment'];
    const ambient = (node: Node) => node.type === 'TSModuleDeclaration' && node.declare === true;
    expect(nodesThat(code, (node) => stripped.includes(node.type) && !ambient(node))).toEqual([]);
  });

  it('computes in double precision and by seed: no Float32Array, no Math.random in the engine', () => {
    const engine = source.filter((path) => ENGINE.test(path));
    expect(engine.length).toBeGreaterThan(10);
    expect(
      nodesThat(
        engine,
        (node) => called(node) === 'Math.random' || (node.type === 'Identifier' && node.name === 'Float32Array'),
      ),
    ).toEqual([]);
  });

  it('skips no test and singles none out', () => {
    const tests = code.filter((path) => path.endsWith('.test.ts') || path.endsWith('.test.tsx'));
    expect(tests.length).toBeGreaterThan(5);
    const skipping = /^(it|test|describe|bench)\.(only|skip|todo|skipIf|runIf|fails)$/;
    expect(nodesThat(tests, (node) => skipping.test(called(node)))).toEqual([]);
    const asserting = tests.filter((path) => !/\bexpect\(|\bassert\b/.test(readFileSync(path, 'utf8')));
    expect(asserting).toEqual([]);
  });
});
