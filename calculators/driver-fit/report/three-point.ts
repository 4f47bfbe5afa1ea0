/** The trade's definition method: the peak and the two frequencies at its flanks, as read off a plot by hand. */
export interface ThreePoint {
  readonly fsHz: number; // of the peak of |Z|
  readonly f1Hz: number; // |Z| = Re·√r0 below the peak
  readonly f2Hz: number; // the same above it
  readonly zMaxOhm: number;
  readonly reOhm: number; // as given
  readonly r0: number; // Zmax/Re
  readonly qms: number;
  readonly qes: number;
  readonly qts: number;
  readonly flanksHz: number; // √(f1·f2): equals fs for a coil without inductance
}

/**
 * r0 = Zmax/Re; f1 < fs < f2 where |Z| = Re·√r0; Qms = fs·√r0/(f2 − f1), Qes = Qms/(r0 − 1), Qts = Qms/r0.
 * Source: R. H. Small, "Direct-Radiator Loudspeaker System Analysis", J. Audio Eng. Soc. 20 (1972) 383, appendix
 * (from memory); the total Q agrees with IEC 60268-5:2003, 16.3 (from memory).
 * Shapes: frequencyHz (n) rising, magnitudeOhm (n). `peakIndex` is the row of the resonance's top. Null where a flank
 * is not reached inside the sweep, or where the peak does not rise above Re.
 */
export function threePoint(
  frequencyHz: Float64Array,
  magnitudeOhm: Float64Array,
  reOhm: number,
  peakIndex: number,
): ThreePoint | null {
  const { fsHz, zMaxOhm } = topOf(frequencyHz, magnitudeOhm, peakIndex);
  const r0 = zMaxOhm / reOhm;
  if (!(r0 > 1) || !(reOhm > 0)) return null;
  const level = reOhm * Math.sqrt(r0);
  const f1Hz = crossing(frequencyHz, magnitudeOhm, peakIndex, level, -1);
  const f2Hz = crossing(frequencyHz, magnitudeOhm, peakIndex, level, 1);
  if (f1Hz === null || f2Hz === null) return null;
  const qms = (fsHz * Math.sqrt(r0)) / (f2Hz - f1Hz);
  return {
    fsHz,
    f1Hz,
    f2Hz,
    zMaxOhm,
    reOhm,
    r0,
    qms,
    qes: qms / (r0 - 1),
    qts: qms / r0,
    flanksHz: Math.sqrt(f1Hz * f2Hz),
  };
}

/**
 * Top of the peak: a parabola of 1/|Z|² over ln f (what a single resonance is near its top) through the points above 98 %
 * of the highest, or above 93 % where those are fewer than nine; three at least.
 */
function topOf(frequencyHz: Float64Array, magnitudeOhm: Float64Array, peak: number): { fsHz: number; zMaxOhm: number } {
  const highest = magnitudeOhm[peak] ?? 0;
  const narrow = rowsAbove(magnitudeOhm, peak, 0.98 * highest);
  const [low, high] = narrow.high - narrow.low < 8 ? wide(magnitudeOhm, peak, highest) : [narrow.low, narrow.high];
  const centre = Math.log(frequencyHz[peak] ?? 1);
  const x: number[] = [];
  const y: number[] = [];
  for (let i = low; i <= high; i += 1) {
    x.push(Math.log(frequencyHz[i] ?? 1) - centre);
    y.push((highest / (magnitudeOhm[i] ?? 1)) ** 2);
  }
  const { offset, slope, curvature } = parabola(x, y);
  const turn = curvature > 0 ? -slope / (2 * curvature) : Number.NaN;
  const isInside = turn >= (x[0] ?? 0) && turn <= (x.at(-1) ?? 0);
  if (!isInside) return { fsHz: Math.exp(centre), zMaxOhm: highest };
  return {
    fsHz: Math.exp(centre + turn),
    zMaxOhm: highest / Math.sqrt(offset + slope * turn + curvature * turn * turn),
  };
}

function wide(magnitudeOhm: Float64Array, peak: number, highest: number): [number, number] {
  const { low, high } = rowsAbove(magnitudeOhm, peak, 0.93 * highest);
  return [Math.max(0, Math.min(low, peak - 1)), Math.min(magnitudeOhm.length - 1, Math.max(high, peak + 1))];
}

function rowsAbove(magnitudeOhm: Float64Array, peak: number, levelOhm: number): { low: number; high: number } {
  let [low, high] = [peak, peak];
  while (low > 0 && (magnitudeOhm[low - 1] ?? 0) > levelOhm) low -= 1;
  while (high < magnitudeOhm.length - 1 && (magnitudeOhm[high + 1] ?? 0) > levelOhm) high += 1;
  return { low, high };
}

/** Least-squares parabola y = offset + slope·x + curvature·x² through n ≥ 3 points, by Cramer's rule. */
function parabola(x: readonly number[], y: readonly number[]): { offset: number; slope: number; curvature: number } {
  let [n, s1, s2, s3, s4, t0, t1, t2] = [0, 0, 0, 0, 0, 0, 0, 0];
  for (const [i, xi] of x.entries()) {
    const yi = y[i] ?? 0;
    const square = xi * xi;
    n += 1;
    s1 += xi;
    s2 += square;
    s3 += square * xi;
    s4 += square * square;
    t0 += yi;
    t1 += xi * yi;
    t2 += square * yi;
  }
  const determinant = n * (s2 * s4 - s3 * s3) - s1 * (s1 * s4 - s2 * s3) + s2 * (s1 * s3 - s2 * s2);
  return {
    offset: (t0 * (s2 * s4 - s3 * s3) - s1 * (t1 * s4 - s3 * t2) + s2 * (t1 * s3 - s2 * t2)) / determinant,
    slope: (n * (t1 * s4 - s3 * t2) - t0 * (s1 * s4 - s2 * s3) + s2 * (s1 * t2 - s2 * t1)) / determinant,
    curvature: (n * (s2 * t2 - s3 * t1) - s1 * (s1 * t2 - s2 * t1) + t0 * (s1 * s3 - s2 * s2)) / determinant,
  };
}

/** Frequency where |Z| first falls to the level on the way from the peak, straight in ln f and ln|Z|; null if never. */
function crossing(
  frequencyHz: Float64Array,
  magnitudeOhm: Float64Array,
  peak: number,
  levelOhm: number,
  step: 1 | -1,
): number | null {
  for (let i = peak + step; i >= 0 && i < frequencyHz.length; i += step) {
    const outer = magnitudeOhm[i] ?? 0;
    const inner = magnitudeOhm[i - step] ?? 0;
    if (outer > levelOhm) continue;
    const share = Math.log(inner / levelOhm) / Math.log(inner / outer);
    const lnInner = Math.log(frequencyHz[i - step] ?? 1);
    return Math.exp(lnInner + share * (Math.log(frequencyHz[i] ?? 1) - lnInner));
  }
  return null;
}
