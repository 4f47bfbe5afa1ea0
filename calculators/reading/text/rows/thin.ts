import type { Finding } from '../../../../shared/output.js';
import type { Points } from './curve.js';
import { finding } from './findings.js';
import type { Watch } from './scan-rows.js';

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
    let to = from;
    while (to < n && frequency[to]! <= edge) to += 1;
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
  let lnF = 0;
  let lnZ = 0;
  let phase = 0;
  let before = 0;
  for (let i = from; i < to; i += 1) {
    lnF += Math.log(frequency[i]!);
    lnZ += isPair ? Math.log(Math.hypot(first[i]!, second![i]!)) : Math.log(first[i]!);
    if (!second) continue;
    const angle = isPair ? Math.atan2(second[i]!, first[i]!) : second[i]!;
    before = i === from ? angle : angle - 2 * Math.PI * Math.round((angle - before) / (2 * Math.PI));
    phase += before;
  }
  const size = Math.exp(lnZ / count);
  frequency[at] = Math.exp(lnF / count);
  first[at] = isPair ? size * Math.cos(phase / count) : size;
  if (second) second[at] = isPair ? size * Math.sin(phase / count) : phase / count;
}
