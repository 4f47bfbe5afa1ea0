import type { FitStatus } from '../../shared/output.js';
import type { Loss, LossKind } from './losses.js';

/**
 * One unknown of a fit. The engine works on scaled parameters: ln(value) where `logScaled`, the value itself elsewhere.
 * `lower` and `upper` are bounds on the value; left out means unbounded.
 */
export interface FitParameter {
  readonly id: string;
  readonly logScaled?: boolean; // value > 0 always
  readonly lower?: number;
  readonly upper?: number;
  readonly held?: boolean; // stays at its starting value and is not counted
  readonly maxStep?: number; // largest change of the scaled parameter in one iteration; 1.5 where logScaled, else a quarter of its size
  readonly typical?: number; // its usual size: for difference steps at 0, and for the largest step
}

/** Consecutive rows of the residual vector. A group (2 rows for a complex residual) shares one robust weight. */
export interface ResidualBlock {
  readonly rows: number;
  readonly groupSize: 1 | 2;
  readonly robust: boolean; // false: the loss is always linear here, as for prior knowledge
}

/**
 * What one pass over the data yields at a point: cost ½Σρ, gradient Jᵀwr and curvature JᵀwJ with respect to the scaled
 * parameters. `hessian` is (p, p), row-major; only its lower triangle (column ≤ row) has to be filled.
 */
export interface NormalSums {
  cost: number;
  readonly gradient: Float64Array;
  readonly hessian: Float64Array;
}

/**
 * A least-squares problem: minimise ½Σρ(r²). Callbacks get the natural values (p) and must not keep the arrays.
 * A model that cannot be evaluated at some values writes NaN (or a cost of NaN): the engine then refuses that step.
 */
export interface LeastSquaresProblem {
  readonly parameters: readonly FitParameter[];
  readonly residualCount: number; // n, rows of the residual vector
  readonly activeCount?: number; // rows that carry weight, where some are switched off; n if left out
  readonly blocks?: readonly ResidualBlock[]; // one robust block of single rows if left out
  /** Weighted residual, shape (n). Complex residuals interleave their real and imaginary part. */
  residual(values: Float64Array, out: Float64Array): void;
  /** ∂r/∂(scaled parameter): column k stands at out[k·n … k·n + n − 1]. By differences where left out. */
  jacobian?(values: Float64Array, out: Float64Array): void;
  /** All sums of one pass, for speed; then neither `residual` nor `jacobian` is called while iterating. */
  normal?(values: Float64Array, loss: Loss, out: NormalSums): void;
}

export interface LeastSquaresOptions {
  readonly loss?: LossKind; // linear
  readonly lossScale?: number; // in units of the weighted residual; 1
  readonly relativeOffset?: number; // stop when the relative offset falls below this; 1e-6
  readonly maxIterations?: number; // 200
  readonly absoluteSigma?: boolean; // residuals are in units of their own sigma: no scaling of the covariance
  readonly covariance?: boolean; // false skips it, for the early stages of a fit: standard errors are then 0
  readonly checkpoint?: () => void; // called between iterations; may throw to stop
}

export interface LeastSquaresFit {
  readonly values: Float64Array; // (p), natural
  readonly standardErrors: Float64Array; // (p), natural; 0 where held or on a bound, Infinity where undetermined
  readonly covariance: Float64Array; // (p, p) row-major, natural
  readonly scaledCovariance: Float64Array; // (p, p) row-major, of ln(value) where logScaled
  readonly correlations: number[][]; // (p, p)
  readonly dof: number; // rows that carry weight minus parameters that are free
  readonly cost: number; // ½Σρ
  readonly residualRms: number; // root mean square of the weighted residual over the rows that carry weight
  readonly status: FitStatus;
  readonly atBound: string[];
  readonly neverMoved: string[]; // parameters the residual does not depend on, or which the data cannot tell
  readonly relativeOffset: number; // at the end, see relative-offset.ts
  readonly iterations: number;
  readonly evaluations: number;
}
