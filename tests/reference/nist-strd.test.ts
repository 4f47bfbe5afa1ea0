import { describe, expect, it } from 'vitest';
import { leastSquares } from '../../calculators/numerics/least-squares.js';
import { type CertifiedSet, digitsAgreeing, MODELS, readSet } from './nist-strd-sets.js';

function fitFrom(name: string, set: CertifiedSet, start: number[]) {
  const model = MODELS[name]!;
  return leastSquares(
    {
      parameters: start.map((_, k) => ({ id: `b${k + 1}` })),
      residualCount: set.x.length,
      residual: (b, out) =>
        set.x.forEach((x, i) => {
          out[i] = set.y[i]! - model(b, x);
        }),
    },
    start,
    { relativeOffset: 1e-9, maxIterations: 2000 },
  );
}

describe.each(Object.keys(MODELS))('certified regression %s', (name) => {
  const set = readSet(name);
  it.each([
    ['far', 0],
    ['near', 1],
  ])('is reached to 8 digits, and its deviations to 6, from the %s start', (_, which) => {
    const fit = fitFrom(name, set, set.starts[which]!);
    expect(fit.status).toBe('converged');
    expect(digitsAgreeing(fit.values, set.values)).toBeGreaterThanOrEqual(8);
    expect(digitsAgreeing(fit.standardErrors, set.deviations)).toBeGreaterThanOrEqual(6);
    expect(2 * fit.cost).toBeCloseTo(set.sumOfSquares, 6);
    expect(fit.dof).toBe(set.x.length - set.values.length);
  });
});
