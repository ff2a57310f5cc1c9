/** Who may import whom: the folder order of `src`, no cycles, an engine that knows neither page nor Node. */
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { findCycle, type Import, importsOf, isCode, packageOf, projectFiles } from './sourceTree.ts';

/** A file imports from its own folder and from those before it. */
const ORDER = ['units', 'math', 'arm', 'mechanics', 'capacity', 'studies', 'worker', 'report', 'cli', 'app'];
const ENGINE = ['units', 'math', 'arm', 'mechanics', 'capacity', 'studies', 'worker'];
const NOT_IN_ENGINE = /^(three|react|react-dom|zustand|@react-three)(\/|$)|^node:/;
/** The two entries by which a Node program starts workers. */
const NODE_ENTRIES = ['src/worker/nodeWorker.ts', 'src/worker/nodePool.ts'];

const files = projectFiles().filter(isCode);
const source = files.filter((path) => path.startsWith('src/'));
const imports = new Map<string, Import[]>(files.map((path) => [path, importsOf(path)]));
const folderOf = (path: string): string => path.split('/')[1]!;

/** `path:line imports specifier` of each import that breaks a rule. */
function offences(paths: readonly string[], breaks: (path: string, one: Import) => boolean): string[] {
  return paths.flatMap((path) =>
    imports
      .get(path)!
      .filter((one) => breaks(path, one))
      .map((one) => `${path}:${one.line} imports ${one.specifier}`),
  );
}

describe('imports', () => {
  it('are found in every file of the project', () => {
    expect(source.length).toBeGreaterThan(20);
    expect([...imports.values()].flat().length).toBeGreaterThan(100);
  });

  it('are all seen, however they are written', () => {
    const folder = mkdtempSync(join(tmpdir(), 'imports-'));
    const path = join(folder, 'all.ts');
    const lines = [
      "import './a.ts';",
      "import type { B } from './b.ts';",
      "export * from './c.ts';",
      "export { d } from './d.ts';",
      "type E = import('./e.ts').E;",
      "const f = await import('./f.ts');",
      "new Worker(new URL('./g.ts', import.meta.url));",
      "const h = require('./h.ts');",
      "import i from '@scope/i/part';",
    ];
    writeFileSync(path, lines.join('\n'));
    const seen = importsOf(path).sort((a, b) => a.line - b.line);
    rmSync(folder, { recursive: true });
    expect(seen.map((one) => one.line)).toEqual(lines.map((_, k) => k + 1));
    expect(seen.slice(0, 8).map((one) => one.file)).toEqual([...'abcdefgh'].map((name) => join(folder, `${name}.ts`)));
    expect(packageOf(seen[8]!.specifier)).toBe('@scope/i');
  });

  it('lead to a file that is there, inside the project, with its extension', () => {
    expect(
      offences(
        files,
        (_, { file }) => file !== null && (file.startsWith('..') || file.startsWith('/') || !existsSync(file)),
      ),
    ).toEqual([]);
  });

  it('follow the order of the folders', () => {
    for (const path of source) expect(ORDER, path).toContain(folderOf(path));
    expect(
      offences(source, (path, { file }) => {
        if (file === null) return false;
        if (!file.startsWith('src/')) return !file.startsWith('models/') && file !== 'package.json';
        return ORDER.indexOf(folderOf(file)) > ORDER.indexOf(folderOf(path));
      }),
    ).toEqual([]);
  });

  it('make no cycle', () => {
    const edges = new Map(
      source.map((path) => [path, imports.get(path)!.flatMap(({ file }) => (file === null ? [] : [file]))]),
    );
    expect(findCycle(edges)).toBeNull();
    const looped = new Map([
      ['a', ['b']],
      ['b', ['c', 'd']],
      ['d', ['b']],
    ]);
    expect(findCycle(looped)).toEqual(['b', 'd', 'b']);
  });

  it('keep the engine free of the page and of Node', () => {
    const engine = source.filter((path) => ENGINE.includes(folderOf(path)) && !NODE_ENTRIES.includes(path));
    expect(offences(engine, (_, { specifier }) => NOT_IN_ENGINE.test(specifier))).toEqual([]);
    expect(offences(engine, (_, { file }) => file !== null && NODE_ENTRIES.includes(file))).toEqual([]);
  });

  it('keep the page free of Node', () => {
    const page = source.filter((path) => ['app', 'report'].includes(folderOf(path)));
    expect(
      offences(page, (_, { specifier, file }) => /^node:/.test(specifier) || (file?.startsWith('src/cli/') ?? false)),
    ).toEqual([]);
    expect(offences(page, (_, { file }) => file !== null && NODE_ENTRIES.includes(file))).toEqual([]);
  });

  it('name only packages that package.json lists, and in src none that only tests have', () => {
    const { dependencies, devDependencies } = JSON.parse(readFileSync('package.json', 'utf8')) as Record<
      string,
      object
    >;
    const shipped = Object.keys(dependencies!);
    const listed = [...shipped, ...Object.keys(devDependencies!)];
    const missing =
      (packages: string[]) =>
      (_: string, { file, specifier }: Import) =>
        file === null && !specifier.startsWith('node:') && !packages.includes(packageOf(specifier));
    expect(offences(files, missing(listed))).toEqual([]);
    expect(offences(source, missing(shipped))).toEqual([]);
  });
});
