import { expect, it } from 'vitest';
import { type Lineage, outOfDateReasons } from '../../../shared/out-of-date.js';

const one = { number: 1, pointsSha256: 'a' };
const two = { number: 2, pointsSha256: 'b' };
const current: Lineage = {
  calculator: { made: 3, now: 3 },
  setup: { made: 4, now: 4 },
  sweeps: [{ sweepId: 's1', isDeleted: false, made: one, now: one }],
};

it('calls a result current while nothing of its inputs has moved on', () => {
  expect(outOfDateReasons(current)).toEqual([]);
});

it('names each thing that has moved on, with what it was and what it is', () => {
  const moved: Lineage = {
    calculator: { made: 3, now: 5 },
    setup: { made: 4, now: 6 },
    sweeps: [
      { sweepId: 's1', isDeleted: false, made: one, now: two },
      { sweepId: 's2', isDeleted: true, made: one, now: one },
    ],
  };
  expect(outOfDateReasons(moved)).toEqual([
    { what: 'calculator', from: '3', to: '5' },
    { what: 'setup', from: '4', to: '6' },
    { what: 'reading', sweepId: 's1', from: '1', to: '2' },
    { what: 'sweep-deleted', sweepId: 's2', from: '1', to: '' },
  ]);
});

it('does not count a newer reading that gave the same points', () => {
  const same = { ...two, pointsSha256: one.pointsSha256 };
  const sweeps = [{ sweepId: 's1', isDeleted: false, made: one, now: same }];
  expect(outOfDateReasons({ ...current, sweeps })).toEqual([]);
});

it('names a sweep once, however many roles it plays', () => {
  const twice = { sweepId: 's1', isDeleted: true, made: one, now: one };
  expect(outOfDateReasons({ ...current, sweeps: [twice, twice] })).toHaveLength(1);
});

it('has nothing to compare with when the calculator is not in the registry or no setup was used', () => {
  expect(outOfDateReasons({ ...current, calculator: { made: 3, now: undefined }, setup: undefined })).toEqual([]);
});
