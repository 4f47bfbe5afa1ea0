import type { Finding, Fit, Marker, Output, Table } from '../../shared/output.js';
import type { RunContext } from '../kit/calculator.js';
import { type Estimate, estimatesOf, isOfResonance, withResampling } from './derive/estimates.js';
import type { Externals } from './derive/externals.js';
import { figuresOf } from './derive/figures.js';
import { withProfiles } from './derive/weak-parameters.js';
import { fitFindings } from './findings/fit-findings.js';
import { diameterFindings, loadFindings } from './findings/load-findings.js';
import { wildFindings } from './findings/sweep-findings.js';
import { type BandResults, bandResults } from './fitting/bands.js';
import { bootstrapped } from './fitting/bootstrap.js';
import { modelName } from './fitting/candidates.js';
import type { Measured } from './measured.js';
import { budgetTable } from './report/budget-table.js';
import { modelTable } from './report/model-table.js';
import { firstLoadSteps, type NextStep, nextSteps, nextTable } from './report/next-measurement.js';
import { sentenceOf } from './report/sentence.js';
import { threePoint } from './report/three-point.js';
import { type NamedThreePoint, threePointMarkers, threePointTable } from './report/three-point-table.js';
import { tracesOf } from './report/traces.js';
import { waysTable } from './report/ways-table.js';
import type { DriverFitSettings } from './settings.js';

export interface Task {
  readonly measured: readonly Measured[]; // free air first; all with a resonance
  readonly settings: DriverFitSettings;
  readonly externals: Externals;
  readonly context: RunContext;
}

/** From usable sweeps to the whole answer. */
export function fittedOutput({ measured, settings, externals, context }: Task, before: readonly Finding[]): Output {
  const results = bandResults(measured, settings, externals, context);
  const estimates = resampledEstimates(results, settings, externals, context);
  const { whole, resonance } = results;
  const [{ propagated }] = resonance.models;
  const findings = [
    ...before,
    ...wildFindings(whole.analysis.singles),
    ...loadFindings(measured, whole.analysis, propagated, settings),
    ...diameterFindings(propagated, externals),
    ...fitFindings(results, estimates),
  ];
  const figures = figuresOf(withMisfit(estimates, results), circumstancesOf(results, externals));
  const points = threePointRows(results);
  const steps = stepsOf(results, estimates, externals);
  return {
    summary: sentenceOf(estimates, findings, steps),
    figures: withProfiles(figures, results, () => context.checkpoint()),
    fit: fitOf(results),
    traces: tracesOf(results),
    markers: markersOf(points, estimates),
    findings,
    tables: tablesOf(results, { estimates, externals, points, steps }),
  };
}

/** From the covariance, or from resampled refits where the settings ask for them. */
function resampledEstimates(
  results: BandResults,
  { bootstrap }: DriverFitSettings,
  externals: Externals,
  context: RunContext,
): Map<string, Estimate | null> {
  const estimates = estimatesOf(results);
  if (bootstrap === 0) return estimates;
  const job = { refits: bootstrap, externals, context };
  const { whole, resonance } = results;
  const ofWhole = bootstrapped(whole, job);
  const ofResonance = resonance === whole ? ofWhole : bootstrapped(resonance, job);
  const chosen = new Map([...ofWhole].filter(([id]) => !isOfResonance(id)));
  for (const [id, found] of ofResonance) if (isOfResonance(id)) chosen.set(id, found);
  return withResampling(estimates, chosen);
}

function withMisfit(
  estimates: ReadonlyMap<string, Estimate | null>,
  { whole }: BandResults,
): Map<string, Estimate | number | null> {
  return new Map<string, Estimate | number | null>([
    ...estimates,
    ['rmsResidual', misfitOf(whole.analysis.setup.sweeps)],
  ]);
}

/** Root mean square of |ln(Z/model)| over the fitted points of all sweeps. */
function misfitOf(sweeps: BandResults['whole']['analysis']['setup']['sweeps']): number {
  let squares = 0;
  let points = 0;
  for (const { misfitSquares, rows } of sweeps) {
    squares += misfitSquares;
    points += rows.counts.reduce((a, b) => a + b, 0);
  }
  return Math.sqrt(squares / Math.max(points, 1));
}

function circumstancesOf({ whole, resonance }: BandResults, externals: Externals) {
  const { mass, vas } = resonance.models[0].propagated;
  return {
    hasLoad: mass.length + vas.length > 0,
    hasArea: externals.sdM2 !== null,
    hasBox: externals.volumeM3 !== null,
    highHz: whole.context.highHz,
    model: modelName(whole.analysis.outcomes[0].choice),
  };
}

function fitOf({ whole }: BandResults): Fit {
  const [{ fit, problem, choice }] = whole.analysis.outcomes;
  return {
    status: fit.status,
    model: modelName(choice),
    dof: fit.dof,
    residual: misfitOf(whole.analysis.setup.sweeps),
    parameters: problem.parameters.map(({ id }) => id),
    correlations: fit.correlations,
    atBound: [...fit.atBound, ...fit.neverMoved],
  };
}

/** The trade's method on each sweep, with the fitted Re, or the DC resistance where it was told. */
function threePointRows({ resonance, whole }: BandResults): NamedThreePoint[] {
  const reOhm = resonance.models[0].propagated.values.Re ?? 1;
  return whole.analysis.singles.map(({ measured, keep }) => {
    const { kind, data, magnitudeOhm, name, role } = measured;
    if (kind.kind !== 'driver') return { sweep: name, role, result: null };
    const rows = Array.from(keep.keys()).filter((row) => keep[row]);
    const pick = (values: Float64Array): Float64Array => Float64Array.from(rows, (row) => values[row] ?? 0);
    const magnitude = pick(magnitudeOhm);
    const peak = Math.max(
      0,
      rows.findIndex((row) => row >= kind.main.index),
    );
    const own = whole.analysis.setup.shape.hasOwnRe.some(Boolean) ? undefined : reOhm;
    const single = whole.analysis.singles.find((fit) => fit.measured === measured);
    return {
      sweep: name,
      role,
      result: threePoint(pick(data.grid.frequencyHz), magnitude, own ?? single?.reOhm ?? reOhm, peak),
    };
  });
}

function markersOf(points: readonly NamedThreePoint[], estimates: ReadonlyMap<string, Estimate | null>): Marker[] {
  const [free] = points;
  if (free?.result) return threePointMarkers(free.result);
  const fs = estimates.get('fs');
  return fs ? [{ frequency: fs.value, label: 'fs' }] : [];
}

function stepsOf(
  { resonance }: BandResults,
  estimates: ReadonlyMap<string, Estimate | null>,
  externals: Externals,
): NextStep[] {
  const steps = nextSteps(resonance, estimates, externals);
  const fs = estimates.get('fs');
  return steps.length > 0 || !fs ? steps : firstLoadSteps(resonance, fs.value);
}

interface Parts {
  readonly estimates: ReadonlyMap<string, Estimate | null>;
  readonly externals: Externals;
  readonly points: readonly NamedThreePoint[];
  readonly steps: readonly NextStep[];
}

function tablesOf({ all, resonance }: BandResults, { estimates, externals, points, steps }: Parts): Table[] {
  const ways = waysTable(resonance, externals);
  return [
    threePointTable(points),
    ...all.map(modelTable),
    ...(ways ? [ways] : []),
    budgetTable(estimates),
    nextTable(steps),
  ];
}
