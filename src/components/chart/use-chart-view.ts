import { type RefObject, useEffect, useLayoutEffect, useRef, useState } from 'react';
import type { ChartContent } from '../../../shared/drawing/chart-input.js';
import type { ChartStore } from './chart-store.js';
import { watchChartTheme } from './chart-theme.js';
import { ChartView } from './chart-view.js';

export interface ChartRefs {
  readonly root: RefObject<HTMLDivElement | null>;
  readonly canvas: RefObject<HTMLCanvasElement | null>;
  readonly frame: RefObject<SVGGElement | null>;
  readonly cursors: RefObject<SVGGElement | null>;
  readonly rings: RefObject<SVGGElement | null>;
}

/** Ties a painter to its elements: size, theme, pixel ratio and store. Null until the elements exist. */
export function useChartView(store: ChartStore, content: ChartContent, locale: string | undefined) {
  const refs: ChartRefs = {
    root: useRef<HTMLDivElement>(null),
    canvas: useRef<HTMLCanvasElement>(null),
    frame: useRef<SVGGElement>(null),
    cursors: useRef<SVGGElement>(null),
    rings: useRef<SVGGElement>(null),
  };
  const [view, setView] = useState<ChartView | null>(null);
  const { root, canvas, frame, cursors, rings } = refs;
  const first = useRef({ content, locale });

  useLayoutEffect(() => {
    if (!root.current || !canvas.current || !frame.current || !cursors.current || !rings.current) return;
    const elements = {
      canvas: canvas.current,
      frame: frame.current,
      cursors: cursors.current,
      rings: rings.current,
    };
    const made = new ChartView(elements, store, first.current.content, first.current.locale);
    const { width, height } = root.current.getBoundingClientRect();
    made.resize(width, height);
    setView(made);
    const sizes = new ResizeObserver(([entry]) => {
      if (entry) made.resize(entry.contentRect.width, entry.contentRect.height);
    });
    sizes.observe(root.current);
    const leave = [store.subscribe(made.request), watchChartTheme(() => made.retheme()), watchPixelRatio(made)];
    return () => {
      sizes.disconnect();
      for (const stop of leave) stop();
      made.stop();
      setView(null);
    };
  }, [store, root, canvas, frame, cursors, rings]);

  useEffect(() => view?.show(content, locale), [view, content, locale]);
  return { refs, view };
}

/** A window moved to another screen has another number of pixels to a point. */
function watchPixelRatio(view: ChartView): () => void {
  const query = window.matchMedia?.(`(resolution: ${window.devicePixelRatio || 1}dppx)`);
  const changed = () => view.requestAll();
  query?.addEventListener('change', changed);
  return () => query?.removeEventListener('change', changed);
}
