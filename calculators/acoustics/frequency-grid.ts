/** Angular frequency to which power laws are referred inside, so that amplitude and exponent decorrelate: 2π·1 kHz. */
export const REFERENCE_OMEGA = 2000 * Math.PI;

/** What every model needs of the frequencies, computed once for a sweep. Shapes (n); frequencyHz > 0. */
export interface FrequencyGrid {
  readonly frequencyHz: Float64Array;
  readonly period: Float64Array; // 1/f, s
  readonly omega: Float64Array; // rad/s
  readonly logOmegaRatio: Float64Array; // ln(ω/ω0), ω0 = 2π·1 kHz
  readonly rootHalfOmega: Float64Array; // √(ω/2)
}

export function frequencyGrid(frequencyHz: Float64Array): FrequencyGrid {
  const omega = frequencyHz.map((f) => 2 * Math.PI * f);
  return {
    frequencyHz,
    period: frequencyHz.map((f) => 1 / f),
    omega,
    logOmegaRatio: omega.map((w) => Math.log(w / REFERENCE_OMEGA)),
    rootHalfOmega: omega.map((w) => Math.sqrt(w / 2)),
  };
}
