import { describe, expect, it } from 'vitest';
import {
  between,
  frequencyFit,
  keptNear,
  panned,
  stretched,
  usableRange,
  valueFit,
  zoomed,
} from '../../../shared/drawing/scales/ranges.js';

function close(actual: readonly number[], expected: readonly number[]): void {
  for (const [i, value] of actual.entries()) expect(value / (expected[i] ?? 1)).toBeCloseTo(1, 9);
}

describe('ranges', () => {
  it('fit the data and 5 % more', () => {
    close(frequencyFit([10, 20_000]), [10 / 1.05, 21_000]);
    expect(valueFit([6, 46], 'linear', true)).toEqual([0, 48]); // 5 % of a span of 40 above, and from zero
    close(valueFit([1, Math.E], 'log'), [Math.exp(-0.05), Math.exp(1.05)]);
  });
  it('give a flat line room above and below', () => {
    const [low, high] = valueFit([8, 8], 'log');
    expect(low).toBeLessThan(8);
    expect(high).toBeGreaterThan(8);
  });
  it('zoom around a value that stays where it is', () => {
    close(zoomed([10, 1000], 'log', 100, 2), [100 / Math.sqrt(10), 100 * Math.sqrt(10)]);
    close(zoomed([0, 10], 'linear', 5, 5), [4, 6]);
  });
  it('pan by a part of what is shown and keep the ratio', () => {
    close(panned([10, 1000], 'log', 0.5), [100, 10_000]);
  });
  it('stretch from one end while the other stands still', () => {
    close(stretched([10, 1000], 'log', 'start', 0.5, 0.25), [10, 100_000]);
    close(stretched([10, 1000], 'log', 'end', 0.5, 0.75), [0.1, 1000]);
  });
  it('go half way between two ranges on the axis itself', () => {
    close(between([10, 100], [1000, 10_000], 'log', 0.5), [100, 1000]);
  });
  it('never leave the data behind, nor shrink it to a line', () => {
    const fit = [10, 10_000] as const;
    const far = keptNear([1e6, 1e7], fit, 'log');
    expect(far[0]).toBeLessThan(10_000);
    const wide = keptNear([1e-9, 1e15], fit, 'log');
    expect(Math.log10((wide[1] ?? 1) / (wide[0] ?? 1))).toBeCloseTo(9, 6); // three times three decades
  });
  it('refuse what no axis can show', () => {
    expect(usableRange([0, 10], 'log')).toBeNull();
    expect(usableRange([5, 5], 'linear')).toBeNull();
    expect(usableRange([Number.NaN, 5], 'linear')).toBeNull();
    expect(usableRange([20, 10], 'log')).toEqual([10, 20]);
  });
});
