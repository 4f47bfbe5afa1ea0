import type { TriangularFactor } from './damped-step.js';
import { type DifferenceOrder, differenceJacobian } from './differences.js';
import { factorise } from './householder.js';
import type { LeastSquaresProblem, NormalSums, ResidualBlock } from './least-squares-problem.js';
import { type Loss, lossValue, lossWeight } from './losses.js';

/** Cost and derivatives of a problem, one way or the other: in one fused pass, or from residual and Jacobian. */
export interface Evaluation {
  readonly sums: NormalSums;
  readonly factor: TriangularFactor | null;
  evaluations: number;
  /** Cost at the values (NaN where the model fails). What it computed on the way becomes current by `adopt`. */
  tryAt(values: Float64Array): number;
  /** Makes the last trial the current point and brings the derivatives up to date. */
  adopt(values: Float64Array): void;
  /** Changes to more exact derivatives; false when they are as exact as they get. */
  sharpen(values: Float64Array): boolean;
  /** Jacobian with √weight applied, column-major (n, p), where there is one. */
  weightedJacobian(): Float64Array | null;
}

export function newSums(p: number): NormalSums {
  return { cost: Number.NaN, gradient: new Float64Array(p), hessian: new Float64Array(p * p) };
}

/** For problems with a fused `normal` pass: the trial's sums become current by exchanging two buffers. */
export class FusedEvaluation implements Evaluation {
  sums: NormalSums;
  readonly factor = null;
  evaluations = 0;
  private spare: NormalSums;

  constructor(
    private readonly normal: NonNullable<LeastSquaresProblem['normal']>,
    p: number,
    private readonly loss: Loss,
  ) {
    this.sums = newSums(p);
    this.spare = newSums(p);
  }
  tryAt(values: Float64Array): number {
    this.evaluations++;
    this.normal(values, this.loss, this.spare);
    return this.spare.cost;
  }
  adopt(): void {
    const previous = this.sums;
    this.sums = this.spare;
    this.spare = previous;
  }
  sharpen(): boolean {
    return false;
  }
  weightedJacobian(): null {
    return null;
  }
}

/** For problems that give a residual, and perhaps a Jacobian. */
export class ResidualEvaluation implements Evaluation {
  readonly sums: NormalSums;
  readonly factor: TriangularFactor;
  evaluations = 0;
  private readonly residual: Float64Array;
  private readonly jacobian: Float64Array;
  private readonly work: Float64Array;
  private readonly rotated: Float64Array;
  private readonly rootWeights: Float64Array;
  private order: DifferenceOrder = 1;

  constructor(
    private readonly problem: LeastSquaresProblem,
    private readonly loss: Loss,
  ) {
    const n = problem.residualCount;
    const p = problem.parameters.length;
    this.sums = newSums(p);
    this.factor = { r: new Float64Array(p * p), z: new Float64Array(p) };
    this.residual = new Float64Array(n);
    this.jacobian = new Float64Array(n * p);
    this.work = new Float64Array(Math.max(n, p) * p);
    this.rotated = new Float64Array(Math.max(n, p));
    this.rootWeights = new Float64Array(n).fill(1);
  }

  tryAt(values: Float64Array): number {
    this.evaluations++;
    this.problem.residual(values, this.rotated);
    return costOf(this.rotated, blocksOf(this.problem), this.loss, null);
  }

  adopt(values: Float64Array): void {
    this.residual.set(this.rotated.subarray(0, this.residual.length));
    this.sums.cost = costOf(this.residual, blocksOf(this.problem), this.loss, this.rootWeights);
    this.differentiate(values);
    this.accumulate();
  }

  sharpen(values: Float64Array): boolean {
    if (this.problem.jacobian || this.order === 4) return false;
    this.order = this.order === 1 ? 2 : 4;
    this.differentiate(values);
    this.accumulate();
    return true;
  }

  weightedJacobian(): Float64Array {
    return this.jacobian;
  }

  private differentiate(values: Float64Array): void {
    if (this.problem.jacobian) this.problem.jacobian(values, this.jacobian);
    else this.evaluations += differenceJacobian(this.problem, values, this.residual, this.order, this.jacobian);
    const n = this.residual.length;
    if (this.loss.kind === 'linear') return;
    for (let i = 0; i < this.jacobian.length; i++) this.jacobian[i]! *= this.rootWeights[i % n]!;
  }

  private accumulate(): void {
    const { jacobian, residual, rootWeights, rotated, work, factor, sums } = this;
    const n = residual.length;
    const p = this.problem.parameters.length;
    const rows = Math.max(n, p);
    for (let i = 0; i < rows; i++) rotated[i] = i < n ? residual[i]! * rootWeights[i]! : 0;
    for (let k = 0; k < p; k++) {
      const a = jacobian.subarray(k * n, k * n + n);
      let slope = 0;
      for (let i = 0; i < n; i++) slope += a[i]! * rotated[i]!;
      sums.gradient[k] = slope;
      for (let l = 0; l <= k; l++) {
        let dot = 0;
        for (let i = 0; i < n; i++) dot += a[i]! * jacobian[l * n + i]!;
        sums.hessian[k * p + l] = dot;
      }
      work.fill(0, k * rows, (k + 1) * rows);
      work.set(a, k * rows);
    }
    factorise(work, rows, p, rotated, false);
    for (let k = 0; k < p; k++) {
      factor.z[k] = rotated[k]!;
      for (let i = 0; i < p; i++) factor.r[k * p + i] = i <= k ? work[k * rows + i]! : 0;
    }
  }
}

export function blocksOf(problem: LeastSquaresProblem): readonly ResidualBlock[] {
  return problem.blocks ?? [{ rows: problem.residualCount, groupSize: 1, robust: true }];
}

/** ½ C² Σ ρ(|r|²/C²); √ρ′ of every row goes to `rootWeights` where given. */
function costOf(
  residual: Float64Array,
  blocks: readonly ResidualBlock[],
  loss: Loss,
  rootWeights: Float64Array | null,
): number {
  const squareScale = loss.scale * loss.scale;
  let cost = 0;
  let row = 0;
  for (const { rows, groupSize, robust } of blocks) {
    const kind = robust ? loss.kind : 'linear';
    const end = row + rows;
    for (; row < end; row += groupSize) {
      const first = residual[row]!;
      const second = groupSize === 2 ? residual[row + 1]! : 0;
      const z = (first * first + second * second) / squareScale;
      cost += 0.5 * squareScale * lossValue(kind, z);
      if (!rootWeights) continue;
      const root = Math.sqrt(lossWeight(kind, z));
      rootWeights[row] = root;
      if (groupSize === 2) rootWeights[row + 1] = root;
    }
  }
  return cost;
}
