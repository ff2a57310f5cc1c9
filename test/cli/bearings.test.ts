/** `--bearings`: the user's own table beside the file's. */
import { readFileSync } from 'node:fs';
import { afterAll, describe, expect, it } from 'vitest';
import { readBearingCsv } from '../../src/capacity/rolling/index.ts';
import { armload, complaints, model, modelFile, ROOT, scratchFolder } from './armload.ts';

const scratch = scratchFolder();
afterAll(() => scratch.remove());

const HEADER = 'name,kind,bore_mm,outer_mm,width_mm,C_N,C0_N,source';
const ROW = 'dg-10-20,deep-groove,20,42,12,9000,2500,own table';
const OTHER = 'never-named,deep-groove,20,42,12,9000,5000,own table';

describe('armload --bearings', () => {
  it('reads the example of the README', () => {
    const [, csv] = /```csv\n([\s\S]*?)```/.exec(readFileSync(`${ROOT}/README.md`, 'utf8'))!;
    const { bearings, issues } = readBearingCsv(csv!);
    expect(issues).toEqual([]);
    expect(Object.keys(bearings)).toEqual(['own-20', 'own-bush']);
  });

  it.each([
    ['pose', ['--at=10,-40']],
    ['sweep', ['--samples', '2', '--case', 'hold the grinder']],
    ['worst', ['--case', 'hold the grinder', '--gap', '0.1']],
    ['compare', ['--joint', 'elbow', '--samples', '2']],
  ] as const)(
    '%s takes the bearings that the arm names from the table, as if they stood in the file',
    async (verb, args) => {
      const table = scratch.write('own.csv', `${HEADER}\n${ROW}\n${OTHER}\n`);
      const file = modelFile('two-link');
      const own = {
        kind: 'deep-groove',
        bore_mm: 20,
        outer_mm: 42,
        width_mm: 12,
        C_N: 9000,
        C0_N: 2500,
        source: 'own table',
      };
      const inside = scratch.write('inside.arm.json', { ...file, bearings: { ...file.bearings, 'dg-10-20': own } });
      const untimed = (text: string) => text.replace(/"seconds":[^,]+,/, '');
      const by = await armload([verb, model('two-link'), ...args, '--bearings', table, '--json']);
      const as = await armload([verb, inside, ...args, '--json']);
      expect(untimed(by.stdout)).toBe(untimed(as.stdout));
      expect(by.code).toBe(as.code);
      const said = complaints(by).filter((line) => line.includes('own.csv'));
      expect(said).toHaveLength(1);
      expect(said[0]).toContain('"dg-10-20"');
      expect(said[0]).not.toContain('never-named');
    },
  );

  it('says so where the arm names none of the table', async () => {
    const table = scratch.write('none.csv', `${HEADER}\n${OTHER}\n`);
    const ran = await armload(['pose', model('two-link'), '--at=0,0', '--bearings', table]);
    expect(complaints(ran).join('\n')).toContain('the arm names no bearing of');
    expect(ran.stdout).toBe((await armload(['pose', model('two-link'), '--at=0,0'])).stdout);
  });

  it('is 2 with every problem and its line where the table is not sound, and prints no result', async () => {
    const table = scratch.write(
      'bad.csv',
      `${HEADER}\ndg-10-20,deep-groove,20,42,12,nine,5000,\n${OTHER.replace('42', '-4')}\n`,
    );
    const ran = await armload(['pose', model('two-link'), '--at=0,0', '--bearings', table]);
    expect(ran.code).toBe(2);
    expect(ran.stdout).toBe('');
    expect(complaints(ran)[0]).toContain('bad.csv is not a valid table of bearings');
    expect(ran.stderr).toMatch(/line 2, column 31: found "nine", expected a number/);
    expect(ran.stderr).toMatch(/line 3, column \d+: found -4, expected/);
    const json = await armload(['pose', model('two-link'), '--at=0,0', '--bearings', table, '--json']);
    expect(JSON.parse(json.stdout)).toMatchObject({ sound: false, issues: [{ line: 2 }, { line: 3 }] });
  });

  it('is 2 where a bearing of the table does not go with its joint, and 3 where there is no such file', async () => {
    const table = scratch.write('ring.csv', 'name,kind,bore_mm,outer_mm,width_mm\ndg-10-20,crossed-roller,20,60,12\n');
    const ran = await armload(['pose', model('two-link'), '--at=0,0', '--bearings', table]);
    expect(ran.code).toBe(2);
    expect(ran.stderr).toContain('crossed-roller');
    const gone = await armload(['pose', model('two-link'), '--at=0,0', '--bearings', '/tmp/no-such-table.csv']);
    expect(gone.code).toBe(3);
    expect(gone.stderr).toContain('no such file');
  });
});
