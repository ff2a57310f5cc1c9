/** What a start keeps for the next one: made by the first, used after, replaced where it is broken or old. On a copy of the built files. */
import { execFileSync } from 'node:child_process';
import { cpSync, mkdtempSync, readdirSync, readFileSync, rmSync, statSync, utimesSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { ROOT } from './armload.ts';

let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'armload-'));
  cpSync(join(ROOT, 'dist/node'), folder, { recursive: true, filter: (path) => !path.includes('.compiled') });
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const run = () =>
  execFileSync(
    process.execPath,
    [join(folder, 'cli.js'), 'pose', join(ROOT, 'models/two-link.arm.json'), '--at=0,20'],
    {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    },
  );
const kept = () => readdirSync(folder).filter((name) => name.endsWith('.js.compiled'));

/** From Node 22 on the engine keeps it by itself, in a folder of its own; then only the answer is looked at. */
const ours = Number(process.versions.node.split('.')[0]) < 22;

describe('compiled code', () => {
  it('is kept by the first start and changes nothing', () => {
    expect(kept()).toEqual([]);
    const first = run();
    expect(first).toContain('loads at the pose');
    expect(run()).toBe(first);
    if (!ours) return;
    expect(kept().length).toBeGreaterThan(3);
    // No parts are left behind
    expect(readdirSync(folder).filter((name) => /\.compiled\./.test(name))).toEqual([]);
    const times = kept().map((name) => statSync(join(folder, name)).mtimeMs);
    expect(run()).toBe(first);
    expect(kept().map((name) => statSync(join(folder, name)).mtimeMs)).toEqual(times);
  });

  it('is made anew where it is broken, or older than the file', () => {
    const first = run();
    if (!ours) return;
    const [broken, old] = kept();
    writeFileSync(join(folder, broken!), 'no code');
    utimesSync(join(folder, old!), 1, 1);
    expect(run()).toBe(first);
    expect(readFileSync(join(folder, broken!)).length).toBeGreaterThan(100);
    expect(statSync(join(folder, old!)).mtimeMs).toBeGreaterThan(1e6);
  });
});
