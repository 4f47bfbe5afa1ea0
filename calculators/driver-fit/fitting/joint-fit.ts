import {
  type JointDriverProblem,
  type JointSweep,
  jointDriverProblem,
  type PriorKnowledge,
} from '../../acoustics/joint-driver-problem.js';
import { leastSquares } from '../../numerics/least-squares.js';
import type { LeastSquaresFit } from '../../numerics/least-squares-problem.js';
import type { Measured } from '../measured.js';
import {
  type Candidate,
  fitCandidate,
  type ModelChoice,
  RELAXATION_RANGE,
  withinReach,
  withoutHeld,
} from './candidates.js';
import type { FitRows } from './fit-rows.js';
import type { SingleFit } from './single-fit.js';

/** A sweep of the joint fit. `noise`: σ of one component of one point, stretched where the misfit is correlated. */
export interface FitSweep {
  readonly measured: Measured;
  readonly rows: FitRows;
  readonly noise: number;
  readonly alone: SingleFit;
  readonly misfitSquares: number; // Σ|ln(Z/model)|² over the points, of the model chosen
}
/** How the test box and Re enter: what is free beside the plain joint model. */
export interface JointShape {
  readonly boxKind: 'sealed' | 'leaky';
  readonly isBoxMassFree: boolean;
  readonly hasOwnRe: readonly boolean[]; // by sweep
}
export interface JointSetup {
  readonly sweeps: readonly FitSweep[];
  readonly shape: JointShape;
  readonly priors: readonly PriorKnowledge[];
}

export function jointProblem(choice: ModelChoice, { sweeps, shape, priors }: JointSetup): JointDriverProblem {
  const joint = sweeps.map((sweep, i): JointSweep => {
    const { data, counts } = sweep.rows;
    const { massKg, massUncertaintyKg, role } = sweep.measured;
    return {
      data,
      weights: counts.map((count) => Math.sqrt(count) / sweep.noise),
      ...(role === 'added-mass' ? { addedMass: { massKg, uncertaintyKg: massUncertaintyKg } } : {}),
      ...(role === 'known-volume' ? { box: { kind: shape.boxKind, massFree: shape.isBoxMassFree } } : {}),
      ...(shape.hasOwnRe[i] ? { ownRe: true } : {}),
    };
  });
  const problem = jointDriverProblem(choice.coil, choice.suspension, joint, priors);
  return withinReach(problem, choice, sweeps[0]?.alone.fsHz ?? 1);
}

const USUAL_LEAK_Q = 30;

/** Starting values by parameter id: the driver's from free air, the loads' from what single fits say. */
export function jointStart(
  problem: JointDriverProblem,
  freeAir: Readonly<Record<string, number>>,
  { sweeps }: JointSetup,
): Float64Array {
  const free = sweeps[0]?.alone;
  return Float64Array.from(
    problem.parameters,
    ({ id, lower = Number.NEGATIVE_INFINITY, upper = Number.POSITIVE_INFINITY }) => {
      const [, name = id, place] = /^(Re|mass|alpha|QL|QA|mu)(\d+)$/.exec(id) ?? [];
      const sweep = place ? sweeps[Number(place) - 1] : undefined;
      const value = startOf(name, sweep, free, sweeps) ?? freeAir[id] ?? 1;
      return Math.min(upper, Math.max(lower, value));
    },
  );
}

function startOf(
  name: string,
  sweep: FitSweep | undefined,
  free: SingleFit | undefined,
  sweeps: readonly FitSweep[],
): number | undefined {
  if (name === 'Mms') return movingMassStart(free, sweeps);
  if (!sweep || !free) return undefined;
  switch (name) {
    case 'Re':
      return sweep.alone.reOhm;
    case 'mass':
      return sweep.measured.massKg;
    case 'alpha':
      return Math.max((sweep.alone.fsHz / free.fsHz) ** 2 - 1, 0.01);
    case 'QL':
      return USUAL_LEAK_Q;
    default:
      return 0; // mu: the same mass as in free air
  }
}

/** Mms = m/((fs/fm)² − 1) from the sweep with the heaviest mass. */
function movingMassStart(free: SingleFit | undefined, sweeps: readonly FitSweep[]): number {
  const heaviest = sweeps.reduce((a, b) => (b.measured.massKg > a.measured.massKg ? b : a));
  const ratio = ((free?.fsHz ?? 1) / heaviest.alone.fsHz) ** 2 - 1;
  return heaviest.measured.massKg / Math.max(ratio, 0.005);
}

/** The values of a fit by parameter id. */
export function valuesById(problem: JointDriverProblem, fit: LeastSquaresFit): Record<string, number> {
  return Object.fromEntries(problem.parameters.map(({ id }, k) => [id, fit.values[k] ?? 0]));
}

export function jointCandidate(
  choice: ModelChoice,
  setup: JointSetup,
  freeAir: Readonly<Record<string, number>>,
  checkpoint: () => void,
): Candidate<JointDriverProblem> {
  const problem = jointProblem(choice, setup);
  return fitCandidate(choice, problem, jointStart(problem, freeAir, setup), checkpoint);
}

/**
 * A relaxation that the data hardly tell still lies inside its bounds: as uncertain as an even spread of its logarithm
 * between them, ln(upper/lower)/√12, about where the fit has it. It moves no value and keeps the covariance finite.
 */
function reachOf({ suspension }: ModelChoice, start: Readonly<Record<string, number>>): PriorKnowledge[] {
  if (suspension !== 'relaxing') return [];
  return (['kappa', 'tau'] as const).flatMap((id) => {
    const value = start[id];
    return value ? [{ id, value, uncertainty: (value * Math.log(RELAXATION_RANGE[id])) / Math.sqrt(12) }] : [];
  });
}

/** The last fit: residuals in units of their own noise, with covariance. */
export function finalFit(
  choice: ModelChoice,
  setup: JointSetup,
  start: Readonly<Record<string, number>>,
  checkpoint: () => void,
): { problem: JointDriverProblem; fit: LeastSquaresFit } {
  const problem = jointProblem(choice, { ...setup, priors: [...setup.priors, ...reachOf(choice, start)] });
  const values = problem.parameters.map(({ id }, k) => start[id] ?? jointStart(problem, start, setup)[k] ?? 1);
  const fit = leastSquares(problem, withoutHeld(problem, values), {
    relativeOffset: 1e-4,
    maxIterations: 60,
    absoluteSigma: true,
    checkpoint,
  });
  return { problem, fit };
}
