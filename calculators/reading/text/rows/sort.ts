import type { Finding } from '../../../../shared/output.js';
import type { Points } from './curve.js';
import { finding } from './findings.js';
import type { Watch } from './table.js';

/** Brings the points into ascending frequency, rows of one frequency in the order of the file. */
export function sortByFrequency(points: Points, findings: Finding[], watch: Watch): void {
  const { frequency } = points;
  let falls = 0;
  for (let from = 1; from < frequency.length; from += ROWS_A_ROUND)
    falls += fallsIn(frequency, from, from + ROWS_A_ROUND);
  if (falls === 0) return;
  const order = ascending(frequency, watch);
  points.frequency = picked(frequency, order);
  points.first = picked(points.first, order);
  if (points.second) points.second = picked(points.second, order);
  const isReversed = falls === frequency.length - 1;
  const what = isReversed
    ? 'The frequencies fall from row to row'
    : `The frequencies are not in order (${falls} ${falls === 1 ? 'step goes' : 'steps go'} back)`;
  findings.push(finding('unsorted', `${what}; the rows were sorted.`, { steps: falls }));
}

const ROWS_A_ROUND = 1024;

function fallsIn(frequency: Float64Array, from: number, to: number): number {
  const end = Math.min(to, frequency.length);
  let falls = 0;
  for (let i = from; i < end; i += 1) if (frequency[i]! < frequency[i - 1]!) falls += 1;
  return falls;
}

function picked(values: Float64Array, order: Uint32Array): Float64Array {
  const out = new Float64Array(order.length);
  for (let i = 0; i < order.length; i += 1) out[i] = values[order[i]!]!;
  return out;
}

/**
 * The indices of positive numbers in ascending order, equal ones in their own order: a radix sort of the bit patterns, 16 bits a pass
 * (positive IEEE 754 numbers sort as their patterns do). Linear, so that a million rows do not hold up a Stop.
 */
function ascending(values: Float64Array, watch: Watch): Uint32Array {
  const n = values.length;
  const digits = new Uint16Array(Float64Array.from(values).buffer); // four a number, the lowest first on little-endian machines
  const isLittle = new Uint8Array(Uint16Array.of(1).buffer)[0] === 1;
  let order = Uint32Array.from({ length: n }, (_, i) => i);
  let next = new Uint32Array(n);
  const counts = new Uint32Array(65536);
  for (let pass = 0; pass < 4; pass += 1) {
    const at = isLittle ? pass : 3 - pass;
    counts.fill(0);
    for (let i = 0; i < n; i += 1) counts[digits[4 * i + at]!]! += 1;
    let sum = 0;
    for (let d = 0; d < 65536; d += 1) {
      const count = counts[d]!;
      counts[d] = sum;
      sum += count;
    }
    for (let i = 0; i < n; i += 1) {
      const index = order[i]!;
      const digit = digits[4 * index + at]!;
      next[counts[digit]!] = index;
      counts[digit]! += 1;
    }
    [order, next] = [next, order];
    watch.checkpoint();
  }
  return order;
}
