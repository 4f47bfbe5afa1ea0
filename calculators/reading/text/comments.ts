import { isBlank, QUOTE, SEMICOLON, SLASH } from './characters.js';

const MARKS = new Set(['*', '#', '%', '!'].map((mark) => mark.charCodeAt(0)));

/**
 * Whether the line [start, end) is a comment: `yes` behind * # % ! or //, `maybe` behind ; or a quote, which may also
 * start a row of data.
 */
export function commentAt(codes: Uint8Array, start: number, end: number): 'yes' | 'maybe' | 'no' {
  let p = start;
  while (p < end && isBlank(codes[p]!)) p += 1;
  if (p >= end) return 'no';
  const code = codes[p]!;
  if (MARKS.has(code) || (code === SLASH && codes[p + 1] === SLASH)) return 'yes';
  return code === SEMICOLON || code === QUOTE ? 'maybe' : 'no';
}

/** Where a remark behind the data of a line starts (behind # ! % // and, unless it parts the columns, ;), or `end`. */
export function remarkAt(codes: Uint8Array, start: number, end: number, separator: number): number {
  for (let p = start + 1; p < end; p += 1) {
    const code = codes[p]!;
    if ((MARKS.has(code) && code !== 42) || (code === SLASH && codes[p + 1] === SLASH)) return p;
    if (code === SEMICOLON && separator !== SEMICOLON) return p;
  }
  return end;
}

/** The words of a comment or heading without its mark. */
export function withoutMark(line: string): string {
  return line
    .replace(/^\s*([*#%!;"]+|\/\/+)?\s*/, '')
    .replace(/"\s*$/, '')
    .trimEnd();
}
