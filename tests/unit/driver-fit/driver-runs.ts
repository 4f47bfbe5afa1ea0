import { vi } from 'vitest';
import { driverFit } from '../../../calculators/driver-fit/index.js';
import type { RoleInput } from '../../../calculators/kit/calculator.js';
import { runCalculator } from '../../../calculators/kit/run.js';
import type { Sweep } from '../../../calculators/kit/sweep.js';
import type { Figure, Output } from '../../../shared/output.js';
import { CHECK_AIR, CHECK_STIFFNESS_OF_AIR, checkDriver } from '../../reference/check-driver.js';
import {
  type DriverParts,
  type Load,
  logFrequencies,
  normals,
  relativeNoise,
  sweepOf,
} from '../../reference/simulated-driver.js';

/** Sweeps of the check driver with 0.2 % noise, and short ways to run driver-fit on them. */
vi.setConfig({ testTimeout: 60_000 }); // a first fit, not compiled yet, on a busy machine

export const driver = checkDriver('inductor+eddy');
export const diameterM = Math.sqrt((4 * driver.sd) / Math.PI);
const frequencyHz = logFrequencies(300, 8, 20_000);

export function noisySweep(parts: DriverParts, load: Load = {}, seed = 1, name = 'free air'): Sweep {
  const disturb = relativeNoise(0.002, normals(seed));
  return { ...sweepOf(parts, frequencyHz, { ...load, stiffnessOfAir: CHECK_STIFFNESS_OF_AIR }, disturb), name };
}
export const freeAir = (sweep: Sweep): RoleInput[] => [{ sweep, keys: {} }];
export const withMass = (massKg: number, sweep: Sweep): RoleInput => ({ sweep, keys: { mass: massKg } });
export const inBox = (volumeM3: number, sweep: Sweep): RoleInput[] => [{ sweep, keys: { volume: volumeM3 } }];

export function fitted(inputs: Record<string, readonly RoleInput[]>, settings: Record<string, unknown> = {}): Output {
  return runCalculator(driverFit, inputs, { air: CHECK_AIR, ...settings });
}
export function figureOf(output: Output, id: string): Figure {
  const found = output.figures.find((figure) => figure.id === id);
  if (!found) throw new Error(`no figure ${id}`);
  return found;
}
export function numberOf(output: Output, id: string): number {
  const { value } = figureOf(output, id);
  if (typeof value !== 'number') throw new Error(`${id} has no value`);
  return value;
}
export const codesOf = (output: Output): string[] => output.findings.map(({ code }) => code);
export const worriesOf = (output: Output): string[] =>
  output.findings.filter(({ severity }) => severity !== 'info').map(({ code }) => code);
