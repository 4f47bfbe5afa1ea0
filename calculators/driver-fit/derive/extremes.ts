/** |Z|² of a curve at ln f. */
export type SquaredMagnitude = (lnF: number) => number;
export interface Extreme {
  readonly lnF: number;
  readonly ohm: number; // |Z| there
  readonly isInside: boolean; // false where it lies on the end of the range
}

const GOLDEN = (Math.sqrt(5) - 1) / 2;
const SCAN_STEPS = 48;

/**
 * Largest (sign 1) or smallest (sign −1) |Z| between two frequencies: a scan in equal steps of ln f, then a
 * golden-section search and a last parabola around the best step (common practice, no published source).
 */
export function extremeOf(curve: SquaredMagnitude, lnLow: number, lnHigh: number, sign: 1 | -1): Extreme {
  const step = (lnHigh - lnLow) / SCAN_STEPS;
  let best = lnLow;
  let bestValue = Number.NEGATIVE_INFINITY;
  for (let i = 0; i <= SCAN_STEPS; i += 1) {
    const value = sign * curve(lnLow + i * step);
    if (value > bestValue) {
      bestValue = value;
      best = lnLow + i * step;
    }
  }
  let [low, high] = [Math.max(lnLow, best - step), Math.min(lnHigh, best + step)];
  while (high - low > 1e-4) {
    const left = high - GOLDEN * (high - low);
    const right = low + GOLDEN * (high - low);
    if (sign * curve(left) > sign * curve(right)) high = right;
    else low = left;
  }
  const centre = Math.min(lnHigh, Math.max(lnLow, refined(curve, (low + high) / 2, 1e-3)));
  const isInside = centre > lnLow + 2e-4 && centre < lnHigh - 2e-4;
  const lnF = isInside ? centre : Math.abs(centre - lnLow) < Math.abs(lnHigh - centre) ? lnLow : lnHigh;
  return { lnF, ohm: Math.sqrt(curve(lnF)), isInside };
}

/**
 * The extreme again after a small change of the curve: one parabola around where it was. Smooth in every parameter of
 * the curve, so that its derivatives by differences are sound; an extreme on an end stays there.
 */
export function extremeNear(curve: SquaredMagnitude, before: Extreme): Extreme {
  const lnF = before.isInside ? refined(curve, before.lnF, 3e-3) : before.lnF;
  return { lnF, ohm: Math.sqrt(curve(lnF)), isInside: before.isInside };
}

/** Turning point of the parabola through three points of ln|Z|² around a place; the place itself where there is none. */
function refined(curve: SquaredMagnitude, lnF: number, step: number): number {
  const [left, middle, right] = [curve(lnF - step), curve(lnF), curve(lnF + step)].map(Math.log) as [
    number,
    number,
    number,
  ];
  const curvature = left - 2 * middle + right;
  if (curvature === 0) return lnF;
  const shift = (0.5 * (left - right)) / curvature;
  return Math.abs(shift) < 4 ? lnF + shift * step : lnF;
}
