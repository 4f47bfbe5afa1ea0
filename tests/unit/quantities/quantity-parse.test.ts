import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { displayFromSi, unitOf, unitsFor } from '../../../shared/quantities.js';
import { parseQuantity } from '../../../shared/quantity-parse.js';
import { formatPlain, formatQuantity } from '../../../shared/quantity-text.js';

function si(typed: string, unit: string, locale = 'en', shown?: string): number | null {
  return parseQuantity(typed, unit, shown ? unitOf(shown) : undefined, locale)?.valueSi ?? null;
}

describe('what a person types', () => {
  it.each([
    ['4u7', 'F', 4.7e-6], // a letter in place of the mark: IEC 60062
    ['4.7µ', 'F', 4.7e-6],
    ['4.7\u03BC', 'F', 4.7e-6], // Greek mu, as some keyboards give it
    ['4,7 uH', 'H', 4.7e-6],
    ['4u7H', 'H', 4.7e-6],
    ['470n', 'F', 4.7e-7],
    ['6R8', 'Ω', 6.8],
    ['2k2', 'Ω', 2200],
    ['4R7', 'Ω', 4.7],
    ['1,5 ft3', 'm³', 1.5 * 0.3048 ** 3],
    ['1.2e-3', 'kg', 1.2e-3],
    ['10k', 'Ω', 10_000],
    ['2k', 'Hz', 2000],
    ['31.8', 'Hz', 31.8],
    ['1.5 kHz', 'Hz', 1500],
    ['0,33 mH', 'H', 3.3e-4],
    ['12 mm', 'm', 0.012],
    ['5 in', 'm', 0.127],
    ['5"', 'm', 0.127],
    ['5 1/4 in', 'm', 0.13335],
    ['3/4 in', 'm', 0.01905],
    ['30 l', 'm³', 0.03],
    ['1 cu ft', 'm³', 0.028316846592],
    ['133 cm2', 'm²', 0.0133],
    ['10 g', 'kg', 0.01],
    ['2 oz', 'kg', 0.05669904625],
    ['20 °C', 'K', 293.15],
    ['1e-3 m', 'm', 1e-3],
    ['\u22125', 'Ω', -5],
    ['1 234.5', 'Hz', 1234.5],
    ['1.234,5', 'Hz', 1234.5], // two different marks: the last one is the decimal mark
    ['1,234.5', 'Hz', 1234.5],
  ])('%s as %s is %f', (typed, unit, expected) => {
    expect(si(typed, unit)).toBeCloseTo(expected, 12);
  });

  it('takes a bare number in the unit that the field shows', () => {
    expect(si('165', 'm', 'en', 'mm')).toBeCloseTo(0.165, 12);
    expect(si('6.5', 'm', 'en', 'in')).toBeCloseTo(0.1651, 12);
  });
  it('reads one mark before three digits as the locale does', () => {
    expect(si('1,234', 'Hz', 'en')).toBe(1234);
    expect(si('1,234', 'Hz', 'de')).toBe(1.234);
    expect(si('1.234', 'Hz', 'de')).toBe(1234);
    expect(si('0,125', 'Hz', 'en')).toBe(0.125); // no thousand starts with a zero
  });
  it('tells m for milli from m for metre by the quantity', () => {
    expect(si('4.7m', 'H')).toBeCloseTo(4.7e-3, 12);
    expect(si('4.7m', 'm')).toBe(4.7);
  });
  it.each([
    ['', 'Hz'],
    ['  ', 'Hz'],
    ['about 5', 'Hz'],
    ['twelve', 'm'],
    ['1.2.3', 'Hz'],
    ['1.2.3.4e', 'Ω'],
    ['4u7', 'm'],
    ['5 kg', 'm'],
    ['5 parsec', 'm'],
    ['1/0 in', 'm'],
    ['1e999', 'Hz'],
  ])('does not take "%s" for a number of %s', (typed, unit) => {
    expect(si(typed, unit)).toBeNull();
  });
  it('keeps the unit it was written in, and finds one for a prefix alone', () => {
    expect(parseQuantity('4u7', 'F')?.unit.symbol).toBe('µF');
    expect(parseQuantity('4.7µ', 'H')?.unit.symbol).toBe('µH');
    expect(parseQuantity('5"', 'm')?.unit.symbol).toBe('in');
    expect(parseQuantity('165', 'm', unitOf('mm'))?.unit.symbol).toBe('mm');
  });

  const anySi = fc.constantFrom('m', 'm²', 'm³', 'kg', 'Ω', 'F', 'H', 'Hz', 's', 'm/N');
  const anyValue = fc.double({ min: 1e-12, max: 1e8, noNaN: true });
  const anyLocale = fc.constantFrom('en', 'de', 'fr', 'sv', 'en-IN');
  it('reads back whatever it writes, in every unit and locale', () => {
    fc.assert(
      fc.property(anySi, anyValue, anyLocale, fc.nat(), (symbol, value, locale, pick) => {
        const units = unitsFor(symbol);
        const unit = units[pick % units.length]!;
        const text = `${formatPlain(displayFromSi(value, unit), 9, locale)} ${unit.symbol}`;
        expect(Math.abs(si(text, symbol, locale)! / value - 1)).toBeLessThan(1e-8);
      }),
      { numRuns: 500 },
    );
  });
  it('reads back what stands on the screen, to its four digits', () => {
    fc.assert(
      fc.property(anySi, fc.double({ min: 1e-9, max: 1e6, noNaN: true }), anyLocale, (symbol, value, locale) => {
        const shown = formatQuantity(value, symbol, { locale });
        expect(Math.abs(si(shown, symbol, locale)! / value - 1)).toBeLessThan(5.1e-4);
      }),
    );
  });
  it('never throws and never gives a number that is none', () => {
    fc.assert(
      fc.property(fc.string(), anySi, (typed, symbol) => {
        const value = si(typed, symbol);
        if (value !== null) expect(Number.isFinite(value)).toBe(true);
      }),
    );
  });
});
