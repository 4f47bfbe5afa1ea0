import { describe, expect, it } from 'vitest';
import { driverFit } from '../../../calculators/driver-fit/index.js';

import { runCalculator } from '../../../calculators/kit/run.js';
import { OutputSchema } from '../../../shared/output.js';
import { CHECK_AIR } from '../../reference/check-driver.js';
import { diameterM, driver, figureOf, fitted, freeAir, noisySweep, numberOf, withMass } from './driver-runs.js';

const inputs = {
  'free-air': freeAir(noisySweep(driver)),
  'added-mass': [withMass(0.02, noisySweep(driver, { mass: 0.02 }, 2, '20 g'))],
};
const output = fitted(inputs, { pistonDiameter: diameterM });
const table = (id: string) => output.tables.find((found) => found.id === id);

it('survives JSON: what is stored is what was computed', () => {
  expect(OutputSchema.parse(JSON.parse(JSON.stringify(output)))).toEqual(output);
});

it('reports the three-point method step by step, for every sweep', () => {
  const [free, loaded] = table('three-point')?.rows ?? [];
  expect(free).toMatchObject({ method: 'three-point', sweep: 'free air' });
  expect(loaded).toMatchObject({ method: 'three-point', sweep: '20 g' });
  const { f1, f2, fs, r0, Qms, Qes, Qts, level, Re, Zmax, flanks } = free as Record<string, number>;
  expect(r0).toBeCloseTo((Zmax ?? 0) / (Re ?? 1), 10); // R. H. Small, J. Audio Eng. Soc. 20 (1972), from memory
  expect(level).toBeCloseTo((Re ?? 0) * Math.sqrt(r0 ?? 0), 10);
  expect(Qms).toBeCloseTo(((fs ?? 0) * Math.sqrt(r0 ?? 0)) / ((f2 ?? 0) - (f1 ?? 0)), 10);
  expect(Qes).toBeCloseTo((Qms ?? 0) / ((r0 ?? 0) - 1), 10);
  expect(Qts).toBeCloseTo((Qms ?? 0) / (r0 ?? 1), 10);
  expect(flanks).toBeCloseTo(Math.sqrt((f1 ?? 0) * (f2 ?? 0)), 10);
  expect(output.markers.map(({ label }) => label)).toEqual(['f1', 'fs', 'f2']);
});

describe('the comparison of models', () => {
  const rows = table('models')?.rows ?? [];
  it('lists all five coils under all three suspensions, semi-inductance with and without Rss', () => {
    expect(rows.length).toBe(18);
    expect(rows.filter(({ isChosen }) => isChosen)).toHaveLength(1);
    expect(rows[0]).toMatchObject({ coil: 'inductor+eddy', suspension: 'constant', isChosen: true });
  });

  it('weighs them by exp(−ΔBIC/2), to 1 in total', () => {
    const weighed = rows.filter(({ weight }) => Number(weight) > 0);
    expect(weighed.reduce((sum, { weight }) => sum + Number(weight), 0)).toBeCloseTo(1, 10);
    const [first, second] = weighed;
    if (!first || !second) return;
    const ratio = Math.exp((Number(first.bic) - Number(second.bic)) / 2);
    expect(Number(second.weight) / Number(first.weight)).toBeCloseTo(ratio, 8);
  });

  it('puts the spread between the models into the uncertainty', () => {
    const toldOutput = fitted(inputs, { pistonDiameter: diameterM, coil: 'inductor+eddy', suspension: 'constant' });
    expect(figureOf(output, 'Qms').uncertainty ?? 0).toBeGreaterThanOrEqual(
      figureOf(toldOutput, 'Qms').uncertainty ?? 1,
    );
    expect(numberOf(output, 'Qms')).toBeCloseTo(numberOf(toldOutput, 'Qms'), 6);
  });
});

it('draws the fitted curve and the misfit of every sweep', () => {
  expect(output.traces.map(({ id }) => id)).toEqual(['fitted', 'misfit', 'fitted-2', 'misfit-2']);
  const [curve, misfit] = output.traces;
  expect(curve).toMatchObject({ axis: 'impedance', xUnit: 'Hz', yUnit: 'Ω' });
  expect(misfit).toMatchObject({ axis: 'residual', yUnit: '1' });
  const squares = Array.from(misfit?.re ?? []).reduce((sum, re, i) => sum + re * re + (misfit?.im?.[i] ?? 0) ** 2, 0);
  expect(Math.sqrt(squares / (misfit?.x.length ?? 1))).toBeCloseTo(0.002 * Math.SQRT2, 3);
});

it('shows the fit itself: status, degrees of freedom and correlations', () => {
  expect(output.fit).toMatchObject({ status: 'converged', model: 'inductor+eddy · constant' });
  expect(output.fit?.parameters).toEqual(expect.arrayContaining(['Re', 'fs', 'Qms', 'Qes', 'Mms']));
  const size = output.fit?.parameters.length ?? 0;
  expect(output.fit?.correlations.every((row) => row.length === size)).toBe(true);
  expect(output.fit?.dof).toBe(2 * 2 * 300 - size);
});

it('says what a mass or a volume would bring, amplified as 2x²/(x² − 1)', () => {
  for (const { kind, quantity, resonance, amplification } of table('next')?.rows ?? []) {
    if (kind !== 'added-mass' && kind !== 'known-volume') continue;
    const square = (Number(resonance) / numberOf(output, 'fs')) ** (kind === 'added-mass' ? -2 : 2);
    expect(Number(amplification)).toBeCloseTo((2 * square) / (square - 1), 6);
    expect(Number(quantity)).toBeGreaterThan(0);
  }
});

describe('while it runs', () => {
  it('tells which model is in hand', () => {
    const labels = new Set<string>();
    const context = {
      progress: (_: number, __: number, label = '') => void labels.add(label),
      checkpoint: () => {},
      seed: 1,
    };
    runCalculator(driverFit, inputs, { air: CHECK_AIR }, context);
    expect([...labels]).toEqual(expect.arrayContaining(['inductor · constant', 'semi-inductance with Rss · relaxing']));
  });

  it('stops as soon as the person says so', () => {
    let calls = 0;
    const checkpoint = (): void => {
      calls += 1;
      if (calls === 10) throw new Error('stopped by the person');
    };
    expect(() => runCalculator(driverFit, inputs, {}, { progress: () => {}, checkpoint, seed: 1 })).toThrow(
      'stopped by the person',
    );
    expect(calls).toBe(10);
  });
});
