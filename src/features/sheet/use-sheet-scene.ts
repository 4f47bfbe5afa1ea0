import { useQueries, useQuery } from '@tanstack/react-query';
import { useCallback, useRef, useState } from 'react';
import type { Sheet } from '../../../shared/contracts/sheet.js';
import type { SweepRow } from '../../../shared/contracts/sweep.js';
import type { Output } from '../../../shared/output.js';
import type { Points } from '../../../shared/points.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { pointsQuery, resultsQuery, sweepsQuery } from '../../lib/project-store/store-queries.js';
import type { SheetScene, SheetSlots } from './sheet-context.js';
import { change } from './sheet-edits.js';
import type { SheetState } from './use-sheet-content.js';

interface SceneParts {
  sheet: Sheet;
  state: SheetState;
  slots: SheetSlots;
  openUnpack: (files?: readonly File[]) => void;
}
const NONE: never[] = [];

/** Everything the panes of a sheet share: rows, points as they arrive, the active sweep, the curves of the cards. */
export function useSheetScene({ sheet, state, slots, openUnpack }: SceneParts): SheetScene {
  const store = useProjectStore();
  const sweeps = useQuery(sweepsQuery(store)).data ?? NONE;
  const resultsAnswer = useQuery(resultsQuery(store));
  const points = usePoints(usedSweeps(state, sweeps));
  const [chosen, setActiveSweep] = useState<string>();
  const [overlays, setOverlays] = useState<ReadonlyMap<string, Output>>(new Map());
  const setOverlay = useCallback((cardId: string, output: Output | undefined) => {
    setOverlays((before) => {
      if (before.get(cardId) === output) return before;
      const next = new Map(before);
      if (output) next.set(cardId, output);
      else next.delete(cardId);
      return next;
    });
  }, []);
  const { drawn } = state.content;
  const activeSweepId = sweeps.some(({ id }) => id === chosen) ? chosen : drawn[0]?.sweepId;
  return {
    sheetId: sheet.id,
    state,
    sweeps,
    results: resultsAnswer.data ?? NONE,
    areResultsHere: resultsAnswer.isSuccess,
    points,
    activeSweepId,
    setActiveSweep,
    overlays,
    setOverlay,
    setCursorA: (hz) => state.edit(change({ cursorAHz: hz })),
    openUnpack,
    slots,
    readOnlyReason: store.readOnlyReason,
  };
}

/** The sweeps whose points a sheet needs: drawn ones and inputs of its cards. */
function usedSweeps({ content }: SheetState, sweeps: readonly SweepRow[]): SweepRow[] {
  const used = new Set(content.drawn.map(({ sweepId }) => sweepId));
  for (const { inputs } of content.cards)
    for (const list of Object.values(inputs)) for (const { sweepId } of list) used.add(sweepId);
  return sweeps.filter(({ id }) => used.has(id));
}

/** The points that have arrived, as one map that stays the same object while nothing in it changes. */
function usePoints(sweeps: readonly SweepRow[]): ReadonlyMap<string, Points> {
  const store = useProjectStore();
  const kept = useRef<ReadonlyMap<string, Points>>(new Map());
  const revisions = [...new Map(sweeps.map(({ revision }) => [revision.pointsSha256, revision])).values()];
  const answers = useQueries({ queries: revisions.map((revision) => pointsQuery(store, revision)) });
  const arrived = new Map<string, Points>();
  revisions.forEach(({ pointsSha256 }, i) => {
    const points = answers[i]?.data;
    if (points) arrived.set(pointsSha256, points);
  });
  const isSame =
    arrived.size === kept.current.size && [...arrived].every(([hash, own]) => kept.current.get(hash) === own);
  if (!isSame) kept.current = arrived;
  return kept.current;
}
