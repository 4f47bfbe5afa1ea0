import type { COLUMN_KINDS, ReadingOverrides } from '../../../../shared/contracts/reading.js';
import type { ColumnMeaning } from './column-names.js';
import type { DialectGuess } from './guess-dialect.js';
import { phaseMisfit } from './minimum-phase.js';
import { sampleColumn, sampleCurve } from './sample-curve.js';

export type ColumnKind = (typeof COLUMN_KINDS)[number];
type Pair = 'magnitude+phase' | 'real+imaginary' | 'phase+magnitude';

export interface ColumnsGuess {
  readonly kinds: readonly ColumnKind[];
  readonly because: 'named' | 'data' | 'custom';
  readonly misfitDeg?: number | undefined; // how well the phase fits the magnitude in the chosen sense
  readonly rivalDeg?: number | undefined; // the next best sense
  readonly magnitudeUnit?: 'ohm' | 'dB' | undefined; // where the data chose it
  readonly phaseUnit?: 'degree' | 'radian' | undefined;
}

/** Decides what each column holds: by its name where it has one, by the data otherwise. Undefined: no two columns of numbers. */
export function guessColumns(
  guess: DialectGuess,
  meanings: readonly ColumnMeaning[],
  told: ReadingOverrides,
): ColumnsGuess | undefined {
  const numeric = [...guess.shape.isNumber.keys()].filter((i) => guess.shape.isNumber[i]);
  const named = (kind: ColumnMeaning['kind']) => numeric.filter((i) => meanings[i]?.kind === kind);
  const free = numeric.filter((i) => meanings[i]?.kind !== 'other');
  const unnamed = free.filter((i) => meanings[i]?.kind === undefined);
  const guessed =
    named('frequency').length > 0 ? { frequency: named('frequency')[0], counts: [] } : steadiest(guess, unnamed);
  const { frequency, counts } = guessed;
  if (frequency === undefined) return undefined;
  const rest = free.filter((i) => i !== frequency && meanings[i]?.kind !== 'frequency' && !counts.includes(i));
  if (rest.length === 0) return undefined;
  const { first, second } = pairOf(rest, (kind) => named(kind).filter((i) => rest.includes(i)));
  const kinds: ColumnKind[] = guess.shape.isNumber.map(() => 'ignore');
  kinds[frequency] = 'frequency';
  const because = () => (kinds.every((kind, i) => kind === 'ignore' || meanings[i]?.kind === kind) ? 'named' : 'data');
  if (second === undefined) {
    kinds[first] = 'magnitude';
    return { kinds, because: because() };
  }
  const senses = weigh(guess, [frequency, first, second], [meanings[first] ?? {}, meanings[second] ?? {}], told);
  const best = senses[0];
  if (!best) return undefined;
  const [a, b] = best.pair.split('+') as [ColumnKind, ColumnKind];
  kinds[first] = a;
  kinds[second] = b;
  const { magnitudeUnit, phaseUnit, misfitDeg } = best;
  return { kinds, because: because(), misfitDeg, rivalDeg: senses[1]?.misfitDeg, magnitudeUnit, phaseUnit };
}

/** The two columns that make up the impedance: named ones if there are, else the first two beside the frequency. */
function pairOf(
  rest: readonly number[],
  named: (kind: ColumnMeaning['kind']) => number[],
): { first: number; second?: number | undefined } {
  const magnitude = named('magnitude')[0];
  const phases = named('phase');
  const [real, imaginary] = [named('real')[0], named('imaginary')[0]];
  if (magnitude !== undefined && phases.length > 0) {
    return { first: magnitude, second: phases.find((i) => i > magnitude) ?? phases[0] };
  }
  if (real !== undefined && imaginary !== undefined) return { first: real, second: imaginary };
  const unnamed = rest.filter((i) => named(undefined).includes(i));
  if (magnitude !== undefined) return { first: magnitude, second: unnamed.find((i) => i > magnitude) };
  const first = unnamed.find((i) => phases.length === 0 || i !== phases[0]);
  if (first !== undefined) return { first, second: phases[0] ?? unnamed.find((i) => i > first) };
  return { first: rest[0]!, second: undefined };
}

interface Sense {
  readonly pair: Pair;
  readonly magnitudeUnit?: 'ohm' | 'dB';
  readonly phaseUnit?: 'degree' | 'radian';
  readonly penaltyDeg: number; // the usual sense wins where the data cannot tell
  readonly misfitDeg: number;
}
const SENSES: readonly Omit<Sense, 'misfitDeg'>[] = [
  { pair: 'magnitude+phase', magnitudeUnit: 'ohm', phaseUnit: 'degree', penaltyDeg: 0 },
  { pair: 'magnitude+phase', magnitudeUnit: 'ohm', phaseUnit: 'radian', penaltyDeg: 2 },
  { pair: 'real+imaginary', penaltyDeg: 1 },
  { pair: 'magnitude+phase', magnitudeUnit: 'dB', phaseUnit: 'degree', penaltyDeg: 4 },
  { pair: 'magnitude+phase', magnitudeUnit: 'dB', phaseUnit: 'radian', penaltyDeg: 6 },
  { pair: 'phase+magnitude', magnitudeUnit: 'ohm', phaseUnit: 'degree', penaltyDeg: 4 },
  { pair: 'phase+magnitude', magnitudeUnit: 'ohm', phaseUnit: 'radian', penaltyDeg: 6 },
];

/** The senses that the names and the person leave open, the most likely first. */
function weigh(
  guess: DialectGuess,
  columns: readonly [number, number, number],
  meanings: readonly [ColumnMeaning, ColumnMeaning],
  told: ReadingOverrides,
): Sense[] {
  const curve = sampleCurve(guess, columns);
  const open = SENSES.filter((sense) => {
    const kinds = sense.pair.split('+');
    return kinds.every((kind, i) => {
      const { kind: name, unit } = meanings[i] as ColumnMeaning;
      if (name && name !== kind) return false;
      if (kind === 'magnitude' && unit?.kind === 'level') return sense.magnitudeUnit === 'dB';
      if (kind === 'magnitude' && unit?.kind === 'impedance') return sense.magnitudeUnit === 'ohm';
      if (kind === 'phase' && unit?.kind === 'angle') return sense.phaseUnit === unit.unit;
      return true;
    });
  });
  const wanted = open.filter(
    (sense) =>
      (!told.phaseUnit || !sense.phaseUnit || sense.phaseUnit === told.phaseUnit) &&
      (!told.magnitudeUnit || !sense.magnitudeUnit || (sense.magnitudeUnit === 'dB') === (told.magnitudeUnit === 'dB')),
  );
  const usable = wanted.length > 0 ? wanted : open;
  return usable
    .map((sense) => ({ ...sense, misfitDeg: misfitOf(sense, curve) }))
    .sort((a, b) => a.misfitDeg + a.penaltyDeg - (b.misfitDeg + b.penaltyDeg));
}

function misfitOf(sense: Omit<Sense, 'misfitDeg'>, curve: ReturnType<typeof sampleCurve>): number {
  const [size, angle] = sense.pair === 'phase+magnitude' ? [curve.second, curve.first] : [curve.first, curve.second];
  const isPair = sense.pair === 'real+imaginary';
  const isLevel = sense.magnitudeUnit === 'dB';
  const usable = [...size.keys()].filter((i) => isLevel || size[i]! > 0); // a passive part has |Z| and Re Z above zero
  if (curve.frequency.length < 8) return 90;
  if (usable.length < 0.9 * size.length) return 170;
  const turn = sense.phaseUnit === 'radian' ? 1 : Math.PI / 180;
  const lnMagnitude = usable.map((i) => {
    if (isPair) return Math.log(Math.hypot(size[i]!, angle[i]!));
    return isLevel ? (size[i]! * Math.LN10) / 20 : Math.log(size[i]!);
  });
  const phase = usable.map((i) => (isPair ? Math.atan2(angle[i]!, size[i]!) : angle[i]! * turn));
  const frequency = usable.map((i) => curve.frequency[i]!);
  const { asWritten, turned } = phaseMisfit(frequency, lnMagnitude, phase);
  return Math.min(asWritten, turned + 3);
}

/** The column that is most like a frequency: steady, positive, first. A mere count of rows (0, 1, 2 …) beside a better one is none. */
function steadiest(guess: DialectGuess, candidates: readonly number[]) {
  const columns = candidates.map((column) => {
    const values = sampleColumn(guess, column);
    const steady = 1 - turns(values) / Math.max(1, values.length / 2);
    const positive = values.every((value) => !(value < 0));
    const reachesUp = steady === 1 && positive && values.some((value) => value > 500);
    return {
      column,
      values,
      reachesUp,
      score: 2 * steady + (positive ? 0.5 : 0) + (column === candidates[0] ? 0.6 : 0),
    };
  });
  const isMereCount = ({ values, column }: (typeof columns)[number]) =>
    candidates.length > 2 && isCount(values) && columns.some((other) => other.column !== column && other.reachesUp);
  const best = columns.filter((entry) => !isMereCount(entry)).sort((a, b) => b.score - a.score)[0];
  return { frequency: best?.column, counts: columns.filter(isMereCount).map((entry) => entry.column) };
}

function isCount(values: Float64Array): boolean {
  const first = values[0]!;
  return (first === 0 || first === 1) && values.every((value, i) => i >= 40 || value === first + i);
}

/** How many steps go against the greater number of steps; equal neighbours count as half. */
function turns(values: Float64Array): number {
  let up = 0;
  let down = 0;
  let level = 0;
  for (let i = 1; i < values.length; i += 1) {
    const step = values[i]! - values[i - 1]!;
    if (step > 0) up += 1;
    else if (step < 0) down += 1;
    else level += 1;
  }
  return Math.min(up, down) + level / 2;
}
