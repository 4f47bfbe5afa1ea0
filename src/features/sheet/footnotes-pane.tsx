import { type ReactNode, useMemo } from 'react';
import type { ChartSweep } from '../../../shared/drawing/chart-input.js';
import type { ReadoutValue } from '../../../shared/drawing/words/readout.js';
import { formatDecimals, formatDigits, formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import type { ChartStore } from '../../components/chart/chart-store.js';
import { useCursorReadout } from '../../components/chart/use-chart-store.js';
import { usePreferences } from '../../lib/preferences.js';
import { Pane } from './pane.js';
import { useSheetScene } from './sheet-context.js';

const words = text.sheet.footnotes;

interface FootnotesPaneProps {
  store: ChartStore;
  sizeMenu: ReactNode;
  /** Closed, only the heading is there: nothing hides below it. */
  isOpen: boolean;
}

/** The Readout: every drawn sweep at cursors A and B, their difference and their ratio. */
export function FootnotesPane({ store, sizeMenu, isOpen }: FootnotesPaneProps) {
  return (
    <Pane id="footnotes" title={text.sheet.panes.footnotes} actions={sizeMenu}>
      {isOpen && (
        <div className="p-3">
          <Readout store={store} />
        </div>
      )}
    </Pane>
  );
}

function Readout({ store }: { store: ChartStore }) {
  const { state, sweeps, points } = useSheetScene();
  const { locale } = usePreferences();
  const { drawn } = state.content;
  const lines = useMemo<ChartSweep[]>(
    () =>
      drawn.flatMap(({ sweepId, lineNumber }) => {
        const sweep = sweeps.find(({ id }) => id === sweepId);
        const own = sweep && points.get(sweep.revision.pointsSha256);
        return sweep && own ? [{ id: sweepId, name: sweep.name, lineNumber, points: own }] : [];
      }),
    [drawn, sweeps, points],
  );
  const readouts = useCursorReadout(store, lines);
  if (readouts.every(({ readout }) => !readout.a && !readout.b)) return <p className="text-soft">{words.noCursor}</p>;
  const language = locale ?? undefined;
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a table that scrolls sideways must be scrollable by keys
    <section tabIndex={0} aria-label={words.readout} className="overflow-x-auto">
      <table className="w-full border-collapse">
        <thead>
          <tr className="text-note text-soft">
            {[words.sweep, `${words.cursor} A`, `${words.cursor} B`, words.difference, words.ratio].map((head) => (
              <th key={head} scope="col" className="py-1 pe-4 text-start font-normal">
                {head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody className="font-num">
          {readouts.map(({ sweep, readout }) => (
            <tr key={sweep.id} className="border-t border-line align-baseline">
              <th scope="row" className="py-1 pe-4 text-start font-ui font-medium">
                {sweep.name}
              </th>
              <td className="py-1 pe-4 whitespace-nowrap">{valueText(readout.a, language)}</td>
              <td className="py-1 pe-4 whitespace-nowrap">{valueText(readout.b, language)}</td>
              <td className="py-1 pe-4 whitespace-nowrap">{valueText(readout.difference, language)}</td>
              <td className="py-1 whitespace-nowrap">
                {readout.ratio
                  ? `f ${formatDigits(readout.ratio.frequency, 4, language)}, |Z| ${formatDigits(readout.ratio.magnitude, 4, language)}`
                  : '–'}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-2 text-note text-soft">{words.interpolation}</p>
    </section>
  );
}

type Value = Pick<ReadoutValue, 'frequencyHz' | 'magnitudeOhm'> & { readonly phaseDeg?: number | undefined };

function valueText(value: Value | null, locale: string | undefined): string {
  if (!value) return '–';
  const parts = [
    formatQuantity(value.frequencyHz, 'Hz', { locale }),
    formatQuantity(value.magnitudeOhm, 'Ω', { locale }),
  ];
  if (value.phaseDeg !== undefined) parts.push(`${formatDecimals(value.phaseDeg, 1, locale)}°`);
  return parts.join('  ');
}
