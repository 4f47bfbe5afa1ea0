/** Codes of the characters that matter in a table of numbers (ASCII). */
export const TAB = 9;
export const LF = 10;
export const CR = 13;
export const BLANK = 32;
export const QUOTE = 34;
export const PLUS = 43;
export const COMMA = 44;
export const MINUS = 45;
export const POINT = 46;
export const SLASH = 47;
export const SEMICOLON = 59;

export const isDigit = (code: number): boolean => code >= 48 && code <= 57;
export const isLineEnd = (code: number): boolean => code === LF || code === CR;
export const isBlank = (code: number): boolean => code === BLANK || code === TAB;

/** Where the line that holds `from` ends: the index of its CR or LF, or `end`. */
export function lineEnd(codes: Uint8Array, from: number, end: number): number {
  let p = from;
  while (p < end && codes[p] !== LF && codes[p] !== CR) p += 1;
  return p;
}

/** Where the next line starts, given the index at which a line ended: past LF, CR or CR LF. */
export function nextLine(codes: Uint8Array, lineEndAt: number, end: number): number {
  if (lineEndAt >= end) return end;
  return codes[lineEndAt] === CR && codes[lineEndAt + 1] === LF ? lineEndAt + 2 : lineEndAt + 1;
}
