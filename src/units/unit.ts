import { ONE, over, power, times, toNumber } from './rational.ts';
import { type Dimension, UNIT_TABLE, type Unit, type UnitRow } from './unitTable.ts';

const NONE: Unit = { dimension: { length: 0, mass: 0, time: 0, angle: 0 }, ratio: ONE, pi: 0 };

const bySymbol = new Map<string, UnitRow>();
const byFoldedSymbol = new Map<string, UnitRow | null>();
for (const row of UNIT_TABLE) {
  for (const symbol of row.symbols) {
    bySymbol.set(symbol, row);
    const folded = symbol.toLowerCase();
    const other = byFoldedSymbol.get(folded);
    // `MN` and `mN` fold to one spelling: null means that capitals decide.
    byFoldedSymbol.set(folded, other === undefined || other === row ? row : null);
  }
}

const SUPERSCRIPTS: Readonly<Record<string, string>> = {
  '⁻': '-',
  '⁰': '0',
  '¹': '1',
  '²': '2',
  '³': '3',
  '⁴': '4',
};
const MINUTE = new Set(["'", '′', '’']);
const SECOND = new Set(['"', '″', '”']);

/** True where both measure the same kind of thing. */
export function sameDimension(a: Dimension, b: Dimension): boolean {
  return a.length === b.length && a.mass === b.mass && a.time === b.time && a.angle === b.angle;
}

function isAngle(dimension: Dimension): boolean {
  return sameDimension(dimension, { length: 0, mass: 0, time: 0, angle: 1 });
}

function lookUp(symbol: string, wanted: Dimension | null): Unit | null {
  if (wanted && isAngle(wanted)) {
    if (MINUTE.has(symbol)) return bySymbol.get('arcmin')!;
    if (SECOND.has(symbol)) return bySymbol.get('arcsec')!;
  }
  return bySymbol.get(symbol) ?? byFoldedSymbol.get(symbol.toLowerCase()) ?? null;
}

function combine(a: Unit, b: Unit, exponent: number): Unit {
  const raised = power(b.ratio, exponent);
  return {
    dimension: {
      length: a.dimension.length + exponent * b.dimension.length,
      mass: a.dimension.mass + exponent * b.dimension.mass,
      time: a.dimension.time + exponent * b.dimension.time,
      angle: a.dimension.angle + exponent * b.dimension.angle,
    },
    ratio: times(a.ratio, raised),
    pi: a.pi + exponent * b.pi,
  };
}

// A symbol, its exponent (mm2, mm^2, mm², s⁻¹), or the bare 1 of `1/min`.
const FACTOR = /^(?:(1)(?=\s*\/)|([a-zA-Zµμ°º]+|["'″′”’])(?:\^?(-?[1-4])|([⁻⁰¹²³⁴]+))?)/u;
// `/` divides by the one factor after it; the other signs, or nothing but a space, multiply.
const JOIN = /^\s*([/·⋅*×.-])\s*|^\s+/u;

/**
 * Reads a unit such as `mm`, `N·m`, `lbf in`, `kg·m²`, `deg/s`, `1/min` or `N/mm^2`. `wanted` settles what only the field can tell: `'` and `"`
 * are feet and inches, but minutes and seconds of arc in an angle. Null when it is no unit this table knows.
 */
export function parseUnit(text: string, wanted: Dimension | null = null): Unit | null {
  let rest = text.trim();
  if (rest === '' || rest.length > 40) return null;
  let result = NONE;
  let sign = 1;
  for (;;) {
    const factor = FACTOR.exec(rest);
    if (!factor) return null;
    rest = rest.slice(factor[0].length);
    if (factor[2] !== undefined) {
      const unit = lookUp(factor[2], wanted);
      if (!unit) return null;
      const raised = factor[3] ?? [...(factor[4] ?? '1')].map((c) => SUPERSCRIPTS[c] ?? c).join('');
      const exponent = Number(raised);
      if (!Number.isInteger(exponent) || exponent === 0 || Math.abs(exponent) > 4) return null;
      result = combine(result, unit, sign * exponent);
    }
    if (rest === '') return result;
    const join = JOIN.exec(rest);
    if (!join) return null;
    rest = rest.slice(join[0].length);
    sign = join[1] === '/' ? -1 : 1;
  }
}

const known = new Map<string, Unit>();

/** The unit a program names. Throws on a spelling the table does not know: such a name is a mistake in the program. */
export function unitOf(text: string): Unit {
  let unit = known.get(text);
  if (!unit) {
    const parsed = parseUnit(text);
    if (!parsed) throw new RangeError(`unknown unit: ${text}`);
    known.set(text, parsed);
    unit = parsed;
  }
  return unit;
}

interface Factor {
  readonly num: number;
  readonly den: number;
  readonly pi: number;
}

const factors = new Map<string, Factor>();

function factorOf(text: string): Factor {
  let factor = factors.get(text);
  if (!factor) {
    const { ratio, pi } = unitOf(text);
    factor = {
      num: toNumber({ num: ratio.num, den: 1n }),
      den: toNumber({ num: ratio.den, den: 1n }),
      pi: Math.PI ** pi,
    };
    factors.set(text, factor);
  }
  return factor;
}

/** From `unit` to the coherent SI unit (m, kg, s, rad, N, Pa …). Millimetres are divided by 1000, so 140 gives 0.14 exactly rounded. */
export function toSI(value: number, unit: string): number {
  const { num, den, pi } = factorOf(unit);
  return (value * num * pi) / den;
}

/** From the coherent SI unit to `unit`. */
export function fromSI(value: number, unit: string): number {
  const { num, den, pi } = factorOf(unit);
  return (value * den) / (num * pi);
}

/** The factor from one unit to another, exact but for powers of π. Throws when they measure different things. */
export function factorBetween(from: Unit, to: Unit): { readonly ratio: ReturnType<typeof over>; readonly pi: number } {
  if (!sameDimension(from.dimension, to.dimension)) throw new RangeError('the units measure different things');
  return { ratio: over(from.ratio, to.ratio), pi: from.pi - to.pi };
}
