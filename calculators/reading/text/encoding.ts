import type { ENCODINGS } from '../../../shared/contracts/reading.js';
import { InputError } from '../../../shared/errors.js';
import { BLANK, MINUS } from './characters.js';

export type Encoding = (typeof ENCODINGS)[number];

/**
 * A text as codes to scan: one byte a position. ASCII stands as itself; no-break blanks have become blanks and the
 * typographic minus a hyphen, so that numbers scan; anything else outside ASCII is a code from 128 up.
 * `decode` gives back the original characters of positions [from, to).
 */
export interface Characters {
  readonly codes: Uint8Array;
  readonly encoding: Encoding;
  readonly isAssumed: boolean; // plain as far as was looked; whoever meets a code above 127 throws BeyondAscii
  readonly reason: EncodingReason;
  decode(from: number, to: number): string;
}
/** A text that looked plain at its start is not: it has to be read again, looking at all of it. */
export class BeyondAscii extends Error {
  override readonly name = 'BeyondAscii';
}

/** Throws BeyondAscii where codes [from, to) hold one above 127. */
export function refuseHighCodes(codes: Uint8Array, from: number, to: number): void {
  for (let p = from; p < to; p += 1) if (codes[p]! > 127) throw new BeyondAscii();
}

export type EncodingReason = 'byte-order-mark' | 'plain' | 'valid-utf-8' | 'zero-bytes' | 'not-utf-8' | 'told';

const UTF8_BOM = [0xef, 0xbb, 0xbf];
const startsWith = (bytes: Uint8Array, mark: readonly number[]) => mark.every((byte, i) => bytes[i] === byte);

/** Finds the encoding by byte order mark, then by its zero bytes, then by whether it is sound UTF-8. */
export function readCharacters(
  bytes: Uint8Array,
  told: Encoding | undefined,
  checkpoint: () => void,
  looksAtAll = false, // at every byte for characters beyond ASCII, not only at the first 64 kB
): Characters {
  if (told) return toldCharacters(bytes, told, checkpoint);
  if (startsWith(bytes, UTF8_BOM)) {
    return byteCharacters(bytes.subarray(3), { reason: 'byte-order-mark', looksAtAll }, checkpoint);
  }
  if (startsWith(bytes, [0xff, 0xfe])) return wideCharacters(bytes, 2, 'utf-16le', 'byte-order-mark', checkpoint);
  if (startsWith(bytes, [0xfe, 0xff])) return wideCharacters(bytes, 2, 'utf-16be', 'byte-order-mark', checkpoint);
  const wide = wideByZeros(bytes);
  if (wide) return wideCharacters(bytes, 0, wide, 'zero-bytes', checkpoint);
  return byteCharacters(bytes, { reason: 'plain', looksAtAll }, checkpoint);
}

function toldCharacters(bytes: Uint8Array, told: Encoding, checkpoint: () => void): Characters {
  if (told === 'utf-16le' || told === 'utf-16be') {
    if (bytes.length % 2 === 1) {
      throw new InputError(
        'bad-setting',
        'UTF-16 needs an even number of bytes; this file has an odd one. Choose another encoding.',
        'reading.encoding',
      );
    }
    const hasMark = startsWith(bytes, told === 'utf-16le' ? [0xff, 0xfe] : [0xfe, 0xff]);
    return wideCharacters(bytes, hasMark ? 2 : 0, told, 'told', checkpoint);
  }
  const skip = startsWith(bytes, UTF8_BOM) ? 3 : 0;
  return byteCharacters(bytes.subarray(skip), { reason: 'told', told, looksAtAll: true }, checkpoint);
}

/** UTF-16 of mostly ASCII characters has a zero in every second byte. Looks at the first 4 kB. */
function wideByZeros(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | undefined {
  const size = Math.min(bytes.length, 4096) & ~1;
  if (size < 8) return undefined;
  let evenZeros = 0;
  let oddZeros = 0;
  for (let i = 0; i < size; i += 2) {
    if (bytes[i] === 0) evenZeros += 1;
    if (bytes[i + 1] === 0) oddZeros += 1;
  }
  const enough = 0.4 * (size / 2);
  if (oddZeros > enough && evenZeros < 0.05 * oddZeros) return 'utf-16le';
  return evenZeros > enough && oddZeros < 0.05 * evenZeros ? 'utf-16be' : undefined;
}

const STRIDE = 1 << 20;
const HEAD = 1 << 16;

interface ByteText {
  readonly reason: EncodingReason;
  readonly told?: 'utf-8' | 'latin1';
  readonly looksAtAll: boolean;
}

function byteCharacters(bytes: Uint8Array, { reason, told, looksAtAll }: ByteText, checkpoint: () => void): Characters {
  const isAscii = allAscii(looksAtAll ? bytes : bytes.subarray(0, HEAD), checkpoint);
  const isUtf8 = told ? told === 'utf-8' : isAscii || isSoundUtf8(bytes, checkpoint);
  const encoding = isUtf8 ? 'utf-8' : 'latin1';
  const decoder = new TextDecoder(encoding, { ignoreBOM: true });
  const found: EncodingReason = reason !== 'plain' || isAscii ? reason : isUtf8 ? 'valid-utf-8' : 'not-utf-8';
  const codes = isAscii ? bytes : isUtf8 ? plainUtf8(bytes, checkpoint) : plainLatin1(bytes);
  const isAssumed = isAscii && !looksAtAll;
  return { codes, encoding, isAssumed, reason: found, decode: (from, to) => decoder.decode(bytes.subarray(from, to)) };
}

function allAscii(bytes: Uint8Array, checkpoint: () => void): boolean {
  for (let from = 0; from < bytes.length; from += STRIDE) {
    if (seenBits(bytes.subarray(from, from + STRIDE)) > 127) return false;
    checkpoint();
  }
  return true;
}

function seenBits(bytes: Uint8Array): number {
  let seen = 0;
  for (let i = 0; i < bytes.length; i += 1) seen |= bytes[i]!;
  return seen;
}

function isSoundUtf8(bytes: Uint8Array, checkpoint: () => void): boolean {
  const decoder = new TextDecoder('utf-8', { fatal: true });
  try {
    for (let i = 0; i < bytes.length; i += STRIDE) {
      decoder.decode(bytes.subarray(i, i + STRIDE), { stream: true });
      checkpoint();
    }
    decoder.decode();
    return true;
  } catch (error) {
    if (error instanceof TypeError) return false; // the decoder's word for a broken sequence
    throw error;
  }
}

/** A copy of the same length in which no-break and thin blanks are blanks and U+2212 or U+2013 is a hyphen. */
function plainUtf8(bytes: Uint8Array, checkpoint: () => void): Uint8Array {
  const codes = bytes.slice();
  for (let i = 0; i < codes.length; i += 1) {
    if ((i & (STRIDE - 1)) === 0) checkpoint();
    const code = codes[i]!;
    if (code === 0xc2 && codes[i + 1] === 0xa0) codes.fill(BLANK, i, i + 2);
    if (code !== 0xe2) continue;
    const isBlank = codes[i + 1] === 0x80 && (codes[i + 2] === 0xaf || codes[i + 2] === 0x89 || codes[i + 2] === 0x87);
    const isMinus =
      (codes[i + 1] === 0x88 && codes[i + 2] === 0x92) || (codes[i + 1] === 0x80 && codes[i + 2] === 0x93);
    if (isBlank || isMinus) codes.fill(BLANK, i, i + 3);
    if (isMinus) codes[i + 2] = MINUS;
  }
  return codes;
}

function plainLatin1(bytes: Uint8Array): Uint8Array {
  return bytes.map((code) => (code === 0xa0 ? BLANK : code === 0x96 ? MINUS : code)); // 0x96: en dash of Windows-1252
}

function wideCharacters(
  bytes: Uint8Array,
  skip: number,
  encoding: 'utf-16le' | 'utf-16be',
  reason: EncodingReason,
  checkpoint: () => void,
): Characters {
  const size = (bytes.length - skip) >> 1;
  const low = encoding === 'utf-16le' ? 0 : 1;
  const codes = new Uint8Array(size);
  for (let i = 0; i < size; i += 1) {
    if ((i & (STRIDE - 1)) === 0) checkpoint();
    const at = skip + 2 * i;
    const unit = bytes[at + low]! | (bytes[at + 1 - low]! << 8);
    codes[i] = unit < 128 ? unit : plainUnit(unit);
  }
  const decoder = new TextDecoder(encoding, { ignoreBOM: true });
  const decode = (from: number, to: number) => decoder.decode(bytes.subarray(skip + 2 * from, skip + 2 * to));
  return { codes, encoding, isAssumed: false, reason, decode };
}

/** The characters of a string, one position a UTF-16 unit: for a line that is shown already. */
export function charactersOf(line: string): Characters {
  const codes = new Uint8Array(line.length);
  for (let i = 0; i < line.length; i += 1) {
    const unit = line.charCodeAt(i);
    codes[i] = unit < 128 ? unit : plainUnit(unit);
  }
  return { codes, encoding: 'utf-8', isAssumed: false, reason: 'told', decode: (from, to) => line.slice(from, to) };
}

function plainUnit(unit: number): number {
  if (unit === 0xa0 || unit === 0x202f || unit === 0x2009 || unit === 0x2007) return BLANK;
  return unit === 0x2212 || unit === 0x2013 ? MINUS : 128;
}
