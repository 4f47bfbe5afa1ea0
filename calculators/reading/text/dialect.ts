import type { Reading } from '../../../shared/contracts/reading.js';
import { COMMA, POINT, SEMICOLON, TAB } from './characters.js';

/** How the columns of a line are told apart and how its numbers are written. */
export interface Dialect {
  readonly separator: Reading['separator'];
  readonly decimalMark: Reading['decimalMark'];
  readonly thousandsMark: Reading['thousandsMark'];
}

/** The separator as a code; 0 stands for any run of blanks and tabs. */
export const SEPARATOR_CODE: Readonly<Record<Dialect['separator'], number>> = {
  tab: TAB,
  comma: COMMA,
  semicolon: SEMICOLON,
  space: 0,
};
export const DECIMAL_CODE: Readonly<Record<Dialect['decimalMark'], number>> = { point: POINT, comma: COMMA };
export const THOUSANDS_CODE: Readonly<Record<Dialect['thousandsMark'], number>> = {
  none: -1,
  comma: COMMA,
  point: POINT,
  space: 32,
  apostrophe: 39,
};
