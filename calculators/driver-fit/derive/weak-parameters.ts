import type { Figure } from '../../../shared/output.js';
import type { Outcome } from '../fitting/analysis.js';
import type { BandResults } from '../fitting/bands.js';
import { profileInterval } from '../fitting/profile.js';

/** Parameters of coil and suspension that are fitted as positive numbers under the id of their figure. */
const PLAIN = new Set(['Le', 'L1', 'L2', 'R2', 'Leb', 'K', 'kappa', 'tau']);
const OF_SUSPENSION = new Set(['kappa', 'tau']);
const WEAK = 0.25; // of ln value: beyond it ± is no longer even
const SMALLEST_SHUNT = 1e-4; // S: where the search for a bound of Rss begins

/**
 * Figures of weakly determined parameters with a likelihood profile for an interval: uneven, or one-sided where the
 * parameter rests on a bound or the model goes without it (Rss above all). Others are handed back as they are.
 */
export function withProfiles(
  figures: readonly Figure[],
  { whole, resonance }: BandResults,
  checkpoint: () => void,
): Figure[] {
  return figures.map((figure) => {
    const [outcome] = (OF_SUSPENSION.has(figure.id) ? resonance : whole).analysis.outcomes;
    if (figure.id === 'Rss') return withShuntBound(figure, outcome, checkpoint);
    if (!PLAIN.has(figure.id) || !outcome.problem.parameters.some(({ id }) => id === figure.id)) return figure;
    return withProfile(figure, outcome, checkpoint);
  });
}

function withProfile(figure: Figure, outcome: Outcome, checkpoint: () => void): Figure {
  const { fit, problem } = outcome;
  const { id } = figure;
  const k = problem.indexOf(id);
  const value = fit.values[k] ?? 0;
  if (fit.atBound.includes(id) || fit.neverMoved.includes(id)) {
    const { lower = 0, upper = Number.POSITIVE_INFINITY } = problem.parameters[k] ?? {};
    const isLow = value - lower < upper - value;
    const bound = profileInterval(outcome, id, value, [isLow ? 'high' : 'low'], checkpoint);
    const { low, high } = bound;
    const note = isLow ? 'Too small for the data to tell.' : 'Too large for the data to tell.';
    return { id, unit: figure.unit, value: null, interval: { low, high, coverage: 0.95, kind: 'profile' }, note };
  }
  const spread = Math.sqrt(fit.scaledCovariance[k * (fit.values.length + 1)] ?? 0);
  if (!(spread > WEAK)) return figure;
  const interval = profileInterval(outcome, id, value, ['low', 'high'], checkpoint);
  return { ...figure, interval: { ...interval, coverage: 0.95, kind: 'profile' } };
}

/** Rss = 1/Gss: where the curve asks for none, the smallest that it would bear. */
function withShuntBound(figure: Figure, outcome: Outcome, checkpoint: () => void): Figure {
  const { fit, problem, choice } = outcome;
  if (choice.coil !== 'semi-inductance') return figure;
  const k = problem.indexOf('Gss');
  const gss = fit.values[k] ?? 0;
  const isThere = choice.hasRss && !fit.atBound.includes('Gss');
  const u = fit.standardErrors[k] ?? 0;
  if (isThere && u < WEAK * gss) return figure;
  const bound = profileInterval(
    outcome,
    'Gss',
    Math.max(gss, SMALLEST_SHUNT),
    isThere ? ['low', 'high'] : ['high'],
    checkpoint,
  );
  const interval = {
    low: bound.high === null ? null : 1 / bound.high,
    high: bound.low === null ? null : 1 / bound.low,
    coverage: 0.95,
    kind: 'profile' as const,
  };
  if (isThere) return { ...figure, interval };
  const note = 'The curve asks for no Rss: any above the low end of the interval fits as well.';
  return { id: 'Rss', unit: figure.unit, value: null, interval, note };
}
