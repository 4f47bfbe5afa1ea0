/** What both commands need before anything can run: the packages of the lock, and a build of the sources as they are. */
import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  accessSync,
  constants,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  statSync,
  utimesSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { lockFile, SetupError } from './processes.mjs';

const OLDEST_NODE = [20, 19];

/** @typedef {(line: string) => void} Say */

/** Says in one sentence what is wrong when Node.js itself is too old for the packages. */
export function requireNode() {
  const [major = 0, minor = 0] = process.versions.node.split('.').map(Number);
  const [oldestMajor = 0, oldestMinor = 0] = OLDEST_NODE;
  if (major > oldestMajor || (major === oldestMajor && minor >= oldestMinor)) return;
  throw new SetupError(`Hummock needs Node.js ${OLDEST_NODE.join('.')} or newer; this is ${process.versions.node}.`);
}

/**
 * Says so when the checkout is not this user's to write in.
 * @param {string} root
 */
export function requireOwnFolder(root) {
  try {
    accessSync(root, constants.W_OK);
  } catch {
    throw new SetupError(
      `${root} belongs to another user, so nothing can be installed in it. Run this as that user, or from a clone of your own.`,
    );
  }
}

/**
 * One set-up at a time in a checkout: a second start or test waits for the first to finish installing and building.
 * @template T
 * @param {string} root
 * @param {Say} say
 * @param {() => Promise<T>} work
 */
export async function inTurn(root, say, work) {
  mkdirSync(join(root, '.cache'), { recursive: true });
  const unlock = await lockFile(join(root, '.cache', 'setup.lock'), {
    onWait: () => say('Another start or test of this folder is setting up; waiting for it.'),
  });
  try {
    return await work();
  } finally {
    unlock();
  }
}

/**
 * Installs the packages of the lock when they are not there, are those of another lock or another Node.js, or an
 * earlier installation was interrupted.
 * @param {string} root
 * @param {Say} say
 */
export async function installPackages(root, say) {
  const stampPath = join(root, 'node_modules', '.hummock-stamp');
  const nodeKind = `${process.versions.modules} ${process.arch}`;
  const stamp = `${nodeKind} ${hashOf(readFileSync(join(root, 'package-lock.json')))}`;
  const earlier = existsSync(stampPath) ? readFileSync(stampPath, 'utf8') : nodeKind;
  if (earlier === stamp) return;
  if (earlier.startsWith(nodeKind) && holdsTheLock(root)) return writeFileSync(stampPath, stamp); // npm itself was here
  say('Installing the packages of package-lock.json. This takes about a minute.');
  rmSync(stampPath, { force: true });
  await run(root, 'npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], 'npm ci');
  writeFileSync(stampPath, stamp);
}

/**
 * Whether npm itself has put in place exactly what the lock lists: it writes its own list last, so an interrupted
 * installation has none.
 * @param {string} root
 */
function holdsTheLock(root) {
  const listPath = join(root, 'node_modules', '.package-lock.json');
  if (!existsSync(listPath)) return false;
  /** @type {(path: string) => Record<string, { version?: string, optional?: boolean }>} */
  const packagesOf = (path) => JSON.parse(readFileSync(path, 'utf8')).packages;
  const installed = packagesOf(listPath);
  return Object.entries(packagesOf(join(root, 'package-lock.json'))).every(
    ([path, { version, optional }]) =>
      path === '' || (installed[path] ? installed[path].version === version : optional),
  );
}

const SOURCES = [
  'shared',
  'calculators',
  'server',
  'src',
  'public',
  'index.html',
  'vite.config.ts',
  'tsconfig.json',
  'package-lock.json',
  'scripts/setup.mjs',
];

/**
 * The hash of everything that a build is made from.
 * @param {string} root
 */
export function sourceStamp(root) {
  const hash = createHash('sha256');
  for (const source of SOURCES) {
    const path = join(root, source);
    if (!existsSync(path)) continue;
    const files = statSync(path).isDirectory()
      ? readdirSync(path, { recursive: true, withFileTypes: true })
          .filter((entry) => entry.isFile())
          .map((entry) => join(entry.parentPath, entry.name))
          .sort()
      : [path];
    for (const file of files) hash.update(file.slice(root.length)).update('\0').update(readFileSync(file)).update('\0');
  }
  return hash.digest('hex').slice(0, 16);
}

/**
 * Builds client and server into `folder/client` and `folder/server`, unless they are there for these very sources.
 * @param {string} root
 * @param {string} folder
 * @param {Say} say
 */
export async function build(root, folder, say) {
  const stampPath = join(folder, 'stamp');
  const stamp = sourceStamp(root);
  if (existsSync(stampPath) && readFileSync(stampPath, 'utf8') === stamp) return;
  say('Building.');
  rmSync(stampPath, { force: true }); // an interrupted build has none, and is made again
  await Promise.all([buildClient(root, folder), buildServer(root, folder)]);
  writeFileSync(stampPath, stamp);
}

/**
 * A build that nothing rebuilds while a test run uses it: one folder for each state of the sources, the last three kept.
 * @param {string} root
 * @param {Say} say
 */
export async function buildForTests(root, say) {
  const builds = join(root, '.cache', 'builds');
  const folder = join(builds, sourceStamp(root));
  await build(root, folder, say);
  utimesSync(folder, new Date(), new Date());
  const byAge = readdirSync(builds)
    .map((name) => join(builds, name))
    .sort((a, b) => statSync(b).mtimeMs - statSync(a).mtimeMs);
  for (const old of byAge.slice(3)) rmSync(old, { recursive: true, force: true });
  return folder;
}

/**
 * @param {string} root
 * @param {string} folder
 */
function buildClient(root, folder) {
  const vite = join(root, 'node_modules/vite/bin/vite.js');
  const args = ['build', '--outDir', join(folder, 'client'), '--emptyOutDir', '--logLevel', 'warn'];
  return run(root, process.execPath, [vite, ...args], 'The build of the client');
}

/**
 * @param {string} root
 * @param {string} folder
 */
function buildServer(root, folder) {
  rmSync(join(folder, 'server'), { recursive: true, force: true });
  return run(
    root,
    join(root, 'node_modules/esbuild/bin/esbuild'),
    serverBundle(root, join(folder, 'server')),
    'The build of the server',
  );
}

/**
 * The arguments of esbuild: main.ts and every thread of the server (…-thread.ts), side by side in one folder.
 * @param {string} root
 * @param {string} outDir
 */
export function serverBundle(root, outDir) {
  const threads = readdirSync(join(root, 'server'), { recursive: true, encoding: 'utf8' }).filter((path) =>
    path.endsWith('-thread.ts'),
  );
  return [
    'server/main.ts',
    ...threads.map((path) => `server/${path}`),
    '--bundle',
    '--platform=node',
    '--target=node20',
    '--format=esm',
    '--packages=external',
    '--sourcemap',
    '--entry-names=[name]',
    '--log-level=warning',
    `--outdir=${outDir}`,
  ];
}

/** The environment of installing and building: a NODE_ENV of the person's shell would leave packages out. */
export function plainEnvironment() {
  const { NODE_ENV: _, ...env } = process.env;
  return env;
}

/** What is installing or building at the moment. @type {Set<import('node:child_process').ChildProcess>} */
const children = new Set();

/** Ends an installation or a build that is under way; the next start makes it good. */
export function endSetupChildren() {
  for (const child of children) child.kill('SIGTERM');
}

/**
 * @param {string} root
 * @param {string} program
 * @param {string[]} args
 * @param {string} what the subject of the sentence when it fails
 * @returns {Promise<void>}
 */
function run(root, program, args, what) {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { cwd: root, env: plainEnvironment(), stdio: ['ignore', 'pipe', 'pipe'] });
    children.add(child);
    let said = '';
    const listen = (/** @type {Buffer} */ chunk) => (said = (said + chunk).slice(-20_000));
    child.stdout.on('data', listen);
    child.stderr.on('data', listen);
    child.once('error', (error) => reject(new SetupError(`${what} could not start: ${error.message}`)));
    child.once('close', (code, signal) => {
      children.delete(child);
      if (code === 0) return resolve();
      const last = said.trim().split('\n').slice(-25).join('\n  ');
      reject(new SetupError(`${what} did not succeed (${signal ?? `status ${code}`}):\n  ${last}`));
    });
  });
}

/** @param {Buffer} content */
function hashOf(content) {
  return createHash('sha256').update(content).digest('hex');
}
