import { BLANK, CR, isBlank, isLineEnd, LF, lineEnd, nextLine, QUOTE, TAB } from '../characters.js';
import { decimalEnd, scanDecimal } from '../decimal.js';
import { DECIMAL_CODE, type Dialect, SEPARATOR_CODE } from '../dialect.js';
import type { Characters } from '../encoding.js';
import type { Shape } from '../recognise/guess-dialect.js';
import { type PlainFormat, plainRow } from './plain-row.js';
import { slowRow } from './slow-row.js';
import { emptyTable, makeRoom, roomIn, startRun, type Table, type Watch } from './table.js';

/** A column to take: where it stands in the row, and the power of ten its unit adds (kHz: 3). */
export interface TakenColumn {
  readonly column: number;
  readonly exponent: number;
  readonly unitExponent: number; // of the unit that stands behind every number of it, 0 for none
}
export interface ScanPlan {
  readonly dialect: Dialect;
  readonly shape: Shape;
  readonly take: readonly TakenColumn[]; // frequency first, then what makes up the impedance
  readonly dataStart: number;
  readonly fixedDecimals: number; // digits after the mark of the last column, where all rows have as many; else 0
  readonly firstLine: number; // number of the first row's line, counted from 1
  readonly rowsExpected: number;
}

const STRIDE_LEAST = 1 << 12; // characters between two looks at the clock at first: the engine sees whole rounds before it compiles
const STRIDE_MOST = 1 << 19; // later: some milliseconds of work
const MISSES_MOST = 100; // rows that were not plain before the plain way is given up
const BEHIND = 8; // codes that the quick ways may look at behind a number

/** Reads every row below the headings. Rows that are not plain numbers and separators take the slow way, one line at a time. */
export function scanRows(text: Characters, plan: ScanPlan, watch: Watch): Table {
  const table = emptyTable(plan.rowsExpected, plan.take.length);
  const scan = new RowScan(text, plan, table);
  const total = text.codes.length;
  let stride = STRIDE_LEAST;
  while (scan.position < total && table.secondTableLine === 0) {
    scan.upTo(Math.min(total, scan.position + stride));
    stride = Math.min(STRIDE_MOST, 1.25 * stride);
    watch.checkpoint();
    watch.progress(scan.position, total);
  }
  return table;
}

class RowScan {
  position: number;
  private line: number;
  private readonly view: DataView;
  private format: PlainFormat | undefined;
  private readonly fastEnd: number; // where the last rows start that may be cut off or lie too near the end
  private readonly slot: Int32Array; // for each column of the row: which taken one it is, or -1
  private readonly shifts: Int32Array;
  private readonly last: number; // the last column that is needed
  private readonly endsRow: boolean; // nothing may follow it
  private readonly separator: number;
  private readonly decimalCode: number;
  private readonly isFast: boolean;
  private missesLeft: number;

  constructor(
    private readonly text: Characters,
    private readonly plan: ScanPlan,
    private readonly table: Table,
  ) {
    const { codes } = text;
    const { take, shape, dialect } = plan;
    this.position = plan.dataStart;
    this.line = plan.firstLine;
    this.view = new DataView(codes.buffer, codes.byteOffset, codes.byteLength);
    const near = Math.max(0, codes.length - BEHIND);
    this.fastEnd = Math.max(codes.lastIndexOf(LF, near), codes.lastIndexOf(CR, near)) + 1;
    this.slot = new Int32Array(shape.fields).fill(-1);
    take.forEach(({ column }, i) => {
      this.slot[column] = i;
    });
    this.shifts = Int32Array.from(take, (taken) => taken.exponent);
    this.last = take.reduce((last, { column }) => Math.max(last, column), 0);
    this.endsRow = this.last === shape.fields - 1;
    this.separator = SEPARATOR_CODE[dialect.separator];
    this.decimalCode = DECIMAL_CODE[dialect.decimalMark];
    const isPlain = dialect.thousandsMark === 'none' && this.separator !== this.decimalCode;
    this.isFast = isPlain && take.every((taken) => taken.unitExponent === 0);
    this.missesLeft = this.isFast && take.length === shape.fields ? MISSES_MOST : 0;
  }

  /** Takes rows until a line starts at or behind `stop`. */
  upTo(stop: number): void {
    const { codes } = this.text;
    const { table } = this;
    const fastStop = this.isFast ? Math.min(stop, this.fastEnd) : 0;
    startRun(table, this.line);
    while (this.position < stop && table.secondTableLine === 0) {
      if (makeRoom(table)) this.format = undefined;
      if (this.missesLeft > 0 && this.position < fastStop && this.takePlainRows(fastStop)) continue;
      const next = this.position < fastStop ? this.fastRow(codes, this.position) : -1;
      if (next >= 0) {
        table.rows += 1;
        this.position = next;
        this.line += 1;
      } else this.takeSlowly();
    }
  }

  private takeSlowly(): void {
    const { codes } = this.text;
    if (this.passBlankLines(codes)) return;
    const end = lineEnd(codes, this.position, codes.length);
    const at = { start: this.position, end, line: this.line, isLast: end >= codes.length };
    slowRow(this.text, this.plan, this.table, at);
    this.position = nextLine(codes, end, codes.length);
    this.line += 1;
    startRun(this.table, this.line);
  }

  private passBlankLines(codes: Uint8Array): boolean {
    const start = this.position;
    const stop = Math.min(codes.length, start + STRIDE_MOST);
    while (this.position < stop && isLineEnd(codes[this.position]!)) {
      this.position = nextLine(codes, this.position, codes.length);
      this.line += 1;
    }
    if (this.position > start) startRun(this.table, this.line);
    return this.position > start;
  }

  /** Takes what plain rows follow, as long as there is room; whether there were any. */
  private takePlainRows(stop: number): boolean {
    const { table } = this;
    this.format ??= this.plainFormat();
    const room = roomIn(table);
    const before = table.rows;
    let row = before;
    let position = this.position;
    while (position < stop && row < room) {
      const next = plainRow(this.format, position, row);
      if (next < 0) break;
      position = next;
      row += 1;
    }
    table.rows = row;
    this.position = position;
    this.line += row - before;
    this.missesLeft = row === before ? this.missesLeft - 1 : Math.min(MISSES_MOST, this.missesLeft + row - before);
    return row > before;
  }

  private plainFormat(): PlainFormat {
    const columns = Array.from(this.slot, (at) => this.table.values[at]!);
    const shifts = Int32Array.from(this.slot, (at) => this.shifts[at]!);
    const isShifted = shifts.some((shift) => shift !== 0);
    const { view, decimalCode } = this;
    const separator = this.separator || BLANK;
    return { codes: this.text.codes, view, separator, decimalCode, columns, shifts, isShifted };
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
