import { displayUnit, siFromDisplay, siSymbol, type Unit, unitOf, unitsFor } from './quantities.js';

export interface ParsedQuantity {
  readonly valueSi: number;
  readonly unit: Unit; // the one it was written in, or is best read in when it was written with a prefix alone
}

const PREFIXES: Readonly<Record<string, number>> = {
  p: 1e-12,
  n: 1e-9,
  µ: 1e-6,
  u: 1e-6,
  m: 1e-3,
  k: 1e3,
  K: 1e3,
  M: 1e6,
};
/** SI units whose prefix may stand alone (4.7µ) or in place of the decimal mark (4u7, IEC 60062). */
const PREFIXED = new Set(['Ω', 'F', 'H', 'Hz', 'V', 'W', 's']);

const SPELLINGS: Readonly<Record<string, readonly string[]>> = {
  in: ['"', '″', 'inch', 'inches', "''"],
  'in²': ['in2', 'in^2', 'sq in', 'sqin'],
  'in³': ['in3', 'in^3', 'cu in', 'cuin'],
  'ft³': ['ft3', 'ft^3', 'cu ft', 'cuft', 'cubic foot', 'cubic feet'],
  'cm²': ['cm2', 'cm^2', 'sq cm'],
  'cm³': ['cm3', 'cm^3', 'cc', 'ml', 'mL'],
  'm²': ['m2', 'm^2'],
  'm³': ['m3', 'm^3'],
  L: ['l', 'lit', 'liter', 'liters', 'litre', 'litres'],
  g: ['gr', 'gram', 'grams'],
  lb: ['lbs', 'pound', 'pounds'],
  oz: ['ounce', 'ounces'],
  Ω: ['ohm', 'ohms', 'R', 'r'],
  mΩ: ['mohm', 'milliohm'],
  kΩ: ['kohm', 'kilohm'],
  MΩ: ['Mohm', 'megohm'],
  '°C': ['C', 'degC'],
};

/**
 * A quantity as people write it: `4u7`, `4.7µ`, `4,7 uH`, `12 mm`, `5 in`, `5 1/4"`, `1.2e-3`. Without a unit it is read
 * in `shown`. Where a comma or a point could be either mark, the person's locale decides; the field says what was
 * understood. Null where it is not a number of this SI unit.
 */
export function parseQuantity(
  written: string,
  si: string,
  shown: Unit = unitOf(si),
  locale?: string,
): ParsedQuantity | null {
  const text = tidied(written);
  const symbol = siSymbol(si);
  const coded = PREFIXED.has(symbol) ? letterForMark(text) : null;
  if (coded !== null) return { valueSi: coded, unit: displayUnit(coded, symbol) };
  const plain = splitNumber(text, locale);
  const unit = plain && (plain.rest === '' ? shown : unitNamed(plain.rest, symbol));
  if (!plain || !unit) return null;
  const valueSi = siFromDisplay(plain.value, unit);
  if (!Number.isFinite(valueSi)) return null;
  return { valueSi, unit: unit.symbol === '' ? displayUnit(valueSi, symbol) : unit };
}

/** One spelling of signs: U+2212 and dashes to -, both micro signs to µ, both ohms to Ω, every space to one. */
function tidied(typed: string): string {
  return typed
    .replaceAll(/[\u2212\u2012\u2013]/g, '-')
    .replaceAll('\u03BC', 'µ')
    .replaceAll('\u2126', 'Ω')
    .replaceAll(/[\s\u00A0\u202F\u2009]+/g, ' ')
    .trim();
}

const FRACTION = /^([+-]?)(?:(\d+)[ -])?(\d+)\/(\d+)(?= ?[^\d]|$)/;
const NUMBER = /^[+-]?(?:\d[\d.,' ]*|[.,]\d+)(?:[eE][+-]?\d+)?/;

function splitNumber(text: string, locale: string | undefined): { value: number; rest: string } | null {
  const fraction = FRACTION.exec(text);
  if (fraction) {
    const [all, sign, whole = '0', over = '0', under = '1'] = fraction;
    const size = Number(whole) + Number(over) / Number(under);
    return Number.isFinite(size) ? { value: sign === '-' ? -size : size, rest: text.slice(all.length).trim() } : null;
  }
  const found = NUMBER.exec(text)?.[0];
  if (!found) return null;
  const value = readNumber(found.trimEnd(), locale);
  return value === null ? null : { value, rest: text.slice(found.length).trim() };
}

/** Reads digits with either decimal mark and with grouping; null where they cannot be one number. */
function readNumber(digits: string, locale: string | undefined): number | null {
  const [mantissa = '', exponent = ''] = digits.split(/[eE]/);
  const marks = [...mantissa].filter((c) => c === '.' || c === ',');
  const lastMark = Math.max(mantissa.lastIndexOf('.'), mantissa.lastIndexOf(','));
  const decimal = decimalMarkIn(mantissa, marks, lastMark, locale);
  const head = decimal === null ? mantissa : mantissa.slice(0, lastMark);
  const tail = decimal === null ? '' : mantissa.slice(lastMark + 1);
  const groups = head.split(/[.,' ]/);
  if (groups.length > 1 && !groups.slice(1).every((group) => /^\d{3}$/.test(group))) return null;
  if (!/^\d*$/.test(tail)) return null;
  const value = Number(`${groups.join('') || '0'}.${tail || '0'}${exponent ? `e${exponent}` : ''}`);
  return Number.isFinite(value) ? value : null;
}
function decimalMarkIn(mantissa: string, marks: string[], lastMark: number, locale?: string): '.' | ',' | null {
  const last = marks[marks.length - 1] as '.' | ',' | undefined;
  if (!last) return null;
  if (marks.length > 1) return marks.filter((mark) => mark === last).length === 1 ? last : null;
  const looksGrouped =
    /^[+-]?[1-9]\d{0,2}$/.test(mantissa.slice(0, lastMark)) && /^\d{3}$/.test(mantissa.slice(lastMark + 1));
  return looksGrouped && last === groupMark(locale) ? null : last;
}
function groupMark(locale?: string): string {
  const parts = new Intl.NumberFormat(locale, { useGrouping: true }).formatToParts(1234567);
  return parts.find((part) => part.type === 'group')?.value ?? ',';
}

/** `4u7`, `6R8`, `2k2`, `4u7F`: the letter stands where the mark would. */
function letterForMark(text: string): number | null {
  const found = /^([+-]?)(\d+)([pnµumkKMRr])(\d+) ?(?:F|H|Ω|ohm|Hz|V|W|s)?$/.exec(text);
  if (!found) return null;
  const [, sign, whole, letter = '', part] = found;
  const factor = letter === 'R' || letter === 'r' ? 1 : (PREFIXES[letter] ?? 1);
  const value = Number(`${whole}.${part}`) * factor;
  return sign === '-' ? -value : value;
}

/** A unit as written; one without a symbol where only its prefix stands. */
function unitNamed(written: string, symbol: string): Unit | null {
  const known = unitsFor(symbol);
  const name = written.replace(/^u(?=[A-Zs]$)/, 'µ');
  const exact = known.find((k) => k.symbol === name || SPELLINGS[k.symbol]?.includes(name));
  if (exact) return exact;
  const prefix = PREFIXES[name];
  if (prefix !== undefined && PREFIXED.has(symbol)) return { symbol: '', si: symbol, factor: prefix };
  const lower = name.toLowerCase();
  const close = known.filter(
    (k) => k.symbol.toLowerCase() === lower || SPELLINGS[k.symbol]?.some((s) => s.toLowerCase() === lower),
  );
  return close.length === 1 ? (close[0] ?? null) : null;
}
