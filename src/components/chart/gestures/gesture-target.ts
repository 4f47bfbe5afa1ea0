import { type CursorFlag, type CursorName, cursorFlags } from '../../../../shared/drawing/marks/cursors.js';
import { pixelOf, valueAt } from '../../../../shared/drawing/scales/axis-scale.js';
import { valueOfCurve } from '../../../../shared/drawing/words/readout.js';
import type { AxisName, ChartView } from '../chart-view.js';

/** What a pointer is over, and where. */
export interface LocalPoint {
  readonly x: number;
  readonly y: number;
}
export type Target =
  | { readonly kind: 'flag'; readonly flag: CursorFlag }
  | { readonly kind: 'axis'; readonly axis: AxisName }
  | { readonly kind: 'plot' }
  | { readonly kind: 'none' };

export interface GestureOptions {
  readonly root: HTMLElement; // the one focus stop, as large as the drawing
  readonly view: ChartView;
  readonly onAxis: (axis: AxisName, at: LocalPoint) => void; // click: exact values
  readonly onMenu: (hz: number, at: LocalPoint) => void;
  readonly onActiveSweep: (id: string) => void;
  readonly onFitAll: () => void;
  readonly onHint: () => void; // the wheel was not for the chart
  readonly onCursorMoved: () => void;
}

export function localPoint(root: HTMLElement, event: { clientX: number; clientY: number }): LocalPoint {
  const box = root.getBoundingClientRect();
  return { x: event.clientX - box.left, y: event.clientY - box.top };
}

export function targetAt(view: ChartView, { x, y }: LocalPoint, reachPx = 4): Target {
  const layout = view.currentLayout();
  const { frame, frequencyAxis } = layout;
  const flag = cursorFlags(view.input(), layout).find(({ rect }) => {
    const isAcross = x >= rect.x - reachPx && x <= rect.x + rect.width + reachPx;
    return isAcross && y >= rect.y - reachPx && y <= rect.y + rect.height + reachPx;
  });
  if (flag) return { kind: 'flag', flag };
  const isAcross = x >= frame.x && x <= frame.x + frame.width;
  if (isAcross && y >= frame.y && y <= frame.y + frame.height) return { kind: 'plot' };
  if (isAcross && y > frame.y + frame.height && y <= frequencyAxis.y + frequencyAxis.height) {
    return { kind: 'axis', axis: 'frequency' };
  }
  const strip = view.stripAt(y);
  if (strip && x < frame.x) return { kind: 'axis', axis: strip.quantity };
  return { kind: 'none' };
}

export function hzAt(view: ChartView, x: number): number {
  const { frame, frequency } = view.currentLayout();
  return valueAt(frequency, Math.min(frame.x + frame.width, Math.max(frame.x, x)));
}

/** The sweep whose line passes within `reachPx` of the pointer; the nearest one. */
export function sweepAt(view: ChartView, { x, y }: LocalPoint, reachPx: number): string | null {
  const strip = view.stripAt(y);
  if (!strip) return null;
  const { frequency } = view.currentLayout();
  let found: { id: string; distance: number } | null = null;
  for (const sweep of view.sweeps) {
    if (sweep.isDimmed) continue;
    for (const dx of [-2, 0, 2]) {
      const value = valueOfCurve(sweep.points, valueAt(frequency, x + dx));
      const shown =
        value &&
        { magnitude: value.magnitudeOhm, phase: value.phaseDeg, real: value.realOhm, imaginary: value.imaginaryOhm }[
          strip.quantity
        ];
      if (shown === null || shown === undefined) continue;
      const distance = Math.hypot(dx, pixelOf(strip.scale, shown) - y);
      if (distance <= reachPx && (!found || distance < found.distance)) found = { id: sweep.id, distance };
    }
  }
  return found?.id ?? null;
}

export const otherCursor = (cursor: CursorName): CursorName => (cursor === 'A' ? 'B' : 'A');
