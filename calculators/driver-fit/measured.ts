import { InputError } from '../../shared/errors.js';
import { type SweepData, sweepData } from '../acoustics/sweep-term.js';
import type { RoleInput, RoleInputs } from '../kit/calculator.js';
import { hasPhase, magnitudeOf, type Sweep } from '../kit/sweep.js';
import { type CurveKind, curveKind } from './fitting/resonances.js';
import { roles } from './roles.js';
import type { DriverFitSettings } from './settings.js';

export type Role = keyof typeof roles;

/** One sweep as the fit sees it. Shapes (n): every curve of `data`, and magnitudeOhm. */
export interface Measured {
  readonly role: Role;
  readonly name: string;
  readonly sweep: Sweep; // inside the band
  readonly data: SweepData;
  readonly magnitudeOhm: Float64Array;
  readonly kind: CurveKind;
  readonly massKg: number; // added mass; 0 in free air
  readonly massUncertaintyKg: number;
  readonly volumeM3: number | null;
  readonly volumeUncertaintyM3: number;
}

export const LEAST_POINTS_TO_FIT = 16; // fewer cannot settle the seven and more parameters of a driver

/** Every sweep given, free air first, cut to the band of the settings. */
export function measuredSweeps(inputs: RoleInputs, settings: DriverFitSettings): Measured[] {
  const order = Object.keys(roles) as Role[];
  return order.flatMap((role) => (inputs[role] ?? []).flatMap((input) => measuredSweep(role, input, settings)));
}

function measuredSweep(role: Role, { sweep: whole, keys }: RoleInput, settings: DriverFitSettings): Measured[] {
  if (!whole) return [];
  const sweep = settings.band ? insideBand(whole, settings.band) : whole;
  checkLength(sweep, settings);
  return [
    {
      ...curveOf(sweep),
      role,
      massKg: numberOf(keys.mass) ?? 0,
      massUncertaintyKg: numberOf(keys.massUncertainty) ?? settings.massUncertainty ?? 0,
      volumeM3: numberOf(keys.volume),
      volumeUncertaintyM3: numberOf(keys.volumeUncertainty) ?? settings.volumeUncertainty ?? 0,
    },
  ];
}

function checkLength({ name, frequencyHz }: Sweep, { band }: DriverFitSettings): void {
  const { length } = frequencyHz;
  if (length >= LEAST_POINTS_TO_FIT) return;
  if (band) {
    const message = `Only ${length} points of ${name} lie between ${band[0]} and ${band[1]} Hz; at least ${LEAST_POINTS_TO_FIT} are needed. Widen the band.`;
    throw new InputError('bad-setting', message, 'band');
  }
  const message = `${name} has ${length} points; at least ${LEAST_POINTS_TO_FIT} are needed to fit a driver. Sweep with more.`;
  throw new InputError('too-few-points', message, name);
}

type Curve = Pick<Measured, 'name' | 'sweep' | 'data' | 'magnitudeOhm' | 'kind'>;

function curveOf(sweep: Sweep): Curve {
  const magnitudeOhm = magnitudeOf(sweep);
  return {
    name: sweep.name,
    sweep,
    data: sweepData(sweep),
    magnitudeOhm,
    kind: curveKind(sweep.frequencyHz, magnitudeOhm, sweep.imaginaryOhm),
  };
}

/** The same sweep up to a frequency. */
export function cutTo(measured: Measured, upToHz: number): Measured {
  return { ...measured, ...curveOf(insideBand(measured.sweep, [0, upToHz])) };
}

const numberOf = (value: number | string | undefined): number | null => (typeof value === 'number' ? value : null);

function insideBand(sweep: Sweep, [lowHz, highHz]: readonly [number, number]): Sweep {
  const rows = Array.from(sweep.frequencyHz.keys()).filter((row) => {
    const f = sweep.frequencyHz[row] ?? 0;
    return f >= lowHz && f <= highHz;
  });
  const cut = (values: Float64Array): Float64Array => Float64Array.from(rows, (row) => values[row] ?? 0);
  const common = { name: sweep.name, conditions: sweep.conditions, frequencyHz: cut(sweep.frequencyHz) };
  if (hasPhase(sweep)) return { ...common, realOhm: cut(sweep.realOhm), imaginaryOhm: cut(sweep.imaginaryOhm) };
  return { ...common, magnitudeOhm: cut(magnitudeOf(sweep)) };
}
