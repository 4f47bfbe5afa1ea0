import type { Reading } from '../../../../shared/contracts/reading.js';
import { InputError } from '../../../../shared/errors.js';
import type { Finding } from '../../../../shared/output.js';
import { finding } from './findings.js';
import type { Table, Watch } from './scan-rows.js';
import { sortByFrequency } from './sort.js';

/** Points on their way to a sweep. Shapes: (n). `first` and `second`: |Z| in ohm and phase in radians, or Re and Im in ohm. */
export interface Points {
  frequency: Float64Array;
  first: Float64Array;
  second?: Float64Array | undefined;
  lines: Uint32Array;
}
export interface PointsKind {
  readonly isPair: boolean; // real and imaginary
  readonly frequencyUnit: Reading['frequencyUnit'];
  readonly magnitudeUnit: Reading['magnitudeUnit'];
  readonly phaseUnit: Reading['phaseUnit'];
  readonly isTurned: boolean;
}

export const POINTS_LEAST = 8;

/** From the table as written to points in Hz, ohm and radians, ascending, each frequency once. */
export function toPoints(table: Table, kind: PointsKind, fileName: string, findings: Finding[], watch: Watch): Points {
  const points = cleaned(table, kind, fileName, findings);
  watch.checkpoint();
  sortByFrequency(points, findings, watch);
  averageDuplicates(points, kind.isPair, findings);
  watch.checkpoint();
  if (points.frequency.length === 1 && table.rows >= POINTS_LEAST) {
    throw new InputError(
      'single-frequency',
      `All ${table.rows} rows have the same frequency, ${points.frequency[0]} Hz. A sweep needs many; check which column is the frequency.`,
      fileName,
    );
  }
  if (points.frequency.length < POINTS_LEAST) {
    throw new InputError(
      'too-few-points',
      `Only ${points.frequency.length} usable ${points.frequency.length === 1 ? 'point' : 'points'}; a sweep needs at least ${POINTS_LEAST}. Check the separator and the header lines, or export more points.`,
      fileName,
    );
  }
  return points;
}

/** Applies the units, drops 0 Hz and what is not finite, and refuses what no impedance can be. */
function cleaned(table: Table, kind: PointsKind, fileName: string, findings: Finding[]): Points {
  const { rows, lines } = table;
  const [frequency, first, second] = table.values.map((values) => values.subarray(0, rows)) as [
    Float64Array,
    Float64Array,
    Float64Array | undefined,
  ];
  const perHz = kind.frequencyUnit === 'rad/s' ? 2 * Math.PI : 1;
  const perRadian = kind.phaseUnit === 'radian' ? 1 : 180 / Math.PI;
  const sign = kind.isTurned ? -1 : 1;
  let kept = 0;
  let dc = 0;
  for (let i = 0; i < rows; i += 1) {
    const f = perHz === 1 ? frequency[i]! : frequency[i]! / perHz;
    const a = kind.magnitudeUnit === 'dB' ? 10 ** (first[i]! / 20) : first[i]!;
    const b = second ? (kind.isPair ? sign * second[i]! : (sign * second[i]!) / perRadian) : 0;
    const line = lines[i]!;
    if (!Number.isFinite(f + a + b)) {
      if (table.skipped.length < 200) table.skipped.push({ line, reason: 'holds a number too large to use' });
      table.skippedCount += 1;
      continue;
    }
    if (f < 0)
      throw new InputError(
        'negative-frequency',
        `Line ${line}: the frequency is ${f} Hz. Frequencies count upwards from zero; check which column is the frequency.`,
        where(fileName, line),
      );
    if (f === 0) {
      dc += 1;
      continue;
    }
    if (kind.isPair ? a === 0 && b === 0 : a <= 0) throw noImpedance(a, line, fileName);
    frequency[kept] = f;
    first[kept] = a;
    if (second) second[kept] = b;
    lines[kept++] = line;
  }
  if (dc > 0)
    findings.push(
      finding(
        'dc-point',
        `${dc === 1 ? 'A row' : `${dc} rows`} at 0 Hz ${dc === 1 ? 'was' : 'were'} left out: a sweep has no point at zero frequency.`,
        { rows: dc },
      ),
    );
  return {
    frequency: frequency.subarray(0, kept),
    first: first.subarray(0, kept),
    second: second?.subarray(0, kept),
    lines: lines.subarray(0, kept),
  };
}

function noImpedance(value: number, line: number, fileName: string): InputError {
  const what = value === 0 ? 'is zero' : `is ${value} Ω, below zero`;
  return new InputError(
    'zero-impedance',
    `Line ${line}: the impedance ${what}. Leave the row out, or check which column holds the impedance and in which unit.`,
    where(fileName, line),
  );
}

export const where = (fileName: string, line: number): string =>
  fileName ? `${fileName}, line ${line}` : `line ${line}`;

/**
 * Rows of one frequency become their mean: of the magnitude, and of the direction in the complex plane; of the parts where parts are given.
 * Common practice, no published source. The mean magnitude never leaves the range of its readings.
 */
function averageDuplicates(points: Points, isPair: boolean, findings: Finding[]): void {
  const { frequency, first, second, lines } = points;
  let kept = 0;
  let doubled = 0;
  for (let i = 0; i < frequency.length; ) {
    let end = i + 1;
    while (end < frequency.length && frequency[end] === frequency[i]) end += 1;
    frequency[kept] = frequency[i]!;
    lines[kept] = lines[i]!;
    if (end - i === 1 || isPair || !second) {
      first[kept] = mean(first, i, end);
      if (second) second[kept] = mean(second, i, end);
    } else {
      const phase = meanDirection(first, second, i, end);
      first[kept] = mean(first, i, end);
      second[kept] = phase;
    }
    if (end - i > 1) doubled += 1;
    kept += 1;
    i = end;
  }
  if (doubled === 0) return;
  points.frequency = frequency.subarray(0, kept);
  points.first = first.subarray(0, kept);
  points.second = second?.subarray(0, kept);
  points.lines = lines.subarray(0, kept);
  findings.push(
    finding(
      'duplicate-frequency',
      `${doubled} ${doubled === 1 ? 'frequency occurs' : 'frequencies occur'} more than once; the readings were averaged.`,
      { frequencies: doubled },
    ),
  );
}

function mean(values: Float64Array, from: number, to: number): number {
  if (to - from === 1) return values[from]!;
  let sum = 0;
  let least = values[from]!;
  let most = least;
  for (let i = from; i < to; i += 1) {
    sum += values[i]!;
    least = Math.min(least, values[i]!);
    most = Math.max(most, values[i]!);
  }
  return Math.min(most, Math.max(least, sum / (to - from)));
}

function meanDirection(magnitude: Float64Array, phase: Float64Array, from: number, to: number): number {
  let re = 0;
  let im = 0;
  for (let i = from; i < to; i += 1) {
    re += magnitude[i]! * Math.cos(phase[i]!);
    im += magnitude[i]! * Math.sin(phase[i]!);
  }
  return Math.atan2(im, re);
}
