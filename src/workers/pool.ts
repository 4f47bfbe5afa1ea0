import { proxy } from 'comlink';
import { refuseBySize } from '../../calculators/reading/size-limits.js';
import { InputError } from '../../shared/errors.js';
import type { Output } from '../../shared/output.js';
import type { CalculatorApi } from './calculate.worker.js';
import type { Answer, CalculateRequest, OnProgress, ReadFile, ReadRequest } from './messages.js';
import type { ReaderApi } from './reading.worker.js';
import { type Job, WorkerPool } from './worker-pool.js';

const LEAST_WORKERS = 1;
const MOST_WORKERS = 4;

const workers = Math.min(MOST_WORKERS, Math.max(LEAST_WORKERS, (globalThis.navigator?.hardwareConcurrency ?? 2) - 1));

const readers = new WorkerPool<ReaderApi>(
  () => new Worker(new URL('./reading.worker.ts', import.meta.url), { type: 'module', name: 'reading' }),
  workers,
);
const calculators = new WorkerPool<CalculatorApi>(
  () => new Worker(new URL('./calculate.worker.ts', import.meta.url), { type: 'module', name: 'calculating' }),
  workers,
);

/** A file as read, with the first lines for the preview; `refused` instead of the reading where it cannot be used. */
export type ReadOutcome =
  | { readonly file: ReadFile; readonly lines: readonly string[] }
  | { readonly refused: InputError; readonly lines: readonly string[] };

function unwrapped<T>(answer: Answer<T>): T {
  if (answer.ok) return answer.value;
  throw new InputError(answer.refusal.code, answer.refusal.message, answer.refusal.where);
}

/** Reads a file away from the page. One that is too large is refused by its length, before a byte is read. */
export function readInWorker(request: ReadRequest, onProgress: OnProgress = () => {}): Job<ReadOutcome> {
  try {
    refuseBySize(request.file.size, 'text', request.fileName);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return { done: Promise.resolve({ refused: error, lines: [] }), stop: () => {} };
  }
  return readers.run(async (api) => {
    const answer = await api.read(request, proxy(onProgress));
    if (answer.ok) return { file: answer.value, lines: answer.lines };
    const { code, message, where } = answer.refusal;
    return { refused: new InputError(code, message, where), lines: answer.lines };
  });
}

/** Runs a calculator away from the page. `done` rejects with InputError, JobStopped or WorkerEnded. */
export function calculateInWorker(request: CalculateRequest, onProgress: OnProgress = () => {}): Job<Output> {
  return calculators.run(async (api) => unwrapped(await api.calculate(request, proxy(onProgress))));
}

export function warmReaders(): void {
  readers.warm();
}
export function warmCalculators(): void {
  calculators.warm();
}
