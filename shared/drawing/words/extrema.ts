/** Peaks and dips of a curve as a person would point at them: by how far they stand out of their surroundings. */
export interface Extremum {
  readonly index: number;
  readonly kind: 'peak' | 'dip';
  readonly prominence: number; // in the units of the values given
}

/**
 * Peaks and dips of `values` (n), with a prominence of at least `least`, in order of index. Prominence of a peak: its
 * height above the higher of the two lowest values that separate it from higher ground (common definition of
 * topographic prominence); of a dip: the same with signs turned. Ends of the curve are neither.
 */
export function extremaOf(values: Float64Array, least: number): Extremum[] {
  const peaks = peaksOf(values, least).map((e): Extremum => ({ ...e, kind: 'peak' }));
  const dips = peaksOf(
    values.map((v) => -v),
    least,
  ).map((e): Extremum => ({ ...e, kind: 'dip' }));
  return [...peaks, ...dips].sort((a, b) => a.index - b.index);
}

function peaksOf(values: Float64Array, least: number): { index: number; prominence: number }[] {
  const left = lowestUpToHigher(values);
  const right = lowestUpToHigher(values.toReversed()).toReversed();
  const found: { index: number; prominence: number }[] = [];
  for (let i = 1; i < values.length - 1; i += 1) {
    const value = values[i] ?? Number.NaN;
    if (!(value > (values[i - 1] ?? value)) || !(value >= (values[i + 1] ?? value))) continue;
    const prominence = value - Math.max(left[i] ?? value, right[i] ?? value);
    if (prominence >= least) found.push({ index: i, prominence });
  }
  return found;
}

/** For each value the lowest one between it and the nearest higher one on its left (or the start), shape (n); O(n). */
function lowestUpToHigher(values: Float64Array): Float64Array {
  const lowest = new Float64Array(values.length);
  const stack: number[] = []; // indices with falling values
  for (let i = 0; i < values.length; i += 1) {
    const value = values[i] ?? Number.NaN;
    let low = value;
    while (stack.length > 0) {
      const top = stack[stack.length - 1] ?? 0;
      if ((values[top] ?? 0) > value) break;
      low = Math.min(low, lowest[top] ?? low);
      stack.pop();
    }
    lowest[i] = low;
    stack.push(i);
  }
  return lowest;
}

/** Peaks and dips of |Z| worth a stop of the cursor: they stand out by 4 % or more, so that noise is passed over. */
const WORTH_A_STOP = Math.log(1.04);
const kept = new WeakMap<Float64Array, Extremum[]>();
export function impedanceExtrema(lnMagnitude: Float64Array): Extremum[] {
  const known = kept.get(lnMagnitude);
  if (known) return known;
  const found = extremaOf(lnMagnitude, WORTH_A_STOP);
  kept.set(lnMagnitude, found);
  return found;
}
