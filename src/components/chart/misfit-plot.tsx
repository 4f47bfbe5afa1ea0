import { useCallback, useId, useMemo } from 'react';
import { describeMisfit, drawMisfit, type MisfitLine } from '../../../shared/drawing/misfit.js';
import type { Trace } from '../../../shared/output.js';
import { text } from '../../../shared/text.js';
import { type Picture, usePicture } from './use-picture.js';
import './pictures.css';

interface MisfitPlotProps {
  /** Traces of axis `residual`, relative to |Z|: one value, or real and imaginary part. */
  readonly traces: readonly Trace[];
  readonly locale?: string | undefined;
  readonly heightPx?: number;
}

/** Misfit against frequency, with its sentence under it. */
export function MisfitPlot({ traces, locale, heightPx = 180 }: MisfitPlotProps) {
  const id = useId();
  const lines = useMemo(() => traces.flatMap(misfitLines), [traces]);
  const draw = useCallback<Picture>(
    (widthPx, height, theme) => drawMisfit({ lines, widthPx, heightPx: height, theme, locale }),
    [lines, locale],
  );
  const svg = usePicture(draw, id);
  return (
    <figure className="chart-misfit">
      <svg
        ref={svg}
        className="chart-picture"
        role="img"
        aria-label={text.chart.misfit.name}
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
  const parts = [
    ...(y ? [line(label, y)] : []),
    ...(re ? [line(text.chart.misfit.real, re)] : []),
    ...(im ? [line(text.chart.misfit.imaginary, im)] : []),
  ];
  return parts;
}
