import { type ChildProcess, spawn } from 'node:child_process';
import { mkdtempSync, readdirSync, rmSync } from 'node:fs';
import { createServer } from 'node:net';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { createInterface } from 'node:readline';
import { build } from 'esbuild';
import { afterAll, expect, it, vi } from 'vitest';
import { Client } from './support/client.js';
import { makeDatabase } from './support/database.js';

vi.setConfig({ testTimeout: 120_000 }); // a process of its own takes a while on a busy machine

const folder = mkdtempSync(join(tmpdir(), 'hummock-main-'));
// Inside the checkout, so that the bundle finds its packages as the real one does.
const bundle = join('.cache', `main-test-${process.pid}`, 'main.js');
await build({
  entryPoints: ['server/main.ts'],
  outfile: bundle,
  bundle: true,
  platform: 'node',
  format: 'esm',
  packages: 'external',
  logLevel: 'silent',
});
const database = await makeDatabase({ migrated: false });
const children: ChildProcess[] = [];
afterAll(async () => {
  for (const child of children) if (child.exitCode === null) child.kill('SIGKILL');
  await database.drop();
  for (const made of [folder, dirname(bundle)]) rmSync(made, { recursive: true, force: true });
});

interface Running {
  readonly child: ChildProcess;
  readonly lines: Record<string, unknown>[];
  /** The first line of the log that has this event; undefined when the process ends before. */
  line(event: string): Promise<Record<string, unknown> | undefined>;
  readonly ended: Promise<number | null>;
  errors(): string;
}

function startMain(environment: Record<string, string>): Running {
  const env = {
    PATH: process.env.PATH ?? '',
    HUMMOCK_PORT: '0',
    HUMMOCK_DEMO: 'no',
    HUMMOCK_DATA_DIR: folder,
    ...environment,
  };
  const child = spawn(process.execPath, ['--import', 'tsx', 'server/main.ts'], {
    env,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  children.push(child);
  const lines: Record<string, unknown>[] = [];
  let errors = '';
  child.stderr?.on('data', (part) => {
    errors += part;
  });
  createInterface({ input: child.stdout! }).on('line', (line) => lines.push(JSON.parse(line)));
  const ended = new Promise<number | null>((resolve) => child.once('close', resolve));
  const line = async (event: string) => {
    let isOver = false;
    void ended.then(() => {
      isOver = true;
    });
    for (;;) {
      const found = lines.find((entry) => entry.event === event);
      if (found || isOver) return found;
      await new Promise((resolve) => setTimeout(resolve, 30));
    }
  };
  return { child, lines, line, ended, errors: () => errors };
}

it('migrates, serves, sends letters from the queue, and ends at once on a signal that comes twice', async () => {
  const first = startMain({ DATABASE_URL: database.url });
  const ready = await first.line('ready');
  expect(ready).toMatchObject({ url: expect.stringMatching(/^http:\/\/127\.0\.0\.1:\d+$/), pid: first.child.pid });
  const client = new Client(String(ready?.url));
  expect((await client.get('/api/ready')).body).toEqual({ status: 'ready' });
  await client.post('/api/account/register', { email: 'm@example.test', name: 'M', password: 'a quiet passphrase' });
  const letter = await first.line('letter');
  expect(letter).toMatchObject({ to: 'm@example.test', link: expect.stringContaining(`${ready?.url}/verify/`) });
  expect(readdirSync(join(folder, 'mail'))).toHaveLength(1);
  const verified = await client.post('/api/account/verify', { code: String(letter?.link).split('/').at(-1) });
  expect(verified.status).toBe(200);
  first.child.kill('SIGINT');
  first.child.kill('SIGINT');
  expect(await first.ended).toBe(0);
  expect(first.errors()).toBe('');

  const second = startMain({ DATABASE_URL: database.url }); // the same database and secret: the session goes on
  const again = new Client(String((await second.line('ready'))?.url));
  for (const [name, cookie] of client.cookies) again.cookies.set(name, cookie);
  expect((await again.get('/api/me')).status).toBe(200);
  second.child.kill('SIGTERM');
  expect(await second.ended).toBe(0);
});

it('lets an answer on its way finish before it ends', async () => {
  const running = startMain({ DATABASE_URL: database.url });
  const client = new Client(String((await running.line('ready'))?.url));
  const answer = client.post('/api/account/register', {
    email: 'l@example.test',
    name: 'L',
    password: 'a quiet passphrase',
  });
  await new Promise((resolve) => setTimeout(resolve, 40)); // the answer takes 150 ms at least
  running.child.kill('SIGTERM');
  expect((await answer).status).toBe(202);
  expect(await running.ended).toBe(0);
});

it('says in one sentence what is wrong with the environment', async () => {
  const { ended, errors } = startMain({ DATABASE_URL: 'nonsense' });
  expect(await ended).toBe(1);
  expect(errors()).toBe(
    'The environment holds settings that cannot be used.\nDATABASE_URL: This has to be a postgres:// address.\n',
  );
});

it('ends with a failure, and leaves nothing running, when its port is taken', async () => {
  const other = createServer();
  await new Promise<void>((resolve) => other.listen(0, '127.0.0.1', resolve));
  const { port } = other.address() as { port: number };
  const { ended, lines } = startMain({ DATABASE_URL: database.url, HUMMOCK_PORT: String(port) });
  expect(await ended).toBe(1);
  expect(lines).toContainEqual(
    expect.objectContaining({ level: 60, err: expect.objectContaining({ code: 'EADDRINUSE' }) }),
  );
  other.close();
});
