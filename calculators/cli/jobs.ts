import { createReadStream } from 'node:fs';
import { availableParallelism } from 'node:os';
import { dirname } from 'node:path';
import { createInterface } from 'node:readline';
import type { Writable } from 'node:stream';
import { UsageError } from './arguments.js';
import { JobPool, threadProgram } from './job-pool.js';
import { locate } from './paths.js';

const AHEAD_PER_WORKER = 4; // jobs that may be in hand or waiting for an earlier one, for each worker

/**
 * Runs a file of jobs, one JSON object a line ('-' is standard input), on all cores. One answer a line, in the order of the jobs.
 * Only so many lines are in hand at once, and none is read while the output waits: memory does not grow with the number of jobs.
 */
export async function runJobs(name: string, out: Writable): Promise<void> {
  const path = name === '-' ? undefined : locate(name);
  const source = path === undefined ? process.stdin : await opened(path, name);
  const pool = new JobPool(
    availableParallelism(),
    await threadProgram(),
    path === undefined ? undefined : dirname(path),
  );
  const most = AHEAD_PER_WORKER * pool.size;
  let inHand = 0;
  let oneLess = () => {};
  let written = Promise.resolve();
  try {
    let number = 0;
    for await (const line of createInterface({ input: source, crlfDelay: Number.POSITIVE_INFINITY })) {
      number += 1;
      if (line.trim() === '') continue;
      const answer = pool.run({ line, number });
      inHand += 1;
      written = written.then(async () => {
        await write(out, await answer);
        inHand -= 1;
        oneLess();
      });
      while (inHand >= most) {
        await new Promise<void>((resolve) => {
          oneLess = resolve;
        });
      }
    }
    await written;
  } finally {
    await pool.close();
  }
}

async function opened(path: string, name: string) {
  const stream = createReadStream(path);
  await new Promise<void>((resolve, reject) => {
    stream.once('open', () => resolve());
    stream.once('error', () => reject(new UsageError(`The file of jobs ${name} cannot be opened.`)));
  });
  return stream;
}

async function write(out: Writable, line: string): Promise<void> {
  if (out.write(`${line}\n`)) return;
  await new Promise<void>((resolve) => out.once('drain', resolve));
}
