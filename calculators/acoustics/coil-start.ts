import type { ComplexArray } from '../numerics/complex-array.js';
import type { FrequencyGrid } from './frequency-grid.js';
import { type CoilModel, coilParameters, NO_SHUNT } from './voice-coil.js';

/** The coil's part of a curve: what is left of Z when Re and the resonance are taken off. Shapes (m). */
export interface CoilRemainder {
  readonly coilGrid: FrequencyGrid;
  readonly coilOhm: ComplexArray;
  readonly inductiveOhm: ComplexArray; // as a coil without losses would have it; differs only where there is no phase
  readonly coilWeight: Float64Array; // 1/|Z|
}

/**
 * Starting values of the coil's parameters, in closed form: straight lines in logarithms for the power laws; for the
 * models with a corner frequency, a linear least-squares fit of the two amplitudes for each of a row of corners.
 */
export function coilStart(model: CoilModel, remainder: CoilRemainder): number[] {
  const values = START[model](remainder);
  return coilParameters(model).map(({ lower = 0, upper = Number.POSITIVE_INFINITY }, k) => {
    const value = values[k]!;
    return Number.isFinite(value) ? Math.min(Math.max(value, 2 * lower), 0.98 * upper) : Math.sqrt(lower * upper);
  });
}

const START: Readonly<Record<CoilModel, (remainder: CoilRemainder) => number[]>> = {
  inductor: ({ coilGrid: { omega }, inductiveOhm, coilWeight }) => {
    let top = 0;
    let bottom = 0;
    for (let i = 0; i < omega.length; i++) {
      const w2 = coilWeight[i]! * coilWeight[i]!;
      top += w2 * omega[i]! * inductiveOhm.im[i]!;
      bottom += w2 * omega[i]! * omega[i]!;
    }
    return [top / bottom];
  },
  'power-law': (remainder) => {
    const sizes = remainder.coilOhm.re.map((re, i) =>
      Math.hypot(Math.max(re, 0), Math.max(remainder.coilOhm.im[i]!, 0)),
    );
    const [amplitude, slope] = powerLine(remainder, sizes);
    return [amplitude, Math.min(Math.max(slope, 0.3), 0.97)];
  },
  'split-power-law': (remainder) => {
    const [kr, xr] = powerLine(remainder, remainder.coilOhm.re);
    const [ki, xi] = powerLine(remainder, remainder.coilOhm.im);
    const tilt = remainder.inductiveOhm === remainder.coilOhm ? 0 : 0.1; // losses rise faster than reactance, as a rule
    return [kr, Math.min(Math.max(xr + tilt, 0.2), 1.8), ki, Math.min(Math.max(xi - tilt, 0.3), 1)];
  },
  'inductor+eddy': (remainder) => {
    const { l1, second, corner } = bestCorner(remainder, remainder.inductiveOhm, (w, corner) => {
      const t = w / corner; // second amplitude R2: jt/(1 + jt)
      return [(t * t) / (1 + t * t), t / (1 + t * t)];
    });
    return [l1, second / corner, second];
  },
  'semi-inductance': (remainder) => {
    const { l1, second, corner } = bestCorner(remainder, remainder.coilOhm, (w, corner) => {
      const yRe = Math.SQRT1_2 / Math.sqrt(w); // second amplitude K: 1/(√corner/(jω) + 1/√(jω))
      const yIm = -Math.SQRT1_2 / Math.sqrt(w) - Math.sqrt(corner) / w;
      const size = 1 / (yRe * yRe + yIm * yIm);
      return [yRe * size, -yIm * size];
    });
    return withShunt([l1, second / Math.sqrt(corner), second, NO_SHUNT], 0.1);
  },
};

/**
 * Coil values of semi-inductance without Rss turned into ones with it, the curve unchanged to first order: a start from which a
 * fit can find out whether the curve asks for Rss. `share` = Gss·K²/Le, 0.05 to 0.3.
 */
export function withShunt([leb, le, k]: readonly number[], share: number): number[] {
  const q = (k! * k!) / le!;
  const gss = share / q;
  return [leb! + gss * k! * k!, le! * Math.exp(-share), k! * Math.exp(-2 * share), gss];
}

/** Weighted straight line of ln(part) over ln(ω/ω0) through the positive values: [part at 1 kHz, slope]. */
function powerLine({ coilGrid: { logOmegaRatio }, coilWeight }: CoilRemainder, part: Float64Array): [number, number] {
  let [s, sx, sy, sxx, sxy] = [0, 0, 0, 0, 0];
  for (let i = 0; i < part.length; i++) {
    const share = part[i]! * coilWeight[i]!;
    if (!(share > 0.003)) continue; // below, the remainder is noise and leftovers
    const w = share * share;
    const x = logOmegaRatio[i]!;
    const y = Math.log(part[i]!);
    s += w;
    sx += w * x;
    sy += w * y;
    sxx += w * x * x;
    sxy += w * x * y;
  }
  const spread = s * sxx - sx * sx;
  if (!(spread > 1e-9 * s * s)) return [s > 0 ? Math.exp(sy / s) : 1e-2, 0.7];
  const slope = (s * sxy - sx * sy) / spread;
  return [Math.exp((sy - slope * sx) / s), slope];
}

/** For each corner, the best non-negative pair (L1, second amplitude) of Z = jωL1 + second·shape; the best of all. */
function bestCorner(
  { coilGrid: { omega }, coilWeight }: CoilRemainder,
  coilOhm: ComplexArray,
  shape: (w: number, corner: number) => [number, number],
) {
  const low = omega[0]!;
  const high = omega[omega.length - 1]!;
  let best = { l1: 0, second: 0, corner: low, misfit: Number.POSITIVE_INFINITY };
  const corners = 16;
  for (let c = 0; c < corners; c++) {
    const corner = low * (high / low) ** (c / (corners - 1));
    let [aa, ab, bb, ay, by, yy] = [0, 0, 0, 0, 0, 0];
    for (let i = 0; i < omega.length; i++) {
      const w2 = coilWeight[i]! * coilWeight[i]!;
      const [re, im] = shape(omega[i]!, corner);
      const [zRe, zIm, x] = [coilOhm.re[i]!, coilOhm.im[i]!, omega[i]!];
      aa += w2 * x * x;
      ab += w2 * x * im;
      bb += w2 * (re * re + im * im);
      ay += w2 * x * zIm;
      by += w2 * (re * zRe + im * zIm);
      yy += w2 * (zRe * zRe + zIm * zIm);
    }
    const [l1, second] = nonNegativePair(aa, ab, bb, ay, by);
    const misfit = yy - 2 * (l1 * ay + second * by) + l1 * l1 * aa + 2 * l1 * second * ab + second * second * bb;
    if (misfit < best.misfit) best = { l1, second, corner, misfit };
  }
  return { ...best, l1: Math.max(best.l1, 1e-7), second: Math.max(best.second, 1e-5) };
}

function nonNegativePair(aa: number, ab: number, bb: number, ay: number, by: number): [number, number] {
  const determinant = aa * bb - ab * ab;
  if (determinant > 1e-12 * aa * bb) {
    const first = (ay * bb - by * ab) / determinant;
    const second = (by * aa - ay * ab) / determinant;
    if (first >= 0 && second >= 0) return [first, second];
  }
  const [alone, other] = [Math.max(ay / aa, 0), Math.max(by / bb, 0)];
  return alone * ay >= other * by ? [alone, 0] : [0, other];
}
