import type { FitStatus } from '../../shared/output.js';
import { DampedStep } from './damped-step.js';
import type { FitParameter, LeastSquaresOptions, LeastSquaresProblem } from './least-squares-problem.js';
import type { Evaluation } from './problem-evaluation.js';

const MOST_REFUSALS = 40; // in one iteration
const LOOSE_OFFSET = 1e-3; // Bates and Watts' own limit: the confidence region is known to 0.1 % of its size
const ORTHOGONAL = 1e-6; // cosine
const MOST_POLISHING = 60;
const COST_ROUNDING = 1e-8; // relative; far above the rounding of any sum of squares met in practice
const LOG_STEP = 1.5; // largest change of a logarithm in one iteration: a factor of 4.5
const LINEAR_STEP = 0.25; // and of a plain value, relative to its size or a tenth of its start's

/** The way from the start to the optimum; what stands in `leastSquares` about bounds, steps and stopping happens here. */
export class FitIteration {
  readonly values: Float64Array;
  iterations = 0;
  offset = Number.POSITIVE_INFINITY;
  private readonly p: number;
  private readonly parameters: readonly FitParameter[];
  private readonly startSize: Float64Array;
  private readonly trial: Float64Array;
  private readonly step: Float64Array;
  private readonly low: Float64Array;
  private readonly high: Float64Array;
  private readonly toLower: Float64Array; // distance to the bounds, infinite where there is none
  private readonly toUpper: Float64Array;
  private readonly damping: Float64Array;
  private readonly active: Uint8Array;
  private readonly solver: DampedStep;
  private readonly activeRows: number;
  private readonly goal: number;
  private lambda = 1e-3;
  private growth = 4;

  constructor(
    problem: LeastSquaresProblem,
    private readonly evaluation: Evaluation,
    start: ArrayLike<number>,
    private readonly options: LeastSquaresOptions,
  ) {
    this.parameters = problem.parameters;
    this.p = this.parameters.length;
    this.values = Float64Array.from(start, (value, k) => clampTo(this.parameters[k]!, value));
    this.startSize = this.values.map((value, k) => Math.max(Math.abs(value), 10 * (this.parameters[k]!.typical ?? 0)));
    this.trial = new Float64Array(this.p);
    this.step = new Float64Array(this.p);
    this.low = new Float64Array(this.p);
    this.high = new Float64Array(this.p);
    this.toLower = new Float64Array(this.p).fill(Number.NEGATIVE_INFINITY);
    this.toUpper = new Float64Array(this.p).fill(Number.POSITIVE_INFINITY);
    this.damping = new Float64Array(this.p);
    this.active = new Uint8Array(this.p);
    this.solver = new DampedStep(this.p);
    this.activeRows = problem.activeCount ?? problem.residualCount;
    this.goal = options.relativeOffset ?? 1e-6;
  }

  run(): FitStatus {
    const cost = this.evaluation.tryAt(this.values);
    if (!Number.isFinite(cost)) return 'stalled';
    this.evaluation.adopt(this.values);
    const most = this.options.maxIterations ?? 200;
    for (; ; this.iterations++) {
      this.options.checkpoint?.();
      const arrived = this.hasArrived();
      if (arrived) {
        if (this.evaluation.sharpen(this.values)) continue;
        return this.finalStatus('converged');
      }
      if (this.iterations >= most) return 'iteration-limit';
      if (!this.advance()) {
        if (this.evaluation.sharpen(this.values)) continue;
        this.polish();
        return this.offset < LOOSE_OFFSET || this.isOrthogonal() ? this.finalStatus('converged') : 'stalled';
      }
    }
  }

  /** 1 where a parameter may move: it has influence and does not press against a bound. */
  private chooseActive(): void {
    const { gradient, hessian } = this.evaluation.sums;
    for (let k = 0; k < this.p; k++) {
      const parameter = this.parameters[k]!;
      const value = this.values[k]!;
      const slope = gradient[k]!;
      const pressesLow = parameter.lower !== undefined && value <= parameter.lower && slope > 0;
      const pressesHigh = parameter.upper !== undefined && value >= parameter.upper && slope < 0;
      const curvature = hessian[k * this.p + k]!;
      this.active[k] = parameter.held || pressesLow || pressesHigh || !(curvature > 0) ? 0 : 1;
      this.damping[k] = curvature > 0 ? curvature : 1;
    }
  }

  /**
   * The relative offset: length of the residual's part in the tangent plane (as far as one step may go in it) over the
   * length of the rest, each per degree of freedom. Also arrived where the undamped step is below the rounding of the
   * parameters, or the residual vanishes.
   */
  private hasArrived(): boolean {
    this.chooseActive();
    const { sums, factor } = this.evaluation;
    if (!(sums.cost > 0)) {
      this.offset = 0;
      return true;
    }
    const free = this.active.reduce((total, flag) => total + flag, 0);
    if (free === 0) {
      this.offset = 0;
      return true;
    }
    const { step, solver, damping, low, high } = this;
    this.setBox();
    let decrease = solver.solve(sums, factor, this.active, 0, damping, low, high, step);
    if (!(decrease >= 0)) decrease = solver.solve(sums, factor, this.active, 1e-9, damping, low, high, step);
    if (!(decrease >= 0)) return false;
    const rest = Math.max(2 * sums.cost - 2 * decrease, 0);
    const restDof = Math.max(this.activeRows - free, 1);
    this.offset = Math.sqrt((2 * decrease) / free / (rest / restDof));
    if (this.offset < this.goal) return true;
    for (let k = 0; k < this.p; k++) {
      const size = this.parameters[k]!.logScaled ? 1 : Math.abs(this.values[k]!);
      if (Math.abs(step[k]!) > 64 * Number.EPSILON * size) return false;
    }
    return true;
  }

  /** One accepted step; false when none is found. */
  private advance(): boolean {
    const { evaluation, step, solver } = this;
    for (let refusals = 0; refusals < MOST_REFUSALS; refusals++) {
      const { sums } = evaluation;
      const predicted = solver.solve(
        sums,
        evaluation.factor,
        this.active,
        this.lambda,
        this.damping,
        this.low,
        this.high,
        step,
      );
      if (predicted > 0 && this.moveTrial()) {
        if (predicted < 16 * Number.EPSILON * sums.cost) return false;
        const gained = sums.cost - evaluation.tryAt(this.trial);
        if (gained >= 1e-4 * predicted) {
          this.accept(gained, predicted);
          return true;
        }
      }
      this.lambda = Math.max(this.lambda, 1e-6) * this.growth;
      this.growth *= 2;
    }
    return false;
  }

  /**
   * Close to the end the cost no longer tells a better point from a worse one: its rounding is larger than what is left
   * to gain. The gradient still does, so undamped steps go on while each shortens the offset.
   */
  private polish(): void {
    const { evaluation, step } = this;
    for (let round = 0; round < MOST_POLISHING && this.offset < LOOSE_OFFSET; round++) {
      const previous = { offset: this.offset, cost: evaluation.sums.cost, values: this.values.slice() };
      const { sums, factor } = evaluation;
      this.solver.solve(sums, factor, this.active, 0, this.damping, this.low, this.high, step);
      if (!step.every(Number.isFinite) || !this.moveTrial()) return;
      const cost = evaluation.tryAt(this.trial);
      if (!(Math.abs(cost - previous.cost) <= COST_ROUNDING * previous.cost)) return;
      this.values.set(this.trial);
      evaluation.adopt(this.values);
      this.iterations++;
      if (this.hasArrived()) return;
      if (this.offset < 0.95 * previous.offset) continue;
      if (this.offset > previous.offset) this.returnTo(previous.values);
      return;
    }
  }

  private returnTo(values: Float64Array): void {
    this.values.set(values);
    this.evaluation.tryAt(this.values);
    this.evaluation.adopt(this.values);
    this.hasArrived();
  }

  private accept(gained: number, predicted: number): void {
    const ratio = gained / predicted;
    if (ratio > 0.75) this.lambda = this.lambda < 1e-14 ? 0 : this.lambda * 0.1;
    else if (ratio < 0.25) this.lambda = Math.max(this.lambda, 1e-6) * 4;
    this.growth = 4;
    this.values.set(this.trial);
    this.evaluation.adopt(this.values);
  }

  /** Limits of each component: the bounds, and the largest step of its own. */
  private setBox(): void {
    for (let k = 0; k < this.p; k++) {
      const { held, lower, upper, logScaled, maxStep } = this.parameters[k]!;
      if (held) continue;
      const value = this.values[k]!;
      const most = maxStep ?? (logScaled ? LOG_STEP : this.linearStep(k));
      if (lower !== undefined) this.toLower[k] = logScaled ? Math.log(lower / value) : lower - value;
      if (upper !== undefined) this.toUpper[k] = logScaled ? Math.log(upper / value) : upper - value;
      this.low[k] = Math.max(-most, this.toLower[k]!);
      this.high[k] = Math.min(most, this.toUpper[k]!);
    }
  }

  /** Unbounded for a parameter that starts at 0 and does not say how large it typically is. */
  private linearStep(k: number): number {
    const size = Math.max(Math.abs(this.values[k]!), 0.1 * this.startSize[k]!);
    return this.startSize[k]! > 0 ? LINEAR_STEP * size : Number.POSITIVE_INFINITY;
  }

  /** Values after the step, exactly on a bound that it reaches; false when nothing moved. */
  private moveTrial(): boolean {
    let moved = false;
    for (let k = 0; k < this.p; k++) {
      const parameter = this.parameters[k]!;
      const value = this.values[k]!;
      const delta = this.step[k]!;
      let next = parameter.logScaled ? value * Math.exp(delta) : value + delta;
      if (parameter.held) next = value;
      else if (delta <= this.toLower[k]!) next = parameter.lower!;
      else if (delta >= this.toUpper[k]!) next = parameter.upper!;
      this.trial[k] = clampTo(parameter, next);
      if (this.trial[k] !== value) moved = true;
    }
    return moved;
  }

  /** The residual is at right angles to every column: nothing to gain, even where the columns depend on each other. */
  private isOrthogonal(): boolean {
    const { gradient, hessian, cost } = this.evaluation.sums;
    for (let k = 0; k < this.p; k++) {
      const limit = ORTHOGONAL * Math.sqrt(2 * cost * hessian[k * this.p + k]!);
      if (this.active[k] && !(Math.abs(gradient[k]!) <= limit)) return false;
    }
    return true;
  }

  private finalStatus(status: FitStatus): FitStatus {
    return this.resting().length > 0 ? 'at-bound' : status;
  }

  /** Parameters that rest on a bound. */
  resting(): number[] {
    const found: number[] = [];
    this.parameters.forEach(({ held, lower, upper }, k) => {
      if (held) return;
      const value = this.values[k]!;
      if ((lower !== undefined && value <= lower) || (upper !== undefined && value >= upper)) found.push(k);
    });
    return found;
  }
}

function clampTo({ held, lower, upper }: FitParameter, value: number): number {
  if (held) return value;
  if (lower !== undefined && value < lower) return lower;
  if (upper !== undefined && value > upper) return upper;
  return value;
}
