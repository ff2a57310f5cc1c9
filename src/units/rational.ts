/**
 * Exact fractions for unit factors and typed numbers: `0.1 in` must become 2.54 mm and not 2.5400000000000005.
 * Only the last step, to a double, rounds, and it rounds once.
 */

/** num / den, den > 0, lowest terms. */
export interface Rational {
  readonly num: bigint;
  readonly den: bigint;
}

function gcd(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a;
  let y = b;
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}

/** A fraction in lowest terms. `den` must not be 0. */
export function rational(num: bigint, den: bigint = 1n): Rational {
  const sign = den < 0n ? -1n : 1n;
  const divisor = gcd(num, sign * den);
  return { num: (sign * num) / divisor, den: (sign * den) / divisor };
}

export const ONE: Rational = { num: 1n, den: 1n };

export function times(a: Rational, b: Rational): Rational {
  return rational(a.num * b.num, a.den * b.den);
}

export function over(a: Rational, b: Rational): Rational {
  return rational(a.num * b.den, a.den * b.num);
}

export function plus(a: Rational, b: Rational): Rational {
  return rational(a.num * b.den + b.num * a.den, a.den * b.den);
}

export function power(a: Rational, exponent: number): Rational {
  const size = BigInt(Math.abs(exponent));
  const raised = { num: a.num ** size, den: a.den ** size };
  return exponent < 0 ? over(ONE, raised) : raised;
}

/** The exact value of a decimal such as `12`, `.5`, `3.50` or `1e-3`; null when the text is not one or is out of a double's range. */
export function decimal(text: string): Rational | null {
  const match = /^([+-]?)(\d*)(?:\.(\d*))?(?:[eE]([+-]?\d{1,4}))?$/.exec(text);
  if (!match) return null;
  const whole = match[2] ?? '';
  const fraction = match[3] ?? '';
  if (whole.length + fraction.length === 0) return null;
  const exponent = Number(match[4] ?? 0) - fraction.length;
  if (whole.length + fraction.length > 400 || Math.abs(exponent) > 800) return null;
  const digits = BigInt(whole + fraction) * (match[1] === '-' ? -1n : 1n);
  return exponent >= 0 ? rational(digits * 10n ** BigInt(exponent)) : rational(digits, 10n ** BigInt(-exponent));
}

/** The exact value of a finite double. */
export function fromNumber(value: number): Rational {
  const exact = decimal(value.toString());
  if (!exact) throw new RangeError(`not a finite number: ${value}`);
  return exact;
}

const EXACT = 2n ** 53n;

function bits(value: bigint): number {
  return value.toString(16).length * 4;
}

/** The double nearest to the fraction (ties to even; ±Infinity beyond the range of a double; below 2e-308 to the last bit but one). */
export function toNumber(value: Rational): number {
  const size = value.num < 0n ? -value.num : value.num;
  if (size <= EXACT && value.den <= EXACT) return Number(value.num) / Number(value.den);
  // At least 64 bits of quotient, and one sticky bit for the rest, so that the conversion of the quotient rounds as the fraction would.
  const shift = 68 + bits(value.den) - bits(size);
  const over = shift > 0 ? size << BigInt(shift) : size;
  const under = shift < 0 ? value.den << BigInt(-shift) : value.den;
  const sticky = over % under === 0n ? 0n : 1n;
  const result = scaled(Number(((over / under) << 1n) | sticky), -shift - 1);
  return value.num < 0n ? -result : result;
}

/** value · 2^exponent, in steps that neither overflow nor vanish on the way. */
function scaled(value: number, exponent: number): number {
  let result = value;
  let rest = exponent;
  while (Math.abs(rest) > 1000) {
    const step = Math.sign(rest) * 1000;
    result *= 2 ** step;
    rest -= step;
  }
  return result * 2 ** rest;
}
