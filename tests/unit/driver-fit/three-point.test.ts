import { describe, expect, it } from 'vitest';
import { threePoint } from '../../../calculators/driver-fit/report/three-point.js';
import { CHECK_COILS, checkDriver } from '../../reference/check-driver.js';
import { complex, type DriverParts, impedanceOf, logFrequencies } from '../../reference/simulated-driver.js';

const frequencyHz = logFrequencies(40_001, 5, 500);
const magnitudes = (driver: DriverParts) =>
  frequencyHz.map((f) => {
    const { re, im } = impedanceOf(driver, f);
    return Math.hypot(re, im);
  });
const highest = (values: Float64Array) => values.indexOf(Math.max(...values.subarray(0, 30_000)));

describe('the definition method on the check driver', () => {
  // Expected values: R. H. Small's definition (J. Audio Eng. Soc. 20, 1972, from memory), worked by hand for this driver.
  it('reads fs, f1, f2 and the three Q off the curve of a coil without inductance', () => {
    const magnitudeOhm = magnitudes({ ...checkDriver('inductor'), coil: () => complex(0) });
    const result = threePoint(frequencyHz, magnitudeOhm, 6, highest(magnitudeOhm));
    expect(result?.fsHz).toBeCloseTo(30, 4);
    expect(result?.zMaxOhm).toBeCloseTo(66, 4);
    expect(result?.r0).toBeCloseTo(11, 5);
    expect(result?.f1Hz).toBeCloseTo(20.03861, 4);
    expect(result?.f2Hz).toBeCloseTo(44.9133, 4);
    expect(result?.qms).toBeCloseTo(4, 4);
    expect(result?.qes).toBeCloseTo(0.4, 5);
    expect(result?.qts).toBeCloseTo(0.363636, 5);
    expect(result?.flanksHz).toBeCloseTo(30, 3);
  });

  it('shows by √(f1·f2) how far 0.8 mH pull the three points', () => {
    const magnitudeOhm = magnitudes({ ...checkDriver('inductor'), coil: CHECK_COILS.inductor });
    const result = threePoint(frequencyHz, magnitudeOhm, 6, highest(magnitudeOhm));
    expect(result?.fsHz).toBeCloseTo(29.9922, 3);
    expect(result?.f1Hz).toBeCloseTo(19.9997, 3);
    expect(result?.f2Hz).toBeCloseTo(44.7216, 3);
    expect(result?.flanksHz).toBeCloseTo(29.9068, 3);
    expect(result?.qms).toBeCloseTo(4.0237, 3);
    expect(result?.qes).toBeCloseTo(0.40237, 4);
  });
});

it.each([
  ['the lower flank lies below the sweep', 25, 500],
  ['the upper flank lies above it', 5, 40],
])('gives nothing where %s', (_, low, high) => {
  const f = logFrequencies(400, low, high);
  const driver = checkDriver('inductor');
  const magnitudeOhm = f.map((x) => Math.hypot(impedanceOf(driver, x).re, impedanceOf(driver, x).im));
  expect(threePoint(f, magnitudeOhm, 6, magnitudeOhm.indexOf(Math.max(...magnitudeOhm)))).toBeNull();
});

it('gives nothing where the peak does not rise above Re', () => {
  const f = logFrequencies(100, 10, 100);
  expect(
    threePoint(
      f,
      f.map(() => 5),
      6,
      50,
    ),
  ).toBeNull();
});
