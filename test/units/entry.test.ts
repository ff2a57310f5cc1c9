import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { entryFaultText, parseEntry } from '../../src/units/entry.ts';

function value(text: string, field: string): number {
  const entry = parseEntry(text, field);
  if (!entry.ok) throw new Error(`${text}: ${entry.fault.code}`);
  return entry.value;
}

function fault(text: string, field: string): string {
  const entry = parseEntry(text, field);
  return entry.ok ? `read as ${entry.value}` : entry.fault.code;
}

describe('typed numbers', () => {
  // Right-hand sides by hand from 1 in = 25.4 mm, 1 lb = 0.453 592 37 kg, g0 = 9.806 65 m/s², all exact by definition.
  it.each<[string, string, number]>([
    ['88.9', 'mm', 88.9],
    ['3.5 in', 'mm', 88.9],
    ['1/2 in', 'mm', 12.7],
    ['½ in', 'mm', 12.7],
    ['1½"', 'mm', 38.1],
    ['1 1/2 in', 'mm', 38.1],
    ['3-1/2"', 'mm', 88.9],
    ['0.1 in', 'mm', 2.54],
    ['0.3 in', 'mm', 7.62],
    ['2 ft 3 in', 'mm', 685.8],
    ['2\' 3 1/2"', 'mm', 698.5],
    ['-1 ft 1 in', 'mm', -330.2],
    ['5 thou', 'µm', 127],
    ['12 cm', 'mm', 120],
    ['.5', 'mm', 0.5],
    ['7.', 'mm', 7],
    ['1e-3 m', 'mm', 1],
    ['\u22125', 'mm', -5],
    ['+5', 'mm', 5],
    ['-0', 'mm', 0],
    ['5\u00a0mm', 'mm', 5],
    ['45°', '°', 45],
    ['45 deg', 'deg', 45],
    ["45° 30'", '°', 45.5],
    ['-10° 15′ 36″', '°', -10.26],
    ['0.25 turn', '°', 90],
    ['5 N·m', 'N·m', 5],
    ['5 Nm', 'N·m', 5],
    ['5 N m', 'N·m', 5],
    ['5 N*m', 'N·m', 5],
    ['5000 N·mm', 'N·m', 5],
    ['2 kN', 'N', 2000],
    ['1 kgf', 'N', 9.80665],
    ['1 lbf', 'N', 4.4482216152605],
    ['1 lb', 'kg', 0.45359237],
    ['16 oz', 'kg', 0.45359237],
    ['1 kg·m²', 'kg·m²', 1],
    ['1 kg m^2', 'kg·m²', 1],
    ['1000 kg*mm2', 'kg·m²', 0.001],
    ['1 N/mm²', 'MPa', 1],
    ['1 bar', 'MPa', 0.1],
    ['60 rpm', '°/s', 360],
    ['1 rev/s', 'rpm', 60],
    ['30 deg/s', '°/s', 30],
    ['2 h', 's', 7200],
    ['1 h 30 min', 's', 5400],
    ['3 1/min', '1/min', 3],
    ['9.8 m s⁻²', 'm/s²', 9.8],
    ['100 N/µm', 'N/µm', 100],
    ['1 MPa m/s', 'MPa·m/s', 1],
    ['10 KN', 'N', 10000],
    ['10 MM', 'mm', 10],
  ])('%j in a field of %s is %d', (text, field, expected) => {
    expect(value(text, field)).toBe(expected);
  });

  it('converts what π makes irrational to within rounding', () => {
    expect(value('1 rad', '°')).toBeCloseTo(180 / Math.PI, 12);
    expect(value('180°', 'rad')).toBeCloseTo(Math.PI, 15);
    expect(value('1000 psi', 'MPa')).toBeCloseTo(6.894757293168361, 12); // NIST SP 811 B.8 gives 6.894 757 E+03 Pa for one
    expect(value('1 lbf·in', 'N·m')).toBeCloseTo(0.1129848290276167, 15);
    expect(value('1 ft-lbf', 'N·m')).toBeCloseTo(1.3558179483314, 14);
  });

  it.each<[string, string, string]>([
    ['', 'mm', 'empty'],
    ['   ', 'mm', 'empty'],
    ['abc', 'mm', 'not-a-number'],
    ['in', 'mm', 'not-a-number'],
    ['--5', 'mm', 'not-a-number'],
    ['NaN', 'mm', 'not-a-number'],
    ['Infinity', 'mm', 'not-a-number'],
    ['0x10', 'mm', 'unknown-unit'],
    ['3,5', 'mm', 'decimal-comma'],
    ['1,000 mm', 'mm', 'decimal-comma'],
    ['1 000 mm', 'mm', 'unknown-unit'],
    ['5 furlong', 'mm', 'unknown-unit'],
    ['5 mm mm', 'mm', 'wrong-unit'],
    ['5 kg', 'mm', 'wrong-unit'],
    ['5 1/s', '°/s', 'wrong-unit'],
    ['5 N', 'N·m', 'wrong-unit'],
    ['5 m²', 'mm', 'wrong-unit'],
    ['1/0 in', 'mm', 'zero-denominator'],
    ['2 ft 3', 'mm', 'not-a-number'],
    ['3 in 2 ft', 'mm', 'not-a-number'],
    ['5 N·', 'N·m', 'unknown-unit'],
    ['5 /m', 'mm', 'unknown-unit'],
    ['5 mm^9', 'mm', 'unknown-unit'],
    ['1e400', 'mm', 'too-large'],
    ['9e9999', 'mm', 'too-large'],
    ['1.2.3', 'mm', 'unknown-unit'],
    ['5 constructor', 'mm', 'unknown-unit'],
  ])('refuses %j in a field of %s: %s', (text, field, code) => {
    expect(fault(text, field)).toBe(code);
  });

  it('says what was typed and what would do', () => {
    const entry = parseEntry('5 furlong', 'mm');
    expect(entry.ok ? '' : entryFaultText(entry.fault)).toBe(
      '“furlong” is no unit known here; write a unit such as mm.',
    );
  });

  it('never throws and never answers with what is not finite (seed 7)', () => {
    const piece = fc.constantFrom(
      '1',
      '0',
      '/',
      ' ',
      '.',
      '-',
      'mm',
      'in',
      '"',
      "'",
      '°',
      'N',
      '·',
      'm',
      '²',
      '^',
      'e9',
      ',',
      '½',
      '(',
      '😀',
    );
    const typed = fc.oneof(
      fc.string({ unit: 'grapheme', maxLength: 30 }),
      fc.array(piece, { maxLength: 12 }).map((p) => p.join('')),
    );
    const check = fc.property(typed, fc.constantFrom('mm', '°', 'N·m', '°/s'), (text, field) => {
      const entry = parseEntry(text, field);
      if (entry.ok) expect(Number.isFinite(entry.value)).toBe(true);
      else expect(entryFaultText(entry.fault).length).toBeGreaterThan(10);
    });
    fc.assert(check, { seed: 7, numRuns: 2000 });
  });

  it('reads back any number it would be shown as (seed 8)', () => {
    const check = fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
      expect(value(String(x), 'mm')).toBe(x === 0 ? 0 : x);
    });
    fc.assert(check, { seed: 8, numRuns: 1000 });
  });
});
