import { describe, expect, it } from 'vitest';
import { countText, degrees, poseText, secondsText, shownUnit } from '../../src/report/shown.ts';
import { cellText, columnTitle, csvText, decimalsFor, fixedText, type Table } from '../../src/report/table.ts';
import { toSI } from '../../src/units/unit.ts';

const number = (decimals: number) => ({ title: 'radial', unit: 'N', decimals });
const words = { title: 'joint', unit: null, decimals: null };

describe('numbers in tables', () => {
  it('names what is no number, and never shows a negative zero', () => {
    expect(fixedText(Number.NaN, 2)).toBe('failed');
    expect(fixedText(Number.POSITIVE_INFINITY, 2)).toBe('infinite');
    expect(fixedText(Number.NEGATIVE_INFINITY, 2)).toBe('-infinite');
    expect(fixedText(-0.0004, 2)).toBe('0.00');
    expect(fixedText(-1.236, 2)).toBe('-1.24');
  });

  it('shows the largest of a column with four significant digits', () => {
    expect(decimalsFor([0.01234, 3.2])).toBe(3);
    expect(decimalsFor([12345, 1])).toBe(0);
    expect(decimalsFor([0.000123])).toBe(6);
    expect(decimalsFor([0, Number.NaN])).toBe(1);
    expect(decimalsFor([0.05, 812.4])).toBe(1);
  });

  it('marks an empty cell and puts the unit in the title', () => {
    expect(cellText(number(1), null, 0)).toBe('–');
    expect(cellText(words, 'slew', 0)).toBe('slew');
    expect(columnTitle(number(1))).toBe('radial N');
    expect(columnTitle(words)).toBe('joint');
  });
});

describe('csvText', () => {
  const table = (rows: Table['rows']): Table => ({ title: 'not written', columns: [words, number(1)], rows });

  it('writes numbers in full and quotes what needs it', () => {
    expect(csvText(table([['a "b", c', 0.1 + 0.2]]))).toBe('joint,radial N\r\n"a ""b"", c",0.30000000000000004\r\n');
    expect(csvText(table([[null, Number.NaN]]))).toBe('joint,radial N\r\n,failed\r\n');
  });

  it('keeps a text that a spreadsheet would run as a formula a text, and leaves poses and numbers alone', () => {
    expect(csvText(table([['=1+1', -1]]))).toContain("'=1+1,-1");
    expect(csvText(table([['@sum', 1]]))).toContain("'@sum");
    expect(csvText(table([['-170,45.5', 1]]))).toContain('"-170,45.5",1');
  });
});

describe('angles and counts', () => {
  it('reads back every tenth of a degree as it was typed', () => {
    for (let k = -7200; k <= 7200; k++) expect(degrees(toSI(k / 10, '°'))).toBe(k / 10 + 0);
  });

  it('never moves an angle by more than 2e-15 rad times its size', () => {
    for (let k = 1; k < 2000; k++) {
      const angle = Math.sin(k * 12.9898) * 6.3;
      expect(Math.abs(toSI(degrees(angle), '°') - angle)).toBeLessThanOrEqual(2e-15 * Math.max(1, Math.abs(angle)));
    }
  });

  it('writes poses as the command line reads them', () => {
    expect(poseText([toSI(-170, '°'), toSI(45.5, '°'), 1e-18, toSI(0.126, '°')])).toBe('-170,45.5,0,0.13');
    expect(poseText([-1e-9])).toBe('0');
  });

  it('groups large counts and reads seconds', () => {
    expect(countText(4826809)).toBe('4 826 809');
    expect(countText(12)).toBe('12');
    expect(secondsText(0.0123)).toBe('0.012 s');
    expect(secondsText(4.26)).toBe('4.3 s');
    expect(secondsText(125)).toBe('2 min 05 s');
  });

  it('shows checks in the units people read, and passes others through', () => {
    expect(shownUnit('Pa').unit).toBe('MPa');
    expect(shownUnit('Pa').of(2e6)).toBeCloseTo(2, 12);
    expect(shownUnit('N').of(812.4)).toBe(812.4);
    expect(shownUnit('1')).toMatchObject({ unit: '1' });
    expect(shownUnit('N', 'inch').of(4.4482216152605)).toBeCloseTo(1, 12);
  });
});
