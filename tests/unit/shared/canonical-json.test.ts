import fc from 'fast-check';
import { expect, it } from 'vitest';
import { canonicalJson } from '../../../shared/canonical-json.js';

it('sorts keys at every depth and leaves no white space', () => {
  expect(canonicalJson({ b: [1, { d: null, c: 'x' }], a: true })).toBe('{"a":true,"b":[1,{"c":"x","d":null}]}');
});

it('leaves out what is undefined and writes −0 as 0', () => {
  expect(canonicalJson({ a: undefined, b: -0 })).toBe('{"b":0}');
});

it('writes a typed array like the plain list of its numbers', () => {
  expect(canonicalJson({ y: Float64Array.of(1.5, 2) })).toBe(canonicalJson({ y: [1.5, 2] }));
});

it('refuses numbers that JSON cannot hold', () => {
  expect(() => canonicalJson({ a: Number.NaN })).toThrow(RangeError);
  expect(() => canonicalJson([Number.POSITIVE_INFINITY])).toThrow(RangeError);
});

it('does not depend on the order in which keys were set, and parses back to the same value', () => {
  fc.assert(
    fc.property(fc.dictionary(fc.string(), fc.jsonValue()), (value) => {
      const reversed = Object.fromEntries(Object.entries(value).reverse());
      expect(canonicalJson(reversed)).toBe(canonicalJson(value));
      expect(canonicalJson(JSON.parse(canonicalJson(value)))).toBe(canonicalJson(value));
    }),
  );
});
