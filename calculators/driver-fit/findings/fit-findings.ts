import type { Finding } from '../../../shared/output.js';
import type { Estimate } from '../derive/estimates.js';
import type { BandResult, BandResults } from '../fitting/bands.js';
import { isStructured } from '../fitting/bands.js';
import { modelName } from '../fitting/candidates.js';
import { finding, hertz, listed, percent } from './finding.js';

const KEY_FIGURES = ['Re', 'fs', 'Qes', 'Qts', 'QmsTotal', 'Vas'] as const;
const NOTICEABLE = 0.002; // relative: a smaller spread moves no decision
const CLOSE_WEIGHT = 0.02; // the runner-up counts from here on
const LARGE_WAVES = 0.02; // relative misfit that no model follows
const LARGE_NOISE = 0.05;
const FAR_FROM_ARRIVED = 0.05; // relative offset: u would be off by as much

/** What the fit itself has to say before anyone trusts its figures. */
export function fitFindings(results: BandResults, estimates: ReadonlyMap<string, Estimate | null>): Finding[] {
  return [...arrivalFindings(results), ...misfitFindings(results), ...modelFindings(results.resonance, estimates)];
}

function arrivalFindings({ all }: BandResults): Finding[] {
  return all.flatMap(({ analysis: { outcomes }, upToHz }) => {
    const [{ fit, choice }] = outcomes;
    const isArrived = fit.status === 'converged' || fit.status === 'at-bound' || fit.relativeOffset < FAR_FROM_ARRIVED;
    if (isArrived && Number.isFinite(fit.cost)) return [];
    const part = upToHz === null ? '' : ` below ${hertz(upToHz)}`;
    const message = `The fit of ${modelName(choice)}${part} did not come to rest (${fit.status}). Trust none of its figures: choose a simpler coil, or narrow the band to the clean part of the sweep.`;
    return [finding('not-converged', message, { evidence: { offset: finite(fit.relativeOffset) } })];
  });
}

const finite = (value: number): number | null => (Number.isFinite(value) ? value : null);

function misfitFindings({ whole, resonance }: BandResults): Finding[] {
  const found: Finding[] = [];
  const { structures, setup } = whole.analysis;
  const waves = Math.max(...structures.map((structure) => structure.waves));
  if (isStructured(whole.analysis)) {
    const part =
      resonance === whole
        ? 'The uncertainties are widened for it.'
        : `The resonance is fitted from the part below ${hertz(resonance.upToHz ?? 0)}, and the uncertainties cover what moves between the parts.`;
    const names = setup.sweeps.filter((_, i) => structures[i]?.isStructured).map(({ measured }) => measured.name);
    const message = `The misfit of ${listed(names)} is not noise: it runs in waves along the curve (${percent(waves)} rms). ${part} Look at the misfit plot for drift, a rattle or a coil that no model follows.`;
    const tau = Math.max(...structures.map((structure) => structure.pointsPerEffective));
    found.push(finding('structured-residual', message, { evidence: { waves, pointsPerEffective: tau } }));
  }
  const noise = Math.max(
    ...setup.sweeps.map((sweep, i) => sweep.noise / Math.sqrt(structures[i]?.pointsPerEffective ?? 1)),
  );
  if (waves > LARGE_WAVES) {
    const message = `No model follows the curve closer than ${percent(waves)}: something is in it that a driver by itself does not have. Look at the misfit plot, and check mounting and leads.`;
    found.push(finding('poor-fit', message, { evidence: { waves } }));
  } else if (noise > LARGE_NOISE) {
    const message = `The points scatter by ${percent(noise)} about the curve. Sweep slower, at a higher level, or in a quieter place.`;
    found.push(finding('poor-fit', message, { evidence: { noise } }));
  }
  return found;
}

function modelFindings({ analysis, models }: BandResult, estimates: ReadonlyMap<string, Estimate | null>): Finding[] {
  const [first, second] = analysis.ranking;
  if (!first || !second || second.weight < CLOSE_WEIGHT) return [];
  const apart = KEY_FIGURES.filter((id) => {
    const estimate = estimates.get(id);
    const own = models[0].propagated.uncertainty[id] ?? 0;
    return estimate && estimate.spread > own && estimate.spread > NOTICEABLE * Math.abs(estimate.value);
  });
  if (apart.length === 0) return [];
  const largest = Math.max(...apart.map((id) => spreadOf(estimates.get(id))));
  const message = `${modelName(first.candidate)} and ${modelName(second.candidate)} fit about equally well and differ in ${listed(apart)}, by up to ${percent(largest)}. Their spread is in the uncertainties. A lower start of the sweep, or a DC resistance measured apart, would settle it.`;
  return [finding('models-disagree', message, { evidence: { weight: second.weight, spread: largest } })];
}

const spreadOf = (estimate: Estimate | null | undefined): number =>
  estimate ? Math.abs(estimate.spread / estimate.value) : 0;
