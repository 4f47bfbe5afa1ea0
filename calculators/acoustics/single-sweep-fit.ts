import type { Sweep } from '../kit/sweep.js';
import { leastSquares } from '../numerics/least-squares.js';
import type { LeastSquaresFit, LeastSquaresOptions } from '../numerics/least-squares-problem.js';
import { COMPLEX_MEDIAN_TO_SIGMA, MAD_TO_SIGMA, median, medianInPlace } from '../numerics/statistics.js';
import { withShunt } from './coil-start.js';
import { type DriverModel, FREE_AIR } from './driver-impedance.js';
import { driverSweepProblem } from './driver-sweep-problem.js';
import { motionalStart, startValues } from './start-values.js';
import type { SuspensionModel } from './suspension.js';
import { type SweepData, sweepData } from './sweep-term.js';
import { type CoilModel, coilParameters, NO_SHUNT } from './voice-coil.js';

export interface SweepFitOptions {
  readonly coil: CoilModel;
  readonly suspension: SuspensionModel;
  /** Weight of ln(Z/Zmodel) at each point, shape (n); 1 (relative misfit) where left out, 0 switches a point off. */
  readonly weights?: Float64Array;
  readonly robust: boolean;
  /** Natural values in the order of `driverParameters`; from the curve where left out. Its Gss decides whether Rss is fitted. */
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
const EARLY: LeastSquaresOptions = { covariance: false, relativeOffset: 0.03 };
const SHUNT_SHARE = 0.2; // of the start that tries Rss, see withShunt
const CLEARLY_THERE = 3.29; // standard errors: one in a thousand by chance
const GSS_AT = 4 + coilParameters('semi-inductance').findIndex(({ id }) => id === 'Gss');

/**
 * Fits one sweep. Robust: a soft-L1 fit from the start, then Cauchy with the scale taken from the median of the misfit,
 * three times; then the points beyond five scales are left out and a plain fit gives values and covariance.
 * Source: common practice in robust regression; the order of steps is our own, from trials.
 * The optional Rss of semi-inductance stays only where the curve clearly asks for it: left in without need it drags Leb, Le
 * and K along. Where it does not, Gss is among `atBound` and the status is at-bound.
 */
export function fitDriverSweep(sweep: Sweep | SweepData, options: SweepFitOptions): DriverSweepFit {
  const data = 'grid' in sweep ? sweep : sweepData(sweep);
  const { coil, suspension, start } = options;
  const task = new SweepTask({ coil, suspension, load: FREE_AIR }, data, options);
  const first = Float64Array.from(start ?? startValues(motionalStart(data), coil, suspension));
  if (coil !== 'semi-inductance') return task.fit(first, false);
  if (start) return task.fit(first, first[GSS_AT]! <= NO_SHUNT);
  first[GSS_AT] = 0;
  const without = task.fit(first, true);
  const values = without.fit.values.slice();
  values.set(withShunt([...values.subarray(4, 8)], SHUNT_SHARE), 4);
  const rows = without.fit.dof + without.fit.values.length;
  const trial = task.plain(without.weights, values, false);
  const gain = rows * Math.log(without.fit.cost / trial.cost);
  if (!(gain > Math.max(Math.log(rows), CLEARLY_THERE ** 2)) || trial.status === 'stalled') return without;
  return task.finish(trial.values, false);
}

/** One sweep with one model; every step may hold Rss at none. */
class SweepTask {
  private readonly given: Float64Array;
  private readonly common: LeastSquaresOptions;

  constructor(
    private readonly model: DriverModel,
    private readonly data: SweepData,
    private readonly options: SweepFitOptions,
  ) {
    this.given = options.weights ?? new Float64Array(data.re.length).fill(1);
    this.common = options.checkpoint ? { checkpoint: options.checkpoint } : {};
  }

  fit(start: Float64Array, withoutRss: boolean): DriverSweepFit {
    if (!this.options.robust) return this.described(this.plain(this.given, start, withoutRss), this.given);
    const typical = median(this.given.filter((weight) => weight > 0));
    const early = { ...this.common, ...EARLY };
    let { values } = leastSquares(this.problem(this.given, withoutRss), start, {
      ...early,
      loss: 'soft-l1',
      lossScale: SOFT_SCALE * typical,
    });
    for (let round = 0; round < RESCALINGS; round++) {
      const lossScale = CAUCHY_SCALES * this.misfit(values).scale;
      values = leastSquares(this.problem(this.given, withoutRss), values, {
        ...early,
        loss: 'cauchy',
        lossScale,
      }).values;
    }
    return this.finish(values, withoutRss);
  }

  /** The last step: leave out what lies far from these values, fit the rest plainly. */
  finish(values: Float64Array, withoutRss: boolean): DriverSweepFit {
    if (!this.options.robust) return this.described(this.plain(this.given, values, withoutRss), this.given);
    const { sizes, scale } = this.misfit(values);
    const weights = this.given.map((weight, i) => (sizes[i]! > OUTLIER_SCALES * scale ? 0 : weight));
    return this.described(this.plain(weights, values, withoutRss), weights);
  }

  plain(weights: Float64Array, start: Float64Array, withoutRss: boolean): LeastSquaresFit {
    const fit = leastSquares(this.problem(weights, withoutRss), start, this.common);
    if (!withoutRss) return fit;
    const status = fit.status === 'converged' ? 'at-bound' : fit.status;
    return { ...fit, status, atBound: [...fit.atBound, 'Gss'] };
  }

  private problem(weights: Float64Array, withoutRss: boolean) {
    return driverSweepProblem(this.model, this.data, weights, withoutRss ? ['Gss'] : []);
  }

  private described(fit: LeastSquaresFit, weights: Float64Array): DriverSweepFit {
    const outliers = [...weights.keys()].filter((i) => weights[i] === 0 && this.given[i]! > 0);
    return { model: this.model, fit, scale: this.misfit(fit.values).scale, outliers, weights };
  }

  /** |weighted misfit| of each point (n) and the scale from its median. */
  private misfit(values: Float64Array): { sizes: Float64Array; scale: number } {
    const problem = this.problem(this.given, false);
    const rows = new Float64Array(problem.residualCount);
    problem.residual(values, rows);
    const { hasPhase } = this.data;
    const sizes = hasPhase
      ? Float64Array.from({ length: rows.length / 2 }, (_, i) => Math.hypot(rows[2 * i]!, rows[2 * i + 1]!))
      : rows.map(Math.abs);
    const middle = medianInPlace(sizes.filter((_, i) => this.given[i]! > 0));
    const scale = hasPhase ? middle / COMPLEX_MEDIAN_TO_SIGMA : middle * MAD_TO_SIGMA;
    return { sizes, scale: Math.max(Number.isFinite(scale) ? scale : 0, LEAST_SCALE) };
  }
}
