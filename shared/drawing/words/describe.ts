import { formatPlain, formatQuantity } from '../../quantity-text.js';
import { chart } from '../../text/chart.js';
import { columnsOf, firstAtLeast, type ImpedancePoints } from '../curves/columns.js';
import type { Range } from '../scales/axis-scale.js';
import { impedanceExtrema } from './extrema.js';

/** The chart in words and in rows: what a person who does not see the lines is told of them. */
export interface NamedSweep {
  readonly name: string;
  readonly points: ImpedancePoints;
}
const MOST_COMPARED = 5;
const ohm = (value: number, locale?: string) => shortQuantity(value, 'Ω', locale);
const hz = (value: number, locale?: string) => shortQuantity(value, 'Hz', locale);

/** Three digits without needless zeros: 46.2 Ω, 210 Hz, 20 kHz. */
export function shortQuantity(value: number, si: 'Ω' | 'Hz', locale?: string): string {
  const [shown = '', unit = ''] = formatQuantity(value, si, { digits: 3, locale: 'en' }).split('\u00A0');
  return `${formatPlain(Number(shown.replace('\u2212', '-')), 3, locale)}\u00A0${unit}`;
}

/** "W-0417: peak 46.2 Ω at 31.8 Hz, lowest 6.3 Ω at 210 Hz, rising to 28 Ω at 20 kHz. W-0418 peaks 1.7 Hz higher." */
export function describeImpedance(sweeps: readonly NamedSweep[], locale?: string): string {
  const [first, ...others] = sweeps;
  if (!first) return chart.sentence.empty;
  const sentences = [describeSweep(first, locale)];
  for (const other of others.slice(0, MOST_COMPARED)) sentences.push(comparedPeak(first, other, locale));
  const left = others.length - MOST_COMPARED;
  if (left > 0) sentences.push(chart.sentence.more(left));
  return sentences.join(' ');
}

function describeSweep({ name, points }: NamedSweep, locale?: string): string {
  const { frequencyHz, magnitudeOhm } = columnsOf(points);
  const last = frequencyHz.length - 1;
  const at = (i: number): [string, string] => [ohm(magnitudeOhm[i] ?? 0, locale), hz(frequencyHz[i] ?? 0, locale)];
  const parts: string[] = [];
  const peak = highestPeak(points);
  const lowest = lowestPoint(magnitudeOhm, peak ?? 0);
  if (peak !== null) parts.push(chart.sentence.peak(...at(peak)));
  parts.push(chart.sentence.lowest(...at(lowest)));
  if (lowest < last) parts.push(chart.sentence.rising(...at(last)));
  else if (peak === null) parts.unshift(chart.sentence.falling(...at(last)));
  return chart.sentence.whole(name, parts.join(', '));
}

function comparedPeak(first: NamedSweep, other: NamedSweep, locale?: string): string {
  const [a, b] = [highestPeak(first.points), highestPeak(other.points)];
  if (a === null || b === null) return describeSweep(other, locale);
  const [aHz, bHz] = [first.points.frequencyHz[a] ?? 0, other.points.frequencyHz[b] ?? 0];
  const by = Math.abs(bHz - aHz);
  if (by < aHz * 1e-3) return chart.sentence.same(other.name);
  const shown = `${formatPlain(by, 2, locale)}\u00A0Hz`;
  return bHz > aHz ? chart.sentence.higher(other.name, shown) : chart.sentence.lower(other.name, shown);
}

/** Index of the peak that stands out most. */
export function highestPeak(points: ImpedancePoints): number | null {
  const peaks = impedanceExtrema(columnsOf(points).lnMagnitude).filter((e) => e.kind === 'peak');
  return (
    peaks.reduce<(typeof peaks)[number] | null>((a, b) => (a && a.prominence >= b.prominence ? a : b), null)?.index ??
    null
  );
}
/** The lowest point from the peak on: below it a driver only comes back to the same resistance. */
function lowestPoint(magnitudeOhm: Float64Array, from: number): number {
  let lowest = from;
  for (let i = from; i < magnitudeOhm.length; i += 1) {
    if ((magnitudeOhm[i] ?? Number.POSITIVE_INFINITY) < (magnitudeOhm[lowest] ?? 0)) lowest = i;
  }
  return lowest;
}

export interface TableRow {
  readonly index: number;
  readonly frequencyHz: number;
  readonly magnitudeOhm: number;
  readonly phaseDeg: number | undefined;
  readonly kind: 'peak' | 'dip' | 'point';
}
/** The points of a range as rows, thinned evenly to about `mostRows`; peaks, dips and both ends always stay. */
export function impedanceTable(points: ImpedancePoints, range: Range | null, mostRows = 200): TableRow[] {
  const columns = columnsOf(points);
  const { frequencyHz, magnitudeOhm, phaseDeg, lnMagnitude } = columns;
  const from = range ? firstAtLeast(frequencyHz, range[0]) : 0;
  let to = range ? firstAtLeast(frequencyHz, range[1]) : frequencyHz.length;
  if (range && frequencyHz[to] === range[1]) to += 1;
  const kinds = new Map(impedanceExtrema(lnMagnitude).map((e) => [e.index, e.kind]));
  const every = Math.max(1, Math.ceil((to - from) / mostRows));
  const rows: TableRow[] = [];
  for (let i = from; i < to; i += 1) {
    const kind = kinds.get(i) ?? 'point';
    if ((i - from) % every !== 0 && kind === 'point' && i !== to - 1) continue;
    rows.push({
      index: i,
      frequencyHz: frequencyHz[i] ?? 0,
      magnitudeOhm: magnitudeOhm[i] ?? 0,
      phaseDeg: phaseDeg?.[i],
      kind,
    });
  }
  return rows;
}
