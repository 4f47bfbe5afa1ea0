import { activeSweep, type ChartInput, type ChartSweep } from './chart-input.js';
import { columnOf, columnsOf, extentOf, type Quantity } from './curves/columns.js';
import type { Rect } from './primitives.js';
import { type AxisScale, axisScale, type Range, type ScaleKind } from './scales/axis-scale.js';
import { frequencyFit, usableRange, valueFit } from './scales/ranges.js';
import { fitText, textWidthPx } from './text-width.js';

/** Where everything of a chart stands, and how a pixel turns back into a frequency or a value. */
export interface Strip {
  readonly quantity: Quantity;
  readonly rect: Rect;
  readonly scale: AxisScale;
}
export interface LegendEntry {
  readonly kind: 'sweep' | 'model' | 'ramp' | 'band';
  readonly id: string;
  readonly label: string;
  readonly lineNumber: number;
  readonly x: number;
  readonly y: number; // middle of the row
}
export interface ChartLayout {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly sizes: TextSizes;
  readonly titleY: number; // baseline; 0 without a title
  readonly legend: readonly LegendEntry[];
  readonly flagTop: number;
  readonly flagHeight: number;
  readonly frame: Rect; // the dark inner rule, around all strips
  readonly strips: readonly Strip[];
  readonly frequency: AxisScale;
  readonly frequencyAxis: Rect; // below the frame: drag to stretch, click for exact values
  readonly endLabelsX: number | null; // names at the right end, where there is room
}
export interface TextSizes {
  readonly tick: number;
  readonly note: number;
  readonly title: number;
}
export const NEAT_GAP = 5; // px between the dark inner rule and the pale outer one
const STRIP_GAP = 14;
const MOST_END_LABELS = 6;
const END_LABEL_LEAST_WIDTH = 620;
export const END_LABEL_LEAD = 18; // px of line before a name at the right end

export const drawnSweeps = (input: Pick<ChartInput, 'sweeps'>): ChartSweep[] => input.sweeps.filter((s) => !s.isDimmed);
export const isRamp = (input: Pick<ChartInput, 'sweeps'>): boolean => drawnSweeps(input).length > 8;

export function quantitiesOf(view: ChartInput['state']['view']): readonly [Quantity, Quantity] {
  return view === 'real-imaginary' ? ['real', 'imaginary'] : ['magnitude', 'phase'];
}
export function scaleKindOf(quantity: Quantity, state: ChartInput['state']): ScaleKind {
  return quantity === 'magnitude' ? state.magnitudeScale : 'linear';
}

/** The range that shows all of the data, 5 % included. */
export function fittedFrequency(input: Pick<ChartInput, 'sweeps'>): Range {
  let range: [number, number] | null = null;
  for (const { points } of input.sweeps) {
    const [first, last] = [points.frequencyHz[0], points.frequencyHz[points.frequencyHz.length - 1]];
    if (first === undefined || last === undefined) continue;
    range = range ? [Math.min(range[0], first), Math.max(range[1], last)] : [first, last];
  }
  return range ? frequencyFit(range) : [20, 20_000];
}
const PHASE_DEFAULT: Range = [-90, 90];
const PHASE_TURN: Range = [-180, 180];

export function fittedValues(input: Pick<ChartInput, 'sweeps' | 'state'>, quantity: Quantity): Range {
  const isUnwrapped = input.state.isPhaseUnwrapped;
  let range: [number, number] | null = null;
  for (const sweep of input.sweeps) {
    const column = columnOf(columnsOf(sweep.points), quantity, isUnwrapped);
    const extent = column && extentOf(column, sweep.masked);
    if (extent) range = range ? [Math.min(range[0], extent[0]), Math.max(range[1], extent[1])] : extent;
  }
  if (quantity === 'phase') {
    if (!range || (range[0] >= -91 && range[1] <= 91)) return PHASE_DEFAULT;
    return isUnwrapped ? valueFit(range, 'linear') : PHASE_TURN;
  }
  const kind = scaleKindOf(quantity, input.state);
  if (!range) return [1, 100];
  if (kind === 'log' && range[0] <= 0) range = [Math.max(range[1] * 1e-4, Number.MIN_VALUE), Math.max(range[1], 1e-3)];
  return valueFit(range, kind, quantity === 'magnitude');
}
/** The stored range of a quantity, null when everything is shown. */
export function storedRange(state: ChartInput['state'], quantity: Quantity | 'frequency'): Range | null {
  switch (quantity) {
    case 'frequency':
      return state.frequencyRangeHz;
    case 'magnitude':
      return state.magnitudeRangeOhm;
    case 'phase':
      return state.phaseRangeDeg;
    case 'real':
      return state.realRangeOhm;
    case 'imaginary':
      return state.imaginaryRangeOhm;
  }
}
export function shownRange(input: Pick<ChartInput, 'sweeps' | 'state'>, quantity: Quantity | 'frequency'): Range {
  const kind = quantity === 'frequency' ? input.state.frequencyScale : scaleKindOf(quantity, input.state);
  const stored = storedRange(input.state, quantity);
  const usable = stored && usableRange(stored, kind);
  return usable ?? (quantity === 'frequency' ? fittedFrequency(input) : fittedValues(input, quantity));
}

export function layoutOf(input: ChartInput): ChartLayout {
  const { widthPx, heightPx, textScale = 1 } = input;
  const sizes: TextSizes = { tick: 11 * textScale, note: 12 * textScale, title: 15 * textScale };
  const isNarrow = widthPx < 480;
  const endLabelWidth = endLabelRoom(input, sizes);
  const left = Math.round((isNarrow ? 18 : 22) + sizes.tick * 0.6 * 4 + NEAT_GAP + 10 * textScale);
  const right = widthPx - Math.round(endLabelWidth > 0 ? endLabelWidth + NEAT_GAP + 18 : NEAT_GAP + 12);
  const titleY = input.title ? Math.round(10 + sizes.title) : 0;
  const edge = isNarrow ? 12 : 16;
  const rows = legendRows(input, sizes, edge, widthPx - edge, titleY);
  const hasFlags = !input.isStill || input.state.cursorAHz !== null || input.state.cursorBHz !== null;
  const flagTop = Math.round(rows.bottom + 4);
  const flagHeight = hasFlags ? Math.round(sizes.tick * 2 + 16) : 6;
  const top = flagTop + flagHeight + NEAT_GAP + 3;
  const bottom = Math.round(heightPx - (NEAT_GAP + 6 + sizes.tick + 8 + sizes.note + 8));
  const frame: Rect = { x: left, y: top, width: Math.max(40, right - left), height: Math.max(60, bottom - top) };
  const frequency = axisScale(
    input.state.frequencyScale,
    shownRange(input, 'frequency'),
    frame.x,
    frame.x + frame.width,
  );
  return {
    widthPx,
    heightPx,
    sizes,
    titleY,
    legend: rows.entries,
    flagTop,
    flagHeight,
    frame,
    strips: stripsOf(input, frame),
    frequency,
    frequencyAxis: {
      x: frame.x,
      y: frame.y + frame.height,
      width: frame.width,
      height: heightPx - frame.y - frame.height,
    },
    endLabelsX: endLabelWidth > 0 ? frame.x + frame.width + NEAT_GAP + 6 : null,
  };
}

function stripsOf(input: ChartInput, frame: Rect): Strip[] {
  const [upper, lower] = quantitiesOf(input.state.view);
  const lowerPart = lower === 'phase' ? 1 / 3 : 1 / 2;
  const lowerHeight = Math.round((frame.height - STRIP_GAP) * lowerPart);
  const upperHeight = frame.height - STRIP_GAP - lowerHeight;
  const strip = (quantity: Quantity, y: number, height: number): Strip => ({
    quantity,
    rect: { x: frame.x, y, width: frame.width, height },
    scale: axisScale(scaleKindOf(quantity, input.state), shownRange(input, quantity), y + height, y),
  });
  return [strip(upper, frame.y, upperHeight), strip(lower, frame.y + upperHeight + STRIP_GAP, lowerHeight)];
}

function endLabelRoom(input: ChartInput, sizes: TextSizes): number {
  const drawn = drawnSweeps(input);
  if (drawn.length === 0 || drawn.length > MOST_END_LABELS || input.widthPx < END_LABEL_LEAST_WIDTH) return 0;
  const widest = Math.max(...drawn.map((sweep) => textWidthPx(sweep.name, 'ui', sizes.note, 650)));
  return Math.min(widest + END_LABEL_LEAD, input.widthPx * 0.21);
}

interface LegendItem {
  readonly kind: LegendEntry['kind'];
  readonly id: string;
  readonly label: string;
  readonly lineNumber: number;
}
function legendItems(input: ChartInput): LegendItem[] {
  const drawn = drawnSweeps(input);
  const items: LegendItem[] = [];
  if (isRamp(input)) {
    const active = activeSweep(input);
    const label = `${drawn[0]?.name ?? ''} … ${drawn[drawn.length - 1]?.name ?? ''} (${drawn.length})`;
    items.push({ kind: 'ramp', id: 'ramp', label, lineNumber: 1 });
    if (active) items.push({ kind: 'sweep', id: active.id, label: active.name, lineNumber: active.lineNumber });
  } else {
    for (const s of drawn) items.push({ kind: 'sweep', id: s.id, label: legendName(s), lineNumber: s.lineNumber });
  }
  for (const m of input.models ?? []) items.push({ kind: 'model', id: m.id, label: m.label, lineNumber: 1 });
  for (const b of input.bands ?? []) {
    items.push({ kind: 'band', id: b.label, label: b.label, lineNumber: b.lineNumber ?? 3 });
  }
  return items;
}

/** Names beside their line samples: on the title's row where they fit, else in up to three rows of their own. */
function legendRows(input: ChartInput, sizes: TextSizes, left: number, right: number, titleY: number) {
  const rowHeight = Math.round(sizes.note * 1.6);
  const widths = (label: string) => SAMPLE_WIDTH + 8 + textWidthPx(label, 'ui', sizes.note, 650);
  const items = legendItems(input).map((item) => {
    const label = fitText(item.label, Math.min(260, right - left - 40), 'ui', sizes.note, 650);
    return { ...item, label, width: widths(label) };
  });
  const total = items.reduce((sum, { width }) => sum + width + LEGEND_GAP, -LEGEND_GAP);
  const title = titleY > 0 ? textWidthPx(`${input.title} ${input.revision ?? ''}`, 'ui', sizes.title, 650) + 48 : 0;
  const fitsBeside = titleY > 0 && items.length > 0 && left + title + total <= right;
  const firstY = fitsBeside ? titleY - sizes.title * 0.34 : titleY > 0 ? titleY + rowHeight : rowHeight;
  let [x, y] = [fitsBeside ? right - total : left, firstY];
  const entries: LegendEntry[] = [];
  for (const { width, ...item } of items) {
    if (!fitsBeside && x > left && x + width > right) [x, y] = [left, y + rowHeight];
    if (y <= firstY + rowHeight * 2) entries.push({ ...item, x, y });
    x += width + LEGEND_GAP;
  }
  const lastY = entries[entries.length - 1]?.y;
  const bottom = fitsBeside ? titleY + 4 : lastY === undefined ? titleY + 4 : lastY + rowHeight / 2;
  return { entries, bottom };
}
const LEGEND_GAP = 18;
export const SAMPLE_WIDTH = 28;
const legendName = (sweep: ChartSweep): string => (sweep.isReference ? `★ ${sweep.name}` : sweep.name);
