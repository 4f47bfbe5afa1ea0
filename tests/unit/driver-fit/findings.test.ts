import { describe, expect, it } from 'vitest';
import type { Sweep } from '../../../calculators/kit/sweep.js';
import { CHECK_STIFFNESS_OF_AIR } from '../../reference/check-driver.js';
import {
  complex,
  impedanceOf,
  inverse,
  logFrequencies,
  normals,
  plus,
  relativeNoise,
  sweepOf,
  times,
} from '../../reference/simulated-driver.js';
import {
  codesOf,
  diameterM,
  driver,
  figureOf,
  fitted,
  freeAir,
  inBox,
  noisySweep,
  numberOf,
  withMass,
  worriesOf,
} from './driver-runs.js';

const settings = { pistonDiameter: diameterM };
const free = noisySweep(driver, {}, 1);
const massed = (massKg: number, seed: number, name = `${massKg * 1000} g`): Sweep =>
  noisySweep(driver, { mass: massKg }, seed, name);

describe('added masses', () => {
  it('says nothing of a sound pair', () => {
    const output = fitted({ 'free-air': freeAir(free), 'added-mass': [withMass(0.02, massed(0.02, 2))] }, settings);
    expect(worriesOf(output)).toEqual([]);
    expect(numberOf(output, 'Mms')).toBeCloseTo(driver.mms, 4);
  });

  it.each([
    ['too small', 0.005, 'added-mass-too-small'],
    ['too large', 0.12, 'added-mass-too-large'],
  ])('warns of a mass that is %s', (_, massKg, code) => {
    const output = fitted({ 'free-air': freeAir(free), 'added-mass': [withMass(massKg, massed(massKg, 2))] }, settings);
    expect(worriesOf(output)).toEqual([code]);
  });

  it('exchanges two masses that were taken for each other, and says so', () => {
    const output = fitted(
      { 'free-air': freeAir(free), 'added-mass': [withMass(0.01, massed(0.02, 2)), withMass(0.02, massed(0.01, 3))] },
      settings,
    );
    expect(worriesOf(output)).toEqual(['sweeps-swapped']);
    expect(numberOf(output, 'Mms')).toBeCloseTo(driver.mms, 4);
  });

  it('names the sweep whose mass does not fit the series, and leaves it out', () => {
    const output = fitted(
      {
        'free-air': freeAir(free),
        'added-mass': [
          withMass(0.01, massed(0.01, 2)),
          withMass(0.02, massed(0.02, 3)),
          withMass(0.03, massed(0.026, 4, 'slipped mass')),
        ],
      },
      settings,
    );
    expect(worriesOf(output)).toEqual(['mass-series-inconsistent']);
    expect(output.findings[0]?.message).toContain('slipped mass');
    expect(numberOf(output, 'Mms')).toBeCloseTo(driver.mms, 4);
  });

  it('doubts two masses that contradict each other, and covers the truth with a wide uncertainty', () => {
    const output = fitted(
      { 'free-air': freeAir(free), 'added-mass': [withMass(0.01, massed(0.01, 2)), withMass(0.02, massed(0.016, 3))] },
      settings,
    );
    expect(worriesOf(output)).toContain('mass-series-inconsistent');
    const { uncertainty = 0 } = figureOf(output, 'Mms');
    expect(Math.abs(numberOf(output, 'Mms') - driver.mms)).toBeLessThan(2 * uncertainty);
  });

  it('gives a warm sweep a resistance of its own', () => {
    const warm = noisySweep({ ...driver, re: 1.04 * driver.re }, { mass: 0.02 }, 2);
    const output = fitted({ 'free-air': freeAir(free), 'added-mass': [withMass(0.02, warm)] }, settings);
    expect(worriesOf(output)).toEqual(['re-mismatch']);
    expect(numberOf(output, 'Re')).toBeCloseTo(driver.re, 1);
    expect(numberOf(output, 'Bl')).toBeCloseTo(driver.bl, 1);
  });
});

describe('a known volume', () => {
  const box = (parts = driver) => inBox(0.03, noisySweep(parts, { volume: 0.03 }, 2, 'box'));
  it('says nothing of a sound pair', () => {
    const output = fitted({ 'free-air': freeAir(free), 'known-volume': box() }, settings);
    expect(worriesOf(output)).toEqual([]);
    expect(numberOf(output, 'Vas')).toBeCloseTo(0.06, 3);
    expect(numberOf(output, 'fc')).toBeCloseTo(30 * Math.sqrt(3), 1); // fc = fs√(1 + Vas/Vb), R. H. Small 1972
  });

  it('offers Vas with equal and with unequal moving masses', () => {
    const ways = fitted({ 'free-air': freeAir(free), 'known-volume': box() }, settings).tables.find(
      ({ id }) => id === 'ways',
    );
    const names = ways?.rows.map(({ way }) => way) ?? [];
    expect(names).toContain('Known volume, equal moving masses');
    expect(names).toContain('Known volume, unequal moving masses');
    for (const row of ways?.rows ?? []) expect(Number(row.Vas)).toBeCloseTo(0.06, 2);
  });

  it('notices a moving mass that differs in the box, and takes Vas without assuming it equal', () => {
    const output = fitted(
      { 'free-air': freeAir(free), 'known-volume': box({ ...driver, mms: 1.05 * driver.mms }) },
      settings,
    );
    expect(worriesOf(output)).toEqual(['moving-mass-changed']);
    expect(numberOf(output, 'Vas')).toBeCloseTo(0.06, 3);
  });

  it('notices a leak and fits it', () => {
    const cab = 0.03 / CHECK_STIFFNESS_OF_AIR;
    const leakOhm = 6 / (2 * Math.PI * 30 * Math.sqrt(3) * cab); // QL 6 at fc
    const noise = relativeNoise(0.002, normals(9));
    const frequencyHz = logFrequencies(300, 8, 20_000);
    const leaky = sweepOf(driver, frequencyHz, {}, (_, i) => {
      const omega = 2 * Math.PI * (frequencyHz[i] ?? 1);
      const air = inverse(plus(complex(0, omega * cab), complex(1 / leakOhm)));
      const mechanical = plus(
        complex(driver.rms, omega * driver.mms - 1 / (omega * driver.cms)),
        times(complex(driver.sd ** 2), air),
      );
      return noise(plus(complex(driver.re), driver.coil(omega), times(complex(driver.bl ** 2), inverse(mechanical))));
    });
    const output = fitted({ 'free-air': freeAir(free), 'known-volume': inBox(0.03, leaky) }, settings);
    expect(worriesOf(output)).toEqual(['test-box-leaky']);
    expect(numberOf(output, 'Vas')).toBeCloseTo(0.06, 3);
  });
});

describe('the curve itself', () => {
  const part = (impedance: (omega: number) => { re: number; im: number }): Sweep => {
    const frequencyHz = logFrequencies(200, 10, 20_000);
    const points = Array.from(frequencyHz, (f) => impedance(2 * Math.PI * f));
    return {
      name: 'part',
      frequencyHz,
      realOhm: Float64Array.from(points, ({ re }) => re),
      imaginaryOhm: Float64Array.from(points, ({ im }) => im),
      conditions: { role: 'sweep' },
    };
  };
  it.each([
    ['a resistor', () => complex(8, 0.01)],
    ['a capacitor', (w: number) => complex(0.1, -1 / (w * 1e-5))],
    ['a coil', (w: number) => complex(0.3, w * 1e-3)],
  ])('takes %s for no driver and gives no figure', (_, impedance) => {
    const output = fitted({ 'free-air': freeAir(part(impedance)) });
    expect(worriesOf(output)).toEqual(['not-a-driver']);
    expect(output.figures.every(({ value }) => value === null)).toBe(true);
  });

  it.each([
    ['below', 60, 20_000],
    ['above', 5, 25],
  ])('says when the resonance lies %s the sweep', (_, low, high) => {
    const output = fitted({ 'free-air': freeAir(sweepOf(driver, logFrequencies(200, low, high))) });
    expect(worriesOf(output)).toEqual(['peak-outside-sweep']);
  });

  it('says when there are two resonances, as in a vented box', () => {
    const frequencyHz = logFrequencies(300, 8, 20_000);
    const [volume, tuning] = [0.04, 33]; // a lossless vent: Zab = 1/(sCab + 1/(sMap)), R. H. Small 1973
    const cab = volume / CHECK_STIFFNESS_OF_AIR;
    const map = 1 / ((2 * Math.PI * tuning) ** 2 * cab);
    const vented = sweepOf(driver, frequencyHz, {}, (_, i) => {
      const omega = 2 * Math.PI * (frequencyHz[i] ?? 1);
      const air = inverse(plus(complex(0, omega * cab), complex(1e-9, -1 / (omega * map)), complex(1e-6)));
      const mechanical = plus(
        complex(driver.rms, omega * driver.mms - 1 / (omega * driver.cms)),
        times(complex(driver.sd ** 2), air),
      );
      return plus(complex(driver.re), driver.coil(omega), times(complex(driver.bl ** 2), inverse(mechanical)));
    });
    expect(worriesOf(fitted({ 'free-air': freeAir(vented) }))).toContain('two-resonances');
  });

  it('fits |Z| alone where there is no phase, and says so', () => {
    const { realOhm, imaginaryOhm, ...rest } = noisySweep(driver);
    const magnitudeOhm = realOhm?.map((re, i) => Math.hypot(re, imaginaryOhm?.[i] ?? 0));
    const output = fitted({ 'free-air': freeAir({ ...rest, ...(magnitudeOhm ? { magnitudeOhm } : {}) }) });
    expect(codesOf(output)).toEqual(['no-phase']);
    expect(numberOf(output, 'Qts')).toBeCloseTo(0.363636, 2);
  });

  it('leaves hum and wild points out, and says where they were', () => {
    const clean = noisySweep(driver);
    const near = (f: number): number => clean.frequencyHz.findIndex((x) => x >= f);
    const realOhm = clean.realOhm?.slice() ?? new Float64Array();
    for (const row of [near(50), near(50) + 1, near(100), near(150)]) realOhm[row] = (realOhm[row] ?? 0) + 3;
    realOhm[near(2000)] = 3 * (realOhm[near(2000)] ?? 0);
    const output = fitted({ 'free-air': freeAir({ ...clean, realOhm }) });
    expect(codesOf(output).sort()).toEqual(['mains-hum', 'outlier-points']);
    expect(numberOf(output, 'Re')).toBeCloseTo(6, 1);
  });

  it('calls a misfit that runs in waves structured, widens the uncertainties and gives a definition interval', () => {
    const ripple = (f: number): number => 1 + 0.01 * Math.sin(4 * Math.log(f));
    const frequencyHz = logFrequencies(300, 8, 20_000);
    const noise = relativeNoise(0.001, normals(3));
    const wavy = sweepOf(driver, frequencyHz, {}, (clean, i) =>
      noise(times(clean, complex(ripple(frequencyHz[i] ?? 1)))),
    );
    const output = fitted({ 'free-air': freeAir(wavy) });
    expect(codesOf(output)).toContain('structured-residual');
    const qts = figureOf(output, 'Qts');
    expect(qts.interval?.low).toBeLessThan(0.363636);
    expect(qts.interval?.high).toBeGreaterThan(0.363636);
  });

  it('warns when the DC resistance told is not that of the sweep', () => {
    const output = fitted({ 'free-air': freeAir(free) }, { dcResistance: 6.5, dcResistanceUncertainty: 0.02 });
    expect(codesOf(output)).toContain('re-mismatch');
    expect(Math.abs(impedanceOf(driver, 1).re - 6)).toBeLessThan(0.1);
  });
});
