import type { PathPrimitive } from '../primitives.js';

/** Many straight lines of one colour as one path: a painter then works once, and an SVG holds one element. */
export class JoinedLines {
  private readonly byColor = new Map<string, number[]>();

  add(x1: number, y1: number, x2: number, y2: number, color: string): void {
    const points = this.byColor.get(color) ?? [];
    if (points.length > 0) points.push(Number.NaN, Number.NaN);
    points.push(x1, y1, x2, y2);
    this.byColor.set(color, points);
  }
  paths(width = 1): PathPrimitive[] {
    return [...this.byColor].map(([color, points]) => ({
      kind: 'path',
      points: Float64Array.from(points),
      stroke: { color, width },
    }));
  }
}
/** Lines one pixel wide stay sharp when they run through the middle of a pixel. */
export const crisp = (px: number): number => Math.round(px) + 0.5;
