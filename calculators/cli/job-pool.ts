import { fileURLToPath } from 'node:url';
import { Worker } from 'node:worker_threads';
import { build } from 'esbuild';
import type { JobLine } from './job-line.js';

interface Waiting {
  readonly job: JobLine;
  resolve(answer: string): void;
}

/** Threads that answer lines of jobs, each one line at a time; a thread that dies answers for its line and is replaced. */
export class JobPool {
  private readonly queue: Waiting[] = [];
  private readonly threads = new Map<Worker, Waiting | undefined>(); // what each has in hand
  private isClosed = false;

  constructor(
    readonly size: number,
    private readonly program: string,
    private readonly besides: string | undefined,
  ) {}

  /** The answer as a line of JSON; never rejects. */
  run(job: JobLine): Promise<string> {
    return new Promise((resolve) => {
      this.queue.push({ job, resolve });
      this.dispatch();
    });
  }

  async close(): Promise<void> {
    this.isClosed = true;
    await Promise.all([...this.threads.keys()].map((thread) => thread.terminate()));
  }

  private dispatch(): void {
    for (const [thread, inHand] of this.threads) if (!inHand) this.give(thread);
    while (this.queue.length > 0 && this.threads.size < this.size) this.give(this.start());
  }

  private give(thread: Worker): void {
    const next = this.queue.shift();
    if (!next) return;
    this.threads.set(thread, next);
    thread.postMessage(next.job);
  }

  private start(): Worker {
    const thread = new Worker(this.program, { eval: true, execArgv: [], workerData: { besides: this.besides } });
    this.threads.set(thread, undefined);
    thread.on('message', (answer: string) => {
      this.threads.get(thread)?.resolve(answer);
      this.threads.set(thread, undefined);
      this.dispatch();
    });
    thread.on('error', (error) => this.lose(thread, error.message));
    thread.on('exit', () => this.lose(thread, 'the thread ended'));
    return thread;
  }

  private lose(thread: Worker, reason: string): void {
    const inHand = this.threads.get(thread);
    this.threads.delete(thread);
    if (inHand) {
      const message = `The calculation broke off: ${reason}. Run the job again by itself.`;
      inHand.resolve(
        JSON.stringify({ error: { code: 'internal-error', message, where: `line ${inHand.job.number}` } }),
      );
    }
    if (!this.isClosed) this.dispatch();
  }
}

/** The program of a thread as one piece of JavaScript: a thread has no loader for TypeScript. About a fifth of a second, once. */
export async function threadProgram(): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: [fileURLToPath(new URL('./job-thread.ts', import.meta.url))],
    bundle: true,
    platform: 'node',
    format: 'cjs',
    write: false,
    logLevel: 'silent',
  });
  return outputFiles[0]?.text ?? '';
}
