import { type ReactNode, useCallback, useMemo, useState } from 'react';
import { chartSentence } from '../../../shared/drawing/chart.js';
import type { ChartContent, ChartState } from '../../../shared/drawing/chart-input.js';
import { quantitiesOf } from '../../../shared/drawing/layout.js';
import { text } from '../../../shared/text.js';
import { AxisDialog } from './axis-dialog.js';
import { fitAll, stepBack } from './chart-actions.js';
import { ChartControls } from './chart-controls.js';
import { ChartMenu } from './chart-menu.js';
import type { ChartChange, ChartStore } from './chart-store.js';
import { ChartTwins } from './chart-twins.js';
import type { AxisName, ChartView } from './chart-view.js';
import { CursorArrows } from './cursor-arrows.js';
import type { LocalPoint } from './gestures/gesture-target.js';
import { CHART_LETTERS, type ChartLetters } from './gestures/keys.js';
import { type Spoken, SpokenValue, useSpokenValue } from './spoken-value.js';
import { useChartGestures } from './use-chart-gestures.js';
import { useChartStore } from './use-chart-store.js';
import { type ChartRefs, useChartView } from './use-chart-view.js';
import { useZoomHint } from './use-zoom-hint.js';
import './chart.css';
import './controls.css';

/**
 * The chart of a sheet: magnitude with its phase strip, or real and imaginary parts, over one frequency axis.
 *
 * What is drawn comes in `content` (keep its identity while nothing in it changes: the chart repaints when it is
 * another object). How it is looked at comes in `state`: ranges, scales, view and cursors, as a sheet stores them;
 * gestures move it without React, and `onStateChange` says when a change has settled, and of which kind, so that a
 * page can put ranges into the browser's history. `state` may be left out: the chart then keeps its own.
 * To link two charts, or to show a Readout, make one `useChartStore` and give it to all of them as `store`.
 */
export interface SweepChartProps {
  readonly content: ChartContent;
  readonly state?: ChartState;
  readonly onStateChange?: (state: ChartState, change: ChartChange) => void;
  readonly store?: ChartStore; // instead of state and onStateChange
  readonly onActiveSweep?: (id: string) => void; // a line was clicked, or ↑ ↓ pressed
  readonly onMarker?: (frequencyHz: number) => void; // "Marker here"
  readonly onNote?: (frequencyHz: number) => void;
  readonly onReference?: () => void; // R: make the active sweep the reference
  readonly onStepBack?: () => void; // Backspace; default: the chart's own past ranges
  readonly letters?: ChartLetters | 'off'; // letter keys as a person set them
  readonly locale?: string;
  readonly controls?: 'below' | 'none'; // zoom, range, scale and cursor fields under the drawing
  readonly twins?: 'below' | 'none'; // "As sentence", "As table" and "Export"
  readonly className?: string; // of the figure; its height is the chart's
  readonly children?: ReactNode; // shown over the drawing, out of the way of the curve
}

export function SweepChart(props: SweepChartProps) {
  const { content, locale, onStepBack } = props;
  const ownStore = useChartStore(props.state, props.onStateChange);
  const store = props.store ?? ownStore;
  const { refs, view } = useChartView(store, content, locale);
  const sentence = useMemo(() => chartSentence({ ...content, locale }), [content, locale]);
  const spoken = useSpokenValue(view);
  const goBack = useCallback(() => {
    if (onStepBack) onStepBack();
    else if (view) stepBack(view);
  }, [view, onStepBack]);
  const [axis, setAxis] = useState<ChosenAxis | null>(null);
  return (
    <figure className={`chart-figure ${props.className ?? ''}`}>
      <DrawingArea {...props} {...{ refs, view, spoken, sentence, axis }} onChosenAxis={setAxis} onStepBack={goBack} />
      <SpokenValue spoken={spoken} />
      {view && props.controls !== 'none' && (
        <ChartControls
          view={view}
          locale={locale}
          onStepBack={goBack}
          onAxes={() => setAxis({ axis: quantitiesOf(store.get().view)[0], at: { x: 0, y: 0 } })}
        />
      )}
      {props.twins !== 'none' && (
        <ChartTwins content={content} store={store} view={view} sentence={sentence} locale={locale} />
      )}
    </figure>
  );
}

interface ChosenAxis {
  readonly axis: AxisName;
  readonly at: LocalPoint;
}
interface DrawingAreaProps extends SweepChartProps {
  readonly axis: ChosenAxis | null;
  readonly onChosenAxis: (axis: ChosenAxis | null) => void;
  readonly refs: ChartRefs;
  readonly view: ChartView | null;
  readonly spoken: Spoken;
  readonly sentence: string;
  readonly onStepBack: () => void;
}

/** The sheet itself with what opens over it. */
function DrawingArea(props: DrawingAreaProps) {
  const { content, locale, refs, view, spoken, axis, onChosenAxis, onActiveSweep, letters = CHART_LETTERS } = props;
  const [menu, setMenu] = useState<{ hz: number; at: LocalPoint } | null>(null);
  const hint = useZoomHint();
  const close = useCallback(() => {
    onChosenAxis(null);
    setMenu(null);
    refs.root.current?.focus({ preventScroll: true });
  }, [refs.root, onChosenAxis]);
  const keyDown = useChartGestures(refs.root, view, {
    ...props,
    letters,
    onAxis: (name, at) => onChosenAxis({ axis: name, at }),
    onMenu: (hz, at) => setMenu({ hz, at }),
    onHint: hint.show,
    onFitAll: () => view && fitAll(view),
    onActiveSweep: (id) => {
      onActiveSweep?.(id);
      spoken.saySweep(content.sweeps.find((sweep) => sweep.id === id)?.name ?? '');
    },
    onCursorMoved: spoken.sayCursor,
    onNoMore: () => spoken.say(text.chart.cursor.noMore),
    onScaleSwapped: spoken.sayScale,
  });
  return (
    <div className="chart-sheet">
      <div
        ref={refs.root}
        className="chart-drawing"
        // biome-ignore lint/a11y/noNoninteractiveTabindex: the one focus stop of the chart; arrow keys move its cursor
        tabIndex={0}
        role="application"
        aria-roledescription={text.chart.role}
        aria-label={`${content.title ?? text.chart.noTitle}. ${props.sentence}`}
        aria-description={text.chart.keysHint}
        onKeyDown={keyDown}
      >
        <div className="chart-layers" aria-hidden="true">
          <canvas ref={refs.canvas} />
          <svg focusable="false" aria-hidden="true">
            <g ref={refs.frame} />
            <g ref={refs.rings} />
            <g ref={refs.cursors} />
          </svg>
        </div>
        {hint.isShown && <p className="chart-hint">{hint.words}</p>}
        {view && <CursorArrows view={view} onMoved={spoken.sayCursor} />}
      </div>
      {view && axis && (
        <AxisDialog
          view={view}
          {...axis}
          locale={locale}
          onAxis={(name) => onChosenAxis({ ...axis, axis: name })}
          onClose={close}
        />
      )}
      {view && menu && (
        <ChartMenu view={view} {...menu} onMarker={props.onMarker} onNote={props.onNote} onClose={close} />
      )}
      {props.children}
    </div>
  );
}
