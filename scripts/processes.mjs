/**
 * Facts about processes, ports and locks, read from Linux itself (/proc, flock), so that the other scripts need no package.
 */
import { spawn } from 'node:child_process';
import { closeSync, openSync, readdirSync, readFileSync, readlinkSync } from 'node:fs';
import { createServer } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';

/** A fault that a person can act on: its message is printed as it is, without a stack trace. */
export class SetupError extends Error {
  /** @override */
  name = 'SetupError';
}

/**
 * What a person is told of an error: one sentence where one is known, otherwise all there is.
 * @param {unknown} error
 */
export function inWords(error) {
  if (error instanceof SetupError) return error.message;
  const { code, path, stack } = /** @type {NodeJS.ErrnoException} */ (error);
  if (code === 'EACCES' || code === 'EPERM')
    return `${path} belongs to another user. Run this as that user, or remove it.`;
  if (code === 'EROFS') return `${path} cannot be written: its file system is read-only.`;
  if (code === 'ENOSPC') return 'The disk is full. Make room, then try again.';
  return stack ?? String(error);
}

/**
 * When a process began, in clock ticks since boot; undefined when there is none (a zombie counts as none).
 * A process id alone does not name a process: ids are given out again. Id and beginning together do.
 * @param {number} pid
 * @returns {number | undefined}
 */
export function beganAt(pid) {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' '); // the name before it may hold spaces
    return fields[0] === 'Z' ? undefined : Number(fields[19]); // fields 3 and 22 of proc(5)
  } catch {
    return undefined;
  }
}

/** @typedef {{ pid: number, beganAt: number }} ProcessName */

/** @returns {ProcessName} */
export function thisProcess() {
  return { pid: process.pid, beganAt: beganAt(process.pid) ?? 0 };
}

/** @param {ProcessName | undefined} name */
export function isRunning(name) {
  return name !== undefined && beganAt(name.pid) === name.beganAt;
}

/**
 * The folder a process works in; undefined when there is no such process or it is another user's.
 * @param {number} pid
 */
export function workingFolder(pid) {
  try {
    return readlinkSync(`/proc/${pid}/cwd`);
  } catch {
    return undefined;
  }
}

/**
 * Every process that works in the folder.
 * @param {string} folder
 */
export function processesIn(folder) {
  return readdirSync('/proc')
    .map(Number)
    .filter((pid) => pid > 0 && workingFolder(pid) === folder);
}

/**
 * @param {number} pid
 * @param {NodeJS.Signals} signal
 */
export function sendSignal(pid, signal) {
  try {
    process.kill(pid, signal);
  } catch {
    // It has ended already, which is what the caller wants.
  }
}

/**
 * Waits until the statement holds; false when the time is over.
 * @param {() => boolean | Promise<boolean>} holds
 * @param {number} timeoutMs
 */
export async function waitUntil(holds, timeoutMs, everyMs = 25) {
  const end = Date.now() + timeoutMs;
  while (!(await holds())) {
    if (Date.now() > end) return false;
    await sleep(everyMs);
  }
  return true;
}

/**
 * @param {number} port 0 asks the system for any free one
 * @returns {Promise<number | undefined>} the port when it could be bound, otherwise undefined
 */
export function bindable(port, host = '127.0.0.1') {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(undefined));
    probe.listen({ port, host, exclusive: true }, () => {
      const address = probe.address();
      const bound = address !== null && typeof address === 'object' ? address.port : undefined;
      probe.close(() => resolve(bound));
    });
  });
}

/**
 * Holds an exclusive lock on a file until the returned function is called. The kernel keeps it through a child that
 * reads from this process, so it is let go whatever way this process ends, kill -9 included: there is no stale lock.
 * @param {string} path
 * @param {{ timeoutMs?: number, onWait?: () => void }} [options]
 * @returns {Promise<() => void>}
 */
export async function lockFile(path, { timeoutMs = 15 * 60_000, onWait } = {}) {
  closeSync(openSync(path, 'a', 0o600));
  const holder = spawn('flock', ['--exclusive', path, 'sh', '-c', 'echo held; exec cat'], {
    stdio: ['pipe', 'pipe', 'ignore'],
    detached: true, // Ctrl-C in the terminal reaches the whole group, and must not open the lock early
  });
  const notice = onWait && setTimeout(onWait, 1_000);
  const outcome = await new Promise((resolve) => {
    holder.stdout.once('data', () => resolve('held'));
    holder.once('error', () => resolve('missing'));
    holder.once('exit', () => resolve('ended'));
    setTimeout(() => resolve('late'), timeoutMs).unref();
  });
  clearTimeout(notice);
  if (outcome !== 'held') {
    holder.kill();
    if (outcome === 'missing')
      throw new SetupError('The command flock is missing. Install it: apt-get install util-linux');
    throw new SetupError(`Another start or test of this folder has held ${path} for too long. End it, then try again.`);
  }
  holder.unref();
  /** @type {import('node:net').Socket} */ (holder.stdin).unref();
  /** @type {import('node:net').Socket} */ (holder.stdout).unref();
  return () => holder.stdin.end();
}
