import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readSweep } from '../../../calculators/reading/read-sweep.js';
import { bytesOf, table } from './invented-curve.js';

/** Random drivers in free air in closed form (Small's circuit with a coil and one eddy branch), without names, units or noise. */
const between = (low: number, high: number) =>
  fc.integer({ min: 0, max: 1_000_000 }).map((n) => low * (high / low) ** (n / 1_000_000));
const anyDriver = fc.record({
  fs: between(20, 1500),
  qms: between(1, 10),
  re: between(3, 16),
  height: between(1.5, 20), // Res over Re
  le: between(5e-5, 2e-3),
  l2: between(5e-5, 2e-3),
  r2: between(1, 20),
  points: fc.integer({ min: 60, max: 400 }),
});

function curveOf({
  fs,
  qms,
  re,
  height,
  le,
  l2,
  r2,
  points,
}: typeof anyDriver extends fc.Arbitrary<infer T> ? T : never) {
  const f = Array.from({ length: points }, (_, i) => 10 * 2000 ** (i / (points - 1)));
  const z = f.map((hz) => {
    const x = qms * (hz / fs - fs / hz);
    const w = 2 * Math.PI * hz;
    const share = (w * l2) ** 2 / (r2 * r2 + (w * l2) ** 2);
    const motional = (re * height) / (1 + x * x);
    return {
      re: re + motional + r2 * share,
      im: -x * motional + w * le + (r2 * r2 * w * l2) / (r2 * r2 + (w * l2) ** 2),
    };
  });
  const magnitude = z.map((value) => Math.hypot(value.re, value.im));
  const phase = z.map((value) => Math.atan2(value.im, value.re));
  return { f, z, magnitude, phase };
}

const read = (columns: readonly (readonly number[])[]) => readSweep(bytesOf(table(columns, ' ')), { fileName: '' });

describe('three columns without names', () => {
  it('of a driver are told to be degrees or radians, with the right sign', () => {
    const told = fc.property(anyDriver, fc.boolean(), (driver, isRadian) => {
      const { f, magnitude, phase } = curveOf(driver);
      const { reading, findings } = read([f, magnitude, phase.map((rad) => (isRadian ? rad : (rad * 180) / Math.PI))]);
      expect(reading.columns).toEqual(['frequency', 'magnitude', 'phase']);
      expect(reading).toMatchObject({ phaseUnit: isRadian ? 'radian' : 'degree', magnitudeUnit: 'ohm' });
      expect(findings).toEqual([]);
    });
    fc.assert(told, { numRuns: 60, seed: 1, endOnFailure: true });
  }, 60_000);
  it('are never called settled as magnitude and phase when they are real and imaginary parts', () => {
    let right = 0;
    const honest = fc.property(anyDriver, (driver) => {
      const { f, z } = curveOf(driver);
      const { reading } = read([f, z.map(({ re }) => re), z.map(({ im }) => im)]);
      if (reading.columns[1] === 'real') right += 1;
      else expect(reading.guesses.columns?.settled).toBe(false);
    });
    fc.assert(honest, { numRuns: 60, seed: 2, endOnFailure: true });
    expect(right).toBeGreaterThanOrEqual(54); // a low peak reads as both
  }, 60_000);
});
