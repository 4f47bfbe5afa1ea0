import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { Worker } from 'node:worker_threads';
import { build } from 'esbuild';

/**
 * Runs jobs in worker threads, one job at a time in each: `script` is a TypeScript module beside the tests that answers
 * every message with one message. Answers come back in the order of the jobs.
 */
export async function onAllCores<Job, Answer>(script: string, jobs: readonly Job[]): Promise<Answer[]> {
  const answers = new Array<Answer>(jobs.length);
  let next = 0;
  const program = await programOf(script);
  const threads = Math.max(1, Math.min(availableParallelism(), jobs.length));
  await Promise.all(
    Array.from({ length: threads }, async () => {
      const worker = new Worker(program, { eval: true, execArgv: [] });
      try {
        for (let job = next; job < jobs.length; job = next) {
          next += 1;
          answers[job] = await answerOf<Answer>(worker, jobs[job]);
        }
      } finally {
        await worker.terminate();
      }
    }),
  );
  return answers;
}

/** One piece of JavaScript: a thread has no loader for TypeScript. */
async function programOf(script: string): Promise<string> {
  const { outputFiles } = await build({
    entryPoints: [fileURLToPath(new URL(script, import.meta.url))],
    bundle: true,
    platform: 'node',
    format: 'cjs',
    target: 'node20',
    write: false,
    logLevel: 'silent',
  });
  return outputFiles[0]?.text ?? '';
}

function answerOf<Answer>(worker: Worker, job: unknown): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const done = (): void => {
      worker.off('message', onMessage);
      worker.off('error', onError);
    };
    const onMessage = (answer: Answer): void => {
      done();
      resolve(answer);
    };
    const onError = (error: Error): void => {
      done();
      reject(error);
    };
    worker.on('message', onMessage);
    worker.on('error', onError);
    worker.postMessage(job);
  });
}
