/**
 * What a chart is made of once it is worked out: a flat list that a painter of canvas, SVG or PDF walks through.
 * Lengths are CSS pixels from the top left; colours are resolved, so a painter knows nothing of themes.
 */
export interface Rect {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}
export interface Stroke {
  readonly color: string;
  readonly width: number;
  readonly dash?: readonly number[];
  readonly opacity?: number;
}
export interface Fill {
  readonly color: string;
  readonly opacity?: number;
}
export const MARKER_SHAPES = [
  'dot',
  'square',
  'triangle',
  'diamond',
  'ring',
  'hollow-square',
  'hollow-triangle',
  'hollow-diamond',
  'crossed-ring',
] as const;
export type MarkerShape = (typeof MARKER_SHAPES)[number];

export interface LinePrimitive {
  readonly kind: 'line';
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
  readonly stroke: Stroke;
}
export interface RectPrimitive extends Rect {
  readonly kind: 'rect';
  readonly fill?: Fill;
  readonly stroke?: Stroke;
  readonly radius?: number;
}
/** points: x0 y0 x1 y1 …, shape (2n); a NaN pair lifts the pen. Filled paths are closed. */
export interface PathPrimitive {
  readonly kind: 'path';
  readonly points: Float64Array;
  readonly stroke?: Stroke;
  readonly fill?: Fill;
}
export interface TextPrimitive {
  readonly kind: 'text';
  readonly x: number;
  readonly y: number; // baseline
  readonly text: string;
  readonly face: 'ui' | 'num';
  readonly sizePx: number;
  readonly weight: number;
  readonly color: string;
  readonly anchor: 'start' | 'middle' | 'end';
  readonly isUpright?: boolean; // false or absent: level; true: turned a quarter, read from below
}
export interface MarkerPrimitive {
  readonly kind: 'marker';
  readonly shape: MarkerShape;
  readonly x: number;
  readonly y: number;
  readonly sizePx: number;
  readonly color: string;
  readonly ground: string; // fills the hollow ones
  readonly opacity?: number;
}
export interface ClipPrimitive {
  readonly kind: 'clip';
  readonly to: Rect;
  readonly items: readonly Primitive[];
}
export type Primitive = LinePrimitive | RectPrimitive | PathPrimitive | TextPrimitive | MarkerPrimitive | ClipPrimitive;

const polygon = (corners: readonly (readonly [number, number])[], r: number): Float64Array =>
  Float64Array.from([...corners, corners[0] ?? [0, 0]].flatMap(([x, y]) => [x * r, y * r]));
const SQUARE = [
  [-0.8, -0.8],
  [0.8, -0.8],
  [0.8, 0.8],
  [-0.8, 0.8],
] as const;
const TRIANGLE = [
  [0, -1],
  [0.95, 0.75],
  [-0.95, 0.75],
] as const;
const DIAMOND = [
  [0, -1.1],
  [1.1, 0],
  [0, 1.1],
  [-1.1, 0],
] as const;
const CROSS = 0.62;

/** The outline of a marker around 0,0; null is a circle. `cross` lines are drawn over it. */
export function markerOutline(shape: MarkerShape, sizePx: number): { outline: Float64Array | null; isHollow: boolean } {
  const r = sizePx / 2;
  switch (shape) {
    case 'dot':
      return { outline: null, isHollow: false };
    case 'ring':
    case 'crossed-ring':
      return { outline: null, isHollow: true };
    case 'square':
    case 'hollow-square':
      return { outline: polygon(SQUARE, r), isHollow: shape === 'hollow-square' };
    case 'triangle':
    case 'hollow-triangle':
      return { outline: polygon(TRIANGLE, r), isHollow: shape === 'hollow-triangle' };
    case 'diamond':
    case 'hollow-diamond':
      return { outline: polygon(DIAMOND, r), isHollow: shape === 'hollow-diamond' };
  }
}
/** Half the arm of the cross over a crossed ring, in px. */
export const crossArmPx = (sizePx: number): number => (sizePx / 2) * CROSS;
