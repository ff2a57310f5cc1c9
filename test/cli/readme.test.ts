/**
 * What the README shows is what the program prints, and its field reference is the schema's. `WRITE_README=1 npx vitest run
 * test/cli/readme.test.ts` writes both anew.
 */
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { fieldReference } from '../../src/arm/jsonSchema.ts';
import { armload, ROOT } from './armload.ts';

const PATH = join(ROOT, 'README.md');
const BLOCK = /```console\n\$ npm run --silent armload -- (.+)\n([\s\S]*?)```/g;
const FIELDS = /(<!-- fields: .* -->\n)([\s\S]*?)(<!-- end of fields -->)/;

const update = process.env.WRITE_README === '1';
const readme = () => readFileSync(PATH, 'utf8');

/** The words of a command as a shell gives them, with double quotes. */
function words(command: string): string[] {
  return [...command.matchAll(/"([^"]*)"|(\S+)/g)].map((m) => m[1] ?? m[2]!);
}

function fieldTable(): string {
  const cell = (text: string) => text.replaceAll('|', '\\|');
  const lines = fieldReference().map((row) => {
    const kinds = row.kinds.length > 0 ? ` (${row.kinds.join(', ')})` : '';
    const without = row.required ? 'needed' : row.default === '' ? '' : row.default;
    return `| \`${row.path}\`${kinds} | ${row.unit} | ${cell(row.meaning)} | ${cell(without)} |`;
  });
  return ['| field | unit | meaning | where left out |', '| --- | --- | --- | --- |', ...lines, ''].join('\n');
}

describe('README', () => {
  it('shows examples that are what the program prints', async () => {
    const blocks = [...readme().matchAll(BLOCK)];
    expect(blocks.map((m) => words(m[1]!)[0])).toEqual(['pose', 'sweep', 'worst', 'compare']);
    let text = readme();
    for (const [whole, command, shown] of blocks) {
      const ran = await armload(words(command!));
      expect([command, ran.code, ran.stderr.match(/invalid|warning|error/)]).toEqual([command, 0, null]);
      const head = whole!.slice(0, whole!.indexOf(command!) + command!.length);
      if (update) text = text.replace(whole!, () => `${head}\n${ran.stdout}\`\`\``);
      else expect(shown).toBe(ran.stdout);
    }
    if (update) writeFileSync(PATH, text);
  });

  it('has the field reference of the schema', () => {
    if (update)
      writeFileSync(
        PATH,
        readme().replace(FIELDS, (_, head, __, end) => head + fieldTable() + end),
      );
    const shown = FIELDS.exec(readme());
    expect(shown?.[2]).toBe(fieldTable());
  });

  it('names the files and commands that are there', () => {
    const text = readme();
    const scripts = JSON.parse(readFileSync(join(ROOT, 'package.json'), 'utf8')).scripts;
    for (const script of ['start', 'test', 'armload']) expect(scripts[script]).toBeDefined();
    for (const [, path] of text.matchAll(/`((?:src|models|test)\/[\w./-]*)`/g)) {
      expect([path, existsSync(join(ROOT, path!))]).toEqual([path, true]);
    }
    for (const [, path] of text.matchAll(/\]\(([\w./-]+\.md|LICENSE)\)/g)) {
      expect([path, existsSync(join(ROOT, path!))]).toEqual([path, true]);
    }
  });
});
