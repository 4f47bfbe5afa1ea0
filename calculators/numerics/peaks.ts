/** A local maximum. `prominence`: how far one must come down from it before climbing higher, in the unit of the curve. */
export interface Peak {
  readonly index: number;
  readonly value: number;
  readonly prominence: number;
}

/**
 * All interior local maxima of a curve (n), most prominent first; a flat top counts once, at its middle. The ends are
 * never peaks, but they count as ground.
 */
export function peaksOf(curve: ArrayLike<number>): Peak[] {
  const n = curve.length;
  const peaks: Peak[] = [];
  for (let i = 1; i < n - 1; i++) {
    if (!(curve[i]! > curve[i - 1]!)) continue;
    let end = i;
    while (end < n - 1 && curve[end + 1]! === curve[i]!) end++;
    if (end < n - 1 && curve[end + 1]! < curve[i]!)
      peaks.push({ index: (i + end) >> 1, value: curve[i]!, prominence: prominenceOf(curve, i, end) });
    i = end;
  }
  return peaks.sort((a, b) => b.prominence - a.prominence || a.index - b.index);
}

function prominenceOf(curve: ArrayLike<number>, start: number, end: number): number {
  const top = curve[start]!;
  let left = top;
  for (let i = start - 1; i >= 0 && curve[i]! <= top; i--) left = Math.min(left, curve[i]!);
  let right = top;
  for (let i = end + 1; i < curve.length && curve[i]! <= top; i++) right = Math.min(right, curve[i]!);
  return top - Math.max(left, right);
}

/** Vertex of the parabola through three points: [x, y]; the middle point itself where they lie on a line. */
export function parabolaVertex(x: readonly [number, number, number], y: readonly [number, number, number]) {
  const [d1, d2] = [x[0] - x[1], x[2] - x[1]];
  const [e1, e2] = [y[0] - y[1], y[2] - y[1]];
  const curvature = (e1 / d1 - e2 / d2) / (d1 - d2);
  const slope = e1 / d1 - curvature * d1;
  if (!(curvature < 0)) return { x: x[1], y: y[1] };
  const at = Math.min(Math.max(-slope / (2 * curvature), Math.min(d1, d2)), Math.max(d1, d2));
  return { x: x[1] + at, y: y[1] + slope * at + curvature * at * at };
}
