import type { ComplexSweep, Sweep } from '../kit/sweep.js';
import { hasPhase, magnitudeOf } from '../kit/sweep.js';
import { type ComplexArray, complexArray } from '../numerics/complex-array.js';
import type { FitParameter, NormalSums } from '../numerics/least-squares-problem.js';
import { type Loss, lossValue, lossWeight } from '../numerics/losses.js';
import { type DriverModel, driverImpedance, driverParameters } from './driver-impedance.js';
import { type FrequencyGrid, frequencyGrid } from './frequency-grid.js';
import { fusedKernel } from './fused-kernel.js';
import type { Kernel } from './kernel-data.js';

/** A sweep made ready for fitting. Shapes (n). Without phase, `im` and `phaseRad` are 0 and only |Z| is fitted. */
export interface SweepData {
  readonly grid: FrequencyGrid;
  readonly hasPhase: boolean;
  readonly re: Float64Array; // ohm; |Z| where there is no phase
  readonly im: Float64Array;
  readonly logMagnitude: Float64Array; // ln|Z/Ω|
  readonly phaseRad: Float64Array;
}

export function sweepData(sweep: Sweep): SweepData {
  const phase = hasPhase(sweep);
  const re = phase ? (sweep as ComplexSweep).realOhm : magnitudeOf(sweep);
  const im = phase ? (sweep as ComplexSweep).imaginaryOhm : new Float64Array(re.length);
  return {
    grid: frequencyGrid(sweep.frequencyHz),
    hasPhase: phase,
    re,
    im,
    logMagnitude: magnitudeOf(sweep).map(Math.log),
    phaseRad: phase ? re.map((value, i) => Math.atan2(im[i]!, value)) : im,
  };
}

/**
 * The misfit of one sweep under one model: ρ = ln(Z/Zmodel), complex (or its real part where there is no phase),
 * times the weight of the point. Rows: ρ's real and imaginary part side by side, point after point.
 */
export class SweepTerm {
  readonly parameters: readonly FitParameter[];
  readonly groupSize: 1 | 2;
  readonly rows: number;
  private readonly kernel: Kernel | null;
  private scratch: { z: ComplexArray; columns: ComplexArray[] } | null = null; // made when first needed

  constructor(
    readonly model: DriverModel,
    readonly data: SweepData,
    readonly weights: Float64Array, // (n), 0 = switched off
  ) {
    this.parameters = driverParameters(model);
    this.groupSize = data.hasPhase ? 2 : 1;
    this.rows = weights.length * this.groupSize;
    this.kernel = data.hasPhase ? fusedKernel(model) : null;
  }

  /** Model impedance and, with `derivatives`, ∂ln Z/∂(scaled parameter) at the values. */
  private evaluate(values: ArrayLike<number>, derivatives: boolean): { z: ComplexArray; columns: ComplexArray[] } {
    const n = this.weights.length;
    this.scratch ??= { z: complexArray(n), columns: [] };
    const { z, columns } = this.scratch;
    if (derivatives) while (columns.length < this.parameters.length) columns.push(complexArray(n));
    driverImpedance(this.model, values, this.data.grid, z, derivatives ? columns : undefined);
    return this.scratch;
  }

  /** Rows that carry weight. */
  get activeRows(): number {
    let points = 0;
    for (const weight of this.weights) if (weight > 0) points++;
    return points * this.groupSize;
  }

  /** Weighted residual to `out` from row `at` on. */
  residual(values: ArrayLike<number>, out: Float64Array, at = 0): void {
    const { z } = this.evaluate(values, false);
    const { weights, groupSize } = this;
    const pair = new Float64Array(2);
    for (let i = 0; i < weights.length; i++) {
      const weight = weights[i]!;
      if (weight > 0) this.residualAt(i, z, pair);
      else pair.fill(0); // whatever stands there, a gross point or 0 Ω
      out[at + groupSize * i] = weight * pair[0]!;
      if (groupSize === 2) out[at + 2 * i + 1] = weight * pair[1]!;
    }
  }

  /** ∂(weighted residual)/∂(scaled parameter k) to out[k·stride + at …]. */
  jacobian(values: ArrayLike<number>, out: Float64Array, stride = this.rows, at = 0): void {
    const { columns } = this.evaluate(values, true);
    const { weights, groupSize } = this;
    columns.forEach(({ re, im }, k) => {
      const start = k * stride + at;
      for (let i = 0; i < weights.length; i++) {
        out[start + groupSize * i] = -weights[i]! * re[i]!;
        if (groupSize === 2) out[start + 2 * i + 1] = -weights[i]! * im[i]!;
      }
    });
  }

  /** Cost, gradient and curvature (lower triangle) with respect to the scaled parameters, set anew. */
  accumulate(values: ArrayLike<number>, loss: Loss, out: NormalSums): void {
    if (this.kernel) {
      this.kernel(values, this.data, this.weights, loss, out);
      return;
    }
    const { z, columns } = this.evaluate(values, true);
    const rows = this.rootWeighted(z, columns, loss, out);
    const p = columns.length;
    const dot = this.groupSize === 2 ? complexDot : realDot;
    for (let k = 0; k < p; k++) {
      out.gradient[k] = -dot(columns[k]!, rows);
      for (let l = 0; l <= k; l++) out.hessian[k * p + l] = dot(columns[k]!, columns[l]!);
    }
  }

  /** Misfit times √weight, the loss's weight included, and the columns likewise; sets the cost. */
  private rootWeighted(z: ComplexArray, columns: readonly ComplexArray[], loss: Loss, out: NormalSums): ComplexArray {
    const { weights } = this;
    const rows = complexArray(weights.length);
    const roots = new Float64Array(weights.length);
    const squareScale = loss.scale * loss.scale;
    const pair = new Float64Array(2);
    let cost = 0;
    for (let i = 0; i < weights.length; i++) {
      const weight = weights[i]!;
      if (weight === 0) continue;
      this.residualAt(i, z, pair);
      const square = weight * weight * (pair[0]! * pair[0]! + pair[1]! * pair[1]!);
      cost += 0.5 * squareScale * lossValue(loss.kind, square / squareScale);
      const root = weight * Math.sqrt(lossWeight(loss.kind, square / squareScale));
      roots[i] = root;
      rows.re[i] = root * pair[0]!;
      rows.im[i] = root * pair[1]!;
    }
    out.cost = cost;
    for (const { re, im } of columns) {
      for (let i = 0; i < roots.length; i++) {
        re[i]! *= roots[i]!;
        im[i]! *= roots[i]!;
      }
    }
    return rows;
  }

  /** [ln|Z/Zmodel|, arg(Z/Zmodel)]; the second is 0 where there is no phase. */
  private residualAt(i: number, z: ComplexArray, pair: Float64Array): void {
    const { data } = this;
    pair[0] = data.logMagnitude[i]! - 0.5 * Math.log(z.re[i]! * z.re[i]! + z.im[i]! * z.im[i]!);
    if (this.groupSize === 1) return;
    const turn = data.phaseRad[i]! - Math.atan2(z.im[i]!, z.re[i]!);
    pair[1] = turn - 2 * Math.PI * Math.round(turn / (2 * Math.PI));
  }
}

/** Re Σ conj(a)·b. */
function complexDot(a: ComplexArray, b: ComplexArray): number {
  const { re, im } = a;
  const { re: bRe, im: bIm } = b;
  let sum = 0;
  for (let i = 0; i < re.length; i++) sum += re[i]! * bRe[i]! + im[i]! * bIm[i]!;
  return sum;
}

function realDot({ re }: ComplexArray, { re: bRe }: ComplexArray): number {
  let sum = 0;
  for (let i = 0; i < re.length; i++) sum += re[i]! * bRe[i]!;
  return sum;
}

/** ρ of every point, unweighted: the misfit to plot, shape (n). */
export function logMisfit(model: DriverModel, values: ArrayLike<number>, data: SweepData): ComplexArray {
  const term = new SweepTerm(model, data, new Float64Array(data.re.length).fill(1));
  const rows = new Float64Array(term.rows);
  term.residual(values, rows);
  if (!data.hasPhase) return { re: rows, im: new Float64Array(rows.length) };
  return { re: rows.filter((_, i) => i % 2 === 0), im: rows.filter((_, i) => i % 2 === 1) };
}
