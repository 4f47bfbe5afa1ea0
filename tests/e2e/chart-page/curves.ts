import type { ChartSweep } from '../../../shared/drawing/chart-input.js';
import type { ImpedancePoints } from '../../../shared/drawing/curves/columns.js';

/** Curves for the chart's own tests: a moving-coil driver in free air, Z = Re + Res/(1 + j·Qms·(f/fs − fs/f)) + j·2πf·Le. */
export interface DriverCurve {
  readonly fsHz: number;
  readonly reOhm: number;
  readonly resOhm: number;
  readonly qms: number;
  readonly leHenry: number;
  readonly points: number;
  readonly fromHz?: number;
  readonly toHz?: number;
}
export function driverPoints(d: DriverCurve): ImpedancePoints {
  const [from, to] = [d.fromHz ?? 10, d.toHz ?? 20_000];
  const frequencyHz = Float64Array.from({ length: d.points }, (_, i) => from * (to / from) ** (i / (d.points - 1)));
  const realOhm = new Float64Array(d.points);
  const imaginaryOhm = new Float64Array(d.points);
  frequencyHz.forEach((f, i) => {
    const x = d.qms * (f / d.fsHz - d.fsHz / f);
    realOhm[i] = d.reOhm + d.resOhm / (1 + x * x) + 0.02 * Math.sqrt(f);
    imaginaryOhm[i] = 2 * Math.PI * f * d.leHenry - (d.resOhm * x) / (1 + x * x);
  });
  return { frequencyHz, realOhm, imaginaryOhm };
}

/** So many different sweeps of `points` points, numbered from W-0417 on. */
export function someSweeps(count: number, points: number): ChartSweep[] {
  return Array.from({ length: count }, (_, k) => ({
    id: `sweep-${k + 1}`,
    name: `W-${String(417 + k).padStart(4, '0')}`,
    lineNumber: (k % 8) + 1,
    points: driverPoints({
      fsHz: 31.8 + k * 1.7,
      reOhm: 5.9 + 0.05 * k,
      resOhm: 40.3 - k * 0.4,
      qms: 5.2 - k * 0.05,
      leHenry: 2.1e-4 + k * 1e-6,
      points,
    }),
  }));
}
