import { FREE_AIR } from '../../acoustics/driver-impedance.js';
import type { JointDriverProblem, PriorKnowledge } from '../../acoustics/joint-driver-problem.js';
import { logMisfit } from '../../acoustics/sweep-term.js';
import type { RunContext } from '../../kit/calculator.js';
import type { LeastSquaresFit } from '../../numerics/least-squares-problem.js';
import type { Measured } from '../measured.js';
import type { DriverFitSettings } from '../settings.js';
import {
  type Candidate,
  FILE_ROUNDING,
  type ModelChoice,
  modelChoices,
  modelName,
  type Ranked,
  ranked,
} from './candidates.js';
import {
  type FitOptions,
  type FreeAirModels,
  freeAirModels,
  LEAST_EFFECTIVE,
  type LeftBehind,
  loadedFit,
} from './free-air-models.js';
import { type FitSweep, finalFit, type JointSetup, type JointShape, jointCandidate, valuesById } from './joint-fit.js';
import { jointShape } from './load-checks.js';
import { type ResidualStructure, structureOfRows } from './residual-structure.js';
import { exchangedFits, type SeriesVerdict, seriesVerdict } from './series.js';
import type { SingleFit } from './single-fit.js';

/** One model's last word: fitted jointly, with covariance in units of the noise. */
export interface Outcome {
  readonly choice: ModelChoice;
  readonly weight: number; // of all models that could be, 1 in total
  readonly problem: JointDriverProblem;
  readonly fit: LeastSquaresFit;
}
export interface Analysis {
  readonly setup: JointSetup; // the sweeps in use, in their true roles; free air first
  readonly ranking: readonly Ranked<Candidate<JointDriverProblem>>[];
  readonly effectiveRows: number;
  readonly behind: readonly LeftBehind[]; // models dropped after the free-air sweep
  readonly outcomes: readonly [Outcome, ...Outcome[]]; // the chosen model first
  readonly structures: readonly ResidualStructure[]; // by sweep
  readonly verdict: SeriesVerdict;
  readonly singles: readonly SingleFit[]; // every sweep, in the roles in use
}
interface Job {
  readonly settings: DriverFitSettings;
  readonly options: FitOptions;
  readonly priors: readonly PriorKnowledge[];
}

const LEAST_WEIGHT = 1e-3; // lighter models move no figure

/** From sweeps with a resonance in each, free air first, to fitted models. */
export function analyse(measured: readonly Measured[], settings: DriverFitSettings, context: RunContext): Analysis {
  const options: FitOptions = { choices: modelChoices(settings), robust: settings.robust, context };
  const job: Job = { settings, options, priors: resistancePrior(settings) };
  const [free, ...loaded] = measured;
  if (!free) throw new Error('driver-fit was asked to analyse no sweep');
  const models = freeAirModels(free, options);
  const singles = [models.best, ...loaded.map((sweep) => loadedFit(sweep, models.best, options))];
  const verdict = seriesVerdict(singles, measured.map(declaredOf));
  const { exchanged } = verdict;
  if (exchanged?.includes(0)) {
    const righted = exchangedFits(singles, exchanged).map((fit, i) => inRoleOf(fit.measured, measured[i] ?? free));
    return { ...analyse(righted, settings, context), verdict };
  }
  const righted = exchanged ? inDeclaredRoles(exchangedFits(singles, exchanged), measured) : singles;
  const doubtful = verdict.isNamedSurely ? righted : withDoubtfulMasses(righted, verdict.inconsistent);
  const used = doubtful.filter((_, i) => !(verdict.isNamedSurely && verdict.inconsistent.includes(i)));
  return { ...fitTogether(used, models, job), verdict, singles: righted };
}

const declaredOf = ({ massKg, massUncertaintyKg, role }: Measured) => ({
  massKg,
  massUncertaintyKg,
  isBox: role === 'known-volume',
});

/** The sweep as if it had been added in the other one's place. */
function inRoleOf(sweep: Measured, place: Measured): Measured {
  const { role, massKg, massUncertaintyKg, volumeM3, volumeUncertaintyM3 } = place;
  return { ...sweep, role, massKg, massUncertaintyKg, volumeM3, volumeUncertaintyM3 };
}

function inDeclaredRoles(fits: readonly SingleFit[], measured: readonly Measured[]): SingleFit[] {
  return fits.map((fit, i) => ({ ...fit, measured: inRoleOf(fit.measured, measured[i] ?? fit.measured) }));
}

/**
 * Where the masses contradict each other and nobody can tell which is wrong, each is as uncertain as they are apart: the
 * range of Mms = m/((fs/fm)² − 1) over its mean.
 */
function withDoubtfulMasses(fits: readonly SingleFit[], places: readonly number[]): SingleFit[] {
  const [free] = fits;
  const masses = fits.map(({ measured, fsHz }) => measured.massKg / (((free?.fsHz ?? fsHz) / fsHz) ** 2 - 1));
  const told = masses.filter((mass, i) => places.includes(i) && mass > 0 && Number.isFinite(mass));
  if (told.length < 2) return [...fits];
  const range = (Math.max(...told) - Math.min(...told)) / (told.reduce((a, b) => a + b, 0) / told.length);
  return fits.map((fit, i) => {
    const massUncertaintyKg = Math.max(fit.measured.massUncertaintyKg, range * fit.measured.massKg);
    return places.includes(i) ? { ...fit, measured: { ...fit.measured, massUncertaintyKg } } : fit;
  });
}

/** A DC resistance measured apart is knowledge of Re; without an uncertainty it counts as exact to 0.01 %. */
function resistancePrior({ dcResistance, dcResistanceUncertainty }: DriverFitSettings): PriorKnowledge[] {
  if (dcResistance === undefined) return [];
  const uncertainty = Math.max(dcResistanceUncertainty ?? 0, 1e-4 * dcResistance);
  return [{ id: 'Re', value: dcResistance, uncertainty }];
}

function fitTogether(
  singles: readonly SingleFit[],
  freeAir: FreeAirModels,
  { settings, options, priors }: Job,
): Omit<Analysis, 'verdict' | 'singles'> {
  const { context } = options;
  const behind = new Set(freeAir.behind.map(({ choice }) => modelName(choice)));
  const choices = options.choices.filter((choice) => !behind.has(modelName(choice)));
  const checkpoint = (): void => context.checkpoint();
  const sweeps = singles.map(
    (alone): FitSweep => ({ measured: alone.measured, rows: alone.rows, noise: alone.noise, alone, misfitSquares: 0 }),
  );
  const plain: JointShape = { boxKind: 'sealed', isBoxMassFree: false, hasOwnRe: singles.map(() => false) };
  const leader = singles[0]?.choice ?? choices[0];
  const valuesOf = (choice: ModelChoice) => freeAir.values.get(modelName(choice)) ?? {};
  const shape = leader
    ? jointShape(leader, { sweeps, shape: plain, priors }, valuesOf(leader), settings, checkpoint)
    : plain;
  const setup: JointSetup = { sweeps, shape, priors };
  const candidates = choices.map((choice, i) => {
    context.progress(choices.length + i, 2 * choices.length, modelName(choice));
    context.checkpoint();
    return jointCandidate(choice, setup, valuesOf(choice), checkpoint);
  });
  const rows = candidates[0]?.problem.activeCount ?? 1;
  const rounding = sweeps.reduce((sum, sweep) => sum + rowsOf(sweep) * (FILE_ROUNDING / sweep.noise) ** 2, 0);
  const first = ranked(candidates, rows, rounding)[0];
  if (!first) throw new Error('driver-fit has no model to try');
  const structures = sweeps.map((sweep, i) => structureOf(sweep, i, first.candidate));
  const effectiveRows = effectiveCount(sweeps, structures);
  const ranking = ranked(candidates, effectiveRows, rounding);
  const judged = sweeps.map((sweep, i) => withNoise(sweep, i, first.candidate, structures[i]));
  const finalSetup = { ...setup, sweeps: judged };
  const outcomes = ranking
    .filter(({ weight }, i) => i === 0 || weight > LEAST_WEIGHT)
    .map(({ candidate, weight }): Outcome => {
      const start = valuesById(candidate.problem, candidate.fit);
      return { choice: candidate, weight, ...finalFit(candidate, finalSetup, start, checkpoint) };
    });
  const [chosen, ...others] = outcomes;
  if (!chosen) throw new Error('driver-fit has no model to try');
  return {
    setup: finalSetup,
    ranking,
    effectiveRows,
    behind: freeAir.behind,
    outcomes: [chosen, ...others],
    structures,
  };
}

/** ρ of one sweep of a joint fit, over its rows. */
export function misfitOf(
  sweep: FitSweep,
  place: number,
  { problem, fit }: { problem: JointDriverProblem; fit: LeastSquaresFit },
) {
  const model = problem.terms[place]?.model ?? { coil: 'inductor', suspension: 'constant', load: FREE_AIR };
  return logMisfit(model, problem.localValues(place, fit.values), sweep.rows.data);
}

function structureOf(sweep: FitSweep, place: number, candidate: Candidate<JointDriverProblem>): ResidualStructure {
  return structureOfRows(sweep.rows, misfitOf(sweep, place, candidate), sweep.alone.fit.values.length);
}

const rowsOf = ({ rows }: FitSweep): number =>
  (rows.data.hasPhase ? 2 : 1) * rows.counts.reduce((count, points) => count + (points > 0 ? 1 : 0), 0);

function effectiveCount(sweeps: readonly FitSweep[], structures: readonly ResidualStructure[]): number {
  const total = sweeps.reduce((sum, sweep, i) => sum + rowsOf(sweep) / (structures[i]?.pointsPerEffective ?? 1), 0);
  return Math.max(total, LEAST_EFFECTIVE);
}

/** With σ of one component of one point as this model leaves it, stretched by √τ where the misfit is correlated. */
function withNoise(
  sweep: FitSweep,
  place: number,
  candidate: Candidate<JointDriverProblem>,
  structure: ResidualStructure | undefined,
): FitSweep {
  const { re, im } = misfitOf(sweep, place, candidate);
  const { counts } = sweep.rows;
  const squares = counts.reduce((sum, count, i) => sum + count * ((re[i] ?? 0) ** 2 + (im[i] ?? 0) ** 2), 0);
  const rows = rowsOf(sweep);
  const share = (candidate.freeParameters * rows) / (candidate.problem.activeCount ?? rows);
  const sigma = Math.sqrt(squares / Math.max(rows - share, 1));
  const noise = Math.max(sigma, 1e-9) * Math.sqrt(structure?.pointsPerEffective ?? 1);
  return { ...sweep, noise, misfitSquares: squares };
}
