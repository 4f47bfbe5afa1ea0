const GRID = 160; // points over the measured range
const BEYOND = Math.log(30); // how far the end slopes are carried on, in ln f

export interface PhaseMisfit {
  readonly asWritten: number; // mean absolute difference, degrees
  readonly turned: number; // the same for the phase with its sign turned
}

/**
 * How far a phase lies from the one that the magnitude implies. The impedance of a passive one-port is of minimum phase, so
 *   phase(f0) = (1/π) ∫ d ln|Z|/du · ln coth(|u|/2) du,  u = ln(f/f0).
 * Source: H. W. Bode, "Network Analysis and Feedback Amplifier Design", 1945 (from memory). Beyond the ends of the sweep the
 * slope of its last tenth is carried on, within ±1; the outer tenth at each end is not compared.
 * Shapes: (n) each; frequency ascending, > 0; lnMagnitude of |Z|; phaseRad in radians, wrapped or not.
 */
export function phaseMisfit(
  frequency: ArrayLike<number>,
  lnMagnitude: ArrayLike<number>,
  phaseRad: ArrayLike<number>,
): PhaseMisfit {
  const n = frequency.length;
  const low = Math.log(frequency[0]!);
  const step = (Math.log(frequency[n - 1]!) - low) / (GRID - 1);
  if (!(step > 0)) return { asWritten: 180, turned: 180 };
  const { level, phase } = onGrid(frequency, lnMagnitude, phaseRad, low, step);
  const implied = impliedPhase(level, step);
  let asWritten = 0;
  let turned = 0;
  let compared = 0;
  for (let k = Math.floor(GRID / 10); k < GRID - GRID / 10; k += 1) {
    asWritten += Math.abs(wrapped(phase[k]! - implied[k]!));
    turned += Math.abs(wrapped(-phase[k]! - implied[k]!));
    compared += 1;
  }
  const degrees = 180 / Math.PI / compared;
  return { asWritten: asWritten * degrees, turned: turned * degrees };
}

const wrapped = (angle: number): number => angle - 2 * Math.PI * Math.round(angle / (2 * Math.PI));

function onGrid(
  frequency: ArrayLike<number>,
  lnMagnitude: ArrayLike<number>,
  phaseRad: ArrayLike<number>,
  low: number,
  step: number,
) {
  const level = new Float64Array(GRID);
  const phase = new Float64Array(GRID);
  let i = 0;
  for (let k = 0; k < GRID; k += 1) {
    const u = low + k * step;
    while (i < frequency.length - 2 && Math.log(frequency[i + 1]!) < u) i += 1;
    const left = Math.log(frequency[i]!);
    const width = Math.log(frequency[i + 1]!) - left;
    const share = width > 0 ? Math.min(1, Math.max(0, (u - left) / width)) : 0;
    level[k] = lnMagnitude[i]! + share * (lnMagnitude[i + 1]! - lnMagnitude[i]!);
    phase[k] = phaseRad[i]! + share * wrapped(phaseRad[i + 1]! - phaseRad[i]!);
  }
  return { level, phase };
}

/** Radians, shape (GRID): the integral above on the grid, each interval with its mean slope at its middle. */
function impliedPhase(level: Float64Array, step: number): Float64Array {
  const beyond = Math.ceil(BEYOND / step);
  const size = GRID - 1 + 2 * beyond;
  const tenth = Math.floor(GRID / 10);
  const within = (slope: number) => Math.min(1, Math.max(-1, slope));
  const first = within((level[tenth]! - level[0]!) / (tenth * step));
  const last = within((level[GRID - 1]! - level[GRID - 1 - tenth]!) / (tenth * step));
  const slope = new Float64Array(size);
  for (let m = 0; m < size; m += 1) {
    const k = m - beyond;
    slope[m] = k < 0 ? first : k >= GRID - 1 ? last : (level[k + 1]! - level[k]!) / step;
  }
  const weight = Float64Array.from({ length: size }, (_, d) => -Math.log(Math.tanh((d + 0.5) * step * 0.5)));
  const implied = new Float64Array(GRID);
  for (let k = 0; k < GRID; k += 1) {
    let sum = 0;
    for (let m = 0; m < size; m += 1) {
      const apart = m - beyond - k; // the middle of interval m lies apart + 1/2 steps from point k
      sum += slope[m]! * weight[apart >= 0 ? apart : -apart - 1]!;
    }
    implied[k] = (sum * step) / Math.PI;
  }
  return implied;
}
