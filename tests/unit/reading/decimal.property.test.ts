import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimalEnd, scanDecimal } from '../../../calculators/reading/text/decimal.js';

const POINT = '.'.charCodeAt(0);
const COMMA = ','.charCodeAt(0);
const scan = (text: string, decimalCode = POINT, shift = 0) =>
  scanDecimal(new TextEncoder().encode(`${text}\n`), 0, decimalCode, shift);
const digits = (least: number, most: number) =>
  fc.array(fc.integer({ min: 0, max: 9 }), { minLength: least, maxLength: most }).map((list) => list.join(''));
const exponent = fc.oneof(
  fc.constant(''),
  fc
    .tuple(fc.constantFrom('e', 'E'), fc.constantFrom('', '+', '-'), fc.integer({ min: 0, max: 330 }))
    .map((parts) => parts.join('')),
);
const decimal = fc
  .tuple(fc.constantFrom('', '-', '+'), digits(1, 22), fc.option(digits(0, 22), { nil: undefined }), exponent)
  .map(([sign, whole, fraction, power]) => `${sign}${whole}${fraction === undefined ? '' : `.${fraction}`}${power}`);

describe('scanDecimal', () => {
  it('gives the very bits of Number() for any decimal', () => {
    const same = fc.property(decimal, (text) => {
      expect(scan(text)).toBe(Number(text)); // toBe tells −0 from 0
      expect(decimalEnd()).toBe(text.length);
    });
    fc.assert(same, { numRuns: 20_000, seed: 1 });
  });
  it('gives back every float64 from the digits that JavaScript, and that 17 and 21 digits, write for it', () => {
    const anyBits = fc.bigInt({ min: 0n, max: (1n << 63n) - 1n });
    const back = fc.property(anyBits, fc.constantFrom(undefined, 16, 20), (bits, places) => {
      const value = new Float64Array(BigUint64Array.of(bits).buffer)[0] as number;
      fc.pre(Number.isFinite(value));
      const text = places === undefined ? String(value) : value.toExponential(places);
      expect(scan(text)).toBe(Number(text));
    });
    fc.assert(back, { numRuns: 10_000, seed: 2 });
  });
  it('rounds numbers half way between two float64 as Number() does, to the even one', () => {
    const halfway = fc.property(
      fc.bigInt({ min: 1n << 52n, max: (1n << 53n) - 1n }),
      fc.integer({ min: -12, max: 12 }),
      (whole, power) => {
        const text = `${2n * whole + 1n}`; // odd and above 2^53: no float64 holds it
        expect(scan(text)).toBe(Number(text));
        expect(scan(`${text}0001`)).toBe(Number(`${text}0001`));
        expect(scan(`${text}e${power}`)).toBe(Number(`${text}e${power}`));
      },
    );
    fc.assert(halfway, { numRuns: 5_000, seed: 3 });
  });
  it('shifts the decimal mark exactly: kilohertz as written times a thousand, rounded once', () => {
    const shifted = fc.property(digits(1, 5), digits(1, 12), (whole, fraction) => {
      expect(scan(`${whole}.${fraction}`, POINT, 3)).toBe(Number(`${whole}.${fraction}e3`));
    });
    fc.assert(shifted, { numRuns: 5_000, seed: 4 });
    expect(scan('0.011374954', POINT, 3)).toBe(11.374954);
  });
  it.each([
    ['1,5', COMMA, 1.5, 3],
    ['1.5D+03', POINT, 1500, 7],
    ['2d-1', POINT, 0.2, 4],
    ['.5', POINT, 0.5, 2],
    ['10.', POINT, 10, 3],
    ['10deg', POINT, 10, 2],
    ['10e', POINT, 10, 2],
    ['-0', POINT, -0, 2],
    ['1.5.7', POINT, 1.5, 3],
  ])('reads %s and stops where the number ends', (text, mark, value, end) => {
    expect(scan(text, mark)).toBe(value);
    expect(decimalEnd()).toBe(end);
  });
  it.each(['', '-', '+', '.', 'x', '-.', 'e5'])('finds no number in “%s”', (text) => {
    expect(scan(text)).toBeNaN();
    expect(decimalEnd()).toBe(-1);
  });
});
