import { expect, it } from 'vitest';
import { z } from 'zod';
import { assignRoles } from '../../../calculators/kit/assign-roles.js';
import { type CalculatorDefinition, defineCalculator } from '../../../calculators/kit/calculator.js';
import { EMPTY_OUTPUT } from '../../../shared/output.js';

const role = { help: '', needs: 'sweep', keys: {} } as const;
const calculator: CalculatorDefinition = defineCalculator({
  id: 'sum',
  version: 1,
  title: 'Sum',
  summary: '',
  quick: true,
  roles: {
    'free-air': { ...role, label: 'Free air', least: 1, most: 1 },
    'added-mass': {
      ...role,
      label: 'Added mass',
      least: 0,
      most: 5,
      keys: { mass: { label: 'Mass', unit: 'kg', required: true } },
    },
  },
  settings: z.strictObject({}),
  settingsVersion: 1,
  migrate: {},
  figures: [],
  run: () => EMPTY_OUTPUT,
});
const sweep = (sweepId: string, conditions: Parameters<typeof assignRoles>[1][number]['conditions']) => ({
  sweepId,
  itemId: null,
  conditions,
});

it('gives each sweep the role it was added with, and hands its mass on in kilograms', () => {
  const { roles, missing } = assignRoles(calculator, [
    sweep('a', { role: 'free-air' }),
    sweep('b', { role: 'added-mass', addedMassKg: 0.01 }),
  ]);
  expect(roles).toEqual({
    'free-air': [{ sweepId: 'a', keys: {} }],
    'added-mass': [{ sweepId: 'b', keys: { mass: 0.01 } }],
  });
  expect(missing).toEqual([]);
});

it('takes a sweep of no stated role where a required role is still open', () => {
  expect(assignRoles(calculator, [sweep('a', { role: 'sweep' })]).roles['free-air']).toEqual([
    { sweepId: 'a', keys: {} },
  ]);
});

it('leaves out an added-mass sweep whose mass was not told, and names the role that is missing', () => {
  const { roles, missing } = assignRoles(calculator, [sweep('b', { role: 'added-mass' })]);
  expect(roles['added-mass']).toEqual([]);
  expect(missing).toEqual([{ role: 'free-air', label: 'Free air', count: 1 }]);
});
