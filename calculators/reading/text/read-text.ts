import type { Guess, Reading, ReadingOverrides } from '../../../shared/contracts/reading.js';
import { InputError } from '../../../shared/errors.js';
import type { Finding } from '../../../shared/output.js';
import { readingText as words } from '../../../shared/text/reading.js';
import { BeyondAscii, type Characters, readCharacters } from './encoding.js';
import type { DialectGuess } from './recognise/guess-dialect.js';
import { told } from './recognise/guess-units.js';
import { phaseMisfit } from './recognise/minimum-phase.js';
import { guessesOf, type Recognised, recognise } from './recognise/recognise.js';
import { notACurve } from './recognise/refusals.js';
import { hasInk } from './recognise/sample.js';
import { attachedUnit } from './recognise/sample-curve.js';
import { type Points, toPoints } from './rows/curve.js';
import { finding } from './rows/findings.js';
import { type ScanPlan, scanRows, type TakenColumn } from './rows/scan-rows.js';
import { giveBack, type Table, type Watch } from './rows/table.js';
import { thin } from './rows/thin.js';

export interface TextReading {
  readonly points: Points;
  readonly isPair: boolean; // first and second are Re and Im, not |Z| and phase
  readonly reading: Reading;
  readonly findings: Finding[];
}

/** Reads a table of impedance from text: recognise, scan, clean, sort, average, thin. */
export function readText(bytes: Uint8Array, fileName: string, overrides: ReadingOverrides, watch: Watch): TextReading {
  const read = (looksAtAll: boolean) => {
    const text = readCharacters(bytes, overrides.encoding, watch.checkpoint, looksAtAll);
    return readFrom(text, fileName, overrides, watch);
  };
  try {
    return read(false);
  } catch (error) {
    if (error instanceof BeyondAscii) return read(true);
    throw error;
  }
}

function readFrom(text: Characters, fileName: string, overrides: ReadingOverrides, watch: Watch): TextReading {
  if (!hasInk(text.codes, 0, text.codes.length)) {
    throw new InputError('empty-file', 'This file holds no characters but blanks. Export the sweep again.', fileName);
  }
  const found = recognise(text, overrides, fileName);
  const isPair = found.columns.kinds.includes('real');
  const plan = planOf(found, isPair);
  const table = scanRows(text, plan, watch);
  refuseTable(table, fileName);
  const findings: Finding[] = [];
  const kind = {
    isPair,
    frequencyUnit: found.units.frequency.unit,
    magnitudeUnit: found.units.magnitude.unit,
    phaseUnit: found.units.phase.unit,
    isTurned: overrides.phaseSign === 'turned',
  };
  const views = toPoints(table, kind, fileName, findings, watch);
  thin(views, isPair, findings, watch);
  const { frequency, first, second } = views;
  const points = { frequency: frequency.slice(), first: first.slice(), second: second?.slice() };
  giveBack(table);
  const sign = checkSign(points, isPair, findings);
  findings.push(...skippedFindings(table));
  return { points, isPair, findings, reading: readingOf(found, table, overrides, sign) };
}

const EXPONENT = { Hz: 0, kHz: 3, MHz: 6, 'rad/s': 0, ohm: 0, kilohm: 3, dB: 0, degree: 0, radian: 0 } as const;

/** Frequency first, then |Z| or Re, then phase or Im. */
function planOf(found: Recognised, isPair: boolean): ScanPlan {
  const { guess, layout, columns, units } = found;
  const column = (kind: (typeof columns.kinds)[number]) => columns.kinds.indexOf(kind);
  const taken = (at: number, exponent: number): TakenColumn => {
    const { unit, isMixed } = attachedUnit(guess, at);
    return { column: at, exponent, unitExponent: isMixed ? 0 : (unit?.exponent ?? 0) };
  };
  const size = EXPONENT[units.magnitude.unit] + units.magnitude.extraExponent;
  const take = [taken(column('frequency'), EXPONENT[units.frequency.unit])];
  take.push(taken(column(isPair ? 'real' : 'magnitude'), size));
  if (isPair) take.push(taken(column('imaginary'), size));
  else if (column('phase') >= 0) take.push(taken(column('phase'), 0));
  const decimals = new Set(guess.rows.slice(0, -1).map((row) => row.at(-1)?.decimals ?? 0)); // but the last: it may be cut off
  const fixedDecimals = guess.rows.length >= 8 && decimals.size === 1 ? ([...decimals][0] ?? 0) : 0;
  const { dataStart, headerLines } = layout;
  const rowsExpected = Math.ceil((1.02 * (found.text.codes.length - dataStart)) / lengthOf(guess.rows)) + 16;
  const { dialect, shape } = guess;
  return { dialect, shape, take, dataStart, firstLine: headerLines + 1, fixedDecimals, rowsExpected };
}

/** Characters of a row, line end included: the mean of the later half of the sample. */
function lengthOf(rows: DialectGuess['rows']): number {
  const later = rows.slice(rows.length >> 1);
  const sum = later.reduce((total, row) => total + (row.at(-1)?.end ?? 0) - (row[0]?.start ?? 0) + 1, 0);
  return Math.max(2, sum / later.length);
}

function refuseTable(table: Table, fileName: string): void {
  if (table.rows === 0) {
    throw new InputError(
      'no-numeric-data',
      'No row of this file has a number in every column that is needed. Check the columns, or export the sweep again.',
      fileName,
    );
  }
  if (table.textLines > table.rows) throw notACurve(fileName);
}

function skippedFindings(table: Table): Finding[] {
  const found: Finding[] = [];
  if (table.truncatedLine > 0) {
    found.push(
      finding(
        'truncated-last-row',
        `Line ${table.truncatedLine}, the last one, is cut off; it was left out. Copy or export the file again if it should go on.`,
        { line: table.truncatedLine },
      ),
    );
  }
  if (table.secondTableLine > 0) {
    found.push(
      finding(
        'rows-skipped',
        `Line ${table.secondTableLine} starts a second table. Only the first was read; put the second into a file of its own.`,
        { firstLine: table.secondTableLine },
      ),
    );
  }
  const [first] = table.skipped;
  if (first) {
    const count = table.skippedCount;
    const others =
      count > 1 ? ` The other ${count - 1 === 1 ? 'one is' : `${count - 1} are`} listed with the reading.` : '';
    found.push(
      finding(
        'rows-skipped',
        `${count} ${count === 1 ? 'row was' : 'rows were'} left out. Line ${first.line} ${first.reason}.${others}`,
        { rows: count, firstLine: first.line },
      ),
    );
  }
  return found;
}

/** Whether the phase has the sign that the magnitude asks for; a reversed one is reported, never turned by itself. */
function checkSign(points: Points, isPair: boolean, findings: Finding[]): Guess {
  const guess = (confidence: number, settled: boolean, reason: string): Guess => ({
    confidence,
    settled,
    reason,
    toldByPerson: false,
  });
  const { frequency, first, second } = points;
  if (!second) return guess(1, true, words.noPhase);
  const lnMagnitude = first.map((value, i) => Math.log(isPair ? Math.hypot(value, second[i]!) : value));
  const phase = isPair ? second.map((value, i) => Math.atan2(value, first[i]!)) : second;
  const { asWritten, turned } = phaseMisfit(frequency, lnMagnitude, phase);
  if (asWritten > 15 && turned < 30 && turned < 0.5 * asWritten) {
    findings.push(
      finding(
        'phase-sign-flipped',
        `The phase looks reversed: it fits the magnitude within ${turned.toFixed(1)}° with the other sign, and within ${asWritten.toFixed(0)}° as it is. Turn the sign in the reading if the file counts capacitive phase as positive.`,
        { asWrittenDeg: asWritten, turnedDeg: turned },
      ),
    );
    return guess(0.3, false, words.signLooksTurned);
  }
  const isClear = turned > 3 * asWritten + 3;
  return isClear ? guess(0.98, true, words.signFits(asWritten)) : guess(0.8, false, words.signOpen);
}

function readingOf(found: Recognised, table: Table, overrides: ReadingOverrides, sign: Guess): Reading {
  const { text, guess, layout, columns, units } = found;
  return {
    format: 'text',
    encoding: text.encoding,
    ...guess.dialect,
    headerLines: layout.headerLines,
    columns: columns.kinds.slice(0, 64),
    frequencyUnit: units.frequency.unit,
    magnitudeUnit: units.magnitude.unit,
    phaseUnit: units.phase.unit,
    phaseSign: overrides.phaseSign ?? 'as-written',
    columnNames: layout.columnNames.slice(0, 64),
    guesses: guessesOf(found, overrides, overrides.phaseSign ? told : sign),
    skippedRows: table.skipped,
    skippedCount: table.skippedCount,
    rows: table.rows,
    comments: [...layout.comments, ...table.comments].slice(0, 200),
  };
}
