import { ChevronLeft, ChevronRight } from 'lucide-react';
import { useEffect, useRef } from 'react';
import { cursorFlags } from '../../../shared/drawing/marks/cursors.js';
import { text } from '../../../shared/text.js';
import { stepCursor } from './chart-actions.js';
import type { ChartView } from './chart-view.js';
import { useChosenCursor, useSettledState } from './use-chart-store.js';

/** Arrows beside the flag of the chosen cursor, for fingers: one measured point down or up. */
export function CursorArrows({ view, onMoved }: { view: ChartView; onMoved: () => void }) {
  const box = useRef<HTMLDivElement>(null);
  const chosen = useChosenCursor(view.store);
  const state = useSettledState(view.store);
  const isSet = (chosen === 'A' ? state.cursorAHz : state.cursorBHz) !== null;
  useEffect(() => {
    const follow = () => {
      if (!box.current) return;
      const flag = cursorFlags(view.input(), view.currentLayout()).find((f) => f.cursor === chosen);
      box.current.hidden = !flag;
      if (!flag) return;
      const { rect } = flag;
      const room = box.current.offsetWidth / 2;
      const onRight = rect.x + rect.width + 2 + room * 2 <= view.currentLayout().widthPx;
      const x = onRight ? rect.x + rect.width + 2 : rect.x - room * 2 - 2;
      box.current.style.transform = `translate(${Math.max(0, Math.round(x))}px, ${rect.y}px)`;
    };
    follow();
    view.onPainted = follow;
    return () => {
      view.onPainted = undefined;
    };
  }, [view, chosen]);
  const step = (by: number) => {
    stepCursor(view, by);
    onMoved();
  };
  if (!isSet) return null;
  return (
    <div ref={box} className="chart-arrows">
      <button
        type="button"
        tabIndex={-1}
        className="chart-arrow"
        aria-label={text.chart.cursor.back(chosen)}
        onClick={() => step(-1)}
      >
        <ChevronLeft aria-hidden size={18} strokeWidth={1.75} />
      </button>
      <button
        type="button"
        tabIndex={-1}
        className="chart-arrow"
        aria-label={text.chart.cursor.on(chosen)}
        onClick={() => step(1)}
      >
        <ChevronRight aria-hidden size={18} strokeWidth={1.75} />
      </button>
    </div>
  );
}
