import { FREE_AIR } from '../../acoustics/driver-impedance.js';
import { driverSweepProblem } from '../../acoustics/driver-sweep-problem.js';
import { logMisfit } from '../../acoustics/sweep-term.js';
import { leastSquares } from '../../numerics/least-squares.js';
import type { LeastSquaresFit } from '../../numerics/least-squares-problem.js';
import type { Measured } from '../measured.js';
import { type ModelChoice, withinReach, withoutHeld } from './candidates.js';
import { type FitRows, fitRows } from './fit-rows.js';
import { type ResidualStructure, structureOfRows } from './residual-structure.js';
import { keepMask, type RoughFit } from './rough-fit.js';
import { type WildPoints, wildPoints } from './wild-points.js';

/** One sweep by itself, as a single resonance: what the checks between sweeps need. u: standard uncertainty. */
export interface SingleFit {
  readonly measured: Measured;
  readonly choice: ModelChoice;
  readonly rows: FitRows;
  readonly wild: WildPoints;
  readonly keep: Uint8Array; // (n)
  readonly fit: LeastSquaresFit;
  readonly noise: number; // relative, of one component of one point
  readonly structure: ResidualStructure;
  readonly reOhm: number;
  readonly fsHz: number;
  readonly qms: number;
  readonly qes: number;
  readonly relative: { readonly re: number; readonly fs: number; readonly qms: number; readonly qes: number }; // u/value
}

const NOISE_FLOOR = 1e-9; // relative: rounding of the arithmetic

/**
 * Fits one model to one sweep from a start (order of `driverParameters`, free air); looks for wild points once more
 * against the curve found, since they show better the nearer the curve is, and fits again if that changes any.
 */
export function singleFit(
  measured: Measured,
  choice: ModelChoice,
  rough: RoughFit,
  start: ArrayLike<number>,
  options: { readonly robust: boolean; readonly checkpoint: () => void },
): SingleFit {
  const model = { ...choice, load: FREE_AIR };
  const { data } = measured;
  let { keep, wild } = rough;
  let near = rough.nearest;
  let from = start;
  for (let round = 0; ; round += 1) {
    const rows = fitRows(data, keep, near);
    const weights = rows.counts.map(Math.sqrt);
    const problem = withinReach(driverSweepProblem(model, rows.data, weights), choice, rough.motional.fsHz);
    const fit = leastSquares(problem, withoutHeld(problem, from), {
      relativeOffset: 1e-3,
      maxIterations: 60,
      checkpoint: options.checkpoint,
    });
    near = { model, values: fit.values };
    from = fit.values;
    const seen =
      options.robust && round < 2
        ? wildPoints(data.grid.frequencyHz, logMisfit(model, fit.values, data), data.hasPhase)
        : wild;
    const nextKeep = keepMask(data.re.length, seen);
    if (nextKeep.every((flag, i) => flag === keep[i]))
      return described({ measured, choice, rows, wild: seen, keep, fit });
    keep = nextKeep;
    wild = seen;
  }
}

type Described = Pick<SingleFit, 'measured' | 'choice' | 'rows' | 'wild' | 'keep' | 'fit'>;

function described(found: Described): SingleFit {
  const { choice, rows, fit } = found;
  const structure = structureOfRows(
    rows,
    logMisfit({ ...choice, load: FREE_AIR }, fit.values, rows.data),
    fit.values.length,
  );
  const stretch = Math.sqrt(structure.pointsPerEffective);
  const [reOhm, fsHz, qms, qes] = Array.from(fit.values.subarray(0, 4)) as [number, number, number, number];
  const relative = (k: number): number => stretch * Math.sqrt(fit.scaledCovariance[k * (fit.values.length + 1)] ?? 0);
  return {
    ...found,
    noise: Math.max(Math.sqrt((2 * fit.cost) / Math.max(fit.dof, 1)), NOISE_FLOOR),
    structure,
    reOhm,
    fsHz,
    qms,
    qes,
    relative: { re: relative(0), fs: relative(1), qms: relative(2), qes: relative(3) },
  };
}
