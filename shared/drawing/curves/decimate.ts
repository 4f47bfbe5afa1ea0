import type { AxisScale } from '../scales/axis-scale.js';
import { firstAtLeast } from './columns.js';

/**
 * A polyline in pixels with at most two points per pixel column: the least and the most of that column, in the order
 * in which they come, so that no peak and no dip is lost however many points fall on it.
 * x and y are in the units of the scales (ln f on a logarithmic axis, f on a linear one), shapes (n), x ascending.
 * Points with `leaveOut` are passed over; a value that is not a number lifts the pen (a NaN pair).
 */
export function decimatedPath(
  x: Float64Array,
  y: Float64Array,
  xScale: AxisScale,
  yScale: AxisScale,
  leaveOut?: Uint8Array,
): Float64Array {
  const [from, to] = visiblePoints(x, xScale);
  const writer = new ColumnWriter((to - from) * 2);
  const { slope: sx, offset: ox } = xScale;
  const { slope: sy, offset: oy } = yScale;
  const top = Math.min(yScale.startPx, yScale.endPx) - FAR_PX;
  const bottom = Math.max(yScale.startPx, yScale.endPx) + FAR_PX;
  for (let i = from; i < to; i += 1) {
    if (leaveOut?.[i]) continue;
    const yPx = sy * y[i]! + oy;
    if (Number.isNaN(yPx)) {
      writer.lift();
      continue;
    }
    writer.add(sx * x[i]! + ox, Math.max(top, Math.min(bottom, yPx)));
  }
  return straightened(writer.done());
}

/**
 * Leaves out points that a straight line passes within TOLERANCE_PX of: a smooth curve then takes a tenth of the
 * strokes. One pass: from the last kept point on, the slopes that pass near every point so far form a sleeve; a point
 * outside it ends the line. x ascends between two NaN pairs.
 */
function straightened(points: Float64Array): Float64Array {
  const out = scratch('straight', points.length);
  let size = 0;
  const keep = (i: number) => {
    out[size] = points[i]!;
    out[size + 1] = points[i + 1]!;
    size += 2;
  };
  let [fromX, fromY] = [Number.NaN, Number.NaN];
  let [least, most] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
  const startAt = (i: number) => {
    keep(i);
    fromX = points[i]!;
    fromY = points[i + 1]!;
    least = Number.NEGATIVE_INFINITY;
    most = Number.POSITIVE_INFINITY;
  };
  let pending = -1;
  for (let i = 0; i < points.length; i += 2) {
    const y = points[i + 1]!;
    if (Number.isNaN(y) || Number.isNaN(fromY)) {
      if (pending >= 0) keep(pending);
      pending = -1;
      startAt(i);
      continue;
    }
    let slope = (y - fromY) / (points[i]! - fromX);
    if (pending >= 0 && !(slope >= least && slope <= most)) {
      startAt(pending);
      slope = (y - fromY) / (points[i]! - fromX);
    }
    const reach = TOLERANCE_PX / (points[i]! - fromX);
    least = Math.max(least, slope - reach);
    most = Math.min(most, slope + reach);
    pending = i;
  }
  if (pending >= 0) keep(pending);
  return out.slice(0, size);
}

const FAR_PX = 4000; // far outside is as good as at infinity, and painters stay exact
const TOLERANCE_PX = 0.1;
const FLAT_PX = 0.25; // a column lower than this is one point

/** Indices [from, to) of the points in view and one more on each side, so that lines run to the edge. */
export function visiblePoints(x: Float64Array, scale: AxisScale): [number, number] {
  const u = (value: number) => (scale.kind === 'log' ? Math.log(value) : value);
  const from = Math.max(0, firstAtLeast(x, u(scale.min)) - 1);
  const to = Math.min(x.length, firstAtLeast(x, u(scale.max)) + 1);
  return [from, to];
}

const scratches = { columns: new Float64Array(0), straight: new Float64Array(0) };
/** Room to work in, kept from call to call: making and freeing it for every line of every frame costs more than the work. */
function scratch(name: keyof typeof scratches, length: number): Float64Array {
  if (scratches[name].length < length) scratches[name] = new Float64Array(length * 2);
  return scratches[name];
}

class ColumnWriter {
  private readonly out: Float64Array;
  private size = 0;
  private column = Number.NaN;
  private lowX = 0;
  private lowY = 0;
  private highX = 0;
  private highY = 0;

  constructor(most: number) {
    this.out = scratch('columns', most * 2 + 4);
  }
  add(xPx: number, yPx: number): void {
    const column = Math.floor(xPx);
    if (column !== this.column) {
      this.flush();
      this.column = column;
      this.lowX = this.highX = xPx;
      this.lowY = this.highY = yPx;
      return;
    }
    if (yPx < this.lowY) {
      this.lowX = xPx;
      this.lowY = yPx;
    } else if (yPx > this.highY) {
      this.highX = xPx;
      this.highY = yPx;
    }
  }
  lift(): void {
    this.flush();
    this.column = Number.NaN;
    this.put(Number.NaN, Number.NaN);
  }
  done(): Float64Array {
    this.flush();
    return this.out.subarray(0, this.size);
  }
  private flush(): void {
    if (Number.isNaN(this.column)) return;
    if (this.highY - this.lowY < FLAT_PX) {
      this.put((this.lowX + this.highX) / 2, (this.lowY + this.highY) / 2);
    } else if (this.lowX <= this.highX) {
      this.put(this.lowX, this.lowY);
      this.put(this.highX, this.highY);
    } else {
      this.put(this.highX, this.highY);
      this.put(this.lowX, this.lowY);
    }
  }
  private put(x: number, y: number): void {
    this.out[this.size] = x;
    this.out[this.size + 1] = y;
    this.size += 2;
  }
}
