import { type ComplexArray, complexArray } from '../numerics/complex-array.js';
import { type Peak, parabolaVertex, peaksOf } from '../numerics/peaks.js';
import { runningMedian } from '../numerics/statistics.js';
import { coilStart } from './coil-start.js';
import { type FrequencyGrid, frequencyGrid } from './frequency-grid.js';
import type { SuspensionModel } from './suspension.js';
import type { SweepData } from './sweep-term.js';
import type { CoilModel } from './voice-coil.js';

/** What a curve tells without a fit. */
export interface MotionalStart {
  readonly reOhm: number;
  readonly fsHz: number;
  readonly qms: number;
  readonly qes: number;
  /** The interior maximum of |Z| taken for the driver's resonance; null when the sweep has none. */
  readonly peak: Peak | null;
  /** Z − Re − motional part above the peak, thinned: what the coil has to explain. */
  readonly coilGrid: FrequencyGrid;
  readonly coilOhm: ComplexArray;
  readonly inductiveOhm: ComplexArray; // the same; without phase, as it would be for a coil without losses
  readonly coilWeight: Float64Array; // 1/|Z|
}

const LEAST_PROMINENCE = 0.02; // of ln|Z|

/**
 * Re, fs, Qms and Qes from the curve alone: the most prominent interior maximum of ln|Z| after a short median filter (the
 * largest |Z| may be the coil's rise at the band edge), its height and its width at √(Re·Zmax), Re from what is left at
 * the low end when the motional part is taken off.
 * Source of the width formula: R. H. Small, "Direct-Radiator Loudspeaker System Analysis", J. Audio Eng. Soc. 20, 1972.
 */
export function motionalStart(data: SweepData): MotionalStart {
  const { frequencyHz } = data.grid;
  const n = frequencyHz.length;
  const smooth = runningMedian(data.logMagnitude, n >= 40 ? 2 : 1);
  const best = peaksOf(smooth).find(({ prominence }) => prominence > LEAST_PROMINENCE) ?? null;
  const at = best?.index ?? indexOfLargest(smooth.subarray(0, Math.max(1, n >> 1)));
  const near = peakVertex(data, smooth, at);
  const fsHz = Math.exp(near.x);
  const zMax = Math.exp(near.y);
  const leastRe = smallestResistance(data, smooth);
  let reOhm = Math.min(leastRe, 0.9 * zMax);
  let qms = 3;
  let qes = 0.5;
  for (let round = 0; round < 4; round++) {
    const ratio = Math.max(zMax / reOhm, 1.05);
    const width = relativeWidth(smooth, frequencyHz, at, fsHz, 0.5 * Math.log(reOhm * zMax));
    qms = Math.min(Math.max(Math.sqrt(ratio) / width, 0.1), 100);
    qes = Math.min(Math.max(qms / (ratio - 1), 0.01), 50);
    const corrected = resistanceAtLowEnd(data, at, fsHz, qms, qes, reOhm);
    if (Number.isFinite(corrected)) reOhm = Math.min(Math.max(corrected, 0.3 * leastRe), 1.02 * leastRe, 0.95 * zMax);
  }
  return { reOhm, fsHz, qms, qes, peak: best, ...coilRemainder(data, fsHz, reOhm, qms, qes) };
}

/** Starting values of a model, in the order of `driverParameters` for a driver in free air. */
export function startValues(motional: MotionalStart, coil: CoilModel, suspension: SuspensionModel): Float64Array {
  return Float64Array.from([
    motional.reOhm,
    motional.fsHz,
    motional.qms,
    motional.qes,
    ...coilStart(coil, motional),
    ...suspensionStart(suspension, motional.fsHz),
  ]);
}

function suspensionStart(suspension: SuspensionModel, fsHz: number): number[] {
  if (suspension === 'constant') return [];
  if (suspension === 'creep') return [0.05];
  return [0.15, 1 / (2 * Math.PI * 0.6 * fsHz)]; // usual rubber and foam relax somewhat below fs (from trials)
}

function indexOfLargest(values: Float64Array): number {
  let at = 0;
  for (let i = 1; i < values.length; i++) if (values[i]! > values[at]!) at = i;
  return at;
}

function peakVertex(data: SweepData, smooth: Float64Array, at: number): { x: number; y: number } {
  const { frequencyHz } = data.grid;
  const n = frequencyHz.length;
  const middle = Math.min(Math.max(at, 1), n - 2);
  const x = (i: number) => Math.log(frequencyHz[i]!);
  return parabolaVertex(
    [x(middle - 1), x(middle), x(middle + 1)],
    [smooth[middle - 1]!, smooth[middle]!, smooth[middle + 1]!],
  );
}

/** Smallest resistance on the curve (of |Z| where there is no phase): Re cannot be much above it. */
function smallestResistance(data: SweepData, smooth: Float64Array): number {
  if (!data.hasPhase)
    return Math.exp(smooth.reduce((least, value) => Math.min(least, value), Number.POSITIVE_INFINITY));
  const resistance = runningMedian(data.re, 1).filter((value) => value > 0);
  const least = resistance.reduce((low, value) => Math.min(low, value), Number.POSITIVE_INFINITY);
  return Number.isFinite(least) ? least : Math.exp(smooth[0]!);
}

/** (f2 − f1)/fs at the level ln|Z| = level; one side stands for both where the other leaves the sweep (f1·f2 = fs²). */
function relativeWidth(
  smooth: Float64Array,
  frequencyHz: Float64Array,
  at: number,
  fsHz: number,
  level: number,
): number {
  const crossing = (direction: 1 | -1): number | null => {
    for (let i = at; i + direction >= 0 && i + direction < smooth.length; i += direction) {
      const [here, next] = [smooth[i]!, smooth[i + direction]!];
      if (next > level) continue;
      const part = here > level ? (here - level) / (here - next) : 0;
      return frequencyHz[i]! * (frequencyHz[i + direction]! / frequencyHz[i]!) ** part;
    }
    return null;
  };
  const low = crossing(-1);
  const high = crossing(1);
  const ratioHigh = high ? high / fsHz : low ? fsHz / low : 2;
  const ratioLow = low ? low / fsHz : 1 / ratioHigh;
  return Math.max(ratioHigh - ratioLow, 1e-3);
}

/** Median over the lowest points, below the peak, of Re Z (or |Z|) less what the resonance adds there. */
function resistanceAtLowEnd(
  data: SweepData,
  at: number,
  fsHz: number,
  qms: number,
  qes: number,
  reOhm: number,
): number {
  const count = Math.min(7, at);
  const left: number[] = [];
  for (let i = 0; i < count; i++) {
    const x = data.grid.frequencyHz[i]! / fsHz;
    const b = x - 1 / x;
    const size = 1 / (qes * (1 / (qms * qms) + b * b));
    if (data.hasPhase) left.push(data.re[i]! / (1 + size / qms));
    else left.push(data.re[i]! / Math.hypot(1 + size / qms, size * b));
  }
  left.sort((a, b) => a - b);
  return left.length > 0 ? left[left.length >> 1]! : reOhm;
}

/**
 * Z − Re − motional part at up to 60 points above the peak. Without phase, the coil's part is taken to stand at 60°, about where
 * the lossy coils of real drivers are, or at 90°: its size follows from |Z|.
 */
function coilRemainder(data: SweepData, fsHz: number, reOhm: number, qms: number, qes: number) {
  const { frequencyHz } = data.grid;
  const indices: number[] = [];
  for (let i = 0; i < frequencyHz.length; i++) if (frequencyHz[i]! > 1.5 * fsHz) indices.push(i);
  if (indices.length < 8) {
    indices.length = 0;
    for (let i = 0; i < frequencyHz.length; i++) indices.push(i);
  }
  const every = Math.max(1, Math.ceil(indices.length / 60));
  const chosen = indices.filter((_, k) => k % every === 0);
  const coilOhm = complexArray(chosen.length);
  const inductiveOhm = data.hasPhase ? coilOhm : complexArray(chosen.length);
  const coilWeight = new Float64Array(chosen.length);
  chosen.forEach((i, k) => {
    const x = frequencyHz[i]! / fsHz;
    const b = x - 1 / x;
    const size = reOhm / (qes * (1 / (qms * qms) + b * b));
    const rest = reOhm + size / qms;
    const magnitude = Math.exp(data.logMagnitude[i]!);
    coilWeight[k] = 1 / magnitude;
    if (data.hasPhase) {
      coilOhm.re[k] = data.re[i]! - rest;
      coilOhm.im[k] = data.im[i]! + size * b;
      return;
    }
    for (const [target, cos, sin] of [
      [coilOhm, 0.5, Math.sqrt(0.75)],
      [inductiveOhm, 0, 1],
    ] as const) {
      const along = cos * rest - sin * size * b; // |rest − j·size·b + r·e^{jθ}| = |Z| solved for r
      const square = magnitude * magnitude - rest * rest - size * size * b * b + along * along;
      const r = Math.max(Math.sqrt(Math.max(square, 0)) - along, 0);
      target.re[k] = r * cos;
      target.im[k] = r * sin;
    }
  });
  const coilGrid = frequencyGrid(Float64Array.from(chosen, (i) => frequencyHz[i]!));
  return { coilGrid, coilOhm, inductiveOhm, coilWeight };
}
