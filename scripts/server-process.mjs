/** The server as a child process: started, waited for, and stopped in order. */
import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { setTimeout as sleep } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { SetupError } from './processes.mjs';
import { plainEnvironment } from './setup.mjs';

const READY_WITHIN_MS = 120_000;
const STOPPED_WITHIN_MS = 20_000;

/**
 * @typedef {object} ServerProcess
 * @property {number} pid
 * @property {string} url
 * @property {string[]} tell what the server wants the person to be told once it runs
 * @property {Promise<string>} ended how it ended, once it has
 * @property {() => Promise<void>} stop may be called any number of times
 */

/**
 * Starts `main` and waits until it serves. All that it prints goes to `dataDir/logs/server.log`, and what a person has to
 * know is said as well.
 * @param {object} given
 * @param {string} given.root
 * @param {string} given.main the built main.js
 * @param {number} given.port 0 for any free one
 * @param {string} given.dataDir
 * @param {Record<string, string | undefined>} given.env
 * @param {(line: string) => void} given.say
 * @returns {Promise<ServerProcess>}
 */
export async function startServer({ root, main, port, dataDir, env, say }) {
  const logs = join(dataDir, 'logs');
  mkdirSync(logs, { recursive: true, mode: 0o700 });
  const logPath = join(logs, 'server.log');
  const preload = fileURLToPath(new URL('end-with-parent.mjs', import.meta.url));
  const own = {
    NODE_ENV: 'production',
    HUMMOCK_LOG_LEVEL: 'info',
    HUMMOCK_PORT: String(port),
    HUMMOCK_DATA_DIR: dataDir,
  };
  /** @type {import('node:child_process').SpawnOptions} */
  const options = {
    cwd: root,
    env: { ...plainEnvironment(), ...own, ...env },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    detached: true, // Ctrl-C goes to the starter alone, which stops the server once
  };
  const child = spawn(process.execPath, ['--enable-source-maps', '--import', preload, main], options);
  const output = followOutput(child, logPath, say);
  /** @type {Promise<string>} */
  const ended = new Promise((resolve) => {
    child.once('close', (code, signal) => resolve(signal ? `by ${signal}` : `with status ${code}`));
    child.once('error', (error) => resolve(error.message));
  });
  const late = sleep(READY_WITHIN_MS, 'late', { ref: false });
  const outcome = await Promise.race([output.ready, ended, late]);
  if (typeof outcome === 'object') {
    return { pid: child.pid ?? 0, url: outcome.url, tell: outcome.tell ?? [], ended, stop: () => stop(child, ended) };
  }
  await stop(child, ended);
  const what =
    outcome === 'late' ? `was not ready within ${READY_WITHIN_MS / 1000} s` : `ended ${outcome} before it was ready`;
  throw new SetupError(`The server ${what}. Its log: ${logPath}`);
}

/** @typedef {{ event: 'ready', url: string, tell?: string[] }} ReadyLine what the server logs once it serves */

/**
 * Keeps what the server prints in its log, and says to the person what concerns them: of structured lines only faults and
 * the links of letters that nobody sends, any other line as it is.
 * @param {import('node:child_process').ChildProcess} child
 * @param {string} logPath
 * @param {(line: string) => void} say
 */
function followOutput(child, logPath, say) {
  const log = createWriteStream(logPath, { flags: 'w', mode: 0o600 });
  /** @type {(line: ReadyLine) => void} */
  let isReady;
  /** @type {Promise<ReadyLine>} */
  const ready = new Promise((resolve) => (isReady = resolve));
  const follow = (/** @type {string} */ line) => {
    log.write(`${line}\n`);
    const entry = structured(line);
    if (!entry) return say(line);
    if (entry.event === 'ready') isReady(entry);
    if (entry.event === 'letter') say(`Letter to ${entry.to}: ${entry.link ?? entry.subject}`);
    if (entry.level >= 50) say(`Fault in the server: ${[entry.msg, entry.err?.message].filter(Boolean).join(': ')}`);
  };
  for (const stream of [child.stdout, child.stderr]) if (stream) createInterface({ input: stream }).on('line', follow);
  child.once('close', () => log.end());
  return { ready };
}

/** @param {string} line */
function structured(line) {
  try {
    return line.startsWith('{') ? JSON.parse(line) : undefined;
  } catch {
    return undefined;
  }
}

/**
 * @param {import('node:child_process').ChildProcess} child
 * @param {Promise<string>} ended
 */
async function stop(child, ended) {
  child.kill('SIGTERM');
  const lastResort = setTimeout(() => child.kill('SIGKILL'), STOPPED_WITHIN_MS);
  await ended;
  clearTimeout(lastResort);
}
