import { ArrowLeft, ArrowRight, Minus, Plus, Undo2, X } from 'lucide-react';
import { type FocusEvent, type ReactNode, useId, useState } from 'react';
import type { CursorName } from '../../../shared/drawing/marks/cursors.js';
import { parseQuantity } from '../../../shared/quantity-parse.js';
import { formatDigits, formatPlain } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import {
  BUTTON_ZOOM,
  chooseCursor,
  fitAll,
  panAxis,
  placeCursor,
  removeCursor,
  setRange,
  stepCursor,
  swapScale,
  toExtremum,
  zoomFrequency,
} from './chart-actions.js';
import type { ChartView } from './chart-view.js';
import { readEnds } from './read-ends.js';
import { useChosenCursor, useSettledState } from './use-chart-store.js';

interface ChartControlsProps {
  readonly view: ChartView;
  readonly locale: string | undefined;
  readonly onStepBack: () => void;
  readonly onAxes: () => void; // exact values of every axis
}
const words = text.chart.controls;
const ICON = { size: 18, strokeWidth: 1.75, 'aria-hidden': true } as const;

/** The button, key or typed twin of every drag: zoom, pan, range, scales, cursors, peaks. */
export function ChartControls({ view, locale, onStepBack, onAxes }: ChartControlsProps) {
  const state = useSettledState(view.store);
  return (
    <fieldset className="chart-controls" aria-label={words.name}>
      <div className="chart-row">
        <IconButton label={words.zoomOut} onClick={() => zoomFrequency(view, 1 / BUTTON_ZOOM)}>
          <Minus {...ICON} />
        </IconButton>
        <IconButton label={words.zoomIn} onClick={() => zoomFrequency(view, BUTTON_ZOOM)}>
          <Plus {...ICON} />
        </IconButton>
        <IconButton label={words.left} onClick={() => panAxis(view, 'frequency', -0.25)}>
          <ArrowLeft {...ICON} />
        </IconButton>
        <IconButton label={words.right} onClick={() => panAxis(view, 'frequency', 0.25)}>
          <ArrowRight {...ICON} />
        </IconButton>
        <button type="button" className="chart-button" onClick={() => fitAll(view)}>
          {words.fitAll}
        </button>
        <IconButton label={words.stepBack} onClick={onStepBack}>
          <Undo2 {...ICON} />
        </IconButton>
      </div>
      <RangeFields view={view} locale={locale} />
      <div className="chart-row">
        {state.view === 'magnitude-phase' && (
          <Swap
            label={words.magnitudeScale}
            symbol="|Z|"
            kind={state.magnitudeScale}
            onSwap={() => swapScale(view, 'magnitude')}
          />
        )}
        <button type="button" className="chart-button" onClick={onAxes}>
          {words.axes}
        </button>
      </div>
      <CursorFields view={view} locale={locale} />
    </fieldset>
  );
}

function IconButton({ label, onClick, children }: { label: string; onClick: () => void; children: ReactNode }) {
  return (
    <button type="button" className="chart-button chart-icon" aria-label={label} title={label} onClick={onClick}>
      {children}
    </button>
  );
}

function Swap({
  label,
  symbol,
  kind,
  onSwap,
}: {
  label: string;
  symbol: string;
  kind: 'log' | 'linear';
  onSwap: () => void;
}) {
  return (
    <button
      type="button"
      className="chart-button"
      aria-label={`${label}: ${words[kind]}`}
      title={label}
      onClick={onSwap}
    >
      <span className="chart-symbol">{symbol}</span> {words[kind]}
    </button>
  );
}

/** From and to: what is shown, to be typed over; Enter takes it. */
function RangeFields({ view, locale }: { view: ChartView; locale: string | undefined }) {
  useSettledState(view.store);
  const range = view.rangeOf('frequency');
  const shown = range.map((value) => formatPlain(value, 4, locale));
  const [typed, setTyped] = useState<{ from: string; to: string } | null>(null);
  const [error, setError] = useState('');
  const id = useId();
  const take = () => {
    if (!typed) return;
    const read = readEnds([typed.from, typed.to], 'frequency', view.kindOf('frequency'), locale);
    if (typeof read === 'string') return setError(read);
    setError('');
    setTyped(null);
    setRange(view, 'frequency', read[0], read[1]);
  };
  const field = (name: 'from' | 'to', label: string, value: string) => (
    <input
      className="chart-field"
      aria-label={label}
      aria-invalid={error !== '' || undefined}
      aria-describedby={error ? id : undefined}
      value={typed?.[name] ?? value}
      onFocus={(event) => event.target.select()}
      onChange={(event) => setTyped({ from: shown[0] ?? '', to: shown[1] ?? '', ...typed, [name]: event.target.value })}
      onKeyDown={(event) => {
        if (event.key === 'Enter') take();
        if (event.key === 'Escape') setTyped(null);
      }}
    />
  );
  const leave = (event: FocusEvent<HTMLElement>) => {
    if (!event.currentTarget.contains(event.relatedTarget)) take(); // not between the two fields: both may be typed first
  };
  return (
    <fieldset className="chart-row" aria-label={words.range} onBlur={leave}>
      {field('from', words.fromField, shown[0] ?? '')}
      <span aria-hidden>–</span>
      {field('to', words.toField, shown[1] ?? '')}
      <span aria-hidden className="chart-unit">
        Hz
      </span>
      {error && (
        <p id={id} role="alert" className="chart-error">
          {error}
        </p>
      )}
    </fieldset>
  );
}

function CursorFields({ view, locale }: { view: ChartView; locale: string | undefined }) {
  const chosen = useChosenCursor(view.store);
  return (
    <div className="chart-row">
      <CursorField view={view} locale={locale} cursor="A" isChosen={chosen === 'A'} />
      <CursorField view={view} locale={locale} cursor="B" isChosen={chosen === 'B'} />
      <IconButton label={text.chart.cursor.back(chosen)} onClick={() => stepCursor(view, -1)}>
        <ArrowLeft {...ICON} size={15} />
      </IconButton>
      <IconButton label={text.chart.cursor.on(chosen)} onClick={() => stepCursor(view, 1)}>
        <ArrowRight {...ICON} size={15} />
      </IconButton>
      <button
        type="button"
        className="chart-button"
        onClick={() => toExtremum(view, 'peak', 1) || toExtremum(view, 'peak', -1)}
      >
        {text.chart.cursor.nextPeak}
      </button>
      <button
        type="button"
        className="chart-button"
        onClick={() => toExtremum(view, 'dip', 1) || toExtremum(view, 'dip', -1)}
      >
        {text.chart.cursor.nextDip}
      </button>
    </div>
  );
}

interface CursorFieldProps {
  readonly view: ChartView;
  readonly locale: string | undefined;
  readonly cursor: CursorName;
  readonly isChosen: boolean;
}
/** A letter that chooses the cursor, its frequency to type, and a way to take it away. */
function CursorField({ view, locale, cursor, isChosen }: CursorFieldProps) {
  const state = useSettledState(view.store);
  const hz = cursor === 'A' ? state.cursorAHz : state.cursorBHz;
  const [typed, setTyped] = useState<string | null>(null);
  const take = () => {
    if (typed === null) return;
    const typedHz = parseQuantity(typed, 'Hz', undefined, locale)?.valueSi;
    setTyped(null);
    if (typedHz !== undefined && typedHz > 0) {
      view.store.chooseCursor(cursor);
      placeCursor(view, cursor, typedHz, true);
    } else if (typed.trim() === '') removeCursor(view, cursor);
  };
  return (
    <span className="chart-cursor-field">
      <button
        type="button"
        className="chart-button chart-letter"
        aria-pressed={isChosen}
        aria-label={text.chart.cursor.name(cursor)}
        onClick={() => chooseCursor(view, cursor)}
      >
        {cursor}
      </button>
      <input
        className="chart-field"
        aria-label={text.chart.cursor.field(cursor)}
        placeholder="–"
        value={typed ?? (hz === null ? '' : formatDigits(hz, 4, locale))}
        onFocus={(event) => event.target.select()}
        onChange={(event) => setTyped(event.target.value)}
        onKeyDown={(event) => {
          if (event.key === 'Enter') take();
          if (event.key === 'Escape') setTyped(null);
        }}
        onBlur={take}
      />
      {hz !== null && (
        <button
          type="button"
          className="chart-button chart-icon chart-remove"
          aria-label={text.chart.cursor.remove(cursor)}
          onClick={() => removeCursor(view, cursor)}
        >
          <X {...ICON} size={15} />
        </button>
      )}
    </span>
  );
}
