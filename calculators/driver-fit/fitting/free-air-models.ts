import { FREE_AIR } from '../../acoustics/driver-impedance.js';
import { driverSweepProblem } from '../../acoustics/driver-sweep-problem.js';
import type { SuspensionModel } from '../../acoustics/suspension.js';
import type { RunContext } from '../../kit/calculator.js';
import type { Measured } from '../measured.js';
import {
  type Candidate,
  FILE_ROUNDING,
  fitCandidate,
  type ModelChoice,
  modelName,
  ranked,
  withinReach,
} from './candidates.js';
import { type FittedCurve, fitRows } from './fit-rows.js';
import { type RoughFit, roughFit } from './rough-fit.js';
import { type SingleFit, singleFit } from './single-fit.js';

/** The free-air sweep under every model that the settings leave open. */
export interface FreeAirModels {
  readonly best: SingleFit;
  readonly values: ReadonlyMap<string, Readonly<Record<string, number>>>; // by model name, then parameter id
  readonly behind: readonly LeftBehind[];
}
/** A model so far behind the best in free air that no joint fit could bring it back. */
export interface LeftBehind {
  readonly choice: ModelChoice;
  readonly bic: number; // above the best, over the rows that are independent
  readonly squares: number; // Σ|ln(Z/model)|² over the rows
  readonly freeParameters: number;
}
export interface FitOptions {
  readonly choices: readonly ModelChoice[];
  readonly robust: boolean;
  readonly context: RunContext;
}

export const LEAST_EFFECTIVE = 24; // rows that count as independent, however correlated the misfit

const STARTS: Readonly<Record<SuspensionModel, (fsHz: number) => number[]>> = {
  constant: () => [],
  creep: () => [0.05],
  relaxing: (fsHz) => [0.2, 1 / (2 * Math.PI * 0.4 * fsHz)], // in the middle of what rubber and foam do (from trials)
};

/**
 * Every creep law is tried with every coil: without creep in the model the wrong coil can win. All are fitted to the same
 * rows; when the best shows other wild points than the rough curve did, once more to the rows it leaves.
 */
export function freeAirModels(measured: Measured, { choices, robust, context }: FitOptions): FreeAirModels {
  const checkpoint = (): void => context.checkpoint();
  const coils = [...new Set(choices.map(({ coil }) => coil))];
  let rough = roughFit(measured, coils, robust, checkpoint);
  let near: FittedCurve = rough.nearest;
  let known: ReadonlyMap<string, Float64Array> = new Map();
  for (let round = 0; ; round += 1) {
    const candidates = fitAll(measured, rough, near, known, { choices, robust, context });
    known = new Map(candidates.map((candidate) => [modelName(candidate), candidate.fit.values]));
    const rows = candidates[0]?.problem.activeCount ?? 1;
    const leader = ranked(candidates, rows, rows * FILE_ROUNDING ** 2)[0]?.candidate;
    if (!leader) throw new Error('driver-fit has no model to try');
    const best = singleFit(measured, leader, rough, leader.fit.values, { robust, checkpoint });
    const isSettled = round === 1 || best.keep.every((flag, i) => flag === rough.keep[i]);
    if (isSettled) return { best, values: byId(candidates), behind: leftBehind(candidates, best) };
    rough = { ...rough, keep: best.keep, wild: best.wild };
    near = { model: { ...leader, load: FREE_AIR }, values: best.fit.values };
  }
}

const FAR_BEHIND = 60; // of BIC: a weight of 1e-13

function leftBehind(candidates: readonly Candidate[], { structure, rows }: SingleFit): LeftBehind[] {
  const total = (rows.data.hasPhase ? 2 : 1) * rows.counts.filter((count) => count > 0).length;
  const effective = Math.max(total / structure.pointsPerEffective, LEAST_EFFECTIVE);
  const ranking = ranked(candidates, effective, total * FILE_ROUNDING ** 2);
  const least = Math.min(...ranking.map(({ bic }) => bic));
  return ranking
    .filter(({ bic }) => bic > least + FAR_BEHIND)
    .map(({ candidate, bic }) => ({
      choice: candidate,
      bic: bic - least,
      squares: candidate.squares,
      freeParameters: candidate.freeParameters,
    }));
}

function fitAll(
  measured: Measured,
  rough: RoughFit,
  near: FittedCurve,
  known: ReadonlyMap<string, Float64Array>,
  { choices, context }: FitOptions,
): Candidate[] {
  const rows = fitRows(measured.data, rough.keep, near);
  const weights = rows.counts.map(Math.sqrt);
  return choices.map((choice, i) => {
    context.progress(i, choices.length, modelName(choice));
    context.checkpoint();
    const model = { ...choice, load: FREE_AIR };
    const problem = withinReach(driverSweepProblem(model, rows.data, weights), choice, rough.motional.fsHz);
    const start = known.get(modelName(choice)) ?? firstStart(rough, choice, rows.data.grid.omega.at(-1) ?? 1);
    return fitCandidate(choice, problem, start, () => context.checkpoint());
  });
}

function firstStart(
  { coils, motional }: RoughFit,
  { coil, suspension, hasRss }: ModelChoice,
  topOmega: number,
): number[] {
  const [re = 1, fs = 1, qms = 1, qes = 1, ...own] = coils.get(coil) ?? [];
  const ownCoil = hasRss ? withRss(own, 2 * Math.PI * fs, topOmega) : own;
  return [re, fs, qms, qes, ...ownCoil, ...STARTS[suspension](motional.fsHz)];
}

/** Leb Le K Gss: Rss at five times |K√(jω)| at the top of the sweep, Le where it begins to count within the sweep. */
function withRss([leb = 1e-5, le = 1e-3, k = 0.05]: readonly number[], lowOmega: number, topOmega: number): number[] {
  return [leb, Math.min(le, (3 * k) / Math.sqrt(lowOmega)), k, 0.2 / (k * Math.sqrt(topOmega))];
}

function byId(candidates: readonly Candidate[]): Map<string, Record<string, number>> {
  return new Map(
    candidates.map((candidate) => [
      modelName(candidate),
      Object.fromEntries(candidate.problem.parameters.map(({ id }, k) => [id, candidate.fit.values[k] ?? 0])),
    ]),
  );
}

/** A sweep of the same driver under a load, by itself: the driver's own numbers from its curve, the rest from free air. */
export function loadedFit(measured: Measured, free: SingleFit, { robust, context }: FitOptions): SingleFit {
  const checkpoint = (): void => context.checkpoint();
  const rough = roughFit(measured, [free.choice.coil], robust, checkpoint);
  const own = rough.coils.get(free.choice.coil) ?? free.fit.values;
  const start = Float64Array.from(free.fit.values, (value, k) => (k < 4 ? (own[k] ?? value) : value));
  return singleFit(measured, free.choice, rough, start, { robust, checkpoint });
}
