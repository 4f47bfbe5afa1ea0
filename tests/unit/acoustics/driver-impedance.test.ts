import { describe, expect, it } from 'vitest';
import { driverImpedance, driverParameters, FREE_AIR } from '../../../calculators/acoustics/driver-impedance.js';
import { frequencyGrid } from '../../../calculators/acoustics/frequency-grid.js';

const model = (load = FREE_AIR) => ({ coil: 'inductor', suspension: 'constant', load }) as const;
const NO_COIL = 1e-30; // an inductance that is none

/** Re 6 Ω, fs 30 Hz, Qms 4, Qes 0.4, no inductance: synthetic, exact by construction. */
const CHECK_DRIVER = [6, 30, 4, 0.4, NO_COIL];

describe('a driver in free air', () => {
  // Z = Re + Res/(1 + jQms(f/fs − fs/f)), Res = Re·Qms/Qes (R. H. Small, J. Audio Eng. Soc. 20, 1972), computed and rounded
  it.each([
    [10, 6.52275, 5.57599],
    [20, 10.95413, 16.51376],
    [30, 66, 0],
    [45, 10.95413, -16.51376],
    [100, 6.40481, -4.91169],
  ])('has at %d Hz the impedance %d + j%d Ω of the textbook formula', (f, re, im) => {
    const z = driverImpedance(model(), CHECK_DRIVER, frequencyGrid(Float64Array.of(f)));
    expect(z.re[0]).toBeCloseTo(re, 5);
    expect(z.im[0]).toBeCloseTo(im, 5);
  });

  it('stands at √(Re·Zmax) where the definition of Qms looks for f1 and f2: 20.03861 and 44.91330 Hz', () => {
    const z = driverImpedance(model(), CHECK_DRIVER, frequencyGrid(Float64Array.of(20.03861, 44.9133)));
    expect(Math.hypot(z.re[0]!, z.im[0]!)).toBeCloseTo(Math.sqrt(6 * 66), 4);
    expect(Math.hypot(z.re[1]!, z.im[1]!)).toBeCloseTo(Math.sqrt(6 * 66), 4);
  });
});

/** The same by the circuit itself: Z = Re + jωLe + Bl²/(jωM + Rms + 1/(jωCms) + Sd²·Zbox), nothing normalised. */
function byCircuit(f: number, load: { mu: number; alpha: number; ql: number; qa: number }): [number, number] {
  const [re, fs, qms, qes] = CHECK_DRIVER as [number, number, number, number];
  const w = 2 * Math.PI * f;
  const ws = 2 * Math.PI * fs;
  const mms = 0.0321; // any value: it must cancel
  const cms = 1 / (ws * ws * mms);
  const bl2 = (ws * mms * re) / qes;
  let r = (ws * mms) / qms;
  let x = w * mms * (1 + load.mu) - 1 / (w * cms);
  if (load.alpha > 0) {
    const cab = cms / load.alpha; // seen from the mechanical side, Sd = 1
    const wc = ws * Math.sqrt(1 + load.alpha);
    const absorption = 1 / (wc * cab * load.qa); // in series with Cab
    const leak = load.ql / (wc * cab); // in parallel with both
    const [sRe, sIm] = [absorption, -1 / (w * cab)];
    const size = sRe * sRe + sIm * sIm;
    const [yRe, yIm] = [sRe / size + 1 / leak, -sIm / size];
    const ySize = yRe * yRe + yIm * yIm;
    r += yRe / ySize;
    x -= yIm / ySize;
  }
  const size = r * r + x * x;
  return [re + (bl2 * r) / size, (-bl2 * x) / size];
}

describe('a loaded driver', () => {
  const sweep = frequencyGrid(Float64Array.of(3, 9, 20, 33, 47, 90, 400));
  it.each([
    ['an added mass', { mass: true, box: 'none' }, { mu: 0.4, alpha: 0, ql: 1, qa: 1 }, [0.4]],
    ['a leaky, lined box', { mass: false, box: 'leaky-absorbing' }, { mu: 0, alpha: 1.7, ql: 6, qa: 25 }, [1.7, 6, 25]],
    ['a box and a mass', { mass: true, box: 'leaky-absorbing' }, { mu: 0.2, alpha: 3, ql: 9, qa: 40 }, [0.2, 3, 9, 40]],
  ] as const)('with %s equals its circuit', (_, load, truth, values) => {
    const z = driverImpedance(model(load), [...CHECK_DRIVER, ...values], sweep);
    sweep.frequencyHz.forEach((f, i) => {
      const [re, im] = byCircuit(f, truth);
      expect(z.re[i]! / re).toBeCloseTo(1, 9);
      expect(z.im[i]! - im).toBeCloseTo(0, 8);
    });
  });

  // Added mass: m = Mms gives fs/√2 = 21.21320 Hz. Closed box: α 3 gives fc 60 Hz, Qmc 8, Qec 0.8 (Small 1972, part on closed boxes)
  it('peaks where the relations of Thiele and Small put it', () => {
    const heavy = driverImpedance(
      model({ mass: true, box: 'none' }),
      [...CHECK_DRIVER, 1],
      frequencyGrid(Float64Array.of(21.213203)),
    );
    expect(heavy.re[0]).toBeCloseTo(66, 6);
    expect(heavy.im[0]).toBeCloseTo(0, 4);
    const boxed = driverImpedance(
      model({ mass: false, box: 'sealed' }),
      [...CHECK_DRIVER, 3],
      frequencyGrid(Float64Array.of(60)),
    );
    expect(boxed.re[0]).toBeCloseTo(6 * (1 + 8 / 0.8), 6);
    expect(boxed.im[0]).toBeCloseTo(0, 8);
  });

  it('declares its parameters in the order in which it reads them', () => {
    const ids = driverParameters({
      coil: 'semi-inductance',
      suspension: 'relaxing',
      load: { mass: true, box: 'leaky' },
    }).map(({ id }) => id);
    expect(ids).toEqual(['Re', 'fs', 'Qms', 'Qes', 'Leb', 'Le', 'K', 'Gss', 'kappa', 'tau', 'mu', 'alpha', 'QL']);
  });
});
