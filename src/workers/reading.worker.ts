import { expose } from 'comlink';
import { previewLines } from '../../calculators/reading/preview-lines.js';
import { readSweep } from '../../calculators/reading/read-sweep.js';
import { InputError } from '../../shared/errors.js';
import { encodePoints } from '../../shared/points.js';
import type { OnProgress, ReadAnswer, ReadRequest } from './messages.js';

async function sha256Hex(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const digest = new Uint8Array(await crypto.subtle.digest('SHA-256', bytes));
  return Array.from(digest, (byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** Reads one file whole. Stop is not asked for in here: the page terminates the worker. */
async function read({ file, fileName, overrides }: ReadRequest, onProgress: OnProgress): Promise<ReadAnswer> {
  const bytes = new Uint8Array(await file.arrayBuffer());
  const lines = previewLines(bytes, overrides.encoding);
  try {
    const { sweep, reading, findings } = readSweep(bytes, { fileName, overrides, onProgress });
    const { frequencyHz, realOhm, imaginaryOhm, magnitudeOhm } = sweep;
    const points = { frequencyHz, realOhm, imaginaryOhm, magnitudeOhm };
    const [sourceSha256, pointsSha256] = await Promise.all([sha256Hex(bytes), sha256Hex(encodePoints(points))]);
    return { ok: true, value: { sourceSha256, reading, findings, points, pointsSha256 }, lines };
  } catch (error) {
    if (error instanceof InputError) return { ok: false, refusal: error.toJSON(), lines };
    throw error;
  }
}

const readerApi = { read };
export type ReaderApi = typeof readerApi;
expose(readerApi);
