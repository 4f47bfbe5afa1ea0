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
  const rows = legendRows(input, sizes, edge, widthPx - edge, titleY > 0 ? titleY + 18 * textScale : 18 * textScale);
  const flagTop = Math.round(rows.bottom + 4);
  const flagHeight = Math.round(sizes.tick * 2 + 16);
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
  const widest = Math.max(...drawn.map((sweep) => textWidthPx(sweep.name, 'ui', sizes.note)));
  return Math.min(widest + 4, input.widthPx * 0.16);
}

/** Names beside their line samples, in as many rows as they need and at most three. */
function legendRows(input: ChartInput, sizes: TextSizes, left: number, right: number, firstY: number) {
  const entries: LegendEntry[] = [];
  const rowHeight = Math.round(sizes.note * 1.6);
  let [x, y] = [left, firstY];
  const add = (kind: LegendEntry['kind'], id: string, label: string, lineNumber: number) => {
    const most = Math.min(260, right - left - 40);
    const shown = fitText(label, most, 'ui', sizes.note);
    const width = SAMPLE_WIDTH + 8 + textWidthPx(shown, 'ui', sizes.note) + 18;
    if (x > left && x + width - 18 > right) [x, y] = [left, y + rowHeight];
    if (y <= firstY + rowHeight * 2) entries.push({ kind, id, label: shown, lineNumber, x, y });
    x += width;
  };
  const drawn = drawnSweeps(input);
  if (isRamp(input)) {
    const active = activeSweep(input);
    add('ramp', 'ramp', `${drawn[0]?.name ?? ''} … ${drawn[drawn.length - 1]?.name ?? ''} (${drawn.length})`, 1);
    if (active) add('sweep', active.id, active.name, active.lineNumber);
  } else for (const sweep of drawn) add('sweep', sweep.id, legendName(sweep), sweep.lineNumber);
  for (const model of input.models ?? []) add('model', model.id, model.label, 1);
  for (const band of input.bands ?? []) add('band', band.label, band.label, band.lineNumber ?? 3);
  return { entries, bottom: entries.length === 0 ? firstY - 12 : y + rowHeight / 2 };
}
export const SAMPLE_WIDTH = 28;
const legendName = (sweep: ChartSweep): string => (sweep.isReference ? `★ ${sweep.name}` : sweep.name);
