import { describe, expect, it } from 'vitest';
import { phaseMisfit } from '../../../calculators/reading/text/recognise/minimum-phase.js';

/** Closed forms: the impedances of single parts and of a resistor with a coil, all of minimum phase. */
const grid = Float64Array.from({ length: 200 }, (_, i) => 10 * 2000 ** (i / 199));
const parts: readonly [string, (f: number) => { re: number; im: number }][] = [
  ['a capacitor with its series resistance', (f) => ({ re: 0.1, im: -1 / (2 * Math.PI * f * 10e-6) })],
  ['a coil with its wire', (f) => ({ re: 0.4, im: 2 * Math.PI * f * 1e-3 })],
  ['a resistor', () => ({ re: 8.2, im: 0 })],
  ['a half-order coil', (f) => ({ re: 0.05 * Math.sqrt(f / 2), im: 0.05 * Math.sqrt(f / 2) })],
  [
    'a damped resonance of Q 4',
    (f) => {
      const x = 4 * (f / 300 - 300 / f);
      return { re: 6 + 40 / (1 + x * x), im: (-40 * x) / (1 + x * x) };
    },
  ],
];

describe('the phase that the magnitude implies', () => {
  it.each(parts)('fits %s within 2 degrees', (_, impedance) => {
    const z = Array.from(grid, impedance);
    const lnMagnitude = z.map(({ re, im }) => Math.log(Math.hypot(re, im)));
    const { asWritten } = phaseMisfit(
      grid,
      lnMagnitude,
      z.map(({ re, im }) => Math.atan2(im, re)),
    );
    expect(asWritten).toBeLessThan(2);
  });
  it('lies twice 90 degrees away when the sign of a capacitor is turned', () => {
    const lnMagnitude = grid.map((f) => -Math.log(f));
    const { asWritten, turned } = phaseMisfit(
      grid,
      lnMagnitude,
      grid.map(() => Math.PI / 2),
    );
    expect(asWritten).toBeGreaterThan(179);
    expect(turned).toBeLessThan(1);
  });
  it('does not mind whole turns', () => {
    const lnMagnitude = grid.map((f) => -Math.log(f));
    const { asWritten } = phaseMisfit(
      grid,
      lnMagnitude,
      grid.map((_, i) => -Math.PI / 2 - 2 * Math.PI * (i % 3)),
    );
    expect(asWritten).toBeLessThan(1);
  });
  it('knows nothing of a single frequency', () => {
    expect(phaseMisfit([5, 5], [1, 1], [0, 0]).asWritten).toBe(180);
  });
});
