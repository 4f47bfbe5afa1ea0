import { expect, it } from 'vitest';
import { calculatorById } from '../../../../calculators/index.js';
import type { Card } from '../../../../shared/contracts/sheet.js';
import type { SweepRow } from '../../../../shared/contracts/sweep.js';
import { cardIdentityParts, cardInputs, staleReasons } from '../../../../src/features/sheet/card-inputs.js';

const definition = calculatorById('driver-fit');
if (!definition) throw new Error('driver-fit is not registered');
const FREE = '00000000-0000-4000-8000-000000000001';
const LOADED = '00000000-0000-4000-8000-000000000002';

function sweepRow(id: string, conditions: SweepRow['conditions'], pointsSha256 = id): SweepRow {
  const revision = { id: `revision of ${id}`, pointsSha256, number: 1 };
  return { id, name: id, conditions, itemId: null, revision } as unknown as SweepRow;
}
const free = sweepRow(FREE, { role: 'free-air' });
const loaded = sweepRow(LOADED, { role: 'added-mass', addedMassKg: 0.012 });
const card: Card = {
  id: FREE,
  calculatorId: 'driver-fit',
  inputs: { 'free-air': [{ sweepId: FREE, keys: {} }], 'added-mass': [{ sweepId: LOADED, keys: {} }] },
  settings: {},
  setupVersionId: null,
  resultId: null,
};
const partsOf = (asked: Card, sweeps: SweepRow[]) =>
  cardIdentityParts(asked, definition, cardInputs(asked, definition, sweeps).inputs);
const keptFrom = (asked: Card, sweeps: SweepRow[]) =>
  ({ ...partsOf(asked, sweeps), outOfDate: [] }) as unknown as Parameters<typeof staleReasons>[0];

it('takes the mass that was told with the sweep, and the card’s own where it says otherwise', () => {
  expect(cardInputs(card, definition, [free, loaded]).inputs[1]?.keys).toEqual({ mass: 0.012 });
  const own = { ...card, inputs: { ...card.inputs, 'added-mass': [{ sweepId: LOADED, keys: { mass: 0.01 } }] } };
  expect(cardInputs(own, definition, [free, loaded]).inputs[1]?.keys).toEqual({ mass: 0.01 });
});

it('says that an input is missing when its sweep is in the bin, instead of fitting without it', () => {
  expect(cardInputs(card, definition, [free]).isAnyMissing).toBe(true);
  expect(cardInputs(card, definition, [free, loaded]).isAnyMissing).toBe(false);
});

it('puts a kept result out of date exactly by what it was made from', () => {
  const kept = keptFrom(card, [free, loaded]);
  expect(staleReasons(kept, partsOf(card, [free, loaded]))).toEqual([]);
  expect(staleReasons(kept, partsOf({ ...card, settings: { coil: 'inductor' } }, [free, loaded]))).toEqual([
    'settings',
  ]);
  const heavier = sweepRow(LOADED, { role: 'added-mass', addedMassKg: 0.013 });
  expect(staleReasons(kept, partsOf(card, [free, heavier]))).toEqual(['inputs']);
  const reread = sweepRow(FREE, { role: 'free-air' }, 'other points');
  expect(staleReasons(kept, partsOf(card, [reread, loaded]))).toEqual(['reading']);
});
