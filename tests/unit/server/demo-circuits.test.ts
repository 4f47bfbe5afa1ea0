import { expect, it } from 'vitest';
import { airOf, bulkModulusPa } from '../../../calculators/acoustics/air.js';
import { type DriverLoad, driverImpedance as modelled } from '../../../calculators/acoustics/driver-impedance.js';
import { frequencyGrid } from '../../../calculators/acoustics/frequency-grid.js';
import { type DemoBox, driverImpedance } from '../../../server/demo/circuits.js';
import { demoSweeps } from '../../../server/demo/demo-sweeps.js';
import { eightCabinets, lotOfSixteen } from '../../../server/demo/lot.js';

const driver = lotOfSixteen()[0]!;
const { reOhm, blTm, mmsKg, cmsMPerN, rmsKgPerS, sdM2, l1Henry, l2Henry, r2Ohm } = driver;
const omega = 1 / Math.sqrt(mmsKg * cmsMPerN);
const core = [reOhm, omega / (2 * Math.PI), (omega * mmsKg) / rmsKgPerS, (omega * mmsKg * reOhm) / blTm ** 2];
const coil = [l1Henry, l2Henry, r2Ohm];
const frequencies = Float64Array.of(10, 31, 46, 60, 100, 1000, 20_000);

it.each<[string, DriverLoad, number[], DemoBox | undefined, number]>([
  ['in free air', { mass: false, box: 'none' }, [], undefined, 0],
  ['with an added mass', { mass: true, box: 'none' }, [0.01 / mmsKg], undefined, 0.01],
  [
    'in a closed box without leaks',
    { mass: false, box: 'sealed' },
    [(bulkModulusPa(airOf()) * sdM2 ** 2 * cmsMPerN) / 0.01],
    { vbM3: 0.01, leakPaSPerM3: 1e15 },
    0,
  ],
])('makes the same impedance as the models that the fits use, %s', (_, load, loadValues, box, addedMassKg) => {
  const model = { coil: 'inductor+eddy', suspension: 'constant', load } as const;
  const expected = modelled(model, [...core, ...coil, ...loadValues], frequencyGrid(frequencies));
  frequencies.forEach((f, i) => {
    const z = driverImpedance(driver, f, box, addedMassKg);
    expect(z.re / expected.re[i]!).toBeCloseTo(1, 9);
    expect(z.im / expected.im[i]!).toBeCloseTo(1, 7);
  });
});

it('puts the minimum between the peaks of a sound cabinet at its tuning', () => {
  const { box, driverNumber } = eightCabinets()[0]!;
  const magnitude = (f: number) => {
    const { re, im } = driverImpedance(lotOfSixteen()[driverNumber - 1]!, f, box);
    return Math.hypot(re, im);
  };
  const grid = Array.from({ length: 1200 }, (_, i) => 30 + i / 40);
  const dip = grid.reduce((best, f) => (magnitude(f) < magnitude(best) ? f : best));
  expect(dip).toBeGreaterThan(41); // tuned to 43 Hz; losses and coil pull the minimum down a little
  expect(dip).toBeLessThan(43.5);
});

it('writes the same files every time, each with its own name and content', () => {
  const [once, again] = [demoSweeps(), demoSweeps()];
  expect(again).toEqual(once);
  expect(new Set(once.map(({ name }) => name)).size).toBe(once.length);
  expect(new Set(once.map(({ content }) => content)).size).toBe(once.length);
  expect(once.length).toBe(16 + 3 + 1 + 8 + 4 + 12);
});
