import { useId, useState } from 'react';
import type { CsvMarks } from '../../../shared/drawing/words/drawn-points-csv.js';
import { text } from '../../../shared/text.js';
import type { ChartView } from './chart-view.js';
import { saveCsv, savePng, saveSvg } from './export-chart.js';

const words = text.chart.export;
const KEY = 'hummock.csv-marks';
const SEPARATORS = [
  [',', words.comma],
  [';', words.semicolon],
  ['\t', words.tab],
] as const;
const DECIMAL_MARKS = [
  ['.', words.point],
  [',', words.comma],
] as const;

/** The marks of the last export; the first time those of the locale's spreadsheets. */
function rememberedMarks(locale: string | undefined): CsvMarks {
  const hasComma = (1.5).toLocaleString(locale).includes(',');
  const usual: CsvMarks = hasComma ? { separator: ';', decimalMark: ',' } : { separator: ',', decimalMark: '.' };
  try {
    const stored = JSON.parse(localStorage.getItem(KEY) ?? 'null') as Partial<CsvMarks> | null;
    const isKnown =
      SEPARATORS.some(([mark]) => mark === stored?.separator) &&
      DECIMAL_MARKS.some(([mark]) => mark === stored?.decimalMark);
    return isKnown ? (stored as CsvMarks) : usual;
  } catch {
    return usual;
  }
}
function remember(marks: CsvMarks): void {
  try {
    localStorage.setItem(KEY, JSON.stringify(marks));
  } catch {
    // storage may be switched off: the choice then lasts as long as the panel
  }
}

/** Picture and points of the chart as files. */
export function ChartExport({ view, locale }: { view: ChartView; locale: string | undefined }) {
  const id = useId();
  const [marks, setMarks] = useState(() => rememberedMarks(locale));
  const areSame = marks.separator === marks.decimalMark;
  const change = (next: CsvMarks) => {
    setMarks(next);
    remember(next);
  };
  return (
    <div className="chart-export">
      <fieldset className="chart-row">
        <legend>{words.picture}</legend>
        <button type="button" className="chart-button" onClick={() => saveSvg(view.input())}>
          {words.svg}
        </button>
        {([1, 2, 3] as const).map((times) => (
          <button key={times} type="button" className="chart-button" onClick={() => void savePng(view.input(), times)}>
            {words.png(times)}
          </button>
        ))}
        <p className="chart-export-note">{words.light}</p>
      </fieldset>
      <fieldset className="chart-row">
        <legend>{words.points}</legend>
        <label>
          {words.decimalMark}{' '}
          <select
            className="chart-button"
            value={marks.decimalMark}
            onChange={(event) => change({ ...marks, decimalMark: event.target.value as CsvMarks['decimalMark'] })}
          >
            {DECIMAL_MARKS.map(([mark, name]) => (
              <option key={name} value={mark}>
                {name}
              </option>
            ))}
          </select>
        </label>
        <label>
          {words.separator}{' '}
          <select
            className="chart-button"
            value={marks.separator}
            onChange={(event) => change({ ...marks, separator: event.target.value as CsvMarks['separator'] })}
          >
            {SEPARATORS.map(([mark, name]) => (
              <option key={name} value={mark}>
                {name}
              </option>
            ))}
          </select>
        </label>
        <button
          type="button"
          className="chart-button"
          aria-describedby={areSame ? id : undefined}
          disabled={areSame}
          onClick={() => saveCsv(view.input(), marks)}
        >
          {words.csv}
        </button>
        {areSame && (
          <p id={id} className="chart-error">
            {words.sameMarks}
          </p>
        )}
      </fieldset>
    </div>
  );
}
