import { valueAt } from '../../../../shared/drawing/scales/axis-scale.js';
import { panned, zoomed } from '../../../../shared/drawing/scales/ranges.js';
import { type GestureOptions, hzAt, localPoint, targetAt } from './gesture-target.js';

/** The wheel: zooms with Ctrl or ⌘ (a trackpad's pinch arrives so), or plainly once the chart has focus; Shift pans. */
const REST_MS = 160;
const LINE_PX = 16;

export function attachWheel(options: GestureOptions): () => void {
  const { root, view } = options;
  let rest: ReturnType<typeof setTimeout> | undefined;
  const settleSoon = () => {
    clearTimeout(rest);
    rest = setTimeout(() => view.store.settle({}, 'range'), REST_MS);
  };
  const onWheel = (event: WheelEvent) => {
    const hasKey = event.ctrlKey || event.metaKey;
    const isPan = event.shiftKey && !hasKey;
    if (!hasKey && !isPan && !root.contains(document.activeElement) && isPageScrollable(root)) {
      options.onHint();
      return;
    }
    event.preventDefault();
    const pxPerUnit = event.deltaMode === 1 ? LINE_PX : event.deltaMode === 2 ? root.clientHeight : 1;
    if (isPan) pan(options, (event.deltaX || event.deltaY) * pxPerUnit);
    else if (!hasKey && Math.abs(event.deltaX) > Math.abs(event.deltaY) * 1.5) pan(options, event.deltaX * pxPerUnit);
    else zoom(options, event, event.deltaY * pxPerUnit * (hasKey && event.deltaMode === 0 ? PINCH_GAIN : 1));
    settleSoon();
  };
  root.addEventListener('wheel', onWheel, { passive: false });
  return () => {
    clearTimeout(rest);
    root.removeEventListener('wheel', onWheel);
  };
}
const PINCH_GAIN = 2;
const WHEEL_GAIN = 1 / 500; // of ln: one notch of 100 px changes the range by a fifth

function pan({ view }: GestureOptions, byPx: number): void {
  const { frame } = view.currentLayout();
  const range = panned(view.rangeOf('frequency'), view.kindOf('frequency'), byPx / frame.width);
  view.store.move(view.rangePatch('frequency', range));
}
/** Over the numbers of a value axis that axis zooms, everywhere else the frequency. */
function zoom({ root, view }: GestureOptions, event: WheelEvent, delta: number): void {
  const point = localPoint(root, event);
  const target = targetAt(view, point);
  const factor = Math.exp(-Math.max(-400, Math.min(400, delta)) * WHEEL_GAIN);
  const axis = target.kind === 'axis' ? target.axis : 'frequency';
  const strip = view.stripAt(point.y);
  const anchor = axis !== 'frequency' && strip ? valueAt(strip.scale, point.y) : hzAt(view, point.x);
  view.store.move(view.rangePatch(axis, zoomed(view.rangeOf(axis), view.kindOf(axis), anchor, factor)));
}

/** Whether a plain wheel has something to scroll behind the chart. */
export function isPageScrollable(element: HTMLElement): boolean {
  for (let at: HTMLElement | null = element.parentElement; at; at = at.parentElement) {
    if (at.scrollHeight <= at.clientHeight + 1) continue;
    const { overflowY } = getComputedStyle(at);
    const isRoot = at === document.documentElement || at === document.body;
    if (overflowY === 'auto' || overflowY === 'scroll' || (isRoot && overflowY !== 'hidden')) return true;
  }
  return false;
}
