import { chart } from '../../text/chart.js';
import type { ChartInput } from '../chart-input.js';
import { type ChartLayout, NEAT_GAP, type Strip } from '../layout.js';
import type { ChartTheme } from '../palette.js';
import type { Primitive, TextPrimitive } from '../primitives.js';
import { type Tick, ticksOf } from '../scales/ticks.js';
import { textWidthPx } from '../text-width.js';
import { crisp, JoinedLines } from './joined-lines.js';

/** The grid under the curves, and the neat line around them with its ticks, numbers and titles. */
export interface ChartTicks {
  readonly frequency: readonly Tick[];
  readonly strips: readonly (readonly Tick[])[];
}
export function ticksOfChart(layout: ChartLayout, locale?: string): ChartTicks {
  const { tick } = layout.sizes;
  return {
    frequency: ticksOf(layout.frequency, {
      labelGapPx: tick * 3.3,
      labelWidthPx: (label) => textWidthPx(label, 'num', tick),
      ...(locale ? { locale } : {}),
    }),
    strips: layout.strips.map((strip) =>
      ticksOf(strip.scale, {
        labelGapPx: tick * (strip.quantity === 'phase' ? 2.1 : 2.4),
        isAngle: strip.quantity === 'phase',
        ...(locale ? { locale } : {}),
      }),
    ),
  };
}

export function drawGrid(layout: ChartLayout, ticks: ChartTicks, theme: ChartTheme): Primitive[] {
  const [light, strong, zero] = [new JoinedLines(), new JoinedLines(), new JoinedLines()];
  layout.strips.forEach((strip, i) => {
    const { x, y, width, height } = strip.rect;
    const grid = (tick: Tick) => (tick.label ? strong : light);
    const color = (tick: Tick) => (tick.label ? theme.gridStrong : theme.grid);
    for (const tick of ticks.strips[i] ?? []) {
      grid(tick).add(x, crisp(tick.px), x + width, crisp(tick.px), color(tick));
    }
    for (const tick of ticks.frequency) {
      grid(tick).add(crisp(tick.px), y, crisp(tick.px), y + height, color(tick));
    }
    if (strip.quantity !== 'magnitude' && strip.scale.min < 0 && strip.scale.max > 0) {
      zero.add(x, crisp(strip.scale.offset), x + width, crisp(strip.scale.offset), theme.edge);
    }
  });
  return [...light.paths(), ...strong.paths(), ...zero.paths()];
}

export function drawFrame(input: ChartInput, layout: ChartLayout, ticks: ChartTicks): Primitive[] {
  const { theme } = input;
  const { frame, strips } = layout;
  const outer = {
    x: crisp(frame.x - NEAT_GAP),
    y: crisp(frame.y - NEAT_GAP),
    width: frame.width + NEAT_GAP * 2,
    height: frame.height + NEAT_GAP * 2,
  };
  const marks = new JoinedLines();
  const words: Primitive[] = [];
  strips.forEach((strip, i) => {
    words.push(...valueAxis(strip, ticks.strips[i] ?? [], layout, theme, marks));
  });
  words.push(...frequencyAxis(layout, ticks.frequency, theme, marks), ...phaseNotes(input, layout));
  return [
    { kind: 'rect', ...outer, stroke: { color: theme.line, width: 1 } },
    ...marks.paths(),
    ...strips.map(
      ({ rect: { x, y, width, height } }): Primitive => ({
        kind: 'rect',
        x: crisp(x),
        y: crisp(y),
        width,
        height,
        stroke: { color: theme.ink, width: 1.25 },
      }),
    ),
    ...words,
  ];
}
const tickColor = (tick: Tick, theme: ChartTheme): string => (tick.label ? theme.ink : theme.edge);
const tickLength = (tick: Tick): number => (tick.label ? NEAT_GAP : NEAT_GAP / 2);

function valueAxis(
  strip: Strip,
  ticks: readonly Tick[],
  layout: ChartLayout,
  theme: ChartTheme,
  marks: JoinedLines,
): Primitive[] {
  const { x, y, width, height } = strip.rect;
  const { tick: size, note } = layout.sizes;
  const items: Primitive[] = [];
  const [left, right] = [crisp(x), crisp(x + width)];
  for (const tick of ticks) {
    const py = crisp(tick.px);
    const [length, color] = [tickLength(tick), tickColor(tick, theme)];
    marks.add(left - length, py, left, py, color);
    marks.add(right, py, right + length, py, color);
    if (tick.label === '') continue;
    const baseline = Math.min(y + height + size * 0.3, Math.max(y + size * 0.4, tick.px + size * 0.36));
    items.push(number(tick.label, x - NEAT_GAP - 6, baseline, 'end', size, theme.soft));
  }
  items.push({
    kind: 'text',
    x: note + 2,
    y: y + height / 2,
    text: chart.axis[strip.quantity],
    face: 'ui',
    sizePx: note,
    weight: 400,
    color: theme.soft,
    anchor: 'middle',
    isUpright: true,
  });
  return items;
}

function frequencyAxis(
  layout: ChartLayout,
  ticks: readonly Tick[],
  theme: ChartTheme,
  marks: JoinedLines,
): Primitive[] {
  const { frame, sizes, strips } = layout;
  const bottom = frame.y + frame.height;
  const seams = strips.slice(0, -1).map(({ rect }) => rect.y + rect.height);
  const items: Primitive[] = [];
  for (const tick of ticks) {
    const px = crisp(tick.px);
    const [length, color] = [tickLength(tick), tickColor(tick, theme)];
    marks.add(px, crisp(frame.y) - length, px, crisp(frame.y), color);
    for (const y of [...seams, bottom]) marks.add(px, crisp(y), px, crisp(y) + length, color);
    const y = bottom + NEAT_GAP + sizes.tick + 5;
    if (tick.label) items.push(number(tick.label, tick.px, y, 'middle', sizes.tick, theme.soft));
  }
  items.push({
    kind: 'text',
    x: frame.x + frame.width / 2,
    y: bottom + NEAT_GAP + sizes.tick + sizes.note + 10,
    text: chart.axis.frequency,
    face: 'ui',
    sizePx: sizes.note,
    weight: 400,
    color: theme.soft,
    anchor: 'middle',
  });
  return items;
}

/** States of the phase that must not be missed, written on the strip. */
function phaseNotes(input: ChartInput, layout: ChartLayout): TextPrimitive[] {
  const strip = layout.strips.find((s) => s.quantity === 'phase');
  if (!strip) return [];
  const notes: string[] = [];
  if (input.state.isPhaseUnwrapped) notes.push(chart.phaseUnwrapped);
  if (input.isPhaseTurned) notes.push(chart.phaseTurned);
  const { x, y, width } = strip.rect;
  if (notes.length === 0) return [];
  return [
    {
      kind: 'text',
      x: x + width - 8,
      y: y + layout.sizes.note + 4,
      text: notes.join(', '),
      face: 'ui',
      sizePx: layout.sizes.note,
      weight: 400,
      color: input.theme.soft,
      anchor: 'end',
    },
  ];
}

export function number(
  text: string,
  x: number,
  y: number,
  anchor: TextPrimitive['anchor'],
  sizePx: number,
  color: string,
  weight = 400,
): TextPrimitive {
  return { kind: 'text', x, y, text, face: 'num', sizePx, weight, color, anchor };
}
