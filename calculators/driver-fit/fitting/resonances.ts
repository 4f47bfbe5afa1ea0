import { peaksOf } from '../../numerics/peaks.js';
import { MAD_TO_SIGMA, median, runningMedian } from '../../numerics/statistics.js';

/** A hump of |Z| inside the sweep. */
export interface Resonance {
  readonly index: number; // row of the largest |Z| near the top
  readonly frequencyHz: number;
  readonly prominence: number; // of ln|Z| over the higher of its two feet, nepers
}
export type CurveKind =
  | { readonly kind: 'driver'; readonly main: Resonance; readonly others: readonly Resonance[] }
  | { readonly kind: 'peak-outside-sweep'; readonly side: 'below' | 'above' }
  | { readonly kind: 'phase-sign-flipped'; readonly main: Resonance }
  | { readonly kind: 'not-a-driver' };

const BINS_PER_OCTAVE = 48; // a peak of Q 30 is still two bins wide
const LEAST_PROMINENCE = 0.03; // nepers: smaller humps are noise or defects, not a driver's resonance
const SECOND_PROMINENCE = 0.12; // nepers: what a box's second peak keeps at least
const ABOVE_NOISE = 6; // times the noise of the filtered curve
const MEDIAN_OF_THREE = 0.67; // standard deviation of the median of three normal values, in theirs

/**
 * What the curve of |Z| is: one or more humps of ln|Z| after a median filter (common practice, no published source),
 * the most prominent first; a flank of one at an end of the sweep; or neither.
 * Shapes: frequencyHz (n) rising, magnitudeOhm (n), imaginaryOhm (n) or absent.
 */
export function curveKind(
  frequencyHz: Float64Array,
  magnitudeOhm: Float64Array,
  imaginaryOhm?: Float64Array,
): CurveKind {
  const binned = medianBins(frequencyHz, magnitudeOhm);
  const noise = ABOVE_NOISE * binned.noise;
  const humps = prominentMaxima(binned, Math.max(LEAST_PROMINENCE, noise))
    .map((hump) => atHighestRow(hump, binned, frequencyHz, magnitudeOhm))
    .sort((a, b) => b.prominence - a.prominence);
  const [main, ...rest] = humps;
  if (main) {
    if (imaginaryOhm && runsBackwards(main, frequencyHz, imaginaryOhm)) return { kind: 'phase-sign-flipped', main };
    const others = rest.filter(({ prominence, frequencyHz: f }) => {
      const ratio = Math.max(f, main.frequencyHz) / Math.min(f, main.frequencyHz);
      return prominence > Math.max(SECOND_PROMINENCE, noise) && ratio > 1.15 && ratio < 8;
    });
    return { kind: 'driver', main, others };
  }
  return flankKind(binned, imaginaryOhm);
}

interface Binned {
  readonly lnF: number[];
  readonly lnZ: number[];
  readonly firstRow: number[];
  readonly lastRow: number[];
  readonly noise: number; // σ of lnZ
}

function medianBins(frequencyHz: Float64Array, magnitudeOhm: Float64Array): Binned {
  const binned: Omit<Binned, 'noise'> = { lnF: [], lnZ: [], firstRow: [], lastRow: [] };
  let row = 0;
  while (row < frequencyHz.length) {
    const bin = Math.floor(Math.log2(frequencyHz[row] ?? 1) * BINS_PER_OCTAVE);
    let end = row;
    while (end + 1 < frequencyHz.length && Math.floor(Math.log2(frequencyHz[end + 1] ?? 1) * BINS_PER_OCTAVE) === bin) {
      end += 1;
    }
    const middle = (row + end) >> 1;
    binned.lnF.push(Math.log(frequencyHz[middle] ?? 1));
    binned.lnZ.push(Math.log(median(magnitudeOhm.subarray(row, end + 1))));
    binned.firstRow.push(row);
    binned.lastRow.push(end);
    row = end + 1;
  }
  const noise = MEDIAN_OF_THREE * noiseOf(binned.lnZ);
  return { ...binned, lnZ: Array.from(runningMedian(binned.lnZ, 1)), noise };
}

function prominentMaxima({ lnZ }: Binned, least: number): { bin: number; prominence: number }[] {
  return peaksOf(lnZ)
    .filter(({ prominence }) => prominence > least)
    .map(({ index, prominence }) => ({ bin: index, prominence }));
}

/** σ of ln|Z| from its second differences, robust: a resonance bends over many bins, noise over one. */
function noiseOf(lnZ: readonly number[]): number {
  const bends = lnZ.slice(2).map((value, i) => Math.abs(value - 2 * (lnZ[i + 1] ?? 0) + (lnZ[i] ?? 0)));
  return bends.length === 0 ? 0 : (MAD_TO_SIGMA * median(bends)) / Math.sqrt(6);
}

/**
 * A driver is inductive below its resonance and capacitive above it. Where the reactance runs the other way on both
 * sides, within a factor of 1.6, the file counts capacitive phase as positive.
 */
function runsBackwards(
  { frequencyHz: peakHz }: Resonance,
  frequencyHz: Float64Array,
  imaginaryOhm: Float64Array,
): boolean {
  let [below, above, size] = [0, 0, 0];
  for (const [i, f] of frequencyHz.entries()) {
    if (f < peakHz / 1.6 || f > peakHz * 1.6) continue;
    const x = imaginaryOhm[i] ?? 0;
    size += Math.abs(x);
    if (f < peakHz) below += x;
    else above += x;
  }
  return below < -0.1 * size && above > 0.1 * size;
}

function atHighestRow(
  { bin, prominence }: { bin: number; prominence: number },
  { firstRow, lastRow, lnZ }: Binned,
  frequencyHz: Float64Array,
  magnitudeOhm: Float64Array,
): Resonance {
  const from = firstRow[Math.max(0, bin - 1)] ?? 0;
  const to = lastRow[Math.min(lastRow.length - 1, bin + 1)] ?? 0;
  const ceiling = Math.exp(lnZ[bin] ?? 0) * 1.5; // a single row above that is a wild point, not the top
  let index = from;
  let highest = 0;
  for (let row = from; row <= to; row += 1) {
    const value = magnitudeOhm[row] ?? 0;
    if (value > highest && value < ceiling) {
      highest = value;
      index = row;
    }
  }
  return { index, frequencyHz: frequencyHz[index] ?? 0, prominence };
}

/**
 * Without a hump inside: |Z| that starts high and falls to a floor (capacitive, but never to −90° as a capacitor) is
 * the upper flank of a resonance below the sweep; |Z| that rises ever steeper to the upper end and turns real there is
 * the lower flank of one above. Everything else is a part, a network or nothing.
 */
function flankKind({ lnF, lnZ }: Binned, imaginaryOhm: Float64Array | undefined): CurveKind {
  const first = lnZ[0] ?? 0;
  const last = lnZ.at(-1) ?? 0;
  const floor = Math.min(...lnZ);
  const fall = first - floor;
  const floorAt = lnZ.indexOf(floor);
  const isCapacitorLike = fall > Math.log(60) || floorAt === lnZ.length - 1;
  const startsCapacitive = imaginaryOhm ? (imaginaryOhm[0] ?? 0) < 0 : true;
  if (fall > LEAST_PROMINENCE * 2 && startsCapacitive && !isCapacitorLike) {
    return { kind: 'peak-outside-sweep', side: 'below' };
  }
  const rise = last - first;
  const before = Math.max(0, lnZ.length - 1 - Math.max(1, lnZ.length >> 3));
  const endSlope = (last - (lnZ[before] ?? 0)) / ((lnF.at(-1) ?? 1) - (lnF[before] ?? 0)); // 1 for an inductor
  if (rise > Math.log(1.5) && endSlope > 1.3) return { kind: 'peak-outside-sweep', side: 'above' };
  return { kind: 'not-a-driver' };
}
