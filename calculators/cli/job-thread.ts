import { parentPort, workerData } from 'node:worker_threads';
import { answerLine, type JobLine } from './job-line.js';

const { besides } = workerData as { readonly besides: string | undefined };
parentPort?.on('message', (job: JobLine) => parentPort?.postMessage(answerLine(job, besides)));
