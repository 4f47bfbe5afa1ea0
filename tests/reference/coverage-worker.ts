import { parentPort } from 'node:worker_threads';
import { driverFit } from '../../calculators/driver-fit/index.js';
import { runCalculator } from '../../calculators/kit/run.js';
import type { Output } from '../../shared/output.js';
import { CHECK_AIR, CHECK_FIGURES, type CheckCoil, checkDriver } from './check-driver.js';
import { logFrequencies, normals, relativeNoise, sweepOf } from './simulated-driver.js';

/** Noise realisations of the check driver with one coil: seeds from..to, the model told or chosen. */
export interface CoverageJob {
  readonly coil: CheckCoil;
  readonly isModelTold: boolean;
  readonly from: number;
  readonly to: number;
}
export const COVERED = ['Re', 'fs', 'Qms', 'Qes', 'Vas'] as const;
/** For each figure, how many runs lay within one and within two standard uncertainties. */
export type CoverageCounts = Readonly<Record<(typeof COVERED)[number], { once: number; twice: number }>>;

const FREQUENCIES = logFrequencies(300, 10, 20_000);
const NOISE = 0.005;
const MASS_KG = 0.02;
const MASS_UNCERTAINTY_KG = 0.01 * MASS_KG;

function countsOf({ coil, isModelTold, from, to }: CoverageJob): CoverageCounts {
  const counts = Object.fromEntries(COVERED.map((id) => [id, { once: 0, twice: 0 }])) as CoverageCounts;
  for (let seed = from; seed <= to; seed += 1) {
    const output = oneRun(coil, isModelTold, seed);
    for (const id of COVERED) {
      const found = output.figures.find((figure) => figure.id === id);
      if (typeof found?.value !== 'number' || !found.uncertainty) continue;
      const away = Math.abs(found.value - CHECK_FIGURES[id]) / found.uncertainty;
      if (away <= 1) counts[id].once += 1;
      if (away <= 2) counts[id].twice += 1;
    }
  }
  return counts;
}

/** Mass and diameter are told with errors drawn from their own uncertainties. */
function oneRun(coil: CheckCoil, isModelTold: boolean, seed: number): Output {
  const normal = normals(seed);
  const noise = relativeNoise(NOISE, normal);
  const driver = checkDriver(coil);
  const diameterM = Math.sqrt((4 * driver.sd) / Math.PI);
  const diameterUncertaintyM = 0.005 * diameterM;
  const inputs = {
    'free-air': [{ sweep: sweepOf(driver, FREQUENCIES, {}, noise), keys: {} }],
    'added-mass': [
      {
        sweep: sweepOf(driver, FREQUENCIES, { mass: MASS_KG }, noise),
        keys: { mass: MASS_KG + MASS_UNCERTAINTY_KG * normal() },
      },
    ],
  };
  return runCalculator(driverFit, inputs, {
    air: CHECK_AIR,
    pistonDiameter: diameterM + diameterUncertaintyM * normal(),
    pistonDiameterUncertainty: diameterUncertaintyM,
    massUncertainty: MASS_UNCERTAINTY_KG,
    ...(isModelTold ? { coil, suspension: 'constant' } : {}),
  });
}

parentPort?.on('message', (job: CoverageJob) => parentPort?.postMessage(countsOf(job)));
