/** Making, finding and starting one PostgreSQL server process on a data folder. */
import { spawn, spawnSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import {
  chownSync,
  closeSync,
  existsSync,
  mkdirSync,
  openSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { commandPath, declineDebiansOwnCluster, installDebianPackages, isRoot } from './debian.mjs';
import { bindable, SetupError, waitUntil, workingFolder } from './processes.mjs';

const OLDEST_MAJOR = 15;
const LARGEST_LOG_BYTES = 8 << 20;

/** @typedef {{ uid?: number, gid?: number }} User who PostgreSQL runs as; empty means this process's own user */
/** @typedef {{ bin: string, major: number }} Programs */

/** PostgreSQL refuses to run as root, so root lends it the user that Debian's package makes. @returns {User} */
export function unprivilegedUser() {
  if (!isRoot) return {};
  const found = findPostgresUser();
  if (found) return found;
  throw new SetupError(
    'There is no user "postgres" for PostgreSQL to run as. Make one: adduser --system --group postgres',
  );
}

function findPostgresUser() {
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith('postgres:'));
  const [, , uid, gid] = line?.split(':') ?? [];
  return uid && gid ? { uid: Number(uid), gid: Number(gid) } : undefined;
}

/**
 * The folder of initdb and postgres, installed when missing.
 * @param {(line: string) => void} say
 * @param {number} [major] the only version that can open an existing data folder
 * @returns {Programs}
 */
export function serverPrograms(say, major) {
  const found = newestPrograms(major);
  if (found) return found;
  if (major !== undefined) {
    throw new SetupError(
      `The cluster was made by PostgreSQL ${major}, which is no longer installed. Install it: apt-get install postgresql-${major}`,
    );
  }
  if (isRoot) declineDebiansOwnCluster();
  installDebianPackages(['postgresql'], 'the database', say);
  const installed = newestPrograms();
  if (installed) return installed;
  throw new SetupError(
    `The installed PostgreSQL is older than ${OLDEST_MAJOR}, the oldest version that works here. Install a newer one.`,
  );
}

/** @param {number} [major] @returns {Programs | undefined} */
function newestPrograms(major) {
  const debian = '/usr/lib/postgresql';
  const folders = existsSync(debian) ? readdirSync(debian).map((version) => join(debian, version, 'bin')) : [];
  const inPath = commandPath('initdb');
  if (inPath) folders.push(dirname(inPath));
  return folders
    .filter((bin) => existsSync(join(bin, 'initdb')) && existsSync(join(bin, 'postgres')))
    .map((bin) => ({ bin, major: versionOf(bin) }))
    .filter((programs) => (major === undefined ? programs.major >= OLDEST_MAJOR : programs.major === major))
    .sort((a, b) => b.major - a.major)[0];
}

/** @param {string} bin */
function versionOf(bin) {
  const named = /postgresql\/(\d+)\/bin$/.exec(bin)?.[1];
  return Number(
    named ?? /\d+/.exec(spawnSync(join(bin, 'postgres'), ['--version'], { encoding: 'utf8' }).stdout ?? '')?.[0] ?? 0,
  );
}

/** No PG* variable of the person's shell may reach the server, and an ungenerated locale makes initdb stop. */
const serverEnvironment = () => ({ PATH: process.env.PATH, LANG: 'C.UTF-8', LC_ALL: 'C.UTF-8', TZ: 'UTC' });

/**
 * Makes `home/data` with the role hummock and the database hummock, and `home/password`. An interrupted attempt leaves
 * nothing that a later one could take for finished: the data folder gets its name last.
 * @param {{ home: string, user: User, programs: Programs, durable?: boolean }} given
 * @returns {string} the password
 */
export function createCluster({ home, user, programs, durable = true }) {
  for (const name of readdirSync(home))
    if (name.startsWith('data.new')) rmSync(join(home, name), { recursive: true, force: true });
  const folder = join(home, `data.new-${process.pid}`);
  const passwordPath = join(home, `data.new-password-${process.pid}`);
  const password = randomBytes(24).toString('base64url');
  mkdirSync(folder, { mode: 0o700 });
  writeFileSync(passwordPath, password, { mode: 0o600 });
  if (user.uid !== undefined && user.gid !== undefined) {
    chownSync(folder, user.uid, user.gid);
    chownSync(passwordPath, user.uid, user.gid);
  }
  const options = [
    '-U',
    'hummock',
    '--auth=scram-sha-256',
    `--pwfile=${passwordPath}`,
    '--encoding=UTF8',
    '--locale=C.UTF-8',
  ];
  runAs(user, join(programs.bin, 'initdb'), [
    '-D',
    folder,
    '--no-instructions',
    ...(durable ? [] : ['--no-sync']),
    ...options,
  ]);
  rmSync(passwordPath);
  runAs(
    user,
    join(programs.bin, 'postgres'),
    ['--single', '-D', folder, ...(durable ? [] : ['-F']), 'postgres'],
    'CREATE DATABASE hummock;\n',
  );
  writeFileSync(join(home, 'password'), password, { mode: 0o600 });
  renameSync(folder, join(home, 'data'));
  return password;
}

/**
 * @param {User} user
 * @param {string} program
 * @param {string[]} args
 * @param {string} [input]
 */
function runAs(user, program, args, input = '') {
  const run = spawnSync(program, args, { ...user, cwd: '/', env: serverEnvironment(), input, encoding: 'utf8' });
  if (run.status === 0) return;
  const said = run.error?.message ?? `${run.stdout}\n${run.stderr}`.trim().split('\n').slice(-5).join('\n  ');
  throw new SetupError(`Making the PostgreSQL cluster did not succeed:\n  ${said}`);
}

/**
 * The server that runs on the data folder. Its lock file alone proves nothing after kill -9: the process must also work there.
 * @param {string} dataDir
 * @returns {{ pid: number, port: number } | undefined}
 */
export function postmasterOf(dataDir) {
  const lines = lockLines(dataDir);
  const pid = Number(lines[0]);
  if (!pid || workingFolder(pid) !== dataDir || !lines[7]?.startsWith('ready')) return undefined;
  return { pid, port: Number(lines[3]) };
}

/** @param {string} dataDir */
function lockLines(dataDir) {
  try {
    return readFileSync(join(dataDir, 'postmaster.pid'), 'utf8').split('\n'); // line 4 is the port, line 8 the state
  } catch {
    return [];
  }
}

/**
 * Starts a server and waits until it answers. The port is the preferred one when that is free, otherwise any free one;
 * somebody may take it between the look and the start, so a second and third are tried.
 * `endsWithParent`: the kernel itself ends the server when this process ends, whatever way it ends.
 * @param {{ dataDir: string, logPath: string, user: User, programs: Programs, preferredPort?: number, settings?: string[], endsWithParent?: boolean }} given
 * @returns {Promise<{ pid: number, port: number }>}
 */
export async function postmasterStart({ dataDir, logPath, preferredPort = 0, ...given }) {
  for (let attempt = 1; ; attempt += 1) {
    const port = (await bindable(attempt === 1 ? preferredPort : 0)) ?? (await bindable(0)) ?? 0;
    const server = spawnPostmaster({ ...given, dataDir, logPath, port });
    let ended = false;
    server.once('exit', () => (ended = true));
    server.once('error', () => (ended = true));
    await waitUntil(() => ended || postmasterOf(dataDir)?.pid === server.pid, 60_000);
    const running = ended ? undefined : postmasterOf(dataDir);
    if (running) return running;
    if (!ended) server.kill('SIGQUIT');
    if (attempt === 3) throw new SetupError(`PostgreSQL did not start. The end of ${logPath}:\n  ${tail(logPath)}`);
  }
}

/**
 * @param {{ dataDir: string, logPath: string, port: number, user: User, programs: Programs, settings?: string[], endsWithParent?: boolean }} given
 */
function spawnPostmaster({ dataDir, logPath, port, user, programs, settings = [], endsWithParent = false }) {
  const options = [`port=${port}`, 'listen_addresses=127.0.0.1', 'unix_socket_directories=', ...settings];
  const command = [join(programs.bin, 'postgres'), '-D', dataDir, ...options.flatMap((option) => ['-c', option])];
  if (endsWithParent) command.unshift('setpriv', '--pdeathsig', 'SIGQUIT');
  const isLogLarge = existsSync(logPath) && statSync(logPath).size > LARGEST_LOG_BYTES;
  const log = openSync(logPath, isLogLarge ? 'w' : 'a', 0o600);
  const [program = '', ...args] = command;
  const server = spawn(program, args, {
    ...user,
    cwd: '/',
    env: serverEnvironment(),
    stdio: ['ignore', log, log],
    detached: true, // Ctrl-C goes to the starter alone, which stops it in order
  });
  closeSync(log);
  server.unref();
  return server;
}

/** @param {string} path */
function tail(path) {
  return readFileSync(path, 'utf8').trim().split('\n').slice(-5).join('\n  ');
}
