import type { ComplexArray } from '../../numerics/complex-array.js';
import { COMPLEX_MEDIAN_TO_SIGMA, MAD_TO_SIGMA, median, medianInPlace } from '../../numerics/statistics.js';

/** Which points do not belong to the curve, and why. Shapes: rows are indices into the sweep. */
export interface WildPoints {
  readonly humRows: readonly number[];
  readonly humHz: readonly number[]; // harmonics hit, rising
  readonly mainsHz: 50 | 60 | null;
  readonly wildRows: readonly number[];
}
export const NO_WILD_POINTS: WildPoints = { humRows: [], humHz: [], mainsHz: null, wildRows: [] };

const NEIGHBOURS = 5; // on each side
const SPREAD_ROWS = 30; // on each side, for the local noise
const LIMIT = 6.5; // times the local noise per component: by chance about once in some 100,000 points
const QUIETEST = 0.9; // of the sweep's noise: a stretch that happens to be quieter makes no point wild
const FLOOR = 2e-7; // relative: eight written digits
const HARMONICS = 8;
const HUM_WIDTH = 0.03; // relative distance from a harmonic
const WIDEST_HUM = 0.06; // of a run, relative
const LONGEST_RUN = 2;

/**
 * Points that lie off the median of their neighbours in ρ = ln(Z/model) by more than 6.5 times the local noise: narrow
 * enough to be no feature of a driver. Those at harmonics of 50 or 60 Hz are hum, the rest wild. Common practice, no published source.
 * Shapes: frequencyHz (n), misfit (n).
 */
export function wildPoints(frequencyHz: Float64Array, misfit: ComplexArray, hasPhase: boolean): WildPoints {
  const n = frequencyHz.length;
  const distance = distanceFromNeighbours(misfit);
  const perMedian = hasPhase ? 1 / COMPLEX_MEDIAN_TO_SIGMA : MAD_TO_SIGMA;
  const overall = median(distance) * perMedian;
  const rows: number[] = [];
  for (let i = 0; i < n; i += 1) {
    if ((distance[i] ?? 0) <= LIMIT * Math.max(QUIETEST * overall, FLOOR)) continue;
    const around = distance.subarray(Math.max(0, i - SPREAD_ROWS), Math.min(n, i + SPREAD_ROWS + 1));
    const local = median(around) * perMedian;
    if ((distance[i] ?? 0) > LIMIT * Math.max(local, QUIETEST * overall, FLOOR)) rows.push(i);
  }
  return sorted(rows, frequencyHz);
}

/** |ρ − median of the neighbours|, component by component, the point itself left out. */
function distanceFromNeighbours({ re, im }: ComplexArray): Float64Array {
  const n = re.length;
  const out = new Float64Array(n);
  const reals = new Float64Array(2 * NEIGHBOURS);
  const imaginaries = new Float64Array(2 * NEIGHBOURS);
  for (let i = 0; i < n; i += 1) {
    let count = 0;
    const from = Math.max(0, Math.min(i - NEIGHBOURS, n - 1 - 2 * NEIGHBOURS));
    for (let j = from; j <= Math.min(n - 1, from + 2 * NEIGHBOURS); j += 1) {
      if (j === i) continue;
      reals[count] = re[j] ?? 0;
      imaginaries[count] = im[j] ?? 0;
      count += 1;
    }
    out[i] = Math.hypot(
      (re[i] ?? 0) - medianInPlace(reals.subarray(0, count)),
      (im[i] ?? 0) - medianInPlace(imaginaries.subarray(0, count)),
    );
  }
  return out;
}

/** Neighbouring rows that stand out together. */
type Run = readonly number[];

function runsOf(rows: readonly number[]): Run[] {
  const runs: number[][] = [];
  for (const row of rows) {
    const last = runs.at(-1);
    if (last && last.at(-1) === row - 1) last.push(row);
    else runs.push([row]);
  }
  return runs;
}

/** A run of more than two rows is a feature of the curve, unless it is a narrow one at a harmonic of the mains. */
function sorted(rows: readonly number[], frequencyHz: Float64Array): WildPoints {
  const runs = runsOf(rows);
  const families = ([50, 60] as const).map((mainsHz) => {
    const hits = runs.filter((run) => isHum(run, frequencyHz, mainsHz));
    const harmonics = [...new Set(hits.map(([row = 0]) => harmonicOf(frequencyHz[row] ?? 0, mainsHz)))].sort(
      (a, b) => a - b,
    );
    const isFundamentalRun = hits.some(
      (run) => run.length > 1 && harmonicOf(frequencyHz[run[0] ?? 0] ?? 0, mainsHz) <= 3,
    );
    return { mainsHz, hits: harmonics.length >= 2 || isFundamentalRun ? hits : [], harmonics };
  });
  const best = families.reduce((a, b) => (b.hits.length > a.hits.length ? b : a));
  const wildRows = runs.filter((run) => run.length <= LONGEST_RUN && !best.hits.includes(run)).flat();
  if (best.hits.length === 0) return { ...NO_WILD_POINTS, wildRows };
  return {
    humRows: best.hits.flat(),
    humHz: best.harmonics.map((k) => k * best.mainsHz),
    mainsHz: best.mainsHz,
    wildRows,
  };
}

function isHum(run: Run, frequencyHz: Float64Array, mainsHz: number): boolean {
  const [low, high] = [frequencyHz[run[0] ?? 0] ?? 0, frequencyHz[run.at(-1) ?? 0] ?? 0];
  return high / low < 1 + WIDEST_HUM && run.every((row) => harmonicOf(frequencyHz[row] ?? 0, mainsHz) > 0);
}

/** Number of the harmonic a frequency lies on, 0 if on none. */
function harmonicOf(frequencyHz: number, mainsHz: number): number {
  const k = Math.round(frequencyHz / mainsHz);
  const isOn = k >= 1 && k <= HARMONICS && Math.abs(frequencyHz / (k * mainsHz) - 1) < HUM_WIDTH;
  return isOn ? k : 0;
}
