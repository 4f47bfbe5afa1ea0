import { describe, expect, it } from 'vitest';
import { autocorrelation, effectiveCount } from '../../../calculators/numerics/autocorrelation.js';
import {
  chiSquareCdf,
  chiSquareQuantile,
  fCdf,
  fQuantile,
  incompleteBeta,
  logGamma,
  normalCdf,
  normalQuantile,
  studentCdf,
  studentQuantile,
} from '../../../calculators/numerics/distributions.js';
import { lossValue, lossWeight } from '../../../calculators/numerics/losses.js';
import { seededRandom } from '../../../calculators/numerics/random.js';
import {
  COMPLEX_MEDIAN_TO_SIGMA,
  MAD_TO_SIGMA,
  mean,
  median,
  quantile,
  robustComplexSigma,
  robustSigma,
  rootMeanSquare,
  runningMedian,
  standardDeviation,
} from '../../../calculators/numerics/statistics.js';

describe('distributions', () => {
  // Quantiles as printed in the tables of Abramowitz and Stegun, chapter 26, with more digits from their definitions.
  it.each([
    [1, 12.7062047361747],
    [5, 2.57058183563631],
    [30, 2.04227245630124],
    [Number.POSITIVE_INFINITY, 1.95996398454005],
  ])('has the 97.5 %% point of Student with %d degrees of freedom', (dof, expected) => {
    expect(studentQuantile(0.975, dof)).toBeCloseTo(expected, 9);
    expect(studentQuantile(0.025, dof)).toBeCloseTo(-expected, 9);
  });

  it('has the usual points of chi-square, F and the normal distribution', () => {
    expect(chiSquareQuantile(0.95, 1)).toBeCloseTo(3.841458820694124, 9);
    expect(chiSquareQuantile(0.95, 10)).toBeCloseTo(18.30703805327515, 8);
    expect(fQuantile(0.95, 3, 20)).toBeCloseTo(3.098391212140779, 8);
    expect(normalQuantile(0.8413447460685429)).toBeCloseTo(1, 12);
    expect(normalCdf(-5)).toBeCloseTo(2.866515718791939e-7, 18);
  });

  it('keeps the laws between them', () => {
    expect(fCdf(2.5 ** 2, 1, 7)).toBeCloseTo(2 * studentCdf(2.5, 7) - 1, 12); // t² is F(1, d)
    expect(chiSquareCdf(1.7 ** 2, 1)).toBeCloseTo(2 * normalCdf(1.7) - 1, 12);
    expect(studentCdf(1, 1)).toBeCloseTo(0.75, 12); // Cauchy: ½ + atan(1)/π
    expect(incompleteBeta(0.3, 2, 5) + incompleteBeta(0.7, 5, 2)).toBeCloseTo(1, 12);
    expect(logGamma(6)).toBeCloseTo(Math.log(120), 12);
    expect(logGamma(0.5)).toBeCloseTo(0.5 * Math.log(Math.PI), 12);
  });
});

describe('losses', () => {
  it('are Huber’s with tuning constant 1.345: ρ(2) 1.7855, w(2) 0.6725', () => {
    const z = (2 / 1.345) ** 2; // P. J. Huber, "Robust Statistics", 1981: |r|t − t²/2 beyond t
    expect(0.5 * 1.345 ** 2 * lossValue('huber', z)).toBeCloseTo(1.7855, 4);
    expect(lossWeight('huber', z)).toBeCloseTo(0.6725, 4);
  });

  it.each(['linear', 'soft-l1', 'huber', 'cauchy'] as const)('%s has the slope of its value as weight', (kind) => {
    for (const z of [1e-6, 0.3, 0.99, 1.5, 40]) {
      const h = 1e-6 * z;
      const slope = (lossValue(kind, z + h) - lossValue(kind, z - h)) / (2 * h);
      expect(lossWeight(kind, z)).toBeCloseTo(slope, 6);
    }
  });
});

describe('statistics', () => {
  it('takes the middle, the mean of the two middles, and nothing of nothing', () => {
    expect(median([3, 1, 2])).toBe(2);
    expect(median([4, 1, 3, 2])).toBe(2.5);
    expect(median([])).toBeNaN();
    expect(quantile([10, 20, 30, 40], 0.25)).toBe(17.5);
    expect(mean([1, 2, 6])).toBe(3);
    expect(standardDeviation([1, 2, 6])).toBeCloseTo(Math.sqrt(7), 12);
    expect(rootMeanSquare([3, 4])).toBeCloseTo(Math.sqrt(12.5), 12);
  });

  it('removes a single wild point by a running median and keeps a step', () => {
    expect([...runningMedian([1, 1, 9, 1, 1, 5, 5, 5], 1)]).toEqual([1, 1, 1, 1, 1, 5, 5, 5]);
  });

  it('estimates sigma in spite of outliers, real and complex', () => {
    const random = seededRandom(11);
    const draw = () => Array.from({ length: 20_001 }, (_, i) => (i % 20 === 0 ? 50 : 0.3 * random.normal()));
    const [re, im] = [draw(), draw()];
    expect(robustSigma(re)).toBeGreaterThan(0.3);
    expect(robustSigma(re)).toBeLessThan(0.33); // 5 % outliers raise the median by some 7 %
    expect(robustComplexSigma(re, im)).toBeGreaterThan(0.3);
    expect(robustComplexSigma(re, im)).toBeLessThan(0.33);
    expect(MAD_TO_SIGMA).toBeCloseTo(1 / normalQuantile(0.75), 12);
    expect(COMPLEX_MEDIAN_TO_SIGMA).toBeCloseTo(Math.sqrt(2 * Math.LN2), 12);
  });
});

describe('random numbers', () => {
  it('repeat with the seed and differ between seeds', () => {
    const draw = (seed: number) => Array.from({ length: 5 }, seededRandom(seed).uniform);
    expect(draw(1)).toEqual(draw(1));
    expect(draw(1)).not.toEqual(draw(2));
  });

  it('are uniform and normal: moments within five of their own standard errors', () => {
    const random = seededRandom(2);
    const n = 100_000;
    const u = Float64Array.from({ length: n }, () => random.uniform());
    const z = Float64Array.from({ length: n }, () => random.normal());
    const five = 5 / Math.sqrt(n);
    expect(Math.abs(mean(u) - 0.5)).toBeLessThan(five / Math.sqrt(12));
    expect(Math.min(...u)).toBeGreaterThanOrEqual(0);
    expect(Math.max(...u)).toBeLessThan(1);
    expect(Math.abs(mean(z))).toBeLessThan(five);
    expect(Math.abs(mean(z.map((x) => x * x)) - 1)).toBeLessThan(five * Math.SQRT2);
    expect(Math.abs(mean(z.map((x) => x ** 4)) - 3)).toBeLessThan(five * Math.sqrt(96));
    expect(Math.abs(autocorrelation(z, 1)[1]!)).toBeLessThan(five);
  });

  it('draw within their limits', () => {
    const random = seededRandom(3);
    const all = Array.from({ length: 1000 }, () => [
      random.below(3),
      random.logBetween(0.01, 100),
      random.between(-2, 5),
    ]);
    expect(new Set(all.map(([k]) => k))).toEqual(new Set([0, 1, 2]));
    expect(all.every(([, x = 0]) => x >= 0.01 && x < 100)).toBe(true);
    expect(all.every(([, , x = 9]) => x >= -2 && x < 5)).toBe(true);
  });
});

describe('effective number of points', () => {
  it('is (1 − a)/(1 + a) of the points for a first-order process with coefficient a', () => {
    const random = seededRandom(4);
    const a = 0.8;
    let state = 0;
    const series = Float64Array.from({ length: 20_000 }, () => {
      state = a * state + random.normal();
      return state;
    });
    const { points, lagOne } = effectiveCount(series);
    expect(lagOne).toBeCloseTo(a, 1);
    expect(points / 20_000 / ((1 - a) / (1 + a))).toBeGreaterThan(0.8);
    expect(points / 20_000 / ((1 - a) / (1 + a))).toBeLessThan(1.25);
  });

  it('is nearly all of them for white noise, and never more', () => {
    const random = seededRandom(5);
    const white = () => Float64Array.from({ length: 5000 }, () => random.normal());
    const { points, factor } = effectiveCount(white(), white());
    expect(points).toBeGreaterThan(4000);
    expect(factor).toBeGreaterThanOrEqual(1);
    expect(effectiveCount(new Float64Array(10)).factor).toBe(1);
  });
});
