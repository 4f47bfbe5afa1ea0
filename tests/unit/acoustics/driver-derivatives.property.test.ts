import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type DriverLoad,
  type DriverModel,
  driverImpedance,
  driverParameters,
} from '../../../calculators/acoustics/driver-impedance.js';
import { frequencyGrid } from '../../../calculators/acoustics/frequency-grid.js';
import { SUSPENSION_MODELS } from '../../../calculators/acoustics/suspension.js';
import { SweepTerm, sweepData } from '../../../calculators/acoustics/sweep-term.js';
import { COIL_MODELS } from '../../../calculators/acoustics/voice-coil.js';
import { complexArray } from '../../../calculators/numerics/complex-array.js';
import { LOSS_KINDS } from '../../../calculators/numerics/losses.js';
import { seededRandom } from '../../../calculators/numerics/random.js';
import { inventedDriver } from './invented-drivers.js';

const LOADS: readonly DriverLoad[] = [
  { mass: false, box: 'none' },
  { mass: true, box: 'none' },
  { mass: false, box: 'sealed' },
  { mass: false, box: 'leaky' },
  { mass: true, box: 'leaky-absorbing' },
];
const MODELS: DriverModel[] = COIL_MODELS.flatMap((coil) =>
  SUSPENSION_MODELS.flatMap((suspension) => LOADS.map((load) => ({ coil, suspension, load }))),
);
const POINTS = 24;
const anySeed = fc.integer({ min: 1, max: 1e6 });

function anyValues({ coil, suspension, load }: DriverModel, seed: number): Float64Array {
  const random = seededRandom(seed);
  const box = [random.logBetween(0.2, 6), random.logBetween(1, 50), random.logBetween(5, 200)];
  const count = { none: 0, sealed: 1, leaky: 2, 'leaky-absorbing': 3 }[load.box];
  const driver = inventedDriver(seed, coil, suspension).values;
  return Float64Array.from([...driver, ...(load.mass ? [random.between(0.05, 1.5)] : []), ...box.slice(0, count)]);
}

describe('derivatives of ln Z, against central differences', () => {
  it.each(
    MODELS.map(
      (model) =>
        [`${model.coil}, ${model.suspension}, ${model.load.box}${model.load.mass ? ' + mass' : ''}`, model] as const,
    ),
  )('%s', (_, model) => {
    const grid = frequencyGrid(Float64Array.from({ length: POINTS }, (_unused, i) => 8 * 2500 ** (i / (POINTS - 1))));
    const parameters = driverParameters(model);
    const columns = parameters.map(() => complexArray(POINTS));
    fc.assert(
      fc.property(anySeed, (seed) => {
        const values = anyValues(model, seed);
        const z = driverImpedance(model, values, grid, complexArray(POINTS), columns);
        for (const [k, { id, logScaled }] of parameters.entries()) {
          const h = logScaled ? 1e-5 : 1e-5 * Math.max(Math.abs(values[k]!), 1e-3);
          const at = (side: number) => {
            const shifted = values.slice();
            shifted[k] = logScaled ? values[k]! * Math.exp(side * h) : values[k]! + side * h;
            return driverImpedance(model, shifted, grid);
          };
          const [above, below] = [at(1), at(-1)];
          let worst = 0; // of the miss, over what rounding and truncation of the differences allow
          for (let i = 0; i < POINTS; i++) {
            const [dRe, dIm] = [(above.re[i]! - below.re[i]!) / (2 * h), (above.im[i]! - below.im[i]!) / (2 * h)];
            const [cRe, cIm] = [columns[k]!.re[i]!, columns[k]!.im[i]!]; // times Z it must be ∂Z
            const miss = Math.hypot(cRe * z.re[i]! - cIm * z.im[i]! - dRe, cRe * z.im[i]! + cIm * z.re[i]! - dIm);
            const rounding = (1e-14 * Math.hypot(z.re[i]!, z.im[i]!)) / h;
            worst = Math.max(worst, miss / (2e-7 * Math.hypot(dRe, dIm) + rounding));
          }
          expect(worst, id).toBeLessThan(1);
        }
      }),
      { numRuns: 15 },
    );
  });
});

describe('the unrolled loops', () => {
  it.each(COIL_MODELS)('give the sums of the general ones for %s, whatever suspension, loss and weights', (coil) => {
    fc.assert(
      fc.property(
        anySeed,
        fc.constantFrom(...SUSPENSION_MODELS),
        fc.constantFrom(...LOSS_KINDS),
        fc.double({ min: 0.9, max: 1.1, noNaN: true }),
        (seed, suspension, kind, off) => {
          const { sweep, values } = inventedDriver(seed, coil, suspension, { points: 40, noise: 0.03 });
          const data = sweepData(sweep);
          const random = seededRandom(seed);
          const weights = Float64Array.from(data.re, () => (random.uniform() < 0.1 ? 0 : random.between(0.5, 2)));
          const at = values.map((value) => value * off);
          const loss = { kind, scale: 0.02 };
          const fused = new SweepTerm({ coil, suspension, load: { mass: false, box: 'none' } }, data, weights);
          const general = new SweepTerm({ coil, suspension, load: { mass: true, box: 'none' } }, data, weights); // mu = 0: the same
          const [p, q] = [values.length, values.length + 1];
          const [a, b] = [p, q].map((size) => ({
            cost: 0,
            gradient: new Float64Array(size),
            hessian: new Float64Array(size * size),
          }));
          fused.accumulate(at, loss, a!);
          general.accumulate([...at, 0], loss, b!);
          const normOf = (k: number) => Math.sqrt(b!.hessian[k * q + k]!) || 1;
          let worst = Math.abs(a!.cost / b!.cost - 1);
          for (let k = 0; k < p; k++) {
            const slopeMiss = Math.abs(a!.gradient[k]! - b!.gradient[k]!) / (normOf(k) * Math.sqrt(b!.cost));
            worst = Math.max(worst, slopeMiss);
            for (let l = 0; l <= k; l++) {
              const miss = Math.abs(a!.hessian[k * p + l]! - b!.hessian[k * q + l]!);
              worst = Math.max(worst, miss / (normOf(k) * normOf(l)));
            }
          }
          expect(worst).toBeLessThan(1e-10);
        },
      ),
      { numRuns: 60 },
    );
  });
});
