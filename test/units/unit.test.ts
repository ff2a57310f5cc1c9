import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatIn, formatNumber, formatQuantity, type Quantity, SHOWN_UNITS } from '../../src/units/format.ts';
import { decimal, fromNumber, rational, times, toNumber } from '../../src/units/rational.ts';
import { fromSI, parseUnit, toSI, unitOf } from '../../src/units/unit.ts';
import { UNIT_TABLE } from '../../src/units/unitTable.ts';

describe('exact fractions', () => {
  it('round as the number itself would (seed 11)', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (x) => {
        expect(toNumber(fromNumber(x))).toBe(x === 0 ? 0 : x);
      }),
      { seed: 11, numRuns: 1000 },
    );
  });

  it('divide large integers with one rounding (seed 12)', () => {
    // Second route: Number(text) of the exact quotient written out to 60 digits, which rounds by the language's own reader.
    const big = fc.bigInt({ min: 1n, max: 10n ** 40n });
    fc.assert(
      fc.property(big, big, (a, b) => {
        const digits = ((a * 10n ** 80n) / b).toString();
        expect(toNumber(rational(a, b))).toBe(Number(`${digits}e-80`));
      }),
      { seed: 12, numRuns: 1000 },
    );
  });

  it('take a decimal and nothing else', () => {
    expect(decimal('0.1')).toEqual({ num: 1n, den: 10n });
    expect(decimal('-2.50e1')).toEqual({ num: -25n, den: 1n });
    for (const text of ['', '.', '1.2.3', 'e5', '1e', '0x1', '1_0', '1e99999']) expect(decimal(text)).toBeNull();
  });
});

describe('unit table', () => {
  it('holds the published factors', () => {
    // NIST SP 811 B.8 (from memory) where marked; the rest by definition.
    const published: readonly (readonly [string, number, number])[] = [
      ['in', 0.0254, 0],
      ['ft', 0.3048, 0],
      ['lb', 0.45359237, 0],
      ['lbf', 4.448222, 1e-6], // 4.448 222 E+00
      ['kgf', 9.80665, 0],
      ['psi', 6894.757, 1e-6], // 6.894 757 E+03
      ['ksi', 6894757, 1e-6],
      ['lbf·in', 0.1129848, 1e-6], // 1.129 848 E-01
      ['lbf·ft', 1.355818, 1e-6], // 1.355 818 E+00
      ['lb·in²', 2.926397e-4, 1e-6], // 2.926 397 E-04
      ['ozf·in', 7.061552e-3, 1e-6], // 7.061 552 E-03
      ['rpm', 0.1047198, 1e-6], // 1.047 198 E-01
      ['°', 0.01745329, 1e-6], // 1.745 329 E-02
      ['lbf/in', 175.1268, 1e-6], // 1.751 268 E+02
      ['ft/min', 0.00508, 1e-15],
      ['h', 3600, 0],
    ];
    for (const [unit, factor, tolerance] of published) {
      expect(Math.abs(toSI(1, unit) / factor - 1), unit).toBeLessThanOrEqual(tolerance);
    }
  });

  it('gives each spelling to one unit only', () => {
    const seen = new Set<string>();
    for (const row of UNIT_TABLE) {
      for (const symbol of row.symbols) {
        expect(seen.has(symbol), symbol).toBe(false);
        seen.add(symbol);
        expect(parseUnit(symbol)?.ratio, symbol).toEqual(row.ratio);
      }
    }
  });

  it('divides millimetres by 1000 and turns degrees without a stray bit', () => {
    for (const x of [140, 0.1, 12.7, 1 / 3, 1e7]) expect(toSI(x, 'mm')).toBe(x / 1000);
    expect(toSI(90, 'deg')).toBe(Math.PI / 2);
    expect(toSI(180, 'deg')).toBe(Math.PI);
    expect(toSI(360, 'deg')).toBe(2 * Math.PI);
    expect(toSI(-90, 'deg')).toBe(-Math.PI / 2);
  });

  it('goes there and back for every unit (seed 13)', () => {
    const unit = fc.constantFrom(...UNIT_TABLE.map((row) => row.symbols[0]!));
    fc.assert(
      fc.property(unit, fc.double({ min: -1e6, max: 1e6, noNaN: true }), (name, x) => {
        expect(Math.abs(fromSI(toSI(x, name), name) - x)).toBeLessThanOrEqual(1e-14 * Math.abs(x) + 1e-300);
      }),
      { seed: 13, numRuns: 500 },
    );
  });

  it('builds units of units', () => {
    expect(unitOf('N·m').ratio).toEqual(unitOf('Nm').ratio);
    expect(unitOf('N·m').dimension).toEqual(unitOf('Nm').dimension);
    expect(unitOf('psi').ratio).toEqual(unitOf('lbf/in²').ratio);
    expect(unitOf('kg·m/s²').dimension).toEqual(unitOf('N').dimension);
    expect(unitOf('kN/mm^2').ratio).toEqual(unitOf('GPa').ratio);
    expect(unitOf('rev/min')).toMatchObject({ ratio: unitOf('rpm').ratio, pi: 1 });
    expect(times(unitOf('lbf').ratio, unitOf('in').ratio)).toEqual(unitOf('lbf·in').ratio);
    expect(() => unitOf('cubit')).toThrow(RangeError);
    for (const text of ['', '·', 'N·', '/m', 'm^0', 'm^99', 'm²³', '(m)', 'm m'.repeat(20)])
      expect(parseUnit(text), text).toBeNull();
  });
});

describe('shown numbers', () => {
  it.each<[number, number, string]>([
    [0, 4, '0'],
    [-0, 4, '0'],
    [812.44, 4, '812.4'],
    [12345.6, 4, '12346'],
    [0.012344, 4, '0.01234'],
    [9.9996, 4, '10.00'],
    [-1.5, 3, '-1.50'],
    [1e9, 4, '1.000e+9'],
    [1.23456e-7, 3, '1.23e-7'],
    [Number.NaN, 4, 'not a number'],
    [Number.POSITIVE_INFINITY, 4, 'infinite'],
    [Number.NEGATIVE_INFINITY, 4, '-infinite'],
  ])('%d to %d digits is %j', (x, digits, text) => {
    expect(formatNumber(x, digits)).toBe(text);
  });

  it('carry their unit', () => {
    expect(formatIn(0.0889, 'mm')).toBe('88.90 mm');
    expect(formatIn(Math.PI / 4, '°')).toBe('45.00°');
    expect(formatQuantity(0.0889, 'length', 'inch', 3)).toBe('3.50 in');
    expect(formatQuantity(1e6, 'stress')).toBe('1.000 MPa');
    expect(formatQuantity(Number.NaN, 'force')).toBe('not a number N');
  });

  it('are shown in units that can be typed back, alike in both systems', () => {
    for (const quantity of Object.keys(SHOWN_UNITS.metric) as Quantity[]) {
      expect(unitOf(SHOWN_UNITS.metric[quantity]).dimension, quantity).toEqual(
        unitOf(SHOWN_UNITS.inch[quantity]).dimension,
      );
    }
  });
});
