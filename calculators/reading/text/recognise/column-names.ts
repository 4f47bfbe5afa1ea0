import { withoutMark } from '../comments.js';
import { type Dialect, SEPARATOR_CODE } from '../dialect.js';
import { type UnitWord, unitWord } from '../units.js';

export type NamedKind = 'frequency' | 'magnitude' | 'phase' | 'real' | 'imaginary' | 'other' | 'not-impedance';

/** What the name of a column says. `kind` undefined: the name is no word this reader knows. */
export interface ColumnMeaning {
  readonly kind?: NamedKind | undefined;
  readonly unit?: UnitWord | undefined;
}

/** The words by which columns are named, in the languages files come in. The first kind that fits wins. */
const KIND_WORDS: readonly [NamedKind, RegExp][] = [
  [
    'other',
    /^(spl|time|zeit|temps|tiempo|tempo|date|datum|index|coherence|kohärenz|voltage|spannung|volt|volts|current|strom|noise|sigma|std|stdev|uncertainty|gain|comment|note|remark|temperature|delay|number|no|nr)$/,
  ],
  [
    'phase',
    /^(phase|phas|ph|phi|φ|ϕ|theta|θ|arg|angle|ang|winkel|phasenwinkel|fase|faza|fas|faasi|phz|argz|zphase|zph)$/,
  ],
  [
    'imaginary',
    /^(im|imag|imaginary|imaginaire|imaginario|imaginaria|immaginaria|imaginär|imaginärteil|x|xs|zim|imz|zimag|reactance|reaktanz|blindwiderstand|z''|z")$/,
  ],
  ['real', /^(re|real|reel|réel|réelle|reale|realteil|r|rs|zre|rez|zreal|resistance|wirkwiderstand|z')$/],
  [
    'frequency',
    /^(f|fr|frq|freq|freqs|frequency|frequencies|frequenz|frequence|fréquence|frecuencia|frequenza|frequentie|frequência|frekvens|frekvence|częstotliwość|omega|ω)$/,
  ],
  [
    'magnitude',
    /^(mag|magn|magnitude|abs|absz|modulus|module|modul|modulo|módulo|betrag|amplitude|amp|impedance|impedanz|impédance|impedanza|impedancia|impedantie|scheinwiderstand|z|zmag|zmod|zabs|\|z\||z\(f\))$/,
  ],
];
const KIND_OF_UNIT: Readonly<Record<UnitWord['kind'], NamedKind | undefined>> = {
  frequency: 'frequency',
  impedance: 'magnitude',
  angle: 'phase',
  level: undefined,
  none: undefined,
};

/** What one heading means: "Frequency (Hz)", "phase_rad", "Z[Ohm]", "Hz". */
export function meaningOf(name: string): ColumnMeaning {
  const plain = name
    .toLowerCase()
    .replace(/re\.?\s*:?\s*1\s*(ohm|ω)/g, 'dbohm')
    .replaceAll('\u2126', 'ω');
  const parts = plain.split(/[\s_\-()[\]{},;:=]+|\.(?=\s|$)|(?<!rad)\//).filter((part) => part !== '');
  const cased = name.split(/[\s_\-()[\]{},;:=]+|\.(?=\s|$)|(?<!rad)\//).filter((part) => part !== '');
  let kind: NamedKind | undefined;
  for (const [candidate, pattern] of KIND_WORDS) {
    if (parts.some((part, i) => pattern.test(part) && !(part === 'ω' && i > 0))) {
      kind = candidate;
      break;
    }
  }
  const unit = parts.length === cased.length ? (lastUnit(cased) ?? lastUnit(parts)) : lastUnit(parts);
  const isVolume = parts.includes('spl') || parts.includes('dbspl');
  if (!kind && unit) return { kind: unit.kind === 'level' && !isVolume ? 'magnitude' : KIND_OF_UNIT[unit.kind], unit };
  return { kind, unit };
}

function lastUnit(parts: readonly string[]): UnitWord | undefined {
  for (let i = parts.length - 1; i >= 0; i -= 1) {
    const part = parts[i]!;
    if (part === 'r' || part === 'R' || part === 'k' || part === 'K' || part === 'M') continue; // a name, not a unit
    const unit = unitWord(part);
    if (unit) return unit;
  }
  return undefined;
}

/**
 * The headings of `count` columns in a line of text, or undefined where the line does not part into so many. Tries the separator
 * of the data, then the others, then gaps of two blanks; a unit in brackets stays with its name.
 */
export function headingsIn(line: string, count: number, dialect: Dialect): string[] | undefined {
  const bare = withoutMark(line);
  const own = SEPARATOR_CODE[dialect.separator];
  const tries: (() => string[])[] = [
    () => (own === 0 ? wordsOf(bare) : partsOf(line.replace(/^\s*([*#%!]+|\/\/+)\s*/, ''), String.fromCharCode(own))),
    () => partsOf(bare, '\t'),
    () => partsOf(bare, ';'),
    () => partsOf(bare, ','),
    () => bare.split(/\s{2,}|\t+/).filter((part) => part !== ''),
    () => wordsOf(bare),
  ];
  for (const attempt of tries) {
    const names = attempt();
    if (names.length === count) return names.map((name) => name.trim());
  }
  return undefined;
}

function partsOf(line: string, separator: string): string[] {
  const parts = line.split(separator).map((part) => part.trim().replace(/^"(.*)"$/, '$1'));
  while (parts.at(-1) === '') parts.pop();
  return parts;
}

/** Words between blanks, with "(Hz)", "[Ohm]" and a unit standing alone joined to the word before. */
function wordsOf(line: string): string[] {
  const words: string[] = [];
  for (const word of line
    .replace(/([([{])\s+/g, '$1')
    .replace(/\s+([)\]}])/g, '$1')
    .split(/\s+/)) {
    if (word === '') continue;
    const isAside = /^[([{].*[)\]}],?$/.test(word) && words.length > 0;
    if (isAside) words[words.length - 1] += ` ${word}`;
    else words.push(word);
  }
  return words;
}

/** How many of the meanings are known: a line of prose has next to none. */
export function knownMeanings(meanings: readonly ColumnMeaning[]): number {
  return meanings.filter((meaning) => meaning.kind !== undefined).length;
}
