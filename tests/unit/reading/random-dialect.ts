import fc from 'fast-check';

/** A way to write a table of impedance, drawn at random: all that files differ in. */
export interface WrittenDialect {
  readonly separator: string;
  readonly decimalMark: '.' | ',';
  readonly thousandsMark: string;
  readonly lineEnd: string;
  readonly encoding: 'utf-8' | 'utf-8-bom' | 'utf-16le' | 'utf-16be' | 'latin1';
  readonly comment: string;
  readonly comments: number;
  readonly blankEvery: number; // 0: no blank lines
  readonly places: number; // digits behind the mark
  readonly power: '' | 'e' | 'E' | 'D'; // scientific where not ''
  readonly padded: boolean; // columns aligned with blanks
  readonly closed: boolean; // the last line has a line end
  readonly trailing: boolean; // a separator at the end of each row
  readonly frequencyUnit: 'Hz' | 'kHz';
  readonly sizeUnit: 'Ohm' | 'kOhm' | 'dB';
  readonly phaseUnit: 'deg' | 'rad';
  readonly isPair: boolean;
  readonly order: readonly number[]; // of frequency, first, second, and a column that is not wanted
}

const marks = fc.constantFrom(
  ['\t', '.', ''],
  ['\t', ',', ''],
  ['\t', '.', ','],
  ['\t', ',', '.'],
  ['\t', '.', ' '],
  ['\t', '.', "'"],
  [';', '.', ''],
  [';', ',', ''],
  [';', ',', '.'],
  [';', ',', ' '],
  [';', '.', ','],
  [',', '.', ''],
  [',', '.', "'"],
  [' ', '.', ''],
  [' ', ',', ''],
  ['   ', '.', ','],
  ['  ', ',', "'"],
) as fc.Arbitrary<[string, '.' | ',', string]>;

export const anyDialect: fc.Arbitrary<WrittenDialect> = fc
  .record({
    marks,
    lineEnd: fc.constantFrom('\n', '\r\n', '\r'),
    encoding: fc.constantFrom('utf-8', 'utf-8-bom', 'utf-16le', 'utf-16be', 'latin1'),
    comment: fc.constantFrom('*', '#', '%', '!', '//', ';', '"'),
    comments: fc.integer({ min: 0, max: 5 }),
    blankEvery: fc.constantFrom(0, 0, 7),
    places: fc.integer({ min: 4, max: 9 }),
    power: fc.constantFrom('', '', 'e', 'E', 'D'),
    padded: fc.boolean(),
    closed: fc.boolean(),
    trailing: fc.boolean(),
    frequencyUnit: fc.constantFrom('Hz', 'kHz'),
    sizeUnit: fc.constantFrom('Ohm', 'kOhm', 'dB'),
    phaseUnit: fc.constantFrom('deg', 'rad'),
    isPair: fc.boolean(),
    order: fc.constantFrom([0, 1, 2], [1, 0, 2], [2, 1, 0], [3, 0, 1, 2], [0, 3, 1, 2], [0, 1, 2, 3]),
  })
  .map(({ marks: [separator, decimalMark, thousandsMark], ...rest }) => ({
    ...rest,
    separator,
    decimalMark,
    thousandsMark: rest.power === '' ? thousandsMark : '',
    trailing: rest.trailing && separator.trim() !== '',
    sizeUnit: rest.isPair && rest.sizeUnit === 'dB' ? 'Ohm' : rest.sizeUnit,
  })) as fc.Arbitrary<WrittenDialect>;

export interface WrittenFile {
  readonly bytes: Uint8Array;
  /** The numbers exactly as written, in the file's units. Shapes: (n). */
  readonly frequency: readonly string[];
  readonly first: readonly string[];
  readonly second: readonly string[];
}

/** Writes the rows (frequency in Hz; |Z| in ohm and phase in degrees, or Re and Im in ohm) in the dialect. */
export function writeFile(rows: readonly (readonly [number, number, number])[], dialect: WrittenDialect): WrittenFile {
  const texts = rows.map((row) => asWritten(row, dialect));
  const heading = dialect.order.map((column) => headingOf(column, dialect));
  const lines = Array.from(
    { length: dialect.comments },
    (_, i) => `${dialect.comment} remark ${i + 1}, level ${i / 2} V`,
  );
  lines.push(heading.join(dialect.separator));
  texts.forEach((row, i) => {
    const cells = [...row, '1'].map((text) => grouped(text, dialect));
    const chosen = dialect.order.map((column) => cells[column] as string);
    const padded = dialect.padded ? chosen.map((cell) => cell.padStart(16)) : chosen;
    lines.push(padded.join(dialect.separator) + (dialect.trailing ? dialect.separator : ''));
    if (dialect.blankEvery > 0 && i % dialect.blankEvery === 0) lines.push('');
  });
  const text = lines.join(dialect.lineEnd) + (dialect.closed ? dialect.lineEnd : '');
  const pick = (column: number) => texts.map((row) => row[column] as string);
  return { bytes: encoded(text, dialect.encoding), frequency: pick(0), first: pick(1), second: pick(2) };
}

function headingOf(column: number, { frequencyUnit, sizeUnit, phaseUnit, isPair }: WrittenDialect): string {
  const second = isPair ? `Imag[${sizeUnit}]` : `Phase[${phaseUnit}]`;
  return [`Freq[${frequencyUnit}]`, `${isPair ? 'Real' : 'Mag'}[${sizeUnit}]`, second, 'Coherence'][column] as string;
}

/** Plain JavaScript decimals of the row in the units of the dialect, cut to its places. */
function asWritten([f, a, b]: readonly [number, number, number], dialect: WrittenDialect): string[] {
  const perOhm = dialect.sizeUnit === 'kOhm' ? 1000 : 1;
  const size = dialect.sizeUnit === 'dB' ? 20 * Math.log10(a) : a / perOhm;
  const turn = dialect.phaseUnit === 'rad' ? Math.PI / 180 : 1;
  const second = dialect.isPair ? b / perOhm : b * turn;
  return [f / (dialect.frequencyUnit === 'kHz' ? 1000 : 1), size, second].map((value) =>
    dialect.power === '' ? value.toFixed(dialect.places) : value.toExponential(dialect.places),
  );
}

function grouped(text: string, { thousandsMark, decimalMark, power }: WrittenDialect): string {
  const [whole = '', fraction] = text.split('.');
  const parted = thousandsMark === '' ? whole : whole.replace(/\B(?=(\d{3})+$)/g, thousandsMark);
  const joined = fraction === undefined ? parted : `${parted}${decimalMark}${fraction}`;
  return power === '' ? joined : joined.replace('e', power);
}

function encoded(text: string, encoding: WrittenDialect['encoding']): Uint8Array {
  if (encoding === 'utf-8') return new TextEncoder().encode(text);
  if (encoding === 'utf-8-bom') return new TextEncoder().encode(`\ufeff${text}`);
  if (encoding === 'latin1') return Uint8Array.from(text, (char) => char.charCodeAt(0));
  const wide = Uint16Array.from(`\ufeff${text}`, (char) => char.charCodeAt(0));
  const bytes = new Uint8Array(wide.buffer);
  if (encoding === 'utf-16be') for (let i = 0; i < bytes.length; i += 2) bytes.subarray(i, i + 2).reverse();
  return bytes;
}
