import { relativeCompliance } from '../../acoustics/suspension.js';
import type { SingleFit } from './single-fit.js';

/** Where the sweeps of one driver do not fit together as they were declared. Numbers are places in the list of fits. */
export interface SeriesVerdict {
  readonly exchanged: readonly [number, number] | null; // these two were taken for each other
  readonly inconsistent: readonly number[]; // these do not lie on the line of the others
  readonly isNamedSurely: boolean; // false where two masses cannot tell which sweep is wrong
}
export interface Declared {
  readonly massKg: number;
  readonly massUncertaintyKg: number;
  readonly isBox: boolean;
}

const TOLERANCE = 1e-3; // of the frequency: what level, position and creep do to careful sweeps (common practice)
const LIMIT = 4; // standard deviations

/**
 * Added masses lie on a line, 1/f² = 4π²Cms·(Mms + m), and the resonance in a closed box lies above that in free air
 * (R. H. Small, J. Audio Eng. Soc. 20 (1972), from memory). When the sweeps do not obey as declared but do after one
 * exchange of two of them, they were exchanged; else the ones whose absence lets the others obey are inconsistent.
 * `declared` belongs to the sweeps in the order of `fits`; free air is the one of mass 0 that is no box.
 */
export function seriesVerdict(fits: readonly SingleFit[], declared: readonly Declared[]): SeriesVerdict {
  const none: SeriesVerdict = { exchanged: null, inconsistent: [], isNamedSurely: true };
  if (obeys(fits, declared)) return none;
  const exchanges = fits.flatMap((_, i) => fits.slice(i + 1).map((__, k) => [i, i + 1 + k] as const));
  const cures = exchanges.filter((pair) => obeys(exchangedFits(fits, pair), declared));
  const cure = cures.find(([i]) => i === 0) ?? cures[0];
  if (cure) return { ...none, exchanged: cure };
  const culprits = fits.map((_, i) => i).filter((i) => i > 0 && obeys(without(fits, i), without(declared, i)));
  if (culprits.length === 1) return { ...none, inconsistent: culprits };
  if (culprits.length > 1) return { ...none, inconsistent: culprits, isNamedSurely: false };
  const worst = fits.map((_, i) => i).filter((i) => i > 0);
  return { ...none, inconsistent: worst, isNamedSurely: false };
}

export function exchangedFits(fits: readonly SingleFit[], [a, b]: readonly [number, number]): SingleFit[] {
  return fits.map((fit, i) => (i === a ? (fits[b] ?? fit) : i === b ? (fits[a] ?? fit) : fit));
}

const without = <Item>(items: readonly Item[], index: number): Item[] => items.filter((_, i) => i !== index);

function obeys(fits: readonly SingleFit[], declared: readonly Declared[]): boolean {
  const free = fits.find((_, i) => declared[i]?.massKg === 0 && !declared[i]?.isBox);
  if (!free) return true;
  const boxes = fits.filter((_, i) => declared[i]?.isBox);
  if (boxes.some((box) => box.fsHz < free.fsHz * (1 - margin(box, free)))) return false;
  const masses = fits.filter((_, i) => !declared[i]?.isBox);
  const told = declared.filter(({ isBox }) => !isBox);
  const isOneFrequency = masses.every((fit) => Math.abs(Math.log(fit.fsHz / free.fsHz)) < margin(fit, free));
  if (masses.length < 2 || isOneFrequency) return true; // no shift that could tell which is which
  return lineThrough(masses, told, free).every(({ score, isFalling }) => isFalling && Math.abs(score) < LIMIT);
}

const margin = (a: SingleFit, b: SingleFit): number => 3 * Math.hypot(a.relative.fs, b.relative.fs, TOLERANCE);

export interface SeriesPoint {
  readonly score: number; // distance from the line in standard deviations
  readonly isFalling: boolean; // the line rises: more mass, lower resonance
}

/** Weighted line of 1/(f²·c) over m, c the relative compliance at f of a creeping suspension. */
function lineThrough(fits: readonly SingleFit[], told: readonly Declared[], free: SingleFit): SeriesPoint[] {
  const y = fits.map((fit) => (free.fsHz / fit.fsHz) ** 2 / complianceAt(fit.fsHz, free));
  const m = told.map(({ massKg }) => massKg);
  const span = Math.max(...m) || 1;
  const slopeGuess = Math.max((Math.max(...y) - 1) / span, 0);
  const sigma = fits.map((fit, i) =>
    Math.hypot(
      2 * (y[i] ?? 1) * Math.hypot(fit.relative.fs, TOLERANCE),
      slopeGuess * (told[i]?.massUncertaintyKg ?? 0),
    ),
  );
  let [s, sx, sy, sxx, sxy] = [0, 0, 0, 0, 0];
  for (const [i, yi] of y.entries()) {
    const weight = 1 / (sigma[i] ?? 1) ** 2;
    const x = (m[i] ?? 0) / span;
    s += weight;
    sx += weight * x;
    sy += weight * yi;
    sxx += weight * x * x;
    sxy += weight * x * yi;
  }
  const slope = (s * sxy - sx * sy) / (s * sxx - sx * sx);
  const offset = (sy - slope * sx) / s;
  return y.map((yi, i) => ({
    score: (yi - offset - (slope * (m[i] ?? 0)) / span) / (sigma[i] ?? 1),
    isFalling: slope > 0 && offset > 0,
  }));
}

function complianceAt(frequencyHz: number, free: SingleFit): number {
  const { choice, fit, fsHz } = free;
  if (choice.suspension !== 'creep') return 1; // fs of a relaxing suspension is that of its quick spring at any mass
  return relativeCompliance('creep', fit.values, fit.values.length - 1, frequencyHz, fsHz)[0];
}
