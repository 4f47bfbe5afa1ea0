import type { ChartTheme } from '../../../shared/drawing/palette.js';
import {
  crossArmPx,
  type Fill,
  type MarkerPrimitive,
  markerOutline,
  type Primitive,
  type Stroke,
  type TextPrimitive,
} from '../../../shared/drawing/primitives.js';

/** The draw list on a canvas whose transform already maps CSS pixels to its own. */
export function paintOnCanvas(context: CanvasRenderingContext2D, items: readonly Primitive[], theme: ChartTheme): void {
  context.lineJoin = 'bevel'; // round joins cost twice as much and do not show on lines of two pixels
  for (const item of items) paint(context, item, theme);
}

function paint(context: CanvasRenderingContext2D, item: Primitive, theme: ChartTheme): void {
  switch (item.kind) {
    case 'line':
      context.beginPath();
      context.moveTo(item.x1, item.y1);
      context.lineTo(item.x2, item.y2);
      strokePath(context, item.stroke);
      break;
    case 'rect':
      context.beginPath();
      if (item.radius) context.roundRect(item.x, item.y, item.width, item.height, item.radius);
      else context.rect(item.x, item.y, item.width, item.height);
      fillPath(context, item.fill);
      strokePath(context, item.stroke);
      break;
    case 'path':
      tracePath(context, item.points, 0, 0, item.fill !== undefined);
      fillPath(context, item.fill);
      strokePath(context, item.stroke);
      break;
    case 'text':
      paintText(context, item, theme);
      break;
    case 'marker':
      paintMarker(context, item);
      break;
    case 'clip':
      context.save();
      context.beginPath();
      context.rect(item.to.x, item.to.y, item.to.width, item.to.height);
      context.clip();
      for (const inner of item.items) paint(context, inner, theme);
      context.restore();
      break;
  }
}

function tracePath(
  context: CanvasRenderingContext2D,
  points: Float64Array,
  dx: number,
  dy: number,
  isClosed: boolean,
): void {
  context.beginPath();
  let isDown = false;
  for (let i = 0; i < points.length; i += 2) {
    const x = points[i]!;
    const y = points[i + 1]!;
    if (Number.isNaN(y)) isDown = false;
    else if (isDown) context.lineTo(x + dx, y + dy);
    else {
      context.moveTo(x + dx, y + dy);
      isDown = true;
    }
  }
  if (isClosed) context.closePath();
}

function strokePath(context: CanvasRenderingContext2D, stroke: Stroke | undefined): void {
  if (!stroke) return;
  context.strokeStyle = stroke.color;
  context.lineWidth = stroke.width;
  context.setLineDash(stroke.dash ? [...stroke.dash] : []);
  context.globalAlpha = stroke.opacity ?? 1;
  context.stroke();
  context.globalAlpha = 1;
}
function fillPath(context: CanvasRenderingContext2D, fill: Fill | undefined): void {
  if (!fill) return;
  context.fillStyle = fill.color;
  context.globalAlpha = fill.opacity ?? 1;
  context.fill();
  context.globalAlpha = 1;
}

function paintText(context: CanvasRenderingContext2D, item: TextPrimitive, theme: ChartTheme): void {
  context.save();
  context.font = `${item.weight} ${item.sizePx}px ${item.face === 'ui' ? theme.uiFont : theme.numFont}`;
  context.fillStyle = item.color;
  context.textAlign = item.anchor === 'middle' ? 'center' : item.anchor;
  context.textBaseline = 'alphabetic';
  context.translate(item.x, item.y);
  if (item.isUpright) context.rotate(-Math.PI / 2);
  context.fillText(item.text, 0, 0);
  context.restore();
}

const CIRCLE = 2 * Math.PI;
function paintMarker(context: CanvasRenderingContext2D, item: MarkerPrimitive): void {
  const { outline, isHollow } = markerOutline(item.shape, item.sizePx);
  if (outline) tracePath(context, outline, item.x, item.y, true);
  else {
    context.beginPath();
    context.arc(item.x, item.y, item.sizePx / 2, 0, CIRCLE);
  }
  const opacity = item.opacity ?? 1;
  fillPath(context, { color: isHollow ? item.ground : item.color, opacity });
  const stroke: Stroke = { color: item.color, width: 1.5, opacity };
  strokePath(context, stroke);
  if (item.shape !== 'crossed-ring') return;
  const a = crossArmPx(item.sizePx);
  context.beginPath();
  context.moveTo(item.x - a, item.y - a);
  context.lineTo(item.x + a, item.y + a);
  context.moveTo(item.x + a, item.y - a);
  context.lineTo(item.x - a, item.y + a);
  strokePath(context, stroke);
}
