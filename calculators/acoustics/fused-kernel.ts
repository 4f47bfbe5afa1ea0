import type { DriverModel } from './driver-impedance.js';
import type { Kernel } from './kernel-data.js';
import { inductorConstant, inductorCreep, inductorRelaxing } from './kernels/inductor.js';
import { inductorEddyConstant, inductorEddyCreep, inductorEddyRelaxing } from './kernels/inductor-eddy.js';
import { powerLawConstant, powerLawCreep, powerLawRelaxing } from './kernels/power-law.js';
import { semiInductanceConstant, semiInductanceCreep, semiInductanceRelaxing } from './kernels/semi-inductance.js';
import { splitPowerLawConstant, splitPowerLawCreep, splitPowerLawRelaxing } from './kernels/split-power-law.js';
import type { SuspensionModel } from './suspension.js';
import type { CoilModel } from './voice-coil.js';

const KERNELS: Readonly<Record<CoilModel, Readonly<Record<SuspensionModel, Kernel>>>> = {
  inductor: { constant: inductorConstant, creep: inductorCreep, relaxing: inductorRelaxing },
  'inductor+eddy': {
    constant: inductorEddyConstant,
    creep: inductorEddyCreep,
    relaxing: inductorEddyRelaxing,
  },
  'power-law': { constant: powerLawConstant, creep: powerLawCreep, relaxing: powerLawRelaxing },
  'split-power-law': {
    constant: splitPowerLawConstant,
    creep: splitPowerLawCreep,
    relaxing: splitPowerLawRelaxing,
  },
  'semi-inductance': {
    constant: semiInductanceConstant,
    creep: semiInductanceCreep,
    relaxing: semiInductanceRelaxing,
  },
};

/** The unrolled loop for a complex sweep of a driver in free air; null where a load needs the general one. */
export function fusedKernel({ coil, suspension, load }: DriverModel): Kernel | null {
  return load.mass || load.box !== 'none' ? null : KERNELS[coil][suspension];
}
