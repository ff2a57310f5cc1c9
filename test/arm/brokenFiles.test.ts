import { describe, expect, it } from 'vitest';
import type { IssueCode, IssuePath } from '../../src/arm/issue.ts';
import { issueText } from '../../src/arm/issue.ts';
import { readArm, readArmValue } from '../../src/arm/readArm.ts';
import { wholeFile } from './wholeFile.ts';

/** Puts `value` where the path leads (undefined: takes the key away). */
type Change = readonly [path: IssuePath, value: unknown];

/** One mistake, the code and path it must be reported with, and nothing else. The path is that of the first change where none is given. */
type Row = readonly [title: string, changes: readonly Change[], code: IssueCode, path?: IssuePath];

function changed(changes: readonly Change[]): unknown {
  const file = wholeFile() as unknown as Record<string, unknown>;
  for (const [path, value] of changes) {
    let place = file as Record<string | number, unknown>;
    for (const step of path.slice(0, -1)) place = place[step] as Record<string | number, unknown>;
    const last = path.at(-1)!;
    if (value === undefined) delete place[last];
    else Object.defineProperty(place, last, { value, enumerable: true, configurable: true, writable: true });
  }
  return file;
}

const support = (i: number, ...rest: (string | number)[]) => ['joints', i, 'support', ...rest];
const one = (path: IssuePath, value: unknown): readonly Change[] => [[path, value]];

const fixedOnly = { name: 'post', kind: 'fixed', origin_mm: [0, 0, 0], link: { mass_kg: 1, centre_mm: [0, 0, 0] } };
const inertia = (xx: number, yy: number, zz: number, more: object = {}) => ({ xx, yy, zz, ...more });

const ROWS: readonly Row[] = [
  // The whole
  ['another version', one(['armload'], 2), 'version'],
  ['the version as a text', one(['armload'], '1'), 'version'],
  ['no version', one(['armload'], undefined), 'missing'],
  ['no name', one(['name'], undefined), 'missing'],
  ['an empty name', one(['name'], ''), 'bad-text'],
  ['a name of two lines', one(['name'], 'a\nb'), 'bad-text'],
  ['a name with blanks around it', one(['name'], ' arm '), 'bad-text'],
  ['a name too long', one(['name'], 'x'.repeat(121)), 'bad-text'],
  ['a note that is a number', one(['note'], 5), 'wrong-type'],
  ['a note too long', one(['note'], 'x'.repeat(20_001)), 'too-long'],
  ['a key that is not known', one(['colour'], 'green'), 'unknown-key'],
  ['gravity left out', one(['gravity_m_s2'], undefined), 'missing'],
  ['gravity of two numbers', one(['gravity_m_s2'], [0, -9.8]), 'wrong-length'],
  ['gravity of four numbers', one(['gravity_m_s2'], [0, 0, -9.8, 0]), 'wrong-length'],
  ['gravity with a text in it', one(['gravity_m_s2', 2], '-9.8'), 'wrong-type'],
  ['gravity that is one number', one(['gravity_m_s2'], 9.8), 'wrong-type'],
  ['null for a number', one(['gravity_m_s2', 0], null), 'wrong-type'],
  ['a number that is not finite', one(['gravity_m_s2', 0], Number.POSITIVE_INFINITY), 'not-finite'],
  ['a number that is not a number', one(['gravity_m_s2', 0], Number.NaN), 'not-finite'],
  ['a number beyond all sense', one(['gravity_m_s2', 0], 1e200), 'out-of-range'],
  // Joints
  ['no joints', one(['joints'], undefined), 'missing'],
  ['joints as an object', [[['joints'], { a: 1 }]], 'wrong-type'],
  [
    'an empty list of joints',
    [
      [['joints'], []],
      [['cases'], undefined],
      [['duty'], undefined],
    ],
    'wrong-length',
  ],
  ['65 joints', [[['joints'], Array(65).fill(fixedOnly)]], 'wrong-length'],
  [
    'only fixed joints',
    [
      [['joints'], [fixedOnly]],
      [['cases'], undefined],
      [['duty'], undefined],
    ],
    'nothing-turns',
  ],
  ['a joint that is a number', [[['joints', 3], 7]], 'wrong-type'],
  ['a joint without a name', one(['joints', 0, 'name'], undefined), 'missing'],
  ['a name used by two joints', one(['joints', 2, 'name'], 'elbow'), 'duplicate-name'],
  ['a kind of joint that is not known', one(['joints', 0, 'kind'], 'prismatic'), 'not-a-choice'],
  ['a joint without a kind', one(['joints', 0, 'kind'], undefined), 'missing'],
  ['a kind that is no text', one(['joints', 0, 'kind'], true), 'wrong-type'],
  ['a fixed joint with travel', one(['joints', 3, 'travel_deg'], [0, 90]), 'unknown-key'],
  ['an origin left out', one(['joints', 0, 'origin_mm'], undefined), 'missing'],
  ['a turn of two angles', one(['joints', 0, 'turn_deg'], [0, 90]), 'wrong-length'],
  ['no axis', one(['joints', 0, 'axis'], undefined), 'missing'],
  ['an axis of no length', one(['joints', 0, 'axis'], [0, 0, 0]), 'zero-vector'],
  ['an axis that nearly vanishes', one(['joints', 0, 'axis'], [1e-12, 0, 0]), 'zero-vector'],
  ['no travel', one(['joints', 0, 'travel_deg'], undefined), 'missing'],
  ['travel of one number', one(['joints', 0, 'travel_deg'], [90]), 'wrong-length'],
  [
    'travel the wrong way round',
    [
      [
        ['joints', 0, 'travel_deg'],
        [120, -30],
      ],
      [['duty'], undefined],
    ],
    'wrong-order',
  ],
  ['no link', one(['joints', 0, 'link'], undefined), 'missing'],
  ['no mass', one(['joints', 0, 'link', 'mass_kg'], undefined), 'missing'],
  ['mass below 0', one(['joints', 0, 'link', 'mass_kg'], -1), 'out-of-range'],
  ['mass without a centre', one(['joints', 0, 'link', 'centre_mm'], undefined), 'missing'],
  ['a key in the wrong unit', one(['joints', 0, 'link', 'mass_lb'], 3), 'unknown-key'],
  // Inertia
  ['no inertia where a case has motion', one(['joints', 1, 'link', 'inertia_kg_m2'], undefined), 'missing'],
  ['no inertia of a part fixed on a moving link', one(['joints', 3, 'link', 'inertia_kg_m2'], undefined), 'missing'],
  ['an inertia without yy', one(['joints', 1, 'link', 'inertia_kg_m2', 'yy'], undefined), 'missing'],
  ['a moment of inertia below 0', one(['joints', 1, 'link', 'inertia_kg_m2', 'xx'], -0.1), 'out-of-range'],
  [
    'one moment larger than the sum of the others',
    one(['joints', 1, 'link', 'inertia_kg_m2'], inertia(1, 1, 2.01)),
    'inertia',
  ],
  [
    'products too large for the moments',
    one(['joints', 1, 'link', 'inertia_kg_m2'], inertia(1, 1, 1, { xy: 1.1 })),
    'inertia',
  ],
  ['an impossible inertia of a payload', one(['cases', 0, 'payload', 'inertia_kg_m2'], inertia(0, 0, 1)), 'inertia'],
  // Supports
  ['an arrangement that is not known', one(support(0, 'arrangement'), 'fork'), 'not-a-choice'],
  ['no arrangement', one(support(0, 'arrangement'), undefined), 'missing'],
  ['no hub', one(support(0, 'hub_mm'), undefined), 'missing'],
  ['a span of 0', one(support(0, 'span_mm'), 0), 'out-of-range'],
  ['a span below 0', one(support(1, 'span_mm'), -20), 'out-of-range'],
  ['no span', one(support(0, 'span_mm'), undefined), 'missing'],
  ['a hub outside its clevis', one(support(0, 'offset_mm'), 45), 'geometry'],
  ['a hub at the edge of its clevis', one(support(0, 'offset_mm'), -40), 'geometry'],
  ['an overhang below 0', one(support(1, 'overhang_mm'), -1), 'out-of-range'],
  ['no overhang of a cantilever', one(support(1, 'overhang_mm'), undefined), 'missing'],
  ['an overhang of a clevis', one(support(0, 'overhang_mm'), 10), 'unknown-key'],
  ['a side that is not known', one(support(1, 'side'), 'left'), 'not-a-choice'],
  ['thrust to a bearing that is not there', one(support(1, 'thrust'), 'C'), 'not-a-choice'],
  ['no thrust', one(support(1, 'thrust'), undefined), 'missing'],
  ['an adjusted pair that locates at one end', one(support(0, 'thrust'), 'A'), 'conflict'],
  [
    'an adjusted pair of a kind that cannot be',
    one(support(0, 'bearings', 'A'), 'groove'),
    'wrong-kind',
    support(0, 'bearings', 'A'),
  ],
  [
    'a crossed-roller ring in a pair',
    [
      [support(1, 'bearings', 'A'), 'ring'],
      [['bearings', 'ring', 'bore_mm'], 20],
    ],
    'wrong-kind',
  ],
  ['a ring support on a bearing that carries no moment', [[support(2, 'bearing'), 'groove']], 'wrong-kind'],
  ['a bearing named by a number', one(support(0, 'bearings', 'A'), 6004), 'wrong-type'],
  ['a third bearing', one(support(0, 'bearings', 'C'), 'groove'), 'unknown-key'],
  // Shaft
  ['no diameter of a shaft', one(support(2, 'shaft', 'diameter_mm'), undefined), 'missing'],
  ['a shaft bored through', one(support(0, 'shaft', 'bore_mm'), 20), 'geometry'],
  ['a shaft that turns with nothing', one(support(0, 'shaft', 'turns_with'), 'fork'), 'not-a-choice'],
  ['a finish that is not known', one(support(0, 'shaft', 'finish'), 'polished'), 'not-a-choice'],
  ['a section bored through', one(support(1, 'shaft', 'sections', 1, 'bore_mm'), 16), 'geometry'],
  [
    'a section thinner than the bore of the shaft',
    [
      [support(1, 'shaft', 'sections', 1, 'diameter_mm'), 4.5],
      [support(1, 'shaft', 'sections', 1, 'bore_mm'), undefined],
    ],
    'geometry',
  ],
  ['a section that ends before it begins', one(support(1, 'shaft', 'sections', 1, 'to_mm'), 30), 'wrong-order'],
  ['sections that overlap', one(support(1, 'shaft', 'sections', 1, 'from_mm'), 30), 'wrong-order'],
  ['a stress concentration below 1', one(support(1, 'shaft', 'sections', 0, 'bending_factor'), 0.8), 'out-of-range'],
  // Drive
  ['a kind of drive that is not known', one(['joints', 0, 'drive', 'kind'], 'worm'), 'not-a-choice'],
  ['a gear without a radius', one(['joints', 0, 'drive', 'radius_mm'], undefined), 'missing'],
  ['a radius of 0', one(['joints', 0, 'drive', 'radius_mm'], 0), 'out-of-range'],
  ['a pressure angle of 90°', one(['joints', 0, 'drive', 'pressure_angle_deg'], 90), 'out-of-range'],
  ['a belt with less than its effective tension', one(['joints', 1, 'drive', 'tension_ratio'], 0.9), 'out-of-range'],
  ['a pretension below 0', one(['joints', 1, 'drive', 'pretension_N'], -1), 'out-of-range'],
  ['the mesh of a belt', one(['joints', 1, 'drive', 'mesh_deg'], 0), 'unknown-key'],
  // Tip and cases
  ['no tip', one(['tip'], undefined), 'missing'],
  ['a tip that is a list', one(['tip'], [0, 0, 60]), 'wrong-type'],
  [
    '65 cases',
    [
      [['cases'], Array.from({ length: 65 }, (_, i) => ({ name: `c${i}` }))],
      [['duty'], undefined],
    ],
    'wrong-length',
  ],
  ['a case without a name', one(['cases', 3, 'name'], undefined), 'missing'],
  ['a name used by two cases', one(['cases', 3, 'name'], 'press'), 'duplicate-name'],
  ['a payload below 0', one(['cases', 0, 'payload', 'mass_kg'], -3), 'out-of-range'],
  ['a payload without a centre', one(['cases', 0, 'payload', 'centre_mm'], undefined), 'missing'],
  ['a factor of 0', one(['cases', 0, 'factor'], 0), 'out-of-range'],
  ['a force below 0', one(['cases', 1, 'tip_force', 'force_N'], -50), 'out-of-range'],
  ['a force without a direction', one(['cases', 1, 'tip_force', 'direction'], undefined), 'missing'],
  ['a direction that is not known', one(['cases', 1, 'tip_force', 'direction'], 'down'), 'not-a-choice'],
  ['a direction in no frame', one(['cases', 1, 'tip_force', 'direction'], [0, 0, 1]), 'wrong-type'],
  [
    'a direction in two frames',
    one(['cases', 1, 'tip_force', 'direction'], { base: [0, 0, 1], tool: [0, 0, 1] }),
    'wrong-type',
  ],
  ['a direction of no length', one(['cases', 2, 'tip_force', 'direction', 'tool'], [0, 0, 0]), 'zero-vector'],
  ['a text in a direction', one(['cases', 3, 'tip_force', 'direction', 'base', 1], 'y'), 'wrong-type'],
  ['too few speeds', one(['cases', 0, 'motion', 'speed_deg_s'], [60, 90]), 'wrong-length'],
  ['a speed for a fixed joint', one(['cases', 0, 'motion', 'accel_deg_s2'], [1, 2, 3, 4]), 'wrong-length'],
  ['a speed below 0', one(['cases', 0, 'motion', 'speed_deg_s', 1], -5), 'out-of-range'],
  ['motion without accelerations', one(['cases', 0, 'motion', 'accel_deg_s2'], undefined), 'missing'],
  // Bearings
  ['a kind of bearing that is not known', one(['bearings', 'groove', 'kind'], 'magnetic'), 'not-a-choice'],
  ['a bearing without a bore', one(['bearings', 'groove', 'bore_mm'], undefined), 'missing'],
  ['a bore as large as the bearing', one(['bearings', 'bush', 'bore_mm'], 21), 'geometry'],
  ['a rating of 0', one(['bearings', 'groove', 'C_N'], 0), 'out-of-range'],
  ['a contact angle of 90°', one(['bearings', 'angular', 'contact_angle_deg'], 90), 'out-of-range'],
  ['half a ball', one(['bearings', 'groove', 'balls'], 8.5), 'wrong-type'],
  ['more balls than fit', one(['bearings', 'groove', 'balls'], 16), 'geometry'],
  ['balls larger than the ring', one(['bearings', 'groove', 'ball_diameter_mm'], 11), 'geometry'],
  ['a pitch circle outside the ring', one(['bearings', 'groove', 'pitch_diameter_mm'], 43), 'geometry'],
  ['three rows', one(['bearings', 'groove', 'rows'], 3), 'not-a-choice'],
  ['a clearance group that is not known', one(['bearings', 'groove', 'clearance'], 'C9'), 'not-a-choice'],
  ['a clearance given twice', one(['bearings', 'angular', 'clearance'], 'C3'), 'conflict'],
  ['clearances the wrong way round', one(['bearings', 'angular', 'clearance_um'], [8, 2]), 'wrong-order'],
  ['a shaft fit in capitals', one(['bearings', 'groove', 'shaft_fit'], 'K5'), 'bad-text'],
  ['a housing fit in small letters', one(['bearings', 'groove', 'housing_fit'], 'h7'), 'bad-text'],
  ['a flange no larger than its bushing', one(['bearings', 'bush', 'flange_outer_mm'], 21), 'geometry'],
  ['wear through the wall', one(['bearings', 'bush', 'wear_depth_mm'], 3), 'geometry'],
  ['a wear factor of 0', one(['bearings', 'bush', 'wear_factor_mm3_N_m'], 0), 'out-of-range'],
  ['a rating of a bushing', one(['bearings', 'bush', 'C_N'], 1000), 'unknown-key'],
  [
    'a bearing without a name',
    one(['bearings', ''], { kind: 'needle', bore_mm: 1, outer_mm: 2, width_mm: 1 }),
    'bad-text',
  ],
  ['a bearing named constructor', one(['bearings', 'constructor'], { kind: 'needle' }), 'unknown-key'],
  ['a bearing named __proto__', one(['bearings', '__proto__'], { kind: 'needle' }), 'unknown-key'],
  [
    '257 bearings',
    [
      [
        ['bearings'],
        Object.fromEntries(Array.from({ length: 257 }, (_, i) => [`b${i}`, wholeFile().bearings!.groove])),
      ],
    ],
    'wrong-length',
  ],
  // Duty and targets
  ['an empty duty', [[['duty'], []]], 'wrong-length'],
  ['a segment of no known case', one(['duty', 1, 'case'], 'pusch'), 'unknown-name'],
  ['shares that do not sum to 1', [[['duty', 1, 'share'], 0.5]], 'wrong-sum', ['duty']],
  ['a share of 0', [[['duty', 1, 'share'], 0]], 'out-of-range'],
  [
    'a segment with path and anywhere',
    one(['duty', 0, 'anywhere'], { cycles_per_min: [1, 1, 1] }),
    'conflict',
    ['duty', 0],
  ],
  ['a segment with neither', one(['duty', 1, 'anywhere'], undefined), 'conflict', ['duty', 1]],
  ['too many cycles', one(['duty', 1, 'anywhere', 'cycles_per_min'], [1, 1, 1, 1]), 'wrong-length'],
  ['a path of one row', [[['duty', 0, 'path'], [{ time_s: 0, pose_deg: [0, 0, 0] }]]], 'wrong-length'],
  ['a path that goes back in time', one(['duty', 0, 'path', 1, 'time_s'], -1), 'wrong-order'],
  ['a pose of two angles', one(['duty', 0, 'path', 1, 'pose_deg'], [0, 0]), 'wrong-length'],
  ['a pose outside travel', one(['duty', 0, 'path', 1, 'pose_deg', 1], -151), 'outside-travel'],
  ['a reliability in percent', one(['targets', 'reliability'], 95), 'out-of-range'],
  ['a life below 0', one(['targets', 'life_h'], -1), 'out-of-range'],
  ['a target that is not known', one(['targets', 'price'], 10), 'unknown-key'],
];

describe('one mistake, one issue', () => {
  it('is tried in more than 60 ways, each title once', () => {
    expect(ROWS.length).toBeGreaterThan(60);
    expect(new Set(ROWS.map((row) => row[0])).size).toBe(ROWS.length);
  });

  const cases = ROWS.map(([title, changes, code, path]) => ({ title, changes, code, path: path ?? changes[0]![0] }));
  it.each(cases)('$title', ({ changes, code, path }) => {
    const reading = readArmValue(changed(changes));
    const issues = reading.ok ? [] : reading.issues;
    expect(issues.map((issue) => [issue.code, issue.path])).toEqual([[code, path]]);
    const text = issueText(issues[0]!);
    expect(text).not.toMatch(/undefined|\[object|Invalid input/);
    expect(text).toMatch(/^[^:]+: found .+, expected .+\.$/);
  });
});

/** Texts that are no arm file at all: code, line and column, and the path where there is one. */
const TEXTS: readonly (readonly [
  title: string,
  text: string,
  code: IssueCode,
  line: number,
  column: number,
  path?: IssuePath,
])[] = [
  ['nothing', '', 'json-syntax', 1, 1],
  ['blanks', ' \n ', 'json-syntax', 2, 2],
  ['no JSON', 'hello', 'json-syntax', 1, 1],
  ['an object not closed', '{"armload": 1', 'json-syntax', 1, 14],
  ['a comma too many', '{"armload": 1,}', 'json-syntax', 1, 15],
  ['a comma missing', '{\n  "armload": 1\n  "name": "a"\n}', 'json-syntax', 3, 3],
  ['a key without quotes', '{armload: 1}', 'json-syntax', 1, 2],
  ['single quotes', "{'armload': 1}", 'json-syntax', 1, 2],
  ['a comment', '{ // arm\n}', 'json-syntax', 1, 3],
  ['NaN as a number', '{"armload": NaN}', 'json-syntax', 1, 13],
  ['a number with a leading 0', '{"armload": 01}', 'json-syntax', 1, 14],
  ['a text with a line break', '{"name": "a\nb"}', 'json-syntax', 1, 10],
  ['two documents', '{} {}', 'json-syntax', 1, 4],
  ['a list closed as an object', '{"joints": [1}', 'json-syntax', 1, 14],
  ['a list', '[]', 'wrong-type', 1, 1, []],
  ['null', 'null', 'wrong-type', 1, 1, []],
  ['a number', '5', 'wrong-type', 1, 1, []],
];

describe('texts', () => {
  const cases = TEXTS.map(([title, text, code, line, column, path]) => ({
    title,
    text,
    code,
    line,
    column,
    path: path ?? [],
  }));
  it.each(cases)('$title', ({ text, code, line, column, path }) => {
    const reading = readArm(text);
    const issues = reading.ok ? [] : reading.issues;
    expect(issues.map((issue) => [issue.code, issue.path, issue.at])).toEqual([[code, path, { line, column }]]);
  });

  it('with a key twice are refused, at the second', () => {
    const text = JSON.stringify(wholeFile(), null, 1).replace('"note":', '"name": "again",\n "note":');
    const reading = readArm(text);
    expect(reading.ok ? [] : reading.issues).toMatchObject([
      { code: 'duplicate-key', path: ['name'], at: { line: 4, column: 2 } },
    ]);
  });

  it('longer than 8 MiB are refused before they are parsed', () => {
    const ascii = readArm(`{"note": "${'x'.repeat(8 * 1024 * 1024)}"}`);
    expect(ascii.ok ? '' : ascii.issues[0]!.code).toBe('too-long');
    // 3 bytes a letter in UTF-8: the limit is one of bytes.
    const wide = readArm(`{"note": "${'€'.repeat(3 * 1024 * 1024)}"}`);
    expect(wide.ok ? '' : wide.issues[0]!.code).toBe('too-long');
  });

  it('nested a million deep are refused without harm', () => {
    const deep = readArm(`${'['.repeat(1e6)}${']'.repeat(1e6)}`);
    expect(deep.ok ? [] : deep.issues.map((issue) => issue.code)).toEqual(['wrong-type', 'too-deep']);
    const open = readArm('{"joints":'.repeat(1e5));
    expect(open.ok ? '' : open.issues[0]!.code).toBe('json-syntax');
  });

  it('with a million numbers in a vector are refused quickly, naming the list', () => {
    const text = JSON.stringify({ ...wholeFile(), gravity_m_s2: Array(1e6).fill(1) });
    const reading = readArm(text);
    expect(reading.ok ? [] : reading.issues.map((issue) => [issue.code, issue.path, issue.found])).toEqual([
      ['wrong-length', ['gravity_m_s2'], '1000000 entries'],
    ]);
  });

  it('with a long path are read to its last row, and each mistake has its own row', () => {
    const path = Array.from({ length: 5000 }, (_, i) => ({ time_s: i, pose_deg: [0, 0, 0] as unknown[] }));
    path[1999]!.pose_deg[0] = 'a';
    path[2000]!.pose_deg[1] = null;
    path[4321]!.pose_deg = [0, 0];
    (path[4999] as Record<string, unknown>).pace = 1;
    const reading = readArmValue({ ...wholeFile(), duty: [{ case: 'carry', share: 1, path }] });
    expect(reading.ok ? [] : reading.issues.map((issue) => [issue.code, issue.path.slice(2).join('.')])).toEqual([
      ['wrong-type', 'path.1999.pose_deg.0'],
      ['wrong-type', 'path.2000.pose_deg.1'],
      ['unknown-key', 'path.4999.pace'],
      ['wrong-length', 'path.4321.pose_deg'],
    ]);
  });

  it('with a hundred thousand broken rows are refused without harm', () => {
    const path = Array(100_000).fill({ time_s: 'now', pose_deg: 'there' });
    const reading = readArmValue({ ...wholeFile(), duty: [{ case: 'carry', share: 1, path }] });
    expect(reading.ok ? 0 : reading.issues.length).toBe(1001);
  });

  it('with more mistakes than anybody reads are cut short, and say so', () => {
    const path = Array.from({ length: 3000 }, (_, i) => ({ time_s: i, pose_deg: ['x', 'y', 'z'] }));
    const reading = readArmValue({ ...wholeFile(), duty: [{ case: 'carry', share: 1, path }] });
    const issues = reading.ok ? [] : reading.issues;
    expect(issues.length).toBe(1001);
    expect(issues.at(-1)).toMatchObject({ code: 'too-long', found: '8000 more problems' });
  });
});

describe('many mistakes', () => {
  it('are reported together: in fields, between fields, in unread parts and out of them, in the order of the text', () => {
    const file = changed([
      [['name'], 5],
      [['joints', 0, 'support', 'offset_mm'], 60],
      [['joints', 1, 'link', 'mass_kg'], 'two'],
      [['joints', 1, 'support', 'shaft', 'bore_mm'], 30],
      [['joints', 2, 'name'], 'elbow'],
      [['cases', 0, 'motion', 'speed_deg_s'], [1]],
      [['cases', 1, 'tip_force', 'force_N'], -1],
      [['bearings', 'bush', 'bore_mm'], 30],
      [['duty', 1, 'case'], 'nothing of the kind'],
    ]);
    const reading = readArm(JSON.stringify(file, null, 2));
    const issues = reading.ok ? [] : reading.issues;
    expect(issues.map((issue) => [issue.code, issue.path.join('.')])).toEqual([
      ['wrong-type', 'name'],
      ['geometry', 'joints.0.support.offset_mm'],
      ['wrong-type', 'joints.1.link.mass_kg'],
      ['geometry', 'joints.1.support.shaft.bore_mm'],
      ['geometry', 'joints.1.support.shaft.sections.0.diameter_mm'],
      ['duplicate-name', 'joints.2.name'],
      ['wrong-length', 'cases.0.motion.speed_deg_s'],
      ['out-of-range', 'cases.1.tip_force.force_N'],
      ['geometry', 'bearings.bush.bore_mm'],
      ['unknown-name', 'duty.1.case'],
    ]);
    const lines = issues.map((issue) => issue.at!.line);
    expect(lines).toEqual([...lines].sort((a, b) => a - b));
  });

  it('do not make others out of what is wrong already: a bad part is not called missing', () => {
    const file = changed([
      [['joints', 0, 'link', 'centre_mm'], 'here'],
      [['joints', 1, 'link', 'inertia_kg_m2'], 5],
      [['cases', 0, 'name'], 7],
      [['duty', 0, 'path'], 'there'],
    ]);
    const reading = readArmValue(file);
    expect(reading.ok ? [] : reading.issues.map((issue) => issue.path.join('.'))).toEqual([
      'joints.0.link.centre_mm',
      'joints.1.link.inertia_kg_m2',
      'cases.0.name',
      'duty.0.path',
    ]);
  });
});
