import { InputError } from '../../shared/errors.js';

/** Conditions of the air as a person states them. Defaults: 20 °C, 101325 Pa, 50 %. */
export interface AirConditions {
  readonly temperatureK: number;
  readonly pressurePa: number;
  readonly humidity: number; // relative, 0 to 1
}
export const USUAL_AIR: AirConditions = { temperatureK: 293.15, pressurePa: 101_325, humidity: 0.5 };

/** What the formulas of acoustics need of the air. */
export interface Air {
  readonly densityKgPerM3: number;
  readonly speedOfSoundMPerS: number;
}

export function airOf(conditions: AirConditions = USUAL_AIR): Air {
  return {
    densityKgPerM3: airDensity(conditions),
    speedOfSoundMPerS: speedOfSound(conditions.temperatureK),
  };
}

/** ρc² in Pa: what turns a compliance into a volume. Scales with pressure, hardly with temperature. */
export function bulkModulusPa({ densityKgPerM3, speedOfSoundMPerS }: Air): number {
  return densityKgPerM3 * speedOfSoundMPerS * speedOfSoundMPerS;
}

const GAS_CONSTANT = 8.314472; // J/(mol·K), as in CIPM-2007
const MOLAR_MASS_DRY = 28.96546e-3; // kg/mol, with 400 µmol/mol of carbon dioxide
const MOLAR_MASS_WATER = 18.01528e-3;

/**
 * Density of moist air in kg/m³:  ρ = p·Ma/(Z·R·T)·[1 − xv(1 − Mv/Ma)].
 * Source: A. Picard, R. S. Davis, M. Gläser, K. Fujii, "Revised formula for the density of moist air (CIPM-2007)", Metrologia 45,
 * 2008, p. 149. Stated for 15 to 27 °C and 600 to 1100 hPa; usable well beyond for this purpose.
 */
export function airDensity(conditions: AirConditions): number {
  const { temperatureK: T, pressurePa: p } = checked(conditions);
  const xv = waterFraction(conditions);
  const compressibility = compressibilityOf(p, T, xv);
  return (
    ((p * MOLAR_MASS_DRY) / (compressibility * GAS_CONSTANT * T)) * (1 - xv * (1 - MOLAR_MASS_WATER / MOLAR_MASS_DRY))
  );
}

/** Mole fraction of water vapour xv = h·f(p, t)·psv(T)/p, same source. */
export function waterFraction({ temperatureK: T, pressurePa: p, humidity }: AirConditions): number {
  const t = T - 273.15;
  const enhancement = 1.00062 + 3.14e-8 * p + 5.6e-7 * t * t;
  return (humidity * enhancement * saturationPressurePa(T)) / p;
}

/** Saturation vapour pressure over water in Pa, same source: exp(AT² + BT + C + D/T). */
export function saturationPressurePa(T: number): number {
  return Math.exp(1.2378847e-5 * T * T - 1.9121316e-2 * T + 33.93711047 - 6.3431645e3 / T);
}

/** Z of moist air, same source; t in °C. */
export function compressibilityOf(p: number, T: number, xv: number): number {
  const t = T - 273.15;
  const ratio = p / T;
  const first =
    1.58123e-6 -
    2.9331e-8 * t +
    1.1043e-10 * t * t +
    (5.707e-6 - 2.051e-8 * t) * xv +
    (1.9898e-4 - 2.376e-6 * t) * xv * xv;
  return 1 - ratio * first + ratio * ratio * (1.83e-11 - 0.765e-8 * xv * xv);
}

/** c = 343.2·√(T/293.15 K) in m/s. Source: ISO 9613-1:1993. Humidity adds up to 0.35 % (not in this formula). */
export function speedOfSound(temperatureK: number): number {
  return 343.2 * Math.sqrt(temperatureK / 293.15);
}

/** p in Pa at a height in m: 101325·(1 − 2.25577e-5·H)^5.25588. Source: ISO 2533, standard atmosphere (from memory). */
export function pressureAtHeight(heightM: number): number {
  return 101_325 * (1 - 2.25577e-5 * heightM) ** 5.25588;
}

function checked(conditions: AirConditions): AirConditions {
  const { temperatureK, pressurePa, humidity } = conditions;
  if (!(temperatureK >= 233.15 && temperatureK <= 333.15))
    throw new InputError('bad-setting', 'The air temperature must lie between −40 and 60 °C.', 'air.temperature');
  if (!(pressurePa >= 30_000 && pressurePa <= 120_000))
    throw new InputError('bad-setting', 'The air pressure must lie between 300 and 1200 hPa.', 'air.pressure');
  if (!(humidity >= 0 && humidity <= 1))
    throw new InputError('bad-setting', 'The relative humidity must lie between 0 and 100 %.', 'air.humidity');
  return conditions;
}
