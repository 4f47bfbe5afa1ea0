import { QUOTE } from '../characters.js';
import { commentAt, remarkAt, withoutMark } from '../comments.js';
import { SEPARATOR_CODE } from '../dialect.js';
import { type Characters, refuseHighCodes } from '../encoding.js';
import { headingsIn, knownMeanings, meaningOf } from '../recognise/column-names.js';
import { hasInk } from '../recognise/sample.js';
import { type Field, splitRow } from '../row.js';
import type { ScanPlan } from './scan-rows.js';
import { LISTED_MOST, skipRow, type Table } from './table.js';

interface LineAt {
  readonly start: number;
  readonly end: number;
  readonly line: number;
  readonly isLast: boolean; // no line end follows: it may be cut off
}

const LINE_LENGTH_MOST = 1_000_000; // a longer line is no row of a table

/** Takes one line in the careful way: quotes, units behind numbers, thousands marks, remarks; or says why it is no row. */
export function slowRow(text: Characters, plan: ScanPlan, table: Table, at: LineAt): void {
  const { codes } = text;
  if (!hasInk(codes, at.start, at.end)) return;
  if (text.isAssumed) refuseHighCodes(codes, at.start, at.end);
  const comment = commentAt(codes, at.start, at.end);
  if (comment === 'yes') keepComment(text, table, at);
  else if (at.end - at.start > LINE_LENGTH_MOST) skipRow(table, at.line, 'is too long for a row of data');
  else {
    const fields = splitRow(text, at.start, at.end, plan.dialect);
    const refusal = take(text, fields, plan, table, at);
    if (refusal === undefined || takeBeforeRemark(text, plan, table, at)) return;
    if (comment === 'maybe' && isComment(codes, plan, at, fields)) keepComment(text, table, at);
    else refuseRow(text, plan, table, at, fields, refusal);
  }
}

/** Behind ; or a quote stands a comment, unless the mark parts columns or closes again and there are numbers. */
function isComment(codes: Uint8Array, plan: ScanPlan, at: LineAt, fields: readonly Field[]): boolean {
  if (!fields.some((field) => field.kind === 'number')) return true;
  let quotes = 0;
  for (let p = at.start; p < at.end; p += 1) if (codes[p] === QUOTE) quotes += 1;
  return quotes % 2 === 1 || (quotes === 0 && plan.dialect.separator !== 'semicolon');
}

/** A row with a remark behind it: the row is taken, the remark kept as a comment. */
function takeBeforeRemark(text: Characters, plan: ScanPlan, table: Table, at: LineAt): boolean {
  const remark = remarkAt(text.codes, at.start, at.end, SEPARATOR_CODE[plan.dialect.separator]);
  if (remark >= at.end) return false;
  const fields = splitRow(text, at.start, remark, plan.dialect);
  if (take(text, fields, plan, table, { ...at, isLast: false }) !== undefined) return false;
  keepComment(text, table, { ...at, start: remark });
  return true;
}

function refuseRow(
  text: Characters,
  plan: ScanPlan,
  table: Table,
  at: LineAt,
  fields: readonly Field[],
  refusal: string,
): void {
  const isWords = fields.every((field) => field.kind === 'text' || field.kind === 'empty');
  if (at.isLast && !isWords) table.truncatedLine = at.line;
  else if (isWords && table.rows > 0 && startsTable(text, plan, at)) table.secondTableLine = at.line;
  else {
    if (isWords) table.textLines += 1;
    skipRow(table, at.line, refusal);
  }
}

/** Puts the row into the table; returns why not, where it does not fit. */
function take(
  text: Characters,
  fields: readonly Field[],
  plan: ScanPlan,
  table: Table,
  at: LineAt,
): string | undefined {
  const wanted = plan.shape.fields;
  const isShort = plan.take.some(({ column }) => column >= fields.length);
  const isLong = fields.slice(wanted).some((field) => field.kind === 'number');
  if (isShort || isLong || (at.isLast && fields.length < wanted)) {
    return `has ${fields.length} ${fields.length === 1 ? 'column' : 'columns'}, the rows around it have ${wanted}`;
  }
  for (const { column } of plan.take) {
    const field = fields[column] as Field;
    if (field.kind === 'number') continue;
    if (field.kind === 'gap' || field.kind === 'empty') return `has no number in column ${column + 1}`;
    return `column ${column + 1} reads “${text.decode(field.start, Math.min(field.end, field.start + 24))}”, which is no number`;
  }
  if (at.isLast && plan.fixedDecimals > (fields[wanted - 1]?.decimals ?? Number.POSITIVE_INFINITY))
    return 'breaks off in its last number';
  plan.take.forEach(({ column, exponent, unitExponent }, i) => {
    const field = fields[column] as Field;
    const own = field.unit && field.unit.kind !== 'level' ? field.unit.exponent - unitExponent : 0;
    (table.values[i] as Float64Array)[table.rows] = shifted(field.value, exponent + own);
  });
  table.rows += 1;
  return undefined;
}

/** value × 10^exponent, rounded once: the digits of the value with another exponent. */
function shifted(value: number, exponent: number): number {
  if (exponent === 0 || value === 0) return value; // −0 stays −0
  const [digits = '', own = '0'] = String(value).split('e');
  return Number(`${digits}e${Number(own) + exponent}`);
}

function startsTable(text: Characters, plan: ScanPlan, at: LineAt): boolean {
  const names = headingsIn(text.decode(at.start, Math.min(at.end, at.start + 2000)), plan.shape.fields, plan.dialect);
  const meanings = names?.map(meaningOf) ?? [];
  return knownMeanings(meanings) >= 2 && meanings.some((meaning) => meaning.kind === 'frequency');
}

function keepComment(text: Characters, table: Table, at: LineAt): void {
  if (table.comments.length >= LISTED_MOST) return;
  const words = withoutMark(text.decode(at.start, Math.min(at.end, at.start + 2000)));
  if (words !== '') table.comments.push(words);
}
