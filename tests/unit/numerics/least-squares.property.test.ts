import fc from 'fast-check';
import { expect, it } from 'vitest';
import { leastSquares } from '../../../calculators/numerics/least-squares.js';
import { seededRandom } from '../../../calculators/numerics/random.js';

const X = Float64Array.from({ length: 30 }, (_, i) => 0.2 + 0.15 * i);

/** y = a·x/(b + x), fitted to noisy data of a seed; the data times `gain`, the abscissa times `stretch`, rows in `order`. */
function saturation(seed: number, gain = 1, stretch = 1, order = [...X.keys()]) {
  const random = seededRandom(seed);
  const y = X.map((x) => (3 * x) / (1.4 + x) + 0.02 * random.normal());
  return leastSquares(
    {
      parameters: [
        { id: 'a', logScaled: true },
        { id: 'b', logScaled: true },
      ],
      residualCount: X.length,
      residual: (v, out) => {
        for (const [row, i] of order.entries()) {
          const x = X[i]! * stretch;
          out[row] = gain * y[i]! - (v[0]! * x) / (v[1]! + x);
        }
      },
    },
    [2 * gain, 3 * stretch],
    { relativeOffset: 1e-8 },
  );
}
const relative = (a: number, b: number) => Math.abs(a / b - 1);
const anySeed = fc.integer({ min: 1, max: 1e6 });

it('scales values and standard errors with the unit of the data and of the abscissa', () => {
  fc.assert(
    fc.property(
      anySeed,
      fc.double({ min: 1e-4, max: 1e4, noNaN: true }),
      fc.double({ min: 1e-4, max: 1e4, noNaN: true }),
      (seed, gain, stretch) => {
        const plain = saturation(seed);
        const other = saturation(seed, gain, stretch);
        expect(relative(other.values[0]!, plain.values[0]! * gain)).toBeLessThan(1e-6);
        expect(relative(other.values[1]!, plain.values[1]! * stretch)).toBeLessThan(1e-6);
        expect(relative(other.standardErrors[0]!, plain.standardErrors[0]! * gain)).toBeLessThan(1e-5);
        expect(relative(other.standardErrors[1]!, plain.standardErrors[1]! * stretch)).toBeLessThan(1e-5);
      },
    ),
    { numRuns: 60 },
  );
});

it('does not mind the order of the rows', () => {
  fc.assert(
    fc.property(anySeed, fc.shuffledSubarray([...X.keys()], { minLength: X.length }), (seed, order) => {
      const [a, b] = [saturation(seed), saturation(seed, 1, 1, order)];
      for (const k of [0, 1]) expect(relative(b.values[k]!, a.values[k]!)).toBeLessThan(1e-8);
    }),
    { numRuns: 40 },
  );
});

it('covers the truth in about two of three runs with its standard errors', () => {
  let [inside, total] = [0, 0];
  for (let seed = 1; seed <= 400; seed++) {
    const { values, standardErrors } = saturation(seed);
    for (const [k, truth] of [3, 1.4].entries()) {
      total++;
      if (Math.abs(values[k]! - truth) <= standardErrors[k]!) inside++;
    }
  }
  expect(inside / total).toBeGreaterThan(0.63); // 68.3 % for a normal deviate; 5 % is 2 sigma of 400 pairs
  expect(inside / total).toBeLessThan(0.73);
});
