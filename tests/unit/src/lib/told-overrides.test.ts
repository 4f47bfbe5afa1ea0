import { expect, it } from 'vitest';
import { readSweep } from '../../../../calculators/reading/read-sweep.js';
import { toldOverrides } from '../../../../src/lib/told-overrides.js';

const table = Array.from({ length: 40 }, (_, i) => `${10 * 1.2 ** i};${6 + i / 10};${i}`).join('\n');
const read = (overrides: Parameters<typeof readSweep>[1]['overrides']) =>
  readSweep(new TextEncoder().encode(table), { fileName: 'a.csv', overrides });

it('finds nothing told in a reading that was only recognised', () => {
  expect(toldOverrides(read({}).reading)).toEqual({});
});

it('finds exactly what a person said, so that the same words give the same reading again', () => {
  const told = { phaseSign: 'turned', magnitudeUnit: 'kilohm' } as const;
  const { reading } = read(told);
  expect(toldOverrides(reading)).toEqual(told);
  expect(read(toldOverrides(reading)).reading).toEqual(reading);
});
