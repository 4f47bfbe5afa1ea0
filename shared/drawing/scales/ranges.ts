import type { Range, ScaleKind } from './axis-scale.js';

/** Ranges of axes: fit to the data, zoom, pan and stretch, always usable and never far from the data. */
const MARGIN = 0.05; // an axis ends 5 % beyond the data
const LEAST_LOG_SPAN = 2e-4; // of ln: below it the ticks can no longer be told apart
const LEAST_LINEAR_SPAN = 1e-9;
const toU = (kind: ScaleKind, v: number): number => (kind === 'log' ? Math.log(v) : v);
const fromU = (kind: ScaleKind, u: number): number => (kind === 'log' ? Math.exp(u) : u);

/** Frequencies plus 5 % of their value. */
export function frequencyFit([least, most]: Range): Range {
  return [least / (1 + MARGIN), most * (1 + MARGIN)];
}
/** Values plus 5 % of their span on the axis; a linear magnitude starts at zero unless it has negative values. */
export function valueFit([least, most]: Range, kind: ScaleKind, startsAtZero = false): Range {
  const low = toU(kind, least);
  const high = toU(kind, most);
  const span = high - low || (kind === 'log' ? 1 : Math.abs(high) || 1);
  const pad = span * MARGIN + (high === low ? span / 2 : 0);
  const from = startsAtZero && kind === 'linear' && least >= 0 ? 0 : fromU(kind, low - pad);
  return [from, fromU(kind, high + pad)];
}

/** Orders the ends and gives an axis at least a hair of span; null where no axis can be made of it. */
export function usableRange([a, b]: Range, kind: ScaleKind): Range | null {
  if (!Number.isFinite(a) || !Number.isFinite(b)) return null;
  const [low, high] = a < b ? [a, b] : [b, a];
  if (kind === 'log' && low <= 0) return null;
  const span = toU(kind, high) - toU(kind, low);
  const least = kind === 'log' ? LEAST_LOG_SPAN : Math.max(LEAST_LINEAR_SPAN, Math.abs(low) * 1e-6);
  return span >= least ? [low, high] : null;
}

/** Zooms by `factor` (above 1: closer) and keeps `anchor` where it is. */
export function zoomed(range: Range, kind: ScaleKind, anchor: number, factor: number): Range {
  const u = toU(kind, anchor);
  const [low, high] = [toU(kind, range[0]), toU(kind, range[1])];
  const next: Range = [fromU(kind, u + (low - u) / factor), fromU(kind, u + (high - u) / factor)];
  return usableRange(next, kind) ?? range;
}
/** Moves the range by a part of its span: 0.1 shows a tenth further to the right. */
export function panned(range: Range, kind: ScaleKind, part: number): Range {
  const [low, high] = [toU(kind, range[0]), toU(kind, range[1])];
  const by = (high - low) * part;
  return usableRange([fromU(kind, low + by), fromU(kind, high + by)], kind) ?? range;
}
/** Keeps `still` where it is and brings the value that was at `from` (0 to 1 along the axis) to `to`. */
export function stretched(range: Range, kind: ScaleKind, still: 'start' | 'end', from: number, to: number): Range {
  const held = still === 'start' ? [from, to] : [1 - from, 1 - to];
  const factor = Math.min(20, Math.max(0.05, (held[1] ?? 1) / Math.max(0.02, held[0] ?? 1)));
  return zoomed(range, kind, still === 'start' ? range[0] : range[1], factor);
}
/** Part of the way between two ranges, 0 to 1: what the eye follows while a range changes. */
export function between(a: Range, b: Range, kind: ScaleKind, part: number): Range {
  const mix = (x: number, y: number) => fromU(kind, toU(kind, x) + (toU(kind, y) - toU(kind, x)) * part);
  return [mix(a[0], b[0]), mix(a[1], b[1])];
}
/** A range kept in touch with the data: at most three times the fitted span, and never wholly beside it. */
export function keptNear(range: Range, fit: Range, kind: ScaleKind): Range {
  const [fitLow, fitHigh] = [toU(kind, fit[0]), toU(kind, fit[1])];
  const [low, high] = [toU(kind, range[0]), toU(kind, range[1])];
  const fitSpan = fitHigh - fitLow;
  const span = Math.min(high - low, fitSpan * 3);
  const middle = (low + high) / 2;
  const reach = Math.max(0, span / 2 - fitSpan * 0.1);
  const kept = Math.min(fitHigh + reach, Math.max(fitLow - reach, middle));
  return [fromU(kind, kept - span / 2), fromU(kind, kept + span / 2)];
}
