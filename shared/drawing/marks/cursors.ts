import { displayUnit } from '../../quantities.js';
import { formatDecimals, formatQuantity } from '../../quantity-text.js';
import { activeSweep, type ChartInput } from '../chart-input.js';
import { type ChartLayout, NEAT_GAP, type Strip } from '../layout.js';
import { lineColor } from '../palette.js';
import type { Primitive, Rect } from '../primitives.js';
import { pixelOf } from '../scales/axis-scale.js';
import { fitText, textWidthPx } from '../text-width.js';
import { type ReadoutValue, valueOfCurve } from '../words/readout.js';
import { sweepStroke } from './curves.js';
import { number } from './grid.js';

/** Cursors A and B with the values at their flags, and the markers of a calculator. */
export type CursorName = 'A' | 'B';
export interface CursorFlag {
  readonly cursor: CursorName;
  readonly rect: Rect;
  readonly poleX: number;
  readonly lines: readonly [string, string];
}
const FLAG_PADDING = 7;

/** "31.80 Hz" and "46.20 Ω −12.3°": what stands on a flag, also spoken. */
export function flagLines(cursorHz: number, value: ReadoutValue | null, input: ChartInput): [string, string] {
  const { locale } = input;
  const frequency = formatQuantity(cursorHz, 'Hz', { locale });
  if (!value) return [frequency, '–'];
  if (input.state.view !== 'magnitude-phase' && value.realOhm !== undefined) {
    return [frequency, complexText(value.realOhm, value.imaginaryOhm ?? 0, locale)];
  }
  const magnitude = formatQuantity(value.magnitudeOhm, 'Ω', { locale });
  return [
    frequency,
    value.phaseDeg === undefined ? magnitude : `${magnitude} ${signedDegrees(value.phaseDeg, locale)}`,
  ];
}
/** `46.3 + j0.1 Ω`: both parts in one unit and to one place, three digits of the greater. */
function complexText(realOhm: number, imaginaryOhm: number, locale?: string): string {
  const size = Math.hypot(realOhm, imaginaryOhm);
  const unit = displayUnit(size, 'Ω');
  const places = Math.max(0, 2 - Math.floor(Math.log10(size / unit.factor || 1)));
  const part = (ohm: number) => formatDecimals(ohm / unit.factor, places, locale);
  const sign = imaginaryOhm < 0 ? '\u2212' : '+';
  return `${part(realOhm)} ${sign} j${part(Math.abs(imaginaryOhm))}\u00A0${unit.symbol}`;
}
export function signedDegrees(deg: number, locale?: string): string {
  const text = formatDecimals(deg, 1, locale);
  return `${deg >= 0.05 ? '+' : ''}${text}°`;
}

/** Flags stand above the frame, fly away from each other, and never overlap. */
export function cursorFlags(input: ChartInput, layout: ChartLayout): CursorFlag[] {
  const { cursorAHz, cursorBHz } = input.state;
  const active = activeSweep(input);
  const made: CursorFlag[] = [];
  for (const [cursor, hz] of [
    ['A', cursorAHz],
    ['B', cursorBHz],
  ] as const) {
    if (hz === null || (input.state.frequencyScale === 'log' && hz <= 0)) continue;
    const poleX = pixelOf(layout.frequency, hz);
    if (poleX < layout.frame.x - 0.5 || poleX > layout.frame.x + layout.frame.width + 0.5) continue;
    const lines = flagLines(hz, active ? valueOfCurve(active.points, hz) : null, input);
    const size = layout.sizes.tick;
    const width = Math.max(textWidthPx(lines[0], 'num', size) + size * 1.9, textWidthPx(lines[1], 'num', size));
    const rect = { x: poleX, y: layout.flagTop, width: Math.ceil(width + FLAG_PADDING * 2), height: layout.flagHeight };
    made.push({ cursor, poleX, lines, rect });
  }
  return placed(made, layout.widthPx);
}

function placed(flags: CursorFlag[], widthPx: number): CursorFlag[] {
  const sorted = [...flags].sort((a, b) => a.poleX - b.poleX);
  const xs = sorted.map((flag, i) => {
    const fliesLeft = sorted.length === 2 && i === 0;
    return fliesLeft ? flag.poleX - flag.rect.width : flag.poleX;
  });
  const clamp = (i: number, x: number) => Math.min(widthPx - 4 - (sorted[i]?.rect.width ?? 0), Math.max(4, x));
  const single = sorted[0];
  if (sorted.length === 1 && single && single.poleX + single.rect.width > widthPx - 4)
    xs[0] = single.poleX - single.rect.width;
  const fitted = xs.map((x, i) => clamp(i, x));
  const [first, second] = sorted;
  if (first && second) {
    const overlap = (fitted[0] ?? 0) + first.rect.width + 2 - (fitted[1] ?? 0);
    if (overlap > 0) {
      fitted[1] = clamp(1, (fitted[1] ?? 0) + overlap);
      fitted[0] = clamp(0, (fitted[1] ?? 0) - first.rect.width - 2);
    }
  }
  return sorted.map((flag, i) => ({ ...flag, rect: { ...flag.rect, x: Math.round(fitted[i] ?? flag.rect.x) } }));
}

export function drawCursors(input: ChartInput, layout: ChartLayout): Primitive[] {
  return cursorFlags(input, layout).flatMap((flag) => [
    ...pole(input, layout, flag),
    ...flagItems(input, layout, flag),
  ]);
}

function pole(input: ChartInput, layout: ChartLayout, { cursor, poleX }: CursorFlag): Primitive[] {
  const { theme } = input;
  const x = Math.round(poleX) + 0.5;
  const stroke = { color: theme.ink, width: 1, ...(cursor === 'B' ? { dash: [5, 3] } : {}) };
  const y2 = layout.frame.y + layout.frame.height + NEAT_GAP;
  const items: Primitive[] = [{ kind: 'line', x1: x, y1: layout.flagTop + layout.flagHeight, x2: x, y2, stroke }];
  const active = activeSweep(input);
  const hz = cursor === 'A' ? input.state.cursorAHz : input.state.cursorBHz;
  const value = active && hz !== null ? valueOfCurve(active.points, hz) : null;
  if (!active || !value) return items;
  const color = sweepStroke(input, active).color ?? lineColor(theme, active.lineNumber);
  for (const strip of layout.strips) {
    const shown = shownValue(strip, value, input);
    if (shown === undefined || (strip.scale.kind === 'log' && shown <= 0)) continue;
    const y = pixelOf(strip.scale, shown);
    if (y < strip.rect.y || y > strip.rect.y + strip.rect.height) continue;
    items.push({ kind: 'marker', shape: 'ring', x: poleX, y, sizePx: 8, color, ground: theme.sheet });
  }
  return items;
}

function shownValue(strip: Strip, value: ReadoutValue, input: ChartInput): number | undefined {
  switch (strip.quantity) {
    case 'magnitude':
      return value.magnitudeOhm;
    case 'phase':
      return input.state.isPhaseUnwrapped ? undefined : value.phaseDeg; // the wrapped value would miss the line
    case 'real':
      return value.realOhm;
    case 'imaginary':
      return value.imaginaryOhm;
  }
}

/** A is a filled flag, B an open one: told apart without colour. */
function flagItems(input: ChartInput, layout: ChartLayout, { cursor, rect, lines }: CursorFlag): Primitive[] {
  const { theme } = input;
  const size = layout.sizes.tick;
  const [ground, ink] = cursor === 'A' ? [theme.ink, theme.sheet] : [theme.sheet, theme.ink];
  const box = { x: rect.x + 0.5, y: rect.y + 0.5, width: rect.width - 1, height: rect.height - 1 };
  const first = rect.y + FLAG_PADDING + size * 0.75;
  const x = rect.x + FLAG_PADDING;
  const items: Primitive[] = [
    { kind: 'rect', ...box, radius: 2, fill: { color: ground }, stroke: { color: theme.ink, width: 1.25 } },
    number(cursor, x, first, 'start', size, ink, 600),
    number(lines[0], x + size * 1.4, first, 'start', size, ink, 400),
    number(lines[1], x, first + size * 1.4, 'start', size, ink, 400),
  ];
  if (input.chosenCursor === cursor) {
    const y = rect.y + rect.height - 3;
    items.push({
      kind: 'line',
      x1: x,
      y1: y,
      x2: rect.x + rect.width - FLAG_PADDING,
      y2: y,
      stroke: { color: ink, width: 1.5 },
    });
  }
  return items;
}

/** Frequencies a calculator names: a short tick from the top of the frame, the words beside it. */
export function drawMarkers(input: ChartInput, layout: ChartLayout): Primitive[] {
  const { theme } = input;
  const [strip] = layout.strips;
  if (!strip) return [];
  const size = layout.sizes.note;
  const taken: number[] = [];
  const inView = (input.markers ?? []).filter(
    (m) => m.frequencyHz >= layout.frequency.min && m.frequencyHz <= layout.frequency.max,
  );
  return [...inView]
    .sort((a, b) => a.frequencyHz - b.frequencyHz)
    .flatMap((marker): Primitive[] => {
      const x = Math.round(pixelOf(layout.frequency, marker.frequencyHz)) + 0.5;
      const label = fitText(marker.label, 140, 'ui', size);
      const width = textWidthPx(label, 'ui', size) + 10;
      const row = firstFree(taken, x, width);
      const y = strip.rect.y + strip.rect.height - 8 - row * (size + 4);
      const isLeft = x + width > strip.rect.x + strip.rect.width;
      return [
        {
          kind: 'line',
          x1: x,
          y1: strip.rect.y,
          x2: x,
          y2: strip.rect.y + strip.rect.height,
          stroke: { color: theme.edge, width: 1, dash: [1, 3] },
        },
        {
          kind: 'text',
          x: isLeft ? x - 4 : x + 4,
          y,
          text: label,
          face: 'ui',
          sizePx: size,
          weight: 400,
          color: theme.soft,
          anchor: isLeft ? 'end' : 'start',
        },
      ];
    });
}
function firstFree(rows: number[], x: number, width: number): number {
  const row = rows.findIndex((end) => x > end);
  const at = row >= 0 ? row : rows.length;
  rows[at] = x + width;
  return at;
}
