export interface SkippedRow {
  readonly line: number;
  readonly reason: string;
}

/** The rows taken from a file. Shape of each of `values`: room for (rows) and more. */
export interface Table {
  rows: number;
  values: Float64Array[]; // one for each taken column
  readonly runs: { readonly row: number; readonly line: number }[]; // where rows cease to stand in consecutive lines
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

const SPARE_NUMBERS_MOST = 4_000_000; // 32 MB

/**
 * Columns of the last reading, for the next one: fresh memory costs more time than filling it. What stands in them is never read before
 * it is written, so no reading can tell whether it had them.
 */
let spare: Float64Array[] = [];

/** The columns are free for the next reading; nobody may hold a view of them any more. */
export function giveBack(table: Table): void {
  const numbers = table.values.reduce((sum, column) => sum + column.length, 0);
  if (numbers <= SPARE_NUMBERS_MOST) spare = table.values;
  table.values = [];
}

/** `room`: how many rows are expected. */
export function emptyTable(room: number, columns: number): Table {
  const found = spare.filter((column) => column.length >= room).slice(0, columns);
  spare = [];
  while (found.length < columns) found.push(new Float64Array(room));
  return {
    rows: 0,
    values: found,
    runs: [],
    skipped: [],
    skippedCount: 0,
    comments: [],
    textLines: 0,
    truncatedLine: 0,
    secondTableLine: 0,
  };
}

/** Rows that the columns can hold: spare ones may be longer than others. */
export function roomIn({ values }: Table): number {
  return values.reduce((least, column) => Math.min(least, column.length), Number.POSITIVE_INFINITY);
}

/** Makes room for one row more, half as much again when the table is full; whether the columns are new ones. */
export function makeRoom(table: Table): boolean {
  const room = roomIn(table);
  if (table.rows < room) return false;
  const size = Math.ceil(1.5 * room) + 16;
  table.values = table.values.map((old) => {
    if (old.length >= size) return old;
    const grown = new Float64Array(size);
    grown.set(old);
    return grown;
  });
  return true;
}

/** Notes that the rows from the next one on stand in consecutive lines from `line`. */
export function startRun(table: Table, line: number): void {
  while (table.runs.at(-1)?.row === table.rows) table.runs.pop();
  const last = table.runs.at(-1);
  if (!last || last.line + table.rows - last.row !== line) table.runs.push({ row: table.rows, line });
}

/** The line in which a row stands, counted from 1. */
export function lineOf({ runs }: Table, row: number): number {
  let low = 0;
  let high = runs.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (runs[middle]!.row <= row) low = middle;
    else high = middle - 1;
  }
  const run = runs[low];
  return run ? run.line + row - run.row : 0;
}

export const LISTED_MOST = 200;

export function skipRow(table: Table, line: number, reason: string): void {
  if (table.skipped.length < LISTED_MOST) table.skipped.push({ line, reason });
  table.skippedCount += 1;
}
