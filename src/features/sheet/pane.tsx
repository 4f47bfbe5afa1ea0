import type { ReactNode } from 'react';
import { classNames } from '../../lib/class-names.js';

interface PaneProps {
  id: PaneId;
  title: string;
  actions?: ReactNode;
  /** The chart fills its pane; the others scroll. */
  isFilled?: boolean;
  children: ReactNode;
}
export type PaneId = 'ledger' | 'chart' | 'results' | 'footnotes';

/** One pane of the sheet: a landmark with its own heading that F6 reaches. */
export function Pane({ id, title, actions, isFilled, children }: PaneProps) {
  return (
    <section
      aria-labelledby={`pane-${id}`}
      data-pane={id}
      tabIndex={-1}
      className="flex h-full min-h-0 min-w-0 flex-col bg-sheet outline-none focus-visible:outline-2 focus-visible:-outline-offset-2 focus-visible:outline-focus"
    >
      <div className="flex min-h-11 shrink-0 flex-wrap items-center justify-between gap-x-3 border-b border-line px-3 py-1">
        <h2 id={`pane-${id}`} className="text-base font-semibold">
          {title}
        </h2>
        {actions && <div className="flex min-w-0 flex-wrap items-center gap-1">{actions}</div>}
      </div>
      <div className={classNames('min-h-0 flex-1', isFilled ? 'flex flex-col' : 'overflow-y-auto')}>{children}</div>
    </section>
  );
}

/** F6 goes round the panes; past the last one the browser has the key. True when a pane took the focus. */
export function focusNextPane(backwards: boolean): boolean {
  const panes = [...document.querySelectorAll<HTMLElement>('[data-pane]')].filter((pane) => pane.offsetParent !== null);
  const at = panes.findIndex((pane) => pane.contains(document.activeElement));
  const next = panes[at === -1 ? (backwards ? panes.length - 1 : 0) : at + (backwards ? -1 : 1)];
  next?.focus();
  return next !== undefined;
}
