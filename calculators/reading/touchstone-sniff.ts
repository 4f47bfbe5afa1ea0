import { InputError } from '../../shared/errors.js';

const UNITS = new Set(['hz', 'khz', 'mhz', 'ghz']);
const PARAMETERS = new Set(['s', 'y', 'z', 'g', 'h']);
const FORMATS = new Set(['ma', 'db', 'ri']);
const LOOKED_AT = 65_536;
const HASH = 35;
const BRACKET = 91;

/**
 * Recognises a Touchstone file by its option line (# Hz S RI R 50) or its [Version] keyword, and refuses it in words.
 * Source: Touchstone File Format Specification 2.0, IBIS Open Forum, 2009 (from memory).
 * Errors: `touchstone-not-one-port` for more than one port, `touchstone-unsupported` for one.
 */
export function refuseTouchstone(bytes: Uint8Array, fileName: string): void {
  const head = bytes.subarray(0, LOOKED_AT);
  if (!head.includes(HASH) && !head.includes(BRACKET)) return; // neither option line nor keyword
  const lines = new TextDecoder('latin1')
    .decode(head)
    .split(/\r\n|\r|\n/)
    .map((line) => line.replace(/!.*/, '').trim())
    .filter((line) => line !== '');
  const isNamed = /\.(s\d+p|ts)$/i.test(fileName);
  const isNew = lines.some((line) => /^\[version\]\s*\d/i.test(line));
  const data = lines.filter((line) => /^[+-]?[\d.]/.test(line));
  const option = lines.find((line) => line.startsWith('#'));
  if (!isNew && !(option && isOptionLine(option, isNamed, valuesIn(data[0])))) return;
  const ports = portsOf(lines, data);
  if (ports > 1) {
    throw new InputError(
      'touchstone-not-one-port',
      `This Touchstone file has ${ports} ports; an impedance has one. Export the one-port file of the terminals you measured.`,
      fileName,
    );
  }
  throw new InputError(
    'touchstone-unsupported',
    'This is a Touchstone file, which cannot be read here. Export the impedance as a text table of frequency, magnitude and phase.',
    fileName,
  );
}

const valuesIn = (line: string | undefined): number => line?.split(/\s+/).length ?? 0;

/** Two words of an option line at least, or one in a file named like one; a table of two columns has a heading, no option line. */
function isOptionLine(line: string, isNamed: boolean, values: number): boolean {
  const parts = line
    .slice(1)
    .trim()
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== '');
  let words = 0;
  for (let i = 0; i < parts.length; i += 1) {
    const part = parts[i] as string;
    if (part === 'r' && /^[\d.]+(e[+-]?\d+)?$/.test(parts[i + 1] ?? '')) i += 1;
    else if (!UNITS.has(part) && !PARAMETERS.has(part) && !FORMATS.has(part)) return false;
    words += 1;
  }
  return (isNamed && values !== 2) || (words >= 2 && values >= 3);
}

function portsOf(lines: readonly string[], data: readonly string[]): number {
  for (const line of lines) {
    const told = /^\[number of ports\]\s*(\d+)/i.exec(line);
    if (told) return Number(told[1]);
  }
  const values = valuesIn(data[0]);
  return values <= 3 ? 1 : values === 9 ? 2 : Math.max(2, Math.floor(values / 2));
}
