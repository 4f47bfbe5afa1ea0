import type { Sweep } from '../kit/sweep.js';
import { leastSquares } from '../numerics/least-squares.js';
import type { LeastSquaresFit, LeastSquaresOptions, LeastSquaresProblem } from '../numerics/least-squares-problem.js';
import { COMPLEX_MEDIAN_TO_SIGMA, MAD_TO_SIGMA, median, medianInPlace } from '../numerics/statistics.js';
import { type DriverModel, FREE_AIR } from './driver-impedance.js';
import { driverSweepProblem } from './driver-sweep-problem.js';
import { motionalStart, startValues } from './start-values.js';
import type { SuspensionModel } from './suspension.js';
import { type SweepData, sweepData } from './sweep-term.js';
import type { CoilModel } from './voice-coil.js';

export interface SweepFitOptions {
  readonly coil: CoilModel;
  readonly suspension: SuspensionModel;
  /** Weight of ln(Z/Zmodel) at each point, shape (n); 1 (relative misfit) where left out, 0 switches a point off. */
  readonly weights?: Float64Array;
  readonly robust: boolean;
  /** Natural values in the order of `driverParameters`; from the curve where left out. */
  readonly start?: ArrayLike<number>;
  readonly checkpoint?: () => void;
}

export interface DriverSweepFit {
  readonly model: DriverModel;
  readonly fit: LeastSquaresFit;
  /** σ of the weighted misfit, one component, from its median: outliers do not move it. */
  readonly scale: number;
  /** Points left out of the last, plain fit. */
  readonly outliers: number[];
  /** The weights of the last fit: those given, 0 at the outliers. */
  readonly weights: Float64Array;
}

const SOFT_SCALE = 0.02; // of the relative misfit; a usable start is within a few of these
const LEAST_SCALE = 1e-9; // noise-free curves: rounding of the arithmetic
const RESCALINGS = 3;
const OUTLIER_SCALES = 5;
const CAUCHY_SCALES = 2;
const CLEARLY_THERE = 3.29; // standard errors
const EARLY: Partial<LeastSquaresOptions> = { covariance: false, relativeOffset: 0.03 };

/**
 * Fits one sweep. Robust: a soft-L1 fit from the start, then Cauchy with the scale taken from the median of the misfit,
 * three times; then the points beyond five scales are left out and a plain fit gives values and covariance.
 * Source: common practice in robust regression; the order of steps is our own, from trials.
 */
export function fitDriverSweep(sweep: Sweep | SweepData, options: SweepFitOptions): DriverSweepFit {
  const data = 'grid' in sweep ? sweep : sweepData(sweep);
  const { coil, suspension, robust, checkpoint } = options;
  const model: DriverModel = { coil, suspension, load: FREE_AIR };
  const given = options.weights ?? new Float64Array(data.re.length).fill(1);
  const start = options.start ?? startValues(motionalStart(data), coil, suspension);
  const problem = driverSweepProblem(model, data, given);
  const common = checkpoint ? { checkpoint } : {};
  if (!robust) {
    const fit = withoutIdleRss(model, data, given, leastSquares(problem, start, common));
    return { model, fit, scale: misfitScale(problem, fit.values, data.hasPhase).scale, outliers: [], weights: given };
  }
  const typical = median(given.filter((weight) => weight > 0));
  let values = leastSquares(problem, start, {
    ...common,
    ...EARLY,
    loss: 'soft-l1',
    lossScale: SOFT_SCALE * typical,
  }).values;
  let { scale, sizes } = misfitScale(problem, values, data.hasPhase);
  for (let round = 0; round < RESCALINGS; round++) {
    values = leastSquares(problem, values, {
      ...common,
      ...EARLY,
      loss: 'cauchy',
      lossScale: CAUCHY_SCALES * scale,
    }).values;
    ({ scale, sizes } = misfitScale(problem, values, data.hasPhase));
  }
  const weights = given.map((weight, i) => (sizes[i]! > OUTLIER_SCALES * scale ? 0 : weight));
  const outliers = [...weights.keys()].filter((i) => weights[i] === 0 && given[i]! > 0);
  const fit = withoutIdleRss(
    model,
    data,
    weights,
    leastSquares(driverSweepProblem(model, data, weights), values, common),
  );
  return { model, fit, scale, outliers, weights };
}

/**
 * Rss is optional in the semi-inductance model: it stays only where the curve clearly asks for it, Gss/u(Gss) above both
 * √ln N (the Bayesian criterion) and 3.29 (one in a thousand by chance). Left in without need it drags Leb, Le and K along.
 */
function withoutIdleRss(
  model: DriverModel,
  data: SweepData,
  weights: Float64Array,
  fit: LeastSquaresFit,
): LeastSquaresFit {
  if (model.coil !== 'semi-inductance') return fit;
  const problem = driverSweepProblem(model, data, weights, ['Gss']);
  const at = problem.parameters.findIndex(({ id }) => id === 'Gss');
  const rows = problem.activeCount ?? problem.residualCount;
  const limit = Math.max(Math.log(rows), CLEARLY_THERE * CLEARLY_THERE);
  if (fit.values[at]! ** 2 > limit * fit.standardErrors[at]! ** 2 && fit.status === 'converged') return fit;
  const start = fit.values.slice();
  start[at] = 0;
  const simpler = leastSquares(problem, start);
  if (simpler.status === 'stalled' || rows * Math.log(simpler.cost / fit.cost) > limit) return fit;
  return {
    ...simpler,
    status: simpler.status === 'converged' ? 'at-bound' : simpler.status,
    atBound: [...simpler.atBound, 'Gss'],
  };
}

/** |weighted misfit| of each point (n) and the scale from its median. */
function misfitScale(problem: LeastSquaresProblem, values: Float64Array, complex: boolean) {
  const rows = new Float64Array(problem.residualCount);
  problem.residual(values, rows);
  const sizes = complex
    ? Float64Array.from({ length: rows.length / 2 }, (_, i) => Math.hypot(rows[2 * i]!, rows[2 * i + 1]!))
    : rows.map(Math.abs);
  const middle = medianInPlace(sizes.filter((size) => size > 0));
  const scale = complex ? middle / COMPLEX_MEDIAN_TO_SIGMA : middle * MAD_TO_SIGMA;
  return { sizes, scale: Math.max(Number.isFinite(scale) ? scale : 0, LEAST_SCALE) };
}
