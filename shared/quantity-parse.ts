import { siFromDisplay, siSymbol, type Unit, unitOf, unitsFor } from './quantities.js';

/** What a person wrote, understood: SI, and the unit it was written in. */
export interface ParsedQuantity {
  readonly valueSi: number;
  readonly unit: Unit;
}

const PREFIXES: Readonly<Record<string, number>> = {
  p: 1e-12,
  n: 1e-9,
  u: 1e-6,
  µ: 1e-6,
  m: 1e-3,
  k: 1e3,
  K: 1e3,
  M: 1e6,
  G: 1e9,
};
/** Units that are written with a prefix alone and with it in the place of the decimal mark (IEC 60062: 4u7, 4R7). */
const PREFIXED = new Set(['Ω', 'F', 'H', 'Hz']);

/** Other ways to write a unit, lower case and without spaces. */
const SPELLINGS: Readonly<Record<string, string>> = {
  ohm: 'Ω',
  ohms: 'Ω',
  kohm: 'kΩ',
  mohm: 'mΩ',
  uh: 'µH',
  mh: 'mH',
  uf: 'µF',
  nf: 'nF',
  pf: 'pF',
  hz: 'Hz',
  khz: 'kHz',
  l: 'L',
  litre: 'L',
  litres: 'L',
  liter: 'L',
  '"': 'in',
  inch: 'in',
  inches: 'in',
  cuft: 'ft³',
  cuin: 'in³',
  sqin: 'in²',
  c: '°C',
  deg: '°',
};

/**
 * A quantity as people write it: `4u7`, `4.7µ`, `4,7 uH`, `12 mm`, `5 in`, `1.2e-3`. Without a unit it is read in
 * `shown`. A comma or a point is a decimal mark; where both stand, the last one is. Null where it is not a number of
 * this SI unit.
 */
export function parseQuantity(written: string, si: string, shown: Unit = unitOf(si)): ParsedQuantity | null {
  const clean = written
    .replace(/[\s\u00A0\u202F]+/g, ' ')
    .replace(/\u2212/g, '-')
    .replace(/\u03BC/g, 'µ')
    .trim();
  const match = /^([+-]?(?:\d[\d.,' ]*|[.,]\d+)(?:[eE][+-]?\d+)?)(.*)$/.exec(clean);
  if (!match) return null;
  const number = plainNumber(match[1] ?? '');
  if (number === null) return null;
  const rest = (match[2] ?? '').trim();
  if (rest === '') return { valueSi: siFromDisplay(number, shown), unit: shown };
  return inCode(match[1] ?? '', rest, si) ?? withUnit(number, rest, si);
}

function plainNumber(written: string): number | null {
  const compact = written.replace(/[ ']/g, '');
  const lastMark = Math.max(compact.lastIndexOf(','), compact.lastIndexOf('.'));
  const whole = lastMark === -1 ? compact : compact.slice(0, lastMark).replace(/[.,]/g, '');
  const fraction = lastMark === -1 ? '' : `.${compact.slice(lastMark + 1)}`;
  const isRepeated = lastMark !== -1 && compact.indexOf(compact[lastMark] ?? '') !== lastMark;
  const value = Number(isRepeated ? compact.replace(/[.,]/g, '') : whole + fraction);
  return Number.isFinite(value) ? value : null;
}

/** 4u7, 2k2, 4R7: the letter stands where the decimal mark would. */
function inCode(number: string, rest: string, si: string): ParsedQuantity | null {
  const match = /^([pnuµmkKMGR])(\d+)\s*(.*)$/.exec(rest);
  if (!match || !PREFIXED.has(siSymbol(si)) || /[.,]/.test(number)) return null;
  const [, letter = '', digits = '', unitText = ''] = match;
  if (unitText !== '' && spelled(unitText) !== siSymbol(si)) return null;
  const factor = letter === 'R' ? 1 : (PREFIXES[letter] ?? 1);
  const value = Number(`${number.replace(/[ ']/g, '')}.${digits}`);
  return { valueSi: value * factor, unit: unitWithFactor(si, factor) };
}

function withUnit(number: number, unitText: string, si: string): ParsedQuantity | null {
  const symbol = spelled(unitText);
  const found = unitsFor(si).find((unit) => unit.symbol === symbol);
  if (found) return { valueSi: siFromDisplay(number, found), unit: found };
  if (symbol === siSymbol(si)) return { valueSi: number, unit: unitOf(si) };
  const factor = PREFIXED.has(siSymbol(si)) ? PREFIXES[unitText] : undefined;
  return factor === undefined ? null : { valueSi: number * factor, unit: unitWithFactor(si, factor) };
}

function spelled(unitText: string): string {
  const squashed = unitText
    .replace(/ /g, '')
    .replace(/\^?2$/, '²')
    .replace(/\^?3$/, '³')
    .replace(/^u(?=[FHs]$)/, 'µ');
  return SPELLINGS[squashed.toLowerCase()] ?? squashed;
}

function unitWithFactor(si: string, factor: number): Unit {
  return unitsFor(si).find((unit) => Math.abs(unit.factor / factor - 1) < 1e-9) ?? unitOf(si);
}
