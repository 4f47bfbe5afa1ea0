import { relativeCompliance, suspensionParameters } from '../../acoustics/suspension.js';
import { coilFigures } from '../../acoustics/voice-coil.js';
import type { Outcome } from '../fitting/analysis.js';
import { definitionFigures } from './definition-values.js';
import type { DriverNumbers } from './derived-figures.js';
import type { Externals } from './externals.js';
import { pointImpedance } from './point-impedance.js';

/** Small relative changes of what is told, while derivatives are formed: ln of the factor on each. */
export interface ExternalShifts {
  readonly diameter: number; // on Sd
  readonly air: number; // on the density, at a constant speed of sound
  readonly volume: number;
  readonly given: number;
}
export const NO_SHIFTS: ExternalShifts = { diameter: 0, air: 0, volume: 0, given: 0 };

/** How the moving mass and Vas are known: each way with its share. */
export const MASS_WAYS = ['added-mass', 'known-volume', 'given'] as const;
export type MassWay = (typeof MASS_WAYS)[number];
export interface WayShares {
  readonly mass: Readonly<Partial<Record<MassWay, number>>>; // weights of ln Mms
  readonly vas: Readonly<Partial<Record<MassWay, number>>>; // weights of ln Vas
}

/** One fitted model as a function: joint values (p, natural) and shifts of what is told, to the driver's numbers. */
export interface NumbersOf {
  readonly lnMass: (values: Float64Array, shifts: ExternalShifts) => Partial<Record<MassWay, number>>;
  readonly lnVas: (values: Float64Array, shifts: ExternalShifts) => Partial<Record<MassWay, number>>;
  readonly numbers: (values: Float64Array, shifts: ExternalShifts, shares: WayShares) => DriverNumbers;
}

interface Reader {
  readonly read: (values: Float64Array, id: string) => number | null;
  readonly alphaId: string; // of the test box; '' without one
  readonly boxMassId: string;
}

/** A parameter that rests on a bound is not known: a mass that shifted nothing has no Mms to give. */
function readerOf({ problem: { parameters }, fit }: Pick<Outcome, 'problem' | 'fit'>): Reader {
  const known = parameters.map(({ id }, k) => [id, k] as const).filter(([id]) => !fit.atBound.includes(id));
  const at = new Map(known);
  const named = (pattern: RegExp): string => parameters.find(({ id }) => pattern.test(id))?.id ?? '';
  return {
    read: (values, id) => {
      const k = at.get(id);
      return k === undefined ? null : (values[k] ?? null);
    },
    alphaId: named(/^alpha\d+$/),
    boxMassId: named(/^mu\d+$/),
  };
}

/** `heaviestKg`: the largest added mass, null without one. */
export function numbersOf(
  { problem, choice, fit }: Pick<Outcome, 'problem' | 'choice' | 'fit'>,
  externals: Externals,
  heaviestKg: number | null,
): NumbersOf {
  const reader = readerOf({ problem, fit });
  const { read, alphaId, boxMassId } = reader;
  const ways = waysOf(problem, reader, externals);
  const point = pointImpedance(choice);
  const numbers: NumbersOf['numbers'] = (values, shifts, shares) => {
    const { sdM2, density, stiffness, volumeM3 } = toldWith(externals, shifts);
    const local = problem.localValues(0, values);
    const [reOhm = 1, fsHz = 1, qms = 1, qes = 1] = local;
    const mmsKg = blended(ways.lnMass(values, shifts), shares.mass);
    const vasM3 = blended(ways.lnVas(values, shifts), shares.vas);
    const alpha = read(values, alphaId);
    const boxMass = 1 + (read(values, boxMassId) ?? 0);
    return {
      reOhm,
      fsHz,
      qms,
      qes,
      qmsTotal: 1 / (1 / qms + suspensionLoss(choice.suspension, local, fsHz)),
      mmsKg,
      vasM3,
      sdM2: sdM2 ?? impliedArea(mmsKg, vasM3, fsHz, stiffness),
      fcHz: alpha === null ? null : fsHz * Math.sqrt((1 + alpha) / boxMass),
      densityKgPerM3: density,
      speedOfSoundMPerS: externals.speedOfSoundMPerS,
      definition: definitionFigures(choice, local, {
        massKg: heaviestKg,
        mmsKg: read(values, 'Mms'),
        alpha,
        volumeM3,
        stiffnessTimesArea: sdM2 === null ? null : stiffness * sdM2 * sdM2,
      }),
      coilOhm: (frequencyHz) => point.coilOhm(local, frequencyHz),
      squaredOhm: (lnF) => point.squaredOhm(local, lnF),
      parameters: modelParameters(choice, local),
    };
  };
  return { ...ways, numbers };
}

function waysOf(
  problem: Outcome['problem'],
  { read, alphaId }: Reader,
  externals: Externals,
): Pick<NumbersOf, 'lnMass' | 'lnVas'> {
  const lnMass: NumbersOf['lnMass'] = (values, shifts) => {
    const { sdM2, stiffness, volumeM3, given } = toldWith(externals, shifts);
    const [re, fs, , qes] = problem.localValues(0, values);
    const omega = 2 * Math.PI * (fs ?? 1);
    const mms = read(values, 'Mms');
    const alpha = read(values, alphaId);
    const ways: Partial<Record<MassWay, number>> = {};
    if (mms !== null) ways['added-mass'] = Math.log(mms);
    if (alpha !== null && sdM2 !== null && volumeM3 !== null) {
      ways['known-volume'] = Math.log((stiffness * sdM2 * sdM2) / (omega * omega * alpha * volumeM3));
    }
    if (given) ways.given = Math.log(massFromGiven(given, omega, re ?? 1, qes ?? 1));
    return ways;
  };
  const lnVas: NumbersOf['lnVas'] = (values, shifts) => {
    const { sdM2, stiffness, volumeM3 } = toldWith(externals, shifts);
    const omega = 2 * Math.PI * (problem.localValues(0, values)[1] ?? 1);
    const ways: Partial<Record<MassWay, number>> = {};
    const masses = lnMass(values, shifts);
    for (const way of ['added-mass', 'given'] as const) {
      const ln = masses[way];
      if (ln !== undefined && sdM2 !== null) ways[way] = Math.log((stiffness * sdM2 * sdM2) / (omega * omega)) - ln;
    }
    const alpha = read(values, alphaId);
    if (alpha !== null && volumeM3 !== null) ways['known-volume'] = Math.log(alpha * volumeM3);
    return ways;
  };
  return { lnMass, lnVas };
}

function toldWith(externals: Externals, shifts: ExternalShifts) {
  const { sdM2, volumeM3, given, densityKgPerM3, speedOfSoundMPerS } = externals;
  const density = densityKgPerM3 * Math.exp(shifts.air);
  return {
    sdM2: sdM2 === null ? null : sdM2 * Math.exp(shifts.diameter),
    volumeM3: volumeM3 === null ? null : volumeM3 * Math.exp(shifts.volume),
    given: given && { ...given, value: given.value * Math.exp(shifts.given) },
    density,
    stiffness: density * speedOfSoundMPerS ** 2,
  };
}

function massFromGiven(given: { id: string; value: number }, omega: number, re: number, qes: number): number {
  if (given.id === 'Mms') return given.value;
  if (given.id === 'Cms') return 1 / (omega * omega * given.value);
  return (given.value * given.value * qes) / (omega * re); // Bl² = ωs·Mms·Re/Qes
}

function blended(
  logarithms: Partial<Record<MassWay, number>>,
  shares: Readonly<Partial<Record<MassWay, number>>>,
): number | null {
  let sum = 0;
  let total = 0;
  for (const way of MASS_WAYS) {
    const ln = logarithms[way];
    const share = shares[way] ?? 0;
    if (ln === undefined || share === 0) continue;
    sum += share * ln;
    total += share;
  }
  return total > 0 ? Math.exp(sum / total) : null;
}

/** Sd = √(Vas/(ρc²·Cms)): what mass and test box together say of the piston when nobody measured it. */
function impliedArea(mmsKg: number | null, vasM3: number | null, fsHz: number, stiffness: number): number | null {
  if (mmsKg === null || vasM3 === null) return null;
  return Math.sqrt((vasM3 * (2 * Math.PI * fsHz) ** 2 * mmsKg) / stiffness);
}

/** Re(1/(j·c)) at fs: what the suspension's own loss adds to 1/Qms. */
function suspensionLoss(suspension: Outcome['choice']['suspension'], local: Float64Array, fsHz: number): number {
  const first = local.length - suspensionParameters(suspension).length;
  const [re, im] = relativeCompliance(suspension, local, first, fsHz, fsHz);
  return -im / (re * re + im * im);
}

function modelParameters({ coil, suspension }: Outcome['choice'], local: Float64Array): Record<string, number | null> {
  const parameters: Record<string, number | null> = {};
  for (const { id, value } of coilFigures(coil, local, 4)) parameters[id] = value;
  const laws = suspensionParameters(suspension);
  for (const [k, { id }] of laws.entries()) parameters[id] = local[local.length - laws.length + k] ?? 0;
  return parameters;
}
