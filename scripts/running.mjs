/** What runs in a checkout, noted in `.data/running.json`, so that a second start can say so and a crash is cleaned up. */
import { readFileSync, rmSync } from 'node:fs';
import { writePrivate } from './cluster-home.mjs';
import { beganAt, isRunning, sendSignal, thisProcess, waitUntil } from './processes.mjs';

/**
 * @typedef {object} Running
 * @property {import('./processes.mjs').ProcessName} starter
 * @property {import('./processes.mjs').ProcessName} server
 * @property {string} url
 * @property {string[]} closing the lines that told the person where it is
 */

/**
 * @param {string} path
 * @param {{ serverPid: number, url: string, closing: string[] }} server
 */
export function noteRunning(path, { serverPid, url, closing }) {
  /** @type {Running} */
  const running = {
    starter: thisProcess(),
    server: { pid: serverPid, beganAt: beganAt(serverPid) ?? 0 },
    url,
    closing,
  };
  writePrivate(path, JSON.stringify(running));
}

/**
 * What another start in this checkout runs; undefined when nothing does. A server whose starter was killed is ended first.
 * @param {string} path
 * @returns {Promise<Running | undefined>}
 */
export async function runningHere(path) {
  const running = noted(path);
  if (!running) return undefined;
  if (isRunning(running.starter)) return running;
  if (isRunning(running.server)) {
    sendSignal(running.server.pid, 'SIGTERM');
    if (!(await waitUntil(() => !isRunning(running.server), 10_000))) sendSignal(running.server.pid, 'SIGKILL');
  }
  rmSync(path, { force: true });
  return undefined;
}

/** @param {string} path @returns {Running | undefined} */
function noted(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return undefined;
  }
}
