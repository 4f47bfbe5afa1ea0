import type { LeastSquaresProblem, NormalSums } from '../numerics/least-squares-problem.js';
import type { Loss } from '../numerics/losses.js';
import type { DriverModel } from './driver-impedance.js';
import { type SweepData, SweepTerm } from './sweep-term.js';

/** Fitting one sweep with one model; `weights` (n) multiply ln(Z/Zmodel), 0 switches a point off. */
export function driverSweepProblem(
  model: DriverModel,
  data: SweepData,
  weights: Float64Array,
  held: readonly string[] = [], // parameters that stay at their starting values
): LeastSquaresProblem {
  const term = new SweepTerm(model, data, weights);
  return {
    parameters: term.parameters.map((parameter) =>
      held.includes(parameter.id) ? { ...parameter, held: true } : parameter,
    ),
    residualCount: term.rows,
    activeCount: term.activeRows,
    blocks: [{ rows: term.rows, groupSize: term.groupSize, robust: true }],
    residual: (values: Float64Array, out: Float64Array) => term.residual(values, out),
    jacobian: (values: Float64Array, out: Float64Array) => term.jacobian(values, out),
    normal: (values: Float64Array, loss: Loss, out: NormalSums) => term.accumulate(values, loss, out),
  };
}
