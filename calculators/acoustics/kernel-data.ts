import type { NormalSums } from '../numerics/least-squares-problem.js';
import type { Loss } from '../numerics/losses.js';
import type { FrequencyGrid } from './frequency-grid.js';

/** What a fused kernel reads of a sweep: the measured impedance in ohm, shapes (n). */
export interface KernelData {
  readonly grid: FrequencyGrid;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Cost, gradient and curvature (lower triangle) of a driver in free air with respect to its scaled parameters, in the order of
 * `driverParameters`; residual and model as in sweep-term.ts and driver-impedance.ts. A weight of 0 skips the point.
 */
export type Kernel = (
  values: ArrayLike<number>,
  data: KernelData,
  weights: Float64Array,
  loss: Loss,
  out: NormalSums,
) => void;
