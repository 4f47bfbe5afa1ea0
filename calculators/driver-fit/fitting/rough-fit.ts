import { FREE_AIR } from '../../acoustics/driver-impedance.js';
import { driverSweepProblem } from '../../acoustics/driver-sweep-problem.js';
import { type MotionalStart, motionalStart, startValues } from '../../acoustics/start-values.js';
import { logMisfit } from '../../acoustics/sweep-term.js';
import type { CoilModel } from '../../acoustics/voice-coil.js';
import { leastSquares } from '../../numerics/least-squares.js';
import type { Measured } from '../measured.js';
import { withinReach, withoutHeld } from './candidates.js';
import { type FittedCurve, thinnedRows } from './fit-rows.js';
import { NO_WILD_POINTS, type WildPoints, wildPoints } from './wild-points.js';

/** A first curve through one sweep that wild points do not pull, by coil, and the rows that do not belong to it. */
export interface RoughFit {
  readonly motional: MotionalStart;
  readonly coils: ReadonlyMap<CoilModel, Float64Array>; // Re fs Qms Qes and the coil's, suspension constant
  readonly nearest: FittedCurve;
  readonly wild: WildPoints;
  readonly keep: Uint8Array; // (n)
}

const SOFT_SCALE = 0.02; // relative misfit: a usable start lies within a few of these

/**
 * Soft-L1 fits from the curve's own starting values, one for each coil; wild points and hum against the nearest of them.
 * Shapes: keep (n). `start` stands in for the motional start, from an earlier sweep of the same driver.
 */
export function roughFit(
  { data }: Measured,
  coils: readonly CoilModel[],
  robust: boolean,
  checkpoint: () => void,
): RoughFit {
  const motional = motionalStart(data);
  const rows = thinnedRows(data);
  const fits = coils.map((coil) => {
    const model = { coil, suspension: 'constant', load: FREE_AIR } as const;
    const choice = { coil, suspension: model.suspension, hasRss: false };
    const problem = withinReach(driverSweepProblem(model, rows.data, rows.counts), choice, motional.fsHz);
    const fit = leastSquares(problem, withoutHeld(problem, startValues(motional, coil, 'constant')), {
      loss: 'soft-l1',
      lossScale: SOFT_SCALE,
      covariance: false,
      relativeOffset: 0.05,
      maxIterations: 25,
      checkpoint,
    });
    return { model, values: fit.values, cost: fit.cost };
  });
  const nearest = fits.reduce((best, fit) => (fit.cost < best.cost ? fit : best));
  const wild = robust
    ? wildPoints(data.grid.frequencyHz, logMisfit(nearest.model, nearest.values, data), data.hasPhase)
    : NO_WILD_POINTS;
  return {
    motional,
    coils: new Map(fits.map(({ model, values }) => [model.coil, values])),
    nearest,
    wild,
    keep: keepMask(data.re.length, wild),
  };
}

export function keepMask(n: number, { humRows, wildRows }: WildPoints): Uint8Array {
  const keep = new Uint8Array(n).fill(1);
  for (const row of [...humRows, ...wildRows]) keep[row] = 0;
  return keep;
}
