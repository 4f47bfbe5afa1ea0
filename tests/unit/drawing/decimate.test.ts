import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { decimatedPath } from '../../../shared/drawing/curves/decimate.js';
import { axisScale } from '../../../shared/drawing/scales/axis-scale.js';

const xScale = axisScale('linear', [0, 1000], 0, 500);
const yScale = axisScale('linear', [0, 100], 400, 0);
const pairs = (path: Float64Array) =>
  Array.from({ length: path.length / 2 }, (_, i): [number, number] => [path[i * 2]!, path[i * 2 + 1]!]);
const toPx = (x: number, y: number): [number, number] => [x / 2, 400 - 4 * y];

/** Height of the drawn polyline at a pixel, by straight lines between its points. */
function heightAt(path: [number, number][], x: number): number {
  const i = path.findIndex(([px]) => px >= x);
  const [right, left] = [path[i]!, path[Math.max(0, i - 1)]!];
  if (right[0] === left[0]) return right[1];
  return left[1] + ((right[1] - left[1]) * (x - left[0])) / (right[0] - left[0]);
}

describe('a decimated path', () => {
  it('holds the highest and the lowest point of every pixel column', () => {
    const values = fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { minLength: 50, maxLength: 400 });
    fc.assert(
      fc.property(values, (ys) => {
        const n = ys.length * 5; // five points a pixel and more
        const x = Float64Array.from({ length: n }, (_, i) => (i * 1000) / n);
        const y = Float64Array.from({ length: n }, (_, i) => ys[(i * 7) % ys.length]!);
        const path = pairs(decimatedPath(x, y, xScale, yScale));
        const drawn = { least: Math.min(...path.map((p) => p[1])), most: Math.max(...path.map((p) => p[1])) };
        expect(drawn.least).toBeCloseTo(400 - 4 * Math.max(...y), 0);
        expect(drawn.most).toBeCloseTo(400 - 4 * Math.min(...y), 0);
      }),
    );
  });
  it('keeps a spike of a single point among a hundred thousand', () => {
    const n = 100_000;
    const x = Float64Array.from({ length: n }, (_, i) => (i * 1000) / n);
    const y = new Float64Array(n).fill(10);
    y[54_321] = 99;
    const path = pairs(decimatedPath(x, y, xScale, yScale));
    const top = path.reduce((a, b) => (b[1] < a[1] ? b : a));
    expect(top).toEqual(toPx(x[54_321]!, 99));
    expect(path.length).toBeLessThan(20); // the flat rest is two strokes
  });
  it('stays within a quarter of a pixel of every point of a smooth curve', () => {
    const n = 2000;
    const x = Float64Array.from({ length: n }, (_, i) => (i * 1000) / (n - 1));
    const y = x.map((v) => 10 + 80 / (1 + ((v - 300) / 40) ** 2));
    const path = pairs(decimatedPath(x, y, xScale, yScale));
    expect(path.length).toBeLessThan(n / 8);
    x.forEach((v, i) => {
      const [px, py] = toPx(v, y[i]!);
      const slope = Math.abs(((y[Math.min(n - 1, i + 1)]! - y[Math.max(0, i - 1)]!) * 4) / ((2 * 1000) / (n - 1) / 2));
      expect(Math.abs(heightAt(path, px) - py)).toBeLessThan(0.25 + slope * 0.5); // half a pixel sideways where it is steep
    });
  });
  it('leaves a gap where values are missing, and joins over masked points', () => {
    const x = Float64Array.of(0, 250, 500, 750, 1000);
    const gap = pairs(decimatedPath(x, Float64Array.of(1, 2, Number.NaN, 4, 5), xScale, yScale));
    expect(gap.filter(([, y]) => Number.isNaN(y))).toHaveLength(1);
    const masked = pairs(
      decimatedPath(x, Float64Array.of(1, 2, 90, 2, 1), xScale, yScale, Uint8Array.of(0, 0, 1, 0, 0)),
    );
    expect(Math.min(...masked.map(([, y]) => y))).toBe(400 - 4 * 2);
  });
  it('draws only what is in view and one point beyond on each side', () => {
    const x = Float64Array.from({ length: 101 }, (_, i) => i * 10);
    const y = x.map((_, i) => (i % 2) * 50);
    const zoomed = axisScale('linear', [395, 425], 0, 500);
    const path = pairs(decimatedPath(x, y, zoomed, yScale));
    expect(path).toHaveLength(5); // 390, 400, 410, 420, 430
    expect(path[0]![0]).toBeLessThan(0);
    expect(path[4]![0]).toBeGreaterThan(500);
  });
  it('gives nothing for nothing', () => {
    expect(decimatedPath(new Float64Array(0), new Float64Array(0), xScale, yScale)).toHaveLength(0);
  });
});
