import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Sweep } from '../../../calculators/kit/sweep.js';
import { driver, figureOf, fitted, freeAir, noisySweep, numberOf, withMass } from './driver-runs.js';

/** Laws of the field: what a change of the data must do to the figures, whatever the data are. */
const between = (low: number, high: number) => fc.double({ min: low, max: high, noNaN: true });
const sweep = noisySweep(driver, {}, 11);
const loaded = noisySweep(driver, { mass: 0.02 }, 12, '20 g');
const told = { coil: 'inductor+eddy', suspension: 'constant' };
const before = fitted({ 'free-air': freeAir(sweep) }, told);

function scaled(original: Sweep, ohm: number, hertz: number): Sweep {
  const { frequencyHz, realOhm, imaginaryOhm, ...rest } = original;
  return {
    ...rest,
    frequencyHz: frequencyHz.map((f) => f * hertz),
    ...(realOhm && imaginaryOhm
      ? { realOhm: realOhm.map((z) => z * ohm), imaginaryOhm: imaginaryOhm.map((z) => z * ohm) }
      : {}),
  };
}
const near = (value: number, expected: number, within = 2e-5): void => {
  expect(Math.abs(value / expected - 1)).toBeLessThan(within);
};

describe('scaling laws', () => {
  it('scales every resistance and inductance with the impedance, and leaves frequencies and Q alone', () => {
    const holds = fc.property(between(0.5, 4), (ohm) => {
      const after = fitted({ 'free-air': freeAir(scaled(sweep, ohm, 1)) }, told);
      for (const id of ['Re', 'Res', 'Zmax', 'Zmin', 'L1', 'L2', 'R2', 'Le1k'])
        near(numberOf(after, id), ohm * numberOf(before, id));
      for (const id of ['fs', 'Qms', 'Qes', 'Qts', 'fPeak']) near(numberOf(after, id), numberOf(before, id));
    });
    fc.assert(holds, { numRuns: 6, seed: 1 });
  });

  it('scales resonances with frequency and inductances against it, and leaves Re and Q alone', () => {
    const holds = fc.property(between(0.6, 3), (hertz) => {
      const after = fitted({ 'free-air': freeAir(scaled(sweep, 1, hertz)) }, told);
      for (const id of ['fs', 'fPeak', 'fZmin', 'EBP']) near(numberOf(after, id), hertz * numberOf(before, id));
      for (const id of ['L1', 'L2']) near(numberOf(after, id), numberOf(before, id) / hertz);
      for (const id of ['Re', 'Res', 'Qms', 'Qes', 'Qts', 'R2']) near(numberOf(after, id), numberOf(before, id));
    });
    fc.assert(holds, { numRuns: 6, seed: 2 });
  });

  it('scales Vas with the fourth power of the diameter and Mms with the added mass', () => {
    const holds = fc.property(between(0.5, 2), between(0.5, 2), (width, weight) => {
      const run = (diameter: number, massKg: number) =>
        fitted(
          { 'free-air': freeAir(sweep), 'added-mass': [withMass(massKg, loaded)] },
          { ...told, pistonDiameter: diameter },
        );
      const [plain, changed] = [run(0.16, 0.02), run(0.16 * width, 0.02 * weight)];
      near(numberOf(changed, 'Mms'), weight * numberOf(plain, 'Mms'));
      near(numberOf(changed, 'Cms'), numberOf(plain, 'Cms') / weight);
      near(numberOf(changed, 'Vas'), (numberOf(plain, 'Vas') * width ** 4) / weight);
      near(numberOf(changed, 'Bl'), numberOf(plain, 'Bl') * Math.sqrt(weight));
    });
    fc.assert(holds, { numRuns: 5, seed: 3 });
  });
});

it('gives the same digits whatever the order of the rows', () => {
  const holds = fc.property(fc.infiniteStream(fc.nat()), (keys) => {
    const ranks = Array.from(sweep.frequencyHz, () => keys.next().value ?? 0);
    const order = Array.from(ranks.keys()).sort((a, b) => (ranks[a] ?? 0) - (ranks[b] ?? 0));
    const shuffle = (values: Float64Array): Float64Array => Float64Array.from(order, (row) => values[row] ?? 0);
    const { frequencyHz, realOhm, imaginaryOhm, ...rest } = sweep;
    const shuffled = {
      ...rest,
      frequencyHz: shuffle(frequencyHz),
      ...(realOhm && imaginaryOhm ? { realOhm: shuffle(realOhm), imaginaryOhm: shuffle(imaginaryOhm) } : {}),
    };
    expect(fitted({ 'free-air': freeAir(shuffled) }, told).figures).toEqual(before.figures);
  });
  fc.assert(holds, { numRuns: 4, seed: 4 });
});

it('takes a piston’s area for its diameter without a difference', () => {
  const inputs = { 'free-air': freeAir(sweep), 'added-mass': [withMass(0.02, loaded)] };
  const byDiameter = fitted(inputs, { ...told, pistonDiameter: 0.16, pistonDiameterUncertainty: 0.0008 });
  const byArea = fitted(inputs, {
    ...told,
    pistonArea: (Math.PI * 0.16 ** 2) / 4,
    pistonAreaUncertainty: ((Math.PI * 0.16 ** 2) / 4) * 0.01,
  });
  near(numberOf(byArea, 'Vas'), numberOf(byDiameter, 'Vas'), 1e-9);
  near(figureOf(byArea, 'Vas').uncertainty ?? 0, figureOf(byDiameter, 'Vas').uncertainty ?? 1, 1e-6);
});

it('gives the same digits each time, resampling included', () => {
  const run = () => fitted({ 'free-air': freeAir(sweep) }, { ...told, bootstrap: 40 });
  const [first, second] = [run(), run()];
  expect(second.figures).toEqual(first.figures);
  expect(figureOf(first, 'fs').interval).toMatchObject({ kind: 'bootstrap', coverage: 0.95 });
  const ratio = (figureOf(first, 'Qes').uncertainty ?? 0) / (figureOf(before, 'Qes').uncertainty ?? 1);
  expect(ratio).toBeGreaterThan(0.6);
  expect(ratio).toBeLessThan(1.6);
});
