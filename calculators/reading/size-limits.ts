import { InputError } from '../../shared/errors.js';

export type SourceKind = 'text' | 'wav' | 'zip';

/** The largest file of each kind that is opened, in bytes. */
export const SIZE_LIMIT_BYTES: Readonly<Record<SourceKind, number>> = {
  text: 64 * 1024 * 1024,
  wav: 512 * 1024 * 1024,
  zip: 1024 * 1024 * 1024,
};

/** Which limit applies before a byte is read: only the name is known then. What the file really is, its content says. */
export function sourceKindOf(fileName: string): SourceKind {
  if (/\.(wav|wave|rf64)$/i.test(fileName)) return 'wav';
  return /\.zip$/i.test(fileName) ? 'zip' : 'text';
}

/**
 * Refuses a file by its declared size, before a byte of it is read.
 * `bytes`: the size told by the file system or by the sender. Error: `file-too-large`.
 */
export function refuseBySize(bytes: number, kind: SourceKind, fileName = ''): void {
  const limit = SIZE_LIMIT_BYTES[kind];
  if (!(bytes > limit)) return;
  const megabytes = (value: number) => `${Math.ceil(value / 1024 / 1024)} MB`;
  throw new InputError(
    'file-too-large',
    `This file has ${megabytes(bytes)}; ${KIND_NAME[kind]} may have up to ${megabytes(limit)}. ` +
      'Export fewer points, or one sweep a file.',
    fileName,
  );
}

const KIND_NAME: Readonly<Record<SourceKind, string>> = {
  text: 'text files',
  wav: 'recordings',
  zip: 'zip files',
};
