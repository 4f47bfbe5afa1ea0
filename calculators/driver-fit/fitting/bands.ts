import type { RunContext } from '../../kit/calculator.js';
import { studentQuantile } from '../../numerics/distributions.js';
import type { Weighted } from '../derive/averaging.js';
import type { FigureContext } from '../derive/derived-figures.js';
import type { Externals } from '../derive/externals.js';
import { propagate } from '../derive/propagation.js';
import { cutTo, LEAST_POINTS_TO_FIT, type Measured } from '../measured.js';
import type { DriverFitSettings } from '../settings.js';
import { type Analysis, analyse } from './analysis.js';

/** The driver fitted over one part of its sweeps, with figures under every model that counts. */
export interface BandResult {
  readonly upToHz: number | null; // null: the whole sweep
  readonly analysis: Analysis;
  readonly models: readonly [Weighted, ...Weighted[]];
  readonly context: FigureContext;
  readonly noiseDof: number;
  readonly stretch: number; // t of Student over the normal factor, for 95 %
}
/** `whole` tells the coil, `resonance` the driver's resonance; one and the same unless the misfit is structured. */
export interface BandResults {
  readonly whole: BandResult;
  readonly resonance: BandResult;
  readonly all: readonly BandResult[];
}

const NARROWER = [15, 6]; // times fs, where no model follows the coil over the whole sweep (from trials)
export const NORMAL_FACTOR = 1.959964; // of a 95 % interval

/**
 * The whole sweep first. Where its misfit is structured (no model follows this coil all the way up), the same driver
 * again from the part below 15·fs and below 6·fs: there the coil is simpler, and what moves between the parts is what
 * the choice of the band costs. Local fitting around a resonance is common practice; the two factors are from trials.
 */
export function bandResults(
  measured: readonly Measured[],
  settings: DriverFitSettings,
  externals: Externals,
  context: RunContext,
): BandResults {
  const whole = bandResult(measured, null, settings, externals, context);
  const all = [whole];
  let resonance = whole;
  const fsHz = whole.models[0].propagated.values.fs ?? 0;
  const peakHz = whole.models[0].propagated.values.fPeak ?? fsHz;
  for (const factor of NARROWER) {
    if (!isStructured(resonance.analysis)) break;
    const upToHz = factor * Math.max(peakHz, 1);
    const cut = measured.map((sweep) => cutTo(sweep, upToHz));
    const isWorthIt = cut.every(
      ({ data, kind }, i) =>
        kind.kind === 'driver' &&
        data.re.length >= 2 * LEAST_POINTS_TO_FIT &&
        data.re.length < 0.95 * (measured[i]?.data.re.length ?? 0),
    );
    if (!isWorthIt) continue;
    resonance = bandResult(cut, upToHz, settings, externals, context);
    all.push(resonance);
  }
  return { whole, resonance, all };
}

export const isStructured = ({ structures }: Analysis): boolean =>
  structures.some((structure) => structure.isStructured);

function bandResult(
  measured: readonly Measured[],
  upToHz: number | null,
  settings: DriverFitSettings,
  externals: Externals,
  context: RunContext,
): BandResult {
  const analysis = analyse(measured, settings, context);
  const { frequencyHz } = analysis.setup.sweeps[0]?.measured.data.grid ?? { frequencyHz: Float64Array.of(1) };
  const figureContext: FigureContext = {
    airLoadDiscs: externals.airLoadDiscs,
    lowHz: frequencyHz[0] ?? 1,
    highHz: frequencyHz.at(-1) ?? 1,
  };
  const heaviest = Math.max(...analysis.setup.sweeps.map((sweep) => sweep.measured.massKg));
  const weighted = analysis.outcomes.map(
    (outcome): Weighted => ({
      weight: outcome.weight,
      propagated: propagate(outcome, externals, figureContext, heaviest > 0 ? heaviest : null),
    }),
  );
  const [chosen, ...others] = weighted;
  if (!chosen) throw new Error('driver-fit has no outcome');
  const noiseDof = Math.max(analysis.effectiveRows - analysis.outcomes[0].fit.values.length, 2);
  return {
    upToHz,
    analysis,
    models: [chosen, ...others],
    context: figureContext,
    noiseDof,
    stretch: studentQuantile(0.975, noiseDof) / NORMAL_FACTOR,
  };
}
