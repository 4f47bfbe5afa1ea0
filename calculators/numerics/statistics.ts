/** Arithmetic mean; NaN of nothing. */
export function mean(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i]!;
  return sum / values.length;
}

/** Standard deviation of a sample (divisor n − 1). */
export function standardDeviation(values: ArrayLike<number>): number {
  const centre = mean(values);
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += (values[i]! - centre) ** 2;
  return Math.sqrt(sum / (values.length - 1));
}

/** √(mean of squares). */
export function rootMeanSquare(values: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < values.length; i++) sum += values[i]! * values[i]!;
  return Math.sqrt(sum / values.length);
}

/** Median; the mean of the two middle values for an even number. NaN of nothing. */
export function median(values: ArrayLike<number>): number {
  return medianInPlace(Float64Array.from(values));
}

/** Median that sorts the array it is given: for buffers that are thrown away. */
export function medianInPlace(values: Float64Array): number {
  if (values.length === 0) return Number.NaN;
  values.sort();
  const middle = values.length >> 1;
  return values.length % 2 === 1 ? values[middle]! : 0.5 * (values[middle - 1]! + values[middle]!);
}

/** Quantile by linear interpolation between order statistics (type 7 of Hyndman and Fan 1996), 0 ≤ q ≤ 1. */
export function quantile(values: ArrayLike<number>, q: number): number {
  const sorted = Float64Array.from(values).sort();
  if (sorted.length === 0) return Number.NaN;
  const at = Math.min(Math.max(q, 0), 1) * (sorted.length - 1);
  const low = Math.floor(at);
  const high = Math.min(low + 1, sorted.length - 1);
  return sorted[low]! + (at - low) * (sorted[high]! - sorted[low]!);
}

/** 1.4826 = 1/Φ⁻¹(¾): the median absolute deviation times this estimates σ of normal values. */
export const MAD_TO_SIGMA = 1.482602218505602;
/** √(2 ln 2): the median of |a + jb| is this times σ where a and b are independent normal values of deviation σ. */
export const COMPLEX_MEDIAN_TO_SIGMA = 1.1774100225154747;

/** σ of real residuals, robust: 1.4826 × median |r − median r|. */
export function robustSigma(values: ArrayLike<number>): number {
  const centre = median(values);
  return MAD_TO_SIGMA * medianInPlace(Float64Array.from(values, (value) => Math.abs(value - centre)));
}

/** σ per component of complex residuals about 0, robust: median |ρ| / 1.1774. */
export function robustComplexSigma(re: ArrayLike<number>, im: ArrayLike<number>): number {
  return medianInPlace(Float64Array.from(re, (value, i) => Math.hypot(value, im[i]!))) / COMPLEX_MEDIAN_TO_SIGMA;
}

/** Running median over 2·half + 1 points, narrower at the ends; shape (n). */
export function runningMedian(values: ArrayLike<number>, half: number): Float64Array {
  const n = values.length;
  const out = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    const reach = Math.min(half, i, n - 1 - i);
    const window = new Float64Array(2 * reach + 1);
    for (let k = -reach; k <= reach; k++) window[k + reach] = values[i + k]!;
    out[i] = medianInPlace(window);
  }
  return out;
}
