import { parentPort } from 'node:worker_threads';
import { driverFit } from '../../calculators/driver-fit/index.js';
import { threePoint } from '../../calculators/driver-fit/report/three-point.js';
import { runCalculator } from '../../calculators/kit/run.js';
import { studentQuantile } from '../../calculators/numerics/distributions.js';
import type { Figure, Output } from '../../shared/output.js';
import {
  AIR,
  disturbedSweep,
  motionalMagnitude,
  type OutOfFamilyDriver,
  outOfFamilyDrivers,
} from './out-of-family-drivers.js';
import { logFrequencies } from './simulated-driver.js';

export interface OutOfFamilyJob {
  readonly driver: number; // place in the list
  readonly seeds: readonly number[];
}
export interface OutOfFamilyAnswer {
  readonly covered: number; // runs whose three intervals all cover
  readonly silentMisses: number; // misses without structured-residual
}

const FREQUENCIES = logFrequencies(400, 5, 20_000);
const DENSE = logFrequencies(40_001, 4, 800);

/** fs, Qts and Vas by the three-point method on the noise-free motional impedance, two peaks subtracted for Vas. */
function truthOf(driver: OutOfFamilyDriver): Record<'fs' | 'Qts' | 'Vas', number> {
  const read = (massKg: number) => {
    const magnitudeOhm = motionalMagnitude(driver, DENSE, massKg);
    const found = threePoint(DENSE, magnitudeOhm, driver.parts.re, magnitudeOhm.indexOf(Math.max(...magnitudeOhm)));
    if (!found) throw new Error(`${driver.name} has no three points`);
    return found;
  };
  const [free, loaded] = [read(0), read(driver.addedMassKg)];
  const mmsKg = driver.addedMassKg / ((free.fsHz / loaded.fsHz) ** 2 - 1);
  const stiffness = AIR.density * AIR.speedOfSound ** 2;
  const vas = (stiffness * driver.parts.sd ** 2) / ((2 * Math.PI * free.fsHz) ** 2 * mmsKg);
  return { fs: free.fsHz, Qts: free.qts, Vas: vas };
}

function oneRun(driver: OutOfFamilyDriver, seed: number): Output {
  const massKg = driver.addedMassKg;
  const inputs = {
    'free-air': [{ sweep: disturbedSweep(driver, FREQUENCIES, 2 * seed), keys: {} }],
    'added-mass': [{ sweep: disturbedSweep(driver, FREQUENCIES, 2 * seed + 1, massKg), keys: { mass: massKg } }],
  };
  return runCalculator(driverFit, inputs, { air: AIR, pistonArea: driver.parts.sd });
}

/** The 95 % interval as reported; else value ± t·u. */
function isCovered(figure: Figure | undefined, truth: number): boolean {
  if (typeof figure?.value !== 'number') return false;
  const half = studentQuantile(0.975, figure.dof ?? Number.POSITIVE_INFINITY) * (figure.uncertainty ?? 0);
  const low = figure.interval?.low ?? figure.value - half;
  const high = figure.interval?.high ?? figure.value + half;
  return truth >= low && truth <= high;
}

function answerTo({ driver: place, seeds }: OutOfFamilyJob): OutOfFamilyAnswer {
  const driver = outOfFamilyDrivers()[place];
  if (!driver) throw new Error(`no driver ${place}`);
  const truth = truthOf(driver);
  let [covered, silentMisses] = [0, 0];
  for (const seed of seeds) {
    const output = oneRun(driver, seed);
    const figure = (id: string): Figure | undefined => output.figures.find((found) => found.id === id);
    if (Object.entries(truth).every(([id, value]) => isCovered(figure(id), value))) covered += 1;
    else if (!output.findings.some(({ code }) => code === 'structured-residual')) silentMisses += 1;
  }
  return { covered, silentMisses };
}

parentPort?.on('message', (job: OutOfFamilyJob) => parentPort?.postMessage(answerTo(job)));
