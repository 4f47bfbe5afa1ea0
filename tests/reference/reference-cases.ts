import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { RoleInput, RoleInputs } from '../../calculators/kit/calculator.js';
import type { Sweep } from '../../calculators/kit/sweep.js';

/** One figure of a reference case: what a correct analysis returns, and how near to it. */
export interface ExpectedFigure {
  readonly value: number;
  readonly tolerance: number;
  readonly observable: boolean;
  readonly tolerance_other_model?: number;
}
export interface ReferenceCase {
  readonly id: string;
  readonly files: readonly { name: string; declared_mass?: number }[]; // their `role` is what they are, not what was said
  readonly model: { coil: string; creep: string | null };
  readonly inputs?: { piston_diameter: number; net_volume?: number };
  readonly true: Readonly<Record<string, number>>;
  readonly noise: { sigma_per_component: number };
  readonly expect: { figures: Readonly<Record<string, ExpectedFigure>>; findings: readonly string[] };
}

const fixtures = join(import.meta.dirname, '..', 'fixtures');

export function referenceCases(folder: string): readonly ReferenceCase[] {
  return JSON.parse(readFileSync(join(fixtures, folder, 'truth.json'), 'utf8')).cases;
}

/** A sweep of the reference set: plain CSV, either real and imaginary part or magnitude and phase in degrees. */
export function referenceSweep(folder: string, file: string): Sweep {
  const [header = '', ...lines] = readFileSync(join(fixtures, folder, file), 'utf8')
    .trimEnd()
    .split('\n');
  const rows = lines.map((line) => line.split(',').map(Number));
  const column = (index: number): Float64Array => Float64Array.from(rows, (row) => row[index] ?? Number.NaN);
  const [frequencyHz, second, third] = [column(0), column(1), column(2)];
  const isPolar = header.includes('magnitude');
  const rad = (i: number): number => ((third[i] ?? 0) * Math.PI) / 180;
  return {
    name: file,
    frequencyHz,
    realOhm: isPolar ? second.map((z, i) => z * Math.cos(rad(i))) : second,
    imaginaryOhm: isPolar ? second.map((z, i) => z * Math.sin(rad(i))) : third,
    conditions: { role: 'sweep' },
  };
}

/** The inputs of driver-fit as the person of this case declared them (two cases declare them the wrong way round). */
export function referenceInputs(folder: string, { files, inputs }: ReferenceCase): RoleInputs {
  const roles: Record<string, RoleInput[]> = {};
  for (const { name, declared_mass: mass } of files) {
    const role = /-mass\d\.csv$/.test(name) ? 'added-mass' : name.endsWith('-box.csv') ? 'known-volume' : 'free-air';
    const keys: Record<string, number> = {};
    if (role === 'added-mass' && mass) keys.mass = mass;
    if (role === 'known-volume' && inputs?.net_volume) keys.volume = inputs.net_volume;
    roles[role] = [...(roles[role] ?? []), { sweep: referenceSweep(folder, name), keys }];
  }
  return roles;
}

const COIL_NAMES: Readonly<Record<string, string>> = {
  L: 'inductor',
  L2R2: 'inductor+eddy',
  leach: 'power-law',
  wright: 'split-power-law',
  semi: 'semi-inductance',
};
const CREEP_NAMES: Readonly<Record<string, string>> = { log: 'creep', solid3: 'relaxing' };
const FIGURE_NAMES: Readonly<Record<string, string>> = {
  re: 'Re',
  fs: 'fs',
  qms: 'Qms',
  qes: 'Qes',
  qts: 'Qts',
  qms_total: 'QmsTotal',
  res: 'Res',
  l_1khz: 'Le1k',
  l_10khz: 'Le10k',
  rcoil_10khz: 'Rcoil10k',
  coil_l1: 'L1',
  coil_l2: 'L2',
  coil_r2: 'R2',
  coil_k: 'K',
  coil_n: 'n',
  coil_le: 'Le',
  coil_kr: 'Kr',
  coil_xr: 'Xr',
  coil_ki: 'Ki',
  coil_xi: 'Xi',
  coil_leb: 'Leb',
  creep_lambda: 'lambda',
  creep_kappa: 'kappa',
  creep_tau: 'tau',
  f_peak: 'fPeak',
  z_peak: 'Zmax',
  mms: 'Mms',
  cms: 'Cms',
  rms: 'Rms',
  bl: 'Bl',
  vas: 'Vas',
  fc: 'fc',
};

/** The product's name of a figure of the data set. */
export function figureId(name: string): string {
  const id = FIGURE_NAMES[name];
  if (!id) throw new Error(`no name for the figure ${name}`);
  return id;
}

/** The settings that tell the model of a case, and what a person would type in beside it. */
export function referenceSettings({ model, inputs }: ReferenceCase, isModelTold: boolean): Record<string, unknown> {
  return {
    air: { density: 1.2041, speedOfSound: 343.21 },
    ...(inputs ? { pistonDiameter: inputs.piston_diameter } : {}),
    ...(isModelTold
      ? { coil: COIL_NAMES[model.coil], suspension: model.creep ? CREEP_NAMES[model.creep] : 'constant' }
      : {}),
  };
}
