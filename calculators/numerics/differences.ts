import type { LeastSquaresProblem } from './least-squares-problem.js';

/** How exact the differences are: forward, central, or through five points. */
export type DifferenceOrder = 1 | 2 | 4;

/** Steps relative to the value: √ε and ∛ε balance truncation and rounding; 1e-4 keeps five points exact for steep exponentials. */
const STEP: Readonly<Record<DifferenceOrder, number>> = {
  1: Math.sqrt(Number.EPSILON),
  2: Math.cbrt(Number.EPSILON),
  4: 1e-4,
};

/**
 * ∂r/∂(scaled parameter) by differences, steps relative to the value (common practice, no published source). A side on
 * which the model gives no number, or which lies beyond a bound, is replaced by the other side.
 * Returns how many times the residual was computed.
 */
export function differenceJacobian(
  problem: LeastSquaresProblem,
  values: Float64Array,
  residual: Float64Array, // (n) at the values
  order: DifferenceOrder,
  out: Float64Array, // (n, p) column-major
): number {
  const n = problem.residualCount;
  const shifted = values.slice();
  const buffers = [0, 1, 2, 3].map(() => new Float64Array(n));
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
  const [above, below, farAbove, farBelow] = buffers as [Float64Array, Float64Array, Float64Array, Float64Array];
  problem.parameters.forEach((parameter, k) => {
    const value = values[k]!;
    const step = STEP[order] * (Math.abs(value) || parameter.typical || 1);
    const [high, low] = [value + step, value - step];
    const hasAbove = residualAt(k, high, above);
    const hasBelow = (order > 1 || !hasAbove) && residualAt(k, low, below);
    const slope = parameter.logScaled ? value : 1;
    const [farHigh, farLow] = [value + 2 * step, value - 2 * step];
    if (order === 4 && hasAbove && hasBelow && residualAt(k, farHigh, farAbove) && residualAt(k, farLow, farBelow)) {
      const [near, far] = [(4 / 3) * (slope / (high - low)), (1 / 3) * (slope / (farHigh - farLow))];
      for (let i = 0; i < n; i++) out[k * n + i] = near * (above[i]! - below[i]!) - far * (farAbove[i]! - farBelow[i]!);
      return;
    }
    const top = hasAbove ? above : residual;
    const bottom = hasBelow ? below : residual;
    const width = (hasAbove ? high : value) - (hasBelow ? low : value);
    const factor = width > 0 ? slope / width : 0;
    for (let i = 0; i < n; i++) out[k * n + i] = (top[i]! - bottom[i]!) * factor;
  });
  return evaluations;
}
