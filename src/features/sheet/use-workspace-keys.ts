import { useEffect, useRef } from 'react';
import { focusNextPane } from './pane.js';
import type { SheetState } from './use-sheet-content.js';

/** Keys of the whole sheet: undo, redo, run, stop, and F6 round the panes. Fields keep their own undo. */
export function useWorkspaceKeys(state: SheetState): void {
  const latest = useRef(state);
  latest.current = state;
  useEffect(() => {
    const hear = (event: KeyboardEvent) => {
      if (event.defaultPrevented || document.querySelector('dialog[open]')) return;
      if (event.key === 'F6' && !event.ctrlKey && !event.altKey) {
        if (focusNextPane(event.shiftKey)) event.preventDefault();
        return;
      }
      if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
      if (act(event, latest.current)) event.preventDefault();
    };
    document.addEventListener('keydown', hear);
    return () => document.removeEventListener('keydown', hear);
  }, []);
}

function act(event: KeyboardEvent, state: SheetState): boolean {
  const isInField = event.target instanceof HTMLElement && event.target.matches('input:not([type=checkbox]), textarea');
  const key = event.key.toLowerCase();
  if (key === 'enter') return press('[data-run]', event.target);
  if (key === '.') return press('[data-stop]', event.target);
  if (isInField) return false;
  if (key === 'z' && !event.shiftKey && state.canUndo) state.undo();
  else if ((key === 'y' || (key === 'z' && event.shiftKey)) && state.canRedo) state.redo();
  else return false;
  return true;
}

/** Presses the button of the card that has the focus, or of the first card. */
function press(selector: string, target: EventTarget | null): boolean {
  const card = target instanceof HTMLElement ? target.closest('[data-card]') : null;
  const button = (card ?? document).querySelector<HTMLElement>(selector);
  button?.click();
  return button !== null;
}
