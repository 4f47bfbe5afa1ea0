import { describe, expect, it } from 'vitest';
import { magnitudes, phasesRad, unwrapped } from '../../../calculators/numerics/complex-array.js';
import { parabolaVertex, peaksOf } from '../../../calculators/numerics/peaks.js';

describe('peaks', () => {
  it('come most prominent first, with the climb down to the higher side as prominence', () => {
    const peaks = peaksOf([0, 5, 3, 4, 1, 9, 8, 8.5, 0]);
    expect(peaks.map(({ index }) => index)).toEqual([5, 1, 3, 7]);
    expect(peaks.map(({ prominence }) => prominence)).toEqual([9, 4, 1, 0.5]);
  });

  it('count a flat top once, at its middle, and never an end', () => {
    expect(peaksOf([9, 1, 4, 4, 4, 2, 7]).map(({ index }) => index)).toEqual([3]);
    expect(peaksOf([1, 2, 3])).toEqual([]);
    expect(peaksOf([1, 2, 2])).toEqual([]);
  });

  it('are placed between the points by a parabola', () => {
    const y = (x: number) => 7 - 2 * (x - 1.3) ** 2;
    const vertex = parabolaVertex([1, 1.5, 2.2], [y(1), y(1.5), y(2.2)]);
    expect(vertex.x).toBeCloseTo(1.3, 12);
    expect(vertex.y).toBeCloseTo(7, 12);
    expect(parabolaVertex([0, 1, 2], [1, 2, 3])).toEqual({ x: 1, y: 2 });
  });
});

describe('complex arrays', () => {
  const z = { re: Float64Array.of(3, 0, -1), im: Float64Array.of(4, -2, 0) };
  it('have magnitudes and phases', () => {
    expect([...magnitudes(z)]).toEqual([5, 2, 1]);
    expect(phasesRad(z)[1]).toBeCloseTo(-Math.PI / 2, 15);
  });

  it('lose the jumps of whole turns', () => {
    const smooth = Array.from({ length: 50 }, (_, i) => -0.4 * i);
    const wrapped = smooth.map((phase) => Math.atan2(Math.sin(phase), Math.cos(phase)));
    unwrapped(wrapped).forEach((phase, i) => {
      expect(phase).toBeCloseTo(smooth[i]!, 9);
    });
  });
});
