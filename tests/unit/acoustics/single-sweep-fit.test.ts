import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { fitDriverSweep } from '../../../calculators/acoustics/single-sweep-fit.js';
import { COIL_MODELS, coilValues } from '../../../calculators/acoustics/voice-coil.js';
import type { ComplexSweep } from '../../../calculators/kit/sweep.js';
import { seededRandom } from '../../../calculators/numerics/random.js';
import { inventedDriver, noisySweep } from './invented-drivers.js';

const ROBUST = { suspension: 'constant', robust: true } as const;

function withWildPoints(sweep: ComplexSweep, rows: readonly number[]): ComplexSweep {
  const realOhm = sweep.realOhm.slice();
  const imaginaryOhm = sweep.imaginaryOhm.slice();
  for (const [k, row] of rows.entries()) {
    realOhm[row]! *= k % 2 ? 1.6 : 0.5;
    imaginaryOhm[row]! += k % 3 ? 2 : -3;
  }
  return { ...sweep, realOhm, imaginaryOhm };
}

describe('fitting one sweep', () => {
  it.each(COIL_MODELS)('finds a noise-free driver with %s exactly', (coil) => {
    const { sweep, values } = inventedDriver(41, coil, 'constant', { noise: 0 });
    const { fit } = fitDriverSweep(sweep, { ...ROBUST, coil });
    for (const k of [0, 1, 2, 3]) expect(fit.values[k]! / values[k]!).toBeCloseTo(1, 6);
  });

  it('leaves out every twentieth point that is wild, and is then as good as without them', () => {
    const { sweep, values } = inventedDriver(42, 'inductor+eddy', 'constant');
    const rows = Array.from({ length: 15 }, (_, i) => 7 + 20 * i);
    const found = fitDriverSweep(withWildPoints(sweep, rows), { ...ROBUST, coil: 'inductor+eddy' });
    const plain = fitDriverSweep(withWildPoints(sweep, rows), { ...ROBUST, coil: 'inductor+eddy', robust: false });
    for (const row of rows) expect(found.outliers).toContain(row);
    expect(found.outliers.length).toBeLessThan(20);
    expect(found.scale).toBeGreaterThan(0.0045); // the noise put in is 0.005
    expect(found.scale).toBeLessThan(0.0056);
    const missOf = ({ fit }: typeof found) => Math.abs(fit.values[3]! / values[3]! - 1);
    expect(missOf(found)).toBeLessThan((4 * found.fit.standardErrors[3]!) / values[3]!);
    expect(missOf(plain)).toBeGreaterThan(4 * missOf(found));
  });

  it('keeps Rss of semi-inductance where the curve asks for it, and says at-bound where it does not', () => {
    const sweepWith = (Rss: number) => {
      const values = [6, 45, 4, 0.5, ...coilValues('semi-inductance', { Leb: 2e-4, Le: 2e-3, K: 0.06, Rss })];
      const model = { coil: 'semi-inductance', suspension: 'constant' } as const;
      return noisySweep(model, values, seededRandom(43), { points: 400, noise: 0.002 });
    };
    const asked = fitDriverSweep(sweepWith(12), { ...ROBUST, coil: 'semi-inductance' });
    expect(asked.fit.status).toBe('converged');
    expect(1 / asked.fit.values[7]!).toBeGreaterThan(11);
    expect(1 / asked.fit.values[7]!).toBeLessThan(13);
    const none = fitDriverSweep(sweepWith(0), { ...ROBUST, coil: 'semi-inductance' });
    expect(none.fit.status).toBe('at-bound');
    expect(none.fit.atBound).toEqual(['Gss']);
    expect(none.fit.values[7]).toBe(0);
  });

  it('starts from values it is given, and takes per-point weights', () => {
    const { sweep, values } = inventedDriver(45, 'power-law', 'creep');
    const weights = Float64Array.from(sweep.frequencyHz, (_, i) => (i < 20 ? 0 : 1 / 0.005));
    const { fit, scale } = fitDriverSweep(sweep, {
      coil: 'power-law',
      suspension: 'creep',
      robust: true,
      weights,
      start: values,
    });
    expect(fit.status).toBe('converged');
    expect(scale).toBeGreaterThan(0.9); // weighted misfit: its sigma is 1
    expect(scale).toBeLessThan(1.1);
    expect(fit.dof).toBeLessThanOrEqual(2 * 280 - 7);
  });
});

describe('scaling laws of a fit', () => {
  const anyFactor = fc.double({ min: 0.05, max: 20, noNaN: true });
  it('an impedance k times as large has k times the resistance and the same Qs; k times the frequency moves fs alone', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 1e5 }), anyFactor, anyFactor, (seed, k, m) => {
        const { sweep } = inventedDriver(seed, 'inductor', 'constant');
        const scaled = {
          ...sweep,
          frequencyHz: sweep.frequencyHz.map((f) => f * m),
          realOhm: sweep.realOhm.map((x) => x * k),
          imaginaryOhm: sweep.imaginaryOhm.map((x) => x * k),
        };
        const [a, b] = [sweep, scaled].map(
          (one) => fitDriverSweep(one, { ...ROBUST, coil: 'inductor', robust: false }).fit,
        );
        const ratio = (at: number) => b!.values[at]! / a!.values[at]!;
        expect(ratio(0) / k).toBeCloseTo(1, 6);
        expect(ratio(1) / m).toBeCloseTo(1, 6);
        expect(ratio(2)).toBeCloseTo(1, 6);
        expect(ratio(3)).toBeCloseTo(1, 6);
        expect((ratio(4) * m) / k).toBeCloseTo(1, 6);
      }),
      { numRuns: 40 },
    );
  });
});
