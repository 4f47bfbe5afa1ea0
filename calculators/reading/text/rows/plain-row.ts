import { BLANK, CR, LF, MINUS } from '../characters.js';
import { decimalEnd, scanDecimal } from '../decimal.js';

const POWERS_OF_TEN = Float64Array.from({ length: 16 }, (_, k) => 10 ** k);
const SHORT = 9; // digits that an int32 holds

/** Rows that hold the taken columns and nothing else, parted by one character, with no more than blanks before a number. */
export interface PlainFormat {
  readonly codes: Uint8Array;
  readonly view: DataView; // of the same codes
  readonly separator: number; // its code; a blank where runs of blanks part the columns
  readonly decimalCode: number;
  readonly columns: readonly Float64Array[]; // where each column of the row goes, shape: room for rows
  readonly shifts: Int32Array; // power of ten that the unit of each column adds
  readonly isShifted: boolean; // any of them
}

/**
 * The quickest way through a plain row: puts its numbers into row `row` of the columns and returns where the next line starts, or −1 for a
 * row that is not just so. Each number is bit-identical to `Number()`, as in `scanDecimal`, which takes the long ones. One row a call,
 * so that the engine compiles it early and whole. Four codes behind the line must exist.
 */
export function plainRow(format: PlainFormat, from: number, row: number): number {
  const { codes, view, separator, decimalCode, columns, shifts, isShifted } = format;
  const last = columns.length - 1;
  let p = from;
  let code = 0;
  for (let column = 0; column <= last; column += 1) {
    code = codes[p]!;
    while (code === BLANK) code = codes[++p]!;
    const start = p;
    const isNegative = code === MINUS;
    if (isNegative) code = codes[++p]!;
    const wholeStart = p;
    let whole = 0;
    while (code >= 48 && code <= 57) {
      whole = (Math.imul(whole, 10) + code - 48) | 0;
      code = codes[++p]!;
    }
    const wholeDigits = p - wholeStart;
    let fraction = 0;
    let places = 0;
    if (code === decimalCode) {
      const fractionStart = ++p;
      for (let four = fourDigits(view, p); four >= 0; four = fourDigits(view, p)) {
        fraction = (Math.imul(fraction, 10_000) + four) | 0;
        p += 4;
      }
      code = codes[p]!;
      while (code >= 48 && code <= 57) {
        fraction = (Math.imul(fraction, 10) + code - 48) | 0;
        code = codes[++p]!;
      }
      places = p - fractionStart;
    }
    const isShort = wholeDigits <= SHORT && places <= SHORT && wholeDigits + places > 0 && wholeDigits + places <= 15;
    const isEnd = column === last ? code === LF || code === CR : code === separator;
    if (isEnd && isShort && !isShifted) {
      const power = POWERS_OF_TEN[places]!;
      const value = (whole * power + fraction) / power;
      columns[column]![row] = isNegative ? -value : value;
    } else {
      columns[column]![row] = scanDecimal(codes, start, decimalCode, shifts[column]!);
      p = decimalEnd();
      if (p < 0) return -1;
      code = codes[p]!;
      if (column === last ? code !== LF && code !== CR : code !== separator) return -1;
    }
    p += 1;
  }
  return code === CR && codes[p] === LF ? p + 1 : p;
}

/** The value of the four digits at `p`, or −1 where there are not four: tested and added up side by side in one int32. */
function fourDigits(view: DataView, p: number): number {
  const word = view.getUint32(p, true) | 0;
  const digits = (word - 0x30303030) | 0;
  if ((((word + 0x46464646) | digits) & 0x80808080) !== 0) return -1;
  const pairs = (Math.imul(digits, 10) + (digits >>> 8)) | 0;
  return Math.imul(pairs & 0xff, 100) + ((pairs >>> 16) & 0xff);
}
