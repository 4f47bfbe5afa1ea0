/** Where the project's own cluster lives: in the checkout, or elsewhere when the PostgreSQL user cannot enter the checkout. */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { isRoot } from './debian.mjs';
import { unprivilegedUser } from './postmaster.mjs';

/**
 * The folder that holds the cluster of this checkout (data, password, port, log), made when it is missing.
 * `.data/cluster-home.json` records a home outside the checkout.
 * @param {string} root
 * @param {(line: string) => void} say
 */
export function clusterHome(root, say) {
  const inside = join(root, '.data', 'postgres');
  const pointerPath = join(root, '.data', 'cluster-home.json');
  const pointer = readPointer(pointerPath);
  if (pointer && existsSync(pointer.home) && !isCopy(pointer, root)) return pointer.home;
  if (existsSync(join(inside, 'data')) || canHold(join(root, '.data'))) {
    openFolder(inside);
    return inside;
  }
  const home = homeOutside(root);
  if (existsSync(home)) setAside(home, say);
  openFolder(home);
  writePrivate(pointerPath, JSON.stringify({ home, root }));
  return home;
}

/**
 * Makes a folder that others may pass through but not list, whatever the umask; one that exists keeps its mode.
 * @param {string} path
 */
export function openFolder(path) {
  if (existsSync(path)) return;
  mkdirSync(path, { recursive: true });
  chmodSync(path, 0o711);
}

/**
 * A file that only this user may read, replaced in one step.
 * @param {string} path
 * @param {string} text
 */
export function writePrivate(path, text) {
  const next = `${path}.next`;
  writeFileSync(next, text, { mode: 0o600 });
  renameSync(next, path);
}

/** @param {string} root */
function homeOutside(root) {
  const key = createHash('sha256').update(root).digest('hex').slice(0, 12);
  return join('/var/lib', `hummock-${key}`);
}

/**
 * A home without a pointer to it belonged to an earlier checkout at the same path. Its data is kept, under another name.
 * @param {string} home
 * @param {(line: string) => void} say
 */
function setAside(home, say) {
  const kept = `${home}-kept-${new Date().toISOString().replaceAll(/[:.]/g, '-')}`;
  renameSync(home, kept);
  say(`The database of an earlier checkout in this place is kept in ${kept}.`);
}

/** @param {string} path @returns {{ home: string, root: string } | undefined} */
function readPointer(path) {
  try {
    return JSON.parse(readFileSync(path, 'utf8'));
  } catch {
    return undefined;
  }
}

/**
 * Whether the checkout was copied, pointer and all, while the original still stands: then each needs a cluster of its own.
 * @param {{ home: string, root: string }} pointer
 * @param {string} root
 */
function isCopy(pointer, root) {
  return pointer.root !== root && readPointer(join(pointer.root, '.data', 'cluster-home.json'))?.home === pointer.home;
}

/**
 * Whether the user that PostgreSQL runs as can enter the folder.
 * @param {string} folder
 */
function canHold(folder) {
  if (!isRoot) return true;
  return spawnSync('test', ['-x', folder], { ...unprivilegedUser(), cwd: '/' }).status === 0;
}
