import type { Table } from '../../../shared/output.js';
import type { Estimate } from '../derive/estimates.js';
import type { Externals } from '../derive/externals.js';
import { grams, hertz, litres } from '../findings/finding.js';
import type { BandResult } from '../fitting/bands.js';

/** One thing to do, and what it would bring. */
export interface NextStep {
  readonly action: string;
  readonly kind: 'added-mass' | 'known-volume' | 'diameter' | 'air';
  readonly quantity: number | null; // kg, m³ or m
  readonly unit: string;
  readonly resonanceHz: number | null; // where the resonance would then lie
  readonly amplification: number | null;
  readonly relative: number; // u(Vas)/Vas expected
  readonly halves: boolean;
}

/** A = 2x²/(x² − 1) = 2(1 + s)/s, s = m/Mms or Vas/Vb: how a relative error of a frequency ratio x reaches Vas. */
export const amplification = (s: number): number => (2 * (1 + s)) / s;

const MASS_STEPS = [0.25, 0.5, 1, 1.5]; // of Mms: resonance lower by 11 to 37 %
const VOLUME_STEPS = [0.5, 1, 2, 4]; // Vas/Vb
const UNTOLD_VOLUME = 0.01; // relative: what a careful builder reaches
const FINEST_DIAMETER = 5e-4; // m, standard uncertainty

/** Contributions to u(Vas)/Vas as they are now. */
interface Now {
  readonly vasM3: number;
  readonly mmsKg: number | null;
  readonly fsHz: number;
  readonly total: number;
  readonly ratio: number; // relative uncertainty of a ratio of two resonances
  readonly massKg: number; // u of an added mass
  readonly constant: number; // diameter and air
}

/**
 * Which mass or volume would halve u(Vas), by propagation of the present noise (common practice for the amplification,
 * computed here): noise A·u(x), mass u(m)/m, and what neither changes. Rows by expected uncertainty, best first.
 */
export function nextSteps(
  band: BandResult,
  estimates: ReadonlyMap<string, Estimate | null>,
  externals: Externals,
): NextStep[] {
  const now = nowOf(band, estimates);
  if (!now) return [];
  const steps = [
    ...(now.mmsKg !== null && externals.sdM2 !== null ? MASS_STEPS.map((s) => massStep(s, now.mmsKg ?? 0, now)) : []),
    ...VOLUME_STEPS.map((s) => volumeStep(s, now, externals)),
    ...diameterStep(estimates, externals, now),
    ...airStep(estimates, externals, now),
  ];
  return steps.sort((a, b) => a.relative - b.relative);
}

function nowOf({ analysis, models }: BandResult, estimates: ReadonlyMap<string, Estimate | null>): Now | null {
  const [vas, mms, fs] = ['Vas', 'Mms', 'fs'].map((id) => estimates.get(id));
  if (!vas || !fs || !(vas.value > 0)) return null;
  const part = (size: number): number => size / vas.value;
  const { parts } = vas;
  const noise = Math.hypot(part(parts.noise), part(vas.spread), part(vas.drift));
  const { singles } = analysis;
  const heaviest = singles.reduce((a, b) => (b.measured.massKg > a.measured.massKg ? b : a));
  const isByMass = models[0].propagated.vas.some(({ way }) => way === 'added-mass');
  const isByVolume = models[0].propagated.vas.some(({ way }) => way === 'known-volume');
  const share = isByMass
    ? heaviest.measured.massKg / (mms?.value ?? 1)
    : isByVolume
      ? vas.value / (singles.find(({ measured }) => measured.volumeM3 !== null)?.measured.volumeM3 ?? vas.value)
      : null;
  const ratio = share === null ? Math.SQRT2 * (singles[0]?.relative.fs ?? 0) : noise / amplification(share);
  return {
    vasM3: vas.value,
    mmsKg: mms?.value ?? null,
    fsHz: fs.value,
    total: vas.uncertainty / vas.value,
    ratio,
    massKg: heaviest.measured.massUncertaintyKg,
    constant: Math.hypot(part(parts.diameter), part(parts.air)),
  };
}

function massStep(s: number, mmsKg: number, now: Now): NextStep {
  const massKg = s * mmsKg;
  const a = amplification(s);
  const relative = Math.hypot(a * now.ratio, now.massKg / massKg, now.constant);
  const resonanceHz = now.fsHz / Math.sqrt(1 + s);
  return {
    action: `Add ${grams(massKg)}: the resonance goes to ${hertz(resonanceHz)}`,
    kind: 'added-mass',
    quantity: massKg,
    unit: 'kg',
    resonanceHz,
    amplification: a,
    relative,
    halves: relative <= now.total / 2,
  };
}

function volumeStep(s: number, now: Now, { volumeM3, volumeRelative }: Externals): NextStep {
  const volume = now.vasM3 / s;
  const a = amplification(s);
  const relative = Math.hypot(a * now.ratio, volumeM3 !== null && volumeRelative > 0 ? volumeRelative : UNTOLD_VOLUME);
  const resonanceHz = now.fsHz * Math.sqrt(1 + s);
  return {
    action: `Sweep in a closed box of ${litres(volume)} net: the resonance goes to ${hertz(resonanceHz)}`,
    kind: 'known-volume',
    quantity: volume,
    unit: 'm³',
    resonanceHz,
    amplification: a,
    relative,
    halves: relative <= now.total / 2,
  };
}

function diameterStep(estimates: ReadonlyMap<string, Estimate | null>, { sdM2 }: Externals, now: Now): NextStep[] {
  const vas = estimates.get('Vas');
  const size = vas ? vas.parts.diameter / vas.value : 0;
  if (sdM2 === null || !(size > 0.5 * now.total)) return [];
  const diameterM = 2 * Math.sqrt(sdM2 / Math.PI);
  const reached = Math.min(size, (4 * FINEST_DIAMETER) / diameterM);
  const relative = Math.sqrt(Math.max(now.total ** 2 - size ** 2, 0) + reached ** 2);
  return [
    {
      action: `Measure the piston diameter to ±${Number((2000 * FINEST_DIAMETER).toPrecision(2))} mm, across in several directions`,
      kind: 'diameter',
      quantity: FINEST_DIAMETER,
      unit: 'm',
      resonanceHz: null,
      amplification: 4,
      relative,
      halves: relative <= now.total / 2,
    },
  ];
}

function airStep(estimates: ReadonlyMap<string, Estimate | null>, { isAirTold }: Externals, now: Now): NextStep[] {
  const vas = estimates.get('Vas');
  const size = vas ? vas.parts.air / vas.value : 0;
  if (isAirTold || !(size > 0.3 * now.total)) return [];
  const relative = Math.sqrt(Math.max(now.total ** 2 - size ** 2, 0));
  return [
    {
      action: 'Tell the air pressure at your place',
      kind: 'air',
      quantity: null,
      unit: '',
      resonanceHz: null,
      amplification: null,
      relative,
      halves: relative <= now.total / 2,
    },
  ];
}

/** What to sweep when neither mass nor box is known yet: the shift to aim at, and how sure Vas would then be. */
export function firstLoadSteps({ analysis }: BandResult, fsHz: number): NextStep[] {
  const ratio = Math.SQRT2 * (analysis.singles[0]?.relative.fs ?? 0);
  return [0.5, 1].map((s): NextStep => {
    const resonanceHz = fsHz / Math.sqrt(1 + s);
    const a = amplification(s);
    return {
      action: `Add a mass that brings the resonance to about ${hertz(resonanceHz)}`,
      kind: 'added-mass',
      quantity: null,
      unit: 'kg',
      resonanceHz,
      amplification: a,
      relative: a * ratio,
      halves: false,
    };
  });
}

export function nextTable(steps: readonly NextStep[]): Table {
  return {
    id: 'next',
    title: 'What to measure next',
    columns: [
      { id: 'action', label: 'What to do', kind: 'text' },
      { id: 'kind', label: 'Kind', kind: 'text' },
      { id: 'quantity', label: 'How much', kind: 'number' },
      { id: 'unit', label: 'Unit', kind: 'text' },
      { id: 'resonance', label: 'Resonance then', kind: 'number', unit: 'Hz' },
      { id: 'amplification', label: 'Amplification', kind: 'number' },
      { id: 'relative', label: 'Relative uncertainty of Vas', kind: 'number', unit: '1' },
      { id: 'halves', label: 'Halves it', kind: 'boolean' },
    ],
    rows: steps.map(({ resonanceHz, ...step }) => ({ ...step, resonance: resonanceHz })),
  };
}
