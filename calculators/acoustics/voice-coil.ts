import type { ComplexArray } from '../numerics/complex-array.js';
import type { FitParameter } from '../numerics/least-squares-problem.js';
import { type FrequencyGrid, REFERENCE_OMEGA } from './frequency-grid.js';

/**
 * Blocked impedance of a voice coil without its DC resistance, s = jω, time factor e^{+jωt}, in ohm:
 * inductor         sLe
 * inductor+eddy    sL1 + sL2 ∥ R2. M. Dodd, W. Klippel, J. Oclee-Brown, "Voice Coil Impedance as a Function of Frequency
 *                  and Displacement", 117th AES Convention, 2004 (number from memory)
 * power-law        K s^n. W. M. Leach, "Loudspeaker Voice-Coil Inductance Losses", J. Audio Eng. Soc. 50, 2002, p. 442
 * split-power-law  Kr ω^Xr + j Ki ω^Xi. J. R. Wright, "An Empirical Model for Loudspeaker Motor Impedance",
 *                  J. Audio Eng. Soc. 38, 1990, p. 749
 * semi-inductance  sLeb + (sLe ∥ K√s ∥ Rss). K. Thorborg, C. Futtrup, "Electrodynamic Transducer Model Incorporating
 *                  Semi-Inductance and Means for Shorting AC Magnetization", J. Audio Eng. Soc. 59, 2011, p. 612 (from memory)
 */
export const COIL_MODELS = ['inductor', 'inductor+eddy', 'power-law', 'split-power-law', 'semi-inductance'] as const;
export type CoilModel = (typeof COIL_MODELS)[number];

const LOG_REFERENCE = Math.log(REFERENCE_OMEGA);

const logged = (id: string, lower: number, upper: number): FitParameter => ({ id, logScaled: true, lower, upper });
const exponent = (id: string, lower: number, upper: number): FitParameter => ({ id, lower, upper, maxStep: 0.3 });

/**
 * Smallest conductance a fit may reach (Rss 100 kΩ); to leave Rss out, hold Gss at 0. A free one could not leave 0: with
 * q = K²/Le the change −P² of the parallel part P is there K²·jω − 2q·∂P/∂ln K − q·∂P/∂ln Le, what the others can do too.
 */
export const NO_SHUNT = 1e-5;

/**
 * What is fitted. H, ohm, ohm·s^½ (K of semi-inductance); K1k, Kr1k, Ki1k are the power laws' values in ohm at 1 kHz;
 * Gss = 1/Rss in siemens, because "no Rss" is then a bound and not a plateau without end.
 * Bounds are wide guards around what voice coils are made like (common practice, no published source).
 */
const PARAMETERS: Readonly<Record<CoilModel, readonly FitParameter[]>> = {
  inductor: [logged('Le', 1e-8, 1)],
  'inductor+eddy': [logged('L1', 1e-8, 1), logged('L2', 1e-8, 10), logged('R2', 1e-4, 1e5)],
  'power-law': [logged('K1k', 1e-5, 1e4), exponent('n', 0.05, 1)],
  'split-power-law': [
    logged('Kr1k', 1e-6, 1e4),
    exponent('Xr', 0.01, 2.5),
    logged('Ki1k', 1e-6, 1e4),
    exponent('Xi', 0.01, 1.5),
  ],
  'semi-inductance': [
    logged('Leb', 1e-9, 0.1),
    logged('Le', 1e-7, 10),
    logged('K', 1e-6, 100),
    logged('Gss', NO_SHUNT, 1e2),
  ],
};

export function coilParameters(model: CoilModel): readonly FitParameter[] {
  return PARAMETERS[model];
}

/**
 * Zcoil(ω) to `z` (n) and, where `derivatives` is given, ∂Zcoil/∂(scaled parameter) to its columns, in the order of
 * `coilParameters`. `values` holds the coil's parameters from index `at` on.
 */
export function coilImpedance(
  model: CoilModel,
  values: ArrayLike<number>,
  at: number,
  grid: FrequencyGrid,
  z: ComplexArray,
  derivatives?: readonly ComplexArray[],
): void {
  IMPEDANCES[model](values, at, grid, z, derivatives);
}

type Impedance = (
  values: ArrayLike<number>,
  at: number,
  grid: FrequencyGrid,
  z: ComplexArray,
  d?: readonly ComplexArray[],
) => void;

const inductor: Impedance = (values, at, { omega }, z, d) => {
  const le = values[at]!;
  for (let i = 0; i < omega.length; i++) {
    z.re[i] = 0;
    z.im[i] = omega[i]! * le;
    if (d) put(d[0]!, i, 0, omega[i]! * le);
  }
};

const inductorWithEddy: Impedance = (values, at, { omega }, z, d) => {
  const [l1, l2, r2] = [values[at]!, values[at + 1]!, values[at + 2]!];
  for (let i = 0; i < omega.length; i++) {
    const t = (omega[i]! * l2) / r2; // jωL2 ∥ R2 = R2 t(t + j)/(1 + t²)
    const s = r2 / (1 + t * t);
    const x1 = omega[i]! * l1;
    z.re[i] = s * t * t;
    z.im[i] = x1 + s * t;
    if (!d) continue;
    const cross = s / (1 + t * t);
    put(d[0]!, i, 0, x1);
    put(d[1]!, i, cross * 2 * t * t, cross * t * (1 - t * t));
    put(d[2]!, i, cross * t * t * (t * t - 1), cross * 2 * t * t * t);
  }
};

const powerLaw: Impedance = (values, at, { logOmegaRatio }, z, d) => {
  const [k, n] = [values[at]!, values[at + 1]!];
  const c = k * Math.cos((n * Math.PI) / 2);
  const s = k * Math.sin((n * Math.PI) / 2);
  for (let i = 0; i < logOmegaRatio.length; i++) {
    const lg = logOmegaRatio[i]!;
    const size = Math.exp(n * lg);
    const re = c * size;
    const im = s * size;
    z.re[i] = re;
    z.im[i] = im;
    if (!d) continue;
    put(d[0]!, i, re, im);
    put(d[1]!, i, re * lg - (im * Math.PI) / 2, im * lg + (re * Math.PI) / 2); // × (ln ω/ω0 + jπ/2)
  }
};

const splitPowerLaw: Impedance = (values, at, { logOmegaRatio }, z, d) => {
  const [kr, xr, ki, xi] = [values[at]!, values[at + 1]!, values[at + 2]!, values[at + 3]!];
  for (let i = 0; i < logOmegaRatio.length; i++) {
    const lg = logOmegaRatio[i]!;
    const re = kr * Math.exp(xr * lg);
    const im = ki * Math.exp(xi * lg);
    z.re[i] = re;
    z.im[i] = im;
    if (!d) continue;
    put(d[0]!, i, re, 0);
    put(d[1]!, i, re * lg, 0);
    put(d[2]!, i, 0, im);
    put(d[3]!, i, 0, im * lg);
  }
};

const semiInductance: Impedance = (values, at, { omega, rootHalfOmega }, z, d) => {
  const [leb, le, k, yr] = [values[at]!, values[at + 1]!, values[at + 2]!, values[at + 3]!];
  for (let i = 0; i < omega.length; i++) {
    const w = omega[i]!;
    const yl = 1 / (w * le); // 1/(jωLe) = −j yl; 1/(K√(jω)) = yk(1 − j), since √j = (1 + j)/√2
    const yk = 0.5 / (k * rootHalfOmega[i]!);
    const gRe = yk + yr;
    const gIm = -yl - yk;
    const size = 1 / (gRe * gRe + gIm * gIm);
    const re = gRe * size;
    const im = -gIm * size;
    z.re[i] = re;
    z.im[i] = w * leb + im;
    if (!d) continue;
    const sqRe = re * re - im * im; // ∂P/∂ln x = P² × (admittance of x), with − for Gss
    const sqIm = 2 * re * im;
    put(d[0]!, i, 0, w * leb);
    put(d[1]!, i, sqIm * yl, -sqRe * yl);
    put(d[2]!, i, (sqRe + sqIm) * yk, (sqIm - sqRe) * yk);
    put(d[3]!, i, -sqRe * yr, -sqIm * yr);
  }
};

const IMPEDANCES: Readonly<Record<CoilModel, Impedance>> = {
  inductor,
  'inductor+eddy': inductorWithEddy,
  'power-law': powerLaw,
  'split-power-law': splitPowerLaw,
  'semi-inductance': semiInductance,
};

function put(column: ComplexArray, i: number, re: number, im: number): void {
  column.re[i] = re;
  column.im[i] = im;
}

/** A figure of the coil as the literature writes it, with ∂value/∂(scaled parameter) in the order of `coilParameters`. */
export interface CoilFigure {
  readonly id: string;
  readonly unit: string;
  readonly value: number | null; // null: Rss where the curve asks for none (infinite)
  readonly gradient: readonly number[];
}

const UNITS: Readonly<Record<string, string>> = { Le: 'H', L1: 'H', L2: 'H', R2: 'Ω', Leb: 'H', K: 'Ω·s^½' };

/** The public figures: `Le` · `L1 L2 R2` · `K n` · `Kr Xr Ki Xi` · `Leb Le K Rss`, power laws with ω in rad/s. */
export function coilFigures(model: CoilModel, values: ArrayLike<number>, at: number): CoilFigure[] {
  const parameters = PARAMETERS[model];
  return parameters.map(({ id, logScaled }, k) => {
    const gradient = parameters.map(() => 0);
    const value = values[at + k]!;
    if (id === 'Gss') {
      const isThere = value > NO_SHUNT;
      if (isThere) gradient[k] = -1 / value;
      return { id: 'Rss', unit: 'Ω', value: isThere ? 1 / value : null, gradient };
    }
    if (!id.endsWith('1k')) {
      gradient[k] = logScaled ? value : 1;
      return { id, unit: UNITS[id] ?? '1', value, gradient };
    }
    const amplitude = value * Math.exp(-values[at + k + 1]! * LOG_REFERENCE); // K = K1k·ω0^−n
    gradient[k] = amplitude;
    gradient[k + 1] = -amplitude * LOG_REFERENCE;
    return { id: id.slice(0, -2), unit: 'Ω·s^n', value: amplitude, gradient };
  });
}

/** The fitted form of figures given as in the literature: the inverse of `coilFigures`. */
export function coilValues(model: CoilModel, figures: Readonly<Record<string, number>>): number[] {
  const parameters = PARAMETERS[model];
  return parameters.map(({ id }, k) => {
    if (id === 'Gss') return figures.Rss ? 1 / figures.Rss : 0;
    if (!id.endsWith('1k')) return figures[id] ?? Number.NaN;
    return (figures[id.slice(0, -2)] ?? Number.NaN) * REFERENCE_OMEGA ** (figures[parameters[k + 1]!.id] ?? Number.NaN);
  });
}
