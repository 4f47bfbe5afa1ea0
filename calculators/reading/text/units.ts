/**
 * Units that stand behind a number or in the name of a column. `exponent`: the power of ten to the plain unit (kHz: 3).
 * Kinds: what a column with this unit holds; `none` is a bare multiplier (1k, 4R7).
 */
export interface UnitWord {
  readonly kind: 'frequency' | 'impedance' | 'angle' | 'level' | 'none';
  readonly unit: 'Hz' | 'rad/s' | 'ohm' | 'degree' | 'radian' | 'dB' | '';
  readonly exponent: number;
}

const words: readonly [readonly string[], UnitWord][] = [
  [['hz', 'hertz', 'cps'], { kind: 'frequency', unit: 'Hz', exponent: 0 }],
  [['khz', 'kilohertz'], { kind: 'frequency', unit: 'Hz', exponent: 3 }],
  [['mhz', 'megahertz'], { kind: 'frequency', unit: 'Hz', exponent: 6 }],
  [['rad/s', 'rad/sec', 's^-1'], { kind: 'frequency', unit: 'rad/s', exponent: 0 }],
  [['ohm', 'ohms', 'r', 'ω'], { kind: 'impedance', unit: 'ohm', exponent: 0 }], // lower case of U+2126 and U+03A9
  [['kohm', 'kohms', 'kilohm', 'kilohms', 'kiloohm', 'kω'], { kind: 'impedance', unit: 'ohm', exponent: 3 }],
  [['megohm', 'megaohm'], { kind: 'impedance', unit: 'ohm', exponent: 6 }],
  [['milliohm', 'milliohms'], { kind: 'impedance', unit: 'ohm', exponent: -3 }],
  [
    ['deg', 'degs', 'degree', 'degrees', '°', 'º', 'grad', 'gradi', 'degré', 'degrés', 'graden', 'grados'],
    { kind: 'angle', unit: 'degree', exponent: 0 },
  ],
  [['rad', 'rads', 'radian', 'radians', 'radiant', 'radians'], { kind: 'angle', unit: 'radian', exponent: 0 }],
  [['db', 'dbohm', 'dbω', 'db(ohm)', 'db(ω)'], { kind: 'level', unit: 'dB', exponent: 0 }],
  [['k'], { kind: 'none', unit: '', exponent: 3 }],
];
const BY_WORD = new Map(words.flatMap(([names, unit]) => names.map((name) => [name, unit] as const)));
const CASED = new Map<string, UnitWord>([
  ['M', { kind: 'none', unit: '', exponent: 6 }],
  ['MOhm', { kind: 'impedance', unit: 'ohm', exponent: 6 }],
  ['MΩ', { kind: 'impedance', unit: 'ohm', exponent: 6 }],
  ['mOhm', { kind: 'impedance', unit: 'ohm', exponent: -3 }],
  ['mΩ', { kind: 'impedance', unit: 'ohm', exponent: -3 }],
]);

export function unitWord(text: string): UnitWord | undefined {
  return CASED.get(text.replace('\u2126', 'Ω')) ?? BY_WORD.get(text.toLowerCase());
}
