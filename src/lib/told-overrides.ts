import { type Reading, type ReadingOverrides, ReadingOverridesSchema } from '../../shared/contracts/reading.js';

/** Of a reading, what a person had said: the same words again give the same reading. */
export function toldOverrides(reading: Reading): ReadingOverrides {
  const told = Object.entries(reading.guesses).filter(([, guess]) => guess?.toldByPerson);
  const values = told.map(([choice]) => [choice, reading[choice as keyof ReadingOverrides]]);
  return ReadingOverridesSchema.parse(Object.fromEntries(values));
}
