import { describe, expect, it } from 'vitest';
import { magnitudeOf, type Sweep } from '../../../calculators/kit/sweep.js';
import { resample } from '../../../calculators/reading/resample.js';

/** Closed forms: a power law is a straight line in ln |Z| over ln f with constant phase; R in series with L has Z = R + j2πfL. */
const conditions = { role: 'sweep' } as const;
const grid = Float64Array.from({ length: 100 }, (_, i) => 10 * 1000 ** (i / 99));
const coil: Sweep = {
  name: 'coil',
  conditions,
  frequencyHz: grid,
  realOhm: grid.map(() => 0.4),
  imaginaryOhm: grid.map((f) => 2 * Math.PI * f * 0.7e-3),
};

describe('resample', () => {
  it('follows a power law exactly', () => {
    const law: Sweep = { name: 'law', conditions, frequencyHz: grid, magnitudeOhm: grid.map((f) => 0.03 * f ** 0.63) };
    const { frequencyHz, magnitudeOhm } = resample(law, [11, 123.4, 9999]);
    expect([...frequencyHz]).toEqual([11, 123.4, 9999]);
    for (const [i, f] of [11, 123.4, 9999].entries()) {
      expect((magnitudeOhm?.[i] ?? 0) / (0.03 * f ** 0.63)).toBeCloseTo(1, 12);
    }
  });
  it('meets a coil between its points within some millionths', () => {
    const wanted = Array.from({ length: 57 }, (_, i) => 10.7 * 900 ** (i / 56));
    const { realOhm, imaginaryOhm } = resample(coil, wanted);
    wanted.forEach((f, i) => {
      const away = Math.hypot((realOhm?.[i] ?? 0) - 0.4, (imaginaryOhm?.[i] ?? 0) - 2 * Math.PI * f * 0.7e-3);
      expect(away / Math.hypot(0.4, 2 * Math.PI * f * 0.7e-3)).toBeLessThan(5e-6);
    });
  });
  it('gives back measured points bit for bit, in ascending order, each once', () => {
    const wanted = [grid[50] ?? 0, grid[7] ?? 0, grid[50] ?? 0, grid[99] ?? 0];
    const { frequencyHz, realOhm, imaginaryOhm } = resample(coil, wanted);
    expect([...frequencyHz]).toEqual([grid[7], grid[50], grid[99]]);
    expect([...(realOhm ?? [])]).toEqual([0.4, 0.4, 0.4]);
    expect([...(imaginaryOhm ?? [])]).toEqual([7, 50, 99].map((i) => coil.imaginaryOhm?.[i]));
  });
  it('crosses ±180° without a jump', () => {
    const turning: Sweep = {
      name: 'turning',
      conditions,
      frequencyHz: grid,
      realOhm: grid.map((_, i) => 5 * Math.cos(2.8 + i * 0.01)),
      imaginaryOhm: grid.map((_, i) => 5 * Math.sin(2.8 + i * 0.01)),
    };
    const between = Array.from(grid.slice(1), (f, i) => Math.sqrt(f * (grid[i] ?? 0)));
    for (const size of magnitudeOf(resample(turning, between))) expect(size).toBeCloseTo(5, 12);
  });
  it.each([9.9, 10_001])('refuses %s Hz, which lies outside the sweep', (f) => {
    expect(() => resample(coil, [100, f])).toThrow(
      expect.objectContaining({ code: 'bad-setting', where: 'frequencies' }),
    );
  });
  it('takes the ends as written with fewer digits', () => {
    expect(resample(coil, [10, 10_000]).frequencyHz).toHaveLength(2);
  });
});
