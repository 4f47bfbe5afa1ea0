import { displayFromSi, displayUnit, type Unit, type UnitSystem, unitOf } from './quantities.js';

/** How numbers are written for people: their locale's decimal mark, U+2212 minus, U+00A0 between value and unit. */
export const NO_BREAK_SPACE = '\u00A0';
export const MINUS = '\u2212';

export interface QuantityFormat {
  readonly locale?: string | undefined;
  readonly system?: UnitSystem;
  readonly unit?: Unit; // shown in this unit; else in the one it is best read in
  readonly digits?: number; // significant digits, 4
}

const formats = new Map<string, Intl.NumberFormat>();
function written(value: number, locale: string | undefined, options: Intl.NumberFormatOptions, key: string): string {
  const id = `${locale ?? ''}/${key}`;
  const format = formats.get(id) ?? new Intl.NumberFormat(locale, { useGrouping: false, ...options });
  formats.set(id, format);
  const text = format.format(value);
  return /[1-9]/.test(text) ? text.replace('-', MINUS) : text.replace('-', ''); // no minus before a zero
}

/** With a fixed number of significant digits: `31.80`. */
export function formatDigits(value: number, digits: number, locale?: string): string {
  if (!Number.isFinite(value)) return '–';
  const options = { minimumSignificantDigits: digits, maximumSignificantDigits: digits };
  return written(Number(value.toPrecision(digits)), locale, options, `d${digits}`);
}
/** With a fixed number of decimals: `12.50`; a negative number rounds to tens, hundreds, … */
export function formatDecimals(value: number, decimals: number, locale?: string): string {
  if (!Number.isFinite(value)) return '–';
  const places = Math.max(0, Math.min(20, decimals));
  const unitOfPlace = decimals < 0 ? 10 ** -decimals : 1;
  const rounded = Math.round(value / unitOfPlace) * unitOfPlace;
  const options = { minimumFractionDigits: places, maximumFractionDigits: places };
  return written(decimals < 0 ? rounded : value, locale, options, `p${places}`);
}
/** At most so many significant digits, without trailing zeros: `0.5`, `120`. */
export function formatPlain(value: number, mostDigits: number, locale?: string): string {
  if (!Number.isFinite(value)) return '–';
  return written(value, locale, { maximumSignificantDigits: mostDigits }, `m${mostDigits}`);
}

const withUnit = (number: string, symbol: string): string =>
  symbol === '' ? number : symbol === '°' ? `${number}°` : `${number}${NO_BREAK_SPACE}${symbol}`;

/** A value of the SI unit `si` in the unit it is best read in: `31.80 Hz`, `165.0 mm`. */
export function formatQuantity(valueSi: number, si: string, format: QuantityFormat = {}): string {
  const shown = format.unit ?? displayUnit(valueSi, si, format.system);
  return withUnit(formatDigits(displayFromSi(valueSi, shown), format.digits ?? 4, format.locale), shown.symbol);
}

/**
 * Two-sided 95 % points of Student's t for 1 to 29 degrees of freedom.
 * Source: JCGM 100:2008 (GUM), table G.2, with a third decimal from memory of the usual tables.
 */
const STUDENT_T_95 = [
  12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145, 2.131, 2.12, 2.11,
  2.101, 2.093, 2.086, 2.08, 2.074, 2.069, 2.064, 2.06, 2.056, 2.052, 2.048, 2.045,
];
/** k of U = k·u: 2 from 30 degrees of freedom on and where none are told; else Student's t, whole degrees downwards. */
export function coverageFactor(dof?: number): number {
  if (dof === undefined || dof >= 30) return 2;
  return STUDENT_T_95[Math.max(1, Math.floor(dof)) - 1] ?? 2;
}

export interface UncertainText {
  readonly value: string; // `6.210 Ω`
  readonly plusMinus: string; // `± 0.032 Ω`, '' where there is no uncertainty
  readonly standard: string; // `0.016 Ω`, u itself
  readonly k: number;
  readonly text: string; // value and ± together
}
export interface UncertainValue {
  readonly value: number; // SI
  readonly uncertainty?: number | undefined; // standard, k = 1, SI
  readonly dof?: number | undefined;
}

/** A value and its ± to two significant digits of U = k·u, the value to the same place, both in one unit. */
export function formatUncertain(figure: UncertainValue, si: string, format: QuantityFormat = {}): UncertainText {
  const shown = format.unit ?? displayUnit(figure.value, si, format.system);
  const k = coverageFactor(figure.dof);
  const { uncertainty } = figure;
  if (uncertainty === undefined || !(uncertainty > 0)) {
    const value = formatQuantity(figure.value, si, { ...format, unit: shown });
    return { value, plusMinus: '', standard: '', k, text: value };
  }
  const expanded = (k * uncertainty) / shown.factor;
  const write = (number: number, places: number) =>
    withUnit(formatDecimals(number, places, format.locale), shown.symbol);
  const places = placesOfTwoDigits(expanded);
  const value = write(displayFromSi(figure.value, shown), places);
  const plusMinus = `±${NO_BREAK_SPACE}${write(expanded, places)}`;
  const standard = uncertainty / shown.factor;
  return {
    value,
    plusMinus,
    standard: write(standard, placesOfTwoDigits(standard)),
    k,
    text: `${value} ${plusMinus}`,
  };
}
/** Decimals at which a number shows two significant digits; 0.0996 counts as 0.10. */
function placesOfTwoDigits(value: number): number {
  return 1 - Number(value.toExponential(1).split('e')[1]);
}

/** Both ends of an uneven interval in one unit; an open end is written as ∞. */
export function formatInterval(
  low: number | null,
  high: number | null,
  si: string,
  format: QuantityFormat = {},
): string {
  const shown = format.unit ?? displayUnit(high ?? low ?? 0, si, format.system);
  const end = (value: number | null, open: string) =>
    value === null ? open : formatDigits(displayFromSi(value, shown), format.digits ?? 3, format.locale);
  return `${end(low, `${MINUS}∞`)} – ${withUnit(end(high, '∞'), shown.symbol)}`;
}
/** A number as a field shows it for editing: plain digits in the unit given, no unit behind it. */
export function formatForField(valueSi: number, unitSymbol: string, locale?: string): string {
  return formatPlain(displayFromSi(valueSi, unitOf(unitSymbol)), 9, locale);
}
