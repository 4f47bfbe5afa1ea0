import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { describeImpedance, highestPeak, impedanceTable } from '../../../shared/drawing/words/describe.js';
import { drawnPointsCsv } from '../../../shared/drawing/words/drawn-points-csv.js';
import { extremaOf } from '../../../shared/drawing/words/extrema.js';
import { cursorReadout, valueOfCurve } from '../../../shared/drawing/words/readout.js';
import { driverPoints, someSweeps } from '../../e2e/chart-page/curves.js';

const driver = { fsHz: 31.8, reOhm: 6, resOhm: 40, qms: 5, leHenry: 2.1e-4 };
const GAP = '\u00A0';

describe('the sentence', () => {
  it('names the peak, the lowest point after it and the end, as they are in the data', () => {
    const points = driverPoints({ ...driver, points: 4001 });
    // |Z| at fs is Re + Res + 0.02·√fs (the curve's own lossy part), with the coil's share in quadrature.
    expect(describeImpedance([{ name: 'W-0417', points }], 'en')).toMatch(
      new RegExp(
        `^W-0417: peak 46\\.1${GAP}Ω at 31\\.8${GAP}Hz, lowest 6\\.[34]\\d?${GAP}Ω at 2\\d\\d${GAP}Hz, rising to 27\\.8${GAP}Ω at 20${GAP}kHz\\.$`,
      ),
    );
  });
  it('compares the peaks of the others with the first', () => {
    const points = driverPoints({ ...driver, points: 4001 });
    const higher = { name: 'W-0418', points: driverPoints({ ...driver, fsHz: 33.5, points: 4001 }) };
    expect(describeImpedance([{ name: 'W-0417', points }, higher], 'en')).toContain(`W-0418 peaks 1.7${GAP}Hz higher.`);
    expect(describeImpedance([higher, { name: 'W-0417', points }], 'en')).toContain(`W-0417 peaks 1.7${GAP}Hz lower.`);
    expect(describeImpedance([higher, { ...higher, name: 'X' }], 'en')).toContain('X peaks at the same place.');
  });
  it('finds no peak where there is none', () => {
    const frequencyHz = Float64Array.from({ length: 50 }, (_, i) => 10 * 1.2 ** i);
    const capacitor = { frequencyHz, magnitudeOhm: frequencyHz.map((f) => 1e4 / f) };
    expect(highestPeak(capacitor)).toBeNull();
    expect(describeImpedance([{ name: 'C3', points: capacitor }], 'en')).toMatch(/^C3: falling to .*lowest/);
    expect(describeImpedance([], 'en')).toBe('No sweep is drawn.');
  });
});

describe('peaks and dips', () => {
  it('have the prominence of the land they stand on', () => {
    //              0  1  2  3  4  5  6  7  8
    const heights = [0, 5, 2, 9, 1, 4, 3, 6, 0];
    expect(extremaOf(Float64Array.from(heights), 0)).toEqual([
      { index: 1, kind: 'peak', prominence: 3 },
      { index: 2, kind: 'dip', prominence: 3 },
      { index: 3, kind: 'peak', prominence: 9 },
      { index: 4, kind: 'dip', prominence: 5 },
      { index: 5, kind: 'peak', prominence: 1 },
      { index: 6, kind: 'dip', prominence: 1 },
      { index: 7, kind: 'peak', prominence: 5 },
    ]);
  });
  it('agree with a slow count straight from the definition', () => {
    fc.assert(
      fc.property(fc.array(fc.integer({ min: 0, max: 1000 }), { minLength: 3, maxLength: 40 }), (list) => {
        const values = Float64Array.from(list, (v, i) => v + i * 1e-6); // no two alike
        const slow = [...values.keys()].slice(1, -1).flatMap((i) => {
          const height = values[i]!;
          if (height <= values[i - 1]! || height <= values[i + 1]!) return [];
          const lowest = (step: 1 | -1) => {
            let low = height;
            for (let k = i + step; k >= 0 && k < values.length && values[k]! <= height; k += step)
              low = Math.min(low, values[k]!);
            return low;
          };
          return [{ index: i, prominence: height - Math.max(lowest(1), lowest(-1)) }];
        });
        const found = extremaOf(values, 0).filter((e) => e.kind === 'peak');
        expect(found.map(({ index, prominence }) => ({ index, prominence }))).toEqual(slow);
      }),
    );
  });
});

describe('the readout', () => {
  const points = driverPoints({ ...driver, points: 300 });
  it('gives the measured values themselves at a measured point', () => {
    const i = 137;
    const value = valueOfCurve(points, points.frequencyHz[i]!)!;
    expect(value.isMeasured).toBe(true);
    expect([value.realOhm, value.imaginaryOhm]).toEqual([points.realOhm![i], points.imaginaryOhm![i]]);
    expect(value.magnitudeOhm).toBe(Math.hypot(points.realOhm![i]!, points.imaginaryOhm![i]!));
  });
  it('goes straight over the logarithm of frequency between two points', () => {
    const two = { frequencyHz: Float64Array.of(100, 400), magnitudeOhm: Float64Array.of(2, 8) };
    expect(valueOfCurve(two, 200)).toMatchObject({ isMeasured: false, phaseDeg: undefined });
    expect(valueOfCurve(two, 200)!.magnitudeOhm).toBeCloseTo(4, 12);
  });
  it('takes the short way over ±180 degrees', () => {
    const at = (deg: number) => [Math.cos((deg * Math.PI) / 180), Math.sin((deg * Math.PI) / 180)] as const;
    const [a, b] = [at(170), at(-170)];
    const jump = {
      frequencyHz: Float64Array.of(1, 4),
      realOhm: Float64Array.of(a[0], b[0]),
      imaginaryOhm: Float64Array.of(a[1], b[1]),
    };
    expect(Math.abs(valueOfCurve(jump, 2)!.phaseDeg!)).toBeCloseTo(180, 9);
  });
  it('says nothing outside the sweep', () => {
    expect(valueOfCurve(points, 9.9)).toBeNull();
    expect(valueOfCurve(points, 20_001)).toBeNull();
    expect(cursorReadout(points, null, 5)).toEqual({ a: null, b: null, difference: null, ratio: null });
  });
  it('gives B − A and B ÷ A', () => {
    const two = { frequencyHz: Float64Array.of(100, 400), magnitudeOhm: Float64Array.of(2, 8) };
    const { difference, ratio } = cursorReadout(two, 100, 400);
    expect(difference).toEqual({ frequencyHz: 300, magnitudeOhm: 6 });
    expect(ratio).toEqual({ frequency: 4, magnitude: 4 });
  });
});

describe('table and CSV', () => {
  const [sweep] = someSweeps(1, 2000);
  it('thins the table evenly and keeps both ends and every peak', () => {
    const rows = impedanceTable(sweep!.points, null);
    expect(rows.length).toBeLessThanOrEqual(210);
    expect([rows[0]!.index, rows[rows.length - 1]!.index]).toEqual([0, 1999]);
    const peak = rows.find((row) => row.kind === 'peak')!;
    expect(peak.index).toBe(highestPeak(sweep!.points));
  });
  it('matches the curve in every row', () => {
    for (const row of impedanceTable(sweep!.points, [20, 200])) {
      expect(row.frequencyHz).toBe(sweep!.points.frequencyHz[row.index]);
      expect(row.magnitudeOhm).toBe(valueOfCurve(sweep!.points, row.frequencyHz)!.magnitudeOhm);
      expect(row.frequencyHz >= 20 && row.frequencyHz <= 200).toBe(true);
    }
  });
  it('writes exactly the drawn points, with every digit', () => {
    const lines = drawnPointsCsv([sweep!], [20, 40], { separator: ';', decimalMark: ',' }).trimEnd().split('\r\n');
    const inRange = sweep!.points.frequencyHz.filter((f) => f >= 20 && f <= 40);
    expect(lines).toHaveLength(inRange.length + 1);
    const [name, hz, ohm] = lines[1]!.split(';');
    expect(name).toBe('"W-0417"');
    expect(Number(hz!.replace(',', '.'))).toBe(inRange[0]);
    expect(Number(ohm!.replace(',', '.'))).toBe(valueOfCurve(sweep!.points, inRange[0]!)!.magnitudeOhm);
  });
  it('keeps a name from running as a formula in a spreadsheet', () => {
    const csv = drawnPointsCsv([{ ...sweep!, name: '=1+1"' }], [20, 21], { separator: ',', decimalMark: '.' });
    expect(csv).toContain(`"'=1+1"""`);
  });
});
