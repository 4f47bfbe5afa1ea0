import { useCallback, useId, useMemo } from 'react';
import { describeMisfit, drawMisfit, type MisfitLine } from '../../../shared/drawing/misfit.js';
import type { Trace } from '../../../shared/output.js';
import { text } from '../../../shared/text.js';
import { type Picture, usePicture } from './use-picture.js';
import './pictures.css';

interface MisfitPlotProps {
  /** Traces of axis `residual`, relative to |Z|: one value, or ln(Z/model) as its real part (|Z|) and imaginary part (phase). */
  readonly traces: readonly Trace[];
  readonly locale?: string | undefined;
  readonly heightPx?: number;
}

/** Misfit against frequency, one plot for each trace, with its sentence under it. */
export function MisfitPlot({ traces, ...rest }: MisfitPlotProps) {
  return (
    <div className="chart-misfits">
      {traces.map((trace) => (
        <OneMisfit key={trace.id} trace={trace} isNamed={traces.length > 1} {...rest} />
      ))}
    </div>
  );
}

interface OneMisfitProps extends Omit<MisfitPlotProps, 'traces'> {
  readonly trace: Trace;
  readonly isNamed: boolean;
}
function OneMisfit({ trace, isNamed, locale, heightPx = 180 }: OneMisfitProps) {
  const id = useId();
  const lines = useMemo(() => misfitLines(trace), [trace]);
  const draw = useCallback<Picture>(
    (widthPx, height, theme) => drawMisfit({ lines, widthPx, heightPx: height, theme, locale }),
    [lines, locale],
  );
  const svg = usePicture(draw, id);
  return (
    <figure className="chart-misfit">
      {isNamed && <p className="chart-misfit-name">{trace.label}</p>}
      <svg
        ref={svg}
        className="chart-picture"
        role="img"
        aria-label={isNamed ? `${text.chart.misfit.name}. ${trace.label}` : text.chart.misfit.name}
        style={{ height: heightPx }}
      />
      <figcaption>{describeMisfit(lines, locale)}</figcaption>
    </figure>
  );
}

function misfitLines({ label, x, y, re, im, yUnit }: Trace): MisfitLine[] {
  const frequencyHz = Float64Array.from(x);
  const scale = yUnit === '%' ? 0.01 : 1;
  const line = (name: string, values: ArrayLike<number>): MisfitLine => ({
    label: name,
    frequencyHz,
    relative: Float64Array.from(values, (value) => value * scale),
  });
  return [
    ...(y ? [line(label, y)] : []),
    ...(re ? [line(text.chart.misfit.real, re)] : []),
    ...(im ? [line(text.chart.misfit.imaginary, im)] : []),
  ];
}
