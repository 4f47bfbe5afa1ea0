import { MINUS, PLUS } from './characters.js';
import { longDecimal } from './long-decimal.js';

let endOfDecimal = -1;
/** Where the number that `scanDecimal` read last ended, or -1 where it found none. */
export const decimalEnd = (): number => endOfDecimal;

const POWERS_OF_TEN = Float64Array.from({ length: 23 }, (_, k) => Number(`1e${k}`)); // 1e22 is the last exact one
const EXACT = 2 ** 53; // every integer below has its own float64

/**
 * The decimal number that starts at `from`, times 10^shift, correctly rounded: bit-identical to `Number()` of the same
 * digits. `decimalCode`: the code of the decimal mark. Digits, one mark, an exponent after e, E, d or D.
 * Where the digits form an integer below 2^53 and the power of ten is at most 22, one multiplication or division of two exact
 * values rounds once (W. D. Clinger, "How to read floating point numbers accurately", 1990, from memory); anything else goes
 * to `Number()`. `codes` must hold a code that is no digit behind the number.
 */
export function scanDecimal(codes: Uint8Array, from: number, decimalCode: number, shift: number): number {
  let p = from;
  let code = codes[p]!;
  const isNegative = code === MINUS;
  if (isNegative || code === PLUS) code = codes[++p]!;
  let mantissa = 0;
  const digitsFrom = p;
  while (code >= 48 && code <= 57) {
    mantissa = mantissa * 10 + (code - 48);
    code = codes[++p]!;
  }
  let digits = p - digitsFrom;
  let exponent = shift;
  if (code === decimalCode) {
    const fractionFrom = p + 1;
    code = codes[++p]!;
    while (code >= 48 && code <= 57) {
      mantissa = mantissa * 10 + (code - 48);
      code = codes[++p]!;
    }
    exponent -= p - fractionFrom;
    digits += p - fractionFrom;
  }
  if (digits === 0) {
    endOfDecimal = -1;
    return Number.NaN;
  }
  endOfDecimal = p;
  const letter = code | 32; // e, E, d, D
  if (letter === 101 || letter === 100) exponent += scanExponent(codes, p + 1);
  let value: number;
  if (mantissa < EXACT && exponent >= -22 && exponent <= 22) {
    value = exponent < 0 ? mantissa / POWERS_OF_TEN[-exponent]! : mantissa * POWERS_OF_TEN[exponent]!;
  } else {
    value = longDecimal(codes, digitsFrom, p, decimalCode, exponent);
    if (Number.isNaN(value)) value = carefully(codes, digitsFrom, p, decimalCode, exponent);
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
