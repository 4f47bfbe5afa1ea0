import { createHash } from 'node:crypto';
import { readFile } from 'node:fs/promises';
import { parentPort } from 'node:worker_threads';
import { readSweep } from '../../calculators/reading/read-sweep.js';
import { InputError } from '../../shared/errors.js';
import { encodePoints } from '../../shared/points.js';
import type { ReadFile, ReadReply, ReadRequest } from './messages.js';
import { storable } from './storable.js';

async function read({ path, fileName, overrides }: ReadRequest): Promise<ReadFile> {
  const { sweep, reading, findings } = readSweep(await readFile(path), { fileName, overrides });
  const canonicalPoints = encodePoints(sweep);
  return {
    reading: storable(reading),
    findings: storable(findings),
    hasPhase: sweep.realOhm !== undefined,
    points: sweep.frequencyHz.length,
    minFrequencyHz: sweep.frequencyHz[0] ?? 0,
    maxFrequencyHz: sweep.frequencyHz.at(-1) ?? 0,
    pointsSha256: createHash('sha256').update(canonicalPoints).digest('hex'),
    canonicalPoints,
  };
}

function refusalOf(error: unknown): ReadReply {
  if (error instanceof InputError) return { ok: false, refusal: error.toJSON() };
  return { ok: false, crash: error instanceof Error ? (error.stack ?? error.message) : String(error) };
}

/** One file at a time: the pool sends the next when this one has answered. */
parentPort?.on('message', (request: ReadRequest) => {
  read(request)
    .then(
      (file): [ReadReply, ArrayBuffer[]] => [{ ok: true, read: file }, [file.canonicalPoints.buffer]],
      (error: unknown): [ReadReply, ArrayBuffer[]] => [refusalOf(error), []],
    )
    .then(([reply, transfer]) => parentPort?.postMessage(reply, transfer))
    .catch((error: unknown) => {
      throw error; // ends the thread: the pool answers for it
    });
});
