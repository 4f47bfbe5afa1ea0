import { type KeyboardEvent, type RefObject, useCallback, useEffect, useRef } from 'react';
import type { ChartView } from './chart-view.js';
import type { GestureOptions } from './gestures/gesture-target.js';
import { type KeyOptions, pressChartKey } from './gestures/keys.js';
import { attachMouse } from './gestures/mouse.js';
import { attachTouch } from './gestures/touch.js';
import { attachWheel } from './gestures/wheel.js';

type Answers = Omit<GestureOptions, 'root' | 'view'> & Omit<KeyOptions, 'view'>;

/** Listens once per view; what the listeners answer to may change with every render. */
export function useChartGestures(root: RefObject<HTMLDivElement | null>, view: ChartView | null, answers: Answers) {
  const latest = useRef(answers);
  useEffect(() => {
    latest.current = answers;
  });
  useEffect(() => {
    if (!root.current || !view) return;
    const options: GestureOptions = {
      root: root.current,
      view,
      onAxis: (axis, at) => latest.current.onAxis(axis, at),
      onMenu: (hz, at) => latest.current.onMenu(hz, at),
      onActiveSweep: (id) => latest.current.onActiveSweep(id),
      onFitAll: () => latest.current.onFitAll(),
      onHint: () => latest.current.onHint(),
      onCursorMoved: () => latest.current.onCursorMoved(),
    };
    const detach = [attachWheel(options), attachMouse(options), attachTouch(options)];
    return () => {
      for (const stop of detach) stop();
    };
  }, [root, view]);

  return useCallback(
    (event: KeyboardEvent<HTMLElement>) => {
      if (!view || event.target !== event.currentTarget) return;
      if (pressChartKey(event, { view, ...latest.current })) {
        event.preventDefault();
        event.stopPropagation();
      }
    },
    [view],
  );
}
