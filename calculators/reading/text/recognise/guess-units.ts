import type { Guess, Reading, ReadingOverrides } from '../../../../shared/contracts/reading.js';
import { readingText as words } from '../../../../shared/text/reading.js';
import type { UnitWord } from '../units.js';
import type { ColumnMeaning } from './column-names.js';
import type { ColumnsGuess } from './guess-columns.js';
import type { DialectGuess } from './guess-dialect.js';
import { attachedUnit, sampleColumn } from './sample-curve.js';

export interface UnitChoice<Unit extends string> {
  readonly unit: Unit;
  readonly guess: Guess;
  readonly extraExponent: number; // power of ten that the unit's own name does not say (MOhm: 6)
}
export interface UnitsGuess {
  readonly frequency: UnitChoice<Reading['frequencyUnit']>;
  readonly magnitude: UnitChoice<Reading['magnitudeUnit']>;
  readonly phase: UnitChoice<Reading['phaseUnit']>;
}
type Evidence = { readonly unit: UnitWord; readonly by: 'attached' | 'named' };

export const told: Guess = { confidence: 1, settled: true, reason: words.told, toldByPerson: true };
const guessed = (confidence: number, settled: boolean, reason: string): Guess => ({
  confidence,
  settled,
  reason,
  toldByPerson: false,
});

/** The units of the columns: as the person says, as attached to the numbers, as named, or as the data suggests. */
export function guessUnits(
  guess: DialectGuess,
  columns: ColumnsGuess,
  meanings: readonly ColumnMeaning[],
  overrides: ReadingOverrides,
): UnitsGuess {
  const at = (...kinds: string[]) => columns.kinds.findIndex((kind) => kinds.includes(kind));
  const evidence = (column: number): Evidence | undefined => {
    if (column < 0) return undefined;
    const attached = attachedUnit(guess, column).unit;
    if (attached && attached.kind !== 'none') return { unit: attached, by: 'attached' };
    const named = meanings[column]?.unit;
    return named ? { unit: named, by: 'named' } : undefined;
  };
  return {
    frequency: frequencyUnit(guess, at('frequency'), evidence(at('frequency')), overrides.frequencyUnit),
    magnitude: magnitudeUnit(guess, evidence(at('magnitude', 'real')), columns, overrides.magnitudeUnit),
    phase: phaseUnit(evidence(at('phase')), columns, overrides.phaseUnit),
  };
}

function frequencyUnit(
  guess: DialectGuess,
  column: number,
  evidence: Evidence | undefined,
  given?: Reading['frequencyUnit'],
): UnitsGuess['frequency'] {
  if (given) return { unit: given, guess: told, extraExponent: 0 };
  if (evidence?.unit.kind === 'frequency') {
    const { unit: name, exponent } = evidence.unit;
    const unit = name === 'rad/s' ? 'rad/s' : exponent === 3 ? 'kHz' : exponent === 6 ? 'MHz' : 'Hz';
    return { unit, guess: guessed(1, true, words.unitBy(unit, evidence.by)), extraExponent: 0 };
  }
  const values = sampleColumn(guess, column).filter((value) => value > 0);
  const least = values.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const most = values.reduce((a, b) => Math.max(a, b), 0);
  if (most <= 100 && least <= 0.5 && most / least >= 20) {
    return { unit: 'kHz', guess: guessed(0.7, false, words.frequencyLooksLike('kHz', least, most)), extraExponent: 0 };
  }
  const isClear = most >= 1000 && most <= 400_000;
  return {
    unit: 'Hz',
    guess: guessed(isClear ? 0.95 : 0.8, isClear, words.frequencyLooksLike('Hz', least, most)),
    extraExponent: 0,
  };
}

function magnitudeUnit(
  guess: DialectGuess,
  evidence: Evidence | undefined,
  columns: ColumnsGuess,
  given?: Reading['magnitudeUnit'],
): UnitsGuess['magnitude'] {
  if (given) return { unit: given, guess: told, extraExponent: 0 };
  if (evidence?.unit.kind === 'level')
    return { unit: 'dB', guess: guessed(1, true, words.unitBy('dB', evidence.by)), extraExponent: 0 };
  if (evidence?.unit.kind === 'impedance') {
    const { exponent } = evidence.unit;
    const unit = exponent === 3 ? 'kilohm' : 'ohm';
    return {
      unit,
      guess: guessed(1, true, words.unitBy(unit, evidence.by)),
      extraExponent: exponent === 3 ? 0 : exponent,
    };
  }
  if (columns.magnitudeUnit === 'dB')
    return { unit: 'dB', guess: guessed(0.8, false, words.levelByPhase), extraExponent: 0 };
  const magnitude = columns.kinds.indexOf('magnitude');
  const values = magnitude < 0 ? [] : sampleColumn(guess, magnitude);
  if (values.filter((value) => value < 0).length > 0.02 * values.length) {
    return { unit: 'dB', guess: guessed(0.7, false, words.levelBelowZero), extraExponent: 0 };
  }
  return { unit: 'ohm', guess: guessed(0.9, false, words.ohmUnnamed), extraExponent: 0 };
}

function phaseUnit(
  evidence: Evidence | undefined,
  columns: ColumnsGuess,
  given?: Reading['phaseUnit'],
): UnitsGuess['phase'] {
  if (given) return { unit: given, guess: told, extraExponent: 0 };
  if (!columns.kinds.includes('phase'))
    return { unit: 'degree', guess: guessed(1, true, words.noPhaseColumn), extraExponent: 0 };
  if (evidence?.unit.kind === 'angle') {
    const unit = evidence.unit.unit === 'radian' ? 'radian' : 'degree';
    return { unit, guess: guessed(1, true, words.unitBy(unit, evidence.by)), extraExponent: 0 };
  }
  const { misfitDeg = 90, rivalDeg = 90, phaseUnit: unit = 'degree' } = columns;
  const isClear = rivalDeg > 3 * misfitDeg + 3;
  return {
    unit,
    guess: guessed(isClear ? 0.98 : 0.6, isClear, words.phaseUnitByFit(unit, misfitDeg, isClear)),
    extraExponent: 0,
  };
}
