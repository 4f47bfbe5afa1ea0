import { BLANK, COMMA, isBlank, isDigit, MINUS, PLUS, QUOTE } from './characters.js';
import { decimalEnd, scanDecimal } from './decimal.js';
import { DECIMAL_CODE, type Dialect, SEPARATOR_CODE, THOUSANDS_CODE } from './dialect.js';
import type { Characters } from './encoding.js';
import { type UnitWord, unitWord } from './units.js';

/**
 * One field of a line: `number` with its value as written (a multiplier such as k not applied), `gap` for NaN and its like,
 * `empty`, or `text`. [start, end) are positions in the characters.
 */
export interface Field {
  readonly start: number;
  readonly end: number;
  readonly kind: 'number' | 'gap' | 'empty' | 'text';
  readonly value: number;
  readonly unit: UnitWord | undefined;
  readonly decimals: number; // digits after the mark, for telling a row that was cut off
}

const GAP = /^[+-]?(nan|inf|infinity|1\.#(ind|qnan|inf)\w*|n\/a|na|null|none|#n\/a|#num!|-{1,3})$/i;
const FIELDS_MOST = 256;

/** Splits the line [start, end) by the dialect. Quoted fields may hold the separator (RFC 4180). */
export function splitRow(text: Characters, start: number, end: number, dialect: Dialect): Field[] {
  const separator = SEPARATOR_CODE[dialect.separator];
  const fields: Field[] = [];
  let p = start;
  while (fields.length < FIELDS_MOST) {
    while (p < end && isBlank(text.codes[p]!) && text.codes[p] !== separator) p += 1;
    if (separator === 0 && p >= end) break;
    const fieldEnd = endOfField(text.codes, p, end, separator);
    fields.push(parseField(text, p, fieldEnd, dialect));
    if (fieldEnd >= end) break;
    p = separator === 0 ? fieldEnd : fieldEnd + 1;
  }
  while (fields.at(-1)?.kind === 'empty') fields.pop(); // a separator at the end of the line is no column
  return separator === 0 ? joinUnits(fields, text) : fields;
}

function endOfField(codes: Uint8Array, from: number, end: number, separator: number): number {
  let p = from;
  if (codes[p] === QUOTE) {
    let close = p + 1;
    while (close < end && codes[close] !== QUOTE) close += 1;
    if (close < end) p = close + 1;
  }
  while (p < end && (separator === 0 ? !isBlank(codes[p]!) : codes[p] !== separator)) p += 1;
  return p;
}

/** "10 Hz 7.4 Ohm": with blanks as separator a unit standing alone belongs to the number before it. */
function joinUnits(fields: Field[], text: Characters): Field[] {
  if (fields.every((field) => field.kind !== 'text')) return fields;
  const joined: Field[] = [];
  for (const field of fields) {
    const before = joined.at(-1);
    const isWord = field.kind === 'text' && before?.kind === 'number' && before.unit === undefined;
    const unit = isWord ? unitWord(text.decode(field.start, field.end)) : undefined;
    if (unit && before) joined[joined.length - 1] = { ...before, end: field.end, unit };
    else joined.push(field);
  }
  return joined;
}

function parseField(text: Characters, from: number, to: number, dialect: Dialect): Field {
  const { codes } = text;
  let start = from;
  let end = to;
  while (end > start && isBlank(codes[end - 1]!)) end -= 1;
  if (end - start >= 2 && codes[start] === QUOTE && codes[end - 1] === QUOTE) {
    start += 1;
    end -= 1;
    while (end > start && isBlank(codes[end - 1]!)) end -= 1;
    while (start < end && isBlank(codes[start]!)) start += 1;
  }
  if (start === end) return other('empty', start, end);
  const first = codes[start]!;
  const mayBeNumber =
    isDigit(first) || first === MINUS || first === PLUS || first === DECIMAL_CODE[dialect.decimalMark];
  const number = mayBeNumber || (first | 32) === 114 ? parseNumber(text, start, end, dialect) : undefined; // R47
  if (number) return number;
  if (end - start <= 12 && GAP.test(text.decode(start, end))) return other('gap', start, end);
  return other('text', start, end);
}

const other = (kind: Field['kind'], start: number, end: number): Field => ({
  start,
  end,
  kind,
  value: Number.NaN,
  unit: undefined,
  decimals: 0,
});
const numberField = (
  start: number,
  end: number,
  value: number,
  unit: UnitWord | undefined,
  decimals: number,
): Field => ({
  start,
  end,
  kind: 'number',
  value,
  unit,
  decimals,
});

function parseNumber(text: Characters, start: number, end: number, dialect: Dialect): Field | undefined {
  const decimalCode = DECIMAL_CODE[dialect.decimalMark];
  const plain = plainDigits(text.codes, start, end, dialect);
  if (!plain) return undefined;
  const value = scanDecimal(plain.codes, plain.start, decimalCode, 0);
  const stop = decimalEnd();
  if (stop < 0) return parseMarked(text, start, end);
  if (decimalCode === COMMA && plain.codes[stop - 1] === COMMA) return undefined; // "10, 7": the comma parts columns
  const decimals = decimalsBefore(plain.codes, plain.start, stop, decimalCode);
  let unitFrom = stop - plain.end + end;
  if (unitFrom >= end) return numberField(start, end, value, undefined, decimals);
  while (unitFrom < end && isBlank(text.codes[unitFrom]!)) unitFrom += 1;
  if (end - unitFrom > 12) return undefined;
  const unit = unitWord(text.decode(unitFrom, end));
  return unit ? numberField(start, end, value, unit, decimals) : parseMarked(text, start, end);
}

function decimalsBefore(codes: Uint8Array, start: number, stop: number, decimalCode: number): number {
  let p = start;
  while (p < stop && codes[p] !== decimalCode) p += 1;
  let decimals = 0;
  while (p + 1 + decimals < stop && isDigit(codes[p + 1 + decimals]!)) decimals += 1;
  return decimals;
}

/** 4R7 and 4k7: the letter stands where the decimal mark would (IEC 60062). Undefined for anything else. */
function parseMarked(text: Characters, start: number, end: number): Field | undefined {
  if (end - start > 12) return undefined;
  const found = /^([+-]?\d*)([RrkKM])(\d+)$/.exec(text.decode(start, end));
  if (!found) return undefined;
  const [, whole = '', letter = '', fraction = ''] = found;
  const unit = unitWord(letter) as UnitWord;
  return numberField(start, end, Number(`${whole || '0'}.${fraction}`), unit, fraction.length);
}

interface PlainDigits {
  readonly codes: Uint8Array;
  readonly start: number;
  readonly end: number; // where the field ends in these codes; the code there is no digit
}

/** The field without its thousands marks. Undefined where the marks do not part groups of three digits. */
function plainDigits(codes: Uint8Array, start: number, end: number, dialect: Dialect): PlainDigits | undefined {
  const mark = THOUSANDS_CODE[dialect.thousandsMark];
  const isQuoted = DECIMAL_CODE[dialect.decimalMark] === SEPARATOR_CODE[dialect.separator]; // a mark behind it is no digit's
  if (mark < 0 && !isQuoted) return { codes, start, end };
  const out = new Uint8Array(end - start + 1);
  let size = 0;
  let p = start;
  let group = 0; // digits since the sign or the last mark
  let marks = 0;
  if (codes[p] === MINUS || codes[p] === PLUS) out[size++] = codes[p++]!;
  while (p < end && (isDigit(codes[p]!) || codes[p] === mark)) {
    if (codes[p] === mark) {
      const next = mark === BLANK ? skipBlanks(codes, p, end) : p + 1;
      if (mark === BLANK && !isDigit(codes[next] ?? 0)) break; // a blank before a unit
      const isZero = marks === 0 && codes[p - group] === 48; // 0,254 is no number of thousands
      if (group === 0 || group > 3 || isZero || (marks > 0 && group !== 3)) return undefined;
      p = next;
      group = 0;
      marks += 1;
    } else {
      out[size++] = codes[p++]!;
      group += 1;
    }
  }
  if (marks > 0 && group !== 3) return undefined;
  out.set(codes.subarray(p, end), size);
  return { codes: out, start: 0, end: size + end - p };
}

function skipBlanks(codes: Uint8Array, from: number, end: number): number {
  let p = from;
  while (p < end && codes[p] === BLANK) p += 1;
  return p;
}
