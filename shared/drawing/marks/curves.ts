import { activeSweep, type ChartBand, type ChartInput, type ChartSweep } from '../chart-input.js';
import { type CurveColumns, columnOf, columnsOf } from '../curves/columns.js';
import { decimatedPath } from '../curves/decimate.js';
import { markedPoints, maskedPoints, measuredPoints } from '../curves/point-marks.js';
import { type ChartLayout, drawnSweeps, isRamp, type Strip } from '../layout.js';
import { lineColor, lineStyle, rampColor } from '../palette.js';
import type { PathPrimitive, Primitive, Stroke } from '../primitives.js';
import type { AxisScale } from '../scales/axis-scale.js';

/** Bands, lines and their marks, one clip per strip. */
const MODEL_DASH = [4, 6]; // more gap than line: the sweep's own colour shows through
const DIMMED = 0.35;
const RAMP_DIMMED = 0.45;
const BAND_OPACITY = { limits: 0.12, uncertainty: 0.16 } as const;
const MARKER_PX = 7;
const HAIRLINE = 1; // px: painters draw it several times faster than a wider line, and forty lines need it

export function drawCurves(input: ChartInput, layout: ChartLayout): Primitive[] {
  return layout.strips.map((strip): Primitive => {
    const items: Primitive[] = [];
    for (const band of input.bands ?? []) {
      if (band.quantity === strip.quantity) items.push(...drawBand(input, band, layout.frequency, strip.scale));
    }
    for (const sweep of inDrawingOrder(input)) items.push(...drawSweep(input, sweep, layout, strip));
    for (const model of input.models ?? []) {
      const stroke: Stroke = { color: input.theme.ink, width: 1.25, dash: MODEL_DASH };
      const path = curvePath(columnsOf(model.points), input, layout.frequency, strip);
      if (path) items.push({ kind: 'path', points: path, stroke });
    }
    return { kind: 'clip', to: strip.rect, items };
  });
}

/** Dimmed ones below, the active one on top. */
function inDrawingOrder(input: ChartInput): ChartSweep[] {
  const active = activeSweep(input);
  const rank = (sweep: ChartSweep) => (sweep === active ? 2 : sweep.isDimmed ? 0 : 1);
  return [...input.sweeps].sort((a, b) => rank(a) - rank(b));
}

export function sweepStroke(input: ChartInput, sweep: ChartSweep): Stroke {
  const isActive = sweep === activeSweep(input);
  if (isRamp(input)) {
    const drawn = drawnSweeps(input);
    const color = rampColor(input.theme, drawn.indexOf(sweep) / Math.max(1, drawn.length - 1));
    return isActive ? { color, width: 2.25 } : { color, width: HAIRLINE, opacity: RAMP_DIMMED };
  }
  const style = lineStyle(sweep.lineNumber);
  const color = lineColor(input.theme, sweep.lineNumber);
  const stroke: Stroke = { color, width: isActive ? 2.25 : 1.6, dash: style.dash };
  return sweep.isDimmed ? { ...stroke, width: 1.25, opacity: DIMMED } : stroke;
}

function drawSweep(input: ChartInput, sweep: ChartSweep, layout: ChartLayout, strip: Strip): Primitive[] {
  const columns = columnsOf(sweep.points);
  const points = curvePath(columns, input, layout.frequency, strip, sweep.masked);
  if (!points) return [];
  const stroke = sweepStroke(input, sweep);
  const items: Primitive[] = [{ kind: 'path', points, stroke }];
  const y = yColumn(columns, input, strip);
  if (!y || sweep.isDimmed) return items;
  const at = { x: xColumn(columns, layout.frequency), y, frequency: layout.frequency, value: strip.scale };
  const { color } = stroke;
  const ground = input.theme.sheet;
  const isOnTop = sweep === activeSweep(input);
  if (isOnTop || !isRamp(input)) {
    for (const [px, py] of measuredPoints(at)) {
      items.push({ kind: 'marker', shape: 'dot', x: px, y: py, sizePx: 3, color, ground });
    }
  }
  if (!isRamp(input)) {
    const { marker } = lineStyle(sweep.lineNumber);
    for (const [px, py] of markedPoints(at, (sweep.lineNumber - 1) / 8)) {
      items.push({ kind: 'marker', shape: marker, x: px, y: py, sizePx: MARKER_PX, color, ground });
    }
  }
  for (const [px, py] of maskedPoints(at, sweep.masked)) {
    items.push({ kind: 'marker', shape: 'crossed-ring', x: px, y: py, sizePx: MARKER_PX, color, ground });
  }
  return items;
}

const xColumn = (columns: CurveColumns, frequency: AxisScale): Float64Array =>
  frequency.kind === 'log' ? columns.lnFrequency : columns.frequencyHz;

function yColumn(columns: CurveColumns, input: ChartInput, strip: Strip): Float64Array | undefined {
  if (strip.quantity === 'magnitude' && strip.scale.kind === 'log') return columns.lnMagnitude;
  return columnOf(columns, strip.quantity, input.state.isPhaseUnwrapped);
}

function curvePath(
  columns: CurveColumns,
  input: ChartInput,
  frequency: AxisScale,
  strip: Strip,
  masked?: Uint8Array,
): Float64Array | null {
  const y = yColumn(columns, input, strip);
  return y ? decimatedPath(xColumn(columns, frequency), y, frequency, strip.scale, masked) : null;
}

/** The area between low and high, closed; edges only for limits. */
function drawBand(input: ChartInput, band: ChartBand, frequency: AxisScale, value: AxisScale): PathPrimitive[] {
  const color =
    band.kind === 'limits' || band.lineNumber === undefined
      ? input.theme.within
      : lineColor(input.theme, band.lineNumber);
  const ln = (values: Float64Array, kind: AxisScale['kind']) => (kind === 'log' ? values.map(Math.log) : values);
  const x = ln(band.frequencyHz, frequency.kind);
  const low = decimatedPath(x, ln(band.low, value.kind), frequency, value);
  const high = decimatedPath(x, ln(band.high, value.kind), frequency, value);
  const area = new Float64Array(low.length + high.length);
  area.set(high);
  for (let i = 0; i < low.length; i += 2) {
    area[high.length + i] = low[low.length - 2 - i] ?? Number.NaN;
    area[high.length + i + 1] = low[low.length - 1 - i] ?? Number.NaN;
  }
  const filled: PathPrimitive = { kind: 'path', points: area, fill: { color, opacity: BAND_OPACITY[band.kind] } };
  if (band.kind === 'uncertainty') return [filled];
  const edge: Stroke = { color, width: 1 };
  return [filled, { kind: 'path', points: low, stroke: edge }, { kind: 'path', points: high, stroke: edge }];
}
