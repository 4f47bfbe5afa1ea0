import type { Reading, ReadingOverrides } from '../../../shared/contracts/reading.js';
import type { SweepConditions } from '../../../shared/contracts/sweep.js';
import type { InputErrorCode } from '../../../shared/errors.js';
import type { Finding } from '../../../shared/output.js';
import { text } from '../../../shared/text.js';
import type { ReadOutcome } from '../../workers/pool.js';

export type EntryState =
  | 'reading'
  | 'ready'
  | 'look' // a guess that the data could not settle, or a remark of weight
  | 'refused'
  | 'here' // the same file is in the project, or twice in this drop
  | 'storing'
  | 'stored'
  | 'not-stored';

/** One dropped file on its way to becoming a sweep. Never changed in place. */
export interface Entry {
  readonly id: string;
  readonly file: File;
  readonly name: string;
  readonly overrides: ReadingOverrides;
  readonly conditions: SweepConditions;
  readonly itemId: string | null;
  readonly state: EntryState;
  readonly share: number; // of the work in hand, 0 to 1
  readonly outcome?: ReadOutcome;
  readonly reading?: Reading; // the last one that worked: what a correction starts from
  readonly sameAs?: string; // name of the sweep or file that holds the same bytes
  readonly error?: unknown; // why it could not be stored
}

export function newEntry(file: File): Entry {
  return {
    id: crypto.randomUUID(),
    file,
    name: file.name.replace(/\.[^.]{1,8}$/, '').slice(0, 120) || file.name,
    overrides: {},
    conditions: { role: 'sweep' },
    itemId: null,
    state: 'reading',
    share: 0,
  };
}

const ASSUMED: Reading = {
  format: 'text',
  encoding: 'utf-8',
  separator: 'comma',
  decimalMark: 'point',
  thousandsMark: 'none',
  headerLines: 0,
  columns: ['frequency', 'magnitude', 'phase'],
  frequencyUnit: 'Hz',
  magnitudeUnit: 'ohm',
  phaseUnit: 'degree',
  phaseSign: 'as-written',
  columnNames: [],
  guesses: {},
  skippedRows: [],
  skippedCount: 0,
  rows: 0,
  comments: [],
};

/** Refusals that another rule may cure; a web page or an archive stays one. */
const CURABLE: readonly InputErrorCode[] = [
  'no-numeric-data',
  'too-few-columns',
  'not-a-curve',
  'too-few-points',
  'single-frequency',
  'negative-frequency',
  'zero-impedance',
  'bad-setting',
];

/** The rule to show and correct: as read, or as told, or a plain one where text could not be read at all. */
export function ruleToShow({ outcome, reading, overrides }: Entry): Reading | undefined {
  if (!outcome) return undefined;
  if ('file' in outcome) return outcome.file.reading;
  if (outcome.lines.length === 0 || !CURABLE.includes(outcome.refused.code)) return undefined;
  return { ...(reading ?? ASSUMED), ...overrides };
}

/** What a person has to look at, guesses first. */
export function openQuestions(reading: Reading, findings: readonly Finding[]): boolean {
  const isUnsettled = Object.values(reading.guesses).some((guess) => guess && !guess.settled && !guess.toldByPerson);
  return isUnsettled || findings.some(({ severity }) => severity !== 'info');
}

/** What to look at first, in a few words. */
export function firstQuestion({ outcome }: Entry): string {
  if (!outcome || 'refused' in outcome) return '';
  const { reading, findings } = outcome.file;
  const choices = Object.entries(reading.guesses).filter(([, guess]) => guess && !guess.settled && !guess.toldByPerson);
  const choice = choices[0]?.[0] as keyof typeof reading.guesses | undefined;
  if (choice !== undefined && choice !== 'format') return text.unpack.guessOf(text.unpack.rule[choice]);
  return findings.find(({ severity }) => severity !== 'info')?.message ?? '';
}

export function stateAfterReading(outcome: ReadOutcome): EntryState {
  if ('refused' in outcome) return 'refused';
  return openQuestions(outcome.file.reading, outcome.file.findings) ? 'look' : 'ready';
}

/** The look of a file: files of one look were written by one program, so one rule fits them all. */
export function lookOf({ outcome }: Entry): string | undefined {
  if (!outcome || 'refused' in outcome) return undefined;
  const { separator, decimalMark, thousandsMark, columns, columnNames, encoding } = outcome.file.reading;
  return JSON.stringify([separator, decimalMark, thousandsMark, columns.length, columnNames, encoding]);
}

export function canBeStored({ state }: Entry): boolean {
  return state === 'ready' || state === 'look' || state === 'not-stored';
}

/** What the chosen role still lacks. */
export function missingCondition({ conditions }: Entry): 'addedMassKg' | 'testVolumeM3' | undefined {
  const { role, addedMassKg, testVolumeM3 } = conditions;
  if (role === 'added-mass' && addedMassKg === undefined) return 'addedMassKg';
  if (role === 'known-volume' && testVolumeM3 === undefined) return 'testVolumeM3';
  return undefined;
}
