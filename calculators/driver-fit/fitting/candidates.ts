import type { SuspensionModel } from '../../acoustics/suspension.js';
import type { CoilModel } from '../../acoustics/voice-coil.js';
import { leastSquares } from '../../numerics/least-squares.js';
import type { FitParameter, LeastSquaresFit, LeastSquaresProblem } from '../../numerics/least-squares-problem.js';
import { COILS, type DriverFitSettings, SUSPENSIONS } from '../settings.js';

export interface ModelChoice {
  readonly coil: CoilModel;
  readonly suspension: SuspensionModel;
  readonly hasRss: boolean; // the optional shunt resistance of semi-inductance
}
/** One model, fitted, with what it takes to compare it with the others on the same data and weights. */
export interface Candidate<Problem extends LeastSquaresProblem = LeastSquaresProblem> extends ModelChoice {
  readonly problem: Problem;
  readonly fit: LeastSquaresFit;
  readonly freeParameters: number; // k: those not resting on a bound and not without effect
  readonly squares: number; // weighted sum of squares
}
export interface Ranked<C extends Candidate> {
  readonly candidate: C;
  readonly bic: number;
  readonly aicc: number;
  readonly weight: number; // ∝ exp(−ΔBIC/2), 0 for one that has shrunk to a simpler one
  readonly sameAs: string | null; // the simpler model it has shrunk to
}

/** The models that the settings leave open, the simplest first. */
export function modelChoices({ coil, suspension }: Pick<DriverFitSettings, 'coil' | 'suspension'>): ModelChoice[] {
  const coils = coil === 'auto' ? COILS : [coil];
  const suspensions = suspension === 'auto' ? SUSPENSIONS : [suspension];
  return suspensions.flatMap((law) =>
    coils.flatMap((model) => {
      const plain = { coil: model, suspension: law, hasRss: false };
      return model === 'semi-inductance' ? [plain, { ...plain, hasRss: true }] : [plain];
    }),
  );
}

export const coilName = ({ coil, hasRss }: ModelChoice): string => (hasRss ? `${coil} with Rss` : coil);
export const modelName = (choice: ModelChoice): string => `${coilName(choice)} · ${choice.suspension}`;

const FASTEST_RELAXATION = 2; // times fs: faster ones cannot be told from a stiffer spring
const LARGEST_KAPPA = 4;
const SMALLEST_KAPPA = 1e-3;
const SLOWEST_RELAXATION = 0.01; // times fs
/** Upper over lower bound. */
export const RELAXATION_RANGE = {
  kappa: LARGEST_KAPPA / SMALLEST_KAPPA,
  tau: FASTEST_RELAXATION / SLOWEST_RELAXATION,
} as const;

/**
 * The problem of one model: Rss held at infinity where the choice leaves it out, and the relaxation kept where a sweep can
 * tell it, between 0.01 and 2 times fs (common practice from trials, no published source): outside it only trades off
 * with Cms.
 */
export function withinReach<Problem extends LeastSquaresProblem>(
  problem: Problem,
  { hasRss }: ModelChoice,
  fsHz: number,
): Problem {
  const bounded = (parameter: FitParameter): FitParameter => {
    if (parameter.id === 'Gss' && !hasRss) return { ...parameter, logScaled: false, lower: 0, held: true };
    if (parameter.id === 'kappa') return { ...parameter, lower: SMALLEST_KAPPA, upper: LARGEST_KAPPA };
    if (parameter.id !== 'tau') return parameter;
    const tauOf = (ratio: number): number => 1 / (2 * Math.PI * ratio * fsHz);
    return { ...parameter, lower: tauOf(FASTEST_RELAXATION), upper: tauOf(SLOWEST_RELAXATION) };
  };
  return { ...problem, parameters: problem.parameters.map(bounded) };
}

/** Plain least squares of one model, near enough to compare it: within a hundredth of its uncertainties. */
export function fitCandidate<Problem extends LeastSquaresProblem>(
  choice: ModelChoice,
  problem: Problem,
  start: ArrayLike<number>,
  checkpoint: () => void,
): Candidate<Problem> {
  const first = withoutHeld(problem, start);
  const fit = leastSquares(problem, first, { relativeOffset: 1e-2, maxIterations: 20, covariance: false, checkpoint });
  const idle = new Set([...fit.atBound, ...fit.neverMoved]);
  return { ...choice, problem, fit, freeParameters: countOf(problem) - idle.size, squares: 2 * fit.cost };
}

/** A start in which everything held has the value it is held at: 0, no shunt. */
export function withoutHeld({ parameters }: LeastSquaresProblem, start: ArrayLike<number>): Float64Array {
  return Float64Array.from(start, (value, k) => (parameters[k]?.held ? 0 : value));
}

const countOf = ({ parameters }: LeastSquaresProblem): number => parameters.filter(({ held }) => !held).length;

const SAME_BIC = 1.5;
export const FILE_ROUNDING = 1e-7; // relative: seven written digits

/**
 * Best first, by BIC = N·ln(RSS/N) + k·ln N; AICc = N·ln(RSS/N) + 2k + 2k(k + 1)/(N − k − 1).
 * Sources: G. Schwarz, Ann. Statist. 6 (1978); C. M. Hurvich, C.-L. Tsai, Biometrika 76 (1989) (from memory).
 * N counts real residuals, or as many of them as are independent where the misfit is correlated. A model with a
 * parameter on its bound that does no better than a simpler one is that one again and carries no weight. Below
 * `leastSquaresSum`, what is left is the rounding of the file, and the simplest model is the best.
 */
export function ranked<C extends Candidate>(
  candidates: readonly C[],
  rows: number,
  leastSquaresSum: number,
): Ranked<C>[] {
  const scored = candidates.map((candidate) => {
    const k = candidate.freeParameters;
    const likelihood = rows * Math.log(Math.max(candidate.squares, leastSquaresSum) / rows);
    const correction = rows - k - 1 > 0 ? (2 * k * (k + 1)) / (rows - k - 1) : 0;
    return {
      candidate,
      bic: likelihood + k * Math.log(rows),
      aicc: likelihood + 2 * k + correction,
      sameAs: null as string | null,
    };
  });
  const simplestFirst = [...scored].sort((a, b) => countOf(a.candidate.problem) - countOf(b.candidate.problem));
  for (const entry of simplestFirst) {
    const simpler = scored.find((other) => isSimplerTwin(other, entry));
    if (simpler) entry.sameAs = modelName(simpler.candidate);
  }
  const best = Math.min(...scored.filter(({ sameAs }) => sameAs === null).map(({ bic }) => bic));
  const raw = scored.map(({ bic, sameAs }) => (sameAs === null ? Math.exp((best - bic) / 2) : 0));
  const total = raw.reduce((a, b) => a + b, 0);
  return scored
    .map((entry, i) => ({ ...entry, weight: (raw[i] ?? 0) / total }))
    .sort((a, b) => b.weight - a.weight || a.bic - b.bic);
}

type Scored = { readonly candidate: Candidate; readonly bic: number; readonly sameAs: string | null };

function isSimplerTwin(other: Scored, entry: Scored): boolean {
  const { fit, problem } = entry.candidate;
  if (other === entry || other.sameAs !== null) return false;
  if (fit.atBound.length + fit.neverMoved.length === 0) return false;
  const isSimpler = countOf(other.candidate.problem) < countOf(problem);
  return isSimpler && other.bic <= entry.bic + SAME_BIC;
}
