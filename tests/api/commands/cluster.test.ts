import { spawn } from 'node:child_process';
import { once } from 'node:events';
import {
  chmodSync,
  cpSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import pg from 'pg';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { isRoot } from '../../../scripts/debian.mjs';
import { ensureCluster, startThrowAwayCluster, stopCluster } from '../../../scripts/postgres.mjs';
import { lockFile, processesIn, waitUntil, workingFolder } from '../../../scripts/processes.mjs';

vi.setConfig({ testTimeout: 120_000, hookTimeout: 120_000 });

type Cluster = Awaited<ReturnType<typeof ensureCluster>>;

async function answer(url: string, sql: string): Promise<unknown> {
  const client = new pg.Client({ connectionString: url });
  client.on('error', () => undefined); // the server may be killed under it
  await client.connect();
  try {
    const { rows } = await client.query({ text: sql, rowMode: 'array' });
    return rows[0]?.[0];
  } finally {
    await client.end();
  }
}

function ownerOfProcess(pid: number): number {
  return Number(/^Uid:\s+(\d+)/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1]);
}

/** Runs a module in a process of its own, for what only a killed process can show. */
async function runModule(source: string): Promise<string> {
  const child = spawn(process.execPath, ['--input-type=module', '--eval', source], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  let printed = '';
  child.stdout.on('data', (chunk) => (printed += chunk));
  await once(child, 'close');
  return printed.trim();
}

const moduleUrl = (path: string) => JSON.stringify(`file://${resolve(path)}`);

describe("the project's own cluster", () => {
  const root = mkdtempSync(join(tmpdir(), 'hummock cluster ')); // with a space
  const checkout = join(root, 'checkout');
  let cluster: Cluster;
  const ensured = async () => {
    cluster = await ensureCluster(checkout);
    return cluster;
  };
  const stop = () => stopCluster({ ...cluster, startedHere: true });

  beforeAll(async () => {
    chmodSync(root, 0o711); // so that the PostgreSQL user may pass
    mkdirSync(checkout);
    await ensured();
  });
  afterAll(async () => {
    await stop();
    rmSync(root, { recursive: true, force: true });
  });

  it('starts on loopback only, with a database of its own, and asks for its password', async () => {
    expect(await answer(cluster.url, 'SELECT current_database()')).toBe('hummock');
    expect(await answer(cluster.url, 'SHOW listen_addresses')).toBe('127.0.0.1');
    expect(await answer(cluster.url, 'SHOW unix_socket_directories')).toBe('');
    const stranger = new URL(cluster.url);
    stranger.password = 'guess';
    await expect(answer(stranger.href, 'SELECT 1')).rejects.toThrow(/password authentication failed/);
  });

  it('is found running by a second start', async () => {
    expect(await ensureCluster(checkout)).toEqual(cluster);
  });

  it('never runs as root, and keeps password and port from other users', () => {
    expect(ownerOfProcess(cluster.pid)).not.toBe(0);
    for (const name of ['password', 'port']) {
      expect(statSync(join(cluster.dataDir, '..', name)).mode & 0o777).toBe(0o600);
    }
  });

  it('comes back on the same port after kill -9 with everything that was committed', async () => {
    const killed = cluster;
    await answer(killed.url, 'CREATE TABLE kept (n int)');
    await answer(killed.url, 'INSERT INTO kept VALUES (7)');
    process.kill(killed.pid, 'SIGKILL');
    await waitUntil(() => workingFolder(killed.pid) === undefined, 10_000);
    expect(existsSync(join(killed.dataDir, 'postmaster.pid'))).toBe(true);
    await ensured();
    expect(cluster.pid).not.toBe(killed.pid);
    expect(cluster.url).toBe(killed.url);
    expect(await answer(cluster.url, 'SELECT n FROM kept')).toBe(7);
  });

  it('leaves no process behind when it is stopped', async () => {
    expect(processesIn(cluster.dataDir)).not.toEqual([]);
    await stop();
    expect(processesIn(cluster.dataDir)).toEqual([]);
  });

  it('is not misled by a lock file whose process id has been given to another process', async () => {
    await ensured();
    const lock = readFileSync(join(cluster.dataDir, 'postmaster.pid'), 'utf8');
    await stop();
    writeFileSync(join(cluster.dataDir, 'postmaster.pid'), lock.replace(/^\d+/, String(process.pid)));
    await ensured();
    expect(await answer(cluster.url, 'SELECT n FROM kept')).toBe(7);
  });

  it('is taken over when its starter was killed, and left running by whoever did not start it', async () => {
    await stop();
    const source = `const { ensureCluster } = await import(${moduleUrl('scripts/postgres.mjs')});
      console.log((await ensureCluster(${JSON.stringify(checkout)})).pid); process.kill(process.pid, 'SIGKILL');`;
    const pid = Number(await runModule(source));
    await ensured();
    expect(cluster.pid).toBe(pid);
    expect(cluster.startedHere).toBe(true);
    await stopCluster({ ...cluster, startedHere: false });
    expect(processesIn(cluster.dataDir)).not.toEqual([]);
  });

  it('is made once when two first starts come at once, and afresh after an interrupted attempt', async () => {
    await stop();
    rmSync(cluster.dataDir, { recursive: true });
    const halfMade = join(cluster.dataDir, '..', 'data.new-1');
    mkdirSync(halfMade);
    writeFileSync(join(halfMade, 'PG_VERSION'), '15\n');
    const [one, two] = await Promise.all([ensured(), ensured()]);
    expect(two).toEqual(one);
    expect(await answer(one.url, 'SELECT current_database()')).toBe('hummock');
    expect(existsSync(halfMade)).toBe(false);
  });
});

describe('a checkout that the PostgreSQL user cannot enter', () => {
  it('has its cluster where it can be reached, and a copy of the checkout gets one of its own', async () => {
    const base = mkdtempSync(join(tmpdir(), 'hummock-closed-')); // mode 0700
    const original = join(base, 'one');
    const copy = join(base, 'two');
    mkdirSync(original);
    const homes: string[] = [];
    try {
      const first = await ensureCluster(original);
      homes.push(join(first.dataDir, '..'));
      const reachable = isRoot ? /^\/var\/lib\/hummock-[0-9a-f]{12}\/data$/ : /one\/\.data\/postgres\/data$/;
      expect(first.dataDir).toMatch(reachable);
      expect(await answer(first.url, 'SELECT 1')).toBe(1);
      await stopCluster(first);
      cpSync(original, copy, { recursive: true });
      const second = await ensureCluster(copy);
      homes.push(join(second.dataDir, '..'));
      expect(second.dataDir).not.toBe(first.dataDir);
      await stopCluster(second);
    } finally {
      for (const folder of [base, ...homes]) rmSync(folder, { recursive: true, force: true });
    }
  });
});

describe('a throw-away cluster', () => {
  it('is deleted when it is stopped', async () => {
    const cluster = await startThrowAwayCluster();
    expect(await answer(cluster.url, 'SHOW fsync')).toBe('off');
    await cluster.stop();
    expect(existsSync(cluster.dataDir)).toBe(false);
  });

  it('ends with its process when that is killed, and a later one sweeps its folder', async () => {
    const source = `const { startThrowAwayCluster } = await import(${moduleUrl('scripts/postgres.mjs')});
      console.log((await startThrowAwayCluster()).dataDir); process.kill(process.pid, 'SIGKILL');`;
    const dataDir = await runModule(source);
    expect(await waitUntil(() => processesIn(dataDir).length === 0, 5_000)).toBe(true);
    expect(existsSync(dataDir)).toBe(true);
    await (await startThrowAwayCluster()).stop();
    expect(existsSync(dataDir)).toBe(false);
  });
});

describe('the lock', () => {
  it('keeps a second holder waiting, and is let go when the first is killed', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'hummock-lock-'));
    const path = join(folder, 'lock');
    const source = `const { lockFile } = await import(${moduleUrl('scripts/processes.mjs')});
      await lockFile(${JSON.stringify(path)}); console.log('held'); setInterval(() => {}, 1_000);`;
    const holder = spawn(process.execPath, ['--input-type=module', '--eval', source], {
      stdio: ['ignore', 'pipe', 'inherit'],
    });
    await once(holder.stdout, 'data');
    await expect(lockFile(path, { timeoutMs: 300 })).rejects.toThrow(/has held/);
    holder.kill('SIGKILL');
    const unlock = await lockFile(path, { timeoutMs: 5_000 });
    unlock();
    expect(readdirSync(folder)).toEqual(['lock']);
    rmSync(folder, { recursive: true });
  });
});
