import type { Guess, Reading, ReadingOverrides } from '../../../../shared/contracts/reading.js';
import { readingText as words } from '../../../../shared/text/reading.js';
import { QUOTE } from '../characters.js';
import { type Characters, refuseHighCodes } from '../encoding.js';
import { type ColumnsGuess, guessColumns } from './guess-columns.js';
import { type DialectGuess, guessDialect } from './guess-dialect.js';
import { guessUnits, told, type UnitsGuess } from './guess-units.js';
import { findLayout, type Layout } from './layout.js';
import { badSetting, noTable, notACurve, numbersIn, refuseClash, refuseColumns, refuseDialect } from './refusals.js';
import { sampleLines } from './sample.js';
import { attachedUnit } from './sample-curve.js';

/** All that is decided before the rows are read. */
export interface Recognised {
  readonly text: Characters;
  readonly guess: DialectGuess;
  readonly layout: Layout;
  readonly columns: ColumnsGuess;
  readonly units: UnitsGuess;
}

/** Decides separator, decimal mark, headings, columns and units from a sample of the lines and from what the person set. */
export function recognise(text: Characters, overrides: ReadingOverrides, fileName: string): Recognised {
  refuseClash(overrides, text.codes.includes(QUOTE));
  const lines = sampleLines(text.codes);
  if (text.isAssumed) for (const { start, end } of lines) refuseHighCodes(text.codes, start, end);
  const guess = guessDialect(text, lines, overrides);
  if (!guess || numbersIn(guess.shape) < 2) {
    const isFree = !overrides.separator && !overrides.decimalMark && !overrides.thousandsMark;
    throw (isFree ? undefined : refuseDialect(overrides, guessDialect(text, lines, {}))) ?? noTable(guess, fileName);
  }
  if (guess.agreeing < 8 && guess.lines > 40 && guess.agreeing < 0.2 * guess.lines) throw notACurve(fileName);
  if (isProse(guess)) throw notACurve(fileName);
  const layout = findLayout(text, guess, overrides.headerLines);
  if (!layout) {
    if (overrides.headerLines === undefined) throw notACurve(fileName);
    throw badSetting(
      'headerLines',
      `${overrides.headerLines} header lines are set, but the file has no more lines than that.`,
    );
  }
  const meanings = layout.meanings.length > 0 ? layout.meanings : attachedMeanings(guess);
  const columns = chooseColumns(guess, meanings, overrides, fileName);
  return { text, guess, layout, columns, units: guessUnits(guess, columns, meanings, overrides) };
}

/** Sentences that are much alike part into words and numbers in the same places. */
const isProse = ({ dialect, shape }: DialectGuess): boolean =>
  dialect.separator === 'space' && shape.fields > 2 * numbersIn(shape);

const KIND_OF_UNIT = {
  frequency: 'frequency',
  impedance: 'magnitude',
  angle: 'phase',
  level: undefined,
  none: undefined,
} as const;

/** What units behind the numbers say about columns that have no names. */
function attachedMeanings(guess: DialectGuess): Layout['meanings'] {
  return guess.shape.isNumber.map((_, column) => {
    const { unit } = attachedUnit(guess, column);
    return { kind: unit && KIND_OF_UNIT[unit.kind], unit };
  });
}

function chooseColumns(
  guess: DialectGuess,
  meanings: Layout['meanings'],
  overrides: ReadingOverrides,
  fileName: string,
): ColumnsGuess {
  if (overrides.columns) {
    refuseColumns(overrides.columns, guess.shape, overrides);
    const kinds = guess.shape.isNumber.map((_, i) => overrides.columns?.[i] ?? 'ignore');
    const { misfitDeg, rivalDeg, magnitudeUnit, phaseUnit } = senseOf(guess, kinds, meanings, overrides);
    return { kinds, because: 'custom', misfitDeg, rivalDeg, magnitudeUnit, phaseUnit };
  }
  const columns = guessColumns(guess, meanings, overrides);
  if (!columns)
    throw notACurve(fileName, 'No column of this table looks like a frequency with an impedance beside it.');
  if (overrides.magnitudeUnit === 'dB' && columns.kinds.includes('real')) {
    throw badSetting(
      'magnitudeUnit',
      'Real and imaginary parts have no level in dB. Choose ohm or kilohm, or set a magnitude column.',
    );
  }
  return columns;
}

/** With the columns set by the person, the data still chooses the units that nothing names. */
function senseOf(
  guess: DialectGuess,
  kinds: ColumnsGuess['kinds'],
  meanings: Layout['meanings'],
  overrides: ReadingOverrides,
): Partial<ColumnsGuess> {
  const asTold = kinds.map((kind, i) =>
    kind === 'ignore' ? { kind: 'other' as const } : { kind, unit: meanings[i]?.unit },
  );
  return guessColumns(guess, asTold, overrides) ?? {};
}

/** The reasons beside each choice. */
export function guessesOf(found: Recognised, overrides: ReadingOverrides, sign: Guess): Reading['guesses'] {
  const { text, guess, layout, columns, units } = found;
  const { separator, decimalMark, thousandsMark } = guess.dialect;
  const share = guess.agreeing / Math.max(1, guess.lines - Math.min(layout.headerLines, guess.lines - guess.agreeing));
  const rival = guess.rival && words.rival(guess.rival.separator, guess.rival.decimalMark, guess.rival.thousandsMark);
  const plain = (confidence: number, settled: boolean, reason: string): Guess => ({
    confidence,
    settled,
    reason,
    toldByPerson: false,
  });
  const marked = (reason: string) => plain(rival ? 0.6 : 1, !rival, rival ? `${reason} ${rival}` : reason);
  const guesses: Reading['guesses'] = {
    format: plain(1, true, words.format),
    encoding: plain(text.reason === 'not-utf-8' ? 0.8 : 1, text.reason !== 'not-utf-8', words.encoding[text.reason]),
    separator: plain(
      Math.min(1, share),
      !rival || guess.rival?.separator === separator,
      words.separator(separator, guess.agreeing, guess.lines),
    ),
    decimalMark: marked(hasDecimals(guess) ? words.decimalByNumbers(decimalMark) : words.decimalUnseen),
    thousandsMark: marked(thousandsMark === 'none' ? words.noThousands : words.thousands(thousandsMark)),
    headerLines: plain(1, true, words.headerLines(layout.headerLines)),
    columns: columnsGuess(columns, layout, plain),
    frequencyUnit: units.frequency.guess,
    magnitudeUnit: units.magnitude.guess,
    phaseUnit: units.phase.guess,
    phaseSign: sign,
  };
  for (const key of Object.keys(overrides) as (keyof ReadingOverrides)[])
    if (overrides[key] !== undefined) guesses[key] = told;
  return guesses;
}

const hasDecimals = (guess: DialectGuess) => guess.rows.some((row) => row.some((field) => field.decimals > 0));

function columnsGuess(
  columns: ColumnsGuess,
  layout: Layout,
  plain: (confidence: number, settled: boolean, reason: string) => Guess,
): Guess {
  if (columns.because === 'named') {
    return layout.meanings.length > 0
      ? plain(1, true, words.columnsNamed(layout.columnNames))
      : plain(1, true, words.columnsByUnits);
  }
  const { misfitDeg, rivalDeg = 90 } = columns;
  if (misfitDeg === undefined) return plain(0.85, false, words.columnsByOrder);
  const isClear = rivalDeg > 3 * misfitDeg + 3;
  return isClear ? plain(0.97, true, words.columnsByPhase(misfitDeg)) : plain(0.7, false, words.columnsByOrder);
}
