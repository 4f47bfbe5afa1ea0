import { lineEnd, nextLine } from '../characters.js';
import { commentAt } from '../comments.js';

export interface Line {
  readonly start: number;
  readonly end: number;
}

const LINES_MOST = 600;
const FROM_THE_TOP = 300;
const LINE_LENGTH_MOST = 4096; // longer lines are looked at this far
const PLACE_LENGTH_MOST = 16_384; // how far a place is searched for a line that is no comment

/**
 * The lines on which the dialect is decided, without blank lines and sure comments: all of a short text; of a long one the
 * first 300 and 300 more at places that are part evenly, part geometrically spread, so that a sweep with evenly
 * spaced frequencies shows its low end too. In the order of the file.
 */
export function sampleLines(codes: Uint8Array): Line[] {
  const top = collect(codes, 0, codes.length, LINES_MOST + 1);
  if (top.length <= LINES_MOST) return top;
  const sample = top.slice(0, FROM_THE_TOP);
  const from = sample[FROM_THE_TOP - 1]!.end;
  const places: number[] = [];
  const half = (LINES_MOST - FROM_THE_TOP) / 2;
  for (let k = 0; k < half; k += 1) {
    places.push(from + ((codes.length - from) * k) / half, from * (codes.length / from) ** (k / half));
  }
  for (const place of places.sort((a, b) => a - b)) {
    const inLine = Math.max(Math.floor(place), sample.at(-1)!.end);
    const start = nextLine(codes, lineEnd(codes, inLine, codes.length), codes.length);
    sample.push(...collect(codes, start, Math.min(codes.length, start + PLACE_LENGTH_MOST), 1));
  }
  return sample;
}

function collect(codes: Uint8Array, from: number, to: number, most: number): Line[] {
  const lines: Line[] = [];
  let start = from;
  while (start < to && lines.length < most) {
    const end = lineEnd(codes, start, codes.length);
    const seen = Math.min(end, start + LINE_LENGTH_MOST);
    if (hasInk(codes, start, seen) && commentAt(codes, start, seen) !== 'yes') lines.push({ start, end: seen });
    start = nextLine(codes, end, codes.length);
  }
  return lines;
}

export function hasInk(codes: Uint8Array, start: number, end: number): boolean {
  for (let p = start; p < end; p += 1) if (codes[p]! > 32) return true;
  return false;
}
