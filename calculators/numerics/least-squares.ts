import { InputError } from '../../shared/errors.js';
import { describeFit } from './fit-description.js';
import { FitIteration } from './fit-iteration.js';
import type { LeastSquaresFit, LeastSquaresOptions, LeastSquaresProblem } from './least-squares-problem.js';
import { LINEAR_LOSS, type Loss } from './losses.js';
import { FusedEvaluation, ResidualEvaluation } from './problem-evaluation.js';

/**
 * Minimises ½Σρ(r²) over the parameters, from `start` (natural values), by Levenberg–Marquardt with diagonal scaling
 * inside a box: a parameter on a bound whose gradient points outwards rests there, and each component of a step has a
 * limit of its own. Stops on the relative offset, not on the change of the sum of squares. Deterministic.
 * Sources: D. W. Marquardt, "An Algorithm for Least-Squares Estimation of Nonlinear Parameters", J. SIAM 11, 1963;
 * D. M. Bates, D. G. Watts, "A Relative Offset Orthogonality Convergence Criterion for Nonlinear Least Squares",
 * Technometrics 23, 1981 (both from memory).
 * Throws InputError('bad-setting') on arguments that make no problem, nothing on numeric trouble.
 */
export function leastSquares(
  problem: LeastSquaresProblem,
  start: ArrayLike<number>,
  options: LeastSquaresOptions = {},
): LeastSquaresFit {
  checkArguments(problem, start, options);
  const loss: Loss = { kind: options.loss ?? LINEAR_LOSS.kind, scale: options.lossScale ?? LINEAR_LOSS.scale };
  const evaluation = problem.normal
    ? new FusedEvaluation(problem.normal.bind(problem), problem.parameters.length, loss)
    : new ResidualEvaluation(problem, loss);
  const iteration = new FitIteration(problem, evaluation, start, options);
  const status = iteration.run();
  return describeFit(problem, evaluation, options, {
    values: iteration.values,
    status,
    relativeOffset: iteration.offset,
    iterations: iteration.iterations,
    resting: iteration.resting(),
  });
}

function checkArguments(problem: LeastSquaresProblem, start: ArrayLike<number>, options: LeastSquaresOptions): void {
  const { parameters, residualCount } = problem;
  const refuse = (message: string, where: string): never => {
    throw new InputError('bad-setting', message, where);
  };
  if (parameters.length === 0) refuse('A fit needs at least one parameter.', 'parameters');
  if (start.length !== parameters.length)
    refuse(`The fit has ${parameters.length} parameters but ${start.length} starting values.`, 'start');
  if (!Number.isInteger(residualCount) || residualCount < 1)
    refuse('A fit needs at least one residual.', 'residualCount');
  if (problem.blocks && problem.blocks.reduce((total, { rows }) => total + rows, 0) !== residualCount)
    refuse('The blocks do not add up to the number of residuals.', 'blocks');
  if (options.lossScale !== undefined && !(options.lossScale > 0))
    refuse('The scale of a robust loss must be above 0.', 'lossScale');
  parameters.forEach(({ id, held, logScaled, lower, upper }, k) => {
    const value = start[k]!;
    if (!Number.isFinite(value)) refuse(`The starting value of ${id} is not a number.`, id);
    if (held) return;
    if (logScaled && lower !== undefined && !(lower > 0)) refuse(`The lower bound of ${id} must be above 0.`, id);
    if (logScaled && !(Math.max(value, lower ?? 0) > 0))
      refuse(`${id} is fitted on a logarithmic scale, so it must start above 0.`, id);
    if (lower !== undefined && upper !== undefined && !(lower < upper))
      refuse(`The bounds of ${id} leave no room: ${lower} to ${upper}.`, id);
  });
}
