import type { Finding } from '../../../../shared/output.js';
import type { Points } from './curve.js';
import { finding } from './findings.js';
import type { Watch } from './table.js';

/** The most points that a sweep holds. */
export const POINTS_MOST = 20_000;

/**
 * A longer curve thinned: ln Z averaged in equal bins of ln f, each bin becoming one point at the mean of its ln f. Bins of one
 * point keep it untouched. Common practice, no published source. In: |Z| and phase, or Re and Im; out: the same.
 */
export function thin(points: Points, isPair: boolean, findings: Finding[], watch: Watch): void {
  const { frequency } = points;
  const n = frequency.length;
  if (n <= POINTS_MOST) return;
  const ratio = Math.log(frequency[n - 1]! / frequency[0]!) / POINTS_MOST;
  const low = Math.log(frequency[0]!);
  let kept = 0;
  let from = 0;
  for (let bin = 0; bin < POINTS_MOST && from < n; bin += 1) {
    const edge = bin === POINTS_MOST - 1 ? Number.POSITIVE_INFINITY : Math.exp(low + (bin + 1) * ratio);
    const to = endOfBin(frequency, from, edge);
    if (to === from) continue;
    averageBin(points, isPair, from, to, kept);
    kept += 1;
    from = to;
    if ((bin & 1023) === 0) watch.checkpoint();
  }
  points.frequency = frequency.subarray(0, kept);
  points.first = points.first.subarray(0, kept);
  points.second = points.second?.subarray(0, kept);
  findings.push(
    finding(
      'thinned',
      `The file has ${n} points; they were thinned to ${kept} by averaging in equal steps of the logarithm of frequency. The source file stays whole.`,
      { points: n, kept },
    ),
  );
}

function endOfBin(frequency: Float64Array, from: number, edge: number): number {
  let to = from;
  while (to < frequency.length && frequency[to]! <= edge) to += 1;
  return to;
}

/** Points [from, to) become point `at`, at ≤ from: the mean of ln f, of ln |Z| and of the phase, unwrapped within the bin. */
function averageBin(points: Points, isPair: boolean, from: number, to: number, at: number): void {
  const { frequency, first, second } = points;
  const count = to - from;
  if (count === 1) {
    frequency[at] = frequency[from]!;
    first[at] = first[from]!;
    if (second) second[at] = second[from]!;
    return;
  }
  if (isPair && second) toPolar(first, second, from, to);
  const phase = second ? meanUnwrapped(second, from, to) : 0;
  const size = geometricMean(first, from, to);
  frequency[at] = geometricMean(frequency, from, to);
  first[at] = isPair ? size * Math.cos(phase) : size;
  if (second) second[at] = isPair ? size * Math.sin(phase) : phase;
}

function toPolar(re: Float64Array, im: Float64Array, from: number, to: number): void {
  for (let i = from; i < to; i += 1) {
    const [a, b] = [re[i]!, im[i]!];
    re[i] = Math.sqrt(a * a + b * b);
    im[i] = Math.atan2(b, a);
  }
}

/** exp of the mean logarithm, as the root of a product: one logarithm for many factors. */
function geometricMean(values: Float64Array, from: number, to: number): number {
  const reference = values[from]!;
  let product = 1;
  let sum = 0;
  for (let i = from + 1; i < to; i += 1) {
    product *= values[i]! / reference;
    if (product > 1e100 || product < 1e-100) {
      sum += Math.log(product);
      product = 1;
    }
  }
  return reference * Math.exp((sum + Math.log(product)) / (to - from));
}

function meanUnwrapped(phase: Float64Array, from: number, to: number): number {
  let before = phase[from]!;
  let sum = before;
  for (let i = from + 1; i < to; i += 1) {
    const step = phase[i]! - before;
    before += step > Math.PI || step < -Math.PI ? step - 2 * Math.PI * Math.round(step / (2 * Math.PI)) : step;
    sum += before;
  }
  return sum / (to - from);
}
