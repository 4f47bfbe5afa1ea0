import type { ChartState } from '../../../shared/drawing/chart-input.js';
import { columnsOf, nearestPoint } from '../../../shared/drawing/curves/columns.js';
import type { CursorName } from '../../../shared/drawing/marks/cursors.js';
import { panned, zoomed } from '../../../shared/drawing/scales/ranges.js';
import { highestPeak } from '../../../shared/drawing/words/describe.js';
import { impedanceExtrema } from '../../../shared/drawing/words/extrema.js';
import { type AxisName, type ChartView, FIT_ALL, patchOf } from './chart-view.js';

/** What keys, buttons and gestures do to a chart: one function for each, so that every way does the same. */
const CURSOR_KEY = { A: 'cursorAHz', B: 'cursorBHz' } as const;
export const BUTTON_ZOOM = 1.6;

export function cursorHz(state: ChartState, cursor: CursorName): number | null {
  return state[CURSOR_KEY[cursor]];
}
const settleRange = (view: ChartView) => (patch: Partial<ChartState>) => view.store.settle(patch, 'range');

/** Around the chosen cursor when it is in view, else around the middle. */
export function zoomFrequency(view: ChartView, factor: number): void {
  const range = view.rangeOf('frequency');
  const kind = view.kindOf('frequency');
  const cursor = cursorHz(view.store.get(), view.store.getChosenCursor());
  const middle = kind === 'log' ? Math.sqrt(range[0] * range[1]) : (range[0] + range[1]) / 2;
  const anchor = cursor !== null && cursor > range[0] && cursor < range[1] ? cursor : middle;
  view.moveTo(view.rangePatch('frequency', zoomed(range, kind, anchor, factor)), settleRange(view));
}
export function panAxis(view: ChartView, axis: AxisName, part: number): void {
  view.moveTo(view.rangePatch(axis, panned(view.rangeOf(axis), view.kindOf(axis), part)), settleRange(view));
}
export function setRange(view: ChartView, axis: AxisName, low: number, high: number): void {
  view.moveTo(patchOf(axis, [low, high]), settleRange(view));
}
export function fitAxis(view: ChartView, axis: AxisName): void {
  view.moveTo(patchOf(axis, null), settleRange(view));
}
export function fitAll(view: ChartView): void {
  view.moveTo(FIT_ALL, settleRange(view));
}
export function stepBack(view: ChartView): void {
  const before = view.store.takeBack();
  if (before) view.moveTo(before, (patch) => view.store.settleBack(patch));
}
export function swapScale(view: ChartView, axis: 'frequency' | 'magnitude'): void {
  const { frequencyScale, magnitudeScale } = view.store.get();
  const other = (kind: 'log' | 'linear') => (kind === 'log' ? 'linear' : 'log');
  if (axis === 'frequency') {
    view.store.settle({ frequencyScale: other(frequencyScale), frequencyRangeHz: null }, 'scale');
  } else view.store.settle({ magnitudeScale: other(magnitudeScale), magnitudeRangeOhm: null }, 'scale');
}

/** Puts a cursor on the nearest measured point of the active sweep, so that its values are in the file. */
export function snapped(view: ChartView, hz: number): number {
  const points = view.active?.points;
  return points && points.frequencyHz.length > 0 ? (points.frequencyHz[nearestPoint(points, hz)] ?? hz) : hz;
}
export function placeCursor(view: ChartView, cursor: CursorName, hz: number, isSettled: boolean): void {
  const patch = { [CURSOR_KEY[cursor]]: hz };
  if (isSettled) view.store.settle(patch, 'cursor');
  else view.store.move(patch);
}
export function removeCursor(view: ChartView, cursor: CursorName): void {
  view.store.settle({ [CURSOR_KEY[cursor]]: null }, 'cursor');
}
/** Chooses a cursor; one that is not set yet goes to the main peak, or to the middle of what is shown. */
export function chooseCursor(view: ChartView, cursor: CursorName): void {
  view.store.chooseCursor(cursor);
  if (cursorHz(view.store.get(), cursor) !== null) return;
  const points = view.active?.points;
  if (!points) return;
  const [low, high] = view.rangeOf('frequency');
  const peak = highestPeak(points);
  const peakHz = peak === null ? undefined : points.frequencyHz[peak];
  const isTaken = peakHz === cursorHz(view.store.get(), cursor === 'A' ? 'B' : 'A');
  const isShown = peakHz !== undefined && peakHz > low && peakHz < high && !isTaken;
  placeCursor(view, cursor, isShown ? peakHz : snapped(view, Math.sqrt(Math.max(low, 1e-9) * high)), true);
}
/** Moves the chosen cursor by whole points of the active sweep. */
export function stepCursor(view: ChartView, steps: number): void {
  const cursor = view.store.getChosenCursor();
  const points = view.active?.points;
  if (!points) return;
  const hz = cursorHz(view.store.get(), cursor);
  if (hz === null) {
    chooseCursor(view, cursor);
    return;
  }
  const { frequencyHz } = columnsOf(points);
  const index = nearestPoint(points, hz) + steps;
  goToPoint(view, cursor, frequencyHz[Math.min(frequencyHz.length - 1, Math.max(0, index))] ?? hz);
}
export function cursorToEnd(view: ChartView, end: 'first' | 'last'): void {
  const all = view.active?.points.frequencyHz;
  if (!all || all.length === 0) return;
  goToPoint(view, view.store.getChosenCursor(), all[end === 'first' ? 0 : all.length - 1] ?? 0);
}
/** To the next peak or dip after the chosen cursor; false when there is none. */
export function toExtremum(view: ChartView, kind: 'peak' | 'dip', direction: 1 | -1): boolean {
  const points = view.active?.points;
  if (!points) return false;
  const { frequencyHz, lnMagnitude } = columnsOf(points);
  const cursor = view.store.getChosenCursor();
  const hz = cursorHz(view.store.get(), cursor) ?? (direction > 0 ? 0 : Number.POSITIVE_INFINITY);
  const places = impedanceExtrema(lnMagnitude)
    .filter((e) => e.kind === kind)
    .map((e) => frequencyHz[e.index] ?? 0)
    .filter((place) => (direction > 0 ? place > hz * (1 + 1e-9) : place < hz * (1 - 1e-9)));
  const next = direction > 0 ? places[0] : places[places.length - 1];
  if (next === undefined) return false;
  goToPoint(view, cursor, next);
  return true;
}
/** Sets the cursor and brings it into view when it left it. */
function goToPoint(view: ChartView, cursor: CursorName, hz: number): void {
  placeCursor(view, cursor, hz, true);
  const [low, high] = view.rangeOf('frequency');
  if (hz >= low && hz <= high) return;
  const kind = view.kindOf('frequency');
  const u = (v: number) => (kind === 'log' ? Math.log(v) : v);
  const part = (u(hz) - (u(low) + u(high)) / 2) / (u(high) - u(low));
  panAxis(view, 'frequency', part);
}
/** The sweep before or after the active one in drawing order, null at the end. */
export function neighbourSweep(view: ChartView, direction: 1 | -1): string | null {
  const drawn = view.sweeps.filter((sweep) => !sweep.isDimmed);
  const at = view.active ? drawn.indexOf(view.active) : -1;
  return drawn[at + direction]?.id ?? null;
}
