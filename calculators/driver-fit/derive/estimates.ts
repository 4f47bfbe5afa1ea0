import { type BandResult, type BandResults, NORMAL_FACTOR } from '../fitting/bands.js';
import type { Resampled } from '../fitting/bootstrap.js';
import { type Averaged, averaged, type Weighted } from './averaging.js';
import { BY_DEFINITION } from './derived-figures.js';

/** A figure as reported. `interval` is there only where value ± 2u would say too little. */
export interface Estimate extends Averaged {
  readonly kind: 'fit' | 'definition' | 'bootstrap';
  readonly noiseDof: number;
  readonly drift: number; // what the choice of the band costs, already in the uncertainty
}

/** Figures of the resonance: from the part of the sweep that tells it best. All others come from the whole sweep. */
const OF_RESONANCE: ReadonlySet<string> = new Set(
  'Re fs Qms Qes Qts QmsTotal Res EBP Mms Mmd Cms Rms Bl Vas Sd Dd fc eta0 SPL1W SPL2V83 lambda kappa tau'.split(' '),
);
export const isOfResonance = (id: string): boolean => OF_RESONANCE.has(id);

/**
 * By how much a slow wave of the misfit over the resonance, 1 in ln Z, moves a figure: Re and with it Qes and Qts by as
 * much; fs by 1/(2·Qms), the slope of the phase there; what follows from a ratio of two resonances by 2(1 + s)/s times
 * that, s = m/Mms or Vas/Vb. A fit to the same points cannot see it: a drift, a warm coil, a coil of another kind.
 */
function wavesReach(id: string, { models, analysis }: BandResult): number {
  const { values } = models[0].propagated;
  const ofFs = 1 / (2 * Math.max(values.Qms ?? 1, 0.5));
  const heaviestKg = Math.max(...analysis.setup.sweeps.map(({ measured }) => measured.massKg));
  const shift = heaviestKg > 0 && values.Mms ? heaviestKg / values.Mms : 1;
  const ofRatio = ((2 * (1 + shift)) / shift) * ofFs;
  switch (id) {
    case 'Re':
    case 'Qes':
    case 'Qts':
      return 1;
    case 'fs':
    case 'fc':
      return ofFs;
    case 'Mms':
    case 'Cms':
    case 'Vas':
      return ofRatio;
    default:
      return 0;
  }
}
const wavesOf = (bands: readonly BandResult[]): number =>
  Math.max(...bands.flatMap(({ analysis }) => analysis.structures.map(({ waves }) => waves)));

/** Every figure that the fits give, by id; null where a figure cannot be known. */
export function estimatesOf(results: BandResults): Map<string, Estimate | null> {
  const { whole, resonance } = results;
  const found = new Map<string, Estimate | null>();
  for (const id of Object.keys(whole.models[0].propagated.values)) {
    if (!isOfResonance(id) && !id.endsWith(BY_DEFINITION)) found.set(id, fitEstimate(id, whole));
  }
  for (const id of Object.keys(resonance.models[0].propagated.values)) {
    if (isOfResonance(id)) found.set(id, resonanceEstimate(id, results));
  }
  return found;
}

function fitEstimate(id: string, { models, stretch, noiseDof }: BandResult): Estimate | null {
  const found = averaged(id, models, stretch);
  return found && { ...found, kind: 'fit', noiseDof, drift: 0 };
}

/**
 * A figure of the resonance means two things where the suspension creeps: the model's parameter, which is reported, and
 * what the trade's three-point definition gives on the same motional impedance. The interval then covers both. Where
 * the sweep was fitted in parts, it reaches to what the definition gives in the other parts, and their spread enters u,
 * with the slow waves of the misfit over the whole sweep as an error that no part of it can see.
 */
function resonanceEstimate(id: string, { resonance, all }: BandResults): Estimate | null {
  const main = fitEstimate(id, resonance);
  if (!main) return null;
  const { noiseDof, stretch } = resonance;
  const ends = [endsOf(main, stretch)];
  const byDefinition = averaged(id + BY_DEFINITION, resonance.models, stretch);
  if (byDefinition) ends.push(endsOf(byDefinition, stretch));
  const others = all.filter((band) => band !== resonance).flatMap((band) => definitionIn(id, band));
  for (const value of others) ends.push({ low: value, high: value });
  if (ends.length === 1) return main;
  const centre = byDefinition?.value ?? main.value;
  const scale = Math.abs(centre) * wavesOf(all) * wavesReach(id, resonance);
  const drift = Math.hypot(deviationOf([centre, ...others]), scale);
  const uncertainty = Math.hypot(main.uncertainty, drift);
  const half = NORMAL_FACTOR * stretch * uncertainty;
  const about = [main.value, centre].flatMap((value) => [value - half, value + half]);
  const low = Math.min(...ends.map((end) => end.low), ...about);
  const high = Math.max(...ends.map((end) => end.high), ...about);
  return { ...main, uncertainty, drift, interval: { low, high }, kind: 'definition', noiseDof };
}

function endsOf({ value, uncertainty, interval }: Averaged, stretch: number): { low: number; high: number } {
  const half = NORMAL_FACTOR * stretch * uncertainty;
  return interval ?? { low: value - half, high: value + half };
}

/** What the definition gives in another part of the sweep; nothing where only a creep's parameter could be told. */
function definitionIn(id: string, { models, analysis }: BandResult): number[] {
  const [chosen]: readonly Weighted[] = models;
  const values = chosen?.propagated.values ?? {};
  const isConstant = analysis.outcomes[0].choice.suspension === 'constant';
  const value = values[id + BY_DEFINITION] ?? (isConstant || id === 'Re' ? values[id] : null);
  return typeof value === 'number' ? [value] : [];
}

function deviationOf(values: readonly number[]): number {
  if (values.length < 2) return 0;
  const mean = values.reduce((a, b) => a + b, 0) / values.length;
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1));
}

/**
 * With the spread over resampled refits in place of the covariance. An interval that already covers more than one
 * meaning or model of a figure stays, and its uncertainty only grows.
 */
export function withResampling(
  estimates: ReadonlyMap<string, Estimate | null>,
  resampled: ReadonlyMap<string, Resampled>,
): Map<string, Estimate | null> {
  const found = new Map(estimates);
  for (const [id, { uncertainty, low, high }] of resampled) {
    const estimate = found.get(id);
    if (!estimate) continue;
    const whole = Math.hypot(uncertainty, estimate.spread, estimate.drift);
    found.set(
      id,
      estimate.interval
        ? { ...estimate, uncertainty: Math.max(whole, estimate.uncertainty) }
        : { ...estimate, uncertainty: whole, interval: { low, high }, kind: 'bootstrap' },
    );
  }
  return found;
}
