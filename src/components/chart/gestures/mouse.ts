import { panned, stretched } from '../../../../shared/drawing/scales/ranges.js';
import { placeCursor, snapped } from '../chart-actions.js';
import { type AxisName, patchOf } from '../chart-view.js';
import { type GestureOptions, hzAt, type LocalPoint, localPoint, sweepAt, targetAt } from './gesture-target.js';
import { chooseBand } from './rubber-band.js';

/** Mouse and pen. One drag at a time; Esc drops it. A finger is left to touch.ts and to the page's scrolling. */
interface Drag {
  move(point: LocalPoint): void;
  end(point: LocalPoint, event: PointerEvent): void;
}
const MOVED_PX = 5;
const NEAR_LINE_PX = 6;

export function attachMouse(options: GestureOptions): () => void {
  const { root, view } = options;
  let drag: Drag | null = null;
  let isSpaceDown = false;
  const down = (event: PointerEvent) => {
    if (event.pointerType === 'touch' || drag) return;
    if (event.target instanceof Element && event.target.closest('button, input, [role=dialog]')) return;
    const point = localPoint(root, event);
    drag = beginDrag(options, event, point, isSpaceDown);
    if (!drag) return;
    event.preventDefault();
    root.focus({ preventScroll: true });
    root.setPointerCapture(event.pointerId);
  };
  const move = (event: PointerEvent) => {
    if (event.pointerType === 'touch') return;
    if (drag) drag.move(localPoint(root, event));
    else root.style.cursor = pointerShape(options, localPoint(root, event), isSpaceDown);
  };
  const up = (event: PointerEvent) => {
    const ended = drag;
    drag = null;
    ended?.end(localPoint(root, event), event);
  };
  const drop = () => {
    drag = null;
    view.band = [];
    view.store.dropMove();
  };
  const key = (event: KeyboardEvent) => {
    if (event.key === ' ') {
      isSpaceDown = event.type === 'keydown';
      if (document.activeElement === root) event.preventDefault();
    }
    if (event.key === 'Escape' && drag) {
      drop();
      event.stopPropagation();
    }
  };
  const doubleClick = (event: MouseEvent) => {
    if (targetAt(view, localPoint(root, event)).kind === 'plot') options.onFitAll();
  };
  const menu = (event: MouseEvent) => {
    const point = localPoint(root, event);
    if (targetAt(view, point).kind !== 'plot') return;
    event.preventDefault();
    if (event instanceof PointerEvent && event.pointerType === 'touch') return; // a long press: touch.ts holds the cursor
    options.onMenu(snapped(view, hzAt(view, point.x)), point);
  };
  const listeners: [string, EventListener][] = [
    ['pointerdown', down as EventListener],
    ['pointermove', move as EventListener],
    ['pointerup', up as EventListener],
    ['pointercancel', drop],
    ['keydown', key as EventListener],
    ['keyup', key as EventListener],
    ['dblclick', doubleClick as EventListener],
    ['contextmenu', menu as EventListener],
  ];
  for (const [name, listener] of listeners) root.addEventListener(name, listener);
  return () => {
    for (const [name, listener] of listeners) root.removeEventListener(name, listener);
  };
}

function beginDrag(options: GestureOptions, event: PointerEvent, start: LocalPoint, isSpaceDown: boolean): Drag | null {
  const target = targetAt(options.view, start);
  if (event.button === 1 || (event.button === 0 && isSpaceDown))
    return target.kind === 'none' ? null : panDrag(options, start);
  if (event.button !== 0) return null;
  switch (target.kind) {
    case 'flag':
      return flagDrag(options, target.flag.cursor, start, target.flag.poleX);
    case 'axis':
      return axisDrag(options, target.axis, start);
    case 'plot':
      return plotDrag(options, start);
    case 'none':
      return null;
  }
}

/** Moves the frequency, and the values of the strip once they are zoomed in. */
function panDrag({ view }: GestureOptions, start: LocalPoint): Drag {
  const strip = view.stripAt(start.y);
  const axis = strip?.quantity;
  const frequency = view.rangeOf('frequency');
  const values = axis && view.store.get()[valueKey(axis)] ? view.rangeOf(axis) : null;
  const { frame } = view.currentLayout();
  return {
    move(point) {
      const patch = view.rangePatch(
        'frequency',
        panned(frequency, view.kindOf('frequency'), (start.x - point.x) / frame.width),
      );
      if (!values || !strip || !axis) return view.store.move(patch);
      const moved = panned(values, view.kindOf(axis), (point.y - start.y) / strip.rect.height);
      view.store.move({ ...patch, ...view.rangePatch(axis, moved) });
    },
    end: () => view.store.settle({}, 'range'),
  };
}
const VALUE_KEYS = {
  magnitude: 'magnitudeRangeOhm',
  phase: 'phaseRangeDeg',
  real: 'realRangeOhm',
  imaginary: 'imaginaryRangeOhm',
  frequency: 'frequencyRangeHz',
} as const;
export const valueKey = (axis: AxisName) => VALUE_KEYS[axis];

function flagDrag(options: GestureOptions, cursor: 'A' | 'B', start: LocalPoint, poleX: number): Drag {
  const { view } = options;
  view.store.chooseCursor(cursor);
  const place = (point: LocalPoint, isSettled: boolean) =>
    placeCursor(view, cursor, snapped(view, hzAt(view, poleX + point.x - start.x)), isSettled);
  return {
    move: (point) => place(point, false),
    end(point) {
      if (Math.abs(point.x - start.x) > 0) place(point, true);
      options.onCursorMoved();
    },
  };
}

/** Drags the numbers of an axis: what was grabbed follows the pointer, the far end stands still. A click: exact values. */
function axisDrag(options: GestureOptions, axis: AxisName, start: LocalPoint): Drag {
  const { view } = options;
  const { frame } = view.currentLayout();
  const strip = view.stripAt(start.y);
  const range = view.rangeOf(axis);
  const part = (point: LocalPoint) =>
    axis === 'frequency'
      ? (point.x - frame.x) / frame.width
      : strip
        ? (strip.rect.y + strip.rect.height - point.y) / strip.rect.height
        : 0;
  const from = part(start);
  let hasMoved = false;
  return {
    move(point) {
      hasMoved ||= Math.hypot(point.x - start.x, point.y - start.y) >= MOVED_PX;
      if (!hasMoved) return;
      const next = stretched(range, view.kindOf(axis), from < 0.5 ? 'end' : 'start', from, part(point));
      view.store.move(view.rangePatch(axis, next));
    },
    end() {
      if (hasMoved) view.store.settle({}, 'range');
      else options.onAxis(axis, start);
    },
  };
}

/** Across: to that range; diagonally: both axes; a click: cursor A, with Shift B. */
function plotDrag(options: GestureOptions, start: LocalPoint): Drag {
  const { view } = options;
  return {
    move(point) {
      view.band = chooseBand(view, start, point).items;
      view.request();
    },
    end(point, event) {
      view.band = [];
      const { ranges } = chooseBand(view, start, point);
      if (ranges.length === 0) return click(options, start, event.shiftKey);
      const patch = Object.assign({}, ...ranges.map(({ axis, range }) => patchOf(axis, range)));
      view.moveTo(patch, (settled) => view.store.settle(settled, 'range'));
    },
  };
}
function click(options: GestureOptions, point: LocalPoint, isShift: boolean): void {
  const { view } = options;
  const sweep = sweepAt(view, point, NEAR_LINE_PX);
  if (sweep && sweep !== view.active?.id) options.onActiveSweep(sweep);
  const cursor = isShift ? 'B' : 'A';
  view.store.chooseCursor(cursor);
  placeCursor(view, cursor, snapped(view, hzAt(view, point.x)), true);
  options.onCursorMoved();
}

function pointerShape(options: GestureOptions, point: LocalPoint, isSpaceDown: boolean): string {
  const target = targetAt(options.view, point);
  if (isSpaceDown && target.kind !== 'none') return 'grab';
  switch (target.kind) {
    case 'flag':
      return 'ew-resize';
    case 'axis':
      return target.axis === 'frequency' ? 'ew-resize' : 'ns-resize';
    case 'plot':
      return 'crosshair';
    case 'none':
      return 'default';
  }
}
