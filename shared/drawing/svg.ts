import type { ChartTheme } from './palette.js';
import {
  crossArmPx,
  type MarkerPrimitive,
  markerOutline,
  type Primitive,
  type Stroke,
  type TextPrimitive,
} from './primitives.js';

/** The draw list as SVG text. Presentation attributes only: no style element, so any content policy allows it. */
type Faces = Pick<ChartTheme, 'uiFont' | 'numFont'>;

export function svgOf(items: readonly Primitive[], faces: Faces, idPrefix = 'clip'): string {
  const counter = { next: 0 };
  const write = (item: Primitive): string => primitiveSvg(item, faces, idPrefix, counter, write);
  return items.map(write).join('');
}

export interface SvgDocument {
  readonly widthPx: number;
  readonly heightPx: number;
  readonly title: string;
  readonly description: string;
  readonly ground: string;
}
/** A whole file: title and description inside, so that it can be read aloud. */
export function svgDocument(items: readonly Primitive[], faces: Faces, document: SvgDocument): string {
  const { widthPx, heightPx } = document;
  return [
    `<svg xmlns="http://www.w3.org/2000/svg" width="${widthPx}" height="${heightPx}" viewBox="0 0 ${widthPx} ${heightPx}" role="img" aria-labelledby="t d">`,
    `<title id="t">${escaped(document.title)}</title><desc id="d">${escaped(document.description)}</desc>`,
    `<rect width="${widthPx}" height="${heightPx}" fill="${escaped(document.ground)}"/>`,
    svgOf(items, faces),
    '</svg>',
  ].join('\n');
}

function primitiveSvg(
  item: Primitive,
  faces: Faces,
  prefix: string,
  counter: { next: number },
  write: (item: Primitive) => string,
): string {
  switch (item.kind) {
    case 'line':
      return `<line x1="${n(item.x1)}" y1="${n(item.y1)}" x2="${n(item.x2)}" y2="${n(item.y2)}"${stroke(item.stroke)}/>`;
    case 'rect': {
      const radius = item.radius ? ` rx="${n(item.radius)}"` : '';
      return `<rect x="${n(item.x)}" y="${n(item.y)}" width="${n(item.width)}" height="${n(item.height)}"${radius}${fill(item.fill)}${stroke(item.stroke)}/>`;
    }
    case 'path':
      return `<path d="${pathData(item.points, item.fill !== undefined)}"${fill(item.fill)}${stroke(item.stroke)} stroke-linejoin="round"/>`;
    case 'text':
      return textSvg(item, faces);
    case 'marker':
      return markerSvg(item);
    case 'clip': {
      counter.next += 1;
      const id = `${prefix}-${counter.next}`;
      const { x, y, width, height } = item.to;
      const box = `<rect x="${n(x)}" y="${n(y)}" width="${n(width)}" height="${n(height)}"/>`;
      return `<clipPath id="${id}">${box}</clipPath><g clip-path="url(#${id})">${item.items.map(write).join('')}</g>`;
    }
  }
}

const n = (value: number): string => String(Math.round(value * 100) / 100);
const fill = (f: { color: string; opacity?: number } | undefined): string =>
  f ? ` fill="${escaped(f.color)}"${f.opacity === undefined ? '' : ` fill-opacity="${f.opacity}"`}` : ' fill="none"';
function stroke(s: Stroke | undefined): string {
  if (!s) return '';
  const dash = s.dash && s.dash.length > 0 ? ` stroke-dasharray="${s.dash.join(' ')}"` : '';
  const opacity = s.opacity === undefined ? '' : ` stroke-opacity="${s.opacity}"`;
  return ` stroke="${escaped(s.color)}" stroke-width="${n(s.width)}"${dash}${opacity}`;
}

/** M and L commands; a NaN pair starts a new stretch. */
export function pathData(points: Float64Array, isClosed: boolean): string {
  let data = '';
  let isDown = false;
  for (let i = 0; i < points.length; i += 2) {
    const [x, y] = [points[i] ?? Number.NaN, points[i + 1] ?? Number.NaN];
    if (Number.isNaN(x) || Number.isNaN(y)) {
      isDown = false;
      continue;
    }
    data += `${isDown ? 'L' : 'M'}${n(x)} ${n(y)}`;
    isDown = true;
  }
  return isClosed && data !== '' ? `${data}Z` : data;
}

function textSvg(item: TextPrimitive, faces: Faces): string {
  const turn = item.isUpright ? ` transform="rotate(-90 ${n(item.x)} ${n(item.y)})"` : '';
  const family = item.face === 'ui' ? faces.uiFont : faces.numFont;
  const font = `font-family="${escaped(family)}" font-size="${n(item.sizePx)}" font-weight="${item.weight}"`;
  return `<text x="${n(item.x)}" y="${n(item.y)}" text-anchor="${item.anchor}" ${font} fill="${escaped(item.color)}"${turn}>${escaped(item.text)}</text>`;
}

function markerSvg(item: MarkerPrimitive): string {
  const { outline, isHollow } = markerOutline(item.shape, item.sizePx);
  const opacity = item.opacity === undefined ? '' : ` opacity="${item.opacity}"`;
  const paint = `fill="${escaped(isHollow ? item.ground : item.color)}" stroke="${escaped(item.color)}" stroke-width="1.5"${opacity}`;
  const shape = outline
    ? `<path d="${pathData(
        outline.map((v, i) => v + (i % 2 === 0 ? item.x : item.y)),
        true,
      )}" ${paint}/>`
    : `<circle cx="${n(item.x)}" cy="${n(item.y)}" r="${n(item.sizePx / 2)}" ${paint}/>`;
  if (item.shape !== 'crossed-ring') return shape;
  const a = crossArmPx(item.sizePx);
  const cross = `M${n(item.x - a)} ${n(item.y - a)}L${n(item.x + a)} ${n(item.y + a)}M${n(item.x + a)} ${n(item.y - a)}L${n(item.x - a)} ${n(item.y + a)}`;
  return `${shape}<path d="${cross}" ${paint}/>`;
}

const ESCAPES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};
function escaped(text: string): string {
  return text.replace(/[&<>"']/g, (character) => ESCAPES[character] ?? character);
}
