import { Redo2, Undo2 } from 'lucide-react';
import { type ReactNode, useEffect, useMemo, useState } from 'react';
import type { Sheet } from '../../../shared/contracts/sheet.js';
import { text } from '../../../shared/text.js';
import { Button } from '../../components/button.js';
import { useChartStore } from '../../components/chart/use-chart-store.js';
import { DropPage } from '../../components/drop-page.js';
import { StatusWord } from '../../components/status-word.js';
import { classNames } from '../../lib/class-names.js';
import { handFiles } from '../../lib/handed-files.js';
import { useProjectStore } from '../../lib/project-store/store-context.js';
import { warmCalculators } from '../../workers/pool.js';
import { ChartPane, chartStateOf } from './chart-pane.js';
import { ClashDialog } from './clash-dialog.js';
import { FootnotesPane } from './footnotes-pane.js';
import { LedgerPane } from './ledger-pane.js';
import { PaneLayout } from './pane-layout.js';
import { ResultsPane } from './results-pane.js';
import { SheetSceneProvider, type SheetSlots } from './sheet-context.js';
import { change, draw } from './sheet-edits.js';
import { useRangeHistory } from './use-range-history.js';
import { useSheetContent } from './use-sheet-content.js';
import { useSheetScene } from './use-sheet-scene.js';
import { useWorkspaceKeys } from './use-workspace-keys.js';

const words = text.sheet;

interface SheetWorkspaceProps {
  sheet: Sheet;
  slots: SheetSlots;
  /** The page's frame around the panes; it is given the bar of the sheet. */
  frame: (bar: ReactNode, panes: ReactNode) => ReactNode;
  /** Files were dropped on the way here: Unpack is open at once, and takes them. */
  opensUnpack: boolean;
}

/** A sheet: ledger, chart, results and footnotes over one saved view. */
export function SheetWorkspace({ sheet, slots, frame, opensUnpack }: SheetWorkspaceProps) {
  const { readOnlyReason } = useProjectStore();
  const state = useSheetContent(sheet);
  const [isUnpacking, setIsUnpacking] = useState(opensUnpack);
  const openUnpack = (files: readonly File[] = []) => {
    handFiles([...files]);
    setIsUnpacking(true);
  };
  const pushRange = useRangeHistory(state.content, (ranges) => state.edit(change(ranges)));
  const chartState = useMemo(() => chartStateOf(state.content), [state.content]);
  const store = useChartStore(chartState, (next, kind) => {
    state.edit(change(next), kind === 'cursor' ? 'cursor' : undefined);
    if (kind === 'range') pushRange(next);
  });
  const scene = useSheetScene({ sheet, state, slots, openUnpack });
  useWorkspaceKeys(state);
  useEffect(warmCalculators, []);
  const bar = <SheetBar state={state} />;
  return (
    <SheetSceneProvider value={scene}>
      <DropPage onFiles={openUnpack} isOff={isUnpacking || readOnlyReason !== undefined}>
        {frame(
          bar,
          <PaneLayout
            panes={{
              ledger: (menu) => <LedgerPane sizeMenu={menu} />,
              chart: (menu) => <ChartPane store={store} sizeMenu={menu} />,
              results: (menu) => <ResultsPane sizeMenu={menu} />,
              footnotes: (menu, isOpen) => <FootnotesPane store={store} sizeMenu={menu} isOpen={isOpen} />,
            }}
          />,
        )}
      </DropPage>
      {isUnpacking &&
        slots.unpack({
          onAdded: (sweepIds) => {
            state.edit(draw(...sweepIds));
            setIsUnpacking(false);
          },
          onClose: () => setIsUnpacking(false),
        })}
      {state.clash && <ClashDialog clash={state.clash} onSettle={state.settleClash} />}
    </SheetSceneProvider>
  );
}

function SheetBar({ state }: { state: ReturnType<typeof useSheetContent> }) {
  const { kind, readOnlyReason } = useProjectStore();
  const [isOnline, setIsOnline] = useState(navigator.onLine);
  useEffect(() => {
    const look = () => setIsOnline(navigator.onLine);
    window.addEventListener('online', look);
    window.addEventListener('offline', look);
    return () => {
      window.removeEventListener('online', look);
      window.removeEventListener('offline', look);
    };
  }, []);
  const saved = kind === 'local' ? words.keptHere : words.saved;
  const isLost = state.saveState === 'not-saved' || (kind === 'server' && !isOnline);
  return (
    <>
      <span
        role="status"
        className={classNames(
          'text-note text-soft',
          !isLost && state.saveState !== 'refused' && 'whitespace-nowrap max-sm:sr-only',
        )}
      >
        {readOnlyReason !== undefined ? (
          words.readOnly
        ) : state.saveState === 'refused' ? (
          <StatusWord tone="out">{words.refused}</StatusWord>
        ) : isLost ? (
          <StatusWord tone="old">{words.notSaved}</StatusWord>
        ) : state.saveState === 'saving' ? (
          words.saving
        ) : (
          saved
        )}
      </span>
      <span className="flex-1" />
      <Button
        look="quiet"
        isIconOnly
        aria-label={words.undo}
        icon={<Undo2 size={18} aria-hidden />}
        disabled={!state.canUndo}
        onClick={state.undo}
      />
      <Button
        look="quiet"
        isIconOnly
        aria-label={words.redo}
        icon={<Redo2 size={18} aria-hidden />}
        disabled={!state.canRedo}
        onClick={state.redo}
      />
    </>
  );
}
