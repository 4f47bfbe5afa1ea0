import type { FitStatus } from '../../shared/output.js';
import { type InverseNormal, inverseNormalByCholesky, inverseNormalByQr } from './covariance.js';
import type { LeastSquaresFit, LeastSquaresOptions, LeastSquaresProblem } from './least-squares-problem.js';
import type { Evaluation } from './problem-evaluation.js';

/** Where the iteration ended. */
export interface EndPoint {
  readonly values: Float64Array;
  readonly status: FitStatus;
  readonly relativeOffset: number;
  readonly iterations: number;
  readonly resting: readonly number[]; // indices of parameters on a bound
}

/**
 * Uncertainties at the end point: covariance = s²(JᵀWJ)⁻¹ over the parameters that are free, s² = 2·cost/dof (1 where
 * the residuals are in units of their own sigma). Natural values follow by the chain rule (JCGM 100, 5.1.2).
 */
export function describeFit(
  problem: LeastSquaresProblem,
  evaluation: Evaluation,
  options: LeastSquaresOptions,
  end: EndPoint,
): LeastSquaresFit {
  const { parameters } = problem;
  const p = parameters.length;
  const { cost, hessian } = evaluation.sums;
  const rests = new Set(end.resting);
  parameters.forEach(({ held }, k) => {
    if (held) rests.add(k);
  });
  const indices = parameters.map((_, k) => k);
  const deaf = indices.filter((k) => !(hessian[k * p + k]! > 0) && !rests.has(k));
  const free = indices.filter((k) => !rests.has(k) && !deaf.includes(k));
  const rows = problem.activeCount ?? problem.residualCount;
  const dof = Math.max(rows - free.length, 0);
  const found = options.covariance === false ? null : inverseNormal(problem, evaluation, end.values, free);
  const undetermined = [...deaf, ...(found?.undetermined ?? [])];
  const variance = options.absoluteSigma ? 1 : dof > 0 ? (2 * cost) / dof : 0;
  const scaledCovariance = new Float64Array(p * p);
  const covariance = new Float64Array(p * p);
  const jacobianOf = (k: number) => (parameters[k]!.logScaled ? end.values[k]! : 1);
  if (found && Number.isFinite(variance)) {
    for (let i = 0; i < p * p; i++) {
      scaledCovariance[i] = found.inverse[i]! * variance;
      covariance[i] = scaledCovariance[i]! * jacobianOf(Math.trunc(i / p)) * jacobianOf(i % p);
    }
  }
  const standardErrors = Float64Array.from(indices, (k) =>
    undetermined.includes(k) ? Number.POSITIVE_INFINITY : Math.sqrt(covariance[k * p + k]!),
  );
  const idOf = (k: number) => parameters[k]!.id;
  return {
    values: end.values,
    standardErrors,
    covariance,
    scaledCovariance,
    correlations: correlationsOf(scaledCovariance, p),
    dof,
    cost: Number.isFinite(cost) ? cost : Number.POSITIVE_INFINITY,
    residualRms: Number.isFinite(cost) ? Math.sqrt((2 * cost) / rows) : Number.POSITIVE_INFINITY,
    status: end.status,
    atBound: end.resting.map(idOf),
    neverMoved: undetermined.map(idOf),
    relativeOffset: end.relativeOffset,
    iterations: end.iterations,
    evaluations: evaluation.evaluations,
  };
}

function inverseNormal(
  problem: LeastSquaresProblem,
  evaluation: Evaluation,
  values: Float64Array,
  free: readonly number[],
): InverseNormal | null {
  const p = problem.parameters.length;
  const n = problem.residualCount;
  if (free.length === 0) return null;
  const weighted = evaluation.weightedJacobian();
  if (weighted) return inverseNormalByQr(weighted, n, p, free);
  const quick = inverseNormalByCholesky(evaluation.sums.hessian, p, free);
  if (quick || !problem.jacobian) return quick;
  const jacobian = new Float64Array(n * p);
  problem.jacobian(values, jacobian);
  return inverseNormalByQr(jacobian, n, p, free);
}

function correlationsOf(covariance: Float64Array, p: number): number[][] {
  return Array.from({ length: p }, (_, i) =>
    Array.from({ length: p }, (__, j) => {
      if (i === j) return 1;
      const product = covariance[i * p + i]! * covariance[j * p + j]!;
      return product > 0 ? Math.min(1, Math.max(-1, covariance[i * p + j]! / Math.sqrt(product))) : 0;
    }),
  );
}
