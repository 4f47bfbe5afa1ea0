import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { displayFromSi, displayUnit, siFromDisplay, UNITS, unitOf, unitsFor } from '../../../shared/quantities.js';

describe('SI and display units', () => {
  // Factors fixed by the international yard and pound agreement of 1959: 1 in = 25.4 mm, 1 lb = 0.45359237 kg.
  it.each([
    [0.0254, 'in', 1],
    [0.028316846592, 'ft³', 1], // (0.3048 m)³
    [6.4516e-4, 'in²', 1],
    [1.6387064e-5, 'in³', 1],
    [0.45359237, 'lb', 1],
    [0.028349523125, 'oz', 1],
    [0.03, 'L', 30],
    [0.0133, 'cm²', 133],
    [4.7e-6, 'µF', 4.7],
    [293.15, '°C', 20],
  ])('shows %f of SI in %s as %f', (si, symbol, shown) => {
    expect(displayFromSi(si, unitOf(symbol))).toBeCloseTo(shown, 12);
  });

  it('comes back to the same SI value in every unit, to the last few bits', () => {
    const anyUnit = fc.constantFrom(...UNITS);
    const anyValue = fc.double({ min: 1e-9, max: 1e9, noNaN: true });
    fc.assert(
      fc.property(anyUnit, anyValue, (unit, value) => {
        const back = siFromDisplay(displayFromSi(value, unit), unit);
        expect(Math.abs(back - value)).toBeLessThanOrEqual(4e-16 * (Math.abs(value) + (unit.offset ?? 0)) * 4);
      }),
    );
  });

  it.each([
    [0.165, 'm', 'metric', 'mm'],
    [0.165, 'm', 'inch', 'in'],
    [1.2, 'm', 'metric', 'm'],
    [0.0305, 'm³', 'metric', 'L'],
    [0.0305, 'm³', 'inch', 'ft³'],
    [5e-4, 'm³', 'inch', 'in³'],
    [0.0181, 'kg', 'metric', 'g'],
    [0.0181, 'kg', 'inch', 'oz'],
    [4.7e-6, 'F', 'metric', 'µF'],
    [3.3e-9, 'F', 'metric', 'nF'],
    [2.2e-4, 'H', 'inch', 'mH'],
    [4.7e-5, 'H', 'metric', 'µH'],
    [6.2, 'ohm', 'metric', 'Ω'],
    [0.03, 'Ω', 'metric', 'mΩ'],
    [999.94, 'Hz', 'metric', 'Hz'],
    [999.96, 'Hz', 'metric', 'kHz'], // would be written 1000 with four digits
    [8.5e-4, 'm/N', 'metric', 'mm/N'],
    [1.3, 'kg/s', 'metric', 'kg/s'],
    [0.41, '1', 'metric', ''],
  ] as const)('shows %f %s (%s) in %s', (value, si, system, symbol) => {
    expect(displayUnit(value, si, system).symbol).toBe(symbol);
  });

  it('offers metric and inch units for a volume', () => {
    expect(unitsFor('m³').map((unit) => unit.symbol)).toEqual(['cm³', 'L', 'm³', 'in³', 'ft³']);
  });
});
