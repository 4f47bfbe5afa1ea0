import { type ChildProcess, spawn } from 'node:child_process';
import { once } from 'node:events';
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  rmSync,
  symlinkSync,
  writeFileSync,
} from 'node:fs';
import { createServer, type Server } from 'node:net';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { startThrowAwayCluster } from '../../../scripts/postgres.mjs';
import { beganAt, processesIn, waitUntil } from '../../../scripts/processes.mjs';

vi.setConfig({ testTimeout: 180_000, hookTimeout: 180_000 });

/** A small server in the product's place: what is tested here is how a start begins, goes on and ends. */
const SMALL_SERVER = `
import { createServer } from 'node:http';
import pg from 'pg';
const client = new pg.Client(process.env.DATABASE_URL);
client.on('error', () => undefined);
await client.connect();
const { rows } = await client.query('SELECT current_setting($1) AS port', ['port']);
const server = createServer((_request, response) => response.end(String(rows[0].port)));
const port = Number(process.env.HUMMOCK_PORT);
server.listen(port, '127.0.0.1', () => {
  console.log(JSON.stringify({ level: 30, msg: 'a line of the log' }));
  const tell = ['Demo sign-in: someone@school.example'];
  console.log(JSON.stringify({ level: 30, event: 'ready', url: 'http://127.0.0.1:' + port, tell }));
});
process.once('SIGTERM', () => process.exit(0));
`;

function makeCheckout(folder: string): string {
  mkdirSync(join(folder, 'server'), { recursive: true });
  mkdirSync(join(folder, 'src'));
  for (const name of ['scripts', 'package.json', 'package-lock.json', 'tsconfig.json']) {
    cpSync(name, join(folder, name), { recursive: true });
  }
  symlinkSync(resolve('node_modules'), join(folder, 'node_modules'));
  writeFileSync(join(folder, 'server/main.ts'), SMALL_SERVER);
  writeFileSync(join(folder, 'vite.config.ts'), 'export default {};\n');
  writeFileSync(join(folder, 'src/main.ts'), 'export {};\n');
  writeFileSync(join(folder, 'index.html'), '<script type="module" src="/src/main.ts"></script>\n');
  return folder;
}

interface Start {
  readonly child: ChildProcess;
  readonly lines: string[];
  readonly ended: Promise<number | null>;
}

const starts: Start[] = [];

function start(checkout: string, env: Readonly<Record<string, string>> = {}): Start {
  const { DATABASE_URL: _, HUMMOCK_PORT: __, ...own } = process.env;
  const child = spawn('npm', ['start', '--silent'], { cwd: checkout, env: { ...own, NODE_ENV: 'production', ...env } });
  const lines: string[] = [];
  for (const stream of [child.stdout, child.stderr]) {
    stream.on('data', (chunk: Buffer) => lines.push(...String(chunk).split('\n').filter(Boolean)));
  }
  const begun: Start = { child, lines, ended: once(child, 'close').then(([code]) => code as number | null) };
  starts.push(begun);
  return begun;
}

/** The address that a start prints once it serves. */
async function addressOf({ lines, child }: Start): Promise<string> {
  const address = () => lines.join('\n').match(/Hummock runs at (http:\/\/\S+)/)?.[1];
  await waitUntil(() => address() !== undefined || child.exitCode !== null, 120_000);
  return address() ?? `none: ${lines.join('\n')}`;
}

async function stop({ child, ended }: Start): Promise<number | null> {
  child.kill('SIGTERM');
  child.kill('SIGINT'); // a second signal, as Ctrl-C in a terminal arrives twice
  return ended;
}

const portOf = (address: string) => Number(new URL(address).port);
const clusterFolder = (checkout: string) => join(checkout, '.data/postgres/data');
const answer = async (address: string) => (await fetch(address)).text();

describe('npm start', () => {
  const base = mkdtempSync(join(tmpdir(), 'hummock start '));
  let checkout: string;
  beforeAll(() => {
    chmodSync(base, 0o711);
    checkout = makeCheckout(join(base, 'a path with a space'));
  });
  afterEach(async () => {
    for (const begun of starts.splice(0)) if (begun.child.exitCode === null) await stop(begun);
  });
  afterAll(() => rmSync(base, { recursive: true, force: true }));

  it('ends with the address and the demo sign-in, and leaves no process behind on SIGTERM', async () => {
    const first = start(checkout);
    const address = await addressOf(first);
    expect((await fetch(address)).status).toBe(200);
    expect(first.lines.slice(-3)).toEqual([
      `Hummock runs at ${address}`,
      'Demo sign-in: someone@school.example',
      'Ctrl-C stops it.',
    ]);
    expect(first.lines.join('\n')).not.toContain('a line of the log');
    expect(readFileSync(join(checkout, '.data/logs/server.log'), 'utf8')).toContain('a line of the log');
    expect(await stop(first)).toBe(0);
    expect(processesIn(clusterFolder(checkout))).toEqual([]);
    expect(processesIn(checkout)).toEqual([]);
    await expect(fetch(address)).rejects.toThrow();
  });

  it('run twice says where it already runs, and stops nothing', async () => {
    const address = await addressOf(start(checkout));
    const second = start(checkout);
    expect(await second.ended).toBe(0);
    expect(second.lines[0]).toBe('Hummock already runs in this folder.');
    expect(await addressOf(second)).toBe(address);
    expect((await fetch(address)).status).toBe(200);
  });

  it('takes the next port and a database of its own when a second checkout runs beside the first', async () => {
    const beside = makeCheckout(join(base, 'beside'));
    const [one, two] = [await addressOf(start(checkout)), await addressOf(start(beside))];
    expect(portOf(two)).toBeGreaterThan(portOf(one));
    expect(await answer(two)).not.toBe(await answer(one));
  });

  it('says that a port it was told to use is taken', async () => {
    const holder: Server = createServer().listen(0, '127.0.0.1');
    await once(holder, 'listening');
    const { port } = holder.address() as { port: number };
    const refused = start(checkout, { HUMMOCK_PORT: String(port) });
    expect(await refused.ended).toBe(1);
    expect(refused.lines.at(-1)).toBe(
      `Port ${port}, which HUMMOCK_PORT names, is in use. Name another, or leave HUMMOCK_PORT out.`,
    );
    expect(processesIn(clusterFolder(checkout))).toEqual([]);
    holder.close();
  });

  it('starts again after its starter was killed, whose server ended by itself', async () => {
    const killed = start(checkout);
    const address = await addressOf(killed);
    const { starter, server } = JSON.parse(readFileSync(join(checkout, '.data/running.json'), 'utf8'));
    process.kill(starter.pid, 'SIGKILL');
    expect(await waitUntil(() => beganAt(server.pid) === undefined, 10_000)).toBe(true);
    expect(processesIn(clusterFolder(checkout))).not.toEqual([]);
    const again = start(checkout);
    expect(portOf(await addressOf(again))).toBe(portOf(address));
    expect(await stop(again)).toBe(0);
    expect(processesIn(clusterFolder(checkout))).toEqual([]);
  });

  it('says so and stops PostgreSQL when the server is killed', async () => {
    const begun = start(checkout);
    await addressOf(begun);
    process.kill(JSON.parse(readFileSync(join(checkout, '.data/running.json'), 'utf8')).server.pid, 'SIGKILL');
    expect(await begun.ended).toBe(1);
    expect(begun.lines.at(-1)).toMatch(/^The server ended by SIGKILL\. Its log: /);
    expect(processesIn(clusterFolder(checkout))).toEqual([]);
  });

  it('starts PostgreSQL again when that is killed under it', async () => {
    const begun = start(checkout);
    await addressOf(begun);
    const postmaster = Number(readFileSync(join(clusterFolder(checkout), 'postmaster.pid'), 'utf8').split('\n')[0]);
    process.kill(postmaster, 'SIGKILL');
    expect(
      await waitUntil(() => begun.lines.includes('PostgreSQL ended unexpectedly; starting it again.'), 10_000),
    ).toBe(true);
    const lockPath = join(clusterFolder(checkout), 'postmaster.pid');
    const isBack = () => existsSync(lockPath) && readFileSync(lockPath, 'utf8').includes('ready');
    expect(
      await waitUntil(() => isBack() && !readFileSync(lockPath, 'utf8').startsWith(`${postmaster}\n`), 60_000),
    ).toBe(true);
    expect(await stop(begun)).toBe(0);
    expect(processesIn(clusterFolder(checkout))).toEqual([]);
  });

  it('uses the database of DATABASE_URL and makes none of its own', async () => {
    const elsewhere = makeCheckout(join(base, 'elsewhere'));
    const cluster = await startThrowAwayCluster();
    const begun = start(elsewhere, { DATABASE_URL: cluster.url });
    expect(await answer(await addressOf(begun))).toBe(String(cluster.port));
    expect(await stop(begun)).toBe(0);
    expect(existsSync(join(elsewhere, '.data/postgres'))).toBe(false);
    expect(processesIn(cluster.dataDir)).not.toEqual([]);
    await cluster.stop();
  });

  it('builds again when a source has changed', async () => {
    const first = start(checkout);
    await addressOf(first);
    await stop(first);
    expect(first.lines).not.toContain('Building.');
    writeFileSync(join(checkout, 'src/main.ts'), 'export const changed = true;\n');
    const second = start(checkout);
    await addressOf(second);
    expect(second.lines).toContain('Building.');
  });
});
