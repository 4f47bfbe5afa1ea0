import { type RefObject, useCallback, useEffect, useMemo, useRef } from 'react';
import { flagLines } from '../../../shared/drawing/marks/cursors.js';
import { valueOfCurve } from '../../../shared/drawing/words/readout.js';
import { text } from '../../../shared/text.js';
import { cursorHz } from './chart-actions.js';
import type { ChartView } from './chart-view.js';

/** What is spoken after 250 ms of rest, so that a held arrow key does not stutter. */
const REST_MS = 250;
export interface Spoken {
  readonly place: RefObject<HTMLParagraphElement | null>;
  readonly say: (words: string) => void;
  readonly sayCursor: () => void;
  readonly saySweep: (name: string) => void;
  readonly sayScale: (axis: 'frequency' | 'magnitude') => void;
}

export function useSpokenValue(view: ChartView | null): Spoken {
  const place = useRef<HTMLParagraphElement>(null);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  useEffect(() => () => clearTimeout(timer.current), []);
  const sayLater = useCallback((words: () => string) => {
    clearTimeout(timer.current);
    timer.current = setTimeout(() => {
      if (place.current) place.current.textContent = words();
    }, REST_MS);
  }, []);
  return useMemo(
    () => ({
      place,
      say: (words: string) => sayLater(() => words),
      sayCursor: () => sayLater(() => (view ? cursorWords(view) : '')),
      saySweep: (name: string) => sayLater(() => text.chart.spoken.sweep(name)),
      sayScale: (axis: 'frequency' | 'magnitude') =>
        sayLater(() => {
          const words = view?.kindOf(axis) === 'log' ? text.chart.spoken.log : text.chart.spoken.linear;
          return words(axis === 'frequency' ? text.chart.controls.frequencyScale : text.chart.controls.magnitudeScale);
        }),
    }),
    [view, sayLater],
  );
}

function cursorWords(view: ChartView): string {
  const cursor = view.store.getChosenCursor();
  const hz = cursorHz(view.store.get(), cursor);
  const sweep = view.active;
  if (hz === null || !sweep) return '';
  const [frequency, values] = flagLines(hz, valueOfCurve(sweep.points, hz), view.input());
  return text.chart.spoken.cursor(text.chart.cursor.name(cursor), frequency, values, sweep.name);
}

export function SpokenValue({ spoken }: { spoken: Spoken }) {
  return <p ref={spoken.place} className="chart-spoken" role="status" aria-live="polite" />;
}
