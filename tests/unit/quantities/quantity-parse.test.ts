import fc from 'fast-check';
import { expect, it } from 'vitest';
import { unitOf, unitsFor } from '../../../shared/quantities.js';
import { parseQuantity } from '../../../shared/quantity-parse.js';
import { formatForField } from '../../../shared/quantity-text.js';

it.each([
  ['4u7', 'F', 4.7e-6], // letter code of IEC 60062
  ['4R7', 'Ω', 4.7],
  ['2k2', 'Ω', 2200],
  ['4.7µ', 'H', 4.7e-6],
  ['4,7 uH', 'H', 4.7e-6],
  ['12 mm', 'm', 0.012],
  ['5 in', 'm', 0.127],
  ['1,5 ft3', 'm³', 1.5 * 0.3048 ** 3],
  ['20 L', 'm³', 0.02],
  ['1.234,5 Hz', 'Hz', 1234.5],
  ['20 °C', 'K', 293.15],
  ['\u22125', 'Ω', -5],
  ['1.2e-3', 'kg', 1.2e-3],
])('understands %s', (written, si, valueSi) => {
  expect(parseQuantity(written, si)?.valueSi).toBeCloseTo(valueSi, 12);
});

it.each([
  ['twelve', 'm'],
  ['12 kg', 'm'],
  ['4u7', 'm'],
  ['1.2.3.4e', 'Ω'],
  ['', 'Ω'],
])('refuses %s as a quantity in %s', (written, si) => {
  expect(parseQuantity(written, si)).toBeNull();
});

it('reads a number without a unit in the unit that the field shows', () => {
  expect(parseQuantity('130', 'm', unitOf('mm'))?.valueSi).toBeCloseTo(0.13, 12);
});

it('reads back what a field shows, in every unit and with either decimal mark', () => {
  const anyUnit = fc.constantFrom(...['m', 'm²', 'm³', 'kg', 'Ω', 'F', 'H', 'Hz'].flatMap((si) => unitsFor(si)));
  fc.assert(
    fc.property(anyUnit, fc.double({ min: 1e-3, max: 999, noNaN: true }), fc.boolean(), (unit, shown, hasComma) => {
      const field = formatForField(shown * unit.factor, unit.symbol, hasComma ? 'de-DE' : 'en-GB');
      const parsed = parseQuantity(`${field} ${unit.symbol}`, unit.si);
      expect(parsed?.valueSi).toBeDefined();
      expect(Math.abs((parsed?.valueSi ?? 0) / (shown * unit.factor) - 1)).toBeLessThan(1e-8);
    }),
  );
});
