import { expect, it } from 'vitest';
import { sampleFiles, samplePoints } from '../../../../src/lib/sample-driver.js';

const magnitudes = (massKg?: number) => {
  const { frequencyHz, realOhm, imaginaryOhm } = samplePoints(massKg);
  return Array.from(frequencyHz, (f, i) => ({ f, z: Math.hypot(realOhm[i] ?? 0, imaginaryOhm[i] ?? 0) }));
};
const peakOf = (points: { f: number; z: number }[]) =>
  points.filter(({ f }) => f < 300).reduce((best, point) => (point.z > best.z ? point : best));

it('peaks at its resonance with Re + Res, as the equivalent circuit says', () => {
  const peak = peakOf(magnitudes());
  expect(peak.f).toBeGreaterThan(46.5 * 0.97);
  expect(peak.f).toBeLessThan(46.5 * 1.03);
  expect(peak.z).toBeCloseTo(5.6 + 38, 0);
});

it('resonates lower by the root of the masses when mass is added', () => {
  const ratio = peakOf(magnitudes(0.0142)).f / peakOf(magnitudes()).f; // mass doubled
  expect(ratio).toBeGreaterThan(Math.SQRT1_2 * 0.96);
  expect(ratio).toBeLessThan(Math.SQRT1_2 * 1.04);
});

it('is the same at every call, so that everyone sees the same sample', async () => {
  const [first, second] = [sampleFiles(), sampleFiles()];
  expect(await first[0]?.file.text()).toBe(await second[0]?.file.text());
});
