import { peaksOf } from '../numerics/peaks.js';
import { median, runningMedian } from '../numerics/statistics.js';

/** A hump of |Z| inside the sweep. */
export interface Resonance {
  readonly index: number; // row of the largest |Z| near the top
  readonly frequencyHz: number;
  readonly prominence: number; // of ln|Z| over the higher of its two feet, nepers
}
export type CurveKind =
  | { readonly kind: 'driver'; readonly main: Resonance; readonly others: readonly Resonance[] }
  | { readonly kind: 'peak-outside-sweep'; readonly side: 'below' | 'above' }
  | { readonly kind: 'not-a-driver' };

const BINS_PER_OCTAVE = 48; // a peak of Q 30 is still two bins wide
const LEAST_PROMINENCE = 0.03; // nepers: smaller humps are noise or defects, not a driver's resonance
const SECOND_PROMINENCE = 0.12; // nepers: what a box's second peak keeps at least

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
  const humps = prominentMaxima(binned)
    .map((hump) => atHighestRow(hump, binned, frequencyHz, magnitudeOhm))
    .sort((a, b) => b.prominence - a.prominence);
  const [main, ...rest] = humps;
  if (main) {
    const others = rest.filter(({ prominence, frequencyHz: f }) => {
      const ratio = Math.max(f, main.frequencyHz) / Math.min(f, main.frequencyHz);
      return prominence > SECOND_PROMINENCE && ratio > 1.15 && ratio < 8;
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
}

function medianBins(frequencyHz: Float64Array, magnitudeOhm: Float64Array): Binned {
  const binned: Binned = { lnF: [], lnZ: [], firstRow: [], lastRow: [] };
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
  return { ...binned, lnZ: Array.from(runningMedian(binned.lnZ, 1)) };
}

function prominentMaxima({ lnZ }: Binned): { bin: number; prominence: number }[] {
  return peaksOf(lnZ)
    .filter(({ prominence }) => prominence > LEAST_PROMINENCE)
    .map(({ index, prominence }) => ({ bin: index, prominence }));
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
