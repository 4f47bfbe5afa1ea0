import { MINUS, PLUS } from './characters.js';
import { longDecimal } from './long-decimal.js';

let endOfDecimal = -1;
/** Where the number that `scanDecimal` read last ended, or -1 where it found none. */
export const decimalEnd = (): number => endOfDecimal;

const POWERS_OF_TEN = Float64Array.from({ length: 23 }, (_, k) => Number(`1e${k}`)); // 1e22 is the last exact one
const SHORT = 9; // digits that an int32 holds

/**
 * The decimal number that starts at `from`, times 10^shift, correctly rounded: bit-identical to `Number()` of the same
 * digits. `decimalCode`: the code of the decimal mark. Digits, one mark, an exponent after e, E, d or D.
 * Up to nine digits before and six behind the mark, or the other way round, form an exact integer; where the power of ten is at
 * most 22 one multiplication or division of two exact values rounds once (W. D. Clinger, "How to read floating point numbers
 * accurately", 1990, from memory). Longer ones go to `longDecimal`, and what that is not sure of to `Number()`.
 * `codes` must hold a code that is no digit behind the number.
 */
export function scanDecimal(codes: Uint8Array, from: number, decimalCode: number, shift: number): number {
  let p = from;
  let code = codes[p]!;
  const isNegative = code === MINUS;
  if (isNegative || code === PLUS) code = codes[++p]!;
  const start = p;
  let whole = 0;
  while (code >= 48 && code <= 57) {
    whole = (Math.imul(whole, 10) + code - 48) | 0;
    code = codes[++p]!;
  }
  const wholeDigits = p - start;
  let fraction = 0;
  let places = 0;
  if (code === decimalCode) {
    code = codes[++p]!;
    const fractionStart = p;
    while (code >= 48 && code <= 57) {
      fraction = (Math.imul(fraction, 10) + code - 48) | 0;
      code = codes[++p]!;
    }
    places = p - fractionStart;
  }
  if (wholeDigits + places === 0) {
    endOfDecimal = -1;
    return Number.NaN;
  }
  endOfDecimal = p;
  let exponent = shift - places;
  const letter = code | 32; // e, E, d, D
  if (letter === 101 || letter === 100) exponent += scanExponent(codes, p + 1);
  let value: number;
  if (wholeDigits <= SHORT && places <= SHORT && wholeDigits + places <= 15 && exponent >= -22 && exponent <= 22) {
    const mantissa = whole * POWERS_OF_TEN[places]! + fraction;
    value = exponent < 0 ? mantissa / POWERS_OF_TEN[-exponent]! : mantissa * POWERS_OF_TEN[exponent]!;
  } else {
    value = longDecimal(codes, start, p, decimalCode, exponent);
    if (Number.isNaN(value)) value = carefully(codes, start, p, decimalCode, exponent);
  }
  return isNegative ? -value : value;
}

/** The exponent after its letter; moves the end past it. Without digits the letter belongs to a unit and is left. */
function scanExponent(codes: Uint8Array, from: number): number {
  let p = from;
  const isNegative = codes[p] === MINUS;
  if (isNegative || codes[p] === PLUS) p += 1;
  const digitsFrom = p;
  let value = 0;
  while (codes[p]! >= 48 && codes[p]! <= 57) {
    if (value < 100_000) value = value * 10 + (codes[p]! - 48);
    p += 1;
  }
  if (p === digitsFrom) return 0;
  endOfDecimal = p;
  return isNegative ? -value : value;
}

/** The slow way, for very many digits and large exponents: the digits as text with the exponent that makes them an integer's. */
function carefully(codes: Uint8Array, from: number, to: number, decimalCode: number, exponent: number): number {
  let digits = '';
  for (let p = from; p < to; p += 1) if (codes[p] !== decimalCode) digits += String.fromCharCode(codes[p]!);
  return Number(`${digits}e${exponent}`);
}
