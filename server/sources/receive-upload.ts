import { createHash } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdtemp, rm } from 'node:fs/promises';
import { join } from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import multer, { MulterError, type StorageEngine } from 'multer';
import { AppError, InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';

/** A file that lies in a temporary folder of its own until the upload's work is done. */
export interface ReceivedFile {
  readonly path: string;
  readonly fileName: string;
  readonly bytes: number;
  readonly sha256: string;
}
export interface Upload {
  readonly file: ReceivedFile;
  readonly fields: Readonly<Record<string, string>>;
}
export interface UploadLimits {
  readonly folder: string; // where temporary folders are made
  readonly fileBytes: number;
}
const FIELD_BYTES = 256 * 1024;
const ENVELOPE_BYTES = FIELD_BYTES + 16 * 1024; // what a request may declare beside the file

/**
 * Streams one uploaded file to a temporary folder, hashing as it comes, hands it to `work`, and removes the folder
 * whatever happens. A request that declares too much is refused before a byte of it is read.
 */
export async function withUpload<Answer>(
  req: Request,
  res: Response,
  limits: UploadLimits,
  work: (upload: Upload) => Promise<Answer>,
): Promise<Answer> {
  if (Number(req.headers['content-length'] ?? 0) > limits.fileBytes + ENVELOPE_BYTES) throw tooLarge(limits);
  const folder = await mkdtemp(join(limits.folder, 'upload-'));
  try {
    return await work(await receive(req, res, folder, limits));
  } finally {
    await rm(folder, { recursive: true, force: true, maxRetries: 3 });
  }
}

async function receive(req: Request, res: Response, folder: string, limits: UploadLimits): Promise<Upload> {
  const storage = new HashingStorage(folder);
  const parse = multer({
    storage,
    defParamCharset: 'utf8', // browsers write file names in UTF-8
    limits: { fileSize: limits.fileBytes, files: 1, fields: 4, fieldSize: FIELD_BYTES, parts: 5, headerPairs: 20 },
  }).single('file');
  await new Promise<void>((resolve, reject) => {
    parse(req, res, (error: unknown) => (error ? reject(refusalOf(error, limits)) : resolve()));
  });
  if (!storage.received) throw missing('file', text.measurements.fileMissing);
  const body = (req.body ?? {}) as Record<string, unknown>;
  const fields = Object.entries(body).filter((entry): entry is [string, string] => typeof entry[1] === 'string');
  return { file: storage.received, fields: Object.fromEntries(fields) };
}

class HashingStorage implements StorageEngine {
  received: ReceivedFile | undefined;
  constructor(private readonly folder: string) {}

  _handleFile(_: Request, file: Express.Multer.File, done: (error?: unknown) => void): void {
    const path = join(this.folder, 'source'); // never a name from outside
    const hash = createHash('sha256');
    let bytes = 0;
    const meter = new Transform({
      transform(chunk: Buffer, _encoding, next) {
        hash.update(chunk);
        bytes += chunk.length;
        next(null, chunk);
      },
    });
    pipeline(file.stream, meter, createWriteStream(path, { flags: 'wx' })).then(() => {
      this.received = { path, fileName: cleanFileName(file.originalname), bytes, sha256: hash.digest('hex') };
      done();
    }, done);
  }

  _removeFile(_: Request, __: Express.Multer.File, done: (error: Error | null) => void): void {
    done(null); // the whole folder goes
  }
}

/** The name as the person knows it: without folders, control characters and excess length. */
export function cleanFileName(name: string): string {
  const last = name.split(/[\\/]/).at(-1) ?? '';
  const clean = last.replace(/\p{Cc}/gu, '').trim();
  const letters = [...clean];
  return letters.length > 200 ? letters.slice(0, 200).join('') : clean || 'unnamed';
}

function tooLarge({ fileBytes }: UploadLimits): AppError {
  const refusal = new InputError('file-too-large', text.measurements.fileTooLarge(Math.floor(fileBytes / 2 ** 20)));
  return new AppError('too-large', refusal.message, refusal.toJSON());
}

export function missing(path: string, message: string): AppError {
  return new AppError('validation-failed', message, { issues: [{ path, message }] });
}

function refusalOf(error: unknown, limits: UploadLimits): AppError {
  if (error instanceof MulterError && error.code === 'LIMIT_FILE_SIZE') return tooLarge(limits);
  return new AppError('validation-failed', text.measurements.uploadBroken, {}, error);
}
