import { type DriverModel, driverImpedance } from '../../acoustics/driver-impedance.js';
import { frequencyGrid } from '../../acoustics/frequency-grid.js';
import { logMisfit, type SweepData } from '../../acoustics/sweep-term.js';
import type { ComplexArray } from '../../numerics/complex-array.js';

/** What the least-squares fit works on: the sweep's rows, or their averages where there are very many. Shapes (m). */
export interface FitRows {
  readonly data: SweepData;
  readonly counts: Float64Array; // measured points in each row; 0 where the row is left out
}
export interface FittedCurve {
  readonly model: DriverModel;
  readonly values: Float64Array;
}

const MOST_ROWS = 1200;
const BINS_PER_OCTAVE = 96;

/** Every row of a sweep by itself, with those left out switched off. */
export function plainRows(data: SweepData, keep: Uint8Array): FitRows {
  return { data, counts: Float64Array.from(keep) };
}

/**
 * Rows for the fit. A sweep of more than 1,200 points is averaged over 1/96 octave: the misfit of ln Z against a curve
 * that is near already is averaged and put on that curve at the bin's mean ln f, so that neither the bend of the curve
 * inside a bin nor a point left out shifts it; a row then weighs as many points as it holds.
 * Common practice, no published source. Shapes: keep (n).
 */
export function fitRows(data: SweepData, keep: Uint8Array, near: FittedCurve): FitRows {
  if (data.re.length <= MOST_ROWS) return plainRows(data, keep);
  const bins = binsOf(data, keep, logMisfit(near.model, near.values, data));
  const frequencyHz = Float64Array.from(bins, ({ lnF, count }) => Math.exp(lnF / count));
  const grid = frequencyGrid(frequencyHz);
  const curve = driverImpedance(near.model, near.values, grid);
  const logMagnitude = frequencyHz.map((_, i) => {
    const [re, im] = [curve.re[i] ?? 1, curve.im[i] ?? 0];
    return 0.5 * Math.log(re * re + im * im) + (bins[i]?.re ?? 0) / (bins[i]?.count ?? 1);
  });
  const phaseRad = frequencyHz.map((_, i) =>
    data.hasPhase ? Math.atan2(curve.im[i] ?? 0, curve.re[i] ?? 1) + (bins[i]?.im ?? 0) / (bins[i]?.count ?? 1) : 0,
  );
  return {
    data: {
      grid,
      hasPhase: data.hasPhase,
      re: logMagnitude.map((ln, i) => Math.exp(ln) * Math.cos(phaseRad[i] ?? 0)),
      im: logMagnitude.map((ln, i) => Math.exp(ln) * Math.sin(phaseRad[i] ?? 0)),
      logMagnitude,
      phaseRad,
    },
    counts: Float64Array.from(bins, ({ count }) => count),
  };
}

interface Bin {
  lnF: number;
  re: number;
  im: number;
  count: number;
}

function binsOf(data: SweepData, keep: Uint8Array, misfit: ComplexArray): Bin[] {
  const { frequencyHz } = data.grid;
  const bins: Bin[] = [];
  let number = Number.NaN;
  for (let i = 0; i < frequencyHz.length; i += 1) {
    if (!keep[i]) continue;
    const lnF = Math.log(frequencyHz[i] ?? 1);
    const here = Math.floor((lnF / Math.LN2) * BINS_PER_OCTAVE);
    if (here !== number) {
      bins.push({ lnF: 0, re: 0, im: 0, count: 0 });
      number = here;
    }
    const bin = bins.at(-1);
    if (!bin) continue;
    bin.lnF += lnF;
    bin.re += misfit.re[i] ?? 0;
    bin.im += misfit.im[i] ?? 0;
    bin.count += 1;
  }
  return bins;
}

/** Every k-th row, so that a first rough fit of a very long sweep costs no more than that of a short one. */
export function thinnedRows(data: SweepData): FitRows {
  const n = data.re.length;
  if (n <= MOST_ROWS) return plainRows(data, new Uint8Array(n).fill(1));
  const rows: number[] = [];
  let last = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < n; i += 1) {
    const position = Math.log2(data.grid.frequencyHz[i] ?? 1) * BINS_PER_OCTAVE;
    if (position - last < 1) continue;
    rows.push(i);
    last = position;
  }
  const pick = (values: Float64Array): Float64Array => Float64Array.from(rows, (row) => values[row] ?? 0);
  return {
    data: {
      grid: frequencyGrid(pick(data.grid.frequencyHz)),
      hasPhase: data.hasPhase,
      re: pick(data.re),
      im: pick(data.im),
      logMagnitude: pick(data.logMagnitude),
      phaseRad: pick(data.phaseRad),
    },
    counts: new Float64Array(rows.length).fill(1),
  };
}
