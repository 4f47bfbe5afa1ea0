import { type Range, valueAt } from '../../../../shared/drawing/scales/axis-scale.js';
import { panned, zoomed } from '../../../../shared/drawing/scales/ranges.js';
import { chooseCursor, cursorHz, fitAll, placeCursor, snapped } from '../chart-actions.js';
import { isWorkshop } from '../chart-theme.js';
import type { AxisName, ChartView } from '../chart-view.js';
import {
  type GestureOptions,
  hzAt,
  type LocalPoint,
  localPoint,
  otherCursor,
  sweepAt,
  targetAt,
} from './gesture-target.js';

/**
 * Fingers. One finger scrolls the page; a long press, a touch of a flag, or the workshop mode gives it the cursor. Two
 * fingers pinch and pan; a double tap fits all; a tap on an axis opens its exact values.
 */
const LONG_PRESS_MS = 400;
const DOUBLE_TAP_MS = 300;
const SLOP_PX = 10;
const FINGER_PX = 14;

interface Pinch {
  readonly axis: AxisName;
  readonly range: Range;
  readonly distance: number;
  readonly middle: LocalPoint;
  readonly anchor: number;
}
interface Finger {
  readonly start: LocalPoint;
  readonly holdsCursor: boolean;
  readonly offsetX: number;
  readonly isLongPress?: boolean;
}

export function attachTouch(options: GestureOptions): () => void {
  const gesture = new TouchGesture(options);
  const { root } = options;
  const start = (event: TouchEvent) => gesture.start(event);
  const move = (event: TouchEvent) => gesture.move(event);
  const end = (event: TouchEvent) => gesture.end(event);
  const cancel = () => gesture.cancel();
  root.addEventListener('touchstart', start, { passive: false });
  root.addEventListener('touchmove', move, { passive: false });
  root.addEventListener('touchend', end, { passive: false });
  root.addEventListener('touchcancel', cancel);
  return () => {
    gesture.cancel();
    root.removeEventListener('touchstart', start);
    root.removeEventListener('touchmove', move);
    root.removeEventListener('touchend', end);
    root.removeEventListener('touchcancel', cancel);
  };
}

class TouchGesture {
  private pinch: Pinch | null = null;
  private finger: Finger | null = null;
  private hasMoved = false;
  private longPress: ReturnType<typeof setTimeout> | undefined;
  private lastTap = 0;
  private readonly view: ChartView;

  constructor(private readonly options: GestureOptions) {
    this.view = options.view;
  }

  start(event: TouchEvent): void {
    if (event.target instanceof Element && event.target.closest('button, input, [role=dialog]')) return;
    clearTimeout(this.longPress);
    const [one, two] = [event.touches[0], event.touches[1]];
    if (one && two && event.touches.length === 2) {
      event.preventDefault();
      this.finger = null;
      this.pinch = this.beginPinch(this.at(one), this.at(two));
      return;
    }
    if (!one || event.touches.length > 1) return;
    const point = this.at(one);
    const target = targetAt(this.view, point, FINGER_PX);
    this.hasMoved = false;
    if (target.kind === 'flag') {
      event.preventDefault();
      this.view.store.chooseCursor(target.flag.cursor);
      this.finger = { start: point, holdsCursor: true, offsetX: target.flag.poleX - point.x };
    } else if (target.kind === 'plot' && isWorkshop()) {
      this.finger = { start: point, holdsCursor: true, offsetX: 0 };
    } else {
      this.finger = { start: point, holdsCursor: false, offsetX: 0 };
      if (target.kind === 'plot') this.longPress = setTimeout(() => this.hold(point), LONG_PRESS_MS);
    }
  }

  move(event: TouchEvent): void {
    const [one, two] = [event.touches[0], event.touches[1]];
    if (this.pinch && one && two) {
      event.preventDefault();
      this.movePinch(this.pinch, this.at(one), this.at(two));
      return;
    }
    if (!this.finger || !one) return;
    const point = this.at(one);
    const { start, holdsCursor, offsetX } = this.finger;
    if (Math.hypot(point.x - start.x, point.y - start.y) > SLOP_PX) {
      this.hasMoved = true;
      clearTimeout(this.longPress);
    }
    if (!holdsCursor) return;
    if (event.cancelable) event.preventDefault();
    const cursor = this.view.store.getChosenCursor();
    if (this.hasMoved) placeCursor(this.view, cursor, snapped(this.view, hzAt(this.view, point.x + offsetX)), false);
  }

  end(event: TouchEvent): void {
    clearTimeout(this.longPress);
    if (this.pinch) {
      if (event.touches.length < 2) {
        this.pinch = null;
        this.view.store.settle({}, 'range');
      }
      return;
    }
    const { finger } = this;
    this.finger = null;
    if (!finger) return;
    if (finger.holdsCursor) {
      this.view.store.settle({}, 'cursor');
      this.options.onCursorMoved();
      if (this.hasMoved) return;
      if (event.cancelable) event.preventDefault(); // else the click that follows lands on what just opened
      if (finger.isLongPress) this.options.onMenu(snapped(this.view, hzAt(this.view, finger.start.x)), finger.start);
      else if (isWorkshop()) this.tap(finger.start);
    } else if (!this.hasMoved) {
      if (targetAt(this.view, finger.start, FINGER_PX).kind === 'axis' && event.cancelable) event.preventDefault();
      this.tap(finger.start);
    }
  }

  cancel(): void {
    clearTimeout(this.longPress);
    this.pinch = null;
    this.finger = null;
    this.view.store.settle({}, 'range');
  }

  private at(touch: Touch): LocalPoint {
    return localPoint(this.options.root, touch);
  }

  /** The press was long: the finger now holds a cursor, and the menu opens if it is lifted without sliding. */
  private hold(point: LocalPoint): void {
    const { store } = this.view;
    const state = store.get();
    const chosen = store.getChosenCursor();
    if (cursorHz(state, chosen) !== null && cursorHz(state, otherCursor(chosen)) === null && chosen === 'A') {
      if (Math.abs(this.pxOf(cursorHz(state, 'A') ?? 0) - point.x) > FINGER_PX * 3) store.chooseCursor('B');
    }
    placeCursor(this.view, store.getChosenCursor(), snapped(this.view, hzAt(this.view, point.x)), false);
    this.finger = { start: point, holdsCursor: true, offsetX: 0, isLongPress: true };
    navigator.vibrate?.(8);
  }
  private pxOf(hz: number): number {
    const { frequency } = this.view.currentLayout();
    return frequency.slope * (frequency.kind === 'log' ? Math.log(hz) : hz) + frequency.offset;
  }

  private tap(point: LocalPoint): void {
    const now = performance.now();
    const isSecond = now - this.lastTap < DOUBLE_TAP_MS;
    this.lastTap = isSecond ? 0 : now;
    const target = targetAt(this.view, point, FINGER_PX);
    if (target.kind === 'axis') this.options.onAxis(target.axis, point);
    if (target.kind !== 'plot') return;
    if (isSecond) {
      fitAll(this.view);
      return;
    }
    const sweep = sweepAt(this.view, point, FINGER_PX);
    if (sweep) this.options.onActiveSweep(sweep);
    if (isWorkshop()) chooseCursor(this.view, this.view.store.getChosenCursor());
  }

  /** Fingers side by side zoom the frequency, one above the other the values of the strip between them. */
  private beginPinch(a: LocalPoint, b: LocalPoint): Pinch {
    const middle = { x: (a.x + b.x) / 2, y: (a.y + b.y) / 2 };
    const isUpright = Math.abs(a.y - b.y) > Math.abs(a.x - b.x) * 1.5;
    const strip = isUpright ? this.view.stripAt(middle.y) : undefined;
    const axis: AxisName = strip ? strip.quantity : 'frequency';
    const anchor = strip ? valueAt(strip.scale, middle.y) : hzAt(this.view, middle.x);
    return { axis, range: this.view.rangeOf(axis), distance: apart(axis, a, b), middle, anchor };
  }
  private movePinch(pinch: Pinch, a: LocalPoint, b: LocalPoint): void {
    const { axis, range, distance, middle, anchor } = pinch;
    const kind = this.view.kindOf(axis);
    const layout = this.view.currentLayout();
    const strip = layout.strips.find((s) => s.quantity === axis);
    const spread = zoomed(range, kind, anchor, apart(axis, a, b) / distance);
    const moved = strip
      ? ((a.y + b.y) / 2 - middle.y) / strip.rect.height
      : (middle.x - (a.x + b.x) / 2) / layout.frame.width;
    this.view.store.move(this.view.rangePatch(axis, panned(spread, kind, moved)));
  }
}
const apart = (axis: AxisName, a: LocalPoint, b: LocalPoint): number =>
  Math.max(24, axis === 'frequency' ? Math.hypot(a.x - b.x, (a.y - b.y) / 2) : Math.abs(a.y - b.y));
