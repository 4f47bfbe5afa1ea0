import { useMemo, useState } from 'react';
import { activeSweep, type ChartContent } from '../../../shared/drawing/chart-input.js';
import { signedDegrees } from '../../../shared/drawing/marks/cursors.js';
import { impedanceTable } from '../../../shared/drawing/words/describe.js';
import { formatQuantity } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { ChartExport } from './chart-export.js';
import type { ChartStore } from './chart-store.js';
import type { ChartView } from './chart-view.js';
import { useSettledState } from './use-chart-store.js';

interface ChartTwinsProps {
  readonly content: ChartContent;
  readonly store: ChartStore;
  readonly view: ChartView | null;
  readonly sentence: string;
  readonly locale: string | undefined;
}
const words = text.chart.twins;

type Twin = 'sentence' | 'table' | 'export';

/** The same chart as a sentence, as a table and as a file, one button each. */
export function ChartTwins({ content, store, view, sentence, locale }: ChartTwinsProps) {
  const [shown, setShown] = useState<Twin | null>(null);
  const button = (twin: Twin, label: string) => (
    <button
      type="button"
      className="chart-button chart-quiet"
      aria-expanded={shown === twin}
      onClick={() => setShown(shown === twin ? null : twin)}
    >
      {label}
    </button>
  );
  return (
    <figcaption className="chart-twins">
      <div className="chart-row">
        {button('sentence', words.asSentence)}
        {button('table', words.asTable)}
        {button('export', text.chart.export.button)}
      </div>
      {shown === 'sentence' && <p className="chart-sentence">{sentence}</p>}
      {shown === 'export' && view && <ChartExport view={view} locale={locale} />}
      {shown === 'table' && <PointsTable content={content} store={store} locale={locale} />}
    </figcaption>
  );
}

function PointsTable({ content, store, locale }: Pick<ChartTwinsProps, 'content' | 'store' | 'locale'>) {
  const { frequencyRangeHz } = useSettledState(store);
  const sweep = activeSweep(content);
  const rows = useMemo(() => (sweep ? impedanceTable(sweep.points, frequencyRangeHz) : []), [sweep, frequencyRangeHz]);
  if (!sweep) return <p className="chart-sentence">{text.chart.sentence.empty}</p>;
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls has to be reached by keyboard
    <section className="chart-table" tabIndex={0} aria-label={text.chart.twins.asTable}>
      <table>
        <caption>{words.caption(sweep.name, rows.length, sweep.points.frequencyHz.length)}</caption>
        <thead>
          <tr>
            <th scope="col">{text.chart.quantity.frequency}</th>
            <th scope="col">{text.chart.quantity.magnitude}</th>
            <th scope="col">{text.chart.quantity.phase}</th>
            <th scope="col">{words.kind}</th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.index}>
              <th scope="row">{formatQuantity(row.frequencyHz, 'Hz', { locale })}</th>
              <td>{formatQuantity(row.magnitudeOhm, 'Ω', { locale })}</td>
              <td>{row.phaseDeg === undefined ? '–' : signedDegrees(row.phaseDeg, locale)}</td>
              <td>{words[row.kind]}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}
