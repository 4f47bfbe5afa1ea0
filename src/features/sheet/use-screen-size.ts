import { useSyncExternalStore } from 'react';

export type ScreenSize = 'wide' | 'medium' | 'small';
const WIDE = '(min-width: 1200px)';
const MEDIUM = '(min-width: 768px)';

/** Wide shows four panes, medium the chart and one beside it, small one at a time. */
export function useScreenSize(): ScreenSize {
  return useSyncExternalStore(subscribe, current);
}

function current(): ScreenSize {
  if (window.matchMedia(WIDE).matches) return 'wide';
  return window.matchMedia(MEDIUM).matches ? 'medium' : 'small';
}

function subscribe(listener: () => void): () => void {
  const queries = [window.matchMedia(WIDE), window.matchMedia(MEDIUM)];
  for (const query of queries) query.addEventListener('change', listener);
  return () => {
    for (const query of queries) query.removeEventListener('change', listener);
  };
}
