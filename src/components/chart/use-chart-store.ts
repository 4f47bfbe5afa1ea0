import { useEffect, useMemo, useRef, useState, useSyncExternalStore } from 'react';
import type { ChartState, ChartSweep } from '../../../shared/drawing/chart-input.js';
import { type CursorReadout, cursorReadout } from '../../../shared/drawing/words/readout.js';
import { type ChartChange, ChartStore } from './chart-store.js';

/** A store for one chart, or for several linked ones; `state` is what the page keeps, `onChange` what it should keep. */
export function useChartStore(
  state: ChartState | undefined,
  onChange?: (state: ChartState, change: ChartChange) => void,
): ChartStore {
  const [store] = useState(() => new ChartStore(state));
  const latest = useRef(onChange);
  useEffect(() => {
    latest.current = onChange;
    store.onSettled = (next, change) => latest.current?.(next, change);
  }, [store, onChange]);
  useEffect(() => {
    if (state) store.receive(state);
  }, [store, state]);
  return store;
}

/** The state as it was last settled: for controls, which need not follow every frame of a gesture. */
export function useSettledState(store: ChartStore): ChartState {
  return useSyncExternalStore(store.subscribeSettled, store.getSettled, store.getSettled);
}
export function useChosenCursor(store: ChartStore): 'A' | 'B' {
  return useSyncExternalStore(store.subscribeSettled, store.getChosenCursor, store.getChosenCursor);
}

/** Values of each sweep at both cursors, while they move; B − A and B ÷ A among them. */
export function useCursorReadout(
  store: ChartStore,
  sweeps: readonly ChartSweep[],
): readonly { readonly sweep: ChartSweep; readonly readout: CursorReadout }[] {
  const state = useSyncExternalStore(store.subscribe, store.get, store.get);
  const { cursorAHz, cursorBHz } = state;
  return useMemo(
    () => sweeps.map((sweep) => ({ sweep, readout: cursorReadout(sweep.points, cursorAHz, cursorBHz) })),
    [sweeps, cursorAHz, cursorBHz],
  );
}
