import { type AirConditions, airOf, USUAL_AIR } from '../../acoustics/air.js';
import type { Measured } from '../measured.js';
import type { DriverFitSettings, Mounting } from '../settings.js';

/** What is told beside the sweeps, in SI, each with its relative standard uncertainty (0: exact). */
export interface Externals {
  readonly sdM2: number | null;
  readonly sdRelative: number;
  readonly densityKgPerM3: number;
  readonly speedOfSoundMPerS: number;
  readonly airRelative: number; // of ρc², which follows the pressure
  readonly isAirTold: boolean;
  readonly volumeM3: number | null;
  readonly volumeRelative: number;
  readonly given: { readonly id: 'Mms' | 'Bl' | 'Cms'; readonly value: number; readonly relative: number } | null;
  readonly airLoadDiscs: 1 | 2;
}

/** Causes of uncertainty that come from outside the sweeps, as the budget names them. */
export const EXTERNAL_CAUSES = ['diameter', 'air', 'volume', 'given'] as const;
export type ExternalCause = (typeof EXTERNAL_CAUSES)[number];

export function externalUncertainty(externals: Externals, cause: ExternalCause): number {
  switch (cause) {
    case 'diameter':
      return externals.sdM2 === null ? 0 : externals.sdRelative;
    case 'air':
      return externals.airRelative;
    case 'volume':
      return externals.volumeM3 === null ? 0 : externals.volumeRelative;
    case 'given':
      return externals.given?.relative ?? 0;
  }
}

const UNTOLD_PRESSURE = 0.01; // relative: weather at sea level; a height of 500 m would be 6 %
const TOLD_PRESSURE = 1e-3; // relative: a household barometer

export function externalsOf(settings: DriverFitSettings, measured: readonly Measured[]): Externals {
  const box = measured.find(({ volumeM3 }) => volumeM3 !== null);
  const volumeM3 = box?.volumeM3 ?? null;
  return {
    ...pistonOf(settings),
    ...airFrom(settings),
    volumeM3,
    volumeRelative: box && volumeM3 ? box.volumeUncertaintyM3 / volumeM3 : 0,
    given: givenOf(settings),
    airLoadDiscs: airLoadDiscsOf(settings.mounting),
  };
}

type AirPart = Pick<Externals, 'densityKgPerM3' | 'speedOfSoundMPerS' | 'airRelative' | 'isAirTold'>;

function airFrom({ air }: DriverFitSettings): AirPart {
  if (air && 'density' in air) {
    return { densityKgPerM3: air.density, speedOfSoundMPerS: air.speedOfSound, airRelative: 0, isAirTold: true };
  }
  const conditions: AirConditions = {
    temperatureK: air?.temperature ?? USUAL_AIR.temperatureK,
    pressurePa: air?.pressure ?? USUAL_AIR.pressurePa,
    humidity: air?.humidity ?? USUAL_AIR.humidity,
  };
  const isAirTold = air?.pressure !== undefined;
  return { ...airOf(conditions), airRelative: isAirTold ? TOLD_PRESSURE : UNTOLD_PRESSURE, isAirTold };
}

/** Piston area and its relative uncertainty: u(Sd)/Sd = 2·u(Dd)/Dd. */
export function pistonOf(settings: DriverFitSettings): { sdM2: number | null; sdRelative: number } {
  const { pistonDiameter, pistonDiameterUncertainty = 0, pistonArea, pistonAreaUncertainty = 0 } = settings;
  if (pistonArea !== undefined) return { sdM2: pistonArea, sdRelative: pistonAreaUncertainty / pistonArea };
  if (pistonDiameter === undefined) return { sdM2: null, sdRelative: 0 };
  return {
    sdM2: (Math.PI * pistonDiameter ** 2) / 4,
    sdRelative: (2 * pistonDiameterUncertainty) / pistonDiameter,
  };
}

export function givenOf({ given }: DriverFitSettings): Externals['given'] {
  if (!given) return null;
  for (const id of ['Mms', 'Bl', 'Cms'] as const) {
    const value = given[id];
    if (value !== undefined) return { id, value, relative: (given.uncertainty ?? 0) / value };
  }
  return null;
}

/** Discs of (8/3)ρa³: one in free air, one for each side in a baffle; a box is counted as a baffle. */
export const airLoadDiscsOf = (mounting: Mounting): 1 | 2 => (mounting === 'free-air' ? 1 : 2);
