import type { Reading } from '../../shared/contracts/reading.js';
import { isBinary } from './sniff.js';
import { lineEnd, nextLine } from './text/characters.js';
import { commentAt } from './text/comments.js';
import { charactersOf, type Encoding, readCharacters } from './text/encoding.js';
import type { ColumnKind } from './text/recognise/guess-columns.js';
import { hasInk } from './text/recognise/sample.js';
import { splitRow } from './text/row.js';

const LINES_MOST = 60;
const LINE_LENGTH_MOST = 400;
const BYTES_MOST = 65_536;

/** The first lines of a text file as they stand in it, long ones cut; none of a file that is no text. */
export function previewLines(bytes: Uint8Array, encoding?: Encoding, most = LINES_MOST): string[] {
  const head = bytes.subarray(0, BYTES_MOST);
  if (isBinary(head)) return [];
  const isWide = encoding === 'utf-16le' || encoding === 'utf-16be';
  const text = readCharacters(isWide ? head.subarray(0, head.length & ~1) : head, encoding, () => {});
  const lines: string[] = [];
  for (let start = 0; start < text.codes.length && lines.length < most; ) {
    const end = lineEnd(text.codes, start, text.codes.length);
    const isCut = end === text.codes.length && bytes.length > BYTES_MOST;
    if (!isCut || lines.length === 0) lines.push(text.decode(start, Math.min(end, start + LINE_LENGTH_MOST)));
    start = nextLine(text.codes, end, text.codes.length);
  }
  return lines;
}

/** Where a column stands in a line: characters [start, end) of its text. */
export interface ColumnSpan {
  readonly start: number;
  readonly end: number;
  readonly column: number; // from 0
  readonly kind: ColumnKind;
}
export interface PreviewLine {
  readonly number: number; // from 1
  readonly text: string;
  readonly kind: 'blank' | 'comment' | 'header' | 'data' | 'skipped';
  readonly spans: readonly ColumnSpan[]; // of data, and of headings that part like the data
}

/** The first lines of a file parted into columns as a reading says; cheap enough to redo on every change of the reading. */
export function markLines(lines: readonly string[], reading: Reading): PreviewLine[] {
  return lines.map((text, i) => markLine(text, i + 1, reading));
}

function markLine(line: string, number: number, reading: Reading): PreviewLine {
  const text = charactersOf(line);
  const { codes } = text;
  if (!hasInk(codes, 0, codes.length)) return { number, text: line, kind: 'blank', spans: [] };
  const fields = splitRow(text, 0, codes.length, reading);
  const spans = fields.map(({ start, end }, column) => ({
    start,
    end,
    column,
    kind: reading.columns[column] ?? ('ignore' as const),
  }));
  const comment = commentAt(codes, 0, codes.length);
  if (number <= reading.headerLines) {
    const kind = comment === 'yes' ? 'comment' : 'header';
    return { number, text: line, kind, spans: fields.length === reading.columns.length ? spans : [] };
  }
  const isRow = reading.columns.every((kind, column) => kind === 'ignore' || fields[column]?.kind === 'number');
  if (comment !== 'yes' && isRow) return { number, text: line, kind: 'data', spans };
  return { number, text: line, kind: comment === 'no' ? 'skipped' : 'comment', spans: [] };
}
