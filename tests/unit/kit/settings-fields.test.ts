import { expect, it } from 'vitest';
import { z } from 'zod';
import { settingsFields } from '../../../calculators/kit/settings-fields.js';

const schema = z.strictObject({
  coil: z.enum(['auto', 'inductor']).default('auto').meta({ label: 'Voice coil', help: 'Which model.' }),
  pistonDiameter: z.number().positive().max(1).optional().meta({ label: 'Piston diameter', unit: 'm' }),
  band: z.tuple([z.number().positive(), z.number().positive()]).optional().meta({ label: 'Band', unit: 'Hz' }),
  robust: z.boolean().default(true).meta({ label: 'Ignore wild points' }),
  refits: z.int().min(0).max(1000).default(0).meta({ label: 'Refits' }),
  volume: z.number().meta({ label: 'Volume', unit: 'm³' }),
  air: z
    .union([
      z.strictObject({ temperature: z.number().optional().meta({ label: 'Temperature', unit: 'K' }) }),
      z.strictObject({ density: z.number().meta({ label: 'Density', unit: 'kg/m³' }) }),
    ])
    .optional()
    .meta({ label: 'Air' }),
});

it('turns each kind of setting into a field with its label, unit, range and default', () => {
  const fields = settingsFields(schema);
  expect(fields.map((field) => field.kind)).toEqual([
    'choice',
    'number',
    'range',
    'toggle',
    'number',
    'number',
    'alternatives',
  ]);
  expect(fields[0]).toMatchObject({ label: 'Voice coil', options: ['auto', 'inductor'], preset: 'auto' });
  expect(fields[1]).toMatchObject({ unit: 'm', least: 0, most: 1, isInteger: false, required: false });
  expect(fields[4]).toMatchObject({ isInteger: true, least: 0, most: 1000, preset: 0 });
  expect(fields[5]).toMatchObject({ required: true });
});

it('reaches into groups with the whole path, so that a form can set a nested value', () => {
  const air = settingsFields(schema).find((field) => field.kind === 'alternatives');
  expect(air?.kind === 'alternatives' && air.alternatives.map((group) => group.fields[0]?.path)).toEqual([
    ['air', 'temperature'],
    ['air', 'density'],
  ]);
});
