import { effectiveCount } from '../../numerics/autocorrelation.js';
import type { ComplexArray } from '../../numerics/complex-array.js';
import type { FitRows } from './fit-rows.js';

/** How far the misfit is from white noise. */
export interface ResidualStructure {
  readonly isStructured: boolean;
  readonly pointsPerEffective: number; // τ ≥ 1: N/τ points would tell as much if their noise were white
  readonly lagOne: number; // correlation of neighbouring points
  readonly waves: number; // relative rms of one component, of the part that is no white noise
  readonly excess: number; // variance of averages over about 1/12 octave, against that of white noise
}
export const WHITE: ResidualStructure = { isStructured: false, pointsPerEffective: 1, lagOne: 0, waves: 0, excess: 1 };

/** The same for the rows of a fit: those left out are skipped, averaged ones weigh by √count. */
export function structureOfRows(
  { data, counts }: FitRows,
  { re, im }: ComplexArray,
  parameters: number,
): ResidualStructure {
  const rows = Array.from(counts.keys()).filter((row) => (counts[row] ?? 0) > 0);
  const weighted = (values: Float64Array): Float64Array =>
    Float64Array.from(rows, (row) => (values[row] ?? 0) * Math.sqrt(counts[row] ?? 0));
  const frequencyHz = Float64Array.from(rows, (row) => data.grid.frequencyHz[row] ?? 0);
  const misfit = { re: weighted(re), im: weighted(im) };
  return residualStructure(frequencyHz, misfit, data.hasPhase ? 2 : 1, parameters);
}

const BINS_PER_OCTAVE = 12;
const SIGNIFICANT = 4.5; // standard deviations: by chance once in 150,000 fits
const FLOOR = 1e-4; // relative misfit below which structure is beyond every instrument, and moves no figure

/**
 * Tests ρ for correlation along ln f in two ways: between neighbouring points, and between neighbouring averages over
 * 1/12 octave (slow waves of a model that does not quite fit). Where either is significant, τ = 1 + 2Σ r_k. Common
 * practice, no published source.
 * Shapes: frequencyHz (n) rising, misfit (n) in units of its noise or relative; components 2 with phase, 1 without.
 */
export function residualStructure(
  frequencyHz: Float64Array,
  misfit: ComplexArray,
  components: 1 | 2,
  parameters: number,
): ResidualStructure {
  const n = frequencyHz.length;
  const power = sumOfProducts(misfit, 0);
  if (n < 4 * BINS_PER_OCTAVE || Math.sqrt(power / n) < FLOOR) return WHITE;
  const lagOne = sumOfProducts(misfit, 1) / power;
  const bins = binned(frequencyHz, misfit);
  const binPower = sumOfProducts(bins.values, 0);
  const binLagOne = sumOfProducts(bins.values, 1) / binPower;
  const white = whiteVariance(misfit, components);
  const degrees = Math.max(components * bins.values.re.length - parameters, 1);
  const excess = binPower / degrees / white;
  const scores = [
    lagOne * Math.sqrt(components * n),
    binLagOne * Math.sqrt(components * bins.values.re.length),
    (excess - 1) / Math.sqrt(2 / degrees + 3 / (components * n)),
  ];
  if (!(Math.max(...scores) > SIGNIFICANT)) return { ...WHITE, lagOne, excess };
  const tau = effectiveCount(misfit.re, misfit.im).factor;
  const waves = Math.sqrt(Math.max(power / (components * n) - white, 0));
  return { isStructured: true, pointsPerEffective: tau, lagOne, waves, excess };
}

/** Variance per component of white noise, from first differences: blind to slow waves. */
function whiteVariance({ re, im }: ComplexArray, components: 1 | 2): number {
  let sum = 0;
  for (let i = 1; i < re.length; i += 1)
    sum += ((re[i] ?? 0) - (re[i - 1] ?? 0)) ** 2 + ((im[i] ?? 0) - (im[i - 1] ?? 0)) ** 2;
  return sum / (2 * components * (re.length - 1));
}

/** Averages over bins of ln f, each times √count, so that white noise keeps its variance. */
function binned(frequencyHz: Float64Array, { re, im }: ComplexArray): { values: ComplexArray } {
  const sums: { re: number; im: number; count: number; bin: number }[] = [];
  for (let i = 0; i < frequencyHz.length; i += 1) {
    const bin = Math.floor(Math.log2(frequencyHz[i] ?? 1) * BINS_PER_OCTAVE);
    let last = sums.at(-1);
    if (last?.bin !== bin) {
      last = { re: 0, im: 0, count: 0, bin };
      sums.push(last);
    }
    last.re += re[i] ?? 0;
    last.im += im[i] ?? 0;
    last.count += 1;
  }
  return {
    values: {
      re: Float64Array.from(sums, (sum) => sum.re / Math.sqrt(sum.count)),
      im: Float64Array.from(sums, (sum) => sum.im / Math.sqrt(sum.count)),
    },
  };
}

function sumOfProducts({ re, im }: ComplexArray, lag: number): number {
  let sum = 0;
  for (let i = lag; i < re.length; i += 1) sum += (re[i] ?? 0) * (re[i - lag] ?? 0) + (im[i] ?? 0) * (im[i - lag] ?? 0);
  return sum;
}
