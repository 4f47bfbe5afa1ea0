/** One axis: px = slope · u + offset, where u = ln(value) on a logarithmic axis and the value on a linear one. */
export type ScaleKind = 'log' | 'linear';
export type Range = readonly [number, number];

export interface AxisScale {
  readonly kind: ScaleKind;
  readonly min: number;
  readonly max: number;
  readonly startPx: number; // where min lies
  readonly endPx: number; // where max lies
  readonly slope: number;
  readonly offset: number;
}

/** A logarithmic axis takes only positive limits: the caller has seen to that (`usableRange`). */
export function axisScale(kind: ScaleKind, [min, max]: Range, startPx: number, endPx: number): AxisScale {
  const low = kind === 'log' ? Math.log(min) : min;
  const high = kind === 'log' ? Math.log(max) : max;
  const slope = (endPx - startPx) / (high - low);
  return { kind, min, max, startPx, endPx, slope, offset: startPx - slope * low };
}
export function pixelOf(scale: AxisScale, value: number): number {
  return scale.slope * (scale.kind === 'log' ? Math.log(value) : value) + scale.offset;
}
export function valueAt(scale: AxisScale, px: number): number {
  const u = (px - scale.offset) / scale.slope;
  return scale.kind === 'log' ? Math.exp(u) : u;
}
