import { once } from 'node:events';
import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import { AppError, InputError } from '../../shared/errors.js';
import { text } from '../../shared/text.js';
import type { ReadFile, ReadReply, ReadRequest } from './messages.js';
import { readingThreadSource, type ThreadSource } from './thread-source.js';

export interface ReadingPoolOptions {
  readonly threads: number;
  readonly timeLimitMs: number; // for one file, from the moment its thread begins
  readonly memoryMb: number; // of one thread's heap
  readonly longestQueue: number;
  readonly source: () => Promise<ThreadSource>;
}
const DEFAULTS: ReadingPoolOptions = {
  threads: Math.max(1, Math.min(4, availableParallelism() - 1)),
  timeLimitMs: 30_000,
  memoryMb: 1024,
  longestQueue: 1000,
  source: readingThreadSource,
};

interface Job {
  readonly request: ReadRequest;
  readonly resolve: (read: ReadFile) => void;
  readonly reject: (error: Error) => void;
}

/**
 * Files are read away from the server's own thread: a file that takes too long, runs out of memory or ends its thread
 * costs that one thread, which is replaced, and its upload gets a typed error. Threads start when first needed and
 * stay for the next file.
 */
export class ReadingPool {
  private readonly options: ReadingPoolOptions;
  private readonly queue: Job[] = [];
  private readonly idle: Worker[] = [];
  private readonly all = new Set<Worker>();
  private working = 0;
  private isClosed = false;

  constructor(options: Partial<ReadingPoolOptions> = {}) {
    this.options = { ...DEFAULTS, ...options };
  }

  /** Throws InputError for a file that cannot be used, AppError for trouble of our own. */
  read(request: ReadRequest): Promise<ReadFile> {
    if (this.isClosed || this.queue.length >= this.options.longestQueue)
      return Promise.reject(new AppError('not-ready', text.measurements.readersBusy));
    return new Promise((resolve, reject) => {
      this.queue.push({ request, resolve, reject });
      this.next();
    });
  }

  async close(): Promise<void> {
    this.isClosed = true;
    for (const job of this.queue.splice(0)) job.reject(new AppError('not-ready', text.measurements.readersBusy));
    await Promise.all([...this.all].map((worker) => worker.terminate()));
  }

  private next(): void {
    if (this.working >= this.options.threads) return;
    const job = this.queue.shift();
    if (!job) return;
    this.working++;
    this.run(job)
      .then(job.resolve, job.reject)
      .finally(() => {
        this.working--;
        this.next();
      });
  }

  private async run(job: Job): Promise<ReadFile> {
    const worker = this.idle.pop() ?? (await this.start());
    const reply = await this.ask(worker, job.request);
    if (reply.ok) return reply.read;
    if ('refusal' in reply) throw new InputError(reply.refusal.code, reply.refusal.message, reply.refusal.where);
    throw broke(reply.crash);
  }

  private async start(): Promise<Worker> {
    const { entry, isText } = await this.options.source();
    if (this.isClosed) throw new AppError('not-ready', text.measurements.readersBusy);
    const worker = new Worker(entry, {
      eval: isText,
      resourceLimits: { maxOldGenerationSizeMb: this.options.memoryMb },
      env: {}, // it needs nothing of the server's environment
    });
    this.all.add(worker);
    worker.once('exit', () => {
      this.all.delete(worker);
      const at = this.idle.indexOf(worker);
      if (at >= 0) this.idle.splice(at, 1);
    });
    const ended = once(worker, 'exit').then(() => Promise.reject(broke()));
    await Promise.race([once(worker, 'online'), ended]); // both reject when the thread cannot begin
    worker.unref();
    return worker;
  }

  /** One question, one answer. The thread goes back to the idle ones only when it answered. */
  private ask(worker: Worker, request: ReadRequest): Promise<ReadReply> {
    return new Promise<ReadReply>((resolve, reject) => {
      const settle = (finish: () => void) => {
        clearTimeout(timer);
        worker.off('message', onMessage).off('error', onError).off('exit', onExit);
        worker.unref();
        finish();
      };
      const onMessage = (reply: ReadReply) =>
        settle(() => {
          this.idle.push(worker);
          resolve(reply);
        });
      const onError = (error: Error & { code?: string }) => settle(() => reject(this.endOf(error, request.fileName)));
      const onExit = () => settle(() => reject(broke()));
      const timer = setTimeout(() => {
        settle(() => {
          const seconds = Math.round(this.options.timeLimitMs / 1000);
          reject(new InputError('file-too-large', text.measurements.readingTooLong(seconds), request.fileName));
        });
        void worker.terminate();
      }, this.options.timeLimitMs);
      worker.on('message', onMessage).on('error', onError).on('exit', onExit);
      worker.ref();
      worker.postMessage(request);
    });
  }

  private endOf(error: Error & { code?: string }, fileName: string): Error {
    if (error.code === 'ERR_WORKER_OUT_OF_MEMORY')
      return new InputError('file-too-large', text.measurements.readingTooMuchMemory, fileName);
    return broke(error);
  }
}

function broke(cause?: unknown): AppError {
  return new AppError('internal-error', text.measurements.readingBroke, {}, cause);
}
