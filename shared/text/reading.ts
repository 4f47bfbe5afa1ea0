const quoted = (name: string) => `“${name}”`;
const rounded = (value: number) => Number(value.toPrecision(3)).toLocaleString('en-US');

/** Why each part of a file was read as it was: the reasons beside the reading rule. */
export const readingText = {
  told: 'You set this.',
  format: 'The file holds lines of text.',
  encoding: {
    'byte-order-mark': 'A byte order mark at the start says so.',
    plain: 'Plain characters only; every encoding writes them alike.',
    'valid-utf-8': 'Every character beyond plain ones is sound UTF-8.',
    'zero-bytes': 'Every second byte is zero.',
    'not-utf-8': 'The characters beyond plain ones are not UTF-8.',
    told: 'You set this.',
  },
  separator: (name: string, agreeing: number, lines: number) => `${name}, because ${agreeing} of ${lines} lines agree`,
  decimalByNumbers: (mark: string) => `A decimal ${mark} makes numbers of all columns.`,
  decimalUnseen: 'No number has a decimal mark.',
  thousands: (mark: string) => `The ${mark} parts groups of three digits.`,
  noThousands: 'No mark parts groups of three digits.',
  rival: (separator: string, decimal: string, thousands: string) =>
    `It could also be read with ${separator}, decimal ${decimal}${thousands === 'none' ? '' : `, ${thousands} between thousands`}.`,
  headerLines: (count: number) =>
    count === 0 ? 'The first line is data already.' : `Line ${count + 1} is the first row of numbers like the rest.`,
  columnsNamed: (names: readonly string[]) => `Named in the file: ${names.map(quoted).join(', ')}.`,
  columnsByPhase: (misfitDeg: number) =>
    `Not named. The phase fits the rise and fall of the magnitude within ${rounded(misfitDeg)}° in this order.`,
  columnsByOrder: 'Not named. Frequency first, then impedance, is the usual order.',
  columnsByUnits: 'The units behind the numbers say so.',
  unitBy: (unit: string, by: 'attached' | 'named') =>
    by === 'attached' ? `${unit}, because it stands behind the numbers` : `${unit}, because the heading says so`,
  frequencyLooksLike: (unit: string, least: number, most: number) =>
    `No unit is named; ${rounded(least)} to ${rounded(most)} looks like ${unit}.`,
  ohmUnnamed: 'No unit is named; ohm is usual.',
  levelByPhase: 'No unit is named; the phase fits a level in dB re 1 Ω better than ohm.',
  levelBelowZero: 'No unit is named; values below zero are no magnitude in ohm, so a level in dB re 1 Ω is taken.',
  noPhaseColumn: 'There is no phase column.',
  phaseUnitByFit: (unit: string, misfitDeg: number, isClear: boolean) =>
    isClear
      ? `${unit}, because it then fits the rise and fall of the magnitude within ${rounded(misfitDeg)}°`
      : `No unit is named, and the data does not tell degrees from radians well; ${unit} is taken.`,
  signFits: (misfitDeg: number) => `The sign fits the rise and fall of the magnitude within ${rounded(misfitDeg)}°.`,
  signOpen: 'The curve does not show which sign was meant; it is taken as written.',
  signLooksTurned: 'The sign looks reversed; it is taken as written until you turn it.',
  noPhase: 'There is no phase.',
} as const;
