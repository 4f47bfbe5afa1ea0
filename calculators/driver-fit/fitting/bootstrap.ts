import type { SweepData } from '../../acoustics/sweep-term.js';
import type { RunContext } from '../../kit/calculator.js';
import { leastSquares } from '../../numerics/least-squares.js';
import { type RandomSource, seededRandom } from '../../numerics/random.js';
import { quantile, standardDeviation } from '../../numerics/statistics.js';
import { figureValues } from '../derive/derived-figures.js';
import { NO_SHIFTS, numbersOf } from '../derive/driver-numbers.js';
import { EXTERNAL_CAUSES, type Externals, externalUncertainty } from '../derive/externals.js';
import { misfitOf, type Outcome } from './analysis.js';
import type { BandResult } from './bands.js';
import { withoutHeld } from './candidates.js';
import { type FitSweep, type JointSetup, jointProblem } from './joint-fit.js';

/** Spread and 95 % ends of a figure over the refits. */
export interface Resampled {
  readonly uncertainty: number;
  readonly low: number;
  readonly high: number;
}
export interface BootstrapJob {
  readonly refits: number;
  readonly externals: Externals;
  readonly context: RunContext;
}

const LEAST_REFITS = 20; // fewer give no spread worth the name

/**
 * Residual bootstrap of the chosen model: the misfit, in blocks as long as its correlation, is dealt out anew along the
 * fitted curves; masses, DC resistance, diameter, volume and air are drawn from their own uncertainties; all is fitted
 * again. Source: B. Efron, R. J. Tibshirani, "An Introduction to the Bootstrap" (1993), chapters 8 and 9 (from memory).
 * The same seed gives the same digits.
 */
export function bootstrapped(band: BandResult, { refits, externals, context }: BootstrapJob): Map<string, Resampled> {
  const { analysis, models } = band;
  const [outcome] = analysis.outcomes;
  const random = seededRandom(context.seed);
  const heaviest = Math.max(...analysis.setup.sweeps.map(({ measured }) => measured.massKg));
  const shares = models[0].propagated.shares;
  const draws = new Map<string, number[]>();
  for (let i = 0; i < refits; i += 1) {
    context.progress(i, refits, 'Resampling');
    context.checkpoint();
    const setup = dealtAnew(
      analysis.setup,
      outcome,
      analysis.structures.map((s) => s.pointsPerEffective),
      random,
    );
    const refitted = refit(outcome, setup, context);
    const shifts = { ...NO_SHIFTS };
    for (const cause of EXTERNAL_CAUSES) shifts[cause] = externalUncertainty(externals, cause) * random.normal();
    const functions = numbersOf(refitted, externals, heaviest > 0 ? heaviest : null);
    const numbers = functions.numbers(refitted.fit.values, shifts, shares);
    const values = figureValues(numbers, band.context, models[0].propagated.extremes);
    for (const [id, value] of Object.entries(values)) {
      if (typeof value !== 'number' || !Number.isFinite(value)) continue;
      const list = draws.get(id) ?? [];
      list.push(value);
      draws.set(id, list);
    }
  }
  return summarised(draws);
}

function refit({ choice, fit }: Outcome, setup: JointSetup, context: RunContext): Outcome {
  const problem = jointProblem(choice, setup);
  const refitted = leastSquares(problem, withoutHeld(problem, fit.values), {
    relativeOffset: 1e-2,
    maxIterations: 40,
    covariance: false,
    absoluteSigma: true,
    checkpoint: () => context.checkpoint(),
  });
  return { choice, weight: 1, problem, fit: refitted };
}

function dealtAnew(setup: JointSetup, outcome: Outcome, blocks: readonly number[], random: RandomSource): JointSetup {
  const sweeps = setup.sweeps.map((sweep, place): FitSweep => {
    const misfit = misfitOf(sweep, place, outcome);
    const { massKg, massUncertaintyKg } = sweep.measured;
    return {
      ...sweep,
      rows: { ...sweep.rows, data: dealtData(sweep, misfit, Math.ceil(2 * (blocks[place] ?? 1) - 1), random) },
      measured: { ...sweep.measured, massKg: massKg > 0 ? massKg + massUncertaintyKg * random.normal() : 0 },
    };
  });
  const priors = setup.priors.map((prior) => ({ ...prior, value: prior.value + prior.uncertainty * random.normal() }));
  return { ...setup, sweeps, priors };
}

function dealtData(
  { rows: { data, counts } }: FitSweep,
  misfit: { readonly re: Float64Array; readonly im: Float64Array },
  block: number,
  random: RandomSource,
): SweepData {
  const used = Array.from(counts.keys()).filter((row) => (counts[row] ?? 0) > 0);
  const logMagnitude = data.logMagnitude.slice();
  const phaseRad = data.phaseRad.slice();
  for (let i = 0; i < used.length; i += block) {
    const from = random.below(Math.max(1, used.length - block + 1));
    for (let k = 0; k < block && i + k < used.length; k += 1) {
      const to = used[i + k] ?? 0;
      const source = used[Math.min(from + k, used.length - 1)] ?? 0;
      const scale = Math.sqrt((counts[source] ?? 1) / (counts[to] ?? 1)); // averaged rows are quieter
      logMagnitude[to] = (data.logMagnitude[to] ?? 0) - (misfit.re[to] ?? 0) + scale * (misfit.re[source] ?? 0);
      phaseRad[to] = (data.phaseRad[to] ?? 0) - (misfit.im[to] ?? 0) + scale * (misfit.im[source] ?? 0);
    }
  }
  const part = (turn: (phase: number) => number): Float64Array =>
    logMagnitude.map((ln, i) => Math.exp(ln) * turn(phaseRad[i] ?? 0));
  return { ...data, logMagnitude, phaseRad, re: part(Math.cos), im: part(Math.sin) };
}

function summarised(draws: ReadonlyMap<string, readonly number[]>): Map<string, Resampled> {
  const summary = new Map<string, Resampled>();
  for (const [id, values] of draws) {
    if (values.length < LEAST_REFITS) continue;
    const [low, high] = [quantile(values, 0.025), quantile(values, 0.975)];
    summary.set(id, { uncertainty: standardDeviation(values), low, high });
  }
  return summary;
}
