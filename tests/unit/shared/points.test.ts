import { expect, it } from 'vitest';
import { decodePoints, encodePoints } from '../../../shared/points.js';

const complex = {
  frequencyHz: Float64Array.of(10, 31.8, 20_000),
  realOhm: Float64Array.of(6.2, 41.5, 9.9),
  imaginaryOhm: Float64Array.of(1.5, -0.25, 22.75),
};

it('returns the same doubles, bit for bit, with phase and without', () => {
  expect(decodePoints(encodePoints(complex), 3, true)).toEqual(complex);
  const magnitude = { frequencyHz: complex.frequencyHz, magnitudeOhm: Float64Array.of(0.1 + 0.2, 1e-300, 4.9e3) };
  expect(decodePoints(encodePoints(magnitude), 3, false)).toEqual(magnitude);
});

it('writes frequency first, then real, then imaginary, least significant byte first', () => {
  const bytes = encodePoints({
    frequencyHz: Float64Array.of(1),
    realOhm: Float64Array.of(2),
    imaginaryOhm: Float64Array.of(-2),
  });
  // IEEE 754 binary64: 1 is 3FF0…, 2 is 4000…, −2 is C000…
  const hex = Buffer.from(bytes).toString('hex');
  expect(hex).toBe('000000000000f03f' + '0000000000000040' + '00000000000000c0');
});

it('reads from the middle of a larger buffer', () => {
  const bytes = encodePoints(complex);
  const padded = new Uint8Array(bytes.length + 3);
  padded.set(bytes, 3);
  expect(decodePoints(padded.subarray(3), 3, true)).toEqual(complex);
});

it('writes −0 as 0, so that equal curves have equal hashes', () => {
  const withZero = (zero: number) =>
    encodePoints({ frequencyHz: Float64Array.of(1), realOhm: Float64Array.of(1), imaginaryOhm: Float64Array.of(zero) });
  expect(withZero(-0)).toEqual(withZero(0));
});

it('refuses bytes of another size', () => {
  expect(() => decodePoints(encodePoints(complex), 3, false)).toThrow(RangeError);
  expect(() => decodePoints(encodePoints(complex), 4, true)).toThrow(RangeError);
});
