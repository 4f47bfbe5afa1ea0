import type { Primitive, Rect } from '../../../../shared/drawing/primitives.js';
import { type Range, valueAt } from '../../../../shared/drawing/scales/axis-scale.js';
import type { AxisName, ChartView } from '../chart-view.js';
import type { LocalPoint } from './gesture-target.js';

/** The area that a drag across the plot encloses, as something to see and as the ranges it stands for. */
const LEAST_WIDTH_PX = 6;
const LEAST_HEIGHT_PX = 28;

export interface Band {
  readonly items: readonly Primitive[];
  readonly ranges: readonly { readonly axis: AxisName; readonly range: Range }[];
}

export function chooseBand(view: ChartView, start: LocalPoint, end: LocalPoint): Band {
  const { frame, frequency } = view.currentLayout();
  const strip = view.stripAt(start.y);
  const clampX = (x: number) => Math.min(frame.x + frame.width, Math.max(frame.x, x));
  const left = clampX(Math.min(start.x, end.x));
  const right = clampX(Math.max(start.x, end.x));
  if (right - left < LEAST_WIDTH_PX) return { items: [], ranges: [] };
  const ranges: Band['ranges'][number][] = [
    { axis: 'frequency', range: [valueAt(frequency, left), valueAt(frequency, right)] },
  ];
  let area: Rect = { x: left, y: frame.y, width: right - left, height: frame.height };
  if (strip && Math.abs(end.y - start.y) >= LEAST_HEIGHT_PX) {
    const clampY = (y: number) => Math.min(strip.rect.y + strip.rect.height, Math.max(strip.rect.y, y));
    const top = clampY(Math.min(start.y, end.y));
    const bottom = clampY(Math.max(start.y, end.y));
    ranges.push({ axis: strip.quantity, range: [valueAt(strip.scale, bottom), valueAt(strip.scale, top)] });
    area = { x: left, y: top, width: right - left, height: bottom - top };
  }
  const { focus } = view.input().theme;
  const items: Primitive[] = [
    { kind: 'rect', ...area, fill: { color: focus, opacity: 0.1 }, stroke: { color: focus, width: 1, dash: [4, 3] } },
  ];
  return { items, ranges };
}
