import type { Reading } from '../../../../shared/contracts/reading.js';
import { InputError } from '../../../../shared/errors.js';
import type { Finding } from '../../../../shared/output.js';
import { finding } from './findings.js';
import { sortByFrequency } from './sort.js';
import { lineOf, skipRow, type Table, type Watch } from './table.js';

/** Points on their way to a sweep. Shapes: (n). `first` and `second`: |Z| in ohm and phase in radians, or Re and Im in ohm. */
export interface Points {
  frequency: Float64Array;
  first: Float64Array;
  second?: Float64Array | undefined;
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
  const points = cleaned(table, kind, fileName, findings, watch);
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

const LARGEST = 1e100; // no impedance comes near; its square is still finite
const ROWS_A_ROUND = 1024; // short rounds: the engine compiles them whole, and Stop is looked for in between

/** Applies the units, drops 0 Hz and what is too large, and refuses what no impedance can be. */
function cleaned(table: Table, kind: PointsKind, fileName: string, findings: Finding[], watch: Watch): Points {
  const cleaning: Cleaning = { table, isPair: kind.isPair, fileName, kept: 0, dc: 0 };
  for (let from = 0; from < table.rows; from += ROWS_A_ROUND) {
    const to = Math.min(table.rows, from + ROWS_A_ROUND);
    applyUnits(table.values, kind, from, to);
    cleanRows(cleaning, from, to);
    watch.checkpoint();
  }
  const { kept, dc } = cleaning;
  if (dc > 0) {
    const what = dc === 1 ? 'A row at 0 Hz was' : `${dc} rows at 0 Hz were`;
    findings.push(finding('dc-point', `${what} left out: a sweep has no point at zero frequency.`, { rows: dc }));
  }
  const [frequency, first, second] = table.values.map((values) => values.subarray(0, kept));
  return { frequency: frequency as Float64Array, first: first as Float64Array, second };
}

interface Cleaning {
  readonly table: Table;
  readonly isPair: boolean;
  readonly fileName: string;
  kept: number; // rows, moved together at the front of the columns
  dc: number;
}

function cleanRows(cleaning: Cleaning, from: number, to: number): void {
  const { table, isPair, fileName } = cleaning;
  const [frequency, first, second] = table.values as [Float64Array, Float64Array, Float64Array | undefined];
  let { kept } = cleaning;
  for (let i = from; i < to; i += 1) {
    const f = frequency[i]!;
    const a = first[i]!;
    const b = second ? second[i]! : 0;
    if (!(Math.abs(f) < LARGEST && Math.abs(a) < LARGEST && Math.abs(b) < LARGEST)) {
      skipRow(table, lineOf(table, i), 'holds a number too large to use');
    } else if (f > 0) {
      if (isPair ? a * a + b * b === 0 : a <= 0) throw noImpedance(a, lineOf(table, i), fileName);
      frequency[kept] = f;
      first[kept] = a;
      if (second) second[kept] = b;
      kept += 1;
    } else if (f === 0) cleaning.dc += 1;
    else throw belowZero(f, lineOf(table, i), fileName);
  }
  cleaning.kept = kept;
}

/** To Hz, ohm and radians where the file has others; the powers of ten of kHz and kilohm were applied while reading. */
function applyUnits(values: readonly Float64Array[], kind: PointsKind, from: number, to: number): void {
  const [frequency, first, second] = values;
  if (kind.frequencyUnit === 'rad/s') divide(frequency, 2 * Math.PI, from, to);
  if (kind.magnitudeUnit === 'dB') for (let i = from; first && i < to; i += 1) first[i] = 10 ** (first[i]! / 20);
  const sign = kind.isTurned ? -1 : 1;
  if (!kind.isPair && kind.phaseUnit === 'degree') divide(second, (sign * 180) / Math.PI, from, to);
  else if (kind.isTurned) divide(second, -1, from, to);
}

function divide(values: Float64Array | undefined, by: number, from: number, to: number): void {
  if (values) for (let i = from; i < to; i += 1) values[i] = values[i]! / by;
}

function belowZero(f: number, line: number, fileName: string): InputError {
  const message = `Line ${line}: the frequency is ${f} Hz. Frequencies count upwards from zero; check which column is the frequency.`;
  return new InputError('negative-frequency', message, where(fileName, line));
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
  const { frequency, first, second } = points;
  let kept = 0;
  while (kept < frequency.length && !hasDoubled(frequency, kept, kept + ROWS_A_ROUND)) kept += ROWS_A_ROUND;
  if (kept >= frequency.length) return;
  let doubled = 0;
  for (let i = kept; i < frequency.length; ) {
    let end = i + 1;
    while (end < frequency.length && frequency[end] === frequency[i]) end += 1;
    frequency[kept] = frequency[i]!;
    const other = second && (isPair || end - i === 1 ? mean(second, i, end) : meanDirection(first, second, i, end));
    first[kept] = mean(first, i, end);
    if (second) second[kept] = other as number;
    if (end - i > 1) doubled += 1;
    kept += 1;
    i = end;
  }
  points.frequency = frequency.subarray(0, kept);
  points.first = first.subarray(0, kept);
  points.second = second?.subarray(0, kept);
  const what = doubled === 1 ? 'frequency occurs' : 'frequencies occur';
  const message = `${doubled} ${what} more than once; the readings were averaged.`;
  findings.push(finding('duplicate-frequency', message, { frequencies: doubled }));
}

function hasDoubled(frequency: Float64Array, from: number, to: number): boolean {
  const end = Math.min(to, frequency.length - 1);
  for (let i = from + 1; i <= end; i += 1) if (frequency[i] === frequency[i - 1]) return true;
  return false;
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
