import { expect, it } from 'vitest';
import { type ResultInputs, resultIdentity } from '../../../shared/result-identity.js';

const base: ResultInputs = {
  calculatorId: 'driver-fit',
  calculatorVersion: 1,
  settings: { coil: 'auto', suspension: 'auto' },
  settingsVersion: 1,
  seed: 1,
  inputs: [
    {
      role: 'free-air',
      sweepId: '00000000-0000-4000-8000-000000000001',
      revisionId: '00000000-0000-4000-8000-000000000002',
      pointsSha256: 'a'.repeat(64),
      keys: {},
      prepSteps: [],
    },
  ],
};
const [input] = base.inputs;

it('is the same for the same content under other ids and in another order of settings', () => {
  const elsewhere: ResultInputs = {
    ...base,
    settings: { suspension: 'auto', coil: 'auto' },
    inputs: [{ ...input!, sweepId: '00000000-0000-4000-8000-000000000009' }],
  };
  expect(resultIdentity(elsewhere)).toBe(resultIdentity(base));
});

it.each<[string, Partial<ResultInputs>]>([
  ['the points', { inputs: [{ ...input!, pointsSha256: 'b'.repeat(64) }] }],
  ['the role', { inputs: [{ ...input!, role: 'added-mass' }] }],
  ['what was told with a sweep', { inputs: [{ ...input!, keys: { mass: 0.01 } }] }],
  ['the prep steps', { inputs: [{ ...input!, prepSteps: [{ step: 'trim', low: 20 }] }] }],
  ['a setting', { settings: { coil: 'power-law', suspension: 'auto' } }],
  ['the calculator version', { calculatorVersion: 2 }],
  ['the seed', { seed: 2 }],
])('changes with %s', (_, change) => {
  expect(resultIdentity({ ...base, ...change })).not.toBe(resultIdentity(base));
});
