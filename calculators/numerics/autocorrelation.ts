/**
 * Autocorrelation r_k of a series about 0, lags 0 … most: Σ xᵢxᵢ₊ₖ / Σ xᵢ². With `im`, of a complex series (real part).
 * All 0 behind lag 0 where the series vanishes.
 */
export function autocorrelation(re: ArrayLike<number>, most: number, im?: ArrayLike<number>): Float64Array {
  const n = re.length;
  const out = new Float64Array(Math.min(most, n - 1) + 1);
  let power = 0;
  for (let i = 0; i < n; i++) power += re[i]! * re[i]! + (im ? im[i]! * im[i]! : 0);
  out[0] = 1;
  if (!(power > 0)) return out;
  for (let k = 1; k < out.length; k++) {
    let sum = 0;
    for (let i = 0; i + k < n; i++) sum += re[i]! * re[i + k]! + (im ? im[i]! * im[i + k]! : 0);
    out[k] = sum / power;
  }
  return out;
}

export interface EffectiveCount {
  readonly points: number; // n / factor
  readonly factor: number; // 1 + 2Σr_k, at least 1: by how much the variance of a fitted value grows
  readonly lagOne: number;
}

/**
 * How many independent points a correlated residual is worth: n/(1 + 2Σ r_k), the sum cut off where the sum of two neighbouring
 * terms turns negative (initial positive sequence; C. J. Geyer, "Practical Markov Chain Monte Carlo", Statistical Science 7,
 * 1992, from memory) and at a quarter of the series.
 */
export function effectiveCount(re: ArrayLike<number>, im?: ArrayLike<number>): EffectiveCount {
  const n = re.length;
  const r = autocorrelation(re, Math.max(1, n >> 2), im);
  let sum = 0;
  for (let k = 1; k + 1 < r.length; k += 2) {
    const pair = r[k]! + r[k + 1]!;
    if (pair <= 0) break;
    sum += pair;
  }
  const factor = Math.max(1, 1 + 2 * sum);
  return { points: n / factor, factor, lagOne: r[1] ?? 0 };
}
