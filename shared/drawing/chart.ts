import { chart as words } from '../text/chart.js';
import { activeSweep, type ChartInput } from './chart-input.js';
import { type ChartLayout, drawnSweeps, layoutOf } from './layout.js';
import { drawCursors, drawMarkers } from './marks/cursors.js';
import { drawCurves } from './marks/curves.js';
import { drawFrame, drawGrid, ticksOfChart } from './marks/grid.js';
import { drawEndLabels, drawHeading } from './marks/legend.js';
import { LIGHT_THEME } from './palette.js';
import type { Primitive } from './primitives.js';
import { svgDocument } from './svg.js';
import { describeImpedance } from './words/describe.js';

/**
 * A chart as layers of a draw list, bottom to top, with the layout that turns pixels back into values. Pure: the same
 * input gives the same picture on screen, in SVG and on paper.
 */
export interface ChartDrawing {
  readonly layout: ChartLayout;
  readonly ground: readonly Primitive[]; // grid
  readonly curves: readonly Primitive[];
  readonly frame: readonly Primitive[]; // neat line, ticks, titles, legend
  readonly cursors: readonly Primitive[];
}

export function drawChart(input: ChartInput): ChartDrawing {
  const layout = layoutOf(input);
  const ticks = ticksOfChart(layout, input.locale);
  return {
    layout,
    ground: drawGrid(layout, ticks, input.theme),
    curves: drawCurves(input, layout),
    frame: [
      ...drawHeading(input, layout),
      ...drawMarkers(input, layout),
      ...drawFrame(input, layout, ticks),
      ...drawEndLabels(input, layout),
    ],
    cursors: drawCursors(input, layout),
  };
}

export const allLayers = (drawing: ChartDrawing): Primitive[] => [
  ...drawing.ground,
  ...drawing.curves,
  ...drawing.frame,
  ...drawing.cursors,
];

/** The chart as an SVG file, in the light colours whatever the screen shows. */
export function chartSvg(input: Omit<ChartInput, 'theme'>): string {
  const lit: ChartInput = { ...input, theme: LIGHT_THEME };
  return svgDocument(allLayers(drawChart(lit)), LIGHT_THEME, {
    widthPx: input.widthPx,
    heightPx: input.heightPx,
    title: input.title ?? words.noTitle,
    description: chartSentence(lit),
    ground: LIGHT_THEME.sheet,
  });
}

/** The chart in one or a few sentences, the active sweep first. */
export function chartSentence(input: Pick<ChartInput, 'sweeps' | 'activeSweepId' | 'locale'>): string {
  const active = activeSweep(input);
  const others = drawnSweeps(input).filter((sweep) => sweep !== active);
  return describeImpedance(active ? [active, ...others] : others, input.locale);
}
