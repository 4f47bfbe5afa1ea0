import { type ReactNode, useMemo } from 'react';
import type { SheetContent } from '../../../shared/contracts/sheet.js';
import { type ChartContent, type ChartState, FITTED_CHART } from '../../../shared/drawing/chart-input.js';
import type { Output } from '../../../shared/output.js';
import { text } from '../../../shared/text.js';
import type { ChartStore } from '../../components/chart/chart-store.js';
import { SweepChart } from '../../components/chart/sweep-chart.js';
import { EmptyState } from '../../components/empty-state.js';
import { Select } from '../../components/select.js';
import { usePreferences } from '../../lib/preferences.js';
import { Pane } from './pane.js';
import { useSheetScene } from './sheet-context.js';
import { change, toggleReference } from './sheet-edits.js';

const words = text.sheet.chart;
const VIEWS = ['magnitude-phase', 'real-imaginary'] as const;

/** The part of a sheet that its chart shows and changes. */
export function chartStateOf(content: SheetContent): ChartState {
  const keys = Object.keys(FITTED_CHART) as (keyof ChartState)[];
  return Object.fromEntries(keys.map((key) => [key, content[key]])) as unknown as ChartState;
}

/** The chart of what is drawn, with the curves and markers of the cards that have run. */
export function ChartPane({ store, sizeMenu }: { store: ChartStore; sizeMenu: ReactNode }) {
  const { state, activeSweepId, setActiveSweep } = useSheetScene();
  const { locale, letterKeys } = usePreferences();
  const content = useChartContent();
  const { view } = state.content;
  const actions = (
    <>
      <Select
        label={<span className="sr-only">{words.view}</span>}
        value={view === 'locus' ? 'magnitude-phase' : view}
        options={VIEWS.map((value) => ({ value, label: words.views[value] }))}
        onValue={(next) => state.edit(change({ view: next }))}
        className="max-w-44"
      />
      {sizeMenu}
    </>
  );
  return (
    <Pane id="chart" title={text.sheet.panes.chart} actions={actions} isFilled>
      {state.content.drawn.length === 0 ? (
        <EmptyState title={words.nothingDrawn}>{words.nothingDrawnHelp}</EmptyState>
      ) : (
        <SweepChart
          content={content}
          store={store}
          onActiveSweep={setActiveSweep}
          onReference={() => activeSweepId && state.edit(toggleReference(activeSweepId))}
          className="min-h-0 flex-1"
          {...(letterKeys ? {} : { letters: 'off' as const })}
          {...(locale ? { locale } : {})}
        />
      )}
    </Pane>
  );
}

function useChartContent(): ChartContent {
  const { state, sweeps, points, overlays, activeSweepId } = useSheetScene();
  const { drawn } = state.content;
  return useMemo(() => {
    const lines = drawn.flatMap(({ sweepId, lineNumber, isReference }) => {
      const sweep = sweeps.find(({ id }) => id === sweepId);
      const own = sweep && points.get(sweep.revision.pointsSha256);
      return sweep && own ? [{ id: sweepId, name: sweep.name, lineNumber, isReference, points: own }] : [];
    });
    const outputs = [...overlays.values()];
    return {
      sweeps: lines,
      models: outputs.flatMap(modelCurves),
      markers: outputs.flatMap(({ markers }) =>
        markers.map(({ frequency, label }) => ({ frequencyHz: frequency, label })),
      ),
      activeSweepId,
    };
  }, [drawn, sweeps, points, overlays, activeSweepId]);
}

function modelCurves(output: Output): NonNullable<ChartContent['models']>[number][] {
  return output.traces.flatMap(({ id, label, axis, x, re, im }) =>
    axis === 'impedance' && re && im
      ? [
          {
            id,
            label,
            points: {
              frequencyHz: Float64Array.from(x),
              realOhm: Float64Array.from(re),
              imaginaryOhm: Float64Array.from(im),
            },
          },
        ]
      : [],
  );
}
