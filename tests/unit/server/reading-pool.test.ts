import { afterEach, expect, it, vi } from 'vitest';
import type { ReadRequest } from '../../../server/reading/messages.js';
import { ReadingPool } from '../../../server/reading/reading-pool.js';
import { AppError, InputError } from '../../../shared/errors.js';

vi.setConfig({ testTimeout: 30_000 }); // threads take their time to start on a busy machine
const pools: ReadingPool[] = [];
afterEach(() => Promise.all(pools.splice(0).map((pool) => pool.close())));

/** A pool whose threads run the given handler of one message instead of the reader. */
function poolOf(handler: string, options: { threads?: number; timeLimitMs?: number; memoryMb?: number } = {}) {
  const entry = `const { parentPort } = require('node:worker_threads');
    const answer = (read) => parentPort.postMessage({ ok: true, read });
    parentPort.on('message', (request) => { ${handler} });`;
  const pool = new ReadingPool({ threads: 1, ...options, source: async () => ({ entry, isText: true }) });
  pools.push(pool);
  return pool;
}
const file = (fileName: string): ReadRequest => ({ path: `/nowhere/${fileName}`, fileName, overrides: {} });
const failure = (promise: Promise<unknown>) =>
  promise.then(
    () => expect.unreachable('it answered'),
    (error: unknown) => error as AppError | InputError,
  );

it('reads several files through one thread, each with its own answer', async () => {
  const pool = poolOf('answer({ reading: request.fileName })');
  const names = ['a.txt', 'b.txt', 'c.txt'];
  const answers = await Promise.all(names.map((name) => pool.read(file(name))));
  expect(answers.map((answer) => answer.reading)).toEqual(names);
});

it('ends a reading at its time limit and still reads the next file', async () => {
  const pool = poolOf("if (request.fileName === 'endless.txt') for (;;); answer({ points: 8 })", { timeLimitMs: 1500 });
  const [stopped, next] = await Promise.all([failure(pool.read(file('endless.txt'))), pool.read(file('good.txt'))]);
  expect(stopped).toBeInstanceOf(InputError);
  expect(stopped).toMatchObject({ code: 'file-too-large', where: 'endless.txt' });
  expect(next.points).toBe(8);
});

it('answers for a thread that ends by itself, and replaces it', async () => {
  const pool = poolOf("if (request.fileName === 'fatal.txt') process.exit(3); answer({ points: 8 })");
  const [ended, next] = await Promise.all([failure(pool.read(file('fatal.txt'))), pool.read(file('good.txt'))]);
  expect(ended).toBeInstanceOf(AppError);
  expect(ended).toMatchObject({ code: 'internal-error' });
  expect(next.points).toBe(8);
});

it('refuses a file whose reading runs out of memory, without taking the server down', async () => {
  const handler = 'const all = []; for (;;) all.push(Array.from({ length: 1e5 }, (_, i) => ({ i })));';
  const pool = poolOf(handler, { memoryMb: 24, timeLimitMs: 20_000 });
  expect(await failure(pool.read(file('huge.txt')))).toMatchObject({ code: 'file-too-large', where: 'huge.txt' });
});

it('passes a refusal of the reader on with its code, its words and its place', async () => {
  const refusal = "{ code: 'too-few-columns', message: 'Line 3 has 1 column.', where: 'line 3' }";
  const pool = poolOf(`parentPort.postMessage({ ok: false, refusal: ${refusal} })`);
  const refused = await failure(pool.read(file('one-column.txt')));
  expect(refused).toBeInstanceOf(InputError);
  expect(refused).toMatchObject({ code: 'too-few-columns', message: 'Line 3 has 1 column.', where: 'line 3' });
});

it('keeps the crash of a reader out of the words that a person sees', async () => {
  const pool = poolOf("parentPort.postMessage({ ok: false, crash: 'TypeError at /secret/path.ts:12' })");
  const crashed = await failure(pool.read(file('odd.txt')));
  expect(crashed).toMatchObject({ code: 'internal-error', cause: 'TypeError at /secret/path.ts:12' });
  expect(crashed.message).not.toContain('secret');
});

it('takes no more files once it is closed', async () => {
  const pool = poolOf('answer({})');
  await pool.close();
  expect(await failure(pool.read(file('late.txt')))).toMatchObject({ code: 'not-ready' });
});

it('answers for a thread that cannot begin, and does not hang when it is closed while one starts', async () => {
  const cannot = poolOf(') this is no program (');
  expect(await failure(cannot.read(file('a.txt')))).toMatchObject({ code: 'internal-error' });
  const slow = poolOf('answer({})');
  const waiting = failure(slow.read(file('b.txt')));
  await new Promise((resolve) => setTimeout(resolve, 1)); // its thread is on the way
  await slow.close();
  expect(['internal-error', 'not-ready']).toContain((await waiting).code);
});
