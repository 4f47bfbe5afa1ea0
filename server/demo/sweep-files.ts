import { seededRandom } from '../../calculators/numerics/random.js';
import type { Complex } from './complex.js';

/** A curve with the noise of a bench: 0.2 % of |Z| in each part, always the same for the same seed. */
const NOISE = 0.002;

export interface Trace {
  readonly frequencyHz: readonly number[];
  readonly ohm: readonly Complex[];
}

export function traceOf(impedance: (frequencyHz: number) => Complex, grid: readonly number[], seed: number): Trace {
  const random = seededRandom(seed);
  const ohm = grid.map((f) => {
    const z = impedance(f);
    const [a, b] = [1 + NOISE * random.normal(), NOISE * random.normal()];
    return { re: z.re * a - z.im * b, im: z.re * b + z.im * a };
  });
  return { frequencyHz: grid, ohm };
}

/** `points` frequencies, evenly spaced on a logarithmic axis. */
export function logGrid(lowHz: number, highHz: number, points: number): number[] {
  return Array.from({ length: points }, (_, i) => lowHz * (highHz / lowHz) ** (i / (points - 1)));
}

/** As the school's own jig writes it. */
export function jigFile({ frequencyHz, ohm }: Trace, remark: string): string {
  const rows = frequencyHz.map((f, i) => {
    const { re, im } = ohm[i]!;
    const degrees = (Math.atan2(im, re) * 180) / Math.PI;
    return `${f.toFixed(4)},${Math.hypot(re, im).toPrecision(7)},${degrees.toFixed(4)}`;
  });
  return `# Hillside School, music department: bench 2\n# ${remark}\nFrequency (Hz),Impedance (ohm),Phase (deg)\n${rows.join('\n')}\n`;
}

/** As the laptop in the workshop writes it: semicolons, decimal commas, real and imaginary parts. */
export function laptopFile({ frequencyHz, ohm }: Trace, remark: string): string {
  const comma = (value: number) => value.toPrecision(7).replace('.', ',');
  const rows = frequencyHz.map((f, i) => `${comma(f)};${comma(ohm[i]!.re)};${comma(ohm[i]!.im)}`);
  return `* ${remark}\r\nf [Hz];Re Z [Ohm];Im Z [Ohm]\r\n${rows.join('\r\n')}\r\n`;
}
