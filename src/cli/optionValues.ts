/** Values of options, refused with the reason where they are not what the option takes. */
import { InvalidArgumentError } from 'commander';

// Decimal numbers only: `Number` alone would take '', '0x10' and 'Infinity'.
const DECIMAL = /^[-+]?(?:\d+\.?\d*|\.\d+)(?:[eE][-+]?\d+)?$/;

function decimal(text: string): number {
  const value = DECIMAL.test(text) ? Number(text) : Number.NaN;
  return Number.isFinite(value) ? value : Number.NaN;
}

/** Angles separated by commas or blanks. */
export function angleList(text: string): readonly number[] {
  const parts = text.trim() === '' ? [] : text.trim().split(/\s*,\s*|\s+/);
  const angles = parts.map(decimal);
  const bad = angles.findIndex(Number.isNaN);
  if (parts.length === 0) throw new InvalidArgumentError('It takes angles in degrees, such as -10,20.');
  if (bad >= 0)
    throw new InvalidArgumentError(`"${parts[bad]}" is not a number; it takes angles in degrees, such as -10,20.`);
  return angles;
}

export function positive(text: string): number {
  const value = decimal(text);
  if (!(value > 0)) throw new InvalidArgumentError('It takes a number above 0.');
  return value;
}

/** A share above 0 and below 1: at 1 there is nothing left to close. */
export function shareBelowOne(text: string): number {
  const value = decimal(text);
  if (!(value > 0 && value < 1)) throw new InvalidArgumentError('It takes a share above 0 and below 1, such as 0.001.');
  return value;
}

export function notNegative(text: string): number {
  const value = decimal(text);
  if (!(value >= 0)) throw new InvalidArgumentError('It takes a number of 0 or more.');
  return value;
}

/** A reader of whole numbers from `from` to `to`. */
export function wholeNumber(from: number, to: number): (text: string) => number {
  return (text) => {
    const value = decimal(text);
    if (!(Number.isInteger(value) && value >= from && value <= to)) {
      throw new InvalidArgumentError(`It takes a whole number from ${from} to ${to}.`);
    }
    return value;
  };
}
