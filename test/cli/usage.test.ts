import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import packageFile from '../../package.json';
import { armload, complaints, model, modelFile, ROOT, scratchFolder } from './armload.ts';

const scratch = scratchFolder();
afterAll(() => scratch.remove());

describe('wrong usage ends with 3 and one line that says what to change', () => {
  const arm = model('two-link');
  const mistakes: [string, string[], RegExp][] = [
    ['an unknown verb', ['pos', arm], /unknown command 'pos' \(Did you mean pose\?\)/],
    ['an unknown option', ['pose', arm, '--at=0,0', '--cse', 'x'], /unknown option '--cse' \(Did you mean --case\?\)/],
    ['no file', ['pose', '--at=0,0'], /missing required argument 'file'/],
    ['two files', ['check', arm, arm], /too many arguments/],
    ['no pose', ['pose', arm], /required option '--at <angles>' not specified/],
    ['an empty pose', ['pose', arm, '--at='], /takes angles in degrees, such as -10,20/],
    ['a pose with a word', ['pose', arm, '--at=0,x'], /"x" is not a number/],
    ['a pose with a hole', ['pose', arm, '--at=0,,1'], /"" is not a number/],
    ['a pose that is not decimal', ['pose', arm, '--at=0,0x10'], /"0x10" is not a number/],
    ['an infinite pose', ['pose', arm, '--at=0,1e999'], /"1e999" is not a number/],
    ['a pose too short', ['pose', arm, '--at=0'], /--at has 1 angle, but the arm turns in 2: /],
    ['a pose too long', ['pose', arm, '--at=0,0,0'], /--at has 3 angles, but the arm turns in 2: /],
    ['an unknown case', ['pose', arm, '--at=0,0', '--case', 'nil'], /there is no case "nil"; the cases are "/],
    ['a missing file', ['check', '/no/such.arm.json'], /cannot read \/no\/such\.arm\.json: there is no such file/],
    ['a folder', ['check', 'models'], /cannot read models: it is a folder/],
  ];
  for (const [what, args, message] of mistakes) {
    it(what, async () => {
      const ran = await armload(args);
      expect(ran.code).toBe(3);
      expect(ran.stdout).toBe('');
      expect(ran.stderr).toMatch(message);
      expect(ran.stderr.trimEnd().split('\n')).toHaveLength(1);
      expect(ran.stderr.startsWith('armload: ')).toBe(true);
      expect(ran.stderr).not.toMatch(/\n\s+at /);
    });
  }

  it('no verb at all shows the help', async () => {
    const ran = await armload([]);
    expect(ran.code).toBe(3);
    expect(ran.stderr).toContain('Usage: armload');
  });
});

describe('help', () => {
  it('is enough for a newcomer: every verb, an example of it, the exit codes', async () => {
    const { code, stdout } = await armload(['--help']);
    expect(code).toBe(0);
    for (const verb of ['pose', 'sweep', 'check', 'worst', 'compare']) {
      expect(stdout).toMatch(new RegExp(`^ {2}${verb} `, 'm'));
      const own = await armload([verb, '--help']);
      expect(own.code).toBe(0);
      expect(own.stdout).toContain('Example');
      expect(own.stdout).toContain(`armload ${verb} models/`);
    }
    expect(stdout).toContain('Exit codes');
  });

  it('shows only examples that run', async () => {
    const texts = await Promise.all(
      [[], ['pose'], ['sweep'], ['check'], ['worst'], ['compare']].map((v) => armload([...v, '--help'])),
    );
    const examples = texts.flatMap(({ stdout }) => [...stdout.matchAll(/^ {2}armload (.+)$/gm)].map((m) => m[1]!));
    expect(examples.length).toBeGreaterThanOrEqual(8);
    for (const example of new Set(examples)) {
      const ran = await armload(example.match(/"[^"]*"|\S+/g)!.map((word) => word.replaceAll('"', '')));
      // 1: the example shows an arm with a check over its limit.
      expect([example, [0, 1].includes(ran.code!), ran.stderr.match(/invalid|warning|error/)]).toEqual([
        example,
        true,
        null,
      ]);
    }
  });

  it('tells the version', async () => {
    expect(await armload(['--version'])).toMatchObject({ code: 0, stdout: `${packageFile.version}\n` });
  });
});

describe('armload check', () => {
  it('says a sound file is sound', async () => {
    const ran = await armload(['check', model('two-link')]);
    expect(ran).toMatchObject({ code: 0, stderr: '' });
    expect(ran.stdout).toMatch(/two-link\.arm\.json is sound: ".+", 2 revolute joints, 3 cases\./);
    const json = await armload(['check', model('two-link'), '--json']);
    expect(JSON.parse(json.stdout)).toMatchObject({ armload: 1, sound: true, issues: [] });
  });

  it('lists every problem with its place, what was found and what was expected, and ends with 2', async () => {
    const file = modelFile('two-link');
    file.joints[0].support.span_mm = -5;
    file.joints[1].axis = [0, 0, 0];
    file.cases[0].colour = 'green';
    const path = scratch.write('three.arm.json', file);
    const ran = await armload(['check', path]);
    expect(ran.code).toBe(2);
    expect(ran.stdout).toContain('is not a valid arm file (3 problems)');
    expect(ran.stdout).toMatch(/joints\[0\]\.support\.span_mm: found -5, expected .+\./);
    expect(ran.stdout).toMatch(/joints\[1\]\.axis: found .+, expected .+\./);
    expect(ran.stdout).toMatch(/cases\[0\]\.colour: found .+, expected .+\./);
    const json = JSON.parse((await armload(['check', path, '--json'])).stdout);
    expect(json.sound).toBe(false);
    expect(json.issues).toHaveLength(3);
    for (const issue of json.issues) {
      expect(Object.keys(issue)).toEqual(['code', 'path', 'found', 'expected', 'line', 'column']);
    }
  });

  it('gives line and column of broken JSON', async () => {
    const ran = await armload(['check', scratch.write('broken.arm.json', '{\n  "armload": 1,\n  "name" "x"\n}')]);
    expect(ran.code).toBe(2);
    expect(ran.stdout).toMatch(/line 3, column 10: .*expected ":" after the key/);
  });

  it('refuses what is no text, and what is no arm', async () => {
    const bytes = await armload(['check', scratch.write('bytes.arm.json', Buffer.from([0xff, 0xfe, 0x00, 0x80]))]);
    expect(bytes.code).toBe(2);
    expect(bytes.stdout).toContain('expected UTF-8 text');
    const empty = await armload(['check', '-'], { stdin: '' });
    expect(empty.code).toBe(2);
    const list = await armload(['check', '-'], { stdin: '[]' });
    expect(list.code).toBe(2);
    const huge = await armload(['check', '-'], { stdin: Buffer.alloc(17 * 1024 * 1024, 32) });
    expect(huge.code).toBe(2);
    expect(huge.stdout).toContain('8 MiB');
  });
});

describe('a file that is not valid', () => {
  const broken = scratch.write('bare.arm.json', '{"armload": 1}');
  for (const args of [
    ['pose', broken, '--at=0'],
    ['sweep', broken],
    ['compare', broken, '--joint', 'x'],
  ]) {
    it(`ends ${args[0]} with 2, its problems on standard error, and a JSON document with --json`, async () => {
      const ran = await armload(args);
      expect(ran.code).toBe(2);
      expect(ran.stdout).toBe('');
      expect(complaints(ran)[0]).toMatch(/is not a valid arm file \(\d problems\):$/);
      expect(ran.stderr).toMatch(/joints: found nothing, expected/);
      const json = await armload([...args, '--json']);
      expect(json.code).toBe(2);
      expect(JSON.parse(json.stdout).issues.map((issue: { path: string }) => issue.path)).toContain('joints');
    });
  }
});

it('a reader that closes the pipe early is no error', async () => {
  const child = spawn(
    process.execPath,
    [join(ROOT, 'dist/node/cli.js'), 'pose', model('seven-joint'), '--at=0,0,0,0,0,0,0'],
    {
      cwd: ROOT,
    },
  );
  let stderr = '';
  child.stderr.on('data', (data) => {
    stderr += data;
  });
  child.stdout.destroy();
  const code = await new Promise((resolve) => child.on('close', resolve));
  expect(code).toBe(0);
  expect(stderr).not.toMatch(/EPIPE|Error/);
});
