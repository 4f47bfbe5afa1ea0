import type { UnitWord } from '../units.js';
import type { DialectGuess } from './guess-dialect.js';

/** What stands behind the numbers of a column: the same unit everywhere, several, or none. */
export interface AttachedUnit {
  readonly unit?: UnitWord | undefined; // of the kind that all share; its exponent only where that is shared too
  readonly isMixed: boolean;
}

/** Column `column` of the sampled rows, NaN where a row has no number there; multipliers of mixed units are applied. */
export function sampleColumn(guess: DialectGuess, column: number): Float64Array {
  const { isMixed } = attachedUnit(guess, column);
  return Float64Array.from(guess.rows, (row) => {
    const field = row[column];
    if (field?.kind !== 'number') return Number.NaN;
    return isMixed && field.unit ? field.value * 10 ** field.unit.exponent : field.value;
  });
}

export function attachedUnit(guess: DialectGuess, column: number): AttachedUnit {
  let unit: UnitWord | undefined;
  let isMixed = false;
  let bare = 0;
  for (const row of guess.rows) {
    const field = row[column];
    if (field?.kind !== 'number') continue;
    if (!field.unit) bare += 1;
    else if (!unit) unit = field.unit;
    else if (unit.exponent !== field.unit.exponent) {
      isMixed = true;
      if (unit.kind === 'none') unit = field.unit;
    }
  }
  if (!unit) return { isMixed: false };
  if (bare > 0 && unit.exponent !== 0) isMixed = true; // 990 and 1k
  return { unit: isMixed ? { ...unit, exponent: 0 } : unit, isMixed };
}

export interface SampleCurve {
  readonly frequency: Float64Array;
  readonly first: Float64Array;
  readonly second: Float64Array;
}

/** Three columns of the sample, rows with f > 0 and both numbers, in the order of the frequency, each frequency once. */
export function sampleCurve(guess: DialectGuess, columns: readonly [number, number, number]): SampleCurve {
  const [f, a, b] = columns.map((column) => sampleColumn(guess, column)) as [Float64Array, Float64Array, Float64Array];
  const order = [...f.keys()]
    .filter((i) => f[i]! > 0 && Number.isFinite(f[i]! + a[i]! + b[i]!))
    .sort((i, k) => f[i]! - f[k]!)
    .filter((i, at, all) => at === 0 || f[i] !== f[all[at - 1]!]);
  const pick = (values: Float64Array) => Float64Array.from(order, (i) => values[i]!);
  return { frequency: pick(f), first: pick(a), second: pick(b) };
}
