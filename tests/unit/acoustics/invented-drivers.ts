import { type DriverModel, driverImpedance, FREE_AIR } from '../../../calculators/acoustics/driver-impedance.js';
import { frequencyGrid } from '../../../calculators/acoustics/frequency-grid.js';
import type { SuspensionModel } from '../../../calculators/acoustics/suspension.js';
import { type CoilModel, coilValues } from '../../../calculators/acoustics/voice-coil.js';
import type { ComplexSweep } from '../../../calculators/kit/sweep.js';
import { type RandomSource, seededRandom } from '../../../calculators/numerics/random.js';

/** A driver made up from a seed, its true fitted values in the order of `driverParameters`, and a noisy sweep of it. */
export interface InventedDriver {
  readonly coil: CoilModel;
  readonly suspension: SuspensionModel;
  readonly values: number[];
  readonly sweep: ComplexSweep;
}

/** Coil values that give a reactance of about `xOhm` at 10 kHz. */
function inventedCoil(coil: CoilModel, xOhm: number, random: RandomSource): number[] {
  const w = 2 * Math.PI * 1e4;
  if (coil === 'inductor') return [xOhm / w];
  if (coil === 'inductor+eddy') {
    const l1 = (xOhm / w) * random.between(0.3, 0.9);
    const l2 = l1 * random.logBetween(0.4, 4);
    return [l1, l2, l2 * 2 * Math.PI * random.logBetween(300, 5000)];
  }
  if (coil === 'power-law') {
    const n = random.between(0.5, 0.9);
    return coilValues(coil, { K: xOhm / Math.sin((n * Math.PI) / 2) / w ** n, n });
  }
  if (coil === 'split-power-law') {
    const [Xi, Xr] = [random.between(0.55, 0.85), random.between(0.55, 1)];
    const kr = xOhm * random.between(0.3, 0.7);
    return coilValues(coil, { Kr: kr / w ** Xr, Xr, Ki: xOhm / w ** Xi, Xi });
  }
  const K = (xOhm / Math.sqrt(w)) * random.between(0.7, 1.3);
  const corner = 2 * Math.PI * random.logBetween(80, 1500); // where ωLe = K√ω
  return coilValues(coil, {
    Leb: (xOhm / w) * random.between(0.1, 0.5),
    Le: K / Math.sqrt(corner),
    K,
    Rss: random.uniform() < 0.4 ? 0 : xOhm * random.logBetween(1.5, 8), // 0: none
  });
}

export function inventedDriver(
  seed: number,
  coil: CoilModel,
  suspension: SuspensionModel,
  options: SweepOptions = {},
): InventedDriver {
  const random = seededRandom(seed);
  const fsHz = random.logBetween(18, 900);
  const reOhm = random.logBetween(2.5, 14);
  const suspensionValues = {
    constant: () => [],
    creep: () => [random.between(0.02, 0.15)],
    relaxing: () => [random.logBetween(0.08, 0.5), 1 / (2 * Math.PI * fsHz * random.logBetween(0.15, 1.5))],
  }[suspension]();
  const values = [
    reOhm,
    fsHz,
    random.logBetween(1.2, 12),
    random.logBetween(0.2, 1.8),
    ...inventedCoil(coil, reOhm * random.logBetween(0.5, 6), random),
    ...suspensionValues,
  ];
  const { low = Math.min(10, fsHz / 4), ...others } = options;
  return { coil, suspension, values, sweep: noisySweep({ coil, suspension }, values, random, { low, ...others }) };
}

export interface SweepOptions {
  readonly noise?: number; // relative, each component
  readonly points?: number;
  readonly low?: number; // Hz
  readonly high?: number;
}

/** The sweep of a driver in free air with these values: log-spaced points, relative complex noise. */
export function noisySweep(
  { coil, suspension }: Pick<DriverModel, 'coil' | 'suspension'>,
  values: readonly number[],
  random: RandomSource,
  { noise = 0.005, points = 300, low = 10, high = 20_000 }: SweepOptions = {},
): ComplexSweep {
  const frequencyHz = Float64Array.from({ length: points }, (_, i) => low * (high / low) ** (i / (points - 1)));
  const z = driverImpedance({ coil, suspension, load: FREE_AIR }, values, frequencyGrid(frequencyHz));
  for (let i = 0; i < points; i++) {
    const [a, b] = [1 + noise * random.normal(), noise * random.normal()];
    const [re, im] = [z.re[i]!, z.im[i]!];
    z.re[i] = re * a - im * b;
    z.im[i] = re * b + im * a;
  }
  return { name: coil, frequencyHz, realOhm: z.re, imaginaryOhm: z.im, conditions: { role: 'free-air' } };
}
