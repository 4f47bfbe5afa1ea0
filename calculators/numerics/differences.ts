import type { LeastSquaresProblem } from './least-squares-problem.js';

const FORWARD = Math.sqrt(Number.EPSILON);
const CENTRAL = Math.cbrt(Number.EPSILON);

/**
 * ∂r/∂(scaled parameter) by differences, steps relative to the value: √ε forward, ∛ε central (truncation and
 * rounding in balance; common practice, no published source). A side on which the model gives no number, or which
 * lies beyond a bound, is replaced by the other side. Returns how many times the residual was computed.
 */
export function differenceJacobian(
  problem: LeastSquaresProblem,
  values: Float64Array,
  residual: Float64Array, // (n) at the values
  central: boolean,
  out: Float64Array, // (n, p) column-major
): number {
  const n = problem.residualCount;
  const shifted = values.slice();
  const above = new Float64Array(n);
  const below = new Float64Array(n);
  let evaluations = 0;
  const residualAt = (k: number, value: number, target: Float64Array): boolean => {
    const { lower = Number.NEGATIVE_INFINITY, upper = Number.POSITIVE_INFINITY } = problem.parameters[k]!;
    if (value < lower || value > upper) return false;
    shifted[k] = value;
    problem.residual(shifted, target);
    shifted[k] = values[k]!;
    evaluations++;
    return target.every(Number.isFinite);
  };
  problem.parameters.forEach((parameter, k) => {
    const value = values[k]!;
    const step = (central ? CENTRAL : FORWARD) * (Math.abs(value) || parameter.typical || 1);
    const high = value + step;
    const low = value - step;
    const hasAbove = residualAt(k, high, above);
    const hasBelow = (central || !hasAbove) && residualAt(k, low, below);
    const top = hasAbove ? above : residual;
    const bottom = hasBelow ? below : residual;
    const width = (hasAbove ? high : value) - (hasBelow ? low : value);
    const factor = width > 0 ? (parameter.logScaled ? value : 1) / width : 0;
    for (let i = 0; i < n; i++) out[k * n + i] = (top[i]! - bottom[i]!) * factor;
  });
  return evaluations;
}
