import { type RefObject, useEffect, useRef } from 'react';
import type { ChartTheme } from '../../../shared/drawing/palette.js';
import type { Primitive } from '../../../shared/drawing/primitives.js';
import { svgOf } from '../../../shared/drawing/svg.js';
import { readChartTheme, watchChartTheme } from './chart-theme.js';

export type Picture = (widthPx: number, heightPx: number, theme: ChartTheme) => readonly Primitive[];

/** A still picture in an SVG that is drawn anew for its size and theme. `draw` should keep its identity. */
export function usePicture(draw: Picture, idPrefix: string): RefObject<SVGSVGElement | null> {
  const svg = useRef<SVGSVGElement>(null);
  useEffect(() => {
    const element = svg.current;
    if (!element) return;
    const paint = () => {
      const { width, height } = element.getBoundingClientRect();
      if (width < 20 || height < 20) return;
      const theme = readChartTheme();
      element.innerHTML = svgOf(draw(Math.round(width), Math.round(height), theme), theme, idPrefix);
    };
    paint();
    const sizes = new ResizeObserver(paint);
    sizes.observe(element);
    const leave = watchChartTheme(paint);
    return () => {
      sizes.disconnect();
      leave();
    };
  }, [draw, idPrefix]);
  return svg;
}
