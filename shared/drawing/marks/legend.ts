import { activeSweep, type ChartInput, type ChartSweep } from '../chart-input.js';
import { columnOf, columnsOf } from '../curves/columns.js';
import { type ChartLayout, drawnSweeps, type LegendEntry, SAMPLE_WIDTH } from '../layout.js';
import { type ChartTheme, lineColor, lineStyle, rampColor } from '../palette.js';
import type { Primitive, TextPrimitive } from '../primitives.js';
import { pixelOf } from '../scales/axis-scale.js';
import { fitText, textWidthPx } from '../text-width.js';
import { valueOfCurve } from '../words/readout.js';
import { sweepStroke } from './curves.js';

/** Title, revision, legend and the names at the right end: the words of the picture. */
export function drawHeading(input: ChartInput, layout: ChartLayout): Primitive[] {
  const { theme } = input;
  const edge = layout.widthPx < 480 ? 12 : 16;
  const items: Primitive[] = [];
  if (input.title) {
    const room = layout.widthPx - edge * 2;
    const revision = input.revision ?? '';
    const revisionWidth = revision ? textWidthPx(revision, 'ui', layout.sizes.note) + 12 : 0;
    const title = fitText(input.title, room - revisionWidth, 'ui', layout.sizes.title, 650);
    items.push(words(title, edge, layout.titleY, layout.sizes.title, theme.ink, 'start', 650));
    if (revision) {
      const x = edge + textWidthPx(title, 'ui', layout.sizes.title, 650) + 12;
      items.push(words(revision, x, layout.titleY, layout.sizes.note, theme.soft, 'start', 400));
    }
  }
  const active = activeSweep(input);
  for (const entry of layout.legend)
    items.push(...legendEntry(input, entry, layout.sizes.note, entry.id === active?.id));
  return items;
}

const words = (
  text: string,
  x: number,
  y: number,
  sizePx: number,
  color: string,
  anchor: TextPrimitive['anchor'],
  weight: number,
): TextPrimitive => ({ kind: 'text', x, y, text, face: 'ui', sizePx, weight, color, anchor });

function legendEntry(input: ChartInput, entry: LegendEntry, size: number, isActive: boolean): Primitive[] {
  const { theme } = input;
  const sweep = input.sweeps.find((s) => s.id === entry.id);
  const sample = sweep && entry.kind === 'sweep' ? sweepSample(input, sweep, entry) : otherSample(theme, entry);
  const weight = isActive && drawnSweeps(input).length > 1 ? 650 : 400;
  const label = words(entry.label, entry.x + SAMPLE_WIDTH + 8, entry.y + size * 0.36, size, theme.ink, 'start', weight);
  return [...sample, label];
}

function sweepSample(input: ChartInput, sweep: ChartSweep, { x, y }: LegendEntry): Primitive[] {
  const stroke = sweepStroke(input, sweep);
  const line: Primitive = { kind: 'line', x1: x, y1: y, x2: x + SAMPLE_WIDTH, y2: y, stroke };
  if (drawnSweeps(input).length > 8) return [line];
  return [line, lineMarker(input.theme, sweep.lineNumber, x + SAMPLE_WIDTH / 2, y)];
}
export function lineMarker(theme: ChartTheme, lineNumber: number, x: number, y: number, sizePx = 7): Primitive {
  const { marker } = lineStyle(lineNumber);
  return { kind: 'marker', shape: marker, x, y, sizePx, color: lineColor(theme, lineNumber), ground: theme.sheet };
}

function otherSample(theme: ChartTheme, { kind, x, y }: LegendEntry): Primitive[] {
  switch (kind) {
    case 'ramp':
      return Array.from({ length: SAMPLE_WIDTH / 4 }, (_, k): Primitive => {
        const color = rampColor(theme, k / (SAMPLE_WIDTH / 4 - 1));
        return { kind: 'rect', x: x + k * 4, y: y - 4, width: 4.2, height: 8, fill: { color } };
      });
    case 'band':
      return [
        {
          kind: 'rect',
          x,
          y: y - 5,
          width: SAMPLE_WIDTH,
          height: 10,
          fill: { color: theme.within, opacity: 0.12 },
          stroke: { color: theme.within, width: 1 },
        },
      ];
    case 'model':
    case 'sweep':
      return [
        {
          kind: 'line',
          x1: x,
          y1: y,
          x2: x + SAMPLE_WIDTH,
          y2: y,
          stroke: { color: theme.ink, width: 1.25, dash: [4, 6] },
        },
      ];
  }
}

/** Names where the lines end, moved apart so that none covers another, with a short lead from line to name. */
export function drawEndLabels(input: ChartInput, layout: ChartLayout): Primitive[] {
  const [strip] = layout.strips;
  if (layout.endLabelsX === null || !strip) return [];
  const { theme } = input;
  const size = layout.sizes.note;
  const right = layout.frame.x + layout.frame.width;
  const places = drawnSweeps(input)
    .map((sweep) => ({ sweep, y: endHeight(sweep, layout) }))
    .filter((place) => place.y !== null)
    .map((place) => ({ sweep: place.sweep, from: place.y ?? 0, y: place.y ?? 0 }))
    .sort((a, b) => a.y - b.y);
  spread(places, size * 1.3, strip.rect.y + size * 0.4, strip.rect.y + strip.rect.height - size * 0.2);
  const room = layout.widthPx - layout.endLabelsX - 6;
  const active = activeSweep(input);
  return places.flatMap(({ sweep, from, y }): Primitive[] => {
    const weight = sweep === active && places.length > 1 ? 650 : 400;
    const label = fitText(sweep.name, room - 8, 'ui', size, weight);
    const x = layout.endLabelsX ?? right;
    const stroke = { color: lineColor(theme, sweep.lineNumber), width: 1.5 };
    return [
      { kind: 'path', points: Float64Array.of(right + 1, from, x - 3, y, x + 4, y), stroke },
      words(label, x + 8, y + size * 0.36, size, theme.ink, 'start', weight),
    ];
  });
}

/** Height in the upper strip at which a line leaves the frame, null where it does not. */
function endHeight(sweep: ChartSweep, layout: ChartLayout): number | null {
  const [strip] = layout.strips;
  const columns = columnsOf(sweep.points);
  const lastHz = columns.frequencyHz[columns.frequencyHz.length - 1] ?? 0;
  const value = valueOfCurve(sweep.points, Math.min(lastHz, layout.frequency.max));
  if (!strip || !value || !columnOf(columns, strip.quantity)) return null;
  const shown = strip.quantity === 'magnitude' ? value.magnitudeOhm : value.realOhm;
  if (shown === undefined || (strip.scale.kind === 'log' && shown <= 0)) return null;
  const { y, height } = strip.rect;
  return Math.min(y + height, Math.max(y, pixelOf(strip.scale, shown)));
}

/** Pushes rows down to their distance, then back up from the foot. */
function spread(rows: { y: number }[], gap: number, top: number, bottom: number): void {
  let above = top - gap;
  for (const row of rows) {
    row.y = Math.max(row.y, above + gap);
    above = row.y;
  }
  let below = bottom + gap;
  for (const row of rows.toReversed()) {
    row.y = Math.min(row.y, below - gap);
    below = row.y;
  }
}
