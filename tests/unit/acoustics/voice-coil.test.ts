import { describe, expect, it } from 'vitest';
import { frequencyGrid } from '../../../calculators/acoustics/frequency-grid.js';
import { relativeCompliance } from '../../../calculators/acoustics/suspension.js';
import {
  COIL_MODELS,
  type CoilModel,
  coilFigures,
  coilImpedance,
  coilParameters,
  coilValues,
} from '../../../calculators/acoustics/voice-coil.js';
import { complexArray } from '../../../calculators/numerics/complex-array.js';

const GRID = frequencyGrid(Float64Array.of(100, 1000, 10_000));
function impedanceOf(coil: CoilModel, figures: Record<string, number>): [number, number][] {
  const z = complexArray(3);
  coilImpedance(coil, coilValues(coil, figures), 0, GRID, z);
  return [0, 1, 2].map((i) => [z.re[i]!, z.im[i]!]);
}

/** Values at 100 Hz, 1 and 10 kHz, computed from the formula named, in double precision and rounded to five decimals. */
const WORKED: [string, CoilModel, Record<string, number>, [number, number][]][] = [
  [
    'K(jω)^n with K 6.89e-3, n 0.7 (form: Leach 2002; values of a published finite-element example, 2021)',
    'power-law',
    { K: 6.89e-3, n: 0.7 },
    [
      [0.28444, 0.55825],
      [1.42558, 2.79786],
      [7.14483, 14.02252],
    ],
  ],
  [
    'K√(jω) with K 0.05 (form: Vanderkooy 1989)',
    'power-law',
    { K: 0.05, n: 0.5 },
    [
      [0.88623, 0.88623],
      [2.8025, 2.8025],
      [8.86227, 8.86227],
    ],
  ],
  [
    '0.5 mH and 1 mH ∥ 5 Ω (form: Dodd, Klippel, Oclee-Brown 2004)',
    'inductor+eddy',
    { L1: 0.5e-3, L2: 1e-3, R2: 5 },
    [
      [0.07773, 0.93271],
      [3.06137, 5.57775],
      [4.96854, 31.81131],
    ],
  ],
  [
    '0.2 mH + (2 mH ∥ 0.06√(jω) ∥ 30 Ω) (form: Thorborg, Futtrup 2011)',
    'semi-inductance',
    { Leb: 0.2e-3, Le: 2e-3, K: 0.06, Rss: 30 },
    [
      [0.27126, 0.80771],
      [2.13557, 3.9348],
      [8.47737, 18.36645],
    ],
  ],
];

describe('blocked impedance of a voice coil', () => {
  it.each(WORKED)('%s', (_, coil, figures, expected) => {
    impedanceOf(coil, figures).forEach(([re, im], i) => {
      expect(re).toBeCloseTo(expected[i]![0], 5);
      expect(im).toBeCloseTo(expected[i]![1], 5);
    });
  });

  it('Kr ω^Xr + j Ki ω^Xi as on a maker’s published driver sheet: 0.0022, 0.75, 0.0048, 0.76', () => {
    const z = impedanceOf('split-power-law', { Kr: 0.0022, Xr: 0.75, Ki: 0.0048, Xi: 0.76 });
    expect(z[1]![0]).toBeCloseTo(1.5526, 4);
    expect(z[1]![1]).toBeCloseTo(3.6971, 4);
    expect(z[2]![0]).toBeCloseTo(8.7309, 4);
    expect(z[2]![1]).toBeCloseTo(21.2744, 4);
  });

  it('of an ideal inductor is jωLe', () => {
    expect(impedanceOf('inductor', { Le: 1e-3 })[1]).toEqual([0, expect.closeTo(2 * Math.PI, 12)]);
  });

  it('falls by the effective inductance of the power law: 0.88848, 0.44529, 0.22318 mH', () => {
    const leMilliHenry = impedanceOf('power-law', { K: 6.89e-3, n: 0.7 }).map(([, x], i) => (1e3 * x) / GRID.omega[i]!);
    expect(leMilliHenry[0]).toBeCloseTo(0.88848, 5);
    expect(leMilliHenry[1]).toBeCloseTo(0.44529, 5);
    expect(leMilliHenry[2]).toBeCloseTo(0.22318, 5);
  });
});

const FIGURES: Record<CoilModel, Record<string, number>> = {
  inductor: { Le: 6e-4 },
  'inductor+eddy': { L1: 4e-4, L2: 8e-4, R2: 5 },
  'power-law': { K: 6.89e-3, n: 0.7 },
  'split-power-law': { Kr: 0.0022, Xr: 0.75, Ki: 0.0048, Xi: 0.76 },
  'semi-inductance': { Leb: 2e-4, Le: 2e-3, K: 0.06, Rss: 30 },
};

describe('figures of a coil', () => {
  it.each(COIL_MODELS)('of %s come back as the literature writes them, under their public ids', (coil) => {
    const figures = coilFigures(coil, coilValues(coil, FIGURES[coil]), 0);
    expect(figures.map(({ id }) => id)).toEqual(Object.keys(FIGURES[coil]));
    for (const { id, value } of figures) expect(value! / FIGURES[coil][id]!).toBeCloseTo(1, 12);
  });

  it.each(COIL_MODELS)('of %s carry the gradients by which covariances propagate', (coil) => {
    const values = coilValues(coil, FIGURES[coil]);
    const parameters = coilParameters(coil);
    coilFigures(coil, values, 0).forEach(({ gradient }, at) => {
      for (const [k, { logScaled }] of parameters.entries()) {
        const moved = (h: number) => {
          const shifted = values.map((value, i) => (i === k ? (logScaled ? value * Math.exp(h) : value + h) : value));
          return coilFigures(coil, shifted, 0)[at]!.value!;
        };
        const slope = (moved(1e-5) - moved(-1e-5)) / 2e-5;
        expect(Math.abs(gradient[k]! - slope)).toBeLessThan(1e-6 * Math.max(Math.abs(slope), 1e-6));
      }
    });
  });

  it('say that there is no Rss where its conductance is none', () => {
    const { Leb, Le, K } = FIGURES['semi-inductance'] as { Leb: number; Le: number; K: number };
    const values = coilValues('semi-inductance', { Leb, Le, K });
    expect(coilFigures('semi-inductance', values, 0)[3]).toMatchObject({ id: 'Rss', value: null });
  });
});

describe('relative compliance of a suspension', () => {
  // Knudsen, Jensen 1993: C0[1 − λ·log10(jω/ωs)], λ 0.1: 1.1, 1 and 0.9 − j0.068219 at 0.1, 1 and 10 ωs
  it.each([
    [4, 1.1],
    [40, 1],
    [400, 0.9],
  ])('creeps: at %d Hz with fs 40 Hz its real part is %d', (f, re) => {
    const c = relativeCompliance('creep', [0.1], 0, f, 40);
    expect(c[0]).toBeCloseTo(re, 12);
    expect(c[1]).toBeCloseTo(-0.0682188, 7);
  });

  it('relaxes from 1 + κ far below 1/τ to 1 far above, with a loss of κ/2 in the middle', () => {
    const tau = 1 / (2 * Math.PI * 20);
    expect(relativeCompliance('relaxing', [0.3, tau], 0, 0.002, 40)[0]).toBeCloseTo(1.3, 6);
    expect(relativeCompliance('relaxing', [0.3, tau], 0, 2e5, 40)[0]).toBeCloseTo(1, 6);
    expect(relativeCompliance('relaxing', [0.3, tau], 0, 20, 40)[1]).toBeCloseTo(-0.15, 12);
    expect(relativeCompliance('constant', [], 0, 20, 40)).toEqual([1, 0]);
  });
});
