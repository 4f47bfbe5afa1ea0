import { z } from 'zod';

/**
 * How a text file was read: every guess, why, and how sure. A person can override any part; the overrides are
 * stored with the sweep, and the reading that came of them with its revision.
 */
export const ENCODINGS = ['utf-8', 'utf-16le', 'utf-16be', 'latin1'] as const;
export const SEPARATORS = ['tab', 'comma', 'semicolon', 'space'] as const;
export const COLUMN_KINDS = ['frequency', 'magnitude', 'phase', 'real', 'imaginary', 'ignore'] as const;
export const FREQUENCY_UNITS = ['Hz', 'kHz', 'MHz', 'rad/s'] as const;
export const MAGNITUDE_UNITS = ['ohm', 'kilohm', 'dB'] as const; // dB re 1 ohm
export const PHASE_UNITS = ['degree', 'radian'] as const;

const choices = {
  format: z.enum(['text', 'touchstone', 'wav']),
  encoding: z.enum(ENCODINGS),
  separator: z.enum(SEPARATORS),
  decimalMark: z.enum(['point', 'comma']),
  thousandsMark: z.enum(['none', 'comma', 'point', 'space', 'apostrophe']),
  headerLines: z.int().nonnegative().max(100_000), // lines before the first row of data, comments included
  columns: z.array(z.enum(COLUMN_KINDS)).min(2).max(64), // left to right
  frequencyUnit: z.enum(FREQUENCY_UNITS),
  magnitudeUnit: z.enum(MAGNITUDE_UNITS), // also of real and imaginary parts (dB does not apply there)
  phaseUnit: z.enum(PHASE_UNITS),
  phaseSign: z.enum(['as-written', 'turned']), // turned: the file counts capacitive phase as positive
};
export const ReadingOverridesSchema = z.strictObject(choices).partial();
export type ReadingOverrides = z.infer<typeof ReadingOverridesSchema>;
export type ReadingChoice = keyof ReadingOverrides;

/** Why a choice was made. `settled` is false where the data cannot decide: a person should look. */
export const GuessSchema = z.object({
  confidence: z.number().min(0).max(1),
  settled: z.boolean(),
  reason: z.string(), // "comma, because 598 of 600 lines agree"
  toldByPerson: z.boolean(),
});
export type Guess = z.infer<typeof GuessSchema>;
export const ReadingSchema = z.object({
  ...choices,
  columnNames: z.array(z.string()), // as written in the header, '' where unnamed
  guesses: z.partialRecord(z.enum(Object.keys(choices) as [ReadingChoice, ...ReadingChoice[]]), GuessSchema),
  skippedRows: z.array(z.object({ line: z.int(), reason: z.string() })).max(200), // the first 200
  skippedCount: z.int(),
  rows: z.int(), // rows of numbers taken
  comments: z.array(z.string()).max(200), // kept for ever; the rest stays in the source file
});
export type Reading = z.infer<typeof ReadingSchema>;
