import { BLANK, CR, isBlank, isLineEnd, LF, lineEnd, nextLine, QUOTE, TAB } from '../characters.js';
import { decimalEnd, scanDecimal } from '../decimal.js';
import { DECIMAL_CODE, type Dialect, SEPARATOR_CODE } from '../dialect.js';
import type { Characters } from '../encoding.js';
import type { Shape } from '../recognise/guess-dialect.js';
import { slowRow } from './slow-row.js';

/** A column to take: where it stands in the row, and the power of ten its unit adds (kHz: 3). */
export interface TakenColumn {
  readonly column: number;
  readonly exponent: number;
  readonly unitExponent: number; // of the unit that stands behind every number of it, 0 for none
}
export interface ScanPlan {
  readonly dialect: Dialect;
  readonly shape: Shape;
  readonly take: readonly TakenColumn[]; // in the order of the columns
  readonly dataStart: number;
  readonly fixedDecimals: number; // digits after the mark of the last column, where all rows have as many; else 0
  readonly firstLine: number; // number of the first row's line, counted from 1
}
export interface SkippedRow {
  readonly line: number;
  readonly reason: string;
}

/** The rows taken. Shapes: each of `values` and `lines` (rows). */
export interface Table {
  rows: number;
  values: Float64Array[]; // one for each taken column
  lines: Uint32Array; // where each row stands in the file
  skipped: SkippedRow[]; // the first 200
  skippedCount: number;
  comments: string[];
  textLines: number; // lines of words among the data
  truncatedLine: number; // the last line, where it was cut off; 0 otherwise
  secondTableLine: number; // where a second table starts, which is not read; 0 otherwise
}

export interface Watch {
  progress(done: number, total: number): void;
  checkpoint(): void;
}

const STRIDE = 1 << 19; // characters between two looks at the clock: about 10 ms of work

/** Reads every row below the headings. Rows that are not plain numbers and separators take the slow way, one line at a time. */
export function scanRows(text: Characters, plan: ScanPlan, watch: Watch): Table {
  const table = emptyTable(text.codes.length - plan.dataStart, plan.take.length);
  const scan = new RowScan(text, plan, table);
  const total = text.codes.length;
  while (scan.position < total && table.secondTableLine === 0) {
    scan.upTo(Math.min(total, scan.position + STRIDE));
    watch.checkpoint();
    watch.progress(scan.position, total);
  }
  return table;
}

function emptyTable(characters: number, columns: number): Table {
  const room = Math.max(16, Math.ceil(characters / 24));
  return {
    rows: 0,
    values: Array.from({ length: columns }, () => new Float64Array(room)),
    lines: new Uint32Array(room),
    skipped: [],
    skippedCount: 0,
    comments: [],
    textLines: 0,
    truncatedLine: 0,
    secondTableLine: 0,
  };
}

/** Doubles the room of a table that is full. */
export function makeRoom(table: Table): void {
  if (table.rows < table.lines.length) return;
  const room = 2 * table.lines.length;
  table.values = table.values.map((old) => {
    const grown = new Float64Array(room);
    grown.set(old);
    return grown;
  });
  const lines = new Uint32Array(room);
  lines.set(table.lines);
  table.lines = lines;
}

class RowScan {
  position: number;
  private line: number;
  private readonly fastEnd: number; // behind the last line end: the line after it may be cut off
  private readonly slot: Int32Array; // for each column of the row: which taken one it is, or -1
  private readonly shifts: Int32Array;
  private readonly last: number; // the last column that is needed
  private readonly endsRow: boolean; // nothing may follow it
  private readonly separator: number;
  private readonly decimalCode: number;
  private readonly isFast: boolean;

  constructor(
    private readonly text: Characters,
    private readonly plan: ScanPlan,
    private readonly table: Table,
  ) {
    const { codes } = text;
    this.position = plan.dataStart;
    this.line = plan.firstLine;
    this.fastEnd = Math.max(codes.lastIndexOf(LF), codes.lastIndexOf(CR)) + 1;
    this.slot = new Int32Array(plan.shape.fields).fill(-1);
    plan.take.forEach(({ column }, i) => {
      this.slot[column] = i;
    });
    this.shifts = Int32Array.from(plan.take, (taken) => taken.exponent);
    this.last = plan.take.reduce((last, { column }) => Math.max(last, column), 0);
    this.endsRow = this.last === plan.shape.fields - 1;
    this.separator = SEPARATOR_CODE[plan.dialect.separator];
    this.decimalCode = DECIMAL_CODE[plan.dialect.decimalMark];
    const isPlain = plan.dialect.thousandsMark === 'none' && this.separator !== this.decimalCode;
    this.isFast = isPlain && plan.take.every((taken) => taken.unitExponent === 0);
  }

  /** Takes rows until a line starts at or behind `stop`. */
  upTo(stop: number): void {
    const { codes } = this.text;
    const { table } = this;
    const fastStop = this.isFast ? Math.min(stop, this.fastEnd) : 0;
    while (this.position < stop && table.secondTableLine === 0) {
      makeRoom(table);
      const next = this.position < fastStop ? this.fastRow(codes, this.position) : -1;
      if (next < 0) {
        const end = lineEnd(codes, this.position, codes.length);
        slowRow(this.text, this.plan, table, {
          start: this.position,
          end,
          line: this.line,
          isLast: end >= codes.length,
        });
        this.position = nextLine(codes, end, codes.length);
      } else {
        table.lines[table.rows++] = this.line;
        this.position = next;
      }
      this.line += 1;
    }
  }

  /** The quick way: a row of digits, signs and separators. Returns where the next line starts, or -1 for anything else. */
  private fastRow(codes: Uint8Array, start: number): number {
    const { separator, last, slot, table } = this;
    let p = start;
    for (let column = 0; column <= last; column += 1) {
      p = skipBlanks(codes, p, separator);
      const at = slot[column]!;
      if (at < 0) p = skipField(codes, p, separator);
      else {
        table.values[at]![table.rows] = scanDecimal(codes, p, this.decimalCode, this.shifts[at]!);
        p = decimalEnd();
      }
      if (p < 0) return -1;
      if (column === last) break;
      if (separator === 0 && !isBlank(codes[p]!)) return -1;
      if (separator !== 0) {
        p = skipBlanks(codes, p, separator);
        if (codes[p] !== separator) return -1;
        p += 1;
      }
    }
    return this.behindRow(codes, p);
  }

  /** What may follow the last needed number: the end of the line, or columns nobody asked for. */
  private behindRow(codes: Uint8Array, from: number): number {
    let p = skipBlanks(codes, from, this.separator);
    if (isLineEnd(codes[p]!)) return codes[p] === CR && codes[p + 1] === LF ? p + 2 : p + 1;
    if (this.endsRow || (this.separator === 0 ? p === from : codes[p] !== this.separator)) return -1;
    while (!isLineEnd(codes[p]!)) p += 1;
    return codes[p] === CR && codes[p + 1] === LF ? p + 2 : p + 1;
  }
}

function skipBlanks(codes: Uint8Array, from: number, separator: number): number {
  let p = from;
  let code = codes[p]!;
  while (code === BLANK || (code === TAB && separator !== TAB)) code = codes[++p]!;
  return p;
}

/** Past a field that nobody asked for; -1 where it is quoted, which takes the slow way. */
function skipField(codes: Uint8Array, from: number, separator: number): number {
  let p = from;
  if (codes[p] === QUOTE) return -1;
  while (!isLineEnd(codes[p]!) && (separator === 0 ? !isBlank(codes[p]!) : codes[p] !== separator)) p += 1;
  return p;
}
