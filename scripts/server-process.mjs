/** The server as a child process: started, waited for, and stopped in order. */
import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { SetupError, waitUntil } from './processes.mjs';
import { plainEnvironment } from './setup.mjs';

const READY_WITHIN_MS = 120_000;

/**
 * @typedef {object} ServerProcess
 * @property {number} pid
 * @property {string} url
 * @property {string[]} tell what the server wants the person to be told once it runs
 * @property {Promise<string>} ended how it ended, once it has
 * @property {() => Promise<void>} stop may be called any number of times
 */

/**
 * Starts `main` and waits until it is ready to serve. All that it prints goes to `dataDir/logs/server.log`, and what a
 * person has to know is said as well. It sends `{ listening: true, tell: string[] }` once it listens, with the lines
 * that close a start.
 * @param {object} given
 * @param {string} given.root
 * @param {string[]} given.main what Node runs: options and the built main.js
 * @param {number} given.port
 * @param {string} given.dataDir
 * @param {Record<string, string | undefined>} given.env
 * @param {(line: string) => void} given.say
 * @returns {Promise<ServerProcess>}
 */
export async function startServer({ root, main, port, dataDir, env, say }) {
  const logs = join(dataDir, 'logs');
  mkdirSync(logs, { recursive: true, mode: 0o700 });
  const logPath = join(logs, 'server.log');
  const log = createWriteStream(logPath, { flags: 'w', mode: 0o600 });
  const preload = fileURLToPath(new URL('end-with-parent.mjs', import.meta.url));
  /** @type {import('node:child_process').SpawnOptions} */
  const options = {
    cwd: root,
    env: {
      ...plainEnvironment(),
      NODE_ENV: 'production',
      HUMMOCK_PORT: String(port),
      HUMMOCK_DATA_DIR: dataDir,
      ...env,
    },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
    detached: true, // Ctrl-C goes to the starter alone, which stops the server once
  };
  const child = spawn(process.execPath, ['--enable-source-maps', '--import', preload, ...main], options);
  /** @type {string[]} */
  const lastLines = [];
  for (const stream of [child.stdout, child.stderr]) {
    if (stream)
      createInterface({ input: stream }).on('line', (line) => {
        log.write(`${line}\n`);
        lastLines.push(line);
        if (lastLines.length > 12) lastLines.shift();
        const words = forThePerson(line);
        if (words !== undefined) say(words);
      });
  }
  const ended = new Promise((/** @type {(how: string) => void} */ resolve) => {
    child.once('exit', (code, signal) => resolve(signal ? `by ${signal}` : `with status ${code}`));
    child.once('error', (error) => resolve(error.message));
  });
  const url = `http://127.0.0.1:${port}`;
  /** @type {string[]} */
  const tell = [];
  let isListening = false; // said by this very process: another server may answer on a port that this one did not get
  child.on('message', (/** @type {{ listening?: boolean, tell?: string[] }} */ message) => {
    isListening ||= message.listening === true;
    tell.push(...(message.tell ?? []));
  });
  const server = { pid: child.pid ?? 0, url, tell, ended, stop: () => stop(child, ended) };
  let how = '';
  void ended.then((outcome) => (how = outcome));
  const isInTime = await waitUntil(
    async () => how !== '' || (isListening && (await answers(url))),
    READY_WITHIN_MS,
    100,
  );
  if (isInTime && how === '') return server;
  await server.stop();
  const what = isInTime ? `ended ${how} before it was ready` : `was not ready within ${READY_WITHIN_MS / 1000} s`;
  throw new SetupError(`The server ${what}. It said:\n  ${lastLines.join('\n  ')}\nThe whole log: ${logPath}`);
}

/**
 * Of a structured log line only the links of letters that nobody sends, and faults; any other line as it is.
 * @param {string} line
 */
function forThePerson(line) {
  if (!line.startsWith('{')) return line;
  try {
    const { level, msg, event, to, link, reqId } = JSON.parse(line);
    if (event === 'letter') return `Letter to ${to}: ${link ?? msg}`;
    return level >= 50 ? `Fault in the server: ${msg}${reqId ? ` (reference ${reqId})` : ''}` : undefined;
  } catch {
    return line;
  }
}

/**
 * Whether a server there is ready to serve.
 * @param {string} url
 */
export async function answers(url) {
  try {
    return (await fetch(`${url}/api/ready`, { signal: AbortSignal.timeout(5_000) })).ok;
  } catch {
    return false;
  }
}

/**
 * @param {import('node:child_process').ChildProcess} child
 * @param {Promise<string>} ended
 */
async function stop(child, ended) {
  child.kill('SIGTERM');
  const lastResort = setTimeout(() => child.kill('SIGKILL'), 10_000);
  await ended;
  clearTimeout(lastResort);
}
