import { MessageChannel, type MessagePort } from 'node:worker_threads';
import { type Endpoint, expose } from 'comlink';
import { afterEach, expect, it } from 'vitest';
import { JobStopped, WorkerEnded, WorkerPool } from '../../../../src/workers/worker-pool.js';

interface Api {
  double(value: number): Promise<number>;
  forever(): Promise<never>;
}
const ports: MessagePort[] = [];
const endpoint = (port: MessagePort) => port as unknown as Endpoint; // a port of Node speaks as the browser's does

/** A worker as the pool sees it, answering over a real message channel. */
class PortWorker {
  static started: PortWorker[] = [];
  isTerminated = false;
  onerror: ((event: { message: string; preventDefault(): void }) => void) | null = null;
  private readonly near: Endpoint;

  constructor() {
    const { port1, port2 } = new MessageChannel();
    ports.push(port1, port2);
    this.near = endpoint(port1);
    expose({ double: (value: number) => value * 2, forever: () => new Promise(() => {}) }, endpoint(port2));
    PortWorker.started.push(this);
  }
  start() {
    this.near.start?.();
  }
  postMessage(message: unknown, transfer?: Transferable[]) {
    this.near.postMessage(message, transfer);
  }
  addEventListener(type: string, listener: EventListenerOrEventListenerObject) {
    this.near.addEventListener(type, listener);
  }
  removeEventListener(type: string, listener: EventListenerOrEventListenerObject) {
    this.near.removeEventListener(type, listener);
  }
  terminate() {
    this.isTerminated = true;
  }
}
const poolOf = (most: number) => new WorkerPool<Api>(() => new PortWorker() as unknown as Worker, most);

afterEach(() => {
  for (const port of ports.splice(0)) port.close();
  PortWorker.started = [];
});

it('answers what the worker answers, and uses the worker again', async () => {
  const pool = poolOf(1);
  expect(await pool.run((api) => api.double(21)).done).toBe(42);
  expect(await pool.run((api) => api.double(4)).done).toBe(8);
  expect(PortWorker.started).toHaveLength(1);
});

it('stops running work by terminating its worker within 0.2 s, and has a fresh one ready', async () => {
  const pool = poolOf(1);
  const job = pool.run((api) => api.forever());
  const begin = performance.now();
  job.stop();
  await expect(job.done).rejects.toBeInstanceOf(JobStopped);
  expect(performance.now() - begin).toBeLessThan(200);
  expect(PortWorker.started.map(({ isTerminated }) => isTerminated)).toEqual([true, false]);
  expect(await pool.run((api) => api.double(5)).done).toBe(10);
});

it('takes waiting work out of the queue without touching the worker that works', async () => {
  const pool = poolOf(1);
  const running = pool.run((api) => api.forever());
  const waiting = pool.run((api) => api.double(1));
  waiting.stop();
  await expect(waiting.done).rejects.toBeInstanceOf(JobStopped);
  expect(PortWorker.started.every(({ isTerminated }) => !isTerminated)).toBe(true);
  running.stop();
  await expect(running.done).rejects.toBeInstanceOf(JobStopped);
});

it('leaves the other waiting work in the queue when a waiting job is stopped twice', async () => {
  const pool = poolOf(1);
  const running = pool.run((api) => api.forever());
  const stopped = pool.run((api) => api.double(1));
  const kept = pool.run((api) => api.double(2));
  stopped.stop();
  stopped.stop();
  await expect(stopped.done).rejects.toBeInstanceOf(JobStopped);
  running.stop();
  await expect(running.done).rejects.toBeInstanceOf(JobStopped);
  expect(await kept.done).toBe(4);
});

it('never has more workers at work than it may', async () => {
  const pool = poolOf(2);
  const jobs = Array.from({ length: 6 }, (_, i) => pool.run((api) => api.double(i)));
  expect(await Promise.all(jobs.map(({ done }) => done))).toEqual([0, 2, 4, 6, 8, 10]);
  expect(PortWorker.started).toHaveLength(2);
});

it('says that a worker ended by itself and replaces it', async () => {
  const pool = poolOf(1);
  const job = pool.run((api) => api.forever());
  PortWorker.started[0]?.onerror?.({ message: 'out of memory', preventDefault: () => {} });
  await expect(job.done).rejects.toBeInstanceOf(WorkerEnded);
  expect(await pool.run((api) => api.double(3)).done).toBe(6);
});
