import { driverImpedance, FREE_AIR } from '../../acoustics/driver-impedance.js';
import { frequencyGrid, REFERENCE_OMEGA } from '../../acoustics/frequency-grid.js';
import { coilImpedance } from '../../acoustics/voice-coil.js';
import { complexArray } from '../../numerics/complex-array.js';
import type { ModelChoice } from '../fitting/candidates.js';

export interface PointImpedance {
  /** |Z|² of the driver in free air at ln f. */
  readonly squaredOhm: (values: ArrayLike<number>, lnF: number) => number;
  /** Coil alone, without Re. */
  readonly coilOhm: (values: ArrayLike<number>, frequencyHz: number) => { re: number; im: number };
}

/** The model at one frequency at a time. `values`: free-air parameters in the order of `driverParameters`. */
export function pointImpedance(choice: ModelChoice): PointImpedance {
  const grid = frequencyGrid(Float64Array.of(1));
  const z = complexArray(1);
  const model = { ...choice, load: FREE_AIR };
  const moveTo = (frequencyHz: number): void => {
    const omega = 2 * Math.PI * frequencyHz;
    grid.frequencyHz[0] = frequencyHz;
    grid.omega[0] = omega;
    grid.logOmegaRatio[0] = Math.log(omega / REFERENCE_OMEGA);
    grid.rootHalfOmega[0] = Math.sqrt(omega / 2);
  };
  return {
    squaredOhm: (values, lnF) => {
      moveTo(Math.exp(lnF));
      driverImpedance(model, values, grid, z);
      return (z.re[0] ?? 0) ** 2 + (z.im[0] ?? 0) ** 2;
    },
    coilOhm: (values, frequencyHz) => {
      moveTo(frequencyHz);
      coilImpedance(choice.coil, values, 4, grid, z);
      return { re: z.re[0] ?? 0, im: z.im[0] ?? 0 };
    },
  };
}
