/**
 * `npm start`: from a fresh clone to a running Hummock. Installs what is missing, starts PostgreSQL, builds, serves and
 * prints the address. `npm run dev` does the same with rebuilding on every change.
 */
import { rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { openFolder } from './cluster-home.mjs';
import { startDevelopment } from './dev.mjs';
import { ensureCluster, keepRunning, stopCluster } from './postgres.mjs';
import { bindable, inWords, SetupError } from './processes.mjs';
import { noteRunning, runningHere } from './running.mjs';
import { startServer } from './server-process.mjs';
import { build, endSetupChildren, installPackages, inTurn, requireNode, requireOwnFolder } from './setup.mjs';

const FIRST_PORT = 4680;
const root = dirname(dirname(fileURLToPath(import.meta.url)));
const dataDir = process.env.HUMMOCK_DATA_DIR || join(root, '.data');
const runningPath = join(root, '.data', 'running.json');
const isDevelopment = process.argv.includes('--dev');

/** @param {string} line */
const say = (line) => console.log(line);

/** What was started, to be stopped in the opposite order. @type {(() => unknown)[]} */
const started = [];
let isEnding = false;

/** Thrown to leave the set-up when a signal has arrived meanwhile. */
class Ending extends Error {}

function goOn() {
  if (isEnding) throw new Ending();
}

async function main() {
  requireNode();
  requireOwnFolder(root);
  openFolder(join(root, '.data'));
  const other = await inTurn(root, say, setUp);
  if (other) {
    say('Hummock already runs in this folder.');
    for (const line of other.closing) say(line);
  }
  return other === undefined;
}

/** Everything up to a server that answers; or what another start runs in this folder, which is then left alone. */
async function setUp() {
  const other = await runningHere(runningPath);
  if (other) return other;
  goOn();
  await installPackages(root, say);
  goOn();
  const databaseUrl = process.env.DATABASE_URL || (await ownDatabase());
  goOn();
  if (!isDevelopment) await build(root, join(root, 'dist'), say);
  goOn();
  const server = await serve(databaseUrl);
  const closing = [`Hummock runs at ${server.url}`, ...server.tell];
  noteRunning(runningPath, { serverPid: server.pid, url: server.url, closing });
  started.push(() => rmSync(runningPath, { force: true }));
  for (const line of closing) say(line);
  say('Ctrl-C stops it.');
  void server.ended.then((how) => {
    const logPath = join(dataDir, 'logs', 'server.log');
    if (!isEnding) void fail(new SetupError(`The server ended ${how}. Its log: ${logPath}`));
  });
  return undefined;
}

async function ownDatabase() {
  const cluster = await ensureCluster(root, { say });
  const leave = keepRunning(root, cluster, { say, onFailure: (error) => void fail(error) });
  started.push(() => stopCluster(cluster), leave);
  return cluster.url;
}

/**
 * Starts the server on the port that HUMMOCK_PORT names, otherwise on the first free one from 4680 on. Somebody may take
 * that port between the look and the start; then the next one is tried.
 * @param {string} databaseUrl
 */
async function serve(databaseUrl) {
  const forced = process.env.HUMMOCK_PORT || undefined;
  const host = process.env.HUMMOCK_HOST || undefined;
  for (let from = FIRST_PORT; ; ) {
    const port = forced === undefined ? await firstFreePort(from, host) : await thePort(forced, host);
    const env = { DATABASE_URL: databaseUrl, HUMMOCK_CLIENT_DIR: join(root, 'dist/client') };
    try {
      const given = { root, port, dataDir, env, say };
      const server = isDevelopment
        ? await startDevelopment(given)
        : await startServer({ ...given, main: join(root, 'dist/server/main.js') });
      started.push(server.stop);
      return server;
    } catch (error) {
      if (forced !== undefined || (await bindable(port, host)) !== undefined) throw error;
      from = port + 1;
    }
  }
}

/**
 * @param {number} from
 * @param {string} [host]
 */
async function firstFreePort(from, host) {
  for (let port = from; port < from + 100; port += 1) if ((await bindable(port, host)) !== undefined) return port;
  throw new SetupError(`No port from ${from} to ${from + 99} is free. Name one: HUMMOCK_PORT=8080 npm start`);
}

/**
 * @param {string} forced
 * @param {string} [host]
 */
async function thePort(forced, host) {
  const port = Number(forced);
  if (!Number.isInteger(port) || port < 1 || port > 65535) {
    throw new SetupError(`HUMMOCK_PORT is "${forced}"; a port is a whole number from 1 to 65535.`);
  }
  if ((await bindable(port, host)) !== undefined) return port;
  throw new SetupError(`Port ${port}, which HUMMOCK_PORT names, is in use. Name another, or leave HUMMOCK_PORT out.`);
}

/** @type {Promise<unknown> | undefined} */
let stopping;

/** Stops everything that was started, once, however many signals arrive. */
function stopAll() {
  isEnding = true;
  endSetupChildren();
  stopping ??= working.then(async () => {
    for (const stop of started.reverse()) await stop();
  });
  return stopping;
}

/** @param {unknown} error */
async function fail(error) {
  const isAsked = isEnding; // what a signal cuts short is no fault
  if (!isAsked) console.error(inWords(error));
  await stopAll();
  process.exit(isAsked ? 0 : 1);
}

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM', 'SIGHUP'])) {
  process.on(signal, () => {
    if (!isEnding) say('Stopping.');
    void stopAll().then(() => process.exit(0));
  });
}

let failure;
const working = main().then(
  (isOurs) => isOurs,
  (error) => {
    failure = error;
    return false;
  },
);
if (!(await working)) {
  if (failure) await fail(failure);
  else process.exit(0);
}
