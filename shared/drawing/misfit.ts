import { formatPlain } from '../quantity-text.js';
import { chart } from '../text/chart.js';
import { extentOf } from './curves/columns.js';
import { decimatedPath } from './curves/decimate.js';
import { number } from './marks/grid.js';
import { type ChartTheme, lineColor, lineStyle } from './palette.js';
import type { Primitive, Rect } from './primitives.js';
import { axisScale } from './scales/axis-scale.js';
import { frequencyFit } from './scales/ranges.js';
import { ticksOf } from './scales/ticks.js';
import { textWidthPx } from './text-width.js';
import { shortQuantity } from './words/describe.js';

/** What a model leaves over, against frequency: flat noise is good, a shape means that the model misses something. */
export interface MisfitLine {
  readonly label: string;
  readonly frequencyHz: Float64Array; // (n), ascending
  readonly relative: Float64Array; // (n), of |Z|: 0.01 is 1 %
}
export interface MisfitInput {
  readonly lines: readonly MisfitLine[];
  readonly widthPx: number;
  readonly heightPx: number;
  readonly theme: ChartTheme;
  readonly locale?: string | undefined;
}
const TEXT_PX = 11;
const LEAST_SPAN = 0.001; // 0.1 %: a perfect fit is a line, not a picture of rounding

export function drawMisfit(input: MisfitInput): Primitive[] {
  const { lines, theme, locale, widthPx, heightPx } = input;
  const frame: Rect = { x: 46, y: 26, width: Math.max(60, widthPx - 58), height: Math.max(40, heightPx - 66) };
  const most = Math.max(LEAST_SPAN, ...lines.map(({ relative }) => largest(relative))) * 1.1;
  const value = axisScale('linear', [-most * 100, most * 100], frame.y + frame.height, frame.y);
  const frequency = axisScale('log', frequencyFit(spanOf(lines)), frame.x, frame.x + frame.width);
  const options = locale ? { locale } : {};
  const items: Primitive[] = [];
  for (const tick of ticksOf(value, { labelGapPx: 18, ...options })) {
    const y = Math.round(tick.px) + 0.5;
    const color = tick.value === 0 ? theme.edge : tick.label ? theme.gridStrong : theme.grid;
    items.push({ kind: 'line', x1: frame.x, y1: y, x2: frame.x + frame.width, y2: y, stroke: { color, width: 1 } });
    if (tick.label) items.push(number(tick.label, frame.x - 8, tick.px + 4, 'end', TEXT_PX, theme.soft));
  }
  for (const tick of ticksOf(frequency, { labelGapPx: 34, labelWidthPx: tickWidth, ...options })) {
    const x = Math.round(tick.px) + 0.5;
    const color = tick.label ? theme.gridStrong : theme.grid;
    items.push({ kind: 'line', x1: x, y1: frame.y, x2: x, y2: frame.y + frame.height, stroke: { color, width: 1 } });
    const y = frame.y + frame.height + TEXT_PX + 5;
    if (tick.label) items.push(number(tick.label, tick.px, y, 'middle', TEXT_PX, theme.soft));
  }
  const curves = lines.map((line, i): Primitive => {
    const points = decimatedPath(
      line.frequencyHz.map(Math.log),
      line.relative.map((part) => part * 100),
      frequency,
      value,
    );
    const stroke = { color: lineColor(theme, i + 1), width: 1.25, dash: lineStyle(i + 1).dash };
    return { kind: 'path', points, stroke };
  });
  items.push({ kind: 'clip', to: frame, items: curves });
  items.push({ kind: 'rect', ...crisp(frame), stroke: { color: theme.ink, width: 1.25 } });
  return [...items, ...titles(input, frame)];
}

const tickWidth = (label: string): number => textWidthPx(label, 'num', TEXT_PX);

function titles({ lines, theme, heightPx }: MisfitInput, frame: Rect): Primitive[] {
  const word = (text: string, x: number, y: number, anchor: 'start' | 'end' | 'middle'): Primitive => ({
    kind: 'text',
    x,
    y,
    text,
    face: 'ui',
    sizePx: TEXT_PX + 1,
    weight: 400,
    color: theme.soft,
    anchor,
  });
  const items = [
    word(chart.axis.misfit, 4, 15, 'start'),
    word(chart.axis.frequency, frame.x + frame.width / 2, heightPx - 5, 'middle'),
  ];
  let x = frame.x + frame.width;
  if (lines.length < 2) return items;
  for (const [i, line] of [...lines.entries()].reverse()) {
    items.push(word(line.label, x, 15, 'end'));
    x -= textWidthPx(line.label, 'ui', TEXT_PX + 1) + 6;
    const stroke = { color: lineColor(theme, i + 1), width: 1.5, dash: lineStyle(i + 1).dash };
    items.push({ kind: 'line', x1: x - 22, y1: 11, x2: x, y2: 11, stroke });
    x -= 36;
  }
  return items;
}

const crisp = ({ x, y, width, height }: Rect): Rect => ({ x: x + 0.5, y: y + 0.5, width, height });
function largest(values: Float64Array): number {
  const extent = extentOf(values);
  return extent ? Math.max(Math.abs(extent[0]), Math.abs(extent[1])) : 0;
}
function spanOf(lines: readonly MisfitLine[]): [number, number] {
  const extents = lines.map(({ frequencyHz }) => extentOf(frequencyHz)).filter((extent) => extent !== null);
  if (extents.length === 0) return [20, 20_000];
  return [Math.min(...extents.map(([low]) => low)), Math.max(...extents.map(([, high]) => high))];
}

/** "Misfit 0.52 % on average, at most 1.8 % at 31.2 Hz." */
export function describeMisfit(lines: readonly MisfitLine[], locale?: string): string {
  let [sum, count, worst, worstHz] = [0, 0, 0, 0];
  for (const { frequencyHz, relative } of lines) {
    relative.forEach((value, i) => {
      if (!Number.isFinite(value)) return;
      sum += value * value;
      count += 1;
      if (Math.abs(value) > worst) [worst, worstHz] = [Math.abs(value), frequencyHz[i] ?? 0];
    });
  }
  if (count === 0) return chart.misfit.none;
  const percent = (value: number) => formatPlain(value * 100, 2, locale);
  return chart.misfit.sentence(percent(Math.sqrt(sum / count)), percent(worst), shortQuantity(worstHz, 'Hz', locale));
}
