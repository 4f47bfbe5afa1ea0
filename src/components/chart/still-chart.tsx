import { useCallback, useId } from 'react';
import { allLayers, chartSentence, drawChart } from '../../../shared/drawing/chart.js';
import { type ChartContent, FITTED_CHART } from '../../../shared/drawing/chart-input.js';
import { type Picture, usePicture } from './use-picture.js';
import './pictures.css';

interface StillChartProps {
  readonly content: ChartContent;
  readonly locale?: string | undefined;
  readonly className?: string; // its height is the picture's
}

/** The chart as a picture that nobody can move: for a landing page, a card, a comparison of many. */
export function StillChart({ content, locale, className = '' }: StillChartProps) {
  const id = useId();
  const draw = useCallback<Picture>(
    (widthPx, heightPx, theme) =>
      allLayers(drawChart({ ...content, state: FITTED_CHART, widthPx, heightPx, theme, locale, isStill: true })),
    [content, locale],
  );
  const svg = usePicture(draw, id);
  return (
    <svg
      ref={svg}
      className={`chart-picture chart-still ${className}`}
      role="img"
      aria-label={chartSentence({ ...content, locale })}
    />
  );
}
