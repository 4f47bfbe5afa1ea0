import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/**
 * Statistical Reference Datasets of the National Institute of Standards and Technology, nonlinear regression: the
 * files are unchanged, their certified values have eleven digits. Both starts, derivatives by differences, no bounds,
 * no logarithmic scaling.
 */
type Model = (b: Float64Array, x: number) => number;
const { exp } = Math;
const cubicOverCubic: Model = (b, x) =>
  (b[0]! + x * (b[1]! + x * (b[2]! + x * b[3]!))) / (1 + x * (b[4]! + x * (b[5]! + x * b[6]!)));
export const MODELS: Record<string, Model> = {
  BoxBOD: (b, x) => b[0]! * (1 - exp(-b[1]! * x)),
  Chwirut2: (b, x) => exp(-b[0]! * x) / (b[1]! + b[2]! * x),
  DanWood: (b, x) => b[0]! * x ** b[1]!,
  Gauss1: (b, x) =>
    b[0]! * exp(-b[1]! * x) + b[2]! * exp(-(((x - b[3]!) / b[4]!) ** 2)) + b[5]! * exp(-(((x - b[6]!) / b[7]!) ** 2)),
  Hahn1: cubicOverCubic,
  Kirby2: (b, x) => (b[0]! + x * (b[1]! + x * b[2]!)) / (1 + x * (b[3]! + x * b[4]!)),
  Lanczos3: (b, x) => b[0]! * exp(-b[1]! * x) + b[2]! * exp(-b[3]! * x) + b[4]! * exp(-b[5]! * x),
  MGH09: (b, x) => (b[0]! * (x * x + x * b[1]!)) / (x * x + x * b[2]! + b[3]!),
  MGH17: (b, x) => b[0]! + b[1]! * exp(-x * b[3]!) + b[2]! * exp(-x * b[4]!),
  Misra1a: (b, x) => b[0]! * (1 - exp(-b[1]! * x)),
  Misra1c: (b, x) => b[0]! * (1 - 1 / Math.sqrt(1 + 2 * b[1]! * x)),
  Rat43: (b, x) => b[0]! / (1 + exp(b[1]! - b[2]! * x)) ** (1 / b[3]!),
  Roszman1: (b, x) => b[0]! - b[1]! * x - Math.atan(b[2]! / (x - b[3]!)) / Math.PI,
  Thurber: cubicOverCubic,
};

export interface CertifiedSet {
  starts: number[][];
  values: number[];
  deviations: number[];
  sumOfSquares: number;
  x: number[];
  y: number[];
}

export function readSet(name: string): CertifiedSet {
  const text = readFileSync(fileURLToPath(new URL(`../fixtures/nist-strd/${name}.dat`, import.meta.url)), 'latin1');
  const lines = text.split(/\r?\n/);
  const numbers = (line: string) => line.trim().split(/\s+/).map(Number);
  const rows = lines.filter((line) => /^\s*b\d+\s*=/.test(line)).map((line) => numbers(line.split('=')[1]!));
  const header = lines.findLastIndex((line) => line.startsWith('Data:'));
  const data = lines
    .slice(header + 1)
    .filter((line) => line.trim() !== '')
    .map(numbers);
  const residual = lines.find((line) => line.startsWith('Residual Sum of Squares:'))!;
  return {
    starts: [rows.map((row) => row[0]!), rows.map((row) => row[1]!)],
    values: rows.map((row) => row[2]!),
    deviations: rows.map((row) => row[3]!),
    sumOfSquares: Number(residual.split(':')[1]),
    x: data.map((row) => row[1]!),
    y: data.map((row) => row[0]!),
  };
}

/** Fewest digits that agree: −lg of the largest relative error. */
export function digitsAgreeing(found: ArrayLike<number>, certified: number[]): number {
  return Math.min(...certified.map((value, k) => -Math.log10(Math.abs(found[k]! - value) / Math.abs(value) || 1e-16)));
}
