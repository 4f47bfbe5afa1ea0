import { type KeyboardEvent, type SubmitEvent, useEffect, useId, useRef, useState } from 'react';
import type { ScaleKind } from '../../../shared/drawing/scales/axis-scale.js';
import { formatPlain } from '../../../shared/quantity-text.js';
import { text } from '../../../shared/text.js';
import { Button } from '../button.js';
import { inputClass } from '../field.js';
import { fitAxis, setRange, swapScale } from './chart-actions.js';
import type { AxisName, ChartView } from './chart-view.js';
import type { LocalPoint } from './gestures/gesture-target.js';
import { readEnds } from './read-ends.js';
import { useSettledState } from './use-chart-store.js';

interface AxisDialogProps {
  readonly view: ChartView;
  readonly axis: AxisName;
  readonly at: LocalPoint;
  readonly locale: string | undefined;
  readonly onAxis: (axis: AxisName) => void;
  readonly onClose: () => void;
}
const words = text.chart.controls;

/** Exact values of one axis, whether it is logarithmic or linear, and whether the phase is unwrapped. */
export function AxisDialog(props: AxisDialogProps) {
  return <AxisForm key={props.axis} {...props} />;
}

function AxisForm({ view, axis, at, locale, onAxis, onClose }: AxisDialogProps) {
  const id = useId();
  const box = useRef<HTMLFormElement>(null);
  const [kind, setKind] = useState(view.kindOf(axis));
  const [ends, setEnds] = useState(() => view.rangeOf(axis).map((value) => formatPlain(value, 4, locale)));
  const [error, setError] = useState('');
  useEffect(() => {
    box.current?.querySelector('input')?.select();
    const outside = (event: Event) => {
      if (event.target instanceof Node && !box.current?.contains(event.target)) onClose();
    };
    document.addEventListener('pointerdown', outside, true);
    return () => document.removeEventListener('pointerdown', outside, true);
  }, [onClose]);
  const submit = (event: SubmitEvent) => {
    event.preventDefault();
    const read = readEnds(ends, axis, kind, locale);
    if (typeof read === 'string') return setError(read);
    if (kind !== view.kindOf(axis) && (axis === 'frequency' || axis === 'magnitude')) swapScale(view, axis);
    setRange(view, axis, read[0], read[1]);
    onClose();
  };
  const keys = (event: KeyboardEvent) => {
    if (event.key !== 'Escape') return;
    event.stopPropagation();
    onClose();
  };
  const { widthPx, heightPx } = view.currentLayout();
  const place = {
    left: Math.min(at.x + 8, Math.max(0, widthPx - 252)),
    top: Math.min(at.y, Math.max(0, heightPx - 210)),
  };
  return (
    <form
      ref={box}
      role="dialog"
      aria-label={words.axisDialog(text.chart.quantity[axis])}
      className="chart-popover chart-axis-dialog"
      style={place}
      onSubmit={submit}
      onKeyDown={keys}
      noValidate
    >
      <select
        className="chart-button chart-popover-title"
        aria-label={words.axis}
        value={axis}
        onChange={(event) => onAxis(event.target.value as AxisName)}
      >
        {(['frequency', ...view.currentLayout().strips.map(({ quantity }) => quantity)] as const).map((name) => (
          <option key={name} value={name}>
            {text.chart.axis[name]}
          </option>
        ))}
      </select>
      <div className="chart-ends">
        {[words.lowest, words.highest].map((label, i) => (
          <label key={label}>
            {label}
            <input
              className={inputClass}
              inputMode="text"
              value={ends[i]}
              aria-invalid={error !== '' || undefined}
              aria-describedby={error ? `${id}-error` : undefined}
              onChange={(event) => setEnds(ends.map((old, k) => (k === i ? event.target.value : old)))}
            />
          </label>
        ))}
      </div>
      {(axis === 'frequency' || axis === 'magnitude') && <KindChoice kind={kind} onKind={setKind} />}
      {axis === 'phase' && <UnwrapChoice view={view} />}
      {error && (
        <p id={`${id}-error`} role="alert" className="chart-error">
          {error}
        </p>
      )}
      <div className="chart-row">
        <Button type="submit" look="primary">
          {words.setRange}
        </Button>
        <Button
          onClick={() => {
            fitAxis(view, axis);
            onClose();
          }}
        >
          {words.fitAll}
        </Button>
      </div>
    </form>
  );
}

function KindChoice({ kind, onKind }: { kind: ScaleKind; onKind: (kind: ScaleKind) => void }) {
  const name = useId();
  return (
    <fieldset className="chart-choice" aria-label={words.scale}>
      {(['log', 'linear'] as const).map((choice) => (
        <label key={choice}>
          <input type="radio" name={name} checked={kind === choice} onChange={() => onKind(choice)} />
          {words[choice]}
        </label>
      ))}
    </fieldset>
  );
}

function UnwrapChoice({ view }: { view: ChartView }) {
  const { isPhaseUnwrapped } = useSettledState(view.store);
  const change = () => view.store.settle({ isPhaseUnwrapped: !isPhaseUnwrapped, phaseRangeDeg: null }, 'view');
  return (
    <div className="chart-choice">
      <label>
        <input type="checkbox" checked={isPhaseUnwrapped} onChange={change} />
        {words.unwrap}
      </label>
    </div>
  );
}
