/**
 * Numbers for people: from SI to the unit a person reads, and back, with the value's uncertainty to two significant
 * digits. Inside the product everything is SI; only form fields, chart labels and tables go through here.
 */
export type UnitSystem = 'metric' | 'inch';

/** One unit that people read or write: SI = (shown + offset) · factor. */
export interface Unit {
  readonly symbol: string;
  readonly si: string;
  readonly factor: number; // exact by definition (inch 25.4 mm, pound 0.45359237 kg)
  readonly offset?: number; // only degrees Celsius
}
const unit = (symbol: string, si: string, factor: number, offset?: number): Unit =>
  offset === undefined ? { symbol, si, factor } : { symbol, si, factor, offset };

const INCH = 0.0254; // m
const POUND = 0.45359237; // kg
export const UNITS: readonly Unit[] = [
  unit('mm', 'm', 1e-3),
  unit('cm', 'm', 1e-2),
  unit('m', 'm', 1),
  unit('in', 'm', INCH),
  unit('cm²', 'm²', 1e-4),
  unit('m²', 'm²', 1),
  unit('in²', 'm²', INCH ** 2),
  unit('cm³', 'm³', 1e-6),
  unit('L', 'm³', 1e-3),
  unit('m³', 'm³', 1),
  unit('in³', 'm³', INCH ** 3),
  unit('ft³', 'm³', (12 * INCH) ** 3),
  unit('mg', 'kg', 1e-6),
  unit('g', 'kg', 1e-3),
  unit('kg', 'kg', 1),
  unit('oz', 'kg', POUND / 16),
  unit('lb', 'kg', POUND),
  unit('mΩ', 'Ω', 1e-3),
  unit('Ω', 'Ω', 1),
  unit('kΩ', 'Ω', 1e3),
  unit('MΩ', 'Ω', 1e6),
  unit('pF', 'F', 1e-12),
  unit('nF', 'F', 1e-9),
  unit('µF', 'F', 1e-6),
  unit('mF', 'F', 1e-3),
  unit('F', 'F', 1),
  unit('nH', 'H', 1e-9),
  unit('µH', 'H', 1e-6),
  unit('mH', 'H', 1e-3),
  unit('H', 'H', 1),
  unit('Hz', 'Hz', 1),
  unit('kHz', 'Hz', 1e3),
  unit('MHz', 'Hz', 1e6),
  unit('µs', 's', 1e-6),
  unit('ms', 's', 1e-3),
  unit('s', 's', 1),
  unit('mm/N', 'm/N', 1e-3),
  unit('m/N', 'm/N', 1),
  unit('mV', 'V', 1e-3),
  unit('V', 'V', 1),
  unit('mW', 'W', 1e-3),
  unit('W', 'W', 1),
  unit('hPa', 'Pa', 100),
  unit('Pa', 'Pa', 1),
  unit('°C', 'K', 1, 273.15),
  unit('K', 'K', 1),
];
const bySymbol = new Map(UNITS.map((known) => [known.symbol, known]));

const SPELLINGS: Readonly<Record<string, string>> = {
  ohm: 'Ω',
  '\u2126': 'Ω',
  'm^2': 'm²',
  m2: 'm²',
  'm^3': 'm³',
  m3: 'm³',
  'N/A': 'T·m',
  'T m': 'T·m',
  Tm: 'T·m',
  'N·s/m': 'kg/s',
  deg: '°',
  degree: '°',
  '1': '',
};
/** One spelling for an SI unit, whichever way a calculator wrote it; '' for a pure number. */
export function siSymbol(written: string): string {
  return SPELLINGS[written] ?? written;
}
/** A unit by its symbol; an SI unit that has no other to be shown in stands for itself. */
export function unitOf(symbol: string): Unit {
  const written = siSymbol(symbol);
  return bySymbol.get(written) ?? unit(written, written, 1);
}

export function displayFromSi(valueSi: number, shown: Unit): number {
  return valueSi / shown.factor - (shown.offset ?? 0);
}
export function siFromDisplay(value: number, shown: Unit): number {
  return (value + (shown.offset ?? 0)) * shown.factor;
}

/** The unit in which a value is best read. The sign does not matter; zero takes the middle one. */
export function displayUnit(valueSi: number, si: string, system: UnitSystem = 'metric'): Unit {
  const symbol = siSymbol(si);
  const steps = (system === 'inch' ? INCH_STEPS[symbol] : undefined) ?? METRIC_STEPS[symbol];
  if (!steps) return unitOf(symbol);
  const size = Math.abs(valueSi);
  const step = size === 0 ? steps.find((s) => s.isUsual) : steps.find((s) => size < s.below * (1 - HALF_A_DIGIT));
  return unitOf((step ?? steps[steps.length - 1])?.symbol ?? symbol);
}
const HALF_A_DIGIT = 5e-5; // 999.96 is shown with four digits, so it goes to the next unit
interface Step {
  readonly symbol: string;
  readonly below: number; // SI
  readonly isUsual?: boolean;
}
const step = (symbol: string, below = Number.POSITIVE_INFINITY, isUsual = false): Step => ({ symbol, below, isUsual });
const METRIC_STEPS: Readonly<Record<string, readonly Step[]>> = {
  m: [step('mm', 1, true), step('m')],
  'm²': [step('cm²', 1, true), step('m²')],
  'm³': [step('cm³', 1e-4), step('L', 1, true), step('m³')],
  kg: [step('mg', 1e-5), step('g', 1, true), step('kg')],
  Ω: [step('mΩ', 0.1), step('Ω', 1e3, true), step('kΩ', 1e6), step('MΩ')],
  F: [step('pF', 1e-9), step('nF', 1e-7), step('µF', 1e-1, true), step('F')],
  H: [step('nH', 1e-6), step('µH', 1e-4), step('mH', 1, true), step('H')],
  Hz: [step('Hz', 1e3, true), step('kHz', 1e6), step('MHz')],
  s: [step('µs', 1e-3), step('ms', 1, true), step('s')],
  'm/N': [step('mm/N', 0.1, true), step('m/N')],
  V: [step('mV', 0.1), step('V', Number.POSITIVE_INFINITY, true)],
  W: [step('mW', 0.1), step('W', Number.POSITIVE_INFINITY, true)],
  Pa: [step('hPa', Number.POSITIVE_INFINITY, true)],
  K: [step('°C', Number.POSITIVE_INFINITY, true)],
};
const INCH_STEPS: Readonly<Record<string, readonly Step[]>> = {
  m: [step('in', Number.POSITIVE_INFINITY, true)],
  'm²': [step('in²', Number.POSITIVE_INFINITY, true)],
  'm³': [step('in³', 0.1 * (12 * INCH) ** 3), step('ft³', Number.POSITIVE_INFINITY, true)],
  kg: [step('oz', POUND, true), step('lb')],
};
/** Every unit a field of this SI unit accepts. */
export function unitsFor(si: string): readonly Unit[] {
  const symbol = siSymbol(si);
  const found = UNITS.filter((known) => known.si === symbol);
  return found.length > 0 ? found : [unitOf(symbol)];
}
