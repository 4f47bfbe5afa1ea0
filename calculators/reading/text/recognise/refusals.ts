import type { ReadingOverrides } from '../../../../shared/contracts/reading.js';
import { InputError } from '../../../../shared/errors.js';
import type { ColumnKind } from './guess-columns.js';
import type { DialectGuess, Shape } from './guess-dialect.js';

/** A setting of the reading that this file cannot be read with; `where` names it. */
export const badSetting = (setting: keyof ReadingOverrides, message: string): InputError =>
  new InputError('bad-setting', message, `reading.${setting}`);

/** The person's separator and marks must be told apart. Error: `bad-setting`. */
export function refuseClash(told: ReadingOverrides, hasQuotes: boolean): void {
  const { separator, decimalMark, thousandsMark } = told;
  if (!thousandsMark || thousandsMark === 'none') return;
  if (thousandsMark === decimalMark) {
    throw badSetting(
      'thousandsMark',
      `The ${thousandsMark} cannot be the decimal mark and part thousands too. Change one of the two.`,
    );
  }
  if (thousandsMark === separator && !hasQuotes) {
    throw badSetting(
      'thousandsMark',
      `The ${thousandsMark} cannot part columns and thousands both. Change one of the two.`,
    );
  }
}

/** Why nothing was found with what the person set, if they set anything; undefined where the file itself holds no table. */
export function refuseDialect(told: ReadingOverrides, free: DialectGuess | undefined): InputError | undefined {
  if (!free || numbersIn(free.shape) < 2) return undefined;
  const { separator, decimalMark, thousandsMark } = free.dialect;
  const looks = `This file reads with ${separator} between columns, decimal ${decimalMark}${thousandsMark === 'none' ? '' : `, ${thousandsMark} between thousands`}.`;
  if (told.separator && told.separator !== separator) {
    return badSetting('separator', `With ${told.separator} as separator no line has two columns of numbers. ${looks}`);
  }
  if (told.decimalMark && told.decimalMark !== decimalMark) {
    return badSetting('decimalMark', `With a decimal ${told.decimalMark} no line has two columns of numbers. ${looks}`);
  }
  if (told.thousandsMark && told.thousandsMark !== thousandsMark) {
    return badSetting(
      'thousandsMark',
      `With ${told.thousandsMark} between thousands no line has two columns of numbers. ${looks}`,
    );
  }
  return undefined;
}

export const numbersIn = (shape: Shape): number => shape.isNumber.filter(Boolean).length;

/** What is wrong with a file in which no table was found, for the person who gave it. */
export function noTable(guess: DialectGuess | undefined, fileName: string): InputError {
  if (!guess)
    return new InputError(
      'no-numeric-data',
      'This file holds no rows of numbers. Export the sweep as a text table: one row a frequency.',
      fileName,
    );
  if (numbersIn(guess.shape) < 2 && guess.agreeing >= 0.5 * guess.lines) {
    return new InputError(
      'too-few-columns',
      'The rows have one column of numbers; a sweep needs two or more: frequency and impedance. Set the separator if the columns are parted by something else.',
      fileName,
    );
  }
  return notACurve(fileName);
}

export const notACurve = (fileName: string, detail = 'Most of this file is no table of numbers.'): InputError =>
  new InputError('not-a-curve', `${detail} Export the sweep as rows of frequency, impedance and phase.`, fileName);

/** The person's columns must make up one curve and stand where there are numbers. Error: `bad-setting`. */
export function refuseColumns(columns: readonly ColumnKind[], shape: Shape, told: ReadingOverrides): void {
  const refuse = (message: string) => badSetting('columns', message);
  const count = (kind: ColumnKind) => columns.filter((column) => column === kind).length;
  if (columns.slice(shape.fields).some((kind) => kind !== 'ignore')) {
    throw refuse(`${columns.length} columns are set; the rows of this file have ${shape.fields}.`);
  }
  if (count('frequency') !== 1) throw refuse(`One column must be the frequency; ${count('frequency')} are set.`);
  const isMagnitude = count('magnitude') === 1 && count('phase') <= 1 && count('real') + count('imaginary') === 0;
  const isPair = count('real') === 1 && count('imaginary') === 1 && count('magnitude') + count('phase') === 0;
  if (!isMagnitude && !isPair)
    throw refuse('Beside the frequency set magnitude, magnitude and phase, or real and imaginary part, once each.');
  const empty = columns.findIndex((kind, i) => kind !== 'ignore' && !shape.isNumber[i]);
  if (empty >= 0) throw refuse(`Column ${empty + 1} is set as ${columns[empty]}, but it holds no numbers.`);
  if (isPair && told.magnitudeUnit === 'dB')
    throw badSetting(
      'magnitudeUnit',
      'Real and imaginary parts have no level in dB. Choose ohm or kilohm, or set a magnitude column.',
    );
}
