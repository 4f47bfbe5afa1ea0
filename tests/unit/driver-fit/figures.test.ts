import { describe, expect, it } from 'vitest';
import { checkDriver } from '../../reference/check-driver.js';
import { type Complex, complex, type DriverParts, logFrequencies, sweepOf } from '../../reference/simulated-driver.js';
import { diameterM, driver, figureOf, fitted, freeAir, inBox, noisySweep, numberOf, withMass } from './driver-runs.js';

const clean = (parts: DriverParts, load = {}) => sweepOf(parts, logFrequencies(400, 5, 20_000), load);

describe('the check driver without noise', () => {
  // Worked by hand from R. H. Small's relations (J. Audio Eng. Soc. 20, 1972, from memory), ρ 1.2, c 343.
  const parts = checkDriver('inductor');
  const output = fitted(
    { 'free-air': freeAir(clean(parts)), 'added-mass': [withMass(0.02, clean(parts, { mass: 0.02 }))] },
    { pistonArea: parts.sd },
  );
  it.each([
    ['Qts', 0.363636, 1e-6],
    ['Cms', 8.780847e-4, 1e-10],
    ['Mms', 3.205246e-2, 1e-8],
    ['Bl', 9.51978, 1e-5],
    ['Rms', 1.51044, 1e-5],
    ['eta0', 0.003962, 1e-6],
    ['SPL1W', 88.122, 1e-3],
    ['SPL2V83', 89.371, 1e-3],
    ['EBP', 75, 1e-3],
    ['Res', 60, 1e-3],
    ['Vas', 0.06, 1e-7],
    ['Le1k', 0.8e-3, 1e-9],
  ])('gives %s', (id, value, within) => {
    expect(Math.abs(numberOf(output, id) - value)).toBeLessThan(within);
  });

  it('subtracts the air load of a bare disc from Mms, or twice that in a baffle', () => {
    const discKg = (8 / 3) * 1.2 * (parts.sd / Math.PI) ** 1.5; // Beranek, "Acoustics" (from memory): 1.875 g here
    expect(discKg).toBeCloseTo(1.875e-3, 6);
    expect(numberOf(output, 'Mms') - numberOf(output, 'Mmd')).toBeCloseTo(discKg, 8);
    const baffled = fitted(
      { 'free-air': freeAir(clean(parts)), 'added-mass': [withMass(0.02, clean(parts, { mass: 0.02 }))] },
      { pistonArea: parts.sd, mounting: 'baffle' },
    );
    expect(numberOf(baffled, 'Mms') - numberOf(baffled, 'Mmd')).toBeCloseTo(2 * discKg, 8);
  });
});

it('agrees with a published example file of a general finite-element package (2021)', () => {
  // Inputs and formulas published; outputs computed with ρ 1.2 and c 343.
  const [radius, rho, c] = [0.12, 1.2, 343];
  const sd = Math.PI * radius ** 2;
  const mms = 0.0334 + (2 * sd ** 2 * 8 * rho) / (3 * Math.PI ** 2 * radius);
  const coil = (w: number): Complex =>
    complex(6.89e-3 * w ** 0.7 * Math.cos(0.35 * Math.PI), 6.89e-3 * w ** 0.7 * Math.sin(0.35 * Math.PI));
  const parts: DriverParts = { re: 7, bl: 11.4, mms, cms: 1.18e-3, rms: 1.85, sd, coil };
  const output = fitted(
    { 'free-air': freeAir(clean(parts)), 'added-mass': [withMass(0.03, clean(parts, { mass: 0.03 }))] },
    { pistonArea: sd, air: { density: rho, speedOfSound: c }, mounting: 'baffle', coil: 'power-law' },
  );
  expect(numberOf(output, 'Mms')).toBeCloseTo(44.4592e-3, 7);
  expect(numberOf(output, 'Mmd')).toBeCloseTo(33.4e-3, 6);
  expect(numberOf(output, 'fs')).toBeCloseTo(21.97345, 4);
  expect(numberOf(output, 'Qes')).toBeCloseTo(0.330619, 5);
  expect(numberOf(output, 'Qms')).toBeCloseTo(3.317937, 4);
  expect(numberOf(output, 'Qts')).toBeCloseTo(0.30066, 5);
  expect(numberOf(output, 'Vas')).toBeCloseTo(0.340939, 5);
  expect(numberOf(output, 'eta0')).toBeCloseTo(0.0107034, 6);
  expect(numberOf(output, 'SPL1W')).toBeCloseTo(92.438, 3);
  expect(numberOf(output, 'EBP')).toBeCloseTo(66.46, 2);
  expect(numberOf(output, 'K')).toBeCloseTo(6.89e-3, 6);
  expect(numberOf(output, 'n')).toBeCloseTo(0.7, 5);
  expect(numberOf(output, 'Le1k')).toBeCloseTo(0.44529e-3, 7); // W. M. Leach, JAES 50 (2002): K(jω)^n at 1 kHz
});

it('agrees with a maker’s published driver sheet', () => {
  // Inputs and results both published; its coil follows two power laws.
  const coil = (w: number): Complex => complex(0.0022 * w ** 0.75, 0.0048 * w ** 0.76);
  const parts: DriverParts = {
    re: 6.18,
    bl: 11.325,
    mms: 38.839e-3,
    cms: 1 / 18.65e3,
    rms: 5.932,
    sd: 369.27e-4,
    coil,
  };
  const output = fitted(
    { 'free-air': freeAir(clean(parts)), 'added-mass': [withMass(0.03, clean(parts, { mass: 0.03 }))] },
    { pistonArea: parts.sd, air: { density: 1.21, speedOfSound: 345 } },
  );
  expect(numberOf(output, 'fs')).toBeCloseTo(110.287, 2);
  expect(numberOf(output, 'Qms')).toBeCloseTo(4.537, 3);
  expect(numberOf(output, 'Qes')).toBeCloseTo(1.2968, 3);
  expect(numberOf(output, 'Qts')).toBeCloseTo(1.0086, 3);
  expect(numberOf(output, 'Res')).toBeCloseTo(21.621, 2);
  expect(numberOf(output, 'Vas')).toBeCloseTo(10.5303e-3, 5);
  expect(numberOf(output, 'eta0')).toBeCloseTo(1.0474e-2, 5);
  expect(numberOf(output, 'Kr')).toBeCloseTo(0.0022, 5);
  expect(numberOf(output, 'Xi')).toBeCloseTo(0.76, 3);
  const at10k = 2 * Math.PI * 10_000;
  expect(numberOf(output, 'Rcoil10k')).toBeCloseTo(8.7309, 3);
  expect(numberOf(output, 'Le10k') * at10k).toBeCloseTo(21.2744, 2);
});

describe('what cannot be known', () => {
  it('has no value and a note, never a guess', () => {
    const output = fitted({ 'free-air': freeAir(noisySweep(driver)) });
    for (const id of ['Mms', 'Mmd', 'Cms', 'Rms', 'Bl', 'Vas', 'Sd', 'Dd', 'fc', 'eta0', 'SPL1W']) {
      expect(figureOf(output, id).value).toBeNull();
      expect(figureOf(output, id).note).toMatch(/\w/);
    }
    expect(numberOf(output, 'Qts')).toBeGreaterThan(0);
  });

  it('leaves the coil’s figures at 10 kHz open where the sweep ends below', () => {
    const output = fitted({ 'free-air': freeAir(sweepOf(driver, logFrequencies(200, 8, 4000))) });
    expect(figureOf(output, 'Le10k')).toMatchObject({ value: null, note: expect.stringContaining('4 kHz') });
    expect(numberOf(output, 'Le1k')).toBeGreaterThan(0);
  });

  it('gives Vas from a test box without a diameter, but not Mms', () => {
    const output = fitted({
      'free-air': freeAir(noisySweep(driver)),
      'known-volume': inBox(0.03, noisySweep(driver, { volume: 0.03 }, 2)),
    });
    expect(numberOf(output, 'Vas')).toBeCloseTo(0.06, 3);
    expect(figureOf(output, 'Mms').value).toBeNull();
    expect(output.findings.map(({ code }) => code)).toContain('diameter-missing');
  });

  it('infers the piston area from a mass and a box together', () => {
    const output = fitted({
      'free-air': freeAir(noisySweep(driver)),
      'added-mass': [withMass(0.02, noisySweep(driver, { mass: 0.02 }, 2))],
      'known-volume': inBox(0.03, noisySweep(driver, { volume: 0.03 }, 3)),
    });
    expect(numberOf(output, 'Sd')).toBeCloseTo(0.022, 4);
    expect(figureOf(output, 'Sd').uncertainty).toBeGreaterThan(0);
  });
});

describe('every uncertain figure', () => {
  const output = fitted(
    {
      'free-air': freeAir(noisySweep(driver)),
      'added-mass': [withMass(0.02, noisySweep(driver, { mass: 0.02 }, 2))],
    },
    { pistonDiameter: diameterM, pistonDiameterUncertainty: 0.005 * diameterM, massUncertainty: 2e-4 },
  );
  it('carries an uncertainty with its degrees of freedom, or a note why not', () => {
    for (const { id, value, uncertainty, note } of output.figures) {
      if (value !== null && uncertainty === undefined) expect(note, id).toMatch(/\w/);
    }
    expect(figureOf(output, 'fs').dof).toBeGreaterThan(100);
  });

  it('follows the law of propagation: four times the diameter’s relative uncertainty and the mass’s own reach Vas', () => {
    const relative = (figureOf(output, 'Vas').uncertainty ?? 0) / numberOf(output, 'Vas');
    expect(relative).toBeGreaterThan(Math.hypot(4 * 0.005, 0.01)); // JCGM 100:2008, 5.1; noise comes on top
    expect(relative).toBeLessThan(1.05 * Math.hypot(4 * 0.005, 0.01));
    const budget = output.tables.find(({ id }) => id === 'budget')?.rows.filter(({ figure }) => figure === 'Vas') ?? [];
    expect(budget[0]).toMatchObject({ causeId: 'diameter' });
    const shares = budget.reduce((sum, { share }) => sum + Number(share), 0);
    expect(shares).toBeGreaterThan(0.97);
    expect(shares).toBeLessThan(1.001);
  });

  it('says on top what holds Vas back, and what would help', () => {
    expect(output.summary).toContain('piston diameter');
    const next = output.tables.find(({ id }) => id === 'next')?.rows ?? [];
    expect(next.some(({ halves }) => halves === true)).toBe(true);
  });
});
