import { lineEnd, nextLine } from '../characters.js';
import { commentAt, withoutMark } from '../comments.js';
import type { Characters } from '../encoding.js';
import { type Field, splitRow } from '../row.js';
import { type ColumnMeaning, headingsIn, knownMeanings, meaningOf } from './column-names.js';
import type { DialectGuess, Shape } from './guess-dialect.js';
import { hasInk } from './sample.js';

/** Where the data starts and what the lines above say. */
export interface Layout {
  readonly headerLines: number;
  readonly dataStart: number; // position of the first row of data
  readonly columnNames: readonly string[];
  readonly meanings: readonly ColumnMeaning[]; // empty where nothing names the columns
  readonly comments: readonly string[];
}

const COMMENTS_MOST = 200;
const HEADER_LINES_MOST = 100_000;

/** Whether a line's fields are those of the shape: as many, and numbers (or NaN) where the others have numbers. */
export function fitsShape(fields: readonly Field[], shape: Shape): boolean {
  if (fields.length !== shape.fields) return false;
  return shape.isNumber.every((isNumber, i) => !isNumber || fields[i]!.kind === 'number' || fields[i]!.kind === 'gap');
}

/**
 * Walks from the top to the first row of data: the first line with the shape of most rows that is followed by another one.
 * `toldLines`: how many lines the person says to pass over.
 */
export function findLayout(text: Characters, guess: DialectGuess, toldLines?: number): Layout | undefined {
  const { codes } = text;
  const passed: string[] = [];
  let start = 0;
  let count = 0;
  while (start < codes.length && count <= HEADER_LINES_MOST) {
    const end = lineEnd(codes, start, codes.length);
    const isData = toldLines === undefined ? startsData(text, start, end, guess) : count >= toldLines;
    if (isData) return { ...headings(passed, guess), headerLines: count, dataStart: start };
    if (hasInk(codes, start, end)) passed.push(text.decode(start, Math.min(end, start + 2000)));
    if (passed.length > 2 * COMMENTS_MOST) passed.splice(COMMENTS_MOST, 1); // the first 200 and the last 200
    count += 1;
    start = nextLine(codes, end, codes.length);
  }
  return undefined;
}

function startsData(text: Characters, start: number, end: number, guess: DialectGuess): boolean {
  if (!isRow(text, start, end, guess)) return false;
  const { codes } = text;
  let next = nextLine(codes, end, codes.length);
  for (let looked = 0; looked < 3 && next < codes.length; ) {
    const nextEnd = lineEnd(codes, next, codes.length);
    if (hasInk(codes, next, nextEnd) && commentAt(codes, next, nextEnd) !== 'yes') {
      if (isRow(text, next, nextEnd, guess)) return true;
      looked += 1;
    }
    next = nextLine(codes, nextEnd, codes.length);
  }
  return guess.agreeing === 1;
}

function isRow(text: Characters, start: number, end: number, guess: DialectGuess): boolean {
  if (end - start > 100_000 || commentAt(text.codes, start, end) === 'yes') return false;
  return fitsShape(splitRow(text, start, end, guess.dialect), guess.shape);
}

/** Looks for the names of the columns in the lines above the data, the nearest line first; a line of units may follow it. */
function headings(passed: readonly string[], guess: DialectGuess) {
  const comments = passed.map(withoutMark).filter((line) => line !== '');
  const nearest = passed.slice(-12).reverse();
  const count = guess.shape.fields;
  for (const [i, line] of nearest.entries()) {
    const names = headingsIn(line, count, guess.dialect);
    if (!names) continue;
    const meanings = names.map(meaningOf);
    const isParted = i === 0 && guess.dialect.separator !== 'space' && names.every((name) => name !== ''); // one known word will do
    const needed = isParted ? 1 : Math.min(2, count);
    const isUnitsOnly = names.every((name) => /^\W*[a-zA-ZΩ°µ/]{1,6}\W*$/.test(name));
    const above =
      isUnitsOnly && nearest[i + 1] ? headingsIn(nearest[i + 1] as string, count, guess.dialect) : undefined;
    const upper = above?.map(meaningOf);
    if (upper && knownMeanings(upper) >= Math.min(2, count) && above) {
      const joined = upper.map((meaning, k) => ({
        kind: meaning.kind ?? meanings[k]?.kind,
        unit: meaning.unit ?? meanings[k]?.unit,
      }));
      return {
        columnNames: above.map((name, k) => `${name} ${names[k]}`),
        meanings: joined,
        comments: comments.slice(0, COMMENTS_MOST),
      };
    }
    if (knownMeanings(meanings) >= needed)
      return { columnNames: names, meanings, comments: comments.slice(0, COMMENTS_MOST) };
  }
  return {
    columnNames: Array.from({ length: count }, () => ''),
    meanings: [],
    comments: comments.slice(0, COMMENTS_MOST),
  };
}
