import { expect, it } from 'vitest';
import { referenceCases } from './reference-cases.js';
import { defectsOf } from './vas-cases.js';

/** Four drivers in a known closed volume, among them a volume too large and two sweeps declared the wrong way round (simulated, known truth). */
const folder = 'vas-known-volume';
const cases = referenceCases(folder).flatMap((item) => [
  [item.id, 'the model told', item, true] as const,
  [item.id, 'the model chosen', item, false] as const,
]);

it.each(cases)(
  '%s with %s gives every figure inside its tolerance and just the findings expected',
  (_, __, item, told) => {
    expect(defectsOf(folder, item, told)).toEqual([]);
  },
);
