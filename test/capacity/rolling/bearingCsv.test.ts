import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { csvRecords } from '../../../src/capacity/rolling/csvRecords.ts';
import { csvIssueText, readBearingCsv } from '../../../src/capacity/rolling/index.ts';
import { SEED } from './bearings.ts';

const HEADER = 'name,kind,bore_mm,outer_mm,width_mm,C_N,C0_N,source';
const ROW = 'wrist,deep-groove,20,47,14,12700,6200,workshop list';

describe('a sound table', () => {
  test('gives bearings in SI, empty fields left out', () => {
    const { bearings, issues } = readBearingCsv(
      `${HEADER},contact_angle_deg,clearance_um\n${ROW},,5..20\ntilt,angular-contact,20,47,14,,,,25,\n`,
    );
    expect(issues).toEqual([]);
    expect(Object.keys(bearings)).toEqual(['wrist', 'tilt']);
    expect(bearings.wrist).toMatchObject({
      kind: 'deep-groove',
      bore: 0.02,
      outer: 0.047,
      width: 0.014,
      C: 12700,
      C0: 6200,
      source: 'workshop list',
    });
    expect(bearings.wrist).toMatchObject({
      clearance: { from: expect.closeTo(5e-6, 15), to: expect.closeTo(20e-6, 15) },
      contactAngle: null,
    });
    expect(bearings.tilt).toMatchObject({
      C: null,
      C0: null,
      contactAngle: expect.closeTo(0.4363323, 6),
      clearance: 'CN',
    });
  });

  test('a plain bushing takes its own keys', () => {
    const { bearings, issues } = readBearingCsv(
      'name,kind,bore_mm,outer_mm,width_mm,pressure_limit_MPa,clearance_um\nlift,plain-bushing,12,16,15,20,30\n',
    );
    expect(issues).toEqual([]);
    expect(bearings.lift).toMatchObject({
      kind: 'plain-bushing',
      pressureLimit: 2e7,
      clearance: expect.closeTo(30e-6, 15),
    });
  });

  test.each([
    ['semicolons', (text: string) => text.replaceAll(',', ';')],
    ['tabs', (text: string) => text.replaceAll(',', '\t')],
    ['carriage returns', (text: string) => text.replaceAll('\n', '\r\n')],
    ['old line ends', (text: string) => text.replaceAll('\n', '\r')],
    ['a byte order mark', (text: string) => `\uFEFF${text}`],
    ['no last line end', (text: string) => text.trimEnd()],
    ['blank lines', (text: string) => text.replaceAll('\n', '\n\n,,,\n')],
    ['every field quoted', (text: string) => text.replace(/[^,\n]+/g, (field) => `"${field}"`)],
  ])('reads the same with %s', (_, change) => {
    const text = `${HEADER}\n${ROW}\n`;
    expect(readBearingCsv(change(text))).toEqual(readBearingCsv(text));
    expect(Object.keys(readBearingCsv(text).bearings)).toEqual(['wrist']);
  });

  test('a quoted field holds separators, quotes and line ends', () => {
    const { bearings, issues } = readBearingCsv(
      `${HEADER}\nwrist,deep-groove,20,47,14,,,"list ""B"", page 3\nsecond line"\n`,
    );
    expect(issues).toEqual([]);
    expect(bearings.wrist?.source).toBe('list "B", page 3\nsecond line');
  });
});

describe('what is wrong is told with its place', () => {
  const one = (text: string) => readBearingCsv(text).issues.map(({ code, line, column }) => [code, line, column]);
  test.each([
    ['nothing at all', '', [['csv-header', 1, 1]]],
    ['blank lines only', '\n\n', [['csv-header', 1, 1]]],
    ['a column missing', 'name,kind,bore_mm,outer_mm\nx,deep-groove,20,47', [['csv-header', 1, 1]]],
    ['an unknown column', `${HEADER},colour\n${ROW},red`, [['unknown-key', 1, 53]]],
    ['a column twice', `${HEADER},C_N\n${ROW},1`, [['duplicate-key', 1, 53]]],
    ['a name twice', `${HEADER}\n${ROW}\n${ROW}`, [['duplicate-name', 3, 1]]],
    ['no name', `${HEADER}\n,deep-groove,20,47,14,,,`, [['missing', 2, 1]]],
    ['an unknown kind', `${HEADER}\nx,square,20,47,14,,,`, [['not-a-choice', 2, 3]]],
    ['no kind', `${HEADER}\nx,,20,47,14,,,`, [['missing', 2, 3]]],
    ['a decimal comma', `${HEADER.replaceAll(',', ';')}\nx;deep-groove;12,5;47;14;;;`, [['wrong-type', 2, 15]]],
    ['a unit in the field', `${HEADER}\nx,deep-groove,20 mm,47,14,,,`, [['wrong-type', 2, 15]]],
    ['NaN', `${HEADER}\nx,deep-groove,NaN,47,14,,,`, [['wrong-type', 2, 15]]],
    ['a hexadecimal', `${HEADER}\nx,deep-groove,0x14,47,14,,,`, [['wrong-type', 2, 15]]],
    ['too large to be a number', `${HEADER}\nx,deep-groove,1e999,47,14,,,`, [['not-finite', 2, 15]]],
    ['a bore of zero', `${HEADER}\nx,deep-groove,0,47,14,,,`, [['out-of-range', 2, 15]]],
    ['a negative rating', `${HEADER}\nx,deep-groove,20,47,14,-5,,`, [['out-of-range', 2, 24]]],
    ['a missing bore', `${HEADER}\nx,deep-groove,,47,14,,,`, [['missing', 2, 15]]],
    ['a bore above the outer diameter', `${HEADER}\nx,deep-groove,50,47,14,,,`, [['geometry', 2, 15]]],
    ['a fit that is none', `${HEADER},shaft_fit\n${ROW},tight`, [['bad-text', 2, 53]]],
    ['a clearance in one number', `${HEADER},clearance_um\n${ROW},20`, [['wrong-type', 2, 53]]],
    ['a key of the other family', `${HEADER},pv_limit_MPa_m_s\n${ROW},2`, [['unknown-key', 2, 53]]],
    ['a field too many', `${HEADER}\n${ROW},more`, [['csv-fields', 2, 53]]],
    ['a record too short', `${HEADER}\nx,deep-groove,20`, [['csv-fields', 2, 15]]],
    ['a record cut before its ratings', `${HEADER}\n${ROW}\nx,deep-groove,20,47,14`, [['csv-fields', 3, 21]]],
    ['a quote that never closes', `${HEADER}\nx,deep-groove,20,47,14,,,"list`, [['csv-quote', 2, 26]]],
    ['text after a quote', `${HEADER}\n"x"y,deep-groove,20,47,14,,,`, [['csv-quote', 2, 4]]],
    ['a quote inside a field', `${HEADER}\nx,deep-groove,20,47,14,,,5" shaft`, [['csv-quote', 2, 27]]],
  ])('%s', (_, text, expected) => {
    expect(one(text)).toEqual(expected);
  });

  test('a bearing with issues is left out, the others stand', () => {
    const { bearings, issues } = readBearingCsv(`${HEADER}\nbad,deep-groove,20,47,14,-1,,\n${ROW}`);
    expect(issues).toHaveLength(1);
    expect(Object.keys(bearings)).toEqual(['wrist']);
  });

  test('several problems of one record are told together', () => {
    expect(one(`${HEADER}\nx,square,20,47,14,,,\ny,deep-groove,20,a,b,,,`)).toEqual([
      ['not-a-choice', 2, 3],
      ['wrong-type', 3, 18],
      ['wrong-type', 3, 20],
    ]);
  });

  test('the line counts line ends inside quotes', () => {
    expect(one(`${HEADER}\nx,deep-groove,20,47,14,,,"a\nb"\ny,deep-groove,20,47,14,-1,,`)).toEqual([
      ['out-of-range', 4, 24],
    ]);
  });

  test('a sentence', () => {
    const [issue] = readBearingCsv(`${HEADER}\nx,deep-groove,20,47,14,-5,,`).issues;
    expect(csvIssueText(issue!)).toBe('line 2, column 24: found -5, expected a number (N) above 0.');
  });

  test('a name that every object of the language has is refused at its field, as the arm file refuses it', () => {
    for (const name of ['constructor', '__proto__', 'toString']) {
      const { bearings, issues } = readBearingCsv(`${HEADER}\n${ROW}\n${name},deep-groove,20,47,14,,,`);
      expect(issues.map(({ line, column }) => [line, column])).toEqual([[3, 1]]);
      expect(Object.keys(bearings)).toEqual(['wrist']);
    }
  });

  test('too much is refused before it is read', () => {
    expect(one(`${HEADER}\n${'x'.repeat(9e6)}`)).toEqual([['too-long', 1, 1]]);
    const rows = Array.from({ length: 10_001 }, (_, i) => `b${i},deep-groove,20,47,14,,,`);
    expect(one(`${HEADER}\n${rows.join('\n')}`)).toEqual([['too-long', 10_002, 1]]);
  });
});

describe(`properties (seed ${SEED})`, () => {
  test('what is written with quotes is read back', () => {
    const cell = fc.string({ unit: fc.constantFrom('a', '"', ',', ';', '\t', '\n', ' ', 'é'), maxLength: 8 });
    fc.assert(
      fc.property(fc.array(fc.array(cell, { minLength: 2, maxLength: 5 }), { minLength: 1, maxLength: 6 }), (rows) => {
        const kept = rows.filter((row) => row.some((c) => c.trim() !== ''));
        const text = rows.map((row) => row.map((c) => `"${c.replaceAll('"', '""')}"`).join(',')).join('\r\n');
        const read = csvRecords(text);
        expect(read.faults).toEqual([]);
        expect(read.records.map((record) => record.map((field) => field.text))).toEqual(kept);
      }),
      { seed: SEED, numRuns: 500 },
    );
  });

  test('any text is read without an exception, and every issue has a place within it', () => {
    const noise = fc.string({ unit: fc.constantFrom(...'name,kind"\n\r;1.5-deg_mmN x'), maxLength: 60 });
    fc.assert(
      fc.property(noise, fc.boolean(), (text, withHeader) => {
        const whole = withHeader ? `${HEADER}\n${text}` : text;
        const lines = whole.split(/\r\n|\r|\n/);
        for (const issue of readBearingCsv(whole).issues) {
          expect(issue.line).toBeLessThanOrEqual(lines.length);
          expect(issue.column).toBeLessThanOrEqual(lines[issue.line - 1]!.length + 1);
        }
      }),
      { seed: SEED, numRuns: 500 },
    );
  });
});
