import type { AxisScale } from '../scales/axis-scale.js';
import { firstAtLeast } from './columns.js';
import { visiblePoints } from './decimate.js';

/** Which points of a curve carry a mark. x and y are in the units of the scales, shapes (n). */
export interface PlacedCurve {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly frequency: AxisScale;
  readonly value: AxisScale;
}
type Pixel = readonly [number, number];
const MARK_GAP_PX = 110;
const POINTS_SHOWN_FROM_PX = 9; // apart: then every measured point is a dot
const MASKED_GAP_PX = 4;

const pixel = ({ x, y, frequency, value }: PlacedCurve, i: number): Pixel => [
  frequency.slope * (x[i] ?? Number.NaN) + frequency.offset,
  value.slope * (y[i] ?? Number.NaN) + value.offset,
];

/**
 * The points nearest to evenly spread places that are fixed to the frequency axis, so that marks stay on their points
 * while the chart pans; `shift` (0 to 1) keeps the marks of several lines apart.
 */
export function markedPoints(curve: PlacedCurve, shift: number): Pixel[] {
  const { x, frequency } = curve;
  if (x.length === 0) return [];
  const step = 2 ** Math.round(Math.log2(MARK_GAP_PX / Math.abs(frequency.slope)));
  const [from, to] = visiblePoints(x, frequency);
  const found: Pixel[] = [];
  let last = -1;
  const start = Math.floor((x[from] ?? 0) / step - shift);
  for (let k = start; found.length < 200; k += 1) {
    const place = (k + shift + 0.25) * step;
    if (place > (x[to - 1] ?? 0)) break;
    const i = firstAtLeast(x, place);
    if (i >= from && i < to && i !== last && Number.isFinite(curve.y[i])) found.push(pixel(curve, i));
    last = i;
  }
  return found;
}

/** Every point in view, once they lie far enough apart to be told from the line. */
export function measuredPoints(curve: PlacedCurve): Pixel[] {
  const [from, to] = visiblePoints(curve.x, curve.frequency);
  const left = pixel(curve, from)[0];
  const right = pixel(curve, to - 1)[0];
  if (to - from < 2 || Math.abs(right - left) / (to - from - 1) < POINTS_SHOWN_FROM_PX) return [];
  const found: Pixel[] = [];
  for (let i = from; i < to; i += 1) if (Number.isFinite(curve.y[i])) found.push(pixel(curve, i));
  return found;
}

export function maskedPoints(curve: PlacedCurve, masked: Uint8Array | undefined): Pixel[] {
  if (!masked) return [];
  const [from, to] = visiblePoints(curve.x, curve.frequency);
  const found: Pixel[] = [];
  let lastPx = Number.NEGATIVE_INFINITY;
  for (let i = from; i < to; i += 1) {
    if (!masked[i]) continue;
    const place = pixel(curve, i);
    if (Number.isNaN(place[1]) || place[0] - lastPx < MASKED_GAP_PX) continue;
    found.push(place);
    lastPx = place[0];
  }
  return found;
}
