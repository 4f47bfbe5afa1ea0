import { InputError } from '../../shared/errors.js';

/** Signatures of what is not a text: first bytes, where they stand, and what the person has then. */
const SIGNATURES: readonly {
  readonly bytes: string;
  readonly at?: number;
  readonly code: 'archive-instead-of-data' | 'not-text';
  readonly what: string;
}[] = [
  { bytes: 'PK\x03\x04', code: 'archive-instead-of-data', what: 'a zip archive or a spreadsheet' },
  { bytes: 'PK\x05\x06', code: 'archive-instead-of-data', what: 'an empty zip archive' },
  { bytes: '\x1f\x8b', code: 'archive-instead-of-data', what: 'a gzip archive' },
  { bytes: '7z\xbc\xaf\x27\x1c', code: 'archive-instead-of-data', what: 'a 7z archive' },
  { bytes: 'Rar!\x1a\x07', code: 'archive-instead-of-data', what: 'a rar archive' },
  { bytes: 'BZh', code: 'archive-instead-of-data', what: 'a bzip2 archive' },
  { bytes: '\xfd7zXZ\x00', code: 'archive-instead-of-data', what: 'an xz archive' },
  { bytes: '\x28\xb5\x2f\xfd', code: 'archive-instead-of-data', what: 'a zstd archive' },
  { bytes: 'ustar', at: 257, code: 'archive-instead-of-data', what: 'a tar archive' },
  { bytes: '%PDF-', code: 'not-text', what: 'a PDF document' },
  { bytes: '\x89PNG', code: 'not-text', what: 'a picture' },
  { bytes: '\xff\xd8\xff', code: 'not-text', what: 'a picture' },
  { bytes: 'GIF8', code: 'not-text', what: 'a picture' },
  { bytes: '\xd0\xcf\x11\xe0', code: 'not-text', what: 'an office document' },
  { bytes: '{\\rtf', code: 'not-text', what: 'a formatted document' },
];

const LOOKED_AT = 65_536;

/**
 * Refuses, by its first bytes, whatever is no table of text, naming what it is. Errors: `empty-file`, `archive-instead-of-data`, `not-text`,
 * `wav-unsupported-encoding`, `html-instead-of-data`.
 */
export function refuseOtherThanText(bytes: Uint8Array, fileName: string): void {
  if (bytes.length === 0) throw new InputError('empty-file', 'This file is empty. Export the sweep again.', fileName);
  const head = String.fromCharCode(...bytes.subarray(0, 512));
  const found = SIGNATURES.find(({ bytes: mark, at = 0 }) => head.startsWith(mark, at));
  if (found) {
    const advice =
      found.code === 'not-text'
        ? 'Export the sweep as plain text.'
        : 'Unpack it and add the files in it, or export as plain text.';
    throw new InputError(found.code, `This is ${found.what}, not a text file. ${advice}`, fileName);
  }
  if (/^(RIFF|RIFX|RF64|BW64)[\s\S]{4}WAVE/.test(head)) {
    throw new InputError(
      'wav-unsupported-encoding',
      'This is a WAV recording, which cannot be read here. Add the sweep as a text table of frequency and impedance.',
      fileName,
    );
  }
  refuseBinary(bytes, fileName);
  refuseMarkup(new TextDecoder(bytes[1] === 0 ? 'utf-16le' : 'utf-8').decode(bytes.subarray(0, 4096)), fileName);
}

function refuseBinary(bytes: Uint8Array, fileName: string): void {
  if (!isBinary(bytes)) return;
  throw new InputError(
    'not-text',
    'This file is not text. Export the sweep as a text table, one row a frequency.',
    fileName,
  );
}

/** Text has next to no control characters; two-byte text is recognised by where its zeros stand. */
export function isBinary(bytes: Uint8Array): boolean {
  const size = Math.min(bytes.length, LOOKED_AT);
  const isWideMark = (bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff);
  let control = 0;
  let evenZeros = 0;
  let oddZeros = 0;
  for (let i = 0; i < size; i += 1) {
    const byte = bytes[i]!;
    if (byte >= 32 && byte !== 127) continue;
    if (byte > 0) control += (byte >= 9 && byte <= 13) || byte === 26 || byte === 27 ? 0 : 1;
    else if (i % 2 === 0) evenZeros += 1;
    else oddZeros += 1;
  }
  const most = Math.max(evenZeros, oddZeros);
  const isWide = isWideMark || (most > 0.2 * size && Math.min(evenZeros, oddZeros) < 0.05 * most);
  const strange = control + (isWide ? 0 : evenZeros + oddZeros);
  return strange > 0.01 * size;
}

function refuseMarkup(head: string, fileName: string): void {
  const start = head
    .replace(/^\ufeff/, '')
    .trimStart()
    .slice(0, 2000);
  if (/^(\{|\[\s*[[{\d"-])/.test(start)) {
    throw new InputError(
      'not-a-curve',
      'This is structured data, not a table. Export the sweep as rows of text.',
      fileName,
    );
  }
  if (!start.startsWith('<')) return;
  if (/<(!doctype\s+html|html|head|body|table|script|meta)\b/i.test(start)) {
    throw new InputError(
      'html-instead-of-data',
      'This is a web page, not the data. Download the file itself, or copy the numbers of the page and paste them.',
      fileName,
    );
  }
  throw new InputError(
    'not-a-curve',
    'This is a document with markup, not a table. Export the sweep as plain text.',
    fileName,
  );
}
