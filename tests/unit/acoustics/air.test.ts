import { describe, expect, it } from 'vitest';
import {
  airDensity,
  airOf,
  bulkModulusPa,
  compressibilityOf,
  pressureAtHeight,
  saturationPressurePa,
  speedOfSound,
  USUAL_AIR,
  waterFraction,
} from '../../../calculators/acoustics/air.js';

const at = (celsius: number, humidity: number, pressurePa = 101_325) => ({
  temperatureK: celsius + 273.15,
  pressurePa,
  humidity,
});

describe('air', () => {
  // Computed from CIPM-2007 (Picard, Davis, Gläser, Fujii, Metrologia 45, 2008) and c from ISO 9613-1:1993, rounded
  it.each([
    [0, 1.293, 1.2916, 1.2901, 331.29],
    [10, 1.2472, 1.2444, 1.2415, 337.3],
    [15, 1.2255, 1.2216, 1.2178, 340.26],
    [20, 1.2046, 1.1993, 1.1941, 343.2],
    [25, 1.1843, 1.1773, 1.1704, 346.11],
    [30, 1.1647, 1.1555, 1.1464, 349],
  ])('of %d °C has the densities %d, %d, %d at 0, 50, 100 %% humidity and sound of %d m/s', (t, dry, half, wet, c) => {
    expect(airDensity(at(t, 0))).toBeCloseTo(dry, 4);
    expect(airDensity(at(t, 0.5))).toBeCloseTo(half, 4);
    expect(airDensity(at(t, 1))).toBeCloseTo(wet, 4);
    expect(speedOfSound(t + 273.15)).toBeCloseTo(c, 2);
  });

  it('has at 20 °C, 50 % the intermediate values of the standard’s formula', () => {
    expect(waterFraction(USUAL_AIR)).toBeCloseTo(0.011589, 6);
    expect(compressibilityOf(101_325, 293.15, waterFraction(USUAL_AIR))).toBeCloseTo(0.999615, 6);
    expect(saturationPressurePa(293.15)).toBeCloseTo(2339.2, 1);
    expect(bulkModulusPa(airOf())).toBeCloseTo(141_263, -1);
    expect(airDensity(at(20, 0.5, 100_000))).toBeCloseTo(1.18356, 5);
  });

  // OIML R 111: ρ = [0.34848 p − 0.009 h·e^{0.061 t}]/(273.15 + t), p in hPa, h in %; stated to be good to 2e-4
  it('agrees with the simplified formula of OIML R 111', () => {
    for (const t of [15, 20, 25]) {
      const simple = (0.34848 * 1013.25 - 0.009 * 50 * Math.exp(0.061 * t)) / (273.15 + t);
      expect(Math.abs(airDensity(at(t, 0.5)) / simple - 1)).toBeLessThan(2e-4);
    }
  });

  // ISO 2533 standard atmosphere
  it.each([
    [0, 101_325],
    [500, 95_461],
    [1000, 89_875],
    [2000, 79_495],
    [3000, 70_109],
  ])('stands at %d m height under %d Pa', (height, pressure) => {
    expect(pressureAtHeight(height)).toBeCloseTo(pressure, -1);
  });

  it('of no place on earth is refused, with the setting named', () => {
    for (const [conditions, where] of [
      [at(-90, 0.5), 'air.temperature'],
      [at(20, 50), 'air.humidity'],
      [at(20, 0.5, 1013), 'air.pressure'],
      [at(Number.NaN, 0.5), 'air.temperature'],
    ] as const)
      expect(() => airDensity(conditions)).toThrow(expect.objectContaining({ code: 'bad-setting', where }));
  });
});
