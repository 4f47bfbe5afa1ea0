import { expect, it } from 'vitest';
import { settingsSchema } from '../../../calculators/driver-fit/settings.js';
import { settingsFields } from '../../../calculators/kit/settings-fields.js';
import { driver, figureOf, fitted, freeAir, noisySweep, numberOf, withMass } from './driver-runs.js';

const inputs = {
  'free-air': freeAir(noisySweep(driver)),
  'added-mass': [withMass(0.02, noisySweep(driver, { mass: 0.02 }, 2))],
};

it.each([
  ['an unknown coil', { coil: 'spiral' }, 'coil'],
  ['a negative diameter', { pistonDiameter: -0.1 }, 'pistonDiameter'],
  ['diameter and area at once', { pistonDiameter: 0.1, pistonArea: 0.01 }, 'pistonArea'],
  ['a band upside down', { band: [500, 20] }, 'band'],
  ['two given figures', { given: { Mms: 0.03, Bl: 9 } }, 'given'],
  ['no given figure', { given: {} }, 'given'],
  ['a temperature in degrees Celsius', { air: { temperature: 20 } }, 'air'],
  ['a setting nobody knows', { colour: 'red' }, 'colour'],
  ['half a resampled refit', { bootstrap: 1.5 }, 'bootstrap'],
  ['not a number', { dcResistance: Number.NaN }, 'dcResistance'],
])('refuses %s as bad-setting and names it', (_, settings, where) => {
  expect(() => fitted(inputs, settings)).toThrow(
    expect.objectContaining({ name: 'InputError', code: 'bad-setting', where: expect.stringContaining(where) }),
  );
});

it.each([
  ['the free-air sweep', { 'added-mass': inputs['added-mass'] }, 'free-air'],
  ['the mass', { ...inputs, 'added-mass': [{ sweep: noisySweep(driver), keys: {} }] }, 'added-mass.mass'],
  ['the volume', { ...inputs, 'known-volume': [{ sweep: noisySweep(driver), keys: {} }] }, 'known-volume.volume'],
])('says missing-input where %s is missing', (_, given, where) => {
  expect(() => fitted(given)).toThrow(expect.objectContaining({ name: 'InputError', code: 'missing-input', where }));
});

it('labels every field of the form', () => {
  const flat = settingsFields(settingsSchema);
  expect(flat.length).toBeGreaterThanOrEqual(15);
  for (const { label, help, path } of flat) {
    expect(label, path.join('.')).not.toBe(path.at(-1));
    expect(help, path.join('.')).toMatch(/\w/);
  }
});

it.each([
  ['Mms', { Mms: driver.mms }],
  ['Bl', { Bl: driver.bl }],
  ['Cms', { Cms: driver.cms }],
])('takes a given %s in place of a loaded sweep', (_, given) => {
  const output = fitted({ 'free-air': inputs['free-air'] }, { given, pistonArea: driver.sd });
  expect(numberOf(output, 'Vas')).toBeCloseTo(0.06, 3);
  expect(numberOf(output, 'Bl')).toBeCloseTo(driver.bl, 1);
});

it('weighs a given figure against the sweeps by their uncertainties', () => {
  const output = fitted(inputs, { given: { Mms: 1.2 * driver.mms, uncertainty: 0.5 * driver.mms } });
  expect(numberOf(output, 'Mms')).toBeCloseTo(driver.mms, 3); // the vague figure hardly counts
});

it('takes a DC resistance measured apart as knowledge of Re', () => {
  const plain = fitted({ 'free-air': inputs['free-air'] });
  const told = fitted({ 'free-air': inputs['free-air'] }, { dcResistance: 6, dcResistanceUncertainty: 5e-4 });
  expect(figureOf(told, 'Re').uncertainty ?? 1).toBeLessThan(figureOf(plain, 'Re').uncertainty ?? 0);
  const causes = told.tables.find(({ id }) => id === 'budget')?.rows.filter(({ figure }) => figure === 'Re') ?? [];
  expect(causes.map(({ causeId }) => causeId)).toContain('dc-resistance');
});

it('fits only what lies inside the band', () => {
  const output = fitted({ 'free-air': inputs['free-air'] }, { band: [10, 2000] });
  const misfit = output.traces.find(({ id }) => id === 'misfit');
  expect(Math.max(...Array.from(misfit?.x ?? []))).toBeLessThanOrEqual(2000);
  expect(figureOf(output, 'Le10k').value).toBeNull();
  expect(numberOf(output, 'Qts')).toBeCloseTo(0.363636, 2);
});

it('tells air from its pressure: Vas follows it, and the uncertainty shrinks once it is told', () => {
  const run = (air?: Record<string, number>) => fitted(inputs, { pistonArea: driver.sd, air });
  const [untold, sea, high] = [run(), run({ pressure: 101_325 }), run({ pressure: 84_556 })];
  expect(numberOf(high, 'Vas') / numberOf(sea, 'Vas')).toBeCloseTo(84_556 / 101_325, 2); // ρc² = γp, but for the vapour
  expect(figureOf(untold, 'Vas').uncertainty ?? 0).toBeGreaterThan(2 * (figureOf(sea, 'Vas').uncertainty ?? 1));
});
