import type { ReadingOverrides } from '../../../../shared/contracts/reading.js';
import type { Dialect } from '../dialect.js';
import type { Characters } from '../encoding.js';
import { type Field, splitRow } from '../row.js';
import type { Line } from './sample.js';

/** What most lines look like in a dialect: how many fields, and which of them are numbers. */
export interface Shape {
  readonly fields: number;
  readonly isNumber: readonly boolean[];
}
export interface DialectGuess {
  readonly dialect: Dialect;
  readonly shape: Shape;
  readonly rows: readonly (readonly Field[])[]; // the sampled lines that agree with the shape
  readonly agreeing: number;
  readonly lines: number;
  readonly rival?: Dialect | undefined; // fits as many lines and gives other numbers
}

const SEPARATORS = ['tab', 'semicolon', 'comma', 'space'] as const;
const THOUSANDS = ['none', 'comma', 'point', 'space', 'apostrophe'] as const;

/** Tries every dialect that the characters of the sample allow and keeps the one in which most lines agree. */
export function guessDialect(
  text: Characters,
  lines: readonly Line[],
  told: ReadingOverrides,
): DialectGuess | undefined {
  const fitting = tryAll(text, lines, told)
    .filter((guess) => guess.agreeing > 0)
    .sort(better);
  const best = fitting[0];
  if (!best) return undefined;
  const rival = fitting.find(
    (other) =>
      other !== best &&
      other.agreeing >= 0.98 * best.agreeing &&
      columnsOf(other) >= 2 &&
      wordsOf(other) <= wordsOf(best) &&
      !sameNumbers(best, other),
  );
  return { ...best, rival: rival?.dialect };
}

/** A separator that makes numbers of all of nearly every line leaves nothing for the later ones to explain. */
function tryAll(text: Characters, lines: readonly Line[], told: ReadingOverrides): DialectGuess[] {
  const tried: DialectGuess[] = [];
  const explainsAll = (guess: DialectGuess) =>
    columnsOf(guess) >= 2 && wordsOf(guess) === 0 && guess.agreeing >= 0.95 * guess.lines;
  for (const dialect of candidates(text, lines, told)) {
    if (tried.some((guess) => guess.dialect.separator !== dialect.separator && explainsAll(guess))) break;
    tried.push(tally(text, lines, dialect));
  }
  return tried;
}

function candidates(text: Characters, lines: readonly Line[], told: ReadingOverrides): Dialect[] {
  const seen = seenMarks(text.codes, lines);
  const all: Dialect[] = [];
  for (const separator of told.separator ? [told.separator] : SEPARATORS.filter((name) => seen.has(name))) {
    for (const decimalMark of told.decimalMark ? [told.decimalMark] : (['point', 'comma'] as const)) {
      for (const thousandsMark of told.thousandsMark ? [told.thousandsMark] : THOUSANDS) {
        const isPointless = decimalMark === 'comma' && !told.decimalMark && !seen.has('comma');
        const isUnseen = !told.thousandsMark && thousandsMark !== 'none' && !seen.has(`group-${thousandsMark}`);
        const clashes = thousandsMark === decimalMark || (thousandsMark === separator && !seen.has('quote'));
        if (!isPointless && !isUnseen && !clashes) all.push({ separator, decimalMark, thousandsMark });
      }
    }
  }
  return all;
}

/** Which separators stand in the sample, and which marks stand between a digit and a group of three. */
function seenMarks(codes: Uint8Array, lines: readonly Line[]): Set<string> {
  const names: Readonly<Record<number, string>> = {
    9: 'tab',
    32: 'space',
    34: 'quote',
    39: 'apostrophe',
    44: 'comma',
    46: 'point',
    59: 'semicolon',
  };
  const seen = new Set(['space']);
  const isDigit = (p: number, end: number) => p < end && codes[p]! >= 48 && codes[p]! <= 57;
  for (const { start, end } of lines) {
    for (let p = start; p < end; p += 1) {
      const name = names[codes[p]!];
      if (!name) continue;
      seen.add(name);
      let next = p + 1;
      while (name === 'space' && codes[next] === 32 && next < end) next += 1;
      const isGroup = isDigit(next, end) && isDigit(next + 1, end) && isDigit(next + 2, end) && !isDigit(next + 3, end);
      if (isGroup && p > start && isDigit(p - 1, end)) seen.add(`group-${name}`);
    }
  }
  return seen;
}

function tally(text: Characters, lines: readonly Line[], dialect: Dialect): DialectGuess {
  const groups = new Map<string, Field[][]>();
  for (const { start, end } of lines) {
    const fields = splitRow(text, start, end, dialect);
    const mask = fields.map((field) => (field.kind === 'number' ? 'n' : field.kind === 'gap' ? 'g' : 't')).join('');
    if (!mask.includes('n')) continue;
    const key = mask.replaceAll('g', 'n');
    const group = groups.get(key);
    if (group) group.push(fields);
    else groups.set(key, [fields]);
  }
  let best: [string, Field[][]] = ['', []];
  const weight = ([key, rows]: [string, Field[][]]) => rows.length * (numbersIn(key) >= 2 ? 1 : 0.25);
  for (const group of groups) if (weight(group) > weight(best)) best = group;
  const isNumber = [...best[0]].map((kind) => kind === 'n');
  return {
    dialect,
    shape: { fields: isNumber.length, isNumber },
    rows: best[1],
    agreeing: best[1].length,
    lines: lines.length,
  };
}

const numbersIn = (key: string) => key.split('n').length - 1;
const columnsOf = (guess: DialectGuess) => guess.shape.isNumber.filter(Boolean).length;
const wordsOf = (guess: DialectGuess) => guess.shape.fields - columnsOf(guess); // empty fields too

/** Two or more columns first; then more agreeing lines, fewer columns of words or nothing, a steadier column; a decimal mark before one of thousands; then the order tried. */
function better(a: DialectGuess, b: DialectGuess): number {
  return (
    Number(columnsOf(b) >= 2) - Number(columnsOf(a) >= 2) ||
    b.agreeing - a.agreeing ||
    wordsOf(a) - wordsOf(b) ||
    reversals(a) - reversals(b) ||
    Number(a.dialect.thousandsMark !== 'none') - Number(b.dialect.thousandsMark !== 'none')
  );
}

/** How often the steadiest column turns round: a wrong decimal or thousands mark breaks its order. */
function reversals(guess: DialectGuess): number {
  let least = Number.POSITIVE_INFINITY;
  guess.shape.isNumber.forEach((isNumber, column) => {
    if (!isNumber) return;
    let falls = 0;
    let rises = 0;
    for (let i = 1; i < guess.rows.length; i += 1) {
      const step = guess.rows[i]![column]!.value - guess.rows[i - 1]![column]!.value;
      if (step < 0) falls += 1;
      if (step > 0) rises += 1;
    }
    if (rises + falls > 0) least = Math.min(least, rises, falls);
  });
  return least;
}

function sameNumbers(a: DialectGuess, b: DialectGuess): boolean {
  const numbers = (guess: DialectGuess) =>
    guess.rows
      .slice(0, 50)
      .map((row) => row.filter((field) => field.kind === 'number').map((field) => field.value))
      .join(';');
  return numbers(a) === numbers(b);
}
