import { chart } from '../../text/chart.js';
import type { ChartInput } from '../chart-input.js';
import { type ChartLayout, NEAT_GAP, type Strip } from '../layout.js';
import type { ChartTheme } from '../palette.js';
import type { LinePrimitive, Primitive, TextPrimitive } from '../primitives.js';
import { type Tick, ticksOf } from '../scales/ticks.js';

/** The grid under the curves, and the neat line around them with its ticks, numbers and titles. */
export interface ChartTicks {
  readonly frequency: readonly Tick[];
  readonly strips: readonly (readonly Tick[])[];
}
export function ticksOfChart(layout: ChartLayout, locale?: string): ChartTicks {
  const { tick } = layout.sizes;
  return {
    frequency: ticksOf(layout.frequency, { labelGapPx: tick * 3.3, ...(locale ? { locale } : {}) }),
    strips: layout.strips.map((strip) =>
      ticksOf(strip.scale, {
        labelGapPx: tick * (strip.quantity === 'phase' ? 2.1 : 2.4),
        isAngle: strip.quantity === 'phase',
        ...(locale ? { locale } : {}),
      }),
    ),
  };
}

const crisp = (px: number): number => Math.round(px) + 0.5;
const line = (x1: number, y1: number, x2: number, y2: number, color: string, width = 1): LinePrimitive => ({
  kind: 'line',
  x1,
  y1,
  x2,
  y2,
  stroke: { color, width },
});

export function drawGrid(layout: ChartLayout, ticks: ChartTicks, theme: ChartTheme): Primitive[] {
  const items: Primitive[] = [];
  layout.strips.forEach((strip, i) => {
    const { x, y, width, height } = strip.rect;
    const across = (tick: Tick) =>
      line(x, crisp(tick.px), x + width, crisp(tick.px), tick.label ? theme.gridStrong : theme.grid);
    const along = (tick: Tick) =>
      line(crisp(tick.px), y, crisp(tick.px), y + height, tick.label ? theme.gridStrong : theme.grid);
    const own = ticks.strips[i] ?? [];
    for (const strong of [false, true]) {
      items.push(...own.filter((t) => (t.label !== '') === strong).map(across));
      items.push(...ticks.frequency.filter((t) => (t.label !== '') === strong).map(along));
    }
    if (strip.quantity !== 'magnitude' && strip.scale.min < 0 && strip.scale.max > 0) {
      items.push(line(x, crisp(strip.scale.offset), x + width, crisp(strip.scale.offset), theme.edge));
    }
  });
  return items;
}

export function drawFrame(input: ChartInput, layout: ChartLayout, ticks: ChartTicks): Primitive[] {
  const { theme } = input;
  const { frame } = layout;
  const outer = {
    x: crisp(frame.x - NEAT_GAP),
    y: crisp(frame.y - NEAT_GAP),
    width: frame.width + NEAT_GAP * 2,
    height: frame.height + NEAT_GAP * 2,
  };
  const items: Primitive[] = [{ kind: 'rect', ...outer, stroke: { color: theme.line, width: 1 } }];
  layout.strips.forEach((strip, i) => {
    const { x, y, width, height } = strip.rect;
    items.push({
      kind: 'rect',
      x: crisp(x),
      y: crisp(y),
      width,
      height,
      stroke: { color: theme.ink, width: 1.25 },
    });
    items.push(...valueAxis(strip, ticks.strips[i] ?? [], layout, theme));
  });
  items.push(...frequencyAxis(layout, ticks.frequency, theme), ...phaseNotes(input, layout));
  return items;
}

function valueAxis(strip: Strip, ticks: readonly Tick[], layout: ChartLayout, theme: ChartTheme): Primitive[] {
  const { x, y, width, height } = strip.rect;
  const { tick: size, note } = layout.sizes;
  const items: Primitive[] = [];
  const [left, right] = [crisp(x), crisp(x + width)];
  for (const tick of ticks) {
    const py = crisp(tick.px);
    const length = tick.label ? NEAT_GAP : NEAT_GAP / 2;
    const color = tick.label ? theme.ink : theme.edge;
    items.push(line(left - length, py, left, py, color), line(right, py, right + length, py, color));
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

function frequencyAxis(layout: ChartLayout, ticks: readonly Tick[], theme: ChartTheme): Primitive[] {
  const { frame, sizes, strips } = layout;
  const bottom = frame.y + frame.height;
  const items: Primitive[] = [];
  for (const tick of ticks) {
    const px = crisp(tick.px);
    const length = tick.label ? NEAT_GAP : NEAT_GAP / 2;
    const color = tick.label ? theme.ink : theme.edge;
    items.push(line(px, crisp(bottom), px, crisp(bottom) + length, color));
    items.push(line(px, crisp(frame.y) - length, px, crisp(frame.y), color));
    const seam = strips[0] ? strips[0].rect.y + strips[0].rect.height : bottom;
    if (strips.length > 1) items.push(line(px, crisp(seam), px, crisp(seam) + length, color));
    if (tick.label)
      items.push(number(tick.label, tick.px, bottom + NEAT_GAP + sizes.tick + 5, 'middle', sizes.tick, theme.soft));
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
