const LARGEST = 60; // powers of ten from 1e-60 to 1e60
const SPLITTER = 2 ** 27 + 1;
const DIGITS_A_PART = 15; // an integer of 15 digits is exact in a float64

/** 10^k for k from −60 to 60 as a sum of two float64: high + low, off by less than 2^-105 of it. Index k + 60. */
const HIGH = new Float64Array(2 * LARGEST + 1);
const LOW = new Float64Array(2 * LARGEST + 1);
for (let k = 0; k <= LARGEST; k += 1) {
  const power = 10n ** BigInt(k);
  HIGH[LARGEST + k] = Number(power);
  LOW[LARGEST + k] = Number(power - BigInt(Number(power)));
  const inverse = Number(`1e-${k}`);
  HIGH[LARGEST - k] = inverse;
  LOW[LARGEST - k] = remainderOfInverse(inverse, power);
}

/** 1/power − inverse, both exact: the float64 as an integer times 2^-400, the difference over `power` as a fraction. */
function remainderOfInverse(inverse: number, power: bigint): number {
  const scaled = BigInt(inverse * 2 ** 260) << 140n; // 1e-60 is near 2^-199: an integer after the first scaling
  const difference = (1n << 400n) - scaled * power; // (1/power − inverse) · power · 2^400
  return Number((difference << 200n) / power) / 2 ** 600;
}

/**
 * The value of the digits in [from, to), as many as 30, with the decimal mark among them, times 10^exponent; NaN where this way
 * cannot be sure of the last bit. The digits are taken as two exact integers and multiplied by the power of ten with twice the
 * precision; the result is kept where an error of 2^-96 would not change its rounding.
 * Source: T. J. Dekker, "A floating-point technique for extending the available precision", Numer. Math. 18, 1971 (from memory).
 */
export function longDecimal(
  codes: Uint8Array,
  from: number,
  to: number,
  decimalCode: number,
  exponent: number,
): number {
  let first = 0;
  let second = 0;
  let digits = 0;
  for (let p = from; p < to; p += 1) {
    const code = codes[p]!;
    if (code === decimalCode) continue;
    if (digits < DIGITS_A_PART) first = first * 10 + (code - 48);
    else second = second * 10 + (code - 48);
    digits += 1;
  }
  const behind = Math.max(0, digits - DIGITS_A_PART);
  if (behind > DIGITS_A_PART || exponent < -LARGEST || exponent > LARGEST) return Number.NaN;
  const shift = HIGH[LARGEST + behind]!; // exact: at most 1e15
  const product = first * shift;
  const productRest = restOfProduct(first, shift, product);
  const mantissa = product + second;
  const mantissaRest = restOfSum(product, second, mantissa) + productRest;
  const high = HIGH[LARGEST + exponent]!;
  const scaled = mantissa * high;
  const scaledRest =
    restOfProduct(mantissa, high, scaled) + (mantissa * LOW[LARGEST + exponent]! + mantissaRest * high);
  const value = scaled + scaledRest;
  const rest = scaledRest - (value - scaled);
  const doubt = Math.abs(value) * 2 ** -96;
  const above = value + (rest + doubt);
  return above === value + (rest - doubt) ? above : Number.NaN;
}

/** a·b − fl(a·b), exact. */
function restOfProduct(a: number, b: number, product: number): number {
  const aSplit = SPLITTER * a;
  const aHigh = aSplit - (aSplit - a);
  const aLow = a - aHigh;
  const bSplit = SPLITTER * b;
  const bHigh = bSplit - (bSplit - b);
  const bLow = b - bHigh;
  return aLow * bLow - (product - aHigh * bHigh - aLow * bHigh - aHigh * bLow);
}

/** a + b − fl(a + b), exact. */
function restOfSum(a: number, b: number, sum: number): number {
  const bShare = sum - a;
  return a - (sum - bShare) + (b - bShare);
}
