import { decimal, over, plus, type Rational, rational, times, toNumber } from './rational.ts';
import { factorBetween, parseUnit, sameDimension, unitOf } from './unit.ts';
import type { Unit } from './unitTable.ts';

/** Why a typed number was refused. `found` quotes the text at fault. */
export interface EntryFault {
  readonly code:
    | 'empty'
    | 'decimal-comma'
    | 'not-a-number'
    | 'zero-denominator'
    | 'unknown-unit'
    | 'wrong-unit'
    | 'too-large';
  readonly found: string;
  readonly expected: string;
}

/** `value` is in the field's unit. */
export type Entry = { readonly ok: true; readonly value: number } | { readonly ok: false; readonly fault: EntryFault };

const VULGAR = /[¼-¾⅐-⅞]/gu;
// Whole and fraction (`1 1/2`, `1-1/2`), fraction, or decimal.
const NUMBER =
  /^([+-]?)\s*(?:(\d+)[\s-]+(\d+)\s*\/\s*(\d+)|(\d+)\s*\/\s*(\d+)|((?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,4}(?![\d.]))?))/u;

class Refusal extends Error {
  readonly fault: EntryFault;
  constructor(code: EntryFault['code'], found: string, expected: string) {
    super(code);
    this.fault = { code, found, expected };
  }
}

function readNumber(match: RegExpExecArray): Rational {
  const [, sign, whole, top, bottom, loneTop, loneBottom, plain] = match;
  let value: Rational | null;
  if (plain !== undefined) {
    value = decimal(plain);
    if (!value) throw new Refusal('too-large', plain, 'a number a double can hold');
  } else {
    const under = BigInt(bottom ?? loneBottom ?? '1');
    if (under === 0n) throw new Refusal('zero-denominator', match[0], 'a fraction with something under the line');
    value = plus(rational(BigInt(whole ?? '0')), rational(BigInt(top ?? loneTop ?? '0'), under));
  }
  return sign === '-' ? times(value, rational(-1n)) : value;
}

interface Part {
  readonly value: Rational;
  readonly unit: Unit | null;
  /** What follows, such as the inches of `2 ft 3 in`. */
  readonly rest: string;
}

function readPart(text: string, field: Unit, example: string): Part {
  const match = NUMBER.exec(text);
  if (!match) throw new Refusal('not-a-number', text, `a number such as ${example}`);
  const value = readNumber(match);
  const after = text.slice(match[0].length);
  if (after.startsWith(','))
    throw new Refusal('decimal-comma', text, 'a point for the decimals and nothing between thousands');
  const tail = after.trim();
  if (tail === '') return { value, unit: null, rest: '' };
  const unit = parseUnit(tail, field.dimension);
  if (unit) return { value, unit, rest: '' };
  const split = /^([^\d\s.]+)\s*([\d.].*)$/u.exec(tail);
  const head = split ? parseUnit(split[1]!, field.dimension) : null;
  if (!split || !head) throw new Refusal('unknown-unit', tail, `a unit such as ${example.replace(/^[^ ]* /, '')}`);
  return { value, unit: head, rest: split[2]! };
}

function inField(
  part: Part,
  field: Unit,
  fieldName: string,
): { readonly value: Rational; readonly pi: number; readonly size: Rational } {
  const unit = part.unit ?? field;
  if (!sameDimension(unit.dimension, field.dimension)) {
    throw new Refusal('wrong-unit', 'a unit of another kind', `${fieldName} or a unit that converts to it`);
  }
  const { ratio, pi } = factorBetween(unit, field);
  return { value: times(part.value, ratio), pi, size: ratio };
}

/**
 * Reads what a person types into a field whose unit is `fieldUnit`: `88.9`, `3.5 in`, `1/2 in`, `3 1/2"`, `2 ft 3 in`, `5 N·m`, `45°`, `½ in`.
 * A number without a unit is in the field's unit. Factors are exact: in a millimetre field `0.1 in` gives 2.54.
 */
export function parseEntry(text: string, fieldUnit: string): Entry {
  const field = unitOf(fieldUnit);
  const example = `12.5 ${fieldUnit}`;
  const clean = text
    .replace(VULGAR, (c) => ` ${c.normalize('NFKC').replace('\u2044', '/')}`)
    .replace(/[\u2212\u2013]/gu, '-')
    .replace(/[\u00a0\u2009\u202f]/gu, ' ')
    .trim();
  try {
    if (clean === '') throw new Refusal('empty', 'nothing', `a number such as ${example}`);
    if (clean.length > 100) throw new Refusal('not-a-number', `${clean.slice(0, 20)}…`, `a number such as ${example}`);
    let part = readPart(clean, field, example);
    const first = inField(part, field, fieldUnit);
    let sum = first.value;
    let last = first.size;
    const negative = clean.startsWith('-');
    while (part.rest !== '') {
      part = readPart(part.rest, field, example);
      const next = inField(part, field, fieldUnit);
      // 2 ft 3 in counts down in size; anything else is two numbers where one belongs.
      const ratio = over(next.size, last);
      if (!part.unit || ratio.num >= ratio.den || next.pi !== first.pi) {
        throw new Refusal('not-a-number', text.trim(), `one number such as ${example}`);
      }
      sum = plus(sum, negative ? times(next.value, rational(-1n)) : next.value);
      last = next.size;
    }
    const value = toNumber(sum) * Math.PI ** first.pi;
    if (!Number.isFinite(value)) throw new Refusal('too-large', text.trim(), 'a number a double can hold');
    return { ok: true, value: value === 0 ? 0 : value };
  } catch (error) {
    if (error instanceof Refusal) return { ok: false, fault: error.fault };
    throw error;
  }
}

/** The one place that turns a fault into a sentence, to stand beside the field. */
export function entryFaultText(fault: EntryFault): string {
  switch (fault.code) {
    case 'empty':
      return `Nothing is typed here; write ${fault.expected}.`;
    case 'decimal-comma':
      return `“${fault.found}”: write ${fault.expected}.`;
    case 'unknown-unit':
      return `“${fault.found}” is no unit known here; write ${fault.expected}.`;
    case 'wrong-unit':
      return `That is ${fault.found}; write ${fault.expected}.`;
    default:
      return `“${fault.found}” cannot be read; write ${fault.expected}.`;
  }
}
