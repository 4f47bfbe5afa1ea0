import type { Outcome } from '../fitting/analysis.js';
import { blendWeights } from './blend.js';
import {
  type CurveExtremes,
  extremesOf,
  type FigureContext,
  type FigureValues,
  figureValues,
} from './derived-figures.js';
import {
  type ExternalShifts,
  MASS_WAYS,
  type MassWay,
  NO_SHIFTS,
  type NumbersOf,
  numbersOf,
  type WayShares,
} from './driver-numbers.js';
import { EXTERNAL_CAUSES, type Externals, externalUncertainty } from './externals.js';

/** Where the uncertainty of a figure comes from, beside the choice of the model. */
export const CAUSES = ['noise', 'mass', 'dc-resistance', ...EXTERNAL_CAUSES] as const;
export type Cause = (typeof CAUSES)[number];

/** The figures of one model. `parts`: standard uncertainty of a figure by cause; `uncertainty` is their root sum. */
export interface Propagated {
  readonly values: FigureValues;
  readonly uncertainty: Readonly<Record<string, number>>;
  readonly parts: Readonly<Record<string, Readonly<Record<Cause, number>>>>;
  readonly shares: WayShares;
  readonly mass: readonly WayEstimate[];
  readonly vas: readonly WayEstimate[];
  readonly extremes: CurveExtremes;
}
/** What one way says of Mms or Vas, with its standard uncertainty. */
export interface WayEstimate {
  readonly way: MassWay;
  readonly value: number;
  readonly uncertainty: number;
}

const STEP = 1e-4; // of a logarithm, or of a parameter that is about 1: central differences are good to 1e-8

/** A direction of uncertainty: a change of one standard deviation of one independent cause. */
interface Direction {
  readonly cause: Cause;
  readonly values: Float64Array; // change of the scaled joint parameters
  readonly shifts: ExternalShifts;
}

/**
 * Law of propagation: u²(y) = Σ (∂y/∂xᵢ)²u²(xᵢ) with correlated parameters turned into independent directions
 * (JCGM 100:2008, 5.1 and 5.2). A fit that uses prior values (masses, a DC resistance) splits exactly into what its
 * noise and what each prior contributes: with C = (JᵀJ + P)⁻¹ the latter is the vector C·e/u of that prior.
 */
export function propagate(
  outcome: Outcome,
  externals: Externals,
  context: FigureContext,
  heaviestKg: number | null,
): Propagated {
  const functions = numbersOf(outcome, externals, heaviestKg);
  const directions = directionsOf(outcome, externals);
  const shares = sharesOf(functions, outcome, directions);
  const centre = functions.numbers(outcome.fit.values, NO_SHIFTS, shares);
  const extremes = extremesOf(centre, context);
  const values = figureValues(centre, context);
  const parts: Record<string, Record<Cause, number>> = {};
  for (const direction of directions) {
    const slopes = slopesAlong(outcome, direction, (moved, shifts) =>
      figureValues(functions.numbers(moved, shifts, shares), context, extremes),
    );
    for (const [id, slope] of Object.entries(slopes)) {
      parts[id] ??= emptyParts();
      parts[id][direction.cause] = Math.hypot(parts[id][direction.cause], slope);
    }
  }
  const uncertainty = Object.fromEntries(
    Object.entries(parts).map(([id, byCause]) => [id, Math.hypot(...Object.values(byCause))]),
  );
  const wayEstimates = (of: NumbersOf['lnMass']): WayEstimate[] => estimatesOf(of, outcome, directions);
  return {
    values,
    uncertainty,
    parts,
    shares,
    extremes,
    mass: wayEstimates(functions.lnMass),
    vas: wayEstimates(functions.lnVas),
  };
}

const emptyParts = (): Record<Cause, number> =>
  Object.fromEntries(CAUSES.map((cause) => [cause, 0])) as Record<Cause, number>;

type ByName = Readonly<Record<string, number | null | undefined>>;

/** ∂y along a direction, times its length, by central differences of a small step. */
function slopesAlong(
  { fit, problem }: Outcome,
  { values, shifts }: Direction,
  evaluate: (values: Float64Array, shifts: ExternalShifts) => ByName,
): Record<string, number> {
  const length = Math.max(...values.map(Math.abs), ...Object.values(shifts).map(Math.abs));
  if (!(length > 0)) return {};
  const share = STEP / length;
  const moved = (sign: 1 | -1): ByName => {
    const at = fit.values.map((value, k) => {
      const change = sign * share * (values[k] ?? 0);
      return problem.parameters[k]?.logScaled ? value * Math.exp(change) : value + change;
    });
    const scaled = Object.fromEntries(Object.entries(shifts).map(([cause, size]) => [cause, sign * share * size]));
    return evaluate(at, { ...NO_SHIFTS, ...scaled });
  };
  const [up, down] = [moved(1), moved(-1)];
  const slopes: Record<string, number> = {};
  for (const [id, high] of Object.entries(up)) {
    const low = down[id];
    if (typeof high !== 'number' || typeof low !== 'number') continue;
    const slope = (high - low) / (2 * share);
    if (Number.isFinite(slope)) slopes[id] = slope;
  }
  return slopes;
}

function directionsOf(outcome: Outcome, externals: Externals): Direction[] {
  const still = new Float64Array(outcome.fit.values.length);
  const outside = EXTERNAL_CAUSES.map((cause) => ({
    cause,
    values: still,
    shifts: { ...NO_SHIFTS, [cause]: externalUncertainty(externals, cause) },
  }));
  return [...fitDirections(outcome), ...outside].filter(
    ({ values, shifts }) => values.some((x) => x !== 0) || Object.values(shifts).some((x) => x !== 0),
  );
}

const causeOfPrior = (id: string): Cause => (id === 'Re' ? 'dc-resistance' : id.startsWith('mass') ? 'mass' : 'noise');

/** The covariance of the fit as independent directions: one for each prior, and the rest, which is noise. */
function fitDirections({ fit, problem }: Outcome): Direction[] {
  const p = fit.values.length;
  const rest = Float64Array.from(fit.scaledCovariance);
  const directions: Direction[] = [];
  for (const { id, uncertainty, value } of problem.priors) {
    const k = problem.indexOf(id);
    const scaled = problem.parameters[k]?.logScaled ? uncertainty / value : uncertainty;
    const values = Float64Array.from({ length: p }, (_, i) => (fit.scaledCovariance[i * p + k] ?? 0) / scaled);
    for (let i = 0; i < p; i += 1) {
      for (let j = 0; j < p; j += 1) rest[i * p + j] = (rest[i * p + j] ?? 0) - (values[i] ?? 0) * (values[j] ?? 0);
    }
    directions.push({ cause: causeOfPrior(id), values, shifts: NO_SHIFTS });
  }
  return [
    ...directions,
    ...rootColumns(rest, p).map((values) => ({ cause: 'noise' as const, values, shifts: NO_SHIFTS })),
  ];
}

/** Columns of L with L·Lᵀ = the matrix, by Cholesky with the largest remaining diagonal first; rounding is cut off. */
function rootColumns(matrix: Float64Array, p: number): Float64Array[] {
  const left = Float64Array.from(matrix);
  const diagonal = (k: number): number => left[k * p + k] ?? 0;
  const first = Array.from({ length: p }, (_, k) => Math.max(diagonal(k), 0));
  const columns: Float64Array[] = [];
  for (let step = 0; step < p; step += 1) {
    let pivot = -1;
    for (let k = 0; k < p; k += 1) {
      const isSound = diagonal(k) > 1e-10 * (first[k] ?? 0);
      if (isSound && (pivot < 0 || diagonal(k) / (first[k] ?? 1) > diagonal(pivot) / (first[pivot] ?? 1))) pivot = k;
    }
    if (pivot < 0) break;
    const root = Math.sqrt(diagonal(pivot));
    const column = Float64Array.from({ length: p }, (_, i) => (left[i * p + pivot] ?? 0) / root);
    for (let i = 0; i < p; i += 1) {
      for (let j = 0; j < p; j += 1) left[i * p + j] = (left[i * p + j] ?? 0) - (column[i] ?? 0) * (column[j] ?? 0);
    }
    columns.push(column);
  }
  return columns;
}

function estimatesOf(of: NumbersOf['lnMass'], outcome: Outcome, directions: readonly Direction[]): WayEstimate[] {
  const centre = of(outcome.fit.values, NO_SHIFTS);
  const slopes = directions.map((direction) => slopesAlong(outcome, direction, of));
  return MASS_WAYS.flatMap((way) => {
    const ln = centre[way];
    if (ln === undefined) return [];
    const value = Math.exp(ln);
    return [{ way, value, uncertainty: value * Math.hypot(...slopes.map((slope) => slope[way] ?? 0)) }];
  });
}

/** How much each way counts: the best linear unbiased mean of their logarithms. */
function sharesOf({ lnMass, lnVas }: NumbersOf, outcome: Outcome, directions: readonly Direction[]): WayShares {
  const shares = (of: NumbersOf['lnMass']): Partial<Record<MassWay, number>> => {
    const ways = MASS_WAYS.filter((way) => of(outcome.fit.values, NO_SHIFTS)[way] !== undefined);
    if (ways.length < 2) return Object.fromEntries(ways.map((way) => [way, 1]));
    const slopes = directions.map((direction) => slopesAlong(outcome, direction, of));
    const covariance = ways.map((a) =>
      ways.map((b) => slopes.reduce((sum, slope) => sum + (slope[a] ?? 0) * (slope[b] ?? 0), 0)),
    );
    return Object.fromEntries(blendWeights(covariance).map((weight, i) => [ways[i], weight]));
  };
  return { mass: shares(lnMass), vas: shares(lnVas) };
}
