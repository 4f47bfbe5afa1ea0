/** Debian packages that the project needs: found, or installed where this user may, or named in one command to run. */
import { spawnSync } from 'node:child_process';
import { accessSync, constants, existsSync, mkdirSync, writeFileSync } from 'node:fs';
import { delimiter, dirname, join } from 'node:path';
import { SetupError } from './processes.mjs';

export const isRoot = process.getuid?.() === 0;

/**
 * The full path of a command; undefined when it is nowhere in PATH.
 * @param {string} name
 */
export function commandPath(name) {
  return (process.env.PATH ?? '')
    .split(delimiter)
    .map((folder) => join(folder, name))
    .find((path) => {
      try {
        accessSync(path, constants.X_OK);
        return true;
      } catch {
        return false;
      }
    });
}

/**
 * Installs Debian packages when this user may; otherwise says which command a person must run.
 * @param {string[]} packages
 * @param {string} purpose what they are for, ending a sentence that begins "… is missing: "
 * @param {(line: string) => void} say
 */
export function installDebianPackages(packages, purpose, say) {
  const names = packages.join(' ');
  const byHand = `apt-get update && apt-get install -y ${names}`;
  if (!commandPath('apt-get')) {
    throw new SetupError(
      `${names} is missing (${purpose}), and this system has no apt-get. Install it, then try again.`,
    );
  }
  if (!isRoot) {
    throw new SetupError(`${names} is missing (${purpose}). Run this once, then try again:\n  sudo sh -c '${byHand}'`);
  }
  say(`Installing Debian's ${names}: ${purpose}.`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive', LC_ALL: 'C.UTF-8' };
  const options = ['-y', '--no-install-recommends', '-o', 'DPkg::Lock::Timeout=300'];
  for (const args of [['update'], ['install', ...options, ...packages]]) {
    const run = spawnSync('apt-get', args, { env, encoding: 'utf8', maxBuffer: 64 << 20 });
    if (run.status !== 0) {
      const last = `${run.stdout}\n${run.stderr}`.trim().split('\n').slice(-6).join('\n  ');
      throw new SetupError(
        `apt-get ${args[0]} did not succeed:\n  ${last}\nRun it by hand, then try again:\n  ${byHand}`,
      );
    }
  }
}

/**
 * Debian's postgresql would make and start a cluster of its own on port 5432, which nobody here asks for.
 * A file that somebody has already written is left as it is.
 */
export function declineDebiansOwnCluster() {
  const path = '/etc/postgresql-common/createcluster.conf';
  if (existsSync(path)) return;
  mkdirSync(dirname(path), { recursive: true });
  writeFileSync(
    path,
    '# Written before postgresql was installed for a project that makes its own cluster.\ncreate_main_cluster = false\n',
  );
}
