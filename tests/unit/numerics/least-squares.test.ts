import { levenbergMarquardt } from 'ml-levenberg-marquardt';
import { describe, expect, it } from 'vitest';
import { leastSquares } from '../../../calculators/numerics/least-squares.js';
import type { FitParameter, LeastSquaresProblem } from '../../../calculators/numerics/least-squares-problem.js';
import { seededRandom } from '../../../calculators/numerics/random.js';
import { InputError } from '../../../shared/errors.js';

const X = Array.from({ length: 40 }, (_, i) => 0.1 * i);

function problemOf(
  parameters: readonly FitParameter[],
  model: (values: Float64Array, x: number) => number,
  y: readonly number[],
  x: readonly number[] = X,
): LeastSquaresProblem {
  return {
    parameters,
    residualCount: x.length,
    residual: (values, out) => {
      for (const [i, at] of x.entries()) out[i] = y[i]! - model(values, at);
    },
  };
}
const decay = (values: Float64Array, x: number) => values[0]! * Math.exp(-values[1]! * x);
const amplitudeAndRate: FitParameter[] = [{ id: 'amplitude' }, { id: 'rate' }];
const noisyDecay = (seed: number, noise = 0.01) => {
  const random = seededRandom(seed);
  return X.map((x) => 2 * Math.exp(-0.7 * x) + noise * random.normal());
};

describe('a straight line', () => {
  // y = 1, 3, 2, 5 at x = 0 … 3: slope 1.1, intercept 1.1, residual sum 2.7 (normal equations by hand)
  const line = problemOf([{ id: 'a' }, { id: 'b' }], (v, x) => v[0]! + v[1]! * x, [1, 3, 2, 5], [0, 1, 2, 3]);
  const fit = leastSquares(line, [0, 0], { relativeOffset: 1e-11 });

  it('is found with the values, standard errors and correlation of the normal equations', () => {
    expect(fit.status).toBe('converged');
    expect(fit.values[0]).toBeCloseTo(1.1, 10);
    expect(fit.values[1]).toBeCloseTo(1.1, 10);
    expect(2 * fit.cost).toBeCloseTo(2.7, 10);
    expect(fit.dof).toBe(2);
    const variance = 2.7 / 2; // (JᵀJ)⁻¹ = [[0.7, −0.3], [−0.3, 0.2]]
    expect(fit.standardErrors[0]).toBeCloseTo(Math.sqrt(0.7 * variance), 9);
    expect(fit.standardErrors[1]).toBeCloseTo(Math.sqrt(0.2 * variance), 9);
    expect(fit.correlations[0]![1]).toBeCloseTo(-0.3 / Math.sqrt(0.7 * 0.2), 9);
    expect(fit.residualRms).toBeCloseTo(Math.sqrt(2.7 / 4), 10);
  });

  it('keeps its covariance unscaled when the residuals are in units of their own sigma', () => {
    const absolute = leastSquares(line, [0, 0], { absoluteSigma: true, relativeOffset: 1e-11 });
    expect(absolute.standardErrors[0]).toBeCloseTo(Math.sqrt(0.7), 9);
  });
});

describe('bounds and scales', () => {
  it('rests on a bound that the data push against, names it, and still fits the others', () => {
    const bounded = [{ id: 'amplitude' }, { id: 'rate', upper: 0.5 }];
    const fit = leastSquares(problemOf(bounded, decay, noisyDecay(1)), [1, 0.1]);
    expect(fit.status).toBe('at-bound');
    expect(fit.atBound).toEqual(['rate']);
    expect(fit.values[1]).toBe(0.5);
    expect(fit.standardErrors[1]).toBe(0);
    const held = leastSquares(
      problemOf([{ id: 'amplitude' }, { id: 'rate', held: true }], decay, noisyDecay(1)),
      [1, 0.5],
    );
    expect(fit.values[0]).toBeCloseTo(held.values[0]!, 6);
    expect(fit.dof).toBe(39);
  });

  it('leaves a bound again that it only passed through', () => {
    const bounded = [
      { id: 'amplitude', lower: 0, upper: 100 },
      { id: 'rate', lower: 0.01, upper: 50 },
    ];
    const fit = leastSquares(problemOf(bounded, decay, noisyDecay(2)), [100, 50]);
    expect(fit.status).toBe('converged');
    expect(fit.values[1]).toBeCloseTo(0.7, 1);
  });

  it('gives the same optimum, errors included, on a logarithmic scale', () => {
    const logged = amplitudeAndRate.map((parameter) => ({ ...parameter, logScaled: true }));
    const plain = leastSquares(problemOf(amplitudeAndRate, decay, noisyDecay(3)), [1, 1]);
    const fit = leastSquares(problemOf(logged, decay, noisyDecay(3)), [1, 1]);
    for (const k of [0, 1]) {
      expect(fit.values[k]).toBeCloseTo(plain.values[k]!, 6);
      expect(fit.standardErrors[k]! / plain.standardErrors[k]!).toBeCloseTo(1, 4);
      expect(Math.sqrt(fit.scaledCovariance[3 * k]!)).toBeCloseTo(fit.standardErrors[k]! / fit.values[k]!, 12);
    }
  });
});

describe('numeric trouble', () => {
  it('refuses steps into a region where the model is no number, and goes on', () => {
    const root: LeastSquaresProblem = problemOf([{ id: 'a' }], (v, x) => Math.sqrt(v[0]! - 1) * x, X);
    const fit = leastSquares(root, [1.01]);
    expect(fit.status).toBe('converged');
    expect(fit.values[0]).toBeCloseTo(2, 6);
  });

  it('says stalled, without a throw, where the model is no number from the start', () => {
    const fit = leastSquares(
      problemOf([{ id: 'a' }], () => Number.NaN, X),
      [1],
    );
    expect(fit.status).toBe('stalled');
    expect(fit.cost).toBe(Number.POSITIVE_INFINITY);
    expect([...fit.values]).toEqual([1]);
  });

  it('names a parameter without influence, and fits the rest', () => {
    const idle = problemOf([...amplitudeAndRate, { id: 'idle' }], decay, noisyDecay(4));
    const fit = leastSquares(idle, [1, 1, 5]);
    expect(fit.status).toBe('converged');
    expect(fit.neverMoved).toEqual(['idle']);
    expect(fit.standardErrors[2]).toBe(Number.POSITIVE_INFINITY);
    expect(fit.values[2]).toBe(5);
    expect(Number.isFinite(fit.standardErrors[0]!)).toBe(true);
  });

  it('finds the sum where only the sum of two parameters is told, and says that one is undetermined', () => {
    const twins = problemOf(
      [{ id: 'a' }, { id: 'b' }],
      (v) => v[0]! + v[1]!,
      X.map(() => 3),
    );
    const fit = leastSquares(twins, [1, 1]);
    expect(fit.values[0]! + fit.values[1]!).toBeCloseTo(3, 8);
    expect(fit.neverMoved).toHaveLength(1);
  });

  it('stops at the iteration limit and says so', () => {
    const fit = leastSquares(problemOf(amplitudeAndRate, decay, noisyDecay(5)), [50, 0.01], { maxIterations: 2 });
    expect(fit.status).toBe('iteration-limit');
  });

  it('takes an exact fit for converged', () => {
    const fit = leastSquares(
      problemOf(
        amplitudeAndRate,
        decay,
        X.map((x) => 2 * Math.exp(-0.7 * x)),
      ),
      [1, 0.3],
    );
    expect(fit.status).toBe('converged');
    expect(fit.values[1]).toBeCloseTo(0.7, 10);
  });
});

describe('robust losses', () => {
  const withOutliers = noisyDecay(6).map((y, i) => (i % 9 === 4 ? y + 3 : y));
  it.each(['soft-l1', 'huber', 'cauchy'] as const)('%s is hardly moved by one wild point in nine', (loss) => {
    const problem = problemOf(amplitudeAndRate, decay, withOutliers);
    const plain = leastSquares(problem, [1, 1]);
    const fit = leastSquares(problem, [1, 1], { loss, lossScale: 0.02 });
    expect(fit.status).toBe('converged');
    expect(Math.abs(plain.values[0]! - 2)).toBeGreaterThan(0.2);
    expect(Math.abs(fit.values[0]! - 2)).toBeLessThan(0.02);
    expect(Math.abs(fit.values[1]! - 0.7)).toBeLessThan(0.03);
  });

  it('weighs both rows of a complex residual alike, and leaves a block of prior knowledge alone', () => {
    const residual = (v: Float64Array, out: Float64Array) => {
      out.set([v[0]! - 1, 0, v[0]! - 1.1, 0, v[0]! - 9, 4, 10 * (v[0]! - 1)]);
    };
    const blocks = [
      { rows: 6, groupSize: 2, robust: true },
      { rows: 1, groupSize: 1, robust: false },
    ] as const;
    const problem = { parameters: [{ id: 'a' }], residualCount: 7, blocks, residual };
    const { values } = leastSquares(problem, [2], { loss: 'cauchy', lossScale: 0.1, relativeOffset: 1e-9 });
    const a = values[0]!; // the estimating equation Σ w(|r|²) r = 0, w = 1/(1 + |r|²/C²), by hand
    const w = (square: number) => 1 / (1 + square / 0.01);
    const sum =
      (a - 1) * w((a - 1) ** 2) + (a - 1.1) * w((a - 1.1) ** 2) + (a - 9) * w((a - 9) ** 2 + 16) + 100 * (a - 1);
    expect(sum).toBeCloseTo(0, 6);
  });
});

describe('the engine as a part', () => {
  it('agrees with another Levenberg–Marquardt program on the same data', () => {
    const y = noisyDecay(7);
    const ours = leastSquares(problemOf(amplitudeAndRate, decay, y), [1, 1]);
    const theirs = levenbergMarquardt(
      { x: X, y },
      ([a = 0, b = 0]) =>
        (x: number) =>
          a * Math.exp(-b * x),
      {
        initialValues: [1, 1],
        damping: 0.01,
        maxIterations: 300,
        gradientDifference: 1e-6,
      },
    );
    for (const k of [0, 1]) {
      const apart = Math.abs(ours.values[k]! - theirs.parameterValues[k]!);
      expect(apart / ours.standardErrors[k]!).toBeLessThan(0.01);
    }
  });

  it('gives the same digits with a Jacobian, without one, and from one fused pass', () => {
    const plain = problemOf(amplitudeAndRate, decay, noisyDecay(8));
    const jacobian = (v: Float64Array, out: Float64Array) => {
      for (const [i, x] of X.entries()) {
        out[i] = -Math.exp(-v[1]! * x);
        out[X.length + i] = v[0]! * x * Math.exp(-v[1]! * x);
      }
    };
    const normal: LeastSquaresProblem['normal'] = (values, _loss, out) => {
      const r = new Float64Array(X.length);
      const j = new Float64Array(2 * X.length);
      plain.residual(values, r);
      jacobian(values, j);
      const column = (k: number) => j.subarray(k * X.length, (k + 1) * X.length);
      const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, value, i) => sum + value * b[i]!, 0);
      out.cost = 0.5 * dot(r, r);
      out.gradient.set([dot(column(0), r), dot(column(1), r)]);
      out.hessian.set([dot(column(0), column(0)), 0, dot(column(1), column(0)), dot(column(1), column(1))]);
    };
    const [a, b, c] = [plain, { ...plain, jacobian }, { ...plain, normal }].map((problem) =>
      leastSquares(problem, [1, 1]),
    );
    for (const k of [0, 1]) {
      expect(a!.values[k]).toBeCloseTo(b!.values[k]!, 9);
      expect(c!.values[k]).toBeCloseTo(b!.values[k]!, 9);
      expect(a!.standardErrors[k]! / b!.standardErrors[k]!).toBeCloseTo(1, 6);
      expect(c!.standardErrors[k]! / b!.standardErrors[k]!).toBeCloseTo(1, 6);
    }
  });

  it('asks the checkpoint between iterations and lets it stop the fit', () => {
    let calls = 0;
    const checkpoint = () => {
      calls++;
      if (calls === 3) throw new Error('enough');
    };
    const problem = problemOf(amplitudeAndRate, decay, noisyDecay(9));
    expect(() => leastSquares(problem, [50, 0.01], { checkpoint })).toThrow('enough');
    expect(calls).toBe(3);
  });

  it('is deterministic to the last bit', () => {
    const run = () => leastSquares(problemOf(amplitudeAndRate, decay, noisyDecay(10)), [50, 0.01]);
    expect([...run().covariance]).toEqual([...run().covariance]);
  });

  it.each([
    ['no parameters', [], [], {}, 'parameters'],
    ['too few starting values', amplitudeAndRate, [1], {}, 'start'],
    ['a start that is no number', amplitudeAndRate, [1, Number.NaN], {}, 'rate'],
    ['a logarithm of 0', [{ id: 'amplitude', logScaled: true }, { id: 'rate' }], [0, 1], {}, 'amplitude'],
    ['bounds that leave no room', [{ id: 'amplitude', lower: 1, upper: 1 }, { id: 'rate' }], [1, 1], {}, 'amplitude'],
    ['a loss without a scale', amplitudeAndRate, [1, 1], { loss: 'huber', lossScale: 0 }, 'lossScale'],
  ] as const)('refuses %s with bad-setting and says where', (_, parameters, start, options, where) => {
    const attempt = () => leastSquares(problemOf(parameters, decay, X), start, options);
    expect(attempt).toThrow(InputError);
    expect(attempt).toThrow(expect.objectContaining({ code: 'bad-setting', where }));
  });
});
