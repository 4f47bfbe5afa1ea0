import { choleskyInPlace, choleskySolve } from './cholesky.js';
import { backSubstitute, factorise } from './householder.js';
import type { NormalSums } from './least-squares-problem.js';

/** R of J = QR and z = Qᵀr, where the Jacobian itself is at hand; column-major (p, p). */
export interface TriangularFactor {
  readonly r: Float64Array;
  readonly z: Float64Array;
}

/**
 * The damped step of Levenberg and Marquardt inside a box: minimises gᵀδ + ½δᵀHδ + ½λδᵀDδ, D = diag(damping).
 * Every component that would leave the box [low, high] is held at its own limit and the others are solved again, so
 * that one parameter at a limit never shortens the step of the others.
 * With a triangular factor the step comes from QR of [R; √(λD)], which does not square the condition number.
 */
export class DampedStep {
  private readonly matrix: Float64Array;
  private readonly vector: Float64Array;
  private readonly scale: Float64Array;
  private readonly solution: Float64Array;
  private readonly free: Int32Array;
  private readonly held: Uint8Array;

  constructor(private readonly p: number) {
    this.matrix = new Float64Array(2 * p * p);
    this.vector = new Float64Array(2 * p);
    this.scale = new Float64Array(p);
    this.solution = new Float64Array(p);
    this.free = new Int32Array(p);
    this.held = new Uint8Array(p);
  }

  /** Writes δ to `step` and returns the predicted decrease of the undamped quadratic model; NaN if singular. */
  solve(
    sums: NormalSums,
    factor: TriangularFactor | null,
    active: Uint8Array, // 1: may move
    lambda: number,
    damping: Float64Array,
    low: Float64Array,
    high: Float64Array,
    step: Float64Array,
  ): number {
    const { p, held, free } = this;
    for (let k = 0; k < p; k++) {
      held[k] = active[k] ? 0 : 1;
      step[k] = 0;
    }
    for (let pass = 0; pass <= p; pass++) {
      let count = 0;
      for (let k = 0; k < p; k++) if (!held[k]) free[count++] = k;
      if (count === 0) break;
      const solved = factor
        ? this.byFactor(factor, count, lambda, damping, step)
        : this.byNormal(sums, count, lambda, damping, step);
      if (!solved) return Number.NaN;
      if (!this.holdThoseOutside(count, low, high, step)) break;
    }
    return predictedDecrease(sums, step, p);
  }

  /** Takes over the solution; true when some component had to be held at its limit. */
  private holdThoseOutside(count: number, low: Float64Array, high: Float64Array, step: Float64Array): boolean {
    let anyOutside = false;
    for (let i = 0; i < count; i++) {
      const k = this.free[i]!;
      const wanted = this.solution[i]!;
      step[k] = wanted;
      if (wanted >= low[k]! && wanted <= high[k]!) continue;
      step[k] = wanted < low[k]! ? low[k]! : high[k]!;
      this.held[k] = 1;
      anyOutside = true;
    }
    return anyOutside;
  }

  private byNormal(
    sums: NormalSums,
    count: number,
    lambda: number,
    damping: Float64Array,
    step: Float64Array,
  ): boolean {
    const { p, matrix, vector, free, held } = this;
    const { hessian, gradient } = sums;
    for (let i = 0; i < count; i++) {
      const k = free[i]!;
      let right = -gradient[k]!;
      for (let l = 0; l < p; l++) if (held[l]) right -= symmetric(hessian, p, k, l) * step[l]!;
      vector[i] = right;
      for (let j = 0; j <= i; j++) matrix[i * count + j] = hessian[k * p + free[j]!]!;
      matrix[i * count + i]! += lambda * damping[k]!;
    }
    if (!choleskyInPlace(matrix, count, this.scale, 1e-15)) return false;
    choleskySolve(matrix, count, this.scale, vector, this.solution);
    return true;
  }

  private byFactor(
    { r, z }: TriangularFactor,
    count: number,
    lambda: number,
    damping: Float64Array,
    step: Float64Array,
  ): boolean {
    const { p, matrix, vector, free, held } = this;
    const rows = p + count;
    matrix.fill(0);
    vector.fill(0);
    for (let i = 0; i < p; i++) vector[i] = -z[i]!;
    for (let l = 0; l < p; l++) {
      if (!held[l] || step[l] === 0) continue;
      for (let i = 0; i < p; i++) vector[i]! -= r[l * p + i]! * step[l]!;
    }
    for (let j = 0; j < count; j++) {
      const k = free[j]!;
      for (let i = 0; i < p; i++) matrix[j * rows + i] = r[k * p + i]!;
      matrix[j * rows + p + j] = Math.sqrt(lambda * damping[k]!);
    }
    factorise(matrix, rows, count, vector, false);
    for (let j = 0; j < count; j++) {
      const diagonal = Math.abs(matrix[j * rows + j]!);
      if (!(diagonal > 1e-15 * Math.sqrt(damping[free[j]!]!))) return false;
    }
    backSubstitute(matrix, rows, count, vector, this.solution);
    return true;
  }
}

function symmetric(h: Float64Array, p: number, i: number, j: number): number {
  return j <= i ? h[i * p + j]! : h[j * p + i]!;
}

/** −(gᵀδ + ½δᵀHδ). */
function predictedDecrease({ gradient, hessian }: NormalSums, step: Float64Array, p: number): number {
  let total = 0;
  for (let i = 0; i < p; i++) {
    const row = i * p;
    let half = 0.5 * hessian[row + i]! * step[i]!;
    for (let j = 0; j < i; j++) half += hessian[row + j]! * step[j]!;
    total -= step[i]! * (gradient[i]! + half);
  }
  return total;
}
