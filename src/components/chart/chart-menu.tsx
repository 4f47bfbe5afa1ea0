import { type KeyboardEvent, useEffect, useRef } from 'react';
import { formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { fitAll, placeCursor } from './chart-actions.js';
import type { ChartView } from './chart-view.js';
import type { LocalPoint } from './gestures/gesture-target.js';

interface ChartMenuProps {
  readonly view: ChartView;
  readonly hz: number;
  readonly at: LocalPoint;
  readonly onMarker: ((hz: number) => void) | undefined;
  readonly onNote: ((hz: number) => void) | undefined;
  readonly onClose: () => void;
}

/** Right click or long press: what can be done at this frequency. */
export function ChartMenu({ view, hz, at, onMarker, onNote, onClose }: ChartMenuProps) {
  const list = useRef<HTMLDivElement>(null);
  useEffect(() => {
    list.current?.querySelector<HTMLElement>('[role=menuitem]')?.focus();
    const outside = (event: Event) => {
      if (event.target instanceof Node && !list.current?.contains(event.target)) onClose();
    };
    document.addEventListener('pointerdown', outside, true);
    return () => document.removeEventListener('pointerdown', outside, true);
  }, [onClose]);
  const entries: { label: string; act: () => void }[] = [
    ...(onMarker ? [{ label: text.chart.menu.marker, act: () => onMarker(hz) }] : []),
    ...(onNote ? [{ label: text.chart.menu.note, act: () => onNote(hz) }] : []),
    ...(['A', 'B'] as const).map((cursor) => ({
      label: text.chart.cursor.here(cursor),
      act: () => {
        view.store.chooseCursor(cursor);
        placeCursor(view, cursor, hz, true);
      },
    })),
    { label: text.chart.controls.fitAll, act: () => fitAll(view) },
  ];
  const keys = (event: KeyboardEvent) => {
    const items = [...(list.current?.querySelectorAll<HTMLElement>('[role=menuitem]') ?? [])];
    const index = items.indexOf(document.activeElement as HTMLElement);
    const step = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    if (step) items[(index + step + items.length) % items.length]?.focus();
    else if (event.key === 'Escape' || event.key === 'Tab') onClose();
    else return;
    event.preventDefault();
    event.stopPropagation();
  };
  const { widthPx } = view.currentLayout();
  return (
    <div
      ref={list}
      role="menu"
      tabIndex={-1}
      aria-label={`${text.chart.menu.name}, ${formatQuantity(hz, 'Hz')}`}
      className="chart-popover chart-menu"
      style={{ left: Math.min(at.x, Math.max(0, widthPx - 190)), top: at.y }}
      onKeyDown={keys}
    >
      <p className="chart-menu-place">{formatQuantity(hz, 'Hz')}</p>
      {entries.map(({ label, act }) => (
        <button
          key={label}
          type="button"
          role="menuitem"
          className="chart-menu-item"
          onClick={() => {
            act();
            onClose();
          }}
        >
          {label}
        </button>
      ))}
    </div>
  );
}
